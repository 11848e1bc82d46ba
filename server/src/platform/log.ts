import { pino, type DestinationStream, type Logger } from 'pino';
import type { Config } from './config';

export type Log = Logger;

/** JSON lines. `error` = a person must act now, `warn` = healed itself, `info` = lifecycle and requests, `debug` = local. */
export function createLog(config: Pick<Config, 'logLevel'>, destination?: DestinationStream): Log {
  const options = {
    level: config.logLevel,
    base: null,
    timestamp: () => `,"time":"${new Date().toISOString()}"`,
    formatters: { level: (label: string) => ({ level: label }) },
    // A second net: nothing below is logged on purpose.
    redact: ['*.password', '*.passwordHash', '*.cookie', '*.authorization', 'req.headers', 'res.headers'],
  };
  return destination === undefined ? pino(options) : pino(options, destination);
}
