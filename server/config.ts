import { existsSync, readFileSync } from 'node:fs';
import { join, resolve } from 'node:path';
import { isLoopback, settings, type Settings } from './environment';

/** The service that takes card payments; `endpoint` is set for the local stand-in alone. */
export interface PaymentConfig {
  readonly secretKey: string;
  /** The secret in use and, during a rotation, the former one. */
  readonly webhookSecrets: readonly string[];
  readonly endpoint: { readonly host: string; readonly port: number } | null;
}

export interface Config {
  readonly port: number;
  readonly host: string;
  /** What people type: scheme, host and port, without a path. */
  readonly origin: string;
  /** True behind TLS: cookies are then Secure and carry the `__Host-` prefix. */
  readonly secureCookies: boolean;
  /** The role that owns nothing. */
  readonly databaseUrl: string;
  /** The role that owns the tables and migrates them; null where another process migrates. */
  readonly databaseOwnerUrl: string | null;
  /** A streaming replica for reports; null when there is none. */
  readonly databaseReplicaUrl: string | null;
  /** Absolute. */
  readonly dataFolder: string;
  readonly demo: boolean;
  /** Whether this process also works on the job queue. */
  readonly worker: boolean;
  readonly sessionSecret: string;
  readonly csrfSecret: string;
  /** Null: patients cannot pay online until it is set. */
  readonly stripe: PaymentConfig | null;
  /** `url` null: messages wait in the outbox until it is set. */
  readonly smtp: { readonly url: string | null; readonly from: string };
  /** What patients know the program by. */
  readonly programName: string;
  readonly logLevel: Settings['LOG_LEVEL'];
  /** How many proxies stand before the server and may tell the caller's address. */
  readonly trustProxyHops: number;
}

/** "Harbor Lane <desk@harborlane.example>" is Harbor Lane; an address alone stands for itself. */
const senderName = (from: string): string => from.split('<')[0]?.trim() || from;

/** One or more settings are wrong; the message names each and what is expected. */
export class ConfigError extends Error {
  constructor(readonly problems: readonly string[]) {
    super(problems.join('\n'));
    this.name = 'ConfigError';
  }
}

type Environment = Readonly<Record<string, string | undefined>>;

/** An empty value counts as unset: that is how a person clears one in a shell or a container file. */
function given(env: Environment): Record<string, string> {
  return Object.fromEntries(
    Object.entries(env).filter((entry): entry is [string, string] => Boolean(entry[1])),
  );
}

/** A misspelt PLIMSOLL_DEMO must not start the demonstration in a clinic. */
function unknownNames(env: Environment): string[] {
  return Object.keys(env)
    .filter((name) => name.startsWith('PLIMSOLL_') && !(name in settings.shape))
    .map((name) => `${name}: there is no such setting.`);
}

function parseSettings(env: Environment): Settings {
  const parsed = settings.safeParse(given(env));
  const problems = unknownNames(env);
  if (!parsed.success) {
    for (const issue of parsed.error.issues) {
      const name = String(issue.path[0]);
      problems.push(`${name}: ${env[name] ? issue.message : 'is not set'}.`);
    }
  }
  if (!parsed.success || problems.length > 0) throw new ConfigError(problems);
  return parsed.data;
}

/** From the setting, else from the file that `npm start` made at the first start. */
function readSecret(name: keyof Settings, value: string | undefined, file: string): string {
  if (value) return value;
  if (existsSync(file)) return readFileSync(file, 'utf8').trim();
  throw new ConfigError([`${name}: is not set, and there is no file ${file}.`]);
}

function paymentConfig(all: Settings): PaymentConfig | null {
  if (!all.STRIPE_SECRET_KEY || !all.STRIPE_WEBHOOK_SECRET) return null;
  const base = all.STRIPE_API_BASE ? new URL(all.STRIPE_API_BASE) : null;
  return {
    secretKey: all.STRIPE_SECRET_KEY,
    webhookSecrets: all.STRIPE_WEBHOOK_SECRET.split(','),
    endpoint: base ? { host: base.hostname, port: Number(base.port || 80) } : null,
  };
}

/** What a demonstration must not do: be reached from elsewhere, or move real money. */
function demoProblems(all: Settings, origin: string): string[] {
  const problems: string[] = [];
  if (!isLoopback(all.PLIMSOLL_HOST) || !isLoopback(new URL(origin).hostname)) {
    problems.push(
      'PLIMSOLL_HOST, PLIMSOLL_ORIGIN: the demonstration is for 127.0.0.1 alone; set PLIMSOLL_DEMO=off to serve others.',
    );
  }
  if (all.STRIPE_SECRET_KEY?.includes('_live_')) {
    problems.push(
      'STRIPE_SECRET_KEY: the demonstration takes no live key; use one that begins with sk_test_, or PLIMSOLL_DEMO=off.',
    );
  }
  return problems;
}

/** What a real program must not do: run on test money, on the stand-in, or as the tables' owner. */
function productionProblems(all: Settings): string[] {
  const problems: string[] = [];
  if (all.STRIPE_SECRET_KEY?.includes('_test_')) {
    problems.push('STRIPE_SECRET_KEY: expected a live key (sk_live_) while PLIMSOLL_DEMO=off.');
  }
  if (all.STRIPE_API_BASE) {
    problems.push('STRIPE_API_BASE: the stand-in is for the demonstration; unset it.');
  }
  if (all.DATABASE_OWNER_URL && userOf(all.DATABASE_OWNER_URL) === userOf(all.DATABASE_URL)) {
    problems.push(
      'DATABASE_URL: expected a role other than the owner of DATABASE_OWNER_URL, so that the server cannot rewrite its audit.',
    );
  }
  if (existsSync(join(resolve(all.PLIMSOLL_DATA), 'demo-data'))) {
    problems.push(
      'PLIMSOLL_DEMO, PLIMSOLL_DATA: this folder holds demonstration data; name an empty one for a real program.',
    );
  }
  return problems;
}

const userOf = (url: string): string => new URL(url).username;

function checkTogether(all: Settings, origin: string): void {
  const problems = all.PLIMSOLL_DEMO ? demoProblems(all, origin) : productionProblems(all);
  if (Boolean(all.STRIPE_SECRET_KEY) !== Boolean(all.STRIPE_WEBHOOK_SECRET)) {
    problems.push('STRIPE_SECRET_KEY, STRIPE_WEBHOOK_SECRET: expected both or neither.');
  }
  if (problems.length > 0) throw new ConfigError(problems);
}

/**
 * Reads and checks every setting; the only place of the server that reads the environment.
 * @throws ConfigError that names each wrong setting and what is expected; it never repeats a secret's value
 */
export function loadConfig(env: Environment): Config {
  const all = parseSettings(env);
  const origin = all.PLIMSOLL_ORIGIN ?? `http://127.0.0.1:${all.PORT}`;
  checkTogether(all, origin);
  const dataFolder = resolve(all.PLIMSOLL_DATA);
  const secretFile = (name: string): string => join(dataFolder, 'secrets', name);
  return {
    port: all.PORT,
    host: all.PLIMSOLL_HOST,
    origin,
    secureCookies: origin.startsWith('https:'),
    databaseUrl: all.DATABASE_URL,
    databaseOwnerUrl: all.DATABASE_OWNER_URL ?? null,
    databaseReplicaUrl: all.DATABASE_REPLICA_URL ?? null,
    dataFolder,
    demo: all.PLIMSOLL_DEMO,
    worker: all.PLIMSOLL_WORKER,
    sessionSecret: readSecret(
      'PLIMSOLL_SESSION_SECRET',
      all.PLIMSOLL_SESSION_SECRET,
      secretFile('session'),
    ),
    csrfSecret: readSecret('PLIMSOLL_CSRF_SECRET', all.PLIMSOLL_CSRF_SECRET, secretFile('csrf')),
    stripe: paymentConfig(all),
    smtp: { url: all.SMTP_URL ?? null, from: all.PLIMSOLL_MAIL_FROM },
    programName: all.PLIMSOLL_PROGRAM ?? senderName(all.PLIMSOLL_MAIL_FROM),
    logLevel: all.LOG_LEVEL,
    trustProxyHops: all.PLIMSOLL_TRUST_PROXY,
  };
}
