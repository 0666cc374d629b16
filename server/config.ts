import { hkdfSync } from 'node:crypto';
import path from 'node:path';

/** Everything the server is told from outside, parsed once. `.env.example` lists the variables with their meanings. */
export interface Config {
  /** `demo` and `test` accept made-up secrets and plain HTTP; `production` refuses both. */
  readonly mode: 'demo' | 'test' | 'production';
  readonly host: string;
  readonly port: number;
  /** The origin that labels, mail and the payment page return to, without a trailing slash. */
  readonly publicUrl: string;
  /** Cookies get `Secure` when the public origin is HTTPS. */
  readonly secureCookies: boolean;
  readonly trustProxy: boolean | number | string;
  readonly logLevel: string;
  /** The exported web app; undefined serves the API alone. */
  readonly webDir: string | undefined;
  readonly storageDir: string;
  readonly database: { readonly url: string; readonly queueUrl: string; readonly poolSize: number };
  readonly accessTokenSecret: string;
  /** Keys the hashes of addresses and e-mails kept for throttling, so that they cannot be guessed backwards. */
  readonly throttleKey: Buffer;
  readonly limits: { readonly publicPerMinute: number; readonly failuresPerAccount: number; readonly failuresPerAddress: number };
  readonly stripe: {
    readonly secretKey: string;
    readonly webhookSecret: string;
    /** Where the payment fake listens, e.g. `http://127.0.0.1:8090`; undefined talks to the real service. */
    readonly apiBase: string | undefined;
  };
  readonly mail: { readonly smtpUrl: string; readonly from: string };
}

export type Environment = Readonly<Record<string, string | undefined>>;

/** The configuration is wrong; every fault is named at once, and the process should end. */
export class ConfigError extends Error {
  constructor(readonly faults: readonly string[]) {
    super(`The configuration is not complete:\n${faults.map((fault) => `  - ${fault}`).join('\n')}`);
    this.name = 'ConfigError';
  }
}

/** Reads the environment. Throws one `ConfigError` that names every missing or refused variable. */
export function readConfig(env: Environment): Config {
  const read = new Reader(env);
  const mode = read.oneOf('TRAYWARD_MODE', ['demo', 'test', 'production'], 'production');
  const port = read.integer('PORT', 8080, { min: 0, max: 65_535 });
  const publicUrl = read.origin('PUBLIC_URL', mode === 'production' ? undefined : `http://localhost:${port}`);
  const accessTokenSecret = read.secret('ACCESS_TOKEN_SECRET', mode);
  const config: Config = {
    mode,
    host: read.text('HOST', mode === 'production' ? '0.0.0.0' : '127.0.0.1'),
    port,
    publicUrl,
    secureCookies: publicUrl.startsWith('https:'),
    trustProxy: proxies(read.text('TRUST_PROXY', 'false')),
    logLevel: read.oneOf('LOG_LEVEL', ['silent', 'fatal', 'error', 'warn', 'info', 'debug', 'trace'], 'info'),
    webDir: optionalPath(env['WEB_DIR']),
    storageDir: path.resolve(read.text('STORAGE_DIR', mode === 'production' ? undefined : '.trayward/storage')),
    database: {
      url: read.text('DATABASE_URL', undefined),
      queueUrl: read.text('DATABASE_QUEUE_URL', undefined),
      poolSize: read.integer('DATABASE_POOL', 12, { min: 2, max: 100 }),
    },
    accessTokenSecret,
    throttleKey: Buffer.from(hkdfSync('sha256', accessTokenSecret, '', 'trayward throttling', 32)),
    limits: {
      publicPerMinute: read.integer('PUBLIC_REQUESTS_PER_MINUTE', 120, { min: 1, max: 1_000_000 }),
      failuresPerAccount: read.integer('SIGN_IN_FAILURES_PER_ACCOUNT', 10, { min: 1, max: 1_000 }),
      failuresPerAddress: read.integer('SIGN_IN_FAILURES_PER_ADDRESS', 60, { min: 1, max: 100_000 }),
    },
    stripe: {
      secretKey: read.secret('STRIPE_SECRET_KEY', mode, 8),
      webhookSecret: read.secret('STRIPE_WEBHOOK_SECRET', mode, 8),
      apiBase: read.address('STRIPE_API_BASE'),
    },
    mail: { smtpUrl: read.text('SMTP_URL', undefined), from: read.text('MAIL_FROM', mode === 'production' ? undefined : 'Trayward <desk@trayward.example>') },
  };
  if (mode === 'production' && config.stripe.apiBase !== undefined) read.fault('STRIPE_API_BASE points at the payment fake and must be empty in production');
  read.finish();
  return config;
}

/** The payment settings as the payment port takes them: the fake's address in parts, or none for the real service. */
export function paymentSettings({ stripe }: Config): { secretKey: string; webhookSecret: string; apiBase?: { host: string; port: number; protocol: 'http' | 'https' } } {
  const { secretKey, webhookSecret, apiBase } = stripe;
  if (apiBase === undefined) return { secretKey, webhookSecret };
  const url = new URL(apiBase);
  const protocol = url.protocol === 'https:' ? 'https' : 'http';
  return { secretKey, webhookSecret, apiBase: { host: url.hostname, port: Number(url.port || (protocol === 'https' ? 443 : 80)), protocol } };
}

/** Reads single variables and collects what is wrong with them. */
class Reader {
  private readonly faults: string[] = [];

  constructor(private readonly env: Environment) {}

  fault(message: string): void {
    this.faults.push(message);
  }

  finish(): void {
    if (this.faults.length > 0) throw new ConfigError(this.faults);
  }

  optional(name: string): string | undefined {
    const value = this.env[name]?.trim();
    return value === '' ? undefined : value;
  }

  text(name: string, fallback: string | undefined): string {
    const value = this.optional(name) ?? fallback;
    if (value === undefined) this.fault(`${name} is required`);
    return value ?? '';
  }

  oneOf<T extends string>(name: string, allowed: readonly T[], fallback: T): T {
    const value = this.optional(name);
    if (value === undefined) return fallback;
    const found = allowed.find((item) => item === value);
    if (found === undefined) this.fault(`${name} must be one of ${allowed.join(', ')}`);
    return found ?? fallback;
  }

  integer(name: string, fallback: number, range: { min: number; max: number }): number {
    const value = this.optional(name);
    if (value === undefined) return fallback;
    const number = Number(value);
    if (Number.isInteger(number) && number >= range.min && number <= range.max) return number;
    this.fault(`${name} must be a whole number from ${range.min} to ${range.max}`);
    return fallback;
  }

  origin(name: string, fallback: string | undefined): string {
    const value = this.text(name, fallback).replace(/\/+$/, '');
    if (value === '') return value;
    if (!URL.canParse(value) || new URL(value).origin !== value) this.fault(`${name} must be an origin such as https://lend.example.org`);
    return value;
  }

  address(name: string): string | undefined {
    const value = this.optional(name);
    if (value !== undefined && !URL.canParse(value)) this.fault(`${name} must be an address such as http://127.0.0.1:8090`);
    return value;
  }

  /** Production refuses short secrets and the demo's, which all carry the word. */
  secret(name: string, mode: Config['mode'], minLength = 32): string {
    const value = this.text(name, undefined);
    if (mode !== 'production' || value === '') return value;
    if (/demo/i.test(value)) this.fault(`${name} is one of the demo's secrets; make your own`);
    else if (value.length < minLength) this.fault(`${name} must have at least ${minLength} characters`);
    return value;
  }
}

/** Express's `trust proxy`: `false`, a number of proxies, or addresses and the names `loopback`, `linklocal`, `uniquelocal`. */
function proxies(value: string): boolean | number | string {
  if (value === 'false') return false;
  const hops = Number(value);
  return Number.isInteger(hops) ? hops : value;
}

function optionalPath(value: string | undefined): string | undefined {
  return value === undefined || value.trim() === '' ? undefined : path.resolve(value);
}
