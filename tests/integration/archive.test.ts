import { QueryTypes } from 'sequelize';
import sharp from 'sharp';
import { describe, expect, it } from 'vitest';
import { Alert, Batch, CalibrationPointRow, CalibrationRow, Lot, Membership, Must, Photo, Place, ProbeAssignment, Sensor } from '@/db/models';
import type { Actor } from '@/lib/auth/policies';
import { ManualClock } from '@/lib/clock';
import { archivedBatch, archivedCalibration, archivedEntry, archivedPhoto, archivedPoint, archivedRefusal, archivedSensor, archivedSettings, archivedStay, archiveSchema, READING_COLUMNS, type Archive } from '@/lib/contracts/archive';
import { ARCHIVE_PARTS, PART_NAMES } from '@/lib/contracts/archive-parts';
import { updateEntry as updateEntryForm } from '@/lib/contracts/batches';
import { importForm, importPreviewForm } from '@/lib/contracts/imports';
import { updateEntry } from '@/lib/services/entries/update';
import { exportArchive } from '@/lib/services/exports/archive';
import { keepImport } from '@/lib/services/imports/keep';
import { previewImport } from '@/lib/services/imports/preview';
import { undoImport } from '@/lib/services/imports/undo';
import { keepPhoto } from '@/lib/services/photos/keep';
import { listMusts } from '@/lib/services/musts/list';
import { getLot } from '@/lib/services/lots/get';
import { mustQuery } from '@/lib/contracts/musts';
import { useDatabase } from '../support/database';
import { buildEntry, buildMember, writeReadings } from '../support/factories';
import { jobThings, type JobThings } from '../support/job-things';
import { useObjectStore } from '../support/object-store';

const db = useDatabase();
useObjectStore();
const clock = new ManualClock(Date.now() + 60_000);
const HOUR = 3_600_000;

process.env.AUTH_SECRET ??= 'a secret of the tests, long enough to be one';

async function archiveText(actor: Actor, batchId: string | null = null): Promise<string> {
  let text = '';
  for await (const piece of await exportArchive(actor, batchId, clock)) text += piece;
  return text;
}
const bring = (actor: Actor, text: string) => keepImport(actor, importForm.parse({ kind: 'archive', file_name: 'cellar.json', text }), clock);

/** The archive's text with its ids counted through: two houses have no id in common, and everything else. */
function counted(text: string): string {
  const numbers = new Map<string, number>();
  const number = (id: string) => numbers.get(id) ?? (numbers.set(id, numbers.size), numbers.size - 1);
  return text.replace(/[0-9a-f]{8}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{12}/g, (id) => `#${number(id)}`).replace(/"cellar":\{[^}]*\}/, '"cellar":{}');
}

const sql = (text: string, bind: object) => db.sequelize.query(text, { bind: { ...bind } });

/** A cellar in which every table that leaves has something. */
async function fullCellar(): Promise<{ keeper: Actor; things: JobThings }> {
  const keeper = await buildMember('keeper', { name: 'Ōlïve Hawthorn' });
  const { cellarId, personId } = keeper;
  const things = await jobThings(keeper, personId);
  await sql(`insert into catalogue_items (cellar_id, sort, body, created_by) select cellar_id, sort, body, created_by from catalogue_items where id = $id`, { id: things.itemId });
  const finished = await Batch.findByPk(things.finishedId, { rejectOnEmpty: true });
  await finished.update({ mustVersionId: (await sql(`select id from must_versions where must_id = $id`, { id: things.mustId }))[0].map((row) => (row as { id: string }).id)[0]!, mustShare: 0.5 });
  await updateEntry(keeper, finished.id, things.ownEntryId, updateEntryForm.parse({ text: 'said otherwise' }), clock);
  await sql(`insert into batch_links (cellar_id, from_batch, to_batch, kind, litres, at, person_id) values ($cellarId, $a, $b, 'top_up', 0.25, now(), $personId)`, { cellarId, a: things.finishedId, b: things.otherBatchId, personId });
  await sql(`insert into bottle_moves (cellar_id, lot_id, lot_bottle_id, from_place, to_place, count, at, person_id) values ($cellarId, $lot, $bottle, null, $place, 2, now(), $personId)`, { cellarId, lot: things.lotId, bottle: things.bottleId, place: things.placeId, personId });
  await sql(`update bottle_stands set count = count - 2 where lot_bottle_id = $bottle`, { bottle: things.bottleId });
  await sql(`insert into bottle_stands (lot_bottle_id, place_id, count, cellar_id) values ($bottle, $place, 2, $cellarId)`, { bottle: things.bottleId, place: things.placeId, cellarId });
  await sql(`insert into mutes (cellar_id, batch_id, muted_by, from_at, until_at) values ($cellarId, $b, $personId, now(), now() + interval '1 day')`, { cellarId, b: things.finishedId, personId });
  await sql(`insert into rule_settings (cellar_id, batch_id, rule, for_min) values ($cellarId, null, 'stalled', 90), ($cellarId, $b, 'stalled', 30)`, { cellarId, b: things.finishedId });
  await sql(`insert into escalations (cellar_id, after_min, people) values ($cellarId, 30, array[$personId]::uuid[])`, { cellarId, personId });
  await sql(`insert into message_choices (cellar_id, person_id, rule, means, wanted) values ($cellarId, $personId, 'rack', 'mail', false)`, { cellarId, personId });
  await sql(`insert into sensor_limits (cellar_id, low_battery_days) values ($cellarId, 21)`, { cellarId });
  const call = { verdict: 'yes', kind: null, since: null, headline: 'Stalled.', reason: '1.020, no fall.', act: null, evidence: [] };
  const assessment = { at: '2026-03-01T00:00:00.000Z', stage: 'slowing', gravity: null, temperature_c: 18, last_reading_at: null, rate_points_per_day: null, gas_l_per_h: null, final_gravity: null, terminal_at: null, abv_percent: null, expected_abv_percent: null, attenuation_percent: null, calls: Object.fromEntries(['started', 'neck', 'stalled', 'temperature', 'rack', 'bottle', 'sensor'].map((name) => [name, { ...call, expected_at: null, changes_it: null }])) };
  await sql(`insert into assessments (cellar_id, batch_id, at, changed, assessment) values ($cellarId, $b, '2026-03-01T00:00:00Z', array['stalled'], $assessment::jsonb)`, { cellarId, b: things.finishedId, assessment: JSON.stringify(assessment) });
  const opened = new Date(clock.now() - 3 * HOUR);
  const alert = { cellarId, batchId: things.finishedId, call: 'stalled', kind: null, level: 'act', since: opened, openedAt: opened, evidence: { ...call, changesIt: null, expectedAt: null } } as const;
  const over = await Alert.create({ ...alert, state: 'resolved', acknowledgedAt: opened, acknowledgedBy: personId, note: 'warmed it', lookAgainAt: opened, resolvedAt: new Date(clock.now() - HOUR), resolvedBy: personId } as never);
  const inHand = await Alert.create({ ...alert, openedAt: new Date(opened.getTime() + 1), kind: 'stuck', state: 'acknowledged', acknowledgedAt: opened, acknowledgedBy: personId, note: 'warming it' } as never);
  await sql(`insert into outbox (cellar_id, alert_id, person_id, means, dedupe_key, payload, sent_at) values ($cellarId, $alert, $personId, 'mail', $key, '{}', now())`, { cellarId, alert: over.id, personId, key: `alert:${over.id}:opened:${personId}` });
  await sql(`insert into outbox (cellar_id, alert_id, person_id, means, dedupe_key, payload, failed_at, dropped_at, held_by, last_error) values ($cellarId, $alert, $personId, 'push', $key, '{}', now(), now(), 'quiet', 'it had passed')`, { cellarId, alert: over.id, personId, key: `alert:${over.id}:opened:${personId}:push` });
  const up = { phase: 'open', since: opened.getTime(), openedAt: opened.getTime(), toldAt: opened.getTime(), repeats: 0, inHand: { lookAgainAt: null } };
  await sql(`insert into alert_states (batch_id, rule, state, alert_id) values ($b, 'stalled', $state::jsonb, $alert), ($b, 'rack', '{"phase":"inactive","openedAt":null}', null)`, { b: things.finishedId, state: JSON.stringify(up), alert: inHand.id });
  await sql(`insert into caution_lifts (cellar_id, lot_id, caution, reason, person_id, at) values ($cellarId, $lot, 'A bottle gushed.', 'opened three more, all still', $personId, now() - interval '1 day')`, { cellarId, lot: things.lotId, personId });
  await floatsOf(keeper, things);
  await everyColumn(keeper, things);
  const photo = await sharp({ create: { width: 900, height: 600, channels: 3, background: '#6b4a2a' } }).jpeg().toBuffer();
  await keepPhoto(keeper, { entry: things.ownEntryId, caption: 'the lees' }, photo, clock);
  await keepPhoto(keeper, { lot: things.lotId }, photo, clock);
  await keepPhoto(keeper, { tasting: things.tastingId }, photo, clock);
  return { keeper, things };
}

/** Fills what the services left empty, so that no field goes untried. */
async function everyColumn({ cellarId, personId }: Actor, things: JobThings): Promise<void> {
  const mine = { cellarId, personId };
  await sql(`insert into places (cellar_id, name, capacity, removed_at) values ($cellarId, 'the old rack', 24, now())`, { cellarId });
  await sql(`update must_sheets set latest = 2 where id = $must`, { must: things.mustId });
  await sql(`insert into must_sheets (cellar_id, name, kind, latest, archived_at) values ($cellarId, 'put away', 'beer', 1, now())`, { cellarId });
  await sql(`insert into must_versions (cellar_id, must_id, version, body, sketch) select m.cellar_id, m.id, 1, v.body, v.sketch from must_sheets m, must_versions v where m.cellar_id = $cellarId and m.name = 'put away' and v.must_id = $must and v.version = 1`, { cellarId, must: things.mustId });
  await sql(`insert into must_versions (cellar_id, must_id, version, body, sketch, change_note, copied_from, created_by) select cellar_id, must_id, 2, body, sketch, 'less sugar', id, created_by from must_versions where must_id = $must`, { must: things.mustId });
  await sql(`update catalogue_items set removed_at = now() where id = $item`, { item: things.itemId });
  await sql(`update finings set second_at = first_at + interval '1 hour' where cellar_id = $cellarId`, { cellarId });
  await sql(`update lots set override_reason = 'kept at 4 C', override_by = $personId, override_at = now(), note = 'the last of it', next_time = 'less', next_time_by = $personId, next_time_at = now() where cellar_id = $cellarId`, mine);
  await sql(`update bottle_moves set from_place = $place, override_reason = 'out of the sun' where cellar_id = $cellarId`, { cellarId, place: things.emptyPlaceId });
  await sql(`update openings set place_id = $place, given_to = 'Bo', note = 'still good' where cellar_id = $cellarId`, { cellarId, place: things.placeId });
  await sql(`insert into tastings (cellar_id, lot_id, guest_name, at, look, smell, taste, balance, sparkle, words, next_time) values ($cellarId, $lot, 'A guest', now(), 3, 4, 5, 2, 'less', 'apples', 'drier')`, { cellarId, lot: things.lotId });
  await sql(`insert into jobs (cellar_id, kind, title, source, due_at, repeat_days, repeats, taken_by, taken_at, snoozed_until, done_at, done_by, dropped_at, seen_at, over_at) values ($cellarId, 'other', 'Look again', 'person', now(), 7, $job, $personId, now(), now(), now(), $personId, now(), now(), now())`, { ...mine, job: things.jobId });
  await sql(`update mutes set ended_at = now(), ended_by = $personId where cellar_id = $cellarId`, mine);
  await sql(`update rule_settings set keep_min = 45 where cellar_id = $cellarId`, { cellarId });
  await sql(`update batches set tag = 7, place = 'back room', yeast = 'own yeast', temperature_min_c = 12, temperature_max_c = 20, created_by = $personId where id = $b`, { personId, b: things.finishedId });
  await sql(`update entries set temperature_c = 18.5, calibrated_at_c = 20, neck = 'airlock', sugar_g = 12.5, fruit_g = 800 where id = $entry`, { entry: things.ownEntryId });
}

async function floatsOf({ cellarId, personId }: Actor, things: JobThings): Promise<void> {
  const at = clock.now() - 50 * HOUR;
  const sensor = (name: string, kind: 'float' | 'room' | 'foam', more = {}) => Sensor.create({ cellarId, identifier: `${kind}-${things.jobId.slice(0, 8)}${name.length}`, secretHash: Buffer.alloc(32), name, kind, createdAt: new Date(at), ...more });
  const [float, room] = [await sensor('=float', 'float', { settingsVersion: 2, wantedIntervalS: 600, settingsAt: new Date(at), confirmedVersion: 2, confirmedAt: new Date(at + HOUR), intervalS: 600 }), await sensor('north wall', 'room')];
  // A room probe that never stood at a batch, a foam probe in a neck, one that was taken away, one that never spoke.
  const hanging = await sensor('by the door', 'room', { place: 'back room' });
  const foam = await sensor('neck eye', 'foam', { disabledAt: new Date(at) });
  await sensor('the old one of them', 'float', { removedAt: new Date(at) });
  await ProbeAssignment.create({ cellarId, sensorId: foam.id, batchId: things.otherBatchId, fromAt: new Date(at), toAt: new Date(at + HOUR) });
  await writeReadings(hanging.id, [{ at, gravity: null, temperature: 11.5 }, { at: at + HOUR, gravity: null, temperature: 11.6 }]);
  await writeReadings(foam.id, [{ at, gravity: null, temperature: 18.25 }]);
  await sql(`update readings set foam = 12.5, battery = 3.1, signal = -70, sequence = 4 where sensor_id = $s`, { s: foam.id });
  await sql(`insert into refusals (sensor_id, received_at, road, reason, body) values ($s, now(), 'mqtt', 'is not JSON', '\\x00ff7b'::bytea), ($s, now(), 'http', 'is empty', '')`, { s: foam.id });
  const version = await CalibrationRow.create({ cellarId, sensorId: float.id, version: 1, appliesFrom: new Date(at), coefficients: [0.9, 0.002], lowDeg: 10, highDeg: 70, sigma: 0.0007, points: [{ inclination: 20, gravity: 1.01, temperature: 20 }], note: 'in sugar', createdBy: personId, removedAt: new Date(at), removedBy: personId });
  await CalibrationPointRow.create({ cellarId, sensorId: float.id, at: new Date(at), inclination: 20, gravity: 1.01, temperature: 20, source: 'hydrometer', sugarGPerL: 26, entryId: things.ownEntryId, createdBy: personId, removedAt: new Date(at) });
  await sql(`insert into assignments (cellar_id, sensor_id, batch_id, from_at, to_at) values ($cellarId, $s, $b, $from, $to), ($cellarId, $s, $c, $to, null)`, { cellarId, s: float.id, b: things.finishedId, c: things.otherBatchId, from: new Date(at), to: new Date(at + 20 * HOUR) });
  await ProbeAssignment.create({ cellarId, sensorId: room.id, batchId: things.finishedId, fromAt: new Date(at) });
  await writeReadings(float.id, Array.from({ length: 40 }, (_, index) => ({ at: at + index * HOUR + 7, gravity: 1.04 - index / 9876 })));
  await sql(`update readings set calibration_id = $v, inclination = 33.3, gravity_sent = 1.05 where sensor_id = $s and gravity < 1.038`, { v: version.id, s: float.id });
  await writeReadings(room.id, [{ at, gravity: null, temperature: 14.2 }]);
}

/** What belongs to a cellar and does not leave with it. */
const STAYS_HERE: Readonly<Record<string, string>> = {
  api_tokens: 'a credential',
  audit: 'the trail has an export of its own',
  batch_states: 'judged anew',
  calendar_feeds: 'a credential',
  imports: 'how it came in',
  invitations: 'a credential',
  letters: 'mail under way',
  memberships: 'people belong to the house; they are named where they wrote',
  recalculations: 'work under way',
  shares: 'a credential',
  take_links: 'a credential',
  webhook_deliveries: 'under way, with the address it goes to',
  webhooks: 'a credential',
};
/** Tables of a cellar that say so only through what they hang on, and stay. */
const HANGING_STAYS_HERE: Readonly<Record<string, string>> = { sensor_latest: 'said again by the readings' };

/** Tables within batches, sensors and photos: the form they leave in, what is named otherwise there, and what only this house has a use for. */
const stay = { as: { batch: 'batch_id', from: 'from_at', to: 'to_at' }, here: ['cellar_id', 'id', 'sensor_id'] };
const NESTED: Readonly<Record<string, { fields: readonly string[]; as?: Record<string, string>; here: readonly string[] }>> = {
  assignments: { fields: Object.keys(archivedStay.shape).filter((name) => name !== 'as'), ...stay },
  batches: { fields: Object.keys(archivedBatch.shape).filter((name) => name !== 'entries'), as: { by: 'created_by', must_version: 'must_version_id' }, here: ['cellar_id', 'import_id', 'updated_at'] },
  calibration_points: { fields: Object.keys(archivedPoint.shape), as: { by: 'created_by', entry: 'entry_id' }, here: ['cellar_id', 'id', 'sensor_id'] },
  calibrations: { fields: Object.keys(archivedCalibration.shape), as: { by: 'created_by' }, here: ['cellar_id', 'id', 'sensor_id'] },
  // What was taken back does not leave.
  entries: { fields: Object.keys(archivedEntry.shape), as: { by: 'person_id' }, here: ['batch_id', 'cellar_id', 'client_id', 'removed_at', 'removed_by'] },
  // Measured again on the file itself.
  photos: { fields: Object.keys(archivedPhoto.shape), as: { by: 'created_by', entry: 'entry_id', lot: 'lot_id', tasting: 'tasting_id', jpeg: '' }, here: ['bytes', 'cellar_id', 'height', 'removed_at', 'width'] },
  probe_assignments: { fields: Object.keys(archivedStay.shape).filter((name) => name !== 'as'), ...stay },
  readings: { fields: READING_COLUMNS, as: { calibration: 'calibration_id' }, here: ['sensor_id'] },
  refusals: { fields: Object.keys(archivedRefusal.shape), here: ['id', 'sensor_id'] },
  // Its address and its secret are credentials.
  sensors: {
    fields: [...Object.keys(archivedSensor.shape), ...Object.keys(archivedSettings.shape).map((name) => `settings.${name}`)],
    as: { 'settings.version': 'settings_version', 'settings.interval_s': 'wanted_interval_s', 'settings.sent_at': 'settings_at', 'settings.confirmed_version': 'confirmed_version', 'settings.confirmed_at': 'confirmed_at', ...Object.fromEntries(['settings', 'stays', 'calibrations', 'points', 'refused', 'columns', 'readings'].map((name) => [name, ''])) },
    here: ['cellar_id', 'id', 'identifier', 'secret_hash'],
  },
};

describe('an archive of all of it', () => {
  const columnsOf = async (table: string) => (await db.sequelize.query<{ name: string }>(`select column_name as name from information_schema.columns where table_schema = 'public' and table_name = $table order by 1`, { bind: { table }, type: QueryTypes.SELECT })).map(({ name }) => name);

  it('holds every table of a cellar, and every table that hangs on its batches, sensors or lots, or says why not', async () => {
    const own = await db.sequelize.query<{ name: string }>(`select table_name as name from information_schema.columns where table_schema = 'public' and column_name = 'cellar_id'`, { type: QueryTypes.SELECT });
    const hanging = await db.sequelize.query<{ name: string }>(
      `select distinct c.conrelid::regclass::text as name from pg_constraint c join information_schema.columns i on i.table_schema = 'public' and i.column_name = 'cellar_id' and c.confrelid = i.table_name::regclass where c.contype = 'f'`,
      { type: QueryTypes.SELECT },
    );
    // The months of `readings` are parts of it, and no key ties them to the sensors.
    const found = new Set([...own, ...hanging].map(({ name }) => name).concat('readings'));
    const covered = new Set([...PART_NAMES.map((name) => ARCHIVE_PARTS[name].table), ...Object.keys(NESTED), ...Object.keys(STAYS_HERE), ...Object.keys(HANGING_STAYS_HERE)]);
    expect([...found].sort()).toEqual([...covered].sort());
  });

  it('holds every column of the tables within batches, sensors and photos', async () => {
    for (const [table, { fields, as = {}, here }] of Object.entries(NESTED)) {
      const taken = fields.map((name) => as[name] ?? name).filter((name) => name !== '');
      expect([...taken, ...here].sort(), table).toEqual(await columnsOf(table));
    }
  });

  it('says something of every field at least once in the tests below', async () => {
    const { keeper } = await fullCellar();
    const archive = archiveSchema.parse(JSON.parse(await archiveText(keeper)));
    const rowsOf = { ...Object.fromEntries(PART_NAMES.map((name) => [name, archive[name]])), batches: archive.batches, entries: archive.batches.flatMap((batch) => batch.entries), sensors: archive.sensors, settings: archive.sensors.flatMap((one) => one.settings ?? []), refused: archive.sensors.flatMap((one) => one.refused), stays: archive.sensors.flatMap((one) => one.stays), calibrations: archive.sensors.flatMap((one) => one.calibrations), points: archive.sensors.flatMap((one) => one.points), photos: archive.photos };
    const silent = Object.entries(rowsOf as Record<string, Record<string, unknown>[]>).flatMap(([name, rows]) => [...new Set(rows.flatMap((row) => Object.keys(row)))].filter((field) => rows.every((row) => row[field] === null)).map((field) => `${name}.${field}`));
    expect(silent).toEqual([]);
    expect(READING_COLUMNS.filter((_, index) => archive.sensors.every((one) => one.readings.every((row) => row[index] === null)))).toEqual([]);
  });

  it('holds every column of the tables that leave, but what only this house has a use for', async () => {
    const left: Record<string, string[]> = {};
    for (const name of PART_NAMES) {
      const { table, fields } = ARCHIVE_PARTS[name];
      const taken = new Set(Object.values(fields).map(({ column }) => column));
      const missing = (await columnsOf(table)).filter((column) => !taken.has(column) && column !== 'cellar_id' && column !== 'id');
      if (missing.length > 0) left[table] = missing.sort();
    }
    // Reckoned again; sent once only; a guest's link; kept out by `where`; the sending itself.
    expect(left).toEqual({ alert_states: ['updated_at'], outbox: ['attempts', 'dedupe_key', 'leased_until', 'next_attempt_at', 'payload', 'refusals'], must_versions: ['sketch'], openings: ['client_id', 'removed_at'], tastings: ['client_id', 'removed_at', 'share_id'] });
  });

  it('goes through another house and comes out word for word, ids aside', async () => {
    const { keeper } = await fullCellar();
    const out = await archiveText(keeper);
    const parsed: Archive = archiveSchema.parse(JSON.parse(out));
    for (const name of PART_NAMES) expect(parsed[name].length, name).toBeGreaterThan(0);
    expect(parsed.photos.map((photo) => [photo.entry, photo.lot, photo.tasting].filter(Boolean).length)).toEqual([1, 1, 1]);
    expect(parsed.sensors.map((sensor) => [sensor.kind, sensor.place, sensor.stays.length, sensor.calibrations.length, sensor.points.length, sensor.readings.length])).toEqual([['float', null, 2, 1, 1, 40], ['room', null, 1, 0, 0, 1], ['room', 'back room', 0, 0, 0, 2], ['foam', null, 1, 0, 0, 1], ['float', null, 0, 0, 0, 0]]);
    expect(parsed.alerts.map((alert) => alert.state)).toEqual(['resolved', 'acknowledged']);

    const other = await buildMember('keeper', { name: 'Ōlïve Hawthorn' });
    const seen = await previewImport(other, importPreviewForm.parse({ kind: 'archive', file_name: 'cellar.json', text: out }), clock);
    expect(seen).toMatchObject({ good: parsed.batches.length, bad: 0 });
    const kept = await bring(other, out);
    expect(kept.counts).toMatchObject({ batches: parsed.batches.length, readings: 44, 'must sheets': 2, lots: 1, 'tasting notes': 2, places: 3, photos: 3 });
    expect(counted(await archiveText(other))).toBe(counted(out));
    // The pages of the other house read it.
    const lot = await Lot.findOne({ where: { cellarId: other.cellarId }, rejectOnEmpty: true });
    expect(await getLot(other, lot.id, clock)).toMatchObject({ code: (parsed.lots[0] as { code: string }).code, counts: { opened: 1 } });
    expect((await listMusts(other, mustQuery.parse({}))).items[0]).toMatchObject({ name: 'Orchard cider', original_gravity: { value: expect.any(Number) } });

    await undoImport(other, kept.id, clock);
    for (const model of [Batch, Must, Place, Sensor, Photo]) expect(await (model as typeof Batch).count({ where: { cellarId: other.cellarId } }), model.name).toBe(0);
    expect(counted(await archiveText(keeper))).toBe(counted(out));
  });

  it('comes in beside what is there: a place of the same name is that place, a code that is taken gets a number', async () => {
    const { keeper } = await fullCellar();
    const out = await archiveText(keeper);
    await bring(keeper, out);
    const codes = (await Lot.findAll({ where: { cellarId: keeper.cellarId }, order: [['code', 'ASC']] })).map((lot) => lot.code);
    expect(codes).toEqual([codes[0], `${codes[0]}-2`]);
    expect(await Place.count({ where: { cellarId: keeper.cellarId, removedAt: null } })).toBe(2);
  });

  it('leaves a line without its author where nobody of that name is here, or two are', async () => {
    const { keeper } = await fullCellar();
    const out = await archiveText(keeper);
    const other = await buildMember('keeper', { name: 'Somebody else' });
    await bring(other, out);
    const parsed = archiveSchema.parse(JSON.parse(await archiveText(other)));
    expect(parsed.batches.flatMap((batch) => batch.entries.map((entry) => entry.by)).filter(Boolean)).toEqual([]);
    expect(parsed.choices).toEqual([]);
    const third = await buildMember('keeper', { name: 'Ōlïve Hawthorn' });
    const twin = await buildMember('hand', { name: 'Ōlïve Hawthorn' });
    await Membership.create({ cellarId: third.cellarId, personId: twin.personId, role: 'hand' });
    await bring(third, out);
    expect(archiveSchema.parse(JSON.parse(await archiveText(third))).batches.flatMap((batch) => batch.entries.map((entry) => entry.by)).filter(Boolean)).toEqual([]);
  });

  it('of one batch holds what belongs to it and comes back alone', async () => {
    const { keeper, things } = await fullCellar();
    const lot = await Lot.findByPk(things.lotId, { rejectOnEmpty: true });
    const out = await archiveText(keeper, lot.batchId);
    const parsed = archiveSchema.parse(JSON.parse(out));
    expect([parsed.batches.length, parsed.lots.length, parsed.tastings.length, parsed.places.length, parsed.photos.length, parsed.ingredients.length]).toEqual([1, 1, 2, 2, 2, 0]);
    const other = await buildMember('keeper', { name: 'Ōlïve Hawthorn' });
    await bring(other, out);
    const [copy] = await Batch.findAll({ where: { cellarId: other.cellarId } });
    expect(counted(await archiveText(other, copy!.id))).toBe(counted(out));
  });
});

describe('a spoilt archive', () => {
  const spoils: ReadonlyArray<readonly [string, (archive: Archive) => unknown]> = [
    ['a lot of a batch that is not in it', (a) => ({ ...a, batches: a.batches.filter((batch) => batch.id !== a.lots[0]!.batch) })],
    ['two things by one id', (a) => ({ ...a, places: [...a.places, a.places[0]] })],
    ['a stay that ends before it begins', (a) => ({ ...a, sensors: a.sensors.map((sensor) => ({ ...sensor, stays: sensor.stays.map((stay) => ({ ...stay, from: stay.to, to: stay.from })) })) })],
    ['a float in two batches at once', (a) => ({ ...a, sensors: a.sensors.map((sensor) => ({ ...sensor, stays: sensor.stays.map((stay) => ({ ...stay, as: 'float', from: sensor.stays[0]!.from })) })) })],
    ['more bottles than there are numbers', (a) => ({ ...a, bottles: a.bottles.map((bottle) => ({ ...bottle, count: 1e12 })) })],
    ['a bench that is none', (a) => ({ ...a, lots: a.lots.map((lot) => ({ ...lot, bench: { shown: {} } })) })],
    ['a must sheet that is none', (a) => ({ ...a, must_versions: a.must_versions.map((version) => ({ ...version, body: { name: 'x' } })) })],
    ['the same version of a sheet twice', (a) => ({ ...a, must_versions: [...a.must_versions, { ...a.must_versions[0], id: '00000000-0000-4000-8000-000000000001' }] })],
    ['a yeast that says it is an ingredient', (a) => ({ ...a, ingredients: a.ingredients.map((item) => ({ ...item, sort: 'ingredient' })) })],
    ['a photo that is no picture', (a) => ({ ...a, photos: a.photos.map((photo) => ({ ...photo, jpeg: Buffer.from('<svg onload=alert(1)>').toString('base64') })) })],
    ['a photo on something that is not in it', (a) => ({ ...a, photos: a.photos.map((photo) => ({ ...photo, entry: photo.entry && '00000000-0000-4000-8000-000000000002' })) })],
    ['a zero byte in a text', (a) => ({ ...a, batches: a.batches.map((batch) => ({ ...batch, entries: batch.entries.map((entry) => ({ ...entry, text: 'a\u0000b' })) })) })],
    ['half a character in a judgement', (a) => ({ ...a, alerts: a.alerts.map((alert) => ({ ...alert, evidence: { ...(alert.evidence as object), headline: '\ud800' } })) })],
    ['a reading of the year 1970', (a) => ({ ...a, sensors: a.sensors.map((sensor) => ({ ...sensor, readings: sensor.readings.map((reading) => ['1970-01-01T00:00:00Z', ...reading.slice(1)]) })) })],
    ['a rule that there is not', (a) => ({ ...a, rules: a.rules.map((rule) => ({ ...rule, rule: '__proto__' })) })],
    ['an alert that goes on with no rule to end it', (a) => ({ ...a, alerts: a.alerts.map((alert) => ({ ...alert, state: 'open' })) })],
    ['a job that repeats every 0 days', (a) => ({ ...a, jobs: a.jobs.map((job) => ({ ...job, repeat_days: 0 })) })],
    ['a vessel smaller than what is in it', (a) => ({ ...a, batches: a.batches.map((batch) => ({ ...batch, vessel_l: 0.1 })) })],
    ['a time that is none', (a) => ({ ...a, tastings: a.tastings.map((tasting) => ({ ...tasting, at: '2026-02-30T00:00:00Z' })) })],
    ['a list where an object belongs', (a) => ({ ...a, lots: [[]] })],
    ['an object where a list belongs', (a) => ({ ...a, jobs: { 0: a.jobs[0] } })],
  ];
  it('is refused with a reason, and nothing of it is kept', async () => {
    const { keeper } = await fullCellar();
    const good = archiveSchema.parse(JSON.parse(await archiveText(keeper)));
    expect(spoils.length).toBeGreaterThanOrEqual(20);
    for (const [what, spoil] of spoils) {
      const other = await buildMember('keeper', { name: 'Ōlïve Hawthorn' });
      await expect(bring(other, JSON.stringify(spoil(structuredClone(good)))), what).rejects.toMatchObject({ code: 'invalid', fields: { text: [expect.any(String)] } });
      for (const model of [Batch, Must, Place, Sensor, Photo]) expect(await (model as typeof Batch).count({ where: { cellarId: other.cellarId } }), `${what}: ${model.name}`).toBe(0);
    }
  });

  it('cannot take an occasion that belongs to another cellar’s job', async () => {
    const { keeper } = await fullCellar();
    const good = archiveSchema.parse(JSON.parse(await archiveText(keeper)));
    const other = await buildMember('keeper');
    const stolen = `settle:${crypto.randomUUID()}`;
    await bring(other, JSON.stringify({ ...good, jobs: good.jobs.map((job, index) => ({ ...job, occasion: index === 0 ? stolen : null, over_at: null })) }));
    const rows = await db.sequelize.query<{ n: number }>('select count(*)::int as n from jobs where dedupe_key = $stolen', { bind: { stolen }, type: QueryTypes.SELECT });
    expect(rows[0]!.n).toBe(0);
  });
});

it('an import is taken out with what was logged in its batches since', async () => {
  const { keeper } = await fullCellar();
  const other = await buildMember('keeper');
  const kept = await bring(other, await archiveText(keeper));
  const [batch] = await Batch.findAll({ where: { cellarId: other.cellarId } });
  await buildEntry(batch!, { text: 'later' });
  await expect(undoImport(other, kept.id, clock)).resolves.toMatchObject({ undone_at: expect.any(String) });
});
