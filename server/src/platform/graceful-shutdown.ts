import type { Server } from 'node:http';
import type { Log } from './log';

/** Supervisors kill after ten seconds; what is not done by then would be cut off in the middle. */
const PATIENCE_MS = 8_000;
const SWEEP_MS = 50;

/**
 * Ends the process in order: no new connections, requests under way are answered, then `release` closes the rest.
 * @param endStreams ends the answers that would not end by themselves
 * @param release closes worker and database
 */
export function shutDownGracefully(
  server: Server,
  log: Log,
  endStreams: () => void,
  release: () => Promise<void>,
): void {
  let stopping = false;
  // An answered connection that its client keeps open would hold the server until it idles out.
  server.on('request', (_req, res) => {
    if (stopping) res.setHeader('Connection', 'close');
  });
  const stop = (signal: string): void => {
    if (stopping) return;
    stopping = true;
    log.info({ signal }, 'stopping');
    endStreams();
    const sweep = setInterval(() => server.closeIdleConnections(), SWEEP_MS);
    const lastResort = setTimeout(() => {
      log.warn('requests under way took too long and were cut off');
      server.closeAllConnections();
    }, PATIENCE_MS);
    server.close(() => {
      clearInterval(sweep);
      clearTimeout(lastResort);
      release().then(
        () => {
          log.info('stopped');
          process.exit(0);
        },
        (error: unknown) => {
          log.error({ err: error }, 'stopped, but not cleanly');
          process.exit(1);
        },
      );
    });
  };
  process.on('SIGTERM', stop);
  process.on('SIGINT', stop);
}

/** An error that nobody caught leaves the process in a state that nobody knows: it is logged and ends it. */
export function exitOnUncaught(log: Log): void {
  const exit = (error: unknown): void => {
    log.fatal({ err: error }, 'uncaught error');
    process.exit(1);
  };
  process.on('uncaughtException', exit);
  process.on('unhandledRejection', exit);
}
