import { describe, expect, it } from 'vitest';
import { correctionOf, draftOfEntry, emptyDraft, entryOf, fieldsOf, type EntryDraft } from '@/components/batch/entry-form';
import { entryWords } from '@/components/batch/entry-words';
import { refractometerWords } from '@/components/batch/refractometer';
import { correctionsOf } from '@/components/batch/revisions';
import { SUBSTANCES } from '@/lib/contracts/batches';
import { entry, hours, NOW } from './fixtures';

const CLIENT = '7a9c2a52-3f64-4c47-9a3b-1f0c8d5e6b70';
const ZONE = 'UTC';
const send = (over: Partial<EntryDraft>) => entryOf({ ...emptyDraft('reading', NOW, ZONE), ...over }, ZONE, CLIENT);

describe('what is looked at and measured', () => {
  it('goes out as it was tapped and typed, and nothing else', () => {
    const sent = send({ kind: 'observation', foam: 'ring', clarity: 'hazy', bubbles: '12', ph: '3,42', smell: 'bread', gravity: '1.040' }).entry;
    expect(sent).toMatchObject({ kind: 'observation', gravity: null, detail: { foam: 'ring', clarity: 'hazy', bubbles_per_minute: 12, ph: 3.42, smell: 'bread' } });
    expect(Object.keys(sent!.detail!)).toHaveLength(5);
    expect(send({ kind: 'observation' }).errors).toEqual({ text: 'write what you saw' });
    expect(send({ kind: 'observation', ph: '14' }).errors).toEqual({ ph: 'must be between 2 and 8' });
  });

  it('reads with a refractometer where that was chosen', () => {
    expect(send({ instrument: 'refractometer', brix: '8,2', gravity: '1.012' }).entry).toMatchObject({ gravity: null, detail: { instrument: 'refractometer', brix: 8.2 } });
    expect(send({ instrument: 'refractometer' }).errors).toEqual({ brix: 'is needed for a reading' });
  });

  it('says what a refractometer’s figure comes to, with the alcohol reckoned in', () => {
    const must = { pitched: true, originalGravity: 1.05 };
    // A drink fallen from 1.050 to 1.010 shows about 6.3 °Bx; read as a must that would be 1.025.
    expect(refractometerWords({ brix: '6.3', temperature: '' }, must)).toMatch(/^1\.0(09|10|11) ± 0\.004 .* it would be 1\.025\. Not to bottle by: .* recalled, not checked/);
    expect(refractometerWords({ brix: '6.3', temperature: '' }, { pitched: true, originalGravity: null })).toContain('tell the original gravity first');
    expect(refractometerWords({ brix: '12', temperature: '' }, { pitched: false, originalGravity: null })).toBe('1.048: no alcohol in it yet.');
    expect(refractometerWords({ brix: '20', temperature: '' }, must)).toContain('more than the must had');
    expect(refractometerWords({ brix: '6.3', temperature: '28' }, must)).toContain('10 to 20 °C');
    expect(refractometerWords({ brix: '', temperature: '' }, must)).toBeNull();
  });
});

describe('what goes in', () => {
  it('asks for what its kind needs, for every substance there is', () => {
    for (const substance of SUBSTANCES) {
      const draft = { ...emptyDraft('addition', NOW, ZONE), substance, grams: '50', volume: '0.5', gravity: '1.05', name: 'a packet' };
      const { entry: sent, errors } = entryOf(draft, ZONE, CLIENT);
      expect(errors, substance).toBeNull();
      expect(sent!.detail).toMatchObject({ substance });
      expect(fieldsOf(draft)).toContain(substance === 'juice' || substance === 'water' ? 'volume' : 'grams');
    }
  });

  it('tells sugar, fruit and honey to the judgement, and the rest only to the log', () => {
    expect(send({ kind: 'addition', substance: 'sugar', grams: '120' }).entry).toMatchObject({ sugar_g: 120, fruit_g: null });
    expect(send({ kind: 'addition', substance: 'fruit', grams: '500' }).entry).toMatchObject({ sugar_g: null, fruit_g: 500 });
    expect(send({ kind: 'addition', substance: 'honey', grams: '300' }).entry).toMatchObject({ sugar_g: null, detail: { ingredient: 'honey', grams: 300 } });
    expect(send({ kind: 'addition', substance: 'nutrient', grams: '2', name: 'yeast food' }).entry).toMatchObject({ sugar_g: null, detail: { substance: 'nutrient', grams: 2, name: 'yeast food' } });
    expect(send({ kind: 'addition', substance: 'water', volume: '0.5' }).entry).toMatchObject({ volume_l: 0.5, gravity: null });
  });

  it('is not logged without the amount that the judgement reckons with', () => {
    expect(send({ kind: 'addition', substance: 'sugar' }).errors).toEqual({ grams: 'say how much went in' });
    expect(send({ kind: 'addition', substance: 'juice' }).errors).toEqual({ volume: 'say how much went in' });
    expect(send({ kind: 'addition', substance: 'enzyme' }).errors).toBeNull();
  });

  it('is told in the log with its name and its weight', () => {
    // A pinch of sulphite is not nothing.
    expect(entryWords(entry({ kind: 'addition', detail: { substance: 'sulphite', grams: 0.4 } }))).toBe('Added 0.4 g of sulphite.');
    expect(entryWords(entry({ kind: 'addition', detail: { substance: 'nutrient', name: 'yeast food', grams: 2 } }))).toBe('Added 2 g of yeast food.');
    expect(entryWords(entry({ kind: 'addition', sugar_g: 246, detail: { substance: 'honey', ingredient: 'honey', grams: 300 } }))).toBe('Added 300 g of honey (246 g of sugar).');
    expect(entryWords(entry({ kind: 'addition', volume_l: 0.5, detail: { substance: 'water' } }))).toBe('Added 0.5 L of water.');
    expect(entryWords(entry({ kind: 'observation', detail: { foam: 'at_neck', clarity: 'cloudy', bubbles_per_minute: 40, ph: 3.4, taste: 'sharp.' } }))).toBe('Foam at the neck. Cloudy. 40 bubbles a minute. pH 3.40. Taste: sharp.');
    expect(entryWords(entry({ kind: 'reading', gravity: 1.052, gravity_read: 1.052, detail: { as_original_gravity: true } }))).toBe('Hydrometer. Taken for the original gravity.');
  });
});

describe('a correction', () => {
  const line = entry({ kind: 'reading', gravity: 1.0128, gravity_read: 1.012, temperature_c: 24, calibrated_at_c: 15.6, text: 'Hazy.' });

  it('opens with the line as it stands, and sends only what was changed', () => {
    const draft = draftOfEntry(line, 'reading', ZONE);
    expect(draft).toMatchObject({ gravity: '1.012', temperature: '24', calibratedAt: '15.6', text: 'Hazy.' });
    expect(correctionOf(draft, line, ZONE)).toEqual({ change: null, errors: null });
    expect(correctionOf({ ...draft, gravity: '1.021' }, line, ZONE)).toEqual({ change: { gravity: 1.021 }, errors: null });
    expect(correctionOf({ ...draft, text: '' }, line, ZONE).change).toEqual({ text: null });
    expect(correctionOf({ ...draft, gravity: '1.9' }, line, ZONE).errors).toEqual({ gravity: 'must be between 0.970 and 1.200' });
  });

  it('keeps of a detail what the form does not show', () => {
    const dose = entry({ kind: 'addition', detail: { substance: 'nutrient', grams: 2, fining_id: '00000000-0000-4000-8000-0000000000cc' } });
    const { change } = correctionOf({ ...draftOfEntry(dose, 'addition', ZONE), grams: '3' }, dose, ZONE);
    expect(change).toEqual({ detail: { substance: 'nutrient', grams: 3, fining_id: '00000000-0000-4000-8000-0000000000cc' } });
  });

  it('shows each thing as it was and as it became, the newest correction first', () => {
    const now = { ...line, gravity_read: 1.022, gravity: 1.0228, revised: true };
    const before = { at: line.at, text: line.text, temperature_c: 24, neck: null, volume_l: null, sugar_g: null, fruit_g: null, detail: null };
    const revisions = [
      { at: hours(-1), by: null, before: { ...before, gravity_read: 1.021, gravity: 1.0218 } },
      { at: hours(-2), by: { id: CLIENT, name: 'Bram' }, before: { ...before, text: null, gravity_read: 1.012, gravity: 1.0128 } },
    ];
    const [latest, first] = correctionsOf(now, revisions, NOW, ZONE);
    expect(latest).toMatchObject({ by: 'somebody who has left', changes: [{ name: 'gravity as read', before: '1.021', after: '1.022' }, { name: 'gravity', before: '1.022', after: '1.023' }] });
    expect(first!.by).toBe('Bram');
    expect(first!.changes).toContainEqual({ name: 'words', before: '–', after: 'Hazy.' });
  });
});
