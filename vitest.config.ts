import { fileURLToPath } from 'node:url';
import { defineConfig } from 'vitest/config';

const alias = { '@': fileURLToPath(new URL('.', import.meta.url)).replace(/\/$/, '') };

/** Suites that share the machine's two cores with a database, a broker or a browser run one file at a time. */
const project = (name: string, options: { timeout: number; parallel: boolean; needsDatabase: boolean }) => ({
  resolve: { alias },
  test: {
    name,
    env: { LOG_LEVEL: process.env.LOG_LEVEL ?? 'silent', AUTH_SECRET: 'a secret that only the tests know, 0123456789' },
    include: [`tests/${name}/**/*.test.{ts,tsx}`],
    testTimeout: options.timeout,
    hookTimeout: Math.max(options.timeout, 120_000),
    fileParallelism: options.parallel,
    globalSetup: options.needsDatabase ? ['tests/support/global-postgres.ts'] : [],
  },
});

export default defineConfig({
  test: {
    projects: [
      project('unit', { timeout: 60_000, parallel: true, needsDatabase: false }),
      project('reference', { timeout: 60_000, parallel: true, needsDatabase: false }),
      project('evaluation', { timeout: 300_000, parallel: true, needsDatabase: false }),
      project('integration', { timeout: 120_000, parallel: false, needsDatabase: true }),
      project('fault', { timeout: 300_000, parallel: false, needsDatabase: true }),
      project('browser', { timeout: 240_000, parallel: false, needsDatabase: true }),
    ],
  },
});
