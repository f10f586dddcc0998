import type { BatchDraft } from './batch-form';
import { typedGravity, typedNumber } from './figures';
import { headspaceNote } from './kinds';

/** What a must sheet says of the vessel that it proposes: its fill counts the pulp too. */
export interface RoomPromise {
  volumeL: number;
  vesselL: number;
  neck: 'blow_off' | 'airlock';
  fits: boolean;
  sentence: string;
}

/** The room over the drink. The sheet's own word holds for as long as its figures stand; then the same rule is asked anew. */
export function roomNote(draft: BatchDraft, promise: RoomPromise | undefined): { text: string; tight: boolean } | null {
  const [volumeL, vesselL] = [typedNumber(draft.volume), typedNumber(draft.vessel)];
  if (promise && promise.sentence !== '' && promise.volumeL === volumeL && promise.vesselL === vesselL) {
    return { text: promise.sentence, tight: !promise.fits || (promise.neck === 'blow_off' && draft.neck !== 'blow_off') };
  }
  return headspaceNote({
    kind: draft.kind,
    volumeL,
    vesselL,
    neck: draft.neck,
    originalGravity: typedGravity(draft.gravity),
    attenuation: { min: typedNumber(draft.attenuationMin), max: typedNumber(draft.attenuationMax) },
  });
}
