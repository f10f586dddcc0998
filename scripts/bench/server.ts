import { spawn, type ChildProcess } from 'node:child_process';
import { readFile } from 'node:fs/promises';
import { resolve } from 'node:path';
import { freePort } from '../lib/postgres';
import { waitUntil } from '../lib/processes';

const NEXT = resolve(import.meta.dirname, '../../node_modules/next/dist/bin/next');

export interface NextServer {
  url: string;
  /** Resident memory now, bytes. */
  memory(): Promise<number>;
  stop(): Promise<void>;
}

export function runNext(command: 'build' | 'start', folder: string, args: string[], env: Record<string, string>): ChildProcess {
  return spawn(process.execPath, [NEXT, command, folder, ...args], { cwd: folder, env: { ...process.env, NODE_ENV: 'production', NEXT_TELEMETRY_DISABLED: '1', ...env }, stdio: ['ignore', 'ignore', 'inherit'] });
}

/** A built Next.js application on a free port. */
export async function startNext(folder: string, readyPath: string, env: (port: number, url: string) => Record<string, string>): Promise<NextServer> {
  const port = await freePort();
  const url = `http://127.0.0.1:${port}`;
  const child = runNext('start', folder, ['-p', String(port), '-H', '127.0.0.1'], env(port, url));
  const ended = new Promise<void>((done) => child.once('exit', () => done()));
  await waitUntil(`The server at ${url}`, async () => (await fetch(`${url}${readyPath}`)).status < 600, 60_000);
  return {
    url,
    memory: async () => Number(/VmRSS:\s+(\d+) kB/.exec(await readFile(`/proc/${child.pid}/status`, 'utf8'))?.[1] ?? NaN) * 1024,
    async stop() {
      child.kill('SIGTERM');
      await ended;
    },
  };
}
