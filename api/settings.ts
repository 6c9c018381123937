import { resolve } from 'node:path';

/** Every setting of the server, read in one place. */
export interface Settings {
  /** PORT, 4280. 0: any free one. */
  readonly port: number;
  /** HOST, 0.0.0.0. */
  readonly host: string;
  /** DATA_DIR, ./data: the SQLite file, the secret, later photos, mail, backups. */
  readonly dataDir: string;
  /** APP_DIR, ./dist/app/browser: built application to serve; null (empty): none (tests). */
  readonly appDir: string | null;
  /** TLS_CERT, TLS_KEY: files; both or none. */
  readonly tls: { readonly cert: string; readonly key: string } | null;
  /** PUBLIC_ORIGIN: the address people use, where a proxy stands before the server; several with commas. */
  readonly publicOrigins: readonly string[];
  /** TRUST_PROXY: how many proxies stand before the server, 0. */
  readonly trustProxy: number;
  /** LOG_LEVEL, info. */
  readonly logLevel: string;
  /** BACKUP_HOUR, 2: when a backup is taken each day, by the server's own clock; null (off): only on demand. */
  readonly backupHour: number | null;
  /** BACKUPS_KEPT, 14. */
  readonly backupsKept: number;
}

/** A setting that cannot be used; the message is the sentence for whoever starts the server. */
export class BadSetting extends Error {}

const LOG_LEVELS = ['fatal', 'error', 'warn', 'info', 'debug', 'trace', 'silent'];

/** Reads the settings from the environment. Throws `BadSetting` with one sentence for the first wrong value. */
export function readSettings(env: Readonly<Record<string, string | undefined>>): Settings {
  const cert = text(env['TLS_CERT']);
  const key = text(env['TLS_KEY']);
  if ((cert === null) !== (key === null))
    throw new BadSetting(
      `${cert === null ? 'TLS_KEY' : 'TLS_CERT'} is set but ${cert === null ? 'TLS_CERT' : 'TLS_KEY'} is not: HTTPS needs both files.`,
    );
  const logLevel = text(env['LOG_LEVEL']) ?? 'info';
  if (!LOG_LEVELS.includes(logLevel))
    throw new BadSetting(`LOG_LEVEL=${logLevel} is none of ${LOG_LEVELS.join(', ')}.`);
  return {
    port: wholeNumber('PORT', env['PORT'], 4280, 65_535),
    host: text(env['HOST']) ?? '0.0.0.0',
    dataDir: resolve(text(env['DATA_DIR']) ?? 'data'),
    appDir: env['APP_DIR']?.trim() === '' ? null : resolve(text(env['APP_DIR']) ?? 'dist/app/browser'),
    tls: cert !== null && key !== null ? { cert: resolve(cert), key: resolve(key) } : null,
    publicOrigins: (text(env['PUBLIC_ORIGIN']) ?? '')
      .split(',')
      .map((each) => each.trim())
      .filter((each) => each !== '')
      .map(originOf),
    trustProxy: wholeNumber('TRUST_PROXY', env['TRUST_PROXY'], 0, 10),
    logLevel,
    backupHour:
      env['BACKUP_HOUR']?.trim() === 'off' ? null : wholeNumber('BACKUP_HOUR', env['BACKUP_HOUR'], 2, 23),
    backupsKept: Math.max(1, wholeNumber('BACKUPS_KEPT', env['BACKUPS_KEPT'], 14, 10_000)),
  };
}

function text(value: string | undefined): string | null {
  const trimmed = value?.trim() ?? '';
  return trimmed === '' ? null : trimmed;
}

function wholeNumber(name: string, value: string | undefined, otherwise: number, most: number): number {
  const given = text(value);
  if (given === null) return otherwise;
  const number = Number(given);
  if (!/^\d+$/.test(given) || number > most)
    throw new BadSetting(`${name}=${given} is not a whole number from 0 to ${most}.`);
  return number;
}

function originOf(address: string): string {
  const url = URL.canParse(address) ? new URL(address) : null;
  if (!url || !/^https?:$/.test(url.protocol))
    throw new BadSetting(`PUBLIC_ORIGIN=${address} is not an address such as https://shedbeat.example.`);
  return url.origin;
}
