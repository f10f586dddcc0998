import { readFileSync } from 'node:fs';

/** A published table of tests/reference/data as objects of numbers; cells that are not numbers are NaN. */
export function table(name: string): Record<string, number>[] {
  const lines = readFileSync(new URL(`./data/${name}`, import.meta.url), 'utf8')
    .split(/\r?\n/)
    .filter((line) => line !== '' && !line.startsWith('#'));
  const names = lines[0]!.split(',');
  return lines.slice(1).map((line) => {
    const cells = line.split(',');
    return Object.fromEntries(names.map((column, i) => [column, cells[i] === '' ? Number.NaN : Number(cells[i])]));
  });
}
