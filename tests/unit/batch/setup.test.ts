import { describe, expect, it } from 'vitest';
import { setupOf, type EntryFacts } from '@/lib/services/batches/setup';

const batch = { kind: 'cider', pitchedAt: new Date(0), originalGravity: 1.05, volumeL: 4.5, vesselL: 5, attenuationMinPercent: null, attenuationMaxPercent: null, alcoholToleranceAbv: null, temperatureMinC: null, temperatureMaxC: null, neck: 'airlock' } as const;
const entry = (over: Partial<EntryFacts>): EntryFacts => ({ kind: 'note', at: new Date(1000), gravity: null, volumeL: null, sugarG: null, fruitG: null, neck: null, createdAt: new Date(2000), detail: null, ...over });
const kinds = (...entries: EntryFacts[]) => setupOf(batch, entries, 'UTC').events.map((event) => event.kind);

describe('what the judgement reads of the log', () => {
  it('takes a hydrometer’s reading, and a refractometer’s with more doubt', () => {
    const [byHydrometer, byRefractometer] = [entry({ kind: 'reading', gravity: 1.01 }), entry({ kind: 'reading', gravity: 1.01, detail: { instrument: 'refractometer', brix: 6 } })];
    expect(setupOf(batch, [byHydrometer], 'UTC').events).toMatchObject([{ kind: 'reading', gravity: 1.01 }]);
    expect(setupOf(batch, [byHydrometer], 'UTC').events[0]).not.toHaveProperty('gravitySd');
    expect(setupOf(batch, [byRefractometer], 'UTC').events).toMatchObject([{ kind: 'reading', gravity: 1.01, gravitySd: 3 }]);
  });

  it('counts the sugar that a blended drink has used up', () => {
    const blend = entry({ kind: 'blend', volumeL: 1, gravity: 1.002, detail: { original_gravity: 1.06 } });
    expect(setupOf(batch, [blend], 'UTC').events).toMatchObject([{ kind: 'top_up', volumeL: 1, gravity: 1.002, originalGravity: 1.06 }]);
  });

  it('begins anew after what feeds, and not after a pinch of sulphite or acid', () => {
    expect(kinds(entry({ kind: 'addition', detail: { substance: 'sulphite', grams: 0.3 } }))).toEqual([]);
    expect(kinds(entry({ kind: 'addition', detail: { substance: 'nutrient', grams: 2 }, sugarG: 5 }))).toEqual(['addition']);
    expect(kinds(entry({ kind: 'addition', sugarG: 100 }), entry({ kind: 'addition', detail: { substance: 'enzyme', grams: 1 } }))).toEqual(['addition', 'addition']);
  });

  it('counts what was blended in as topping up, and leaves what went out alone', () => {
    expect(kinds(entry({ kind: 'blend', volumeL: 1, gravity: 1.002 }), entry({ kind: 'split', volumeL: 1 }), entry({ kind: 'fining' }), entry({ kind: 'bottling', volumeL: 4 }))).toEqual(['top_up']);
  });
});
