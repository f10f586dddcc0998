import type { JudgementBody } from '@/lib/contracts/assessment';
import type { BatchBody, EntryBody, SeriesBody } from '@/lib/contracts/batches';
import type { Bracket, Picture, Post } from './picture';
import { dayRange, duration } from './zone';

/** What the shelf and the batch page both know of an event. */
type Event = Pick<EntryBody, 'kind' | 'at' | 'gravity' | 'neck' | 'text'> & Partial<Pick<EntryBody, 'sugar_g' | 'fruit_g'>>;
type Batch = Pick<BatchBody, 'original_gravity' | 'pitched_at' | 'drink_colour' | 'assessment' | 'attenuation_min_percent' | 'attenuation_max_percent' | 'temperature_min_c' | 'temperature_max_c'>;

const seconds = (iso: string): number => Date.parse(iso) / 1000;

/** Letters and word of an event's post; null for what is not drawn as one. */
export function postWords(event: Event): { letters: string; word: string } | null {
  switch (event.kind) {
    case 'pitch':
      return { letters: 'P', word: 'pitch' };
    case 'rack':
      return { letters: 'R', word: 'racked' };
    case 'stabilise':
      return { letters: 'St', word: 'stabilised' };
    case 'top_up':
      return { letters: 'U', word: 'topped up' };
    case 'addition':
      if (event.sugar_g) return { letters: 'S', word: 'sugar' };
      if (event.fruit_g) return { letters: 'Fr', word: 'fruit' };
      return { letters: 'N', word: 'addition' };
    case 'neck':
      if (event.neck === 'airlock') return { letters: 'A', word: 'airlock on' };
      if (event.neck === 'blow_off') return { letters: 'B', word: 'tube on' };
      return event.neck === 'bung' ? { letters: 'Bu', word: 'bung in' } : { letters: 'O', word: 'neck open' };
    case 'fining':
      return { letters: 'F', word: 'fined' };
    case 'split':
      return { letters: 'Sp', word: 'split' };
    case 'blend':
      return { letters: 'Bl', word: 'blended' };
    case 'bottling':
      return { letters: 'Bt', word: 'bottled' };
    case 'reading':
    case 'observation':
    case 'note':
    case 'overrule':
      return null;
  }
}

/** Posts in time's order; letters that come more than once are numbered. The pitch is there even where nobody logged it. */
export function postsOf(events: readonly Event[], pitchedAt: string | null): Post[] {
  const withPitch = pitchedAt && !events.some((event) => event.kind === 'pitch') ? [...events, { kind: 'pitch' as const, at: pitchedAt, gravity: null, neck: null, text: null }] : events;
  const posts = withPitch
    .flatMap((event) => {
      const words = postWords(event);
      return words ? [{ at: seconds(event.at), ...words, toCome: false }] : [];
    })
    .sort((a, b) => a.at - b.at);
  const counted = ['N', 'S', 'Fr'].filter((letters) => posts.filter((post) => post.letters === letters).length > 1);
  const seen = new Map<string, number>();
  return posts.map((post) => {
    if (!counted.includes(post.letters)) return post;
    const count = (seen.get(post.letters) ?? 0) + 1;
    seen.set(post.letters, count);
    return { ...post, letters: `${post.letters}${count}` };
  });
}

/** The stall is judged over the two days before it is called. */
const STALL_JUDGED_OVER_S = 48 * 3600;
/** Two hydrometer readings count as equal within this, when they lie this far apart. */
const EQUAL = { gravity: 0.0011, apartS: 36 * 3600 };

const HOURS_IN = { days: 24, day: 24, h: 1, min: 1 / 60 } as const;

/** How long it has been flat by the call's own sentence, h: the bracket beside it says no other span. */
export function flatHours(headline: string): number | null {
  const span = /: flat for (.+)\.$/.exec(headline)?.[1];
  const parts = span ? [...span.matchAll(/(\d+) (days?|h|min)/g)] : [];
  return parts.length > 0 ? parts.reduce((sum, [, count, unit]) => sum + Number(count) * HOURS_IN[unit as keyof typeof HOURS_IN], 0) : null;
}

function bracketOf(batch: Batch, rings: Picture['rings'], now: number): Bracket | null {
  const stalled = batch.assessment?.calls.stalled;
  const gravity = batch.assessment?.gravity?.value;
  if (stalled?.verdict === 'yes' && stalled.kind !== 'sluggish' && stalled.since && gravity !== undefined) {
    const said = flatHours(stalled.headline);
    const from = said === null ? seconds(stalled.since) - STALL_JUDGED_OVER_S : now - said * 3600;
    return { from, to: now, gravity, words: `flat ${duration(now - from)}`, kind: 'flat' };
  }
  const last = rings.at(-1);
  if (!last || batch.assessment?.stage !== 'terminal') return null;
  const before = rings.findLast((ring) => last.at - ring.at >= EQUAL.apartS);
  if (!before || Math.abs(before.gravity - last.gravity) >= EQUAL.gravity) return null;
  return { from: before.at, to: last.at, gravity: last.gravity, words: 'equal', kind: 'equal' };
}

function bedOf(batch: Batch): Picture['bed'] {
  const judged = batch.assessment?.final_gravity;
  if (judged) return { value: judged.value, lo: judged.lo, hi: judged.hi };
  const { original_gravity: og, attenuation_min_percent: least, attenuation_max_percent: most } = batch;
  if (og === null || least === null || most === null) return null;
  // Apparent attenuation is a share of the original gravity's excess over water.
  const after = (percent: number) => og - ((og - 1) * percent) / 100;
  return { value: after((least + most) / 2), lo: after(most), hi: after(least) };
}

/** All that is drawn of a batch, from what the server tells. `now` in seconds since 1970. */
export function pictureOf(
  parts: {
    batch: Batch;
    series: Pick<SeriesBody, 'at' | 'gravity' | 'temperature'> | undefined;
    drawn: (Pick<JudgementBody, 'curve' | 'expected'> & Partial<Pick<JudgementBody, 'gas'>>) | undefined;
    entries: readonly Event[];
  },
  now: number,
  timeZone: string,
): Picture {
  const { batch, series, drawn, entries } = parts;
  const { assessment } = batch;
  const rings = entries
    .flatMap((entry) => ((entry.kind === 'reading' || entry.kind === 'pitch') && entry.gravity !== null ? [{ at: seconds(entry.at), gravity: entry.gravity }] : []))
    .sort((a, b) => a.at - b.at);
  const points = (curve: JudgementBody['curve'] | undefined) => (curve ?? []).map((point) => ({ ...point, at: seconds(point.at) }));
  const sensor = assessment?.calls.sensor;
  const end = assessment?.terminal_at;
  const ends = end ? { lo: seconds(end.lo), hi: seconds(end.hi) } : null;
  return {
    now,
    readings: { at: series?.at ?? [], gravity: series?.gravity ?? [], temperature: series?.temperature ?? [] },
    curve: points(drawn?.curve),
    expected: points(drawn?.expected),
    gas: (drawn?.gas ?? []).map((bin) => ({ at: seconds(bin.at), value: Math.max(0, bin.value) })),
    gasNow: assessment?.gas_l_per_h?.value ?? null,
    originalGravity: batch.original_gravity,
    bed: bedOf(batch),
    // An end that has passed is not likely any more, it is known.
    likelyEnd: ends && ends.hi > now && assessment?.stage !== 'terminal' ? { ...ends, words: dayRange(ends.lo, ends.hi, timeZone) } : null,
    silentAt: sensor?.verdict === 'yes' && sensor.kind === 'silent' && assessment?.last_reading_at ? seconds(assessment.last_reading_at) : null,
    rings,
    posts: postsOf(entries, batch.pitched_at),
    bracket: bracketOf(batch, rings, now),
    range: batch.temperature_min_c !== null && batch.temperature_max_c !== null ? { min: batch.temperature_min_c, max: batch.temperature_max_c } : null,
    airlockHolds: assessment?.calls.neck.evidence.find((item) => item.unit === 'L/h')?.threshold ?? null,
    drink: batch.drink_colour,
  };
}
