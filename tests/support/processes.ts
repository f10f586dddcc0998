import { spawn, type ChildProcess } from 'node:child_process';
import { readFile } from 'node:fs/promises';
import { resolve } from 'node:path';
import { createInterface } from 'node:readline';

const ROOT = resolve(import.meta.dirname, '../..');

/** A process of the house, started as in real life. */
export interface Running {
  pid: number;
  /** Its log so far, a parsed line each. */
  lines: Array<Record<string, unknown>>;
  kill(signal: NodeJS.Signals): void;
  /** Resolves with the exit code, or null where a signal ended it. */
  ended: Promise<number | null>;
  /** Resident memory, bytes. */
  memory(): Promise<number>;
}

const alive = new Set<ChildProcess>();
process.on('exit', () => {
  for (const child of alive) child.kill('SIGKILL');
});

/** Starts `file` and waits until a line of its log contains `ready`. */
export async function startProcess(file: string, variables: Record<string, string>, ready: string, args: readonly string[] = []): Promise<Running> {
  const child = spawn(process.execPath, ['--import', 'tsx', resolve(ROOT, file), ...args], {
    cwd: ROOT,
    // The process speaks in its log, which the tests' own level would silence.
    env: { ...process.env, LOG_LEVEL: 'info', ...variables },
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  alive.add(child);
  const lines: Array<Record<string, unknown>> = [];
  const stray: string[] = [];
  let told = false;
  child.stderr.setEncoding('utf8').on('data', (text: string) => stray.push(text));
  const ended = new Promise<number | null>((done) =>
    child.on('exit', (code, signal) => {
      alive.delete(child);
      // Else a test that waits for it learns only that it waited in vain.
      if (code !== 0 && !told) console.error(`${file} ended by itself with ${signal ?? code}: ${stray.join('')} ${JSON.stringify(lines.at(-1) ?? {})}`);
      done(code);
    }),
  );
  const isReady = new Promise<void>((done) => {
    createInterface({ input: child.stdout }).on('line', (line) => {
      const parsed = parseLine(line);
      lines.push(parsed);
      if (String(parsed.msg).includes(ready)) done();
    });
  });
  const first = await Promise.race([isReady.then(() => 'ready' as const), ended]);
  if (first !== 'ready') throw new Error(`${file} ended with ${first} before it was ready: ${stray.join('')} ${JSON.stringify(lines.at(-1) ?? {})}`);
  return {
    pid: child.pid!,
    lines,
    kill: (signal) => {
      told = true;
      child.kill(signal);
    },
    ended,
    memory: async () => {
      const status = await readFile(`/proc/${child.pid}/status`, 'utf8');
      return Number(/VmRSS:\s+(\d+) kB/.exec(status)?.[1] ?? NaN) * 1024;
    },
  };
}

function parseLine(line: string): Record<string, unknown> {
  try {
    return JSON.parse(line) as Record<string, unknown>;
  } catch {
    return { msg: line };
  }
}

/** Waits until `holds` gives something true; the condition is looked at, not a length of time slept. */
export async function until<T>(what: string, holds: () => T | Promise<T>, patienceMs = 10_000): Promise<NonNullable<T>> {
  const deadline = Date.now() + patienceMs;
  for (;;) {
    const value = await holds();
    if (value) return value;
    if (Date.now() > deadline) throw new Error(`Waited ${patienceMs} ms in vain: ${what}.`);
    await new Promise((next) => setTimeout(next, 25));
  }
}

/** Whether a process of that number runs. */
export function runs(pid: number): boolean {
  try {
    process.kill(pid, 0);
    return true;
  } catch {
    return false;
  }
}
