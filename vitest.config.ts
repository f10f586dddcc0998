import { fileURLToPath } from 'node:url';
import { defineConfig } from 'vitest/config';

const ROOT = fileURLToPath(new URL('.', import.meta.url)).replace(/\/$/, '');
const alias = { '@': ROOT };
/** What Next.js puts in its place on the server; outside of it the package only throws. */
const onServer = { 'server-only': `${ROOT}/node_modules/server-only/empty.js` };

/** How many files run at a time. Those with a database, a broker or a browser wait for those as much as they work, and keep two cores busy in twos; a fault is told from load only by itself. */
const project = (name: string, turn: number, options: { timeout: number; atATime?: number; needsDatabase: boolean; together?: boolean }) => ({
  resolve: { alias: options.together ? { ...alias, ...onServer } : alias },
  test: {
    name,
    env: { LOG_LEVEL: process.env.LOG_LEVEL ?? 'silent', AUTH_SECRET: 'a secret that only the tests know, 0123456789' },
    include: [`tests/${name}/**/*.test.{ts,tsx}`],
    testTimeout: options.timeout,
    hookTimeout: Math.max(options.timeout, 120_000),
    maxWorkers: options.atATime,
    // A process for each file costs as much as the tests of pure functions themselves.
    isolate: !options.together,
    // What looks at the browser as it is loaded can be loaded anew by `vi.resetModules` only where it is no package of Node's.
    server: { deps: { inline: options.together ? ['uplot'] : [] } },
    // One suite after the other, where several are asked for in one run.
    sequence: { groupOrder: turn },
    globalSetup: options.needsDatabase ? ['tests/support/global-postgres.ts'] : [],
  },
});

export default defineConfig({
  test: {
    projects: [
      project('unit', 0, { timeout: 60_000, needsDatabase: false, together: true }),
      project('reference', 1, { timeout: 60_000, needsDatabase: false, together: true }),
      project('evaluation', 2, { timeout: 300_000, needsDatabase: false }),
      project('integration', 3, { timeout: 120_000, atATime: 2, needsDatabase: true }),
      project('fault', 4, { timeout: 300_000, atATime: 1, needsDatabase: true }),
      project('browser', 5, { timeout: 240_000, atATime: 2, needsDatabase: true }),
    ],
  },
});
