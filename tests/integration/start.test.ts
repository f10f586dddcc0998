import { execFileSync, spawn, type ChildProcess } from 'node:child_process';
import { mkdtempSync, rmSync } from 'node:fs';
import { createServer } from 'node:net';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { DEMO_BATCHES, DEMO_PASSPHRASE, DEMO_PEOPLE } from '@/db/seed/demo';
import { DEMO_PAST } from '@/db/seed/past';
import { freePort } from '@/scripts/lib/postgres';
import { runs } from '../support/processes';
import { signInOverHttp } from '../support/web';

const ROOT = resolve(import.meta.dirname, '../..');
const folder = mkdtempSync(join(tmpdir(), 'fallbright-start-'));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

const PATIENCE_MS = 240_000;

async function ports(): Promise<Record<string, string>> {
  const [PORT, MQTT_PORT, PGPORT_LOCAL, MAILBOX_SMTP_PORT, MAILBOX_PORT] = [await freePort(14_000), await freePort(16_000), await freePort(18_000), await freePort(26_000), await freePort(28_000)].map(String) as [string, string, string, string, string];
  return { PORT, MQTT_PORT, PGPORT_LOCAL, MAILBOX_SMTP_PORT, MAILBOX_PORT };
}

/** scripts/start.ts as a person starts it, with nothing of the tests' own surroundings. */
class Start {
  output = '';
  readonly child: ChildProcess;
  readonly ended: Promise<number | null>;

  constructor(variables: Record<string, string>) {
    const { DATABASE_URL: _url, AUTH_SECRET: _secret, LOG_LEVEL: _level, NODE_ENV: _env, VITEST: _vitest, ...surroundings } = process.env;
    this.child = spawn(process.execPath, ['--import', 'tsx', join(ROOT, 'scripts/start.ts')], { cwd: ROOT, env: { NODE_ENV: 'production', ...surroundings, DATA_DIR: folder, ...variables }, stdio: ['ignore', 'pipe', 'pipe'] });
    for (const stream of [this.child.stdout!, this.child.stderr!]) stream.setEncoding('utf8').on('data', (text: string) => (this.output += text));
    this.ended = new Promise((done) => this.child.on('exit', (code) => done(code)));
  }

  async ready(): Promise<void> {
    const deadline = Date.now() + PATIENCE_MS;
    // The last line: what stands above it has been read by then.
    while (!/^Ready: [^]*Ctrl-C stops everything/m.test(this.output)) {
      if (this.child.exitCode !== null || Date.now() > deadline) throw new Error(`The start did not get ready:\n${this.output}`);
      await new Promise((next) => setTimeout(next, 100));
    }
  }

  async stop(): Promise<void> {
    this.child.kill('SIGINT');
    await this.ended;
  }
}

/** Processes whose surroundings name this test's data folder. */
function leftOver(): string[] {
  const lines = execFileSync('bash', ['-c', `grep -lz '^DATA_DIR=${folder}$' /proc/[0-9]*/environ 2>/dev/null | cut -d/ -f3; pgrep -f '${folder}' || true`], { encoding: 'utf8' });
  return lines.split('\n').filter((pid) => pid !== '' && Number(pid) !== process.pid && runs(Number(pid)));
}

describe('bash scripts/start.sh', { timeout: 2 * PATIENCE_MS }, () => {
  it('fills the demo once, lets its people in, keeps everything over a second start and leaves no process', async () => {
    const variables = await ports();
    const web = { url: `http://127.0.0.1:${variables.PORT}` };
    const first = new Start(variables);
    let cookie = '';
    try {
      await first.ready();
      expect(first.output).toContain(`Ready: ${web.url}`);
      expect(first.output).toContain(`${DEMO_BATCHES.length + DEMO_PAST.length} batches`);
      for (const { email } of DEMO_PEOPLE) expect(first.output).toContain(email);
      const signedIn = await signInOverHttp(web, { email: DEMO_PEOPLE[0]!.email, password: DEMO_PASSPHRASE });
      cookie = signedIn.cookie ?? '';
      expect(signedIn.error).toBeNull();
      const batches = (await (await fetch(`${web.url}/api/v1/batches`, { headers: { cookie } })).json()) as { items: unknown[] };
      expect(batches.items).toHaveLength(DEMO_BATCHES.length + DEMO_PAST.length);
      expect((await (await fetch(`http://127.0.0.1:${variables.MAILBOX_PORT}/api/mails`)).json()) as unknown).toHaveProperty('items');
    } finally {
      await first.stop();
    }
    expect(leftOver()).toEqual([]);

    const second = new Start(variables);
    try {
      await second.ready();
      expect(second.output).not.toContain('demo cellar was filled');
      const batches = (await (await fetch(`${web.url}/api/v1/batches`, { headers: { cookie } })).json()) as { items: unknown[] };
      expect(batches.items).toHaveLength(DEMO_BATCHES.length + DEMO_PAST.length);
      const other = new Start(variables);
      expect(await other.ended).toBe(1);
      expect(other.output).toMatch(/already runs on/);
    } finally {
      await second.stop();
    }
    expect(leftOver()).toEqual([]);
  });

  it('says in one sentence which port is taken and what to do', async () => {
    const variables = await ports();
    const taken = createServer().listen(Number(variables.MQTT_PORT), '127.0.0.1');
    await new Promise((done) => taken.once('listening', done));
    const start = new Start(variables);
    expect(await start.ended).toBe(1);
    expect(start.output).toContain(`Port ${variables.MQTT_PORT} (MQTT_PORT) is taken by another program. Stop that program, or set MQTT_PORT to a free port.`);
    taken.close();
  });

  it.each([
    ['PORT', 'eighty', /The variable PORT must be a port number/],
    ['MQTT_PORT', '70000', /The variable MQTT_PORT must be 1 to 65535/],
    ['AUTH_SECRET', 'short', /The variable AUTH_SECRET must have at least 32 characters/],
    ['AUTH_SECRET', 'a'.repeat(36), /The variable AUTH_SECRET must have at least 8 different characters/],
    ['DATA_DIR', '/proc/nowhere/data', /The variable DATA_DIR names a folder \(\/proc\/nowhere\/data\) that cannot be made or written in: .*\. Name another one\./],
    ['DATABASE_URL', 'mysql://x', /The variable DATABASE_URL must be a URL that begins with postgres:\/\//],
    ['DEMO', 'yes', /The variable DEMO must be 0 or 1/],
    ['LOG_LEVEL', 'loud', /The variable LOG_LEVEL must be fatal, error, warn, info, debug, trace or silent\./],
    ['S3_BUCKET', 'a', /The variable S3_BUCKET must have at least 3 characters\./],
  ])('names a bad variable: %s=%s', async (name, value, sentence) => {
    const start = new Start({ [name]: value });
    expect(await start.ended).toBe(1);
    expect(start.output).toMatch(sentence);
  });
});
