import { Cellar } from '@/db/models';
import { keptCurve } from '@/db/queries/batch-states';
import { standsOfLot } from '@/db/queries/lots';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { STOCKS, type LabelQuery } from '@/lib/contracts/labels';
import { InvalidError } from '@/lib/errors';
import { detailOf } from '../drink/ledger';
import { loadLot } from '../lots/load';
import { openShareOf } from '../shares/open';
import { labelsPdf } from './draw';
import { fallOf, type Fall } from './fall';
import { lotFacts, SPARKLE_WORDS, type LotFacts } from './facts';
import type { LabelText } from './layout';

/** Drink colours by day, as the screens have them. */
const COLOURS: Record<string, string> = { straw: '#D6C36A', gold: '#E6BD4E', amber: '#D99B3C', copper: '#B5652B', damson: '#8C2243', bramble: '#5A173C', stout: '#3B2218', pale: '#E9DFB8' };
const LETTERS: Partial<Record<string, string>> = { pitch: 'P', rack: 'R', fining: 'F', blend: 'B' };

/** `750 ml`, `1.5 L` */
export const volumeText = (ml: number): string => (ml < 1000 ? `${ml} ml` : `${Number((ml / 1000).toFixed(2))} L`);

const gravityText = (gravity: number | null): string | null => (gravity === null ? null : gravity.toFixed(3));

/** Prints labels of a lot: each text fitted, the figures those of the log. */
export async function printLabels(actor: Actor, lotId: string, query: LabelQuery): Promise<{ pdf: Buffer; filename: string }> {
  authorize(actor, 'labels.print');
  const facts = await lotFacts(await loadLot(actor.cellarId, lotId));
  const { lot, batch } = facts;
  const stock = STOCKS[query.stock];
  if (query.start > stock.across * stock.down) throw new InvalidError('The sheet has no such place.', { start: [`must be at most ${stock.across * stock.down}`] });
  const cellar = await Cellar.findByPk(actor.cellarId, { rejectOnEmpty: true });
  const share = query.qr ? await openShareOf(actor, lot.batchId, query.share) : null;
  const sizes = await sizesWanted(facts, query.count);
  const pdf = await labelsPdf({
    title: `Labels: ${query.name ?? lot.name}, lot ${lot.code}`,
    stock: query.stock,
    design: query.design,
    start: query.start,
    colour: query.colour ? (COLOURS[batch.drinkColour] ?? (/^#[0-9a-f]{6}$/i.test(batch.drinkColour) ? batch.drinkColour : null)) : null,
    fall: await fallOfLot(facts),
    labels: sizes.map((sizeMl, index) => labelText(facts, query, { sizeMl, number: query.numbered ? `${index + 1} of ${sizes.length}` : null, cellar, url: share?.url ?? null, neck: stock.neck })),
  });
  return { pdf, filename: `labels-${lot.code.replace(/[^A-Za-z0-9_-]+/g, '-')}.pdf` };
}

/** One label for each bottle left, or as many as were asked for, sizes in the lot's order. */
async function sizesWanted({ lot, bottles }: LotFacts, count: number | undefined): Promise<number[]> {
  const stands = await standsOfLot(lot.id);
  const left = bottles.flatMap((bottle) => Array.from<number>({ length: stands.filter((stand) => stand.lotBottleId === bottle.id).reduce((sum, stand) => sum + stand.count, 0) }).fill(bottle.sizeMl));
  const sizes = left.length > 0 ? left : bottles.flatMap((bottle) => Array.from<number>({ length: bottle.count }).fill(bottle.sizeMl));
  if (count === undefined) return sizes.slice(0, 500);
  return Array.from({ length: count }, (_, index) => sizes[index % sizes.length] ?? 0);
}

interface One {
  sizeMl: number;
  number: string | null;
  cellar: Cellar;
  url: string | null;
  neck: boolean;
}

function labelText({ lot, batch, suggestion, strength, allergens }: LotFacts, query: LabelQuery, { sizeMl, number, cellar, url, neck }: One): LabelText {
  const day = (at: Date) => new Intl.DateTimeFormat('en-GB', { timeZone: cellar.timeZone, day: 'numeric', month: 'short', year: 'numeric' }).format(at);
  const kind = [suggestion.style, suggestion.name].filter(Boolean).join(' ');
  const fact = (label: string, value: string | null) => (value === null ? [] : [{ label, value }]);
  return {
    name: query.name ?? lot.name,
    under: query.under ?? `${kind}, ${SPARKLE_WORDS[lot.sparkle]}`,
    facts: [
      ...fact('strength', strength.text),
      ...fact('volume', volumeText(sizeMl)),
      ...(neck ? [] : fact('pitched', batch.pitchedAt && day(batch.pitchedAt))),
      ...fact('bottled', day(lot.bottledAt)),
      ...fact('ready from', day(lot.readyFrom)),
      ...(neck ? [] : fact('bottle', number)),
      ...fact('lot', lot.code),
    ],
    small: [`${cellar.name}.`, allergens.text, lot.sparkle === 'still' ? null : 'Under pressure: chill, open away from faces.'].filter(Boolean).join(' '),
    ends: { original: gravityText(lot.originalGravity), final: gravityText(lot.finalGravity) },
    qr: url,
  };
}

/** From the float's curve; without one, from the readings by hand. */
async function fallOfLot({ lot, batch, state }: LotFacts): Promise<Fall | null> {
  if (batch.pitchedAt === null || lot.originalGravity === null || lot.finalGravity === null) return null;
  const curve = (await keptCurve(batch.id)).map((point) => ({ at: Date.parse(point.at), gravity: point.gravity }));
  const byHand = state.entries.flatMap((entry) => (entry.kind === 'reading' && entry.gravity !== null ? [{ at: entry.at.getTime(), gravity: entry.gravity }] : []));
  const second = (entry: { detail?: Record<string, unknown> | null }) => detailOf({ detail: entry.detail ?? null }).dose === 'b';
  return fallOf({
    pitchedAt: batch.pitchedAt.getTime(),
    bottledAt: lot.bottledAt.getTime(),
    originalGravity: lot.originalGravity,
    finalGravity: lot.finalGravity,
    curve: curve.length > 2 ? curve : byHand,
    posts: state.entries.flatMap((entry) => {
      const letter = LETTERS[entry.kind];
      return letter && !second(entry) ? [{ at: entry.at.getTime(), letter }] : [];
    }),
  });
}
