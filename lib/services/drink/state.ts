import type { Transaction } from 'sequelize';
import type { Batch, Entry } from '@/db/models';
import { batchState } from '@/db/queries/batch-states';
import type { AssessmentBody } from '@/lib/contracts/assessment';
import type { EntryDetail } from '@/lib/contracts/batches';
import { strengthByMethods, type StrengthByMethod } from '@/lib/core/strength/methods';
import { sgOf, pointsOf } from '@/lib/core/units/convert';
import { within, type Range } from '@/lib/core/units/range';
import { detailOf, ledgerOf, type Ledger } from './ledger';
import { loadStories, type Stories } from './load';
import { makeupOf, type Makeup } from './makeup';

/** Half a division of a hydrometer. */
const READING_DOUBT = 0.0005;

/** Everything that is known of what stands in a vessel. */
export interface DrinkState {
  batch: Batch;
  at: Date;
  entries: Entry[];
  ledger: Ledger;
  makeup: Makeup;
  gravity: number | null;
  gravityAt: Date | null;
  gravityBy: 'hydrometer' | 'refractometer' | 'float' | null;
  temperatureC: number | null;
  strength: StrengthByMethod | null;
  /** Where the fall should end by yeast and must, without a sweetener that stays, SG. */
  expectedFinal: Range | null;
  assessment: AssessmentBody | null;
  stories: Stories;
}

/** The last time that something of a kind was measured. */
export function lastMeasured(entries: readonly Entry[], key: 'ph' | 'titratable_acid_g_per_l' | 'free_sulphite_mg_l'): { value: number; at: Date } | null {
  const entry = entries.findLast((item) => typeof (detailOf(item) as EntryDetail)[key] === 'number');
  const value = entry && detailOf(entry)[key];
  return entry && typeof value === 'number' ? { value, at: entry.at } : null;
}

/** By the batch's attenuation and all the sugar that can ferment; the lowest and the highest end of it. */
function expectedFinalOf(batch: Batch, effectiveOg: number | null, unfermentable: Makeup['unfermentable']): Range | null {
  const { attenuationMinPercent: min, attenuationMaxPercent: max } = batch;
  if (effectiveOg === null || min === null || max === null) return null;
  const points = pointsOf(effectiveOg) - unfermentable.added;
  // The attenuation of a must with a sweetener counts it as left over: it must not be taken off a second time.
  const end = (percent: number) => sgOf(points * (1 - percent / 100) - unfermentable.must);
  return { lo: end(max), value: end((min + max) / 2), hi: end(min) };
}

/** The last time that nutrient went in. */
export const lastFedAt = (entries: readonly Entry[]): Date | null => entries.findLast((entry) => detailOf(entry).substance === 'nutrient')?.at ?? null;

/** The last time that something fermentable came in: by the log, by a blend, or before it was split off. */
function lastSugarAt(stories: Stories, batch: Batch, own: Date | null, at: Date): Date | null {
  const inflows = stories.links.filter((link) => link.to === batch.id && link.at <= at);
  const times = inflows.flatMap((link) => {
    if (link.kind !== 'split') return [link.at];
    const source = stories.of.get(link.from);
    const before = source && ledgerOf(source.batch, source.entries.filter((entry) => entry.at <= link.at)).lastAdditionAt;
    return before ? [before] : [];
  });
  const all = [...times, ...(own ? [own] : [])];
  return all.length > 0 ? new Date(Math.max(...all.map((time) => time.getTime()))) : null;
}

/** Where the judge last knew it to stand. */
function judgedGravity(assessment: AssessmentBody | null): { value: number; at: Date } | null {
  const known = assessment?.last_gravity;
  if (known) return { value: known.value, at: new Date(known.at) };
  // Kept from before it was told, as of a batch that has ended since.
  return assessment?.gravity && assessment.last_reading_at ? { value: assessment.gravity.value, at: new Date(assessment.last_reading_at) } : null;
}

/** What stands in a batch's vessel at `at`, from its log, its sensor and its sources. */
export async function drinkState(batch: Batch, at: Date, transaction?: Transaction): Promise<DrinkState> {
  const stories = await loadStories(batch, transaction);
  const entries = (stories.of.get(batch.id)?.entries ?? []).filter((entry) => entry.at <= at);
  const told = ledgerOf(batch, entries);
  const ledger = { ...told, lastAdditionAt: lastSugarAt(stories, batch, told.lastAdditionAt, at) };
  const makeup = makeupOf(stories, batch.id, at);
  const assessment = (await batchState<AssessmentBody>(batch.id, transaction))?.assessment ?? null;
  const judged = judgedGravity(assessment);
  // The freshest word counts; nothing that was measured before something went in says where it stands since.
  const judgedCounts = judged !== null && judged.at <= at && (ledger.gravityAt === null || judged.at > ledger.gravityAt) && (ledger.lastAdditionAt === null || judged.at > ledger.lastAdditionAt);
  const gravity = judgedCounts ? judged.value : ledger.gravity;
  const effectiveOg = ledger.effectiveOg;
  return {
    batch,
    at,
    entries,
    ledger,
    makeup,
    gravity,
    gravityAt: judgedCounts ? judged.at : ledger.gravityAt,
    gravityBy: judgedCounts ? 'float' : ledger.gravityBy,
    temperatureC: assessment?.temperature_c ?? null,
    strength: effectiveOg !== null && gravity !== null ? strengthByMethods(within(effectiveOg, READING_DOUBT), within(gravity, READING_DOUBT)) : null,
    expectedFinal: expectedFinalOf(batch, effectiveOg, makeup.unfermentable),
    assessment,
    stories,
  };
}
