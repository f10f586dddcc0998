import { spawn } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join, relative, resolve } from 'node:path';

const ROOT = resolve(import.meta.dirname, '..');

/** What needs neither a database nor a browser keeps one core busy each: two at a time, the longest first. */
const BESIDE = [['lint'], ['types'], ['unit', 'reference'], ['evaluation']];
const AT_A_TIME = 2;

/** The others, each in a run of its own: two cores and one database do not share well. */
const ALONE = [['integration'], ['fault'], ['browser']];

/** Those that are an npm script instead of a project of vitest. */
const SCRIPTS: Record<string, string> = { lint: 'lint', types: 'typecheck' };

/** What `vitest.config.ts` runs two files at a time. */
const IN_TWOS = ['integration', 'browser'];

interface Count {
  passed: number;
  failed: number;
}

/** Where a suite writes: at once, or to `said` where others run beside it. */
type Said = Buffer[] | null;
const say = (said: Said, line: string) => (said ? said.push(Buffer.from(`${line}\n`)) : console.log(line));

function run(command: string, args: string[], said: Said): Promise<number> {
  const env: NodeJS.ProcessEnv = { ...process.env, NEXT_TELEMETRY_DISABLED: '1' };
  return new Promise((done, reject) => {
    const child = spawn(command, args, { cwd: ROOT, stdio: said ? ['ignore', 'pipe', 'pipe'] : ['ignore', 'inherit', 'inherit'], env });
    for (const stream of [child.stdout, child.stderr]) stream?.on('data', (chunk: Buffer) => said!.push(chunk));
    // Not `exit`: what it wrote last is still on its way then.
    child.on('error', reject).on('close', (code) => done(code ?? 1));
  });
}

async function check(script: string, said: Said): Promise<Count> {
  const code = await run('npm', ['run', '--silent', script], said);
  return code === 0 ? { passed: 1, failed: 0 } : { passed: 0, failed: 1 };
}

interface Report {
  testResults: { name: string; status: string; assertionResults: { status: string; fullName: string }[] }[];
}

async function vitest(projects: string[], report: string, said: Said, files: string[] = []): Promise<{ code: number; files: Report['testResults'] }> {
  const code = await run('npx', ['vitest', 'run', ...files, ...projects.flatMap((project) => ['--project', project]), '--reporter=dot', '--reporter=json', `--outputFile.json=${report}`], said);
  try {
    return { code, files: (JSON.parse(readFileSync(report, 'utf8')) as Report).testResults };
  } catch {
    return { code: code || 1, files: [] };
  }
}

const failedIn = (file: Report['testResults'][number]) => file.assertionResults.filter(({ status }) => status === 'failed');

async function suite(projects: string[], folder: string, said: Said): Promise<Count> {
  let { code, files } = await vitest(projects, join(folder, `${projects[0]}.json`), said);
  const broken = files.filter(({ status }) => status === 'failed');
  // A machine of CI is now and then too slow for two files with a server or a browser each. A file, not a test, is run again: its tests go on from one another. What fails twice is wrong.
  if (process.env.CI && projects.some((project) => IN_TWOS.includes(project)) && broken.length > 0) {
    for (const file of broken) say(said, `\nOnce more: ${relative(ROOT, file.name)}, since it failed: ${failedIn(file).map(({ fullName }) => fullName).join('; ') || 'it did not load'}`);
    const again = await vitest(projects, join(folder, 'again.json'), said, broken.map(({ name }) => name));
    files = [...files.filter((file) => !broken.includes(file)), ...again.files];
    code = again.code;
  }
  const tests = files.flatMap(({ assertionResults }) => assertionResults);
  const counted = { passed: tests.filter(({ status }) => status === 'passed').length, failed: files.flatMap(failedIn).length };
  // A file that could not be loaded has no test to fail.
  return code !== 0 && counted.failed === 0 ? { ...counted, failed: 1 } : counted;
}

async function main(): Promise<void> {
  const only = process.argv.slice(2);
  const chosen = (suites: string[][]) => suites.map((names) => names.filter((name) => only.length === 0 || only.includes(name))).filter((names) => names.length > 0);
  const folder = mkdtempSync(join(tmpdir(), 'fallbright-results-'));
  const began = Date.now();
  const seconds = (from: number) => Math.round((Date.now() - from) / 1000);
  const total: Count = { passed: 0, failed: 0 };
  const times: string[] = [];

  async function take(names: string[], said: Said): Promise<void> {
    const from = Date.now();
    const script = SCRIPTS[names[0]!];
    say(said, `\n== ${names.join(', ')}`);
    const count = script ? await check(script, said) : await suite(names, folder, said);
    if (said) process.stdout.write(Buffer.concat(said));
    total.passed += count.passed;
    total.failed += count.failed;
    times.push(`${names.join(', ')} ${seconds(from)} s`);
  }

  const beside = chosen(BESIDE);
  const alone = beside.length === 1;
  const lane = async () => {
    for (let names = beside.shift(); names; names = beside.shift()) await take(names, alone ? null : []);
  };
  await Promise.all(Array.from({ length: AT_A_TIME }, lane));
  for (const names of chosen(ALONE)) await take(names, null);
  rmSync(folder, { recursive: true, force: true });
  console.log(`\nTook ${seconds(began)} s: ${times.join('; ')}.`);
  console.log(`${total.passed} passed, ${total.failed} failed`);
  process.exitCode = total.failed > 0 ? 1 : 0;
}

await main();
