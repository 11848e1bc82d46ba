import type { Server } from 'node:http';
import { Server as NetServer } from 'node:net';
import type { Log } from './log';
import { OpenConnections } from './open-connections';

/** Supervisors kill after ten seconds; what is not done by then would be cut off in the middle. */
const PATIENCE_MS = 8_000;
const SWEEP_MS = 50;
/** A client that is at work sends its next request within this time, and is told with its answer that it was the last. */
const IDLE_MS = 500;

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
  const connections = new OpenConnections(server);
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
    const sweep = setInterval(() => connections.closeIdleFor(IDLE_MS), SWEEP_MS);
    const lastResort = setTimeout(() => {
      log.warn('requests under way took too long and were cut off');
      server.closeAllConnections();
    }, PATIENCE_MS);
    const finish = (): void => {
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
    };
    // After the connections that arrived with the signal were taken on. The close of net.Server, since that of
    // http.Server first destroys what it holds for idle, with requests that are on their way.
    setImmediate(() => NetServer.prototype.close.call(server, finish));
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
