import { senmlRecord } from '@/lib/contracts/telemetry';
import { waterDensity } from '@/lib/core/gravity/density';

/** What a record may measure, its unit, and how it becomes a field of a reading. */
const QUANTITIES = new Map<string, { unit: string; field: string; convert: (value: number) => number }>([
  ['density', { unit: 'kg/m3', field: 'gravity', convert: (value) => value / waterDensity(20) }],
  ['temperature', { unit: 'Cel', field: 'temperature', convert: (value) => value }],
  ['voltage', { unit: 'V', field: 'battery', convert: (value) => value }],
]);

/** Times below 2^28 are seconds from now (section 4.5.3). */
const RELATIVE_BELOW = 2 ** 28;
/** The outermost times that a date can name; beyond them there is no text for it. */
const MAX_DATE_S = 8.64e12;

/** Does this look like a SenML pack? Over MQTT 3.1.1 a body carries no content type. */
export function looksLikeSenml(body: unknown): boolean {
  const first: unknown = Array.isArray(body) ? body[0] : undefined;
  return typeof first === 'object' && first !== null && ('n' in first || 'bn' in first) && !('gravity' in first) && !('temperature' in first);
}

export interface SenmlReading {
  /** The reading in the form that sensors send; still to be checked. */
  reading: Record<string, unknown>;
  /** Its first record in the pack. */
  index: number;
}

/** Records of one time make one reading. What cannot be understood is named with the record's place. */
export function readSenml(pack: readonly unknown[], arrivedAt: number): { readings: SenmlReading[]; problems: { index: number; reason: string }[] } {
  const problems: { index: number; reason: string }[] = [];
  const byTime = new Map<number, SenmlReading>();
  const base = { name: '', time: 0, unit: '', value: 0 };

  pack.forEach((item, index) => {
    const parsed = senmlRecord.safeParse(item);
    if (!parsed.success) {
      const [issue] = parsed.error.issues;
      problems.push({ index, reason: `SenML record: ${issue?.path.join('.') ?? ''} ${issue?.message ?? 'is wrong'}`.trim() });
      return;
    }
    const entry = parsed.data;
    // Section 4.4: a label that ends in an underscore must be understood.
    if (Object.keys(entry).some((key) => key.endsWith('_'))) {
      problems.push({ index, reason: 'the SenML record has a field that must be understood and is not' });
      return;
    }
    base.name = entry.bn ?? base.name;
    base.time = entry.bt ?? base.time;
    base.unit = entry.bu ?? base.unit;
    base.value = entry.bv ?? base.value;

    const quantity = QUANTITIES.get(lastPart(base.name + (entry.n ?? '')));
    if (!quantity || (entry.v === undefined && entry.bv === undefined)) return;
    const unit = entry.u ?? base.unit;
    if (unit !== quantity.unit) {
      problems.push({ index, reason: `${quantity.field} must be in ${quantity.unit}, not in ${/^[\w/%]+$/.test(unit) ? unit : 'another unit'}` });
      return;
    }
    const time = base.time + (entry.t ?? 0);
    const seconds = time < RELATIVE_BELOW ? arrivedAt / 1000 + time : time;
    if (Math.abs(seconds) > MAX_DATE_S) {
      problems.push({ index, reason: 'the time is outside every calendar' });
      return;
    }
    const held = byTime.get(seconds) ?? { reading: { at: new Date(seconds * 1000).toISOString() }, index };
    held.reading[quantity.field] = quantity.convert(base.value + (entry.v ?? 0));
    byTime.set(seconds, held);
  });
  return { readings: [...byTime.values()], problems };
}

/** `urn:dev:mac:0024befffe804ff1:density` names a density: what stands after the last separator. */
function lastPart(name: string): string {
  return name.slice(Math.max(name.lastIndexOf(':'), name.lastIndexOf('/')) + 1);
}
