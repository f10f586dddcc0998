import type { BatchBody } from '@/lib/contracts/batches';
import { clock, dayName, dayRange, when } from '@/components/charts/zone';
import type { ProbeBody } from '@/lib/contracts/surroundings';
import type { Foam } from '@/lib/core/types';
import { degrees, doubt, gravityText, percent } from './figures';
import { dayOf } from './words';

/** One place of the ruled line under a batch's name. */
export interface Fact {
  name: string;
  figure: string;
  more: string | null;
  /** Shown on a phone too. */
  phone: boolean;
  /** Still on its way: nothing is said of it yet. */
  arriving?: boolean;
}

const share = (part: number, whole: number) => Math.round((part / whole) * 100);

const ARRIVING = { figure: '–', more: null, arriving: true } as const;

/** What is last known of the gravity: the judged one now, else where the judge last knew it to stand or the last reading, with its time. */
function gravityFact(batch: BatchBody, last: LastReading | null | undefined, now: number, timeZone: string): Omit<Fact, 'phone'> {
  const judged = batch.assessment?.gravity;
  if (judged) return { name: batch.state === 'working' ? 'now' : 'last known', figure: gravityText(judged.value), more: doubt(judged) };
  const known = judgedLast(batch) ?? last;
  if (known === undefined) return { name: 'now', ...ARRIVING };
  return known ? { name: 'last known', figure: gravityText(known.gravity), more: `at ${when(known.at, now, timeZone)}` } : { name: 'now', figure: 'not read', more: null };
}

export interface LastReading {
  /** Seconds since 1970. */
  at: number;
  gravity: number;
}

/** Where the judge last knew it to stand, which a reading alone may miss by its float's offset. */
function judgedLast({ assessment }: Pick<BatchBody, 'assessment'>): LastReading | null {
  const known = assessment?.last_gravity;
  return known ? { at: Date.parse(known.at) / 1000, gravity: known.value } : null;
}

const FOAM_WORDS: Record<Foam, string> = { none: 'none', ring: 'a ring', cover: 'covers it', at_neck: 'at the neck' };

/** What room and foam probes say; one that is silent is named with nothing beside it. */
function probeFacts(probes: readonly ProbeBody[]): Fact[] {
  const room = probes.find((probe) => probe.kind === 'room' && probe.temperature_c !== null) ?? probes.find((probe) => probe.kind === 'room');
  const foam = probes.find((probe) => probe.foam !== null) ?? probes.find((probe) => probe.kind === 'foam');
  return [
    ...(room ? [{ name: 'room', figure: room.temperature_c === null ? 'not heard' : degrees(room.temperature_c), more: room.name, phone: true }] : []),
    ...(foam ? [{ name: 'foam', figure: foam.foam_mm === null ? 'not heard' : `${Math.round(foam.foam_mm)} mm`, more: foam.foam === null ? foam.name : FOAM_WORDS[foam.foam], phone: true }] : []),
  ];
}

/**
 * What a reader wants at once, in the order of the fall.
 * @param last undefined while the readings are on their way
 * @param now seconds since 1970
 * @param judging no judgement is here, and one is on its way
 */
export function factsOf(batch: BatchBody, last: LastReading | null | undefined, now: number, timeZone: string, probes: readonly ProbeBody[] = [], judging = false): Fact[] {
  const { assessment: judged, original_gravity: og } = batch;
  const seconds = (iso: string) => Date.parse(iso) / 1000;
  const day = dayOf(batch.pitched_at, now, timeZone);
  const bed = judged?.final_gravity ?? null;
  const fallen = judged?.attenuation_percent ?? null;
  const attenuable = og !== null && og > 1 && bed ? share(og - bed.value, og - 1) : null;
  const end = judged?.terminal_at ?? null;
  const heard = batch.sensor?.last_heard_at ?? null;
  return [
    { name: 'pitched', figure: batch.pitched_at ? dayName(seconds(batch.pitched_at), timeZone) : 'not yet', more: day === null ? null : `day ${day}`, phone: false },
    { name: 'original gravity', figure: og === null ? 'not told' : gravityText(og), more: null, phone: true },
    { ...gravityFact(batch, judging ? undefined : last, now, timeZone), phone: true },
    { name: 'bed', ...(judging ? ARRIVING : { figure: bed ? gravityText(bed.value) : 'not known', more: bed && doubt(bed) }), phone: false },
    { name: 'attenuation', figure: fallen === null ? '–' : `${Math.round(fallen)} %`, more: attenuable === null ? null : `of ${attenuable}`, phone: true },
    { name: 'strength so far', figure: judged?.abv_percent ? percent(judged.abv_percent.value) : '–', more: judged?.expected_abv_percent ? `of ${judged.expected_abv_percent.value.toFixed(1)}` : null, phone: true },
    {
      name: 'likely end',
      figure: judged?.stage === 'terminal' ? 'reached' : end && seconds(end.hi) > now ? dayRange(seconds(end.lo), seconds(end.hi), timeZone) : 'not known',
      // Ended while its float gave nothing: nobody saw it.
      more: judged?.stage === 'terminal' && end === null ? 'by its curve' : null,
      ...(judging && ARRIVING),
      phone: false,
    },
    { name: 'sensor', figure: batch.sensor?.name ?? 'none', more: heard ? `heard ${now - seconds(heard) < 43_200 ? clock(seconds(heard), timeZone) : when(seconds(heard), now, timeZone)}` : batch.sensor ? 'not heard yet' : null, phone: false },
    ...probeFacts(probes),
  ];
}
