import { z } from 'zod';
import { BOTTLE_KINDS, CLOSURES } from '../core/bottling/bottles';
import { RULE_NAMES } from '../core/alerts/rules';
import { MEANS } from '../core/alerts/telling';
import { CALL_NAMES, DRINK_KINDS } from '../core/types';
import { ALERT_STATES } from './alerts';
import { field, maybe, maybeTime, mayRefer, own, person, refers, time, value, whole, type ArchivePart } from './archive-fields';
import { bench, cost, evidence, pressure, standing } from './archive-shapes';
import { assessmentSchema } from './assessment';
import { revisionList } from './batches';
import { ingredientForm, yeastForm } from './catalogue';
import { gravity, line, text } from './common';
import { rangeSchema } from './figures';
import { LOT_SPARKLES, OPENING_KINDS } from './lots';
import { mustSheetSchema } from './musts';
import { SPARKLES_FOUND } from './tastings';

/** What stands in the archive beside batches and sensors: a list a part, in the order in which they come back. */
export type PartName = 'places' | 'musts' | 'must_versions' | 'ingredients' | 'links' | 'corrections' | 'finings' | 'lots' | 'bottles' | 'stands' | 'moves' | 'openings' | 'tastings' | 'lifts' | 'jobs' | 'mutes' | 'rules' | 'turns' | 'choices' | 'limits' | 'verdicts' | 'alerts' | 'told' | 'standings';

const int = z.int32();
const count = z.int32().min(1);
const number = z.number();
const points = z.int().min(1).max(5);
const byId = 't.created_at, t.id';
const batchIs = 't.batch_id = $batchId';
const ofItsLots = 't.lot_id in (select id from lots where batch_id = $batchId)';
const lotsOrder = '(select l.created_at from lots l where l.id = t.lot_id), t.lot_id';

export const ARCHIVE_PARTS: Readonly<Record<PartName, ArchivePart>> = {
  places: {
    table: 'places',
    fields: { id: own, name: value('name', line(60)), capacity: maybe('capacity', count), temperature_c: maybe('temperature_c', number), created_at: time('created_at'), removed_at: maybeTime('removed_at') },
    order: byId,
    ofBatch: `t.id in (select s.place_id from bottle_stands s join lot_bottles b on b.id = s.lot_bottle_id join lots l on l.id = b.lot_id where l.batch_id = $batchId
      union all select unnest(array[m.from_place, m.to_place]) from bottle_moves m join lots l on l.id = m.lot_id where l.batch_id = $batchId
      union all select o.place_id from openings o join lots l on l.id = o.lot_id where l.batch_id = $batchId)`,
  },
  musts: {
    table: 'must_sheets',
    fields: { id: own, name: value('name', line(80)), kind: value('kind', z.enum(DRINK_KINDS)), latest: value('latest', count), changed_at: time('changed_at'), archived_at: maybeTime('archived_at'), created_at: time('created_at') },
    order: byId,
    ofBatch: 't.id in (select v.must_id from must_versions v join batches b on b.must_version_id = v.id where b.id = $batchId)',
  },
  must_versions: {
    table: 'must_versions',
    fields: { id: own, must: refers('must_id'), version: value('version', count), body: whole('body', mustSheetSchema), change_note: maybe('change_note', text(500)), copied_from: mayRefer('copied_from'), by: person('created_by'), created_at: time('created_at') },
    order: byId,
    ofBatch: 't.must_id in (select v.must_id from must_versions v join batches b on b.must_version_id = v.id where b.id = $batchId)',
  },
  ingredients: {
    table: 'catalogue_items',
    fields: { id: own, sort: value('sort', z.enum(['ingredient', 'yeast'])), body: whole('body', z.union([ingredientForm, yeastForm])), by: person('created_by'), created_at: time('created_at'), removed_at: maybeTime('removed_at') },
    order: byId,
    ofBatch: null,
  },
  links: {
    table: 'batch_links',
    fields: { from: refers('from_batch'), to: refers('to_batch'), kind: value('kind', z.enum(['split', 'blend', 'top_up'])), litres: value('litres', number.positive()), at: time('at'), by: person('person_id') },
    order: 't.at, t.id',
    ofBatch: null,
  },
  corrections: {
    table: 'entry_revisions',
    fields: { entry: refers('entry_id'), at: time('at'), by: person('person_id'), before: whole('before', revisionList.shape.items.element.shape.before) },
    order: 't.at, t.id',
    where: 'exists (select 1 from entries e where e.id = t.entry_id and e.removed_at is null)',
    ofBatch: 't.entry_id in (select id from entries where batch_id = $batchId)',
  },
  finings: {
    table: 'finings',
    fields: { id: own, batch: refers('batch_id'), fining: value('fining', line(60)), interval_min: maybe('interval_min', int), settle_days: value('settle_days', number), first_at: time('first_at'), second_at: maybeTime('second_at'), by: person('person_id') },
    order: 't.first_at, t.id',
    ofBatch: batchIs,
  },
  lots: {
    table: 'lots',
    fields: {
      id: own,
      batch: refers('batch_id'),
      code: value('code', line(40)),
      name: value('name', line(80)),
      bottled_at: time('bottled_at'),
      ready_from: time('ready_from'),
      volume_l: value('volume_l', number.positive()),
      original_gravity: maybe('original_gravity', gravity),
      final_gravity: maybe('final_gravity', gravity),
      abv: maybe('abv', rangeSchema),
      sparkle: value('sparkle', z.enum(LOT_SPARKLES)),
      bench: whole('bench', bench),
      override_reason: maybe('override_reason', text(1000)),
      override_by: person('override_by'),
      override_at: maybeTime('override_at'),
      caution: maybe('caution', text(1000)),
      note: maybe('note', text(2000)),
      next_time: maybe('next_time', text(500)),
      next_time_by: person('next_time_by'),
      next_time_at: maybeTime('next_time_at'),
      cost: whole('cost', cost),
      by: person('created_by'),
      created_at: time('created_at'),
    },
    order: byId,
    ofBatch: batchIs,
  },
  bottles: {
    table: 'lot_bottles',
    fields: { id: own, lot: refers('lot_id'), position: value('position', int), kind: value('kind', z.enum(BOTTLE_KINDS)), closure: value('closure', z.enum(CLOSURES)), size_ml: value('size_ml', count), rating_bar: maybe('rating_bar', number), rating_confirmed: value('rating_confirmed', z.boolean()), count: value('count', count), pressure: whole('pressure', pressure) },
    order: `${lotsOrder}, t.position, t.id`,
    ofBatch: ofItsLots,
  },
  stands: {
    table: 'bottle_stands',
    fields: { bottle: refers('lot_bottle_id'), place: mayRefer('place_id'), count: value('count', count) },
    order: '(select l.created_at from lots l join lot_bottles b on b.lot_id = l.id where b.id = t.lot_bottle_id), t.lot_bottle_id, (select p.created_at from places p where p.id = t.place_id) nulls first, t.place_id',
    ofBatch: 't.lot_bottle_id in (select b.id from lot_bottles b join lots l on l.id = b.lot_id where l.batch_id = $batchId)',
  },
  moves: {
    table: 'bottle_moves',
    fields: { lot: refers('lot_id'), bottle: refers('lot_bottle_id'), from_place: mayRefer('from_place'), to_place: mayRefer('to_place'), count: value('count', count), at: time('at'), by: person('person_id'), override_reason: maybe('override_reason', text(1000)) },
    order: 't.at, t.id',
    ofBatch: ofItsLots,
  },
  openings: {
    table: 'openings',
    fields: { lot: refers('lot_id'), bottle: refers('lot_bottle_id'), place: mayRefer('place_id'), kind: value('kind', z.enum(OPENING_KINDS)), count: value('count', count), at: time('at'), given_to: maybe('given_to', line(80)), note: maybe('note', text(500)), by: person('person_id') },
    order: 't.at, t.id',
    where: 't.removed_at is null',
    ofBatch: ofItsLots,
  },
  tastings: {
    table: 'tastings',
    fields: {
      id: own,
      lot: refers('lot_id'),
      by: person('person_id'),
      guest_name: maybe('guest_name', line(40)),
      at: time('at'),
      look: maybe('look', points),
      smell: maybe('smell', points),
      taste: maybe('taste', points),
      balance: maybe('balance', points),
      sparkle: maybe('sparkle', z.enum(SPARKLES_FOUND)),
      score: maybe('score', number.min(1).max(10)),
      words: maybe('words', text(1000)),
      next_time: maybe('next_time', text(500)),
      show_name: value('show_name', z.boolean()),
      created_at: time('created_at'),
    },
    order: byId,
    where: 't.removed_at is null',
    ofBatch: ofItsLots,
  },
  lifts: {
    table: 'caution_lifts',
    fields: { lot: refers('lot_id'), caution: value('caution', text(1000)), reason: value('reason', text(1000)), by: person('person_id'), at: time('at') },
    order: `t.at, ${lotsOrder}, t.id`,
    ofBatch: ofItsLots,
  },
  jobs: {
    table: 'jobs',
    fields: {
      id: own,
      batch: mayRefer('batch_id'),
      lot: mayRefer('lot_id'),
      fining: mayRefer('fining_id'),
      kind: value('kind', z.string().regex(/^[a-z_]{2,30}$/)),
      title: value('title', text(500)),
      note: maybe('note', text(2000)),
      source: value('source', z.enum(['call', 'schedule', 'timer', 'person'])),
      occasion: field('key', 'dedupe_key', z.string().max(200), false),
      due_at: time('due_at'),
      exact: value('exact', z.boolean()),
      repeat_days: maybe('repeat_days', count),
      repeats: mayRefer('repeats'),
      taken_by: person('taken_by'),
      taken_at: maybeTime('taken_at'),
      snoozed_until: maybeTime('snoozed_until'),
      done_at: maybeTime('done_at'),
      done_by: person('done_by'),
      dropped_at: maybeTime('dropped_at'),
      seen_at: maybeTime('seen_at'),
      over_at: maybeTime('over_at'),
      by: person('created_by'),
      created_at: time('created_at'),
    },
    order: byId,
    ofBatch: `(${batchIs} or ${ofItsLots})`,
  },
  mutes: {
    table: 'mutes',
    fields: { batch: refers('batch_id'), by: person('muted_by'), from: time('from_at'), until: time('until_at'), ended_at: maybeTime('ended_at'), ended_by: person('ended_by') },
    order: 't.from_at, t.id',
    ofBatch: batchIs,
  },
  rules: {
    table: 'rule_settings',
    fields: { batch: mayRefer('batch_id'), rule: value('rule', z.enum(RULE_NAMES)), enabled: value('enabled', z.boolean()), for_min: maybe('for_min', int.min(0)), keep_min: maybe('keep_min', int.min(0)) },
    order: 't.batch_id is not null, (select b.created_at from batches b where b.id = t.batch_id), t.batch_id, t.rule',
    ofBatch: batchIs,
    keepsOwn: true,
  },
  turns: {
    table: 'escalations',
    fields: { after_min: value('after_min', int.min(1).max(1440)), people: field('people', 'people', z.array(line(200)).max(200)) },
    order: 't.after_min',
    ofBatch: null,
    keepsOwn: true,
  },
  choices: {
    table: 'message_choices',
    fields: { person: field('person', 'person_id', line(200)), rule: value('rule', z.enum(RULE_NAMES)), means: value('means', z.enum(MEANS)), wanted: value('wanted', z.boolean()) },
    order: 't.rule, t.means, (select p.name from people p where p.id = t.person_id)',
    ofBatch: null,
    keepsOwn: true,
  },
  limits: {
    table: 'sensor_limits',
    fields: { low_battery_days: value('low_battery_days', int.min(0)), empty_battery_v: value('empty_battery_v', number), weak_signal_dbm: value('weak_signal_dbm', int), missed_percent: value('missed_percent', int.min(0).max(100)), clock_offset_s: value('clock_offset_s', int.min(0)) },
    order: 't.cellar_id',
    ofBatch: null,
    keepsOwn: true,
  },
  verdicts: {
    table: 'assessments',
    fields: { batch: refers('batch_id'), at: time('at'), changed: value('changed', z.array(z.enum(CALL_NAMES))), assessment: whole('assessment', assessmentSchema) },
    order: 't.at, t.id',
    ofBatch: batchIs,
  },
  alerts: {
    table: 'alerts',
    fields: {
      id: own,
      batch: refers('batch_id'),
      call: value('call', z.enum(CALL_NAMES)),
      kind: maybe('kind', z.string().max(60)),
      level: value('level', z.enum(['act', 'check', 'know'])),
      state: value('state', z.enum(ALERT_STATES)),
      since: time('since'),
      opened_at: time('opened_at'),
      acknowledged_at: maybeTime('acknowledged_at'),
      acknowledged_by: person('acknowledged_by'),
      note: maybe('note', text(2000)),
      look_again_at: maybeTime('look_again_at'),
      resolved_at: maybeTime('resolved_at'),
      resolved_by: person('resolved_by'),
      evidence: whole('evidence', evidence),
    },
    order: 't.opened_at, t.id',
    ofBatch: batchIs,
  },
  // Who was told of them; what is still under way is not.
  told: {
    table: 'outbox',
    fields: {
      alert: refers('alert_id'),
      person: field('person', 'person_id', line(200)),
      means: value('means', z.enum(MEANS)),
      owed_at: time('created_at'),
      sent_at: maybeTime('sent_at'),
      failed_at: maybeTime('failed_at'),
      dropped_at: maybeTime('dropped_at'),
      held_by: maybe('held_by', z.enum(['quiet', 'mute', 'turn'])),
      error: maybe('last_error', z.string().max(2000)),
    },
    order: 't.created_at, t.id',
    where: 't.alert_id is not null and coalesce(t.sent_at, t.failed_at) is not null',
    ofBatch: 't.alert_id in (select id from alerts where batch_id = $batchId)',
  },
  // Where each rule stands, so that what was said or cleared there is not said again here.
  standings: {
    table: 'alert_states',
    fields: { batch: refers('batch_id'), rule: value('rule', z.enum(RULE_NAMES)), state: whole('state', standing), alert: mayRefer('alert_id') },
    order: '(select b.created_at from batches b where b.id = t.batch_id), t.batch_id, t.rule',
    ofCellar: 't.batch_id in (select id from batches where cellar_id = $cellarId)',
    ofBatch: batchIs,
  },
};

export const PART_NAMES = Object.keys(ARCHIVE_PARTS) as PartName[];

const MOST_IN_A_PART = 100_000;

export type ArchivedRow = Record<string, unknown>;
const rowsOf = ({ fields }: ArchivePart): z.ZodType<ArchivedRow[]> => z.array(z.object(Object.fromEntries(Object.entries(fields).map(([name, { schema }]) => [name, schema])))).max(MOST_IN_A_PART) as z.ZodType<ArchivedRow[]>;

/** A field a part; a part that is left out is empty. */
export const archivedParts = Object.fromEntries(PART_NAMES.map((name) => [name, rowsOf(ARCHIVE_PARTS[name]).default([])])) as Record<PartName, z.ZodDefault<z.ZodType<ArchivedRow[]>>>;
