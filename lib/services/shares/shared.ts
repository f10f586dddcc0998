import { Op } from 'sequelize';
import { inTransaction } from '@/db/client';
import { Batch, Entry, Lot, Person, Share, Tasting } from '@/db/models';
import { keptCurve } from '@/db/queries/batch-states';
import { countTry } from '@/db/queries/sign-in-tries';
import { hashLinkToken } from '@/lib/auth/link-tokens';
import { systemClock, type Clock } from '@/lib/clock';
import { ENTRY_KINDS } from '@/lib/contracts/batches';
import { snakeKeys } from '@/lib/contracts/case';
import type { SharedBatch } from '@/lib/contracts/shares';
import type { GuestTasting } from '@/lib/contracts/tastings';
import { ForbiddenError, NotFoundError, ThrottledError } from '@/lib/errors';
import { seriesOf } from '../batches/get-series';
import { suggestionOf } from '../drink/name';
import { drinkState } from '../drink/state';
import { namesOf } from '../entries/names';
import { iso, isoOrNull } from '../iso';
import { howOfLot } from '../lots/how';
import { keptBench, keptCost } from '../lots/kept';
import { lotFacts } from '../labels/facts';
import { summaryOf } from '../tastings/summary';
import { writeTasting } from '../tastings/write';

const SERIES_POINTS = 300;
/** Looks are counted once in a while: one that is loaded over and over is one. */
const LOOK_EVERY_MS = 60_000;
/** Notes by one address on one link: a party's worth, then a wait. */
const BY_ADDRESS = { free: 20, firstWaitS: 60, mostWaitS: 3600 };
/** Notes that one link takes in all. */
const MOST_NOTES = 500;

const CAUTIONS = [
  'Alcohol. The age and the law of the place where you are apply; drink made at home is generally not for sale.',
  'A bottle under pressure: chill it, open it away from faces. If one gushes, open the others outdoors, with eye protection.',
] as const;

/** @throws NotFoundError once it has expired or was revoked, as for one that never was. */
async function openShare(token: string, now: number): Promise<Share> {
  const share = await Share.findOne({ where: { tokenHash: hashLinkToken(token), revokedAt: null, expiresAt: { [Op.gt]: new Date(now) } } });
  if (!share) throw new NotFoundError('shared batch');
  return share;
}

interface Look {
  clock?: Clock;
  /** The open page asks by itself: nobody has looked. */
  again?: boolean;
}

/** One batch for whoever has the address: figures and curve, no text of the log, and no names but those that were given. */
export async function getShared(token: string, { clock = systemClock, again = false }: Look = {}): Promise<SharedBatch> {
  const now = clock.now();
  const share = await openShare(token, now);
  if (!again && (!share.lastLookedAt || now - share.lastLookedAt.getTime() > LOOK_EVERY_MS)) await share.update({ lookedAt: share.lookedAt + 1, lastLookedAt: new Date(now) });
  const batch = await Batch.findByPk(share.batchId, { rejectOnEmpty: true });
  const state = await drinkState(batch, new Date(now));
  const abv = state.strength?.balling.value ?? null;
  const entries = await Entry.findAll({ where: { batchId: batch.id, removedAt: { [Op.is]: null } }, order: [['at', 'ASC']], limit: 500 });
  const lots = await Lot.findAll({ where: { batchId: batch.id }, order: [['bottledAt', 'ASC']] });
  return {
    name: batch.name,
    kind: batch.kind,
    called: suggestionOf(state, abv?.value ?? 0).name,
    drink_colour: batch.drinkColour,
    vessel_kind: batch.vesselKind,
    pitched_at: isoOrNull(batch.pitchedAt),
    ended_at: isoOrNull(batch.endedAt),
    original_gravity: batch.originalGravity,
    gravity: state.gravity,
    abv_percent: abv,
    how: state.strength ? snakeKeys(state.strength.balling.how) : null,
    series: await seriesOf(batch.cellarId, batch.id, { points: SERIES_POINTS }),
    curve: await keptCurve(batch.id),
    entries: entries.flatMap((entry) => {
      const kind = ENTRY_KINDS.find((item) => item === entry.kind);
      return kind && kind !== 'note' && kind !== 'observation' ? [{ kind, at: iso(entry.at), gravity: entry.kind === 'reading' || entry.kind === 'pitch' ? entry.gravity : null }] : [];
    }),
    lots: await Promise.all(lots.map((lot) => sharedLot(lot, share, now))),
    by: share.showPeople && share.createdBy ? ((await Person.findByPk(share.createdBy))?.name ?? null) : null,
    cautions: [...CAUTIONS],
    takes_tastings: share.takesTastings && lots.length > 0,
    expires_at: iso(share.expiresAt),
  };
}

async function sharedLot(lot: Lot, share: Share, now: number): Promise<SharedBatch['lots'][number]> {
  const tastings = await Tasting.findAll({ where: { lotId: lot.id, removedAt: null }, order: [['at', 'DESC']], limit: 200 });
  const names = await namesOf(tastings.map((tasting) => (tasting.showName ? tasting.personId : null)));
  const facts = await lotFacts(lot);
  return {
    id: lot.id,
    code: lot.code,
    name: lot.name,
    bottled_at: iso(lot.bottledAt),
    ready_from: iso(lot.readyFrom),
    ready: lot.readyFrom.getTime() <= now,
    sparkle: lot.sparkle,
    abv_percent: lot.abv,
    how: howOfLot(lot, keptBench(lot.bench), keptCost(lot.cost)).strength,
    allergens: facts.allergens.text,
    caution: lot.caution !== null,
    tastings: summaryOf(tastings),
    words: tastings.flatMap((tasting) => {
      if (tasting.words === null) return [];
      // A name stands here only where the link shows people and this person chose it.
      const name = !share.showPeople || !tasting.showName ? null : tasting.personId === null ? tasting.guestName : (names.get(tasting.personId) ?? null);
      return [{ at: iso(tasting.at), by: name, words: tasting.words, score: tasting.score, sparkle: tasting.sparkle }];
    }),
  };
}

/** A guest's note through the link. A name is written only by those who want it to be read. */
export async function tasteShared(token: string, input: GuestTasting, address: string, clock: Clock = systemClock): Promise<{ id: string }> {
  const now = clock.now();
  const share = await openShare(token, now);
  if (!share.takesTastings) throw new ForbiddenError('This link takes no tasting notes.');
  const wait = await countTry(`tasting:${share.id}:${address}`, BY_ADDRESS);
  if (wait > 0) throw new ThrottledError(wait, `That is a lot of notes. The next one counts in ${wait} s.`);
  return inTransaction(async (transaction) => {
    const lot = await Lot.findOne({ where: { id: input.lot_id, batchId: share.batchId }, transaction, lock: transaction.LOCK.UPDATE });
    if (!lot) throw new NotFoundError('lot');
    if ((await Tasting.count({ where: { shareId: share.id }, transaction })) >= MOST_NOTES) throw new ThrottledError(86_400, 'This link has taken all the notes it can.');
    const tasting = await writeTasting(lot, input, { at: new Date(now), personId: null, shareId: share.id, guestName: input.guest_name, showName: input.guest_name !== null }, transaction);
    return { id: tasting.id };
  });
}
