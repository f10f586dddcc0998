import { spawn, type ChildProcess } from 'node:child_process';
import { closeSync, mkdirSync, openSync, renameSync, statSync } from 'node:fs';
import { join } from 'node:path';

export interface Part {
  name: string;
  /** Arguments to node. */
  args: string[];
  env?: Record<string, string>;
}

const FIRST_RESTART_MS = 1_000;
const LONGEST_RESTART_MS = 30_000;
const LARGE_LOG_BYTES = 10_000_000;
const STOP_WITHIN_MS = 10_000;

/**
 * Keeps the parts of the house running: starts each in a process group of its
 * own, starts it again when it dies, and ends them in reverse order.
 */
export class Processes {
  private readonly running = new Map<string, ChildProcess>();
  private readonly order: Part[] = [];
  private stopping = false;

  constructor(
    private readonly logFolder: string,
    private readonly say: (sentence: string) => void,
  ) {
    mkdirSync(logFolder, { recursive: true });
  }

  start(part: Part): void {
    this.order.push(part);
    this.launch(part, FIRST_RESTART_MS);
  }

  private launch(part: Part, restartMs: number): void {
    const log = join(this.logFolder, `${part.name}.log`);
    setAside(log);
    const out = openSync(log, 'a');
    const began = Date.now();
    const child = spawn(process.execPath, part.args, { env: { ...process.env, ...part.env }, stdio: ['ignore', out, out], detached: true });
    // The child has its own; one kept here for each restart would run out in a night of them.
    closeSync(out);
    this.running.set(part.name, child);
    child.on('error', (error) => this.say(`${part.name} could not start: ${error.message}`));
    child.on('exit', (code, signal) => {
      this.running.delete(part.name);
      if (this.stopping) return;
      // One that ran for a while starts again at once; one that dies at its start waits longer each time.
      const wait = Date.now() - began > 60_000 ? FIRST_RESTART_MS : restartMs;
      this.say(`${part.name} ended (${signal ?? code}); starting it again in ${Math.round(wait / 1000)} s. Its log: ${log}`);
      setTimeout(() => {
        if (!this.stopping) this.launch(part, Math.min(wait * 2, LONGEST_RESTART_MS));
      }, wait);
    });
  }

  /** Ends all parts, the last started first; what does not end in time is killed. */
  async stop(): Promise<void> {
    this.stopping = true;
    for (const part of [...this.order].reverse()) {
      const child = this.running.get(part.name);
      if (!child?.pid) continue;
      const group = -child.pid;
      const ended = new Promise<void>((resolve) => child.once('exit', () => resolve()));
      signalGroup(group, 'SIGTERM');
      const timer = setTimeout(() => signalGroup(group, 'SIGKILL'), STOP_WITHIN_MS);
      await ended;
      clearTimeout(timer);
    }
  }
}

/** A part that starts begins a new log where its last one has grown large; the one before stays beside it. While it runs its log is left alone. */
function setAside(log: string): void {
  const size = statSync(log, { throwIfNoEntry: false })?.size ?? 0;
  if (size > LARGE_LOG_BYTES) renameSync(log, `${log}.1`);
}

function signalGroup(group: number, signal: NodeJS.Signals): void {
  try {
    process.kill(group, signal);
  } catch {
    // It has ended by itself.
  }
}

/** Waits until `ready` is true. @throws after `timeoutMs`, with `what` in the sentence. */
export async function waitUntil(what: string, ready: () => Promise<boolean>, timeoutMs: number): Promise<void> {
  const deadline = Date.now() + timeoutMs;
  while (Date.now() < deadline) {
    if (await ready().catch(() => false)) return;
    await new Promise((resolve) => setTimeout(resolve, 150));
  }
  throw new Error(`${what} did not come up within ${Math.round(timeoutMs / 1000)} s.`);
}
