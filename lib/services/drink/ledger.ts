import type { Batch, Entry } from '@/db/models';
import type { EntryDetail } from '@/lib/contracts/batches';
import { asSugar, effectOf, type Addition, type Vat } from '@/lib/core/additions/effect';
import { catalogued } from '@/lib/core/must/catalogue';

export type LedgerEntry = Pick<Entry, 'kind' | 'at' | 'gravity' | 'volumeL' | 'sugarG' | 'fruitG' | 'detail'>;

export const detailOf = (entry: Pick<Entry, 'detail'>): EntryDetail => (entry.detail ?? {}) as EntryDetail;

/** Where a batch stands by its log alone. */
export interface Ledger {
  /** With all the sugar that ever went in, SG; null without an original gravity. */
  effectiveOg: number | null;
  /** After the last reading and whatever went in since, SG. */
  gravity: number | null;
  gravityAt: Date | null;
  gravityBy: 'hydrometer' | 'refractometer' | null;
  /** The last time sugar, must or another drink went in. */
  lastAdditionAt: Date | null;
}

/** Fruit of which nobody said what it is: as the catalogue has plums, which lie in the middle. */
const SOME_FRUIT = 'plum';

/** What an entry put into the vessel, as the core takes it; none for what moves neither sugar nor volume. */
export function additionsOf(entry: LedgerEntry): Addition[] {
  if (entry.kind !== 'addition' && entry.kind !== 'top_up' && entry.kind !== 'blend') return [];
  const additions: Addition[] = [];
  const detail = detailOf(entry);
  if (entry.sugarG) additions.push({ what: 'sugar', sugarG: entry.sugarG, waterG: 0 });
  const fruit = entry.fruitG ? catalogued(detail.ingredient ?? SOME_FRUIT) ?? catalogued(SOME_FRUIT) : undefined;
  if (entry.fruitG && fruit) additions.push(asSugar(fruit, entry.fruitG));
  if (entry.volumeL) {
    if (typeof detail.original_gravity === 'number' && entry.gravity !== null) additions.push({ what: 'drink', volumeL: entry.volumeL, originalGravity: detail.original_gravity, gravity: entry.gravity });
    else if (entry.gravity !== null) additions.push({ what: 'must', volumeL: entry.volumeL, gravity: entry.gravity });
    else additions.push({ what: 'water', volumeL: entry.volumeL });
  }
  return additions;
}

/** Water alone feeds nothing. */
const feeds = (addition: Addition): boolean => addition.what !== 'water';

/** Volume after an entry: a pitch or a racking says what is there, the others what came or went. */
export function volumeAfter(volumeL: number, entry: LedgerEntry): number {
  if (entry.volumeL === null) return volumeL;
  switch (entry.kind) {
    case 'pitch':
    case 'rack':
      return entry.volumeL;
    case 'addition':
    case 'top_up':
    case 'blend':
      return volumeL + entry.volumeL;
    case 'split':
    case 'bottling':
      return Math.max(0, volumeL - entry.volumeL);
    default:
      return volumeL;
  }
}

/**
 * Goes through the log in order: additions move gravity and effective original
 * gravity by conserved masses, readings say where the gravity stands.
 * @param entries of the batch, not taken back, in any order
 */
export function ledgerOf(batch: Pick<Batch, 'originalGravity' | 'volumeL'>, entries: readonly LedgerEntry[]): Ledger {
  const log = [...entries].sort((a, b) => a.at.getTime() - b.at.getTime());
  let volumeL = log.find((entry) => entry.kind === 'pitch')?.volumeL ?? batch.volumeL;
  let og = batch.originalGravity;
  let gravity = og;
  let read: Pick<Ledger, 'gravityAt' | 'gravityBy'> | null = null;
  let lastAdditionAt: Date | null = null;
  for (const entry of log) {
    if (entry.kind === 'reading' && entry.gravity !== null) {
      gravity = entry.gravity;
      read = { gravityAt: entry.at, gravityBy: detailOf(entry).instrument === 'refractometer' ? 'refractometer' : 'hydrometer' };
    }
    for (const addition of additionsOf(entry)) {
      if (feeds(addition)) lastAdditionAt = entry.at;
      if (og === null || gravity === null) continue;
      const vat: Vat = { volumeL, originalGravity: og, gravity: Math.min(gravity, og) };
      const effect = effectOf(vat, addition);
      if (!effect) continue;
      og = effect.after.effectiveOg;
      gravity = effect.after.gravity;
    }
    volumeL = volumeAfter(volumeL, entry);
  }
  // The original gravity is a start, not where it stands.
  return { effectiveOg: og, gravity: read ? gravity : null, gravityAt: read?.gravityAt ?? null, gravityBy: read?.gravityBy ?? null, lastAdditionAt };
}
