import { readFileSync } from 'node:fs';
import { join, resolve } from 'node:path';
import { z } from 'zod';

/** Ports below 32768 keep clear of the ephemeral range. */
const port = (fallback: number) =>
  z.coerce.number('must be a port number').int('must be a whole number').min(1, 'must be 1 to 65535').max(65535, 'must be 1 to 65535').default(fallback);

const url = (...protocols: string[]) =>
  z
    .string()
    .refine((value) => protocols.some((protocol) => value.startsWith(`${protocol}://`)) && URL.canParse(value), `must be a URL that begins with ${protocols.map((p) => `${p}://`).join(' or ')}`)
    .optional();

/** Of 32 random hexadecimal digits fewer are different in one secret of 28 million; a letter held down has one. */
const LEAST_SECRET_LETTERS = 8;

const schema = z.object({
  NODE_ENV: z.enum(['development', 'production', 'test'], 'must be development, production or test').default('production'),
  HOST: z.string().min(1).default('127.0.0.1'),
  PORT: port(3000),
  MQTT_PORT: port(1883),
  /** Unset: the embedded broker. Set: an existing broker, to which the ingest subscribes. */
  MQTT_URL: url('mqtt', 'mqtts', 'ws', 'wss'),
  DATABASE_URL: url('postgres', 'postgresql'),
  PGPORT_LOCAL: port(25432),
  DATA_DIR: z.string().min(1).default('./.data').transform((path) => resolve(path)),
  PUBLIC_URL: url('http', 'https'),
  AUTH_SECRET: z
    .string()
    .min(32, 'must have at least 32 characters; unset it to have one made')
    .refine((secret) => new Set(secret).size >= LEAST_SECRET_LETTERS, `must have at least ${LEAST_SECRET_LETTERS} different characters, such as those of \`openssl rand -base64 32\`; unset it to have one made`)
    .optional(),
  SMTP_URL: url('smtp', 'smtps'),
  MAIL_FROM: z.string().min(3, 'must be an address').default('Fallbright <watch@fallbright.example>'),
  /** The pair for push messages; unset: made and kept in DATA_DIR. */
  VAPID_PUBLIC_KEY: z.string().regex(/^[A-Za-z0-9_-]{80,}$/, 'must be a key of `npx web-push generate-vapid-keys`').optional(),
  VAPID_PRIVATE_KEY: z.string().regex(/^[A-Za-z0-9_-]{40,}$/, 'must be a key of `npx web-push generate-vapid-keys`').optional(),
  MAILBOX_SMTP_PORT: port(2525),
  MAILBOX_PORT: port(3001),
  S3_ENDPOINT: url('http', 'https'),
  S3_BUCKET: z.string().min(3, 'must have at least 3 characters').default('fallbright'),
  /** Of the local stand-in, where S3_ENDPOINT is unset; unset too: the first free one from 3002 on. */
  S3_PORT: port(3002).unwrap().optional(),
  AWS_REGION: z.string().min(1).default('us-east-1'),
  AWS_ACCESS_KEY_ID: z.string().min(1).optional(),
  AWS_SECRET_ACCESS_KEY: z.string().min(1).optional(),
  /** 1: push services inside this network and over plain http; unset: only outside production. */
  ALLOW_PRIVATE_TARGETS: z.enum(['0', '1'], 'must be 0 or 1').optional(),
  DEMO: z.enum(['0', '1'], 'must be 0 or 1').default('0').transform((value) => value === '1'),
  LOG_LEVEL: z.enum(['fatal', 'error', 'warn', 'info', 'debug', 'trace', 'silent'], 'must be fatal, error, warn, info, debug, trace or silent').default('info'),
});

export type Env = Omit<z.infer<typeof schema>, 'PUBLIC_URL' | 'SMTP_URL'> & {
  PUBLIC_URL: string;
  /** The local fake mailbox where no mail server is named. */
  SMTP_URL: string;
};

/** Says which variable is wrong and what to do, in one sentence. */
export class EnvError extends Error {
  override name = 'EnvError';
}

/**
 * Checks a set of variables. Empty strings count as unset, as in a copied `.env`.
 * @throws EnvError that names the first bad variable.
 */
export function parseEnv(variables: Record<string, string | undefined>): Env {
  const given = Object.fromEntries(Object.entries(variables).filter(([, value]) => value !== undefined && value !== ''));
  const parsed = schema.safeParse(given);
  if (!parsed.success) {
    const [issue] = parsed.error.issues;
    throw new EnvError(`The variable ${issue?.path.join('.')} ${issue?.message ?? 'is wrong'}. Correct it in the environment or in .env, then start again.`);
  }
  const value = parsed.data;
  return {
    ...value,
    PUBLIC_URL: (value.PUBLIC_URL ?? `http://${value.HOST === '0.0.0.0' ? '127.0.0.1' : value.HOST}:${value.PORT}`).replace(/\/$/, ''),
    SMTP_URL: value.SMTP_URL ?? `smtp://127.0.0.1:${value.MAILBOX_SMTP_PORT}`,
  };
}

/** Whether messages may be sent to addresses inside this network. */
export function privateTargetsAllowed(): boolean {
  const { ALLOW_PRIVATE_TARGETS: told, NODE_ENV } = env();
  return told === undefined ? NODE_ENV !== 'production' : told === '1';
}

let cached: Env | undefined;

/** The checked environment of this process. */
export function env(): Env {
  cached ??= parseEnv(process.env);
  return cached;
}

/** Makes the next call read the variables again; a test that changes one calls it. */
export function forgetEnv(): void {
  cached = undefined;
}

function fromDataDir(file: string): string | undefined {
  try {
    return readFileSync(join(env().DATA_DIR, file), 'utf8').trim();
  } catch {
    return undefined;
  }
}

/** Where start keeps what it made: the address of its PostgreSQL and the sign-in secret. */
export const DATABASE_URL_FILE = 'database.url';
export const AUTH_SECRET_FILE = 'auth.secret';
export const STORAGE_URL_FILE = 'storage.url';
export const FIRST_S3_PORT = 3002;

/** The database's address: DATABASE_URL, else that of the PostgreSQL that start manages. */
export function databaseUrl(): string {
  const found = env().DATABASE_URL ?? fromDataDir(DATABASE_URL_FILE);
  if (!found) throw new EnvError('The variable DATABASE_URL is not set and no local PostgreSQL was started in DATA_DIR. Set it, or run `bash scripts/start.sh` first.');
  return found;
}

/** Where photos' files are kept: S3_ENDPOINT, else the local stand-in. */
export function storageUrl(): string {
  const { S3_ENDPOINT, S3_PORT } = env();
  if (S3_ENDPOINT !== undefined) return S3_ENDPOINT;
  return S3_PORT === undefined ? (fromDataDir(STORAGE_URL_FILE) ?? `http://127.0.0.1:${FIRST_S3_PORT}`) : `http://127.0.0.1:${S3_PORT}`;
}

/** The secret that signs sessions and links. */
export function authSecret(): string {
  const found = env().AUTH_SECRET ?? fromDataDir(AUTH_SECRET_FILE);
  if (!found) throw new EnvError('The variable AUTH_SECRET is not set. Set it to at least 32 random characters.');
  return found;
}
