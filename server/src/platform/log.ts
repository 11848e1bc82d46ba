import { dirname, join } from 'node:path';
import { destination, multistream, pino, type DestinationStream, type Logger } from 'pino';
import type { Config } from './config';

export type Log = Logger;

/** JSON lines. `error` = a person must act now, `warn` = healed itself, `info` = lifecycle and requests, `debug` = local. */
export function createLog(config: Pick<Config, 'logLevel'>, stream: DestinationStream): Log {
  const options = {
    level: config.logLevel,
    base: null,
    timestamp: () => `,"time":"${new Date().toISOString()}"`,
    formatters: { level: (label: string) => ({ level: label }) },
    // A second net: nothing below is logged on purpose.
    redact: ['*.password', '*.passwordHash', '*.cookie', '*.authorization', 'req.headers', 'res.headers'],
  };
  return pino(options, stream);
}

/** Where the lines go: what `logFile` names, or standard output; errors on a terminal's standard error as well. */
export function logDestination(logFile: string | undefined): DestinationStream {
  if (logFile === undefined) return destination({ dest: 1, sync: true });
  const file = destination({ dest: logFile, mkdir: true, sync: true, mode: 0o600 });
  return multistream([
    { level: 'debug', stream: file },
    { level: 'error', stream: destination({ dest: 2, sync: true }) },
  ]);
}

/** In production a supervisor collects standard output; at a desk, request lines would push the address off the screen. */
export function logFileOf(config: Pick<Config, 'production' | 'databasePath'>): string | undefined {
  if (config.production || config.databasePath === ':memory:') return undefined;
  return join(dirname(config.databasePath), 'riseback.log');
}
