import type { z } from 'zod';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import type { BatchProposal, MustSheetBody, proposalQuery } from '@/lib/contracts/musts';
import { snakeKeys } from '@/lib/contracts/case';
import type { MustOutcome } from '@/lib/core/must/sheet';
import { pointsOf } from '@/lib/core/units/convert';
import { ConflictError } from '@/lib/errors';
import { loadMust, loadVersion } from './load';
import { keptSheet, outcomeOf } from './sheet';

/** What a batch takes as apparent attenuation, %. */
const ATTENUATION = { least: 20, most: 130 };
/** Where no vessel is chosen: the smallest of the usual ones with a fifth of room. */
const USUAL_VESSELS_L = [1, 2, 5, 10, 15, 23, 30, 50, 100, 200, 500, 1000, 2000];
const ROOM = 1.2;

const round = (value: number, digits: number) => Number(value.toFixed(digits));

/** Apparent attenuation to expect, %, from what the sheet promises: it holds for fruit and honey too, whose yeasts have none of their own. */
export function attenuationOf({ originalGravity: og, finalGravity: fg }: Pick<MustOutcome, 'originalGravity' | 'finalGravity'>): { min: number; max: number } | null {
  const drop = pointsOf(og.value.value);
  if (drop < 5) return null;
  const part = (final: number) => Math.min(ATTENUATION.most, Math.max(ATTENUATION.least, (100 * (drop - pointsOf(final))) / drop));
  return { min: round(part(fg.value.hi), 1), max: round(part(fg.value.lo), 1) };
}

/**
 * What a batch from a sheet would be started with: the expected original gravity,
 * the yeast's ranges, and what to close the neck with.
 * @throws ConflictError where the sheet cannot be reckoned.
 */
export async function proposeBatch(actor: Actor, id: string, query: z.infer<typeof proposalQuery>): Promise<BatchProposal> {
  authorize(actor, 'musts.read');
  const version = await loadVersion(await loadMust(actor.cellarId, id), query.version);
  const kept = keptSheet(version.body);
  const plain = outcomeOf(kept);
  if (!plain) throw new ConflictError('This must cannot be reckoned yet. Mend the sheet first.');
  const fill = plain.fillL.value.value;
  const vesselL = query.vessel_l ?? kept.vessel_l ?? USUAL_VESSELS_L.find((litres) => litres >= fill * ROOM) ?? fill * ROOM;
  const sheet: MustSheetBody = { ...kept, vessel_l: vesselL };
  const outcome = outcomeOf(sheet) ?? plain;
  const attenuation = attenuationOf(outcome);
  const neck = outcome.neck;
  return {
    must_version_id: version.id,
    name: sheet.name,
    kind: sheet.kind,
    // Whole tenths, and never more than the vessel holds: what does not fit is said beside it.
    volume_l: Math.min(vesselL, Math.max(0.1, round(fill, 1))),
    vessel_l: vesselL,
    fits: neck?.fits ?? true,
    neck: neck?.startOn ?? 'airlock',
    neck_reason: neck?.sentence ?? '',
    expected_original_gravity: snakeKeys(outcome.originalGravity),
    expected_final_gravity: snakeKeys(outcome.finalGravity),
    yeast: sheet.yeast?.name ?? null,
    attenuation_min_percent: attenuation?.min ?? null,
    attenuation_max_percent: attenuation?.max ?? null,
    alcohol_tolerance_abv: sheet.yeast?.tolerance_abv.value ?? null,
    temperature_min_c: sheet.yeast?.temperature_c.min ?? null,
    temperature_max_c: sheet.yeast?.temperature_c.max ?? null,
  };
}
