import { inTransaction } from '@/db/client';
import type { Actor } from '@/lib/auth/policies';
import type { Archive } from '@/lib/contracts/archive';
import { ARCHIVE_PARTS, PART_NAMES } from '@/lib/contracts/archive-parts';
import type { ImportPreviewBody } from '@/lib/contracts/imports';
import { iso } from '../iso';
import { peopleByName } from './archive';

const ROWS_SHOWN = 8;
const NAMES_SHOWN = 5;

const many = (count: number, one: string, more = `${one}s`) => `${count} ${count === 1 ? one : more}`;

/** Everybody who is named in it. */
function namedIn(archive: Archive): Set<string> {
  const names = new Set<string>();
  const add = (name: unknown) => typeof name === 'string' && names.add(name);
  for (const batch of archive.batches) for (const row of [batch, ...batch.entries]) add(row.by);
  for (const part of PART_NAMES) {
    const fields = Object.entries(ARCHIVE_PARTS[part].fields).flatMap(([name, { is }]) => (is === 'person' || is === 'people' ? name : []));
    for (const row of archive[part]) for (const field of fields) [row[field]].flat().forEach(add);
  }
  for (const sensor of archive.sensors) for (const row of [...sensor.calibrations, ...sensor.points]) add(row.by);
  for (const photo of archive.photos) add(photo.by);
  return names;
}

/** What stands in it beside batches, and whose name it will not keep. */
function notesOf(archive: Archive, here: ReadonlyMap<string, string>): string[] {
  const { musts, lots, tastings, places, jobs, sensors, photos } = archive;
  const parts = [
    [musts.length, many(musts.length, 'must sheet')],
    [lots.length, many(lots.length, 'lot')],
    [tastings.length, many(tastings.length, 'tasting note')],
    [places.length, many(places.length, 'place')],
    [jobs.length, many(jobs.length, 'job')],
    [sensors.length, `${many(sensors.reduce((sum, sensor) => sum + sensor.readings.length, 0), 'reading')} of ${many(sensors.length, 'sensor')}`],
    [photos.length, many(photos.length, 'photo')],
  ] as const;
  const besides = parts.flatMap(([count, words]) => (count > 0 ? words : []));
  const strangers = [...namedIn(archive)].filter((name) => !here.has(name));
  return [
    ...(besides.length > 0 ? [`Besides: ${besides.join(', ')}.`] : []),
    ...(strangers.length > 0 ? [`Not in this cellar: ${strangers.slice(0, NAMES_SHOWN).join(', ')}${strangers.length > NAMES_SHOWN ? ` and ${strangers.length - NAMES_SHOWN} more` : ''}. What they wrote comes without their name.`] : []),
    ...(sensors.some((sensor) => sensor.kind !== 'file' && sensor.removed_at === null) ? ['Its sensors come without their address and secret, and stay silent until a keeper makes a new secret on the page of each.'] : []),
    ...(archive.batches.some((batch) => batch.state !== 'ended') ? ['What is already so of its working batches, or shows within the first hour, stands among the alerts and wakes nobody.'] : []),
    ...(photos.some((photo) => photo.jpeg === null) ? ['Some photos have no file and stay out.'] : []),
  ];
}

/** Looks at an archive: what it would bring. Nothing is kept. */
export async function previewArchive(actor: Actor, archive: Archive, timeZone: string): Promise<ImportPreviewBody> {
  const here = await inTransaction((transaction) => peopleByName({ cellarId: actor.cellarId, transaction }));
  const times = archive.batches.flatMap((batch) => (batch.pitched_at ? [Date.parse(batch.pitched_at)] : []));
  const lotsOf = (id: string) => archive.lots.filter((lot) => lot.batch === id).length;
  return {
    kind: 'archive',
    header: [],
    rows: [],
    columns: {},
    gravity_unit: null,
    temperature_unit: null,
    time_zone: timeZone,
    date_order: 'day',
    read: archive.batches.slice(0, ROWS_SHOWN).map((batch, index) => ({ line: index + 1, says: `${batch.name}, ${many(batch.entries.length, 'line')} of log${lotsOf(batch.id) > 0 ? `, ${many(lotsOf(batch.id), 'lot')}` : ''}` })),
    good: archive.batches.length,
    bad: 0,
    errors: [],
    notes: notesOf(archive, here),
    from: times.length ? iso(Math.min(...times)) : null,
    to: times.length ? iso(Math.max(...times)) : null,
  };
}
