import { Cellar } from '@/db/models';
import { findLots, type LotRow } from '@/db/queries/lots';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { LotQuery } from '@/lib/contracts/lots';
import { iso } from '../iso';
import { lotFilter } from './list';
import { presentLot } from './present';

/** More lots than anybody has. */
const MOST = 10_000;

/** A spreadsheet takes a cell that begins with one of these for a formula (OWASP, CSV injection); a quote before it makes it text. */
const FORMULA = /^[=+\-@\t\r]/;

/** One cell, quoted where it has to be (RFC 4180). */
export function cell(value: string | number | null): string {
  if (value === null) return '';
  if (typeof value === 'number') return String(value);
  const text = FORMULA.test(value) ? `'${value}` : value;
  return /[",\r\n]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text;
}

const day = (at: string) => at.slice(0, 10);

const COLUMNS = ['code', 'name', 'batch', 'kind', 'bottled', 'ready_from', 'sparkle', 'litres', 'original_gravity', 'final_gravity', 'abv_percent', 'bottled_count', 'left', 'opened', 'given', 'broken', 'gushed', 'places', 'score', 'tastings', 'cost_per_litre', 'currency', 'cost_known', 'caution', 'override_reason', 'next_time', 'note'] as const;

function line(row: LotRow, currency: string | null, now: number): string {
  const lot = presentLot(row, now);
  const values: Record<(typeof COLUMNS)[number], string | number | null> = {
    code: lot.code,
    name: lot.name,
    batch: lot.batch.name,
    kind: lot.batch.kind,
    bottled: day(iso(row.bottledAt)),
    ready_from: day(iso(row.readyFrom)),
    sparkle: lot.sparkle,
    litres: lot.volume_l,
    original_gravity: lot.original_gravity,
    final_gravity: lot.final_gravity,
    abv_percent: lot.abv_percent && Number(lot.abv_percent.value.toFixed(2)),
    bottled_count: lot.counts.bottled,
    left: lot.counts.left,
    opened: lot.counts.opened,
    given: lot.counts.given,
    broken: lot.counts.broken,
    gushed: lot.counts.gushed,
    places: lot.places.join('; '),
    score: lot.tastings.score?.mean ?? null,
    tastings: lot.tastings.count,
    cost_per_litre: lot.cost_per_litre && Number(lot.cost_per_litre.value.toFixed(2)),
    currency: lot.cost_per_litre && currency,
    cost_known: lot.cost_per_litre && (lot.cost_known ? 'yes' : 'no'),
    caution: lot.caution,
    override_reason: row.overrideReason,
    next_time: row.nextTime,
    note: row.note,
  };
  return COLUMNS.map((column) => cell(values[column])).join(',');
}

/** The cellar book as CSV (RFC 4180), as it is searched and sorted, all pages in one. */
export async function exportLots(actor: Actor, query: LotQuery, clock: Clock = systemClock): Promise<string> {
  authorize(actor, 'lots.read');
  const rows = await findLots({ ...lotFilter(actor, query, new Date(clock.now())), limit: MOST });
  const { currency } = await Cellar.findByPk(actor.cellarId, { rejectOnEmpty: true });
  return [COLUMNS.join(','), ...rows.map((row) => line(row, currency, clock.now()))].join('\r\n') + '\r\n';
}
