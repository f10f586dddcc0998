import { fileURLToPath } from 'node:url';
import { defineConfig } from 'vitest/config';

const alias = { '@': fileURLToPath(new URL('.', import.meta.url)).replace(/\/$/, '') };

/** How many files run at a time. Those with a database, a broker or a browser wait for those as much as they work, and keep two cores busy in twos; a fault is told from load only by itself. */
const project = (name: string, turn: number, options: { timeout: number; atATime?: number; needsDatabase: boolean }) => ({
  resolve: { alias },
  test: {
    name,
    env: { LOG_LEVEL: process.env.LOG_LEVEL ?? 'silent', AUTH_SECRET: 'a secret that only the tests know, 0123456789' },
    include: [`tests/${name}/**/*.test.{ts,tsx}`],
    testTimeout: options.timeout,
    hookTimeout: Math.max(options.timeout, 120_000),
    maxWorkers: options.atATime,
    // One suite after the other, where several are asked for in one run.
    sequence: { groupOrder: turn },
    globalSetup: options.needsDatabase ? ['tests/support/global-postgres.ts'] : [],
  },
});

export default defineConfig({
  test: {
    projects: [
      project('unit', 0, { timeout: 60_000, needsDatabase: false }),
      project('reference', 1, { timeout: 60_000, needsDatabase: false }),
      project('evaluation', 2, { timeout: 300_000, needsDatabase: false }),
      project('integration', 3, { timeout: 120_000, atATime: 2, needsDatabase: true }),
      project('fault', 4, { timeout: 300_000, atATime: 1, needsDatabase: true }),
      project('browser', 5, { timeout: 240_000, atATime: 2, needsDatabase: true }),
    ],
  },
});
