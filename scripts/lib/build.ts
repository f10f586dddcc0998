import { spawn } from 'node:child_process';
import { createHash } from 'node:crypto';
import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import { readdir, stat } from 'node:fs/promises';
import { join } from 'node:path';

const SOURCES = ['app', 'components', 'lib', 'db', 'public', 'package-lock.json', 'next.config.mjs', 'tailwind.config.ts', 'postcss.config.mjs', 'tsconfig.json', 'proxy.ts', 'instrumentation.ts'];

/** A fingerprint of what the web build is made from. */
async function fingerprint(root: string): Promise<string> {
  const hash = createHash('sha256');
  const files: string[] = [];
  for (const source of SOURCES) {
    const path = join(root, source);
    if (!existsSync(path)) continue;
    if ((await stat(path)).isDirectory()) for await (const entry of walk(path)) files.push(entry);
    else files.push(path);
  }
  for (const file of files.sort()) hash.update(file.slice(root.length)).update(readFileSync(file));
  return hash.digest('hex');
}

async function* walk(folder: string): AsyncGenerator<string> {
  for (const entry of await readdir(folder, { withFileTypes: true })) {
    const path = join(folder, entry.name);
    if (entry.isDirectory()) yield* walk(path);
    else yield path;
  }
}

/**
 * Builds the web part unless the build there was made from the same sources.
 * @returns true where it had to build.
 */
export async function buildWeb(root: string, distDir: string, signal?: AbortSignal): Promise<boolean> {
  const stamp = join(root, distDir, 'fingerprint');
  const now = await fingerprint(root);
  if (existsSync(join(root, distDir, 'BUILD_ID')) && existsSync(stamp) && readFileSync(stamp, 'utf8') === now) return false;
  const output: Buffer[] = [];
  await new Promise<void>((resolve, reject) => {
    const child = spawn(process.execPath, [join(root, 'node_modules/next/dist/bin/next'), 'build'], {
      cwd: root,
      env: { ...process.env, NODE_ENV: 'production', NEXT_DIST_DIR: distDir, NEXT_TELEMETRY_DISABLED: '1' },
      stdio: ['ignore', 'pipe', 'pipe'],
      signal,
    });
    child.stdout.on('data', (chunk: Buffer) => output.push(chunk));
    child.stderr.on('data', (chunk: Buffer) => output.push(chunk));
    child.on('error', reject);
    child.on('exit', (code) => (code === 0 ? resolve() : reject(new Error(`The web build failed.\n${Buffer.concat(output).toString().slice(-4000)}`))));
  });
  writeFileSync(stamp, now);
  return true;
}
