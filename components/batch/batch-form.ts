import { createBatch, DRINK_COLOURS, updateBatch, type BatchBody, type UpdateBatch } from '@/lib/contracts/batches';
import type { NewBatch } from '@/lib/client/batches';
import type { BatchProposal } from '@/lib/contracts/musts';
import type { DrinkKind, Neck } from '@/lib/core/types';
import { fromLocal, toLocal } from './entry-form';
import { typedGravity, typedNumber } from './figures';
import { USUAL } from './kinds';
import { sentencesOf } from '@/lib/contracts/issues';

type VesselKind = BatchBody['vessel_kind'];

/** A batch as it is typed: every figure text. */
export interface BatchDraft {
  name: string;
  kind: DrinkKind;
  colour: string;
  vesselKind: VesselKind;
  tag: string;
  place: string;
  volume: string;
  vessel: string;
  neck: Neck;
  /** Local time; empty: not pitched yet. */
  pitchedAt: string;
  gravity: string;
  yeast: string;
  attenuationMin: string;
  attenuationMax: string;
  tolerance: string;
  temperatureMin: string;
  temperatureMax: string;
  sensor: string;
}

const WIRE: Record<string, keyof BatchDraft> = {
  name: 'name',
  kind: 'kind',
  drink_colour: 'colour',
  vessel_kind: 'vesselKind',
  tag: 'tag',
  place: 'place',
  volume_l: 'volume',
  vessel_l: 'vessel',
  neck: 'neck',
  pitched_at: 'pitchedAt',
  original_gravity: 'gravity',
  yeast: 'yeast',
  attenuation_min_percent: 'attenuationMin',
  attenuation_max_percent: 'attenuationMax',
  alcohol_tolerance_abv: 'tolerance',
  temperature_min_c: 'temperatureMin',
  temperature_max_c: 'temperatureMax',
  sensor: 'sensor',
};

export type BatchErrors = Partial<Record<keyof BatchDraft, string>>;

export function batchErrors(fields: Record<string, readonly string[]>): BatchErrors {
  return Object.fromEntries(Object.entries(fields).flatMap(([path, said]) => (WIRE[path] && said[0] ? [[WIRE[path], said[0]]] : [])));
}

/** The figures that are usual for a kind, as they stand in the form. */
export function usualDraft(kind: DrinkKind): Pick<BatchDraft, 'colour' | 'neck' | 'attenuationMin' | 'attenuationMax' | 'tolerance' | 'temperatureMin' | 'temperatureMax'> {
  const usual = USUAL[kind];
  return {
    colour: usual.colour,
    neck: usual.neck,
    attenuationMin: String(usual.attenuation.min),
    attenuationMax: String(usual.attenuation.max),
    tolerance: String(usual.tolerance),
    temperatureMin: String(usual.temperature.min),
    temperatureMax: String(usual.temperature.max),
  };
}

export function newDraft(kind: DrinkKind, now: number, timeZone: string): BatchDraft {
  return { name: '', kind, vesselKind: 'demijohn', tag: '', place: '', volume: '', vessel: '', pitchedAt: toLocal(now, timeZone), gravity: '', yeast: '', sensor: '', ...usualDraft(kind) };
}

/** A batch as its must sheet proposes it; the gravity stays empty until it is read. */
export function draftOfProposal(proposal: BatchProposal, now: number, timeZone: string): BatchDraft {
  const usual = newDraft(proposal.kind, now, timeZone);
  const text = (value: number | null, otherwise: string) => (value === null ? otherwise : String(value));
  return {
    ...usual,
    name: proposal.name,
    volume: String(proposal.volume_l),
    vessel: String(proposal.vessel_l),
    vesselKind: proposal.vessel_l > 8 ? 'carboy' : 'demijohn',
    neck: proposal.neck,
    yeast: proposal.yeast ?? '',
    attenuationMin: text(proposal.attenuation_min_percent, usual.attenuationMin),
    attenuationMax: text(proposal.attenuation_max_percent, usual.attenuationMax),
    tolerance: text(proposal.alcohol_tolerance_abv, usual.tolerance),
    temperatureMin: text(proposal.temperature_min_c, usual.temperatureMin),
    temperatureMax: text(proposal.temperature_max_c, usual.temperatureMax),
  };
}

/** Another kind brings its own usual figures, save those that the person has changed from the last kind's. */
export function withKind(draft: BatchDraft, kind: DrinkKind): BatchDraft {
  const before = usualDraft(draft.kind);
  const usual = usualDraft(kind);
  const fields = Object.keys(usual) as (keyof typeof usual)[];
  return { ...draft, kind, ...Object.fromEntries(fields.map((field) => [field, draft[field] === before[field] ? usual[field] : draft[field]])) };
}

export function draftOf(batch: BatchBody, timeZone: string): BatchDraft {
  const text = (value: number | null) => (value === null ? '' : String(value));
  return {
    name: batch.name,
    kind: batch.kind,
    colour: batch.drink_colour,
    vesselKind: batch.vessel_kind,
    tag: text(batch.tag),
    place: batch.place ?? '',
    volume: text(batch.volume_l),
    vessel: text(batch.vessel_l),
    neck: batch.neck,
    pitchedAt: batch.pitched_at === null ? '' : toLocal(Date.parse(batch.pitched_at) / 1000, timeZone),
    gravity: batch.original_gravity === null ? '' : batch.original_gravity.toFixed(3),
    yeast: batch.yeast ?? '',
    attenuationMin: text(batch.attenuation_min_percent),
    attenuationMax: text(batch.attenuation_max_percent),
    tolerance: text(batch.alcohol_tolerance_abv),
    temperatureMin: text(batch.temperature_min_c),
    temperatureMax: text(batch.temperature_max_c),
    sensor: '',
  };
}

function wireOf(draft: BatchDraft, timeZone: string): NewBatch {
  const words = (text: string) => (text.trim() === '' ? null : text);
  // An empty volume is told at its field as no number.
  const needed = (text: string) => typedNumber(text) ?? NaN;
  return {
    name: draft.name,
    kind: draft.kind,
    drink_colour: draft.colour as (typeof DRINK_COLOURS)[number],
    vessel_kind: draft.vesselKind,
    tag: typedNumber(draft.tag),
    place: words(draft.place),
    volume_l: needed(draft.volume),
    vessel_l: needed(draft.vessel),
    neck: draft.neck,
    pitched_at: draft.pitchedAt === '' ? null : fromLocal(draft.pitchedAt, timeZone),
    original_gravity: typedGravity(draft.gravity),
    yeast: words(draft.yeast),
    attenuation_min_percent: typedNumber(draft.attenuationMin),
    attenuation_max_percent: typedNumber(draft.attenuationMax),
    alcohol_tolerance_abv: typedNumber(draft.tolerance),
    temperature_min_c: typedNumber(draft.temperatureMin),
    temperature_max_c: typedNumber(draft.temperatureMax),
    sensor: words(draft.sensor),
  };
}

export function batchToCreate(draft: BatchDraft, timeZone: string): { batch: NewBatch; errors: null } | { batch: null; errors: BatchErrors } {
  const batch = wireOf(draft, timeZone);
  const checked = createBatch.safeParse(batch);
  return checked.success ? { batch, errors: null } : { batch: null, errors: batchErrors(sentencesOf(checked.error.issues)) };
}

/** Only what differs from the batch as it was, so that two people changing different things do not undo each other. */
export function batchToUpdate(draft: BatchDraft, before: BatchBody, timeZone: string): { change: UpdateBatch; errors: null } | { change: null; errors: BatchErrors } {
  const { sensor: _sensor, ...now } = wireOf(draft, timeZone);
  const { sensor: _before, ...was } = wireOf(draftOf(before, timeZone), timeZone);
  const whole = updateBatch.safeParse(now);
  if (!whole.success) return { change: null, errors: batchErrors(sentencesOf(whole.error.issues)) };
  const changed = (Object.keys(now) as (keyof typeof now)[]).filter((field) => now[field] !== was[field]);
  return { change: Object.fromEntries(changed.map((field) => [field, now[field]])), errors: null };
}
