import type { Batch, Entry } from '@/db/models';
import type { EntryDetail, SUBSTANCES } from '@/lib/contracts/batches';
import type { Surroundings } from './surroundings';
import { EVENT_KINDS, type BatchEvent, type BatchSetup, type EventKind } from '@/lib/core/types';

/** The columns that the judgement reads. */
export type BatchFacts = Pick<
  Batch,
  'kind' | 'pitchedAt' | 'originalGravity' | 'volumeL' | 'vesselL' | 'attenuationMinPercent' | 'attenuationMaxPercent' | 'alcoholToleranceAbv' | 'temperatureMinC' | 'temperatureMaxC' | 'neck'
>;
export type EntryFacts = Pick<Entry, 'kind' | 'at' | 'gravity' | 'volumeL' | 'sugarG' | 'fruitG' | 'neck' | 'createdAt'> & Partial<Pick<Entry, 'detail'>>;

/** What goes in by the gram and feeds nothing. An enzyme may make new sugar, and fresh yeast may go on: they count as additions. */
const INERT: ReadonlySet<string> = new Set<(typeof SUBSTANCES)[number]>(['nutrient', 'acid', 'chalk', 'tannin', 'sulphite', 'sorbate', 'fining', 'spice']);

/** Points that a gravity reckoned from a refractometer may be off by in a drink with alcohol: too much to call it finished by. From memory. */
const REFRACTOMETER_SD = 3;

/** `observation` is a note; `pitch` is in the batch itself; a blend tops up with a drink. */
function kindOf({ kind, sugarG, fruitG, volumeL, detail: kept }: EntryFacts): EventKind | null {
  const detail = (kept ?? {}) as EntryDetail;
  if (kind === 'observation') return 'note';
  if (kind === 'blend') return 'top_up';
  if (kind === 'addition' && !sugarG && !fruitG && !volumeL && INERT.has(detail.substance ?? '')) return null;
  return (EVENT_KINDS as readonly string[]).includes(kind) ? (kind as EventKind) : null;
}

function eventOf(entry: EntryFacts): BatchEvent[] {
  const kind = kindOf(entry);
  if (!kind) return [];
  const { sugarG, fruitG, volumeL, gravity, neck } = entry;
  const detail = (entry.detail ?? {}) as EntryDetail;
  return [
    {
      at: entry.at.getTime(),
      kind,
      sugarG,
      fruitG,
      volumeL,
      gravity,
      neck,
      knownAt: entry.createdAt.getTime(),
      ...(detail.foam && { foam: detail.foam }),
      ...(detail.instrument === 'refractometer' && { gravitySd: REFRACTOMETER_SD }),
      // A drink that is poured in has used up sugar that its gravity no longer shows.
      ...(kind === 'top_up' && typeof detail.original_gravity === 'number' && { originalGravity: detail.original_gravity }),
    },
  ];
}

/**
 * What is known of a batch apart from its sensor, as the core takes it. A hand
 * reading's gravity was corrected to 20 °C when it was logged.
 * @param entries those not taken back, in any order
 * @param around what the probes of the room and the foam say
 */
export function setupOf(batch: BatchFacts, entries: readonly EntryFacts[], timeZone: string, around: Surroundings = { roomC: null, events: [] }): BatchSetup {
  const { attenuationMinPercent: attenuationMin, attenuationMaxPercent: attenuationMax, temperatureMinC: minC, temperatureMaxC: maxC } = batch;
  return {
    kind: batch.kind,
    pitchedAt: batch.pitchedAt?.getTime() ?? null,
    originalGravity: batch.originalGravity,
    volumeL: batch.volumeL,
    vesselL: batch.vesselL,
    attenuation: attenuationMin === null || attenuationMax === null ? null : { min: attenuationMin / 100, max: attenuationMax / 100 },
    alcoholToleranceAbv: batch.alcoholToleranceAbv,
    temperature: minC === null || maxC === null ? null : { minC, maxC },
    neck: batch.neck,
    roomC: around.roomC,
    events: [...entries.flatMap(eventOf), ...around.events].sort((a, b) => a.at - b.at),
    timeZone,
  };
}
