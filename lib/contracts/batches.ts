import { z } from 'zod';
import { CALL_NAMES, DRINK_KINDS, FOAMS, NECKS, VERDICTS } from '../core/types';
import { assessmentSchema } from './assessment';
import { gravity, id, line, temperatureC, text, timestamp } from './common';

export const VESSEL_KINDS = ['demijohn', 'carboy', 'flask'] as const;
export const DRINK_COLOURS = ['straw', 'gold', 'amber', 'copper', 'damson', 'bramble', 'stout', 'pale'] as const;
export const BATCH_STATES = ['working', 'ended'] as const;

const litres = z.number('must be a number of litres').min(0.1, 'must be at least 0.1 L').max(2000, 'must be at most 2000 L');
const attenuation = z.number('must be a percentage').min(20, 'must be between 20 and 130 %').max(130, 'must be between 20 and 130 %');
const tolerance = z.number('must be a percentage').min(1, 'must be between 1 and 25 %').max(25, 'must be between 1 and 25 %');

const drinkColour = z.union([z.enum(DRINK_COLOURS), z.string().regex(/^#[0-9a-fA-F]{6}$/)], 'choose a colour');

const batchFields = {
  name: line(80),
  kind: z.enum(DRINK_KINDS, 'choose what it is'),
  drink_colour: drinkColour,
  vessel_kind: z.enum(VESSEL_KINDS, 'choose a vessel'),
  /** The number on the tag tied to the vessel. */
  tag: z.number('must be a whole number').int('must be a whole number').min(1, 'must be 1 to 999').max(999, 'must be 1 to 999').nullable(),
  place: line(80).nullable(),
  volume_l: litres,
  vessel_l: litres,
  neck: z.enum(NECKS, 'choose what closes the neck'),
  pitched_at: timestamp.nullable(),
  original_gravity: gravity.nullable(),
  yeast: line(80).nullable(),
  attenuation_min_percent: attenuation.nullable(),
  attenuation_max_percent: attenuation.nullable(),
  alcohol_tolerance_abv: tolerance.nullable(),
  temperature_min_c: temperatureC.nullable(),
  temperature_max_c: temperatureC.nullable(),
} as const;

type Spans = {
  volume_l?: number;
  vessel_l?: number;
  attenuation_min_percent?: number | null;
  attenuation_max_percent?: number | null;
  temperature_min_c?: number | null;
  temperature_max_c?: number | null;
};

/** Rules that tie two fields together, each told at the field a person would change. */
function checkSpans(value: Spans, context: z.RefinementCtx) {
  const tell = (path: string, message: string) => context.addIssue({ code: 'custom', path: [path], message });
  const both = (low: number | null | undefined, high: number | null | undefined) => typeof low === 'number' && typeof high === 'number' && low > high;
  const half = (low: number | null | undefined, high: number | null | undefined) => (typeof low === 'number') !== (typeof high === 'number');
  if (value.volume_l !== undefined && value.vessel_l !== undefined && value.volume_l > value.vessel_l) tell('volume_l', 'is more than the vessel holds');
  if (both(value.attenuation_min_percent, value.attenuation_max_percent)) tell('attenuation_max_percent', 'must not be below the lower end');
  if (both(value.temperature_min_c, value.temperature_max_c)) tell('temperature_max_c', 'must not be below the lower end');
  if (half(value.attenuation_min_percent, value.attenuation_max_percent)) tell('attenuation_max_percent', 'give both ends of the range, or neither');
  if (half(value.temperature_min_c, value.temperature_max_c)) tell('temperature_max_c', 'give both ends of the range, or neither');
}

/** `POST /api/v1/batches`: what somebody tells when they start a batch. */
export const createBatch = z
  .object({
    ...batchFields,
    drink_colour: drinkColour.default('gold'),
    vessel_kind: batchFields.vessel_kind.default('demijohn'),
    tag: batchFields.tag.default(null),
    place: batchFields.place.default(null),
    neck: batchFields.neck.default('airlock'),
    pitched_at: batchFields.pitched_at.default(null),
    original_gravity: batchFields.original_gravity.default(null),
    yeast: batchFields.yeast.default(null),
    attenuation_min_percent: batchFields.attenuation_min_percent.default(null),
    attenuation_max_percent: batchFields.attenuation_max_percent.default(null),
    alcohol_tolerance_abv: batchFields.alcohol_tolerance_abv.default(null),
    temperature_min_c: batchFields.temperature_min_c.default(null),
    temperature_max_c: batchFields.temperature_max_c.default(null),
    /** Identifier of a sensor to put in from the pitch on. */
    sensor: z.string().max(64).nullable().default(null),
    /** The version of a must sheet that it is made from. */
    must_version_id: id.nullable().default(null),
  })
  .superRefine(checkSpans);
export type CreateBatch = z.infer<typeof createBatch>;

/** `PATCH /api/v1/batches/{id}`. */
export const updateBatch = z.object(batchFields).partial().extend({ state: z.enum(BATCH_STATES).optional() }).superRefine(checkSpans);
export type UpdateBatch = z.infer<typeof updateBatch>;

export const batchSchema = z.object({
  ...batchFields,
  id,
  state: z.enum(BATCH_STATES),
  ended_at: z.string().nullable(),
  created_at: z.string(),
  /** The must sheet it was made from, in the version that it keeps. */
  must: z.object({ id, version_id: id, name: z.string(), version: z.number().int() }).nullable(),
  /** The sensor that is in it now. */
  sensor: z.object({ id: z.string(), name: z.string(), last_heard_at: z.string().nullable() }).nullable(),
  /** The last judgement kept, or null before the first. */
  assessment: assessmentSchema.nullable(),
  /** Calls that somebody overruled, for as long as the call says what it said then. */
  overruled: z.array(z.object({ id, call: z.enum(CALL_NAMES), instead: z.enum(['yes', 'no']).nullable(), at: z.string(), by: z.string().nullable(), reason: z.string() })),
  /** Open alerts, worst first. */
  alerts: z.array(z.object({ id, call: z.string(), state: z.string(), opened_at: z.string(), taken_by: z.string().nullable() })),
});
export type BatchBody = z.infer<typeof batchSchema>;

export const batchList = z.object({ items: z.array(batchSchema), next_cursor: z.string().nullable() });
export type BatchList = z.infer<typeof batchList>;

export const batchQuery = z.object({
  state: z.enum(BATCH_STATES).optional(),
  cursor: z.string().max(200).optional(),
  limit: z.coerce.number().int().min(1).max(200).default(100),
});

export const ENTRY_KINDS = ['pitch', 'reading', 'observation', 'neck', 'rack', 'addition', 'top_up', 'stabilise', 'note', 'fining', 'split', 'blend', 'bottling', 'overrule'] as const;
/** Those that somebody logs by themselves; the others come with the work they are part of. */
export const LOGGED_KINDS = ['pitch', 'reading', 'observation', 'neck', 'rack', 'addition', 'top_up', 'stabilise', 'note', 'overrule'] as const;

export const CLARITIES = ['cloudy', 'hazy', 'clearing', 'bright'] as const;
export const INSTRUMENTS = ['hydrometer', 'refractometer'] as const;
/** What an addition is made of. */
export const SUBSTANCES = ['sugar', 'honey', 'fruit', 'juice', 'nutrient', 'acid', 'chalk', 'tannin', 'enzyme', 'sulphite', 'sorbate', 'sweetener', 'fining', 'yeast', 'spice', 'water', 'other'] as const;

const measure = (min: number, max: number, unit: string) => z.number('must be a number').min(min, `must be between ${min} and ${max} ${unit}`.trim()).max(max, `must be between ${min} and ${max} ${unit}`.trim()).nullable().optional();

/** What was measured or looked at, and what exactly went in: all of it optional. */
export const entryDetail = z.object({
  instrument: z.enum(INSTRUMENTS).nullable().optional(),
  /** What a refractometer showed; the gravity is reckoned from it. */
  brix: measure(0, 60, '°Bx'),
  /** A call that somebody overrules, what they hold instead, and what it said then. The last is set by the program. */
  call: z.enum(CALL_NAMES).nullable().optional(),
  instead: z.enum(['yes', 'no']).nullable().optional(),
  said: z.object({ verdict: z.enum(VERDICTS), kind: z.string().max(40).nullable(), headline: z.string().max(300) }).nullable().optional(),
  /** Taken for the original gravity that nobody had told. Set by the program. */
  as_original_gravity: z.boolean().nullable().optional(),
  /** What closed the neck before the first change that the log tells of. Set by the program. */
  neck_before: z.enum(NECKS).nullable().optional(),
  ph: measure(2, 8, ''),
  titratable_acid_g_per_l: measure(0, 30, 'g/L'),
  free_sulphite_mg_l: measure(0, 500, 'mg/L'),
  bubbles_per_minute: measure(0, 1000, ''),
  clarity: z.enum(CLARITIES).nullable().optional(),
  foam: z.enum(FOAMS).nullable().optional(),
  smell: text(300).nullable().optional(),
  taste: text(300).nullable().optional(),
  substance: z.enum(SUBSTANCES).nullable().optional(),
  /** Its name on the packet, or as the catalogue has it. */
  name: line(80).nullable().optional(),
  /** Key of the catalogue: the sugar it brings is then reckoned. */
  ingredient: z.string().regex(/^[a-z0-9-]{1,60}$/).nullable().optional(),
  grams: measure(0, 200_000, 'g'),
  /** Left on the lees and in the hose by a racking. */
  left_l: measure(0, 2000, 'L'),
  /** Of a fermented drink that was added, SG. */
  original_gravity: gravity.nullable().optional(),
  /** Which dose of a fining, and of which. */
  dose: z.enum(['a', 'b', 'only']).nullable().optional(),
  /** The other batch or the lot that this was about. */
  batch_id: id.nullable().optional(),
  lot_id: id.nullable().optional(),
  fining_id: id.nullable().optional(),
});
export type EntryDetail = z.infer<typeof entryDetail>;

const amount = (unit: string, max: number) => z.number(`must be a number of ${unit}`).min(0, 'must not be negative').max(max, `must be at most ${max} ${unit}`);

const entryFields = {
  at: timestamp,
  text: text(2000).nullable(),
  /** Hydrometer reading (`reading`), or gravity of a liquid added (`addition`, `top_up`). */
  gravity: gravity.nullable(),
  /** Of the sample, for a reading. */
  temperature_c: temperatureC.nullable(),
  /** The hydrometer's own calibration temperature, °C. */
  calibrated_at_c: z.number().min(0).max(40).nullable(),
  neck: z.enum(NECKS).nullable(),
  volume_l: amount('L', 2000).nullable(),
  sugar_g: amount('g', 200_000).nullable(),
  fruit_g: amount('g', 200_000).nullable(),
  detail: entryDetail.nullable(),
};

type EntryFacts = { kind: (typeof ENTRY_KINDS)[number]; text: string | null; gravity: number | null; neck: string | null; volume_l: number | null; sugar_g: number | null; fruit_g: number | null; detail: EntryDetail | null };

/** What an entry of each kind has to say; asked when it is written and when it is corrected. */
export function checkEntry(value: EntryFacts, tell: (path: string, message: string) => void): void {
  const detail = Object.values(value.detail ?? {}).some((item) => item !== null && item !== undefined);
  if (value.kind === 'reading' && value.gravity === null && typeof value.detail?.brix !== 'number') tell('gravity', 'is needed for a reading');
  if (value.kind === 'neck' && value.neck === null) tell('neck', 'choose what closes the neck now');
  if ((value.kind === 'note' || value.kind === 'observation') && value.text === null && !detail) tell('text', 'write what you saw');
  if (value.kind === 'overrule' && !value.detail?.call) tell('detail.call', 'say which call');
  if (value.kind === 'overrule' && value.text === null) tell('text', 'say why');
  if (value.kind === 'addition' && value.sugar_g === null && value.fruit_g === null && value.volume_l === null && value.text === null && !detail) tell('sugar_g', 'say what went in');
}

const tellIssue = (context: z.RefinementCtx) => (path: string, message: string) => context.addIssue({ code: 'custom', path: [path], message });

/** `POST /api/v1/batches/{id}/entries`: something that happened to a batch. */
export const createEntry = z
  .object({
    kind: z.enum(LOGGED_KINDS, 'choose what happened'),
    at: entryFields.at,
    text: entryFields.text.default(null),
    gravity: entryFields.gravity.default(null),
    temperature_c: entryFields.temperature_c.default(null),
    calibrated_at_c: entryFields.calibrated_at_c.default(null),
    neck: entryFields.neck.default(null),
    volume_l: entryFields.volume_l.default(null),
    sugar_g: entryFields.sugar_g.default(null),
    fruit_g: entryFields.fruit_g.default(null),
    detail: entryFields.detail.default(null),
    /** Made by the sender, so that sending twice keeps one. */
    client_id: z.uuid().nullable().default(null),
  })
  .superRefine((value, context) => checkEntry(value, tellIssue(context)));
export type CreateEntry = z.infer<typeof createEntry>;

/** `PATCH /api/v1/batches/{id}/entries/{entryId}`: a correction; what it leaves out stays, and what was there before is kept. */
export const updateEntry = z.object(entryFields).partial().refine((value) => Object.keys(value).length > 0, { path: ['body'], message: 'say what to correct' });
export type UpdateEntry = z.infer<typeof updateEntry>;

export const entrySchema = z.object({
  id,
  batch_id: id,
  kind: z.enum(ENTRY_KINDS),
  at: z.string(),
  text: z.string().nullable(),
  /** At 20 °C: corrected for the sample's temperature where that was told. */
  gravity: z.number().nullable(),
  /** As read, before the correction. */
  gravity_read: z.number().nullable(),
  temperature_c: z.number().nullable(),
  calibrated_at_c: z.number().nullable(),
  neck: z.enum(NECKS).nullable(),
  volume_l: z.number().nullable(),
  sugar_g: z.number().nullable(),
  fruit_g: z.number().nullable(),
  detail: entryDetail.nullable(),
  /** Corrected since it was written; what it said before is kept. */
  revised: z.boolean(),
  /** Null: the program wrote it. */
  person: z.object({ id, name: z.string() }).nullable(),
  created_at: z.string(),
  /** The asker may correct or take back this entry. */
  mine: z.boolean(),
});
export type EntryBody = z.infer<typeof entrySchema>;
export const entryList = z.object({ items: z.array(entrySchema), next_cursor: z.string().nullable() });

/** What an entry said before each correction, newest first. */
export const revisionList = z.object({ items: z.array(z.object({ at: z.string(), by: z.object({ id, name: z.string() }).nullable(), before: entrySchema.pick({ at: true, text: true, gravity: true, gravity_read: true, temperature_c: true, neck: true, volume_l: true, sugar_g: true, fruit_g: true, detail: true }) })) });
export type RevisionList = z.infer<typeof revisionList>;

/** `GET /api/v1/batches/{id}/series`. */
export const seriesQuery = z.object({
  from: timestamp.optional(),
  to: timestamp.optional(),
  points: z.coerce.number().int().min(10).max(5000).default(400),
});

/**
 * Columns, ascending in time (seconds since 1970, as charts take them). Each
 * bucket gives its first and its extreme readings, so that a spike stays visible.
 */
export const seriesSchema = z.object({
  from: z.string(),
  to: z.string(),
  /** Readings before thinning. */
  count: z.number().int(),
  at: z.array(z.number()).describe('seconds since 1970-01-01T00:00:00Z'),
  gravity: z.array(z.number().nullable()),
  temperature: z.array(z.number().nullable()),
});
export type SeriesBody = z.infer<typeof seriesSchema>;
/** The same for programs, which are promised RFC 3339; the pages that get many at once take seconds. */
export const seriesAnswer = seriesSchema.extend({ at: z.array(z.string()) });
export type SeriesAnswer = z.infer<typeof seriesAnswer>;

/** `GET /api/v1/shelf`: all lanes in one answer. */
export const laneSchema = batchSchema.extend({
  /** About one point an hour for the shelf's calendar; SG and °C. */
  series: seriesSchema,
  curve: z.array(z.object({ at: z.string(), gravity: z.number(), lo: z.number(), hi: z.number() })),
  expected: z.array(z.object({ at: z.string(), gravity: z.number(), lo: z.number(), hi: z.number() })),
  /** Events that stand on the bed as posts, and hand readings. */
  entries: z.array(entrySchema.pick({ id: true, kind: true, at: true, gravity: true, neck: true, text: true })),
});
export type LaneBody = z.infer<typeof laneSchema>;
export const shelfQuery = z.object({ from: timestamp, to: timestamp, skip: z.coerce.number().int().min(0).max(100_000).default(0) });
/** At most 500 lanes, those with an alert first, then those at work, newest first; `total` says how many there are. */
export const shelfSchema = z.object({ now: z.string(), items: z.array(laneSchema), total: z.number().int() });
export type ShelfBody = z.infer<typeof shelfSchema>;
