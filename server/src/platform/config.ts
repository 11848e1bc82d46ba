import { isIP } from 'node:net';
import { dirname, join, resolve } from 'node:path';
import * as z from 'zod';
import type { ScheduleSettings } from './backup/backup-schedule';
import { readMailSettings, type MailSettings } from './mail-settings';
import type { MetricsAddress } from './metrics/metrics-server';
import { findSessionSecret, secretMistake } from './session-secret';

/** Every setting the server reads, once, at its start; docs/configuration.md lists them. */
export interface Config {
  readonly port: number;
  readonly host: string;
  /** A file, or ':memory:'. */
  readonly databasePath: string;
  readonly production: boolean;
  readonly sessionSecret: string;
  /** The file of the key that revisions are signed with; undefined for a database in memory, which has one of its own. */
  readonly signingKeyFile: string | undefined;
  /** The address people open when it is not `http://localhost:PORT`, such as behind a proxy that ends TLS. */
  readonly origin: URL | undefined;
  /** Express's "trust proxy": how many proxies stand before the server, or their addresses. */
  readonly trustProxy: false | number | string[];
  /** Of one session; a stop for runaway scripts. */
  readonly requestsPerMinute: number;
  readonly logLevel: 'debug' | 'info' | 'warn' | 'error' | 'silent';
  /** Undefined = nobody asked for backups by schedule. */
  readonly backups: ScheduleSettings | undefined;
  /** Undefined = figures are not served. */
  readonly metrics: MetricsAddress | undefined;
  readonly mail: MailSettings;
}

/** A setting that cannot be used. Stops the start; the message names the setting and says what it must be. */
export class ConfigError extends Error {
  override readonly name = 'ConfigError';
}

const port = z.coerce.number().int().min(0).max(65_535);
const LOOPBACK = ['localhost', '127.0.0.1', '::1'];

const Settings = z.object({
  PORT: port.default(4310),
  HOST: z.string().min(1).default('127.0.0.1'),
  RISEBACK_DB: z.string().min(1).default('data/riseback.db'),
  NODE_ENV: z.enum(['development', 'test', 'production']).default('development'),
  RISEBACK_SESSION_SECRET: z.string().optional(),
  RISEBACK_SESSION_SECRET_FILE: z.string().min(1).optional(),
  RISEBACK_SIGNING_KEY_FILE: z.string().min(1).optional(),
  RISEBACK_ORIGIN: z.string().optional(),
  TRUST_PROXY: z.string().optional(),
  RISEBACK_REQUESTS_PER_MINUTE: z.coerce.number().int().min(60).max(1e9).default(6_000),
  RISEBACK_LOG_LEVEL: z.enum(['debug', 'info', 'warn', 'error', 'silent']).default('info'),
  RISEBACK_BACKUP_FOLDER: z.string().min(1).optional(),
  RISEBACK_BACKUP_EVERY_HOURS: z.coerce.number().min(0.1).max(168).default(24),
  RISEBACK_BACKUP_KEEP: z.coerce.number().int().min(1).max(10_000).default(14),
  RISEBACK_METRICS_PORT: port.optional(),
  RISEBACK_METRICS_HOST: z.string().min(1).default('127.0.0.1'),
  RISEBACK_SMTP_URL: z.string().optional(),
  RISEBACK_SMTP_URL_FILE: z.string().min(1).optional(),
  RISEBACK_MAIL_FROM: z.string().optional(),
});
type Settings = z.infer<typeof Settings>;

/** What each setting must be, for the message that names a bad one. */
const MUST_BE: Readonly<Record<keyof Settings, string>> = {
  PORT: 'a port number from 0 (any free one) to 65535',
  HOST: 'an address or a host name',
  RISEBACK_DB: 'the path of the database file',
  NODE_ENV: 'development, test or production',
  RISEBACK_SESSION_SECRET: 'a text of at least 32 random bytes',
  RISEBACK_SESSION_SECRET_FILE: 'the path of a file with the secret',
  RISEBACK_SIGNING_KEY_FILE: 'the path of the file with the key that revisions are signed with',
  RISEBACK_ORIGIN: 'an origin such as https://riseback.example',
  TRUST_PROXY: 'a number of proxies, or their addresses separated by commas',
  RISEBACK_REQUESTS_PER_MINUTE: 'a whole number, 60 at least',
  RISEBACK_LOG_LEVEL: 'debug, info, warn, error or silent',
  RISEBACK_BACKUP_FOLDER: 'the path of a folder for backups',
  RISEBACK_BACKUP_EVERY_HOURS: 'a number of hours, 168 at most',
  RISEBACK_BACKUP_KEEP: 'a whole number, 1 at least',
  RISEBACK_METRICS_PORT: 'a port number from 0 (any free one) to 65535',
  RISEBACK_METRICS_HOST: 'an address or a host name',
  RISEBACK_SMTP_URL: 'the address of a mail server',
  RISEBACK_SMTP_URL_FILE: 'the path of a file with the address of a mail server',
  RISEBACK_MAIL_FROM: 'the address that mails come from',
};

/** @throws ConfigError naming the first setting that cannot be used */
export function readConfig(env: Readonly<Record<string, string | undefined>>): Config {
  const settings = parseSettings(env);
  const production = settings.NODE_ENV === 'production';
  const origin = readOrigin(settings, production);
  const databasePath = resolveDatabase(settings);
  return {
    port: settings.PORT,
    host: settings.HOST,
    databasePath,
    production,
    sessionSecret: readSecret(settings, production, databasePath),
    signingKeyFile: resolveSigningKey(settings),
    origin,
    trustProxy: readTrustProxy(settings.TRUST_PROXY),
    requestsPerMinute: settings.RISEBACK_REQUESTS_PER_MINUTE,
    logLevel: settings.RISEBACK_LOG_LEVEL,
    backups: readBackups(settings),
    metrics:
      settings.RISEBACK_METRICS_PORT === undefined
        ? undefined
        : { host: settings.RISEBACK_METRICS_HOST, port: settings.RISEBACK_METRICS_PORT },
    mail: readMail(settings, production, databasePath),
  };
}

/** The one setting that commands on the machine share with the server. @throws ConfigError as readConfig */
export function databasePathOf(env: Readonly<Record<string, string | undefined>>): string {
  return resolveDatabase(parseSettings(env));
}

/** As `databasePathOf`. */
export function signingKeyFileOf(env: Readonly<Record<string, string | undefined>>): string | undefined {
  return resolveSigningKey(parseSettings(env));
}

function resolveSigningKey(settings: Settings): string | undefined {
  const { RISEBACK_SIGNING_KEY_FILE: file } = settings;
  if (file !== undefined) return resolve(file);
  const databasePath = resolveDatabase(settings);
  return databasePath === ':memory:' ? undefined : join(dirname(databasePath), 'signing-key.pem');
}

function readBackups(settings: Settings): ScheduleSettings | undefined {
  if (settings.RISEBACK_BACKUP_FOLDER === undefined) return undefined;
  return {
    folder: resolve(settings.RISEBACK_BACKUP_FOLDER),
    everyHours: settings.RISEBACK_BACKUP_EVERY_HOURS,
    keep: settings.RISEBACK_BACKUP_KEEP,
  };
}

function resolveDatabase({ RISEBACK_DB: path }: Settings): string {
  return path === ':memory:' ? path : resolve(path);
}

function parseSettings(env: Readonly<Record<string, string | undefined>>): Settings {
  // An empty setting counts as absent: `PORT= npm start` must not mean port 0.
  const given = Object.fromEntries(Object.entries(env).filter(([, value]) => value !== undefined && value !== ''));
  const parsed = Settings.safeParse(given);
  if (parsed.success) return parsed.data;
  const name = String(parsed.error.issues[0]?.path[0]) as keyof Settings;
  throw new ConfigError(`${name} must be ${MUST_BE[name]}; it is ${JSON.stringify(given[name])}.`);
}

function readOrigin(settings: Settings, production: boolean): URL | undefined {
  const loopback = LOOPBACK.includes(settings.HOST);
  if (settings.RISEBACK_ORIGIN === undefined) {
    if (loopback) return undefined;
    throw new ConfigError(
      `RISEBACK_ORIGIN must be ${MUST_BE.RISEBACK_ORIGIN} when HOST is not a loopback address; it is missing.`,
    );
  }
  const origin = URL.canParse(settings.RISEBACK_ORIGIN) ? new URL(settings.RISEBACK_ORIGIN) : undefined;
  const bare = origin !== undefined && origin.origin === settings.RISEBACK_ORIGIN.replace(/\/$/, '').toLowerCase();
  if (!bare || !['http:', 'https:'].includes(origin.protocol)) {
    throw new ConfigError(`RISEBACK_ORIGIN must be ${MUST_BE.RISEBACK_ORIGIN}, without a path.`);
  }
  if (production && origin.protocol !== 'https:' && !LOOPBACK.includes(origin.hostname)) {
    throw new ConfigError(
      'RISEBACK_ORIGIN must begin with https:// in production: sign-ins must not travel in the clear.',
    );
  }
  return origin;
}

function readSecret(settings: Settings, production: boolean, databasePath: string): string {
  const given = findSessionSecret({
    secret: settings.RISEBACK_SESSION_SECRET,
    file: settings.RISEBACK_SESSION_SECRET_FILE,
    generatedFile:
      production || databasePath === ':memory:' ? undefined : join(dirname(databasePath), 'session-secret'),
  });
  if (given.mistake !== undefined) throw new ConfigError(given.mistake);
  if (given.secret === undefined) {
    throw new ConfigError(
      `RISEBACK_SESSION_SECRET must be ${MUST_BE.RISEBACK_SESSION_SECRET} (or RISEBACK_SESSION_SECRET_FILE a file with one); it is missing. Make one with: openssl rand -base64 48`,
    );
  }
  const weak = secretMistake(given.secret);
  if (weak !== undefined) throw new ConfigError(`${given.setting} ${weak}. Make one with: openssl rand -base64 48`);
  return given.secret;
}

function readMail(settings: Settings, production: boolean, databasePath: string): MailSettings {
  const read = readMailSettings({
    url: settings.RISEBACK_SMTP_URL,
    urlFile: settings.RISEBACK_SMTP_URL_FILE,
    from: settings.RISEBACK_MAIL_FROM,
    production,
    databasePath,
  });
  if ('mistake' in read) throw new ConfigError(read.mistake);
  return read.settings;
}

function readTrustProxy(text: string | undefined): Config['trustProxy'] {
  if (text === undefined) return false;
  // Express would take `true` for "believe anyone's X-Forwarded-For", which lets a guesser invent addresses.
  if (/^\d{1,2}$/.test(text)) return Number(text);
  const addresses = text.split(',').map((part) => part.trim());
  const known = (address: string) =>
    ['loopback', 'linklocal', 'uniquelocal'].includes(address) || isIP(address.replace(/\/\d{1,3}$/, '')) !== 0;
  if (!addresses.every(known))
    throw new ConfigError(`TRUST_PROXY must be ${MUST_BE.TRUST_PROXY}; it is ${JSON.stringify(text)}.`);
  return addresses;
}
