import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll } from 'vitest';
import { forgetEnv } from '@/lib/config/env';
import { forgetObjectStore } from '@/lib/storage/objects';
import { startLocalStorage, type LocalStorage } from '@/scripts/lib/storage';

/** Gives the test file an object store of its own; `away` makes it unreachable for the length of some work. */
export function useObjectStore(): { away<T>(work: () => Promise<T>): Promise<T>; port: number } {
  const held = { port: 0, away };
  let server: LocalStorage;
  let folder: string;
  const use = (port: number) => {
    process.env.S3_PORT = String(port);
    forgetEnv();
    forgetObjectStore();
  };
  async function away<T>(work: () => Promise<T>): Promise<T> {
    // Nothing listens on the discard port.
    use(9);
    try {
      return await work();
    } finally {
      use(held.port);
    }
  }
  beforeAll(async () => {
    folder = mkdtempSync(join(tmpdir(), 'fb-store-'));
    server = await startLocalStorage({ directory: folder, port: 0, bucket: 'fallbright' });
    held.port = server.port;
    use(held.port);
  });
  afterAll(async () => {
    await server.close();
    rmSync(folder, { recursive: true, force: true });
    delete process.env.S3_PORT;
  });
  return held;
}
