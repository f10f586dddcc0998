import { spawn } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join, relative, resolve } from 'node:path';

const ROOT = resolve(import.meta.dirname, '..');

/** Suites in the order of their cost, each in a run of its own: two cores and one database do not share well. */
const SUITES = [['unit', 'reference'], ['evaluation'], ['integration'], ['fault'], ['browser']];

/** What `vitest.config.ts` runs two files at a time. */
const IN_TWOS = ['integration', 'browser'];

interface Count {
  passed: number;
  failed: number;
}

function run(command: string, args: string[]): Promise<number> {
  const env: NodeJS.ProcessEnv = { ...process.env, NEXT_TELEMETRY_DISABLED: '1' };
  return new Promise((done, reject) => {
    spawn(command, args, { cwd: ROOT, stdio: ['ignore', 'inherit', 'inherit'], env })
      .on('error', reject)
      .on('exit', (code) => done(code ?? 1));
  });
}

async function check(name: string, script: string): Promise<Count> {
  console.log(`\n== ${name}`);
  const code = await run('npm', ['run', '--silent', script]);
  return code === 0 ? { passed: 1, failed: 0 } : { passed: 0, failed: 1 };
}

interface Report {
  testResults: { name: string; status: string; assertionResults: { status: string; fullName: string }[] }[];
}

async function vitest(projects: string[], report: string, files: string[] = []): Promise<{ code: number; files: Report['testResults'] }> {
  const code = await run('npx', ['vitest', 'run', ...files, ...projects.flatMap((project) => ['--project', project]), '--reporter=dot', '--reporter=json', `--outputFile.json=${report}`]);
  try {
    return { code, files: (JSON.parse(readFileSync(report, 'utf8')) as Report).testResults };
  } catch {
    return { code: code || 1, files: [] };
  }
}

const failedIn = (file: Report['testResults'][number]) => file.assertionResults.filter(({ status }) => status === 'failed');

async function suite(projects: string[], folder: string): Promise<Count> {
  console.log(`\n== ${projects.join(', ')}`);
  let { code, files } = await vitest(projects, join(folder, `${projects[0]}.json`));
  const broken = files.filter(({ status }) => status === 'failed');
  // A machine of CI is now and then too slow for two files with a server or a browser each. A file, not a test, is run again: its tests go on from one another. What fails twice is wrong.
  if (process.env.CI && projects.some((project) => IN_TWOS.includes(project)) && broken.length > 0) {
    for (const file of broken) console.log(`\nOnce more: ${relative(ROOT, file.name)}, since it failed: ${failedIn(file).map(({ fullName }) => fullName).join('; ') || 'it did not load'}`);
    const again = await vitest(projects, join(folder, 'again.json'), broken.map(({ name }) => name));
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
  const wanted = (name: string) => only.length === 0 || only.includes(name);
  const folder = mkdtempSync(join(tmpdir(), 'fallbright-results-'));
  const began = Date.now();
  const total: Count = { passed: 0, failed: 0 };
  const add = (count: Count) => {
    total.passed += count.passed;
    total.failed += count.failed;
  };
  if (wanted('lint')) add(await check('lint', 'lint'));
  if (wanted('types')) add(await check('types', 'typecheck'));
  for (const projects of SUITES) {
    const chosen = projects.filter(wanted);
    if (chosen.length > 0) add(await suite(chosen, folder));
  }
  rmSync(folder, { recursive: true, force: true });
  console.log(`\nTook ${Math.round((Date.now() - began) / 1000)} s.`);
  console.log(`${total.passed} passed, ${total.failed} failed`);
  process.exitCode = total.failed > 0 ? 1 : 0;
}

await main();
