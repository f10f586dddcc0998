import { execFileSync } from 'node:child_process';
import { cpSync, mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import { describe, expect, it } from 'vitest';

const ROOT = resolve(import.meta.dirname, '../../..');
const COMMANDS = ['scripts/start.ts', 'scripts/backup.ts', 'scripts/restore.ts', 'scripts/migrate.ts', 'scripts/seed.ts', 'scripts/keeper.ts', 'devices/simulator/main.ts'];

describe('the file .env', () => {
  it('fills in what is not set, and leaves what is', () => {
    const house = mkdtempSync(join(tmpdir(), 'fallbright-env-'));
    try {
      mkdirSync(join(house, 'lib/config'), { recursive: true });
      cpSync(join(ROOT, 'lib/config/dot-env.ts'), join(house, 'lib/config/dot-env.ts'));
      writeFileSync(join(house, '.env'), 'DATABASE_URL=postgres://from-the-file/x\nPORT=3999\n');
      const program = `await import(${JSON.stringify(join(house, 'lib/config/dot-env.ts'))}); console.log(process.env.DATABASE_URL, process.env.PORT);`;
      const { DATABASE_URL: _, ...surroundings } = process.env;
      expect(execFileSync(process.execPath, ['--import', 'tsx', '--input-type=module', '-e', program], { cwd: ROOT, env: { ...surroundings, PORT: '3000' }, encoding: 'utf8' }).trim()).toBe('postgres://from-the-file/x 3000');
    } finally {
      rmSync(house, { recursive: true, force: true });
    }
  });

  it.each(COMMANDS)('is read by %s before any other module can look at the environment', (file) => {
    expect(readFileSync(join(ROOT, file), 'utf8')).toMatch(/^import '@\/lib\/config\/dot-env';\n/);
  });
});
