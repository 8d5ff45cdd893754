import { availableParallelism } from 'node:os';
import { resolve } from 'node:path';
import { z } from 'zod';

/** Everything the server can be told from outside, after validation; sizes in bytes or MB (1024² bytes) as named. */
export interface Config {
  nodeEnv: 'development' | 'test' | 'production';
  host: string;
  port: number;
  /** Address people open in the browser, without a trailing slash. */
  publicUrl: string;
  /** Absolute path of the folder that holds everything to be backed up. */
  dataDir: string;
  db: { host: string; port: number; user: string; password: string; name: string };
  sessionSecret: string;
  sessionDays: number;
  /** How many reverse proxies stand in front of the server. */
  trustProxy: number;
  smtpUrl: string | null;
  mailFrom: string;
  uploadLimitBytes: number;
  maxScenePixels: number;
  ingest: { timeoutSeconds: number; memoryMb: number };
  workerThreads: number;
  /** Jobs at the same time in one server process, by lane, and long ones of one project over all processes. */
  jobs: { long: number; short: number; perProject: number };
  tileCacheMb: number;
  /** Whom an empty server without a demo makes site administrator. */
  adminEmail: string | null;
  /** Whether an empty server loads the demo project. */
  demo: boolean;
  logLevel: LogLevel;
}

const LOG_LEVELS = ['fatal', 'error', 'warn', 'info', 'debug', 'trace', 'silent'] as const;
export type LogLevel = (typeof LOG_LEVELS)[number];

/** One setting that cannot be used: its variable, what was found (secrets hidden) and what is wanted. */
export interface ConfigProblem {
  name: string;
  found: string;
  wanted: string;
}

/** Thrown by readConfig with every problem at once, so that an operator mends them in one go. */
export class ConfigError extends Error {
  override readonly name = 'ConfigError';

  constructor(readonly problems: readonly ConfigProblem[]) {
    const lines = problems.map(({ name, found, wanted }) => `  ${name}: found ${found}; wanted ${wanted}`);
    super(`${problems.length} setting${problems.length === 1 ? '' : 's'} cannot be used:\n${lines.join('\n')}`);
  }
}

const SECRET_NAMES = new Set(['GROUNDSEL_SESSION_SECRET', 'GROUNDSEL_DB_PASSWORD', 'GROUNDSEL_SMTP_URL']);
const MEBIBYTE = 1024 * 1024;

function text(wanted: string, pattern: RegExp) {
  return z.string({ error: wanted }).regex(pattern, { error: wanted });
}

function wholeNumber(min: number, max: number, what: string) {
  const wanted = `${what}: a whole number from ${min} to ${max}`;
  return z
    .string({ error: wanted })
    .transform(Number)
    .refine((value) => Number.isInteger(value) && value >= min && value <= max, { error: wanted });
}

function oneOf<const T extends readonly [string, ...string[]]>(values: T) {
  return z.enum(values, { error: `one of ${values.join(', ')}` });
}

function address(protocols: readonly string[], wanted: string) {
  return z.string({ error: wanted }).refine(
    (value) => {
      const url = URL.canParse(value) ? new URL(value) : null;
      return url !== null && protocols.includes(url.protocol) && url.hostname !== '';
    },
    { error: wanted },
  );
}

const schema = z.object({
  NODE_ENV: oneOf(['development', 'test', 'production']).default('development'),
  GROUNDSEL_HOST: text('a host name or address to listen on, such as 127.0.0.1', /^[\w.:-]+$/).default('127.0.0.1'),
  GROUNDSEL_PORT: wholeNumber(1, 65_535, 'a port').prefault('4310'),
  GROUNDSEL_PUBLIC_URL: address(
    ['http:', 'https:'],
    'the address people open, such as https://maps.example.org',
  ).optional(),
  GROUNDSEL_DATA_DIR: z.string().default('.data'),
  GROUNDSEL_DB_HOST: text('the host of the MariaDB server', /^[\w.:-]+$/),
  GROUNDSEL_DB_PORT: wholeNumber(1, 65_535, 'the port of the MariaDB server').prefault('3306'),
  GROUNDSEL_DB_USER: text('the name of a MariaDB user', /^\S{1,80}$/),
  GROUNDSEL_DB_PASSWORD: text("the MariaDB user's password", /^.+$/s),
  GROUNDSEL_DB_NAME: text('a database name of letters, digits and underscores', /^\w{1,64}$/).default('groundsel'),
  GROUNDSEL_SESSION_SECRET: text('at least 32 characters that nobody can guess', /^.{32,}$/s),
  GROUNDSEL_SESSION_DAYS: wholeNumber(1, 365, 'days').prefault('14'),
  GROUNDSEL_TRUST_PROXY: wholeNumber(0, 10, 'reverse proxies in front of the server').prefault('0'),
  GROUNDSEL_SMTP_URL: address(['smtp:', 'smtps:'], 'smtp:// or smtps:// with a host').optional(),
  GROUNDSEL_MAIL_FROM: text(
    'a sender such as Groundsel <groundsel@example.org>',
    /^(?:[^<>@]*<[^\s<>@]+@[^\s<>@]+>|[^\s<>@]+@[^\s<>@]+)$/,
  ).default('Groundsel <groundsel@localhost>'),
  GROUNDSEL_UPLOAD_LIMIT_MB: wholeNumber(1, 1_048_576, 'MB a file').prefault('4096'),
  GROUNDSEL_MAX_SCENE_PIXELS: wholeNumber(1, 10_000_000_000, 'pixels a band').prefault('500000000'),
  GROUNDSEL_INGEST_TIMEOUT_SECONDS: wholeNumber(10, 86_400, 'seconds').prefault('1800'),
  GROUNDSEL_INGEST_MEMORY_MB: wholeNumber(256, 1_048_576, 'MB').prefault('3072'),
  GROUNDSEL_WORKER_THREADS: wholeNumber(1, 256, 'threads').prefault(String(availableParallelism())),
  GROUNDSEL_LONG_JOBS: wholeNumber(1, 64, 'long jobs at a time').prefault('1'),
  GROUNDSEL_SHORT_JOBS: wholeNumber(1, 64, 'short jobs at a time').prefault('1'),
  GROUNDSEL_PROJECT_JOBS: wholeNumber(1, 64, 'long jobs of one project at a time').prefault('1'),
  GROUNDSEL_TILE_CACHE_MB: wholeNumber(0, 1_048_576, 'MB').prefault('256'),
  GROUNDSEL_ADMIN_EMAIL: text('the e-mail of the first site administrator', /^[^\s@]+@[^\s@]+$/).optional(),
  GROUNDSEL_DEMO: oneOf(['on', 'off']).default('on'),
  GROUNDSEL_LOG_LEVEL: oneOf(LOG_LEVELS).default('info'),
});

/** Names of all settings, in the order of `.env.example`. */
export const settingNames: readonly string[] = Object.keys(schema.shape);

/**
 * Reads and validates the settings from environment variables; an empty value counts as not given.
 *
 * @throws ConfigError naming every variable that is missing, malformed or unknown.
 */
export function readConfig(env: NodeJS.ProcessEnv): Config {
  const given = Object.fromEntries(
    settingNames.map((name) => [name, env[name]?.trim()]).filter(([, value]) => value !== undefined && value !== ''),
  );
  const parsed = schema.safeParse(given);
  const problems = [...findUnknownNames(env), ...(parsed.success ? [] : describeIssues(parsed.error, given))];
  if (!parsed.success || problems.length > 0) throw new ConfigError(problems);

  const value = parsed.data;
  return {
    nodeEnv: value.NODE_ENV,
    host: value.GROUNDSEL_HOST,
    port: value.GROUNDSEL_PORT,
    publicUrl: (value.GROUNDSEL_PUBLIC_URL ?? defaultPublicUrl(value.GROUNDSEL_HOST, value.GROUNDSEL_PORT)).replace(
      /\/+$/,
      '',
    ),
    dataDir: resolve(value.GROUNDSEL_DATA_DIR),
    db: {
      host: value.GROUNDSEL_DB_HOST,
      port: value.GROUNDSEL_DB_PORT,
      user: value.GROUNDSEL_DB_USER,
      password: value.GROUNDSEL_DB_PASSWORD,
      name: value.GROUNDSEL_DB_NAME,
    },
    sessionSecret: value.GROUNDSEL_SESSION_SECRET,
    sessionDays: value.GROUNDSEL_SESSION_DAYS,
    trustProxy: value.GROUNDSEL_TRUST_PROXY,
    smtpUrl: value.GROUNDSEL_SMTP_URL ?? null,
    mailFrom: value.GROUNDSEL_MAIL_FROM,
    uploadLimitBytes: value.GROUNDSEL_UPLOAD_LIMIT_MB * MEBIBYTE,
    maxScenePixels: value.GROUNDSEL_MAX_SCENE_PIXELS,
    ingest: { timeoutSeconds: value.GROUNDSEL_INGEST_TIMEOUT_SECONDS, memoryMb: value.GROUNDSEL_INGEST_MEMORY_MB },
    workerThreads: value.GROUNDSEL_WORKER_THREADS,
    jobs: {
      long: value.GROUNDSEL_LONG_JOBS,
      short: value.GROUNDSEL_SHORT_JOBS,
      perProject: value.GROUNDSEL_PROJECT_JOBS,
    },
    tileCacheMb: value.GROUNDSEL_TILE_CACHE_MB,
    adminEmail: value.GROUNDSEL_ADMIN_EMAIL?.toLowerCase() ?? null,
    demo: value.GROUNDSEL_DEMO === 'on',
    logLevel: value.GROUNDSEL_LOG_LEVEL,
  };
}

/** A wildcard listening address is no address to open, so the link then names this machine. */
function defaultPublicUrl(host: string, port: number): string {
  if (host === '0.0.0.0' || host === '::') return `http://localhost:${port}`;
  return `http://${host.includes(':') ? `[${host}]` : host}:${port}`;
}

function describeIssues(error: z.ZodError, given: Record<string, string | undefined>): ConfigProblem[] {
  return error.issues.map((issue) => {
    const name = String(issue.path[0]);
    return { name, found: describeValue(name, given[name]), wanted: issue.message };
  });
}

function describeValue(name: string, value: string | undefined): string {
  if (value === undefined) return 'nothing';
  return SECRET_NAMES.has(name) ? `a hidden value of ${value.length} characters` : JSON.stringify(value);
}

/** A misspelt name would otherwise be a setting silently left at its default. */
function findUnknownNames(env: NodeJS.ProcessEnv): ConfigProblem[] {
  return Object.keys(env)
    .filter((name) => name.startsWith('GROUNDSEL_') && !name.startsWith('GROUNDSEL_TEST_'))
    .filter((name) => !settingNames.includes(name))
    .map((name) => ({ name, found: 'a setting of this name', wanted: 'a name that .env.example lists' }));
}
