import { spawn } from 'node:child_process';
import { mkdtemp, readFile, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import { encode } from 'next-auth/jwt';
import { SignIn } from '@/db/models';
import { buildWeb } from '@/scripts/lib/build';
import { takeLock } from '@/scripts/lib/process-lock';
import { freePort } from '@/scripts/lib/postgres';
import { until } from './processes';

const ROOT = resolve(import.meta.dirname, '../..');
const DIST = '.next';
/** What signs cookies and links in the tests; every part of a house has to have the same. */
export const SECRET = process.env.AUTH_SECRET ?? 'a secret that only the tests know, 0123456789';
const BUILD_PATIENCE_MS = 600_000;

export interface Web {
  url: string;
  pid: number;
  /** Resident memory, bytes. */
  memory(): Promise<number>;
  /** Everything it wrote so far. */
  output(): string;
  kill(signal: NodeJS.Signals): void;
  /** Resolves with the time that stopping took, ms. */
  stop(): Promise<number>;
}

/** Builds the web part once for all suites, unless the build there has the same sources. TEST_WEB_DIST names a build to take as it is. */
async function built(): Promise<string> {
  const given = process.env.TEST_WEB_DIST;
  if (given) return given;
  // Two suites at once: the second waits for the first one's build, unless that one was ended in the midst of it.
  const lock = await until('the other suite’s web build', () => takeLock(join(ROOT, DIST)), BUILD_PATIENCE_MS);
  try {
    await buildWeb(ROOT, DIST);
  } finally {
    await lock.free();
  }
  return DIST;
}

/** The built web server on a free port, with a database of the caller's. */
export async function startWeb({ databaseUrl, variables = {} }: { databaseUrl: string; variables?: Record<string, string> }): Promise<Web> {
  const dist = await built();
  const port = await freePort();
  const url = `http://127.0.0.1:${port}`;
  const folder = await mkdtemp(join(tmpdir(), 'fallbright-web-'));
  const output: string[] = [];
  const child = spawn(process.execPath, [join(ROOT, 'node_modules/next/dist/bin/next'), 'start', '-p', String(port), '-H', '127.0.0.1'], {
    cwd: ROOT,
    env: { ...process.env, NODE_ENV: 'production', NEXT_DIST_DIR: dist, NEXT_TELEMETRY_DISABLED: '1', LOG_LEVEL: 'info', HOST: '127.0.0.1', PORT: String(port), PUBLIC_URL: url, DATABASE_URL: databaseUrl, AUTH_SECRET: SECRET, DATA_DIR: folder, ...variables },
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  const atExit = () => child.kill('SIGKILL');
  process.on('exit', atExit);
  for (const stream of [child.stdout, child.stderr]) stream.setEncoding('utf8').on('data', (text: string) => output.push(text));
  const ended = new Promise<void>((done) => child.on('exit', () => done()));
  await until(`the web server at ${url}`, () => {
    if (child.exitCode !== null) throw new Error(`The web server ended at its start: ${output.join('')}`);
    return fetch(`${url}/api/health`).then(() => true, () => false);
  }, 60_000);
  return {
    url,
    pid: child.pid!,
    memory: async () => Number(/VmRSS:\s+(\d+) kB/.exec(await readFile(`/proc/${child.pid}/status`, 'utf8'))?.[1] ?? NaN) * 1024,
    output: () => output.join(''),
    kill: (signal) => child.kill(signal),
    async stop() {
      const from = Date.now();
      child.kill('SIGTERM');
      await ended;
      process.off('exit', atExit);
      await rm(folder, { recursive: true, force: true });
      return Date.now() - from;
    },
  };
}

const HOUR_MS = 3_600_000;

/** A cookie of an open sign-in, without the sign-in page. */
export async function sessionCookie(personId: string, overrides: Partial<SignIn> = {}): Promise<{ cookie: string; signInId: string }> {
  const row = await SignIn.create({ personId, expiresAt: new Date(Date.now() + HOUR_MS), ...overrides });
  const token = await encode({ token: { sub: personId, signInId: row.id }, secret: SECRET });
  return { cookie: `fallbright-session=${token}`, signInId: row.id };
}

export interface Answer {
  status: number;
  headers: Headers;
  // A test looks into answers of every shape.
  // eslint-disable-next-line @typescript-eslint/no-explicit-any
  body: any;
}

/** Calls the API as a page of ours would, or as `headers` say. */
export async function call(web: Pick<Web, 'url'>, method: string, path: string, options: { cookie?: string; body?: unknown; headers?: Record<string, string> } = {}): Promise<Answer> {
  const response = await fetch(`${web.url}${path}`, {
    method,
    redirect: 'manual',
    headers: {
      'sec-fetch-site': 'same-origin',
      ...(options.cookie && { cookie: options.cookie }),
      ...(options.body !== undefined && { 'content-type': 'application/json' }),
      ...options.headers,
    },
    body: options.body === undefined ? undefined : typeof options.body === 'string' ? options.body : JSON.stringify(options.body),
  });
  const text = await response.text();
  return { status: response.status, headers: response.headers, body: parsed(text) };
}

function parsed(text: string): unknown {
  try {
    return JSON.parse(text);
  } catch {
    return text;
  }
}

/** A browser's way of signing in: the token against forgery, then the form. */
export async function signInOverHttp(web: Pick<Web, 'url'>, form: { email: string; password: string; stay?: boolean }, headers: Record<string, string> = {}): Promise<{ cookie: string | null; error: string | null; setCookies: string[] }> {
  const csrf = await fetch(`${web.url}/api/auth/csrf`, { headers });
  const { csrfToken } = (await csrf.json()) as { csrfToken: string };
  const jar = cookiesOf(csrf);
  const response = await fetch(`${web.url}/api/auth/callback/credentials`, {
    method: 'POST',
    redirect: 'manual',
    headers: { 'content-type': 'application/x-www-form-urlencoded', ...headers, cookie: [...jar, headers.cookie].filter(Boolean).join('; ') },
    body: new URLSearchParams({ csrfToken, email: form.email, password: form.password, stay: String(form.stay ?? false), json: 'true' }),
  });
  const body = (await response.json()) as { url?: string };
  const error = body.url ? new URL(body.url, web.url).searchParams.get('error') : null;
  const session = cookiesOf(response).find((cookie) => cookie.startsWith('fallbright-session=') && cookie.length > 'fallbright-session='.length);
  return { cookie: session ?? null, error, setCookies: response.headers.getSetCookie() };
}

const cookiesOf = (response: Response) => response.headers.getSetCookie().map((cookie) => cookie.split(';')[0]!);
