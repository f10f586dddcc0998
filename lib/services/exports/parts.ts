import { selectPart, type PartRow } from '@/db/queries/archive-parts';
import type { ArchivePart } from '@/lib/contracts/archive-fields';
import { ARCHIVE_PARTS, PART_NAMES } from '@/lib/contracts/archive-parts';
import { namesOf } from '../entries/names';

/** People leave by their names: an id says nothing in another house. */
async function named(part: ArchivePart, rows: readonly PartRow[]): Promise<PartRow[]> {
  const fields = Object.entries(part.fields).filter(([, { is }]) => is === 'person' || is === 'people');
  if (fields.length === 0 || rows.length === 0) return [...rows];
  const names = await namesOf(rows.flatMap((row) => fields.flatMap(([name]) => row[name] as string | string[] | null)));
  return rows.map((row) => ({
    ...row,
    ...Object.fromEntries(
      fields.map(([name, { is }]) => {
        const value = row[name] as string | string[] | null;
        if (is === 'people') return [name, (value as string[]).flatMap((id) => names.get(id) ?? [])];
        return [name, value === null ? null : (names.get(value as string) ?? null)];
      }),
    ),
  }));
}

/** Each part of the archive as `,"name":[…]`, a row a line. */
export async function* partPieces(cellarId: string, batchId: string | null): AsyncGenerator<string> {
  for (const name of PART_NAMES) {
    const part = ARCHIVE_PARTS[name];
    const rows = await named(part, await selectPart(part, cellarId, batchId));
    yield `,\n"${name}":[${rows.map((row) => JSON.stringify(row)).join(',\n')}]`;
  }
}
