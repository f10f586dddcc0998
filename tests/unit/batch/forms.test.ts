import { describe, expect, it } from 'vitest';
import { batchToCreate, batchToUpdate, draftOf, newDraft, withKind } from '@/components/batch/batch-form';
import { emptyDraft, entryOf, fromLocal, toLocal } from '@/components/batch/entry-form';
import { headspaceNote, USUAL } from '@/components/batch/kinds';
import { roomNote } from '@/components/batch/room';
import { neckForecast } from '@/lib/core/must/neck';
import { DRINK_KINDS } from '@/lib/core/types';
import { batch, NOW } from './fixtures';

const CLIENT = '7a9c2a52-3f64-4c47-9a3b-1f0c8d5e6b70';
const ZONE = 'Europe/Prague';

describe('local times in a form', () => {
  it('come back as the instant they stand for', () => {
    expect(toLocal(NOW, ZONE)).toBe('2026-10-15T16:32');
    expect(fromLocal('2026-10-15T16:32', ZONE)).toBe('2026-10-15T14:32:00.000Z');
    expect(fromLocal('tomorrow', ZONE)).toBeNull();
  });
});

describe('logging', () => {
  const send = (over: Partial<ReturnType<typeof emptyDraft>>) => entryOf({ ...emptyDraft('reading', NOW, ZONE), ...over }, ZONE, CLIENT);

  it('sends a hydrometer reading with its sample and the form’s own identifier', () => {
    expect(send({ gravity: '1048', temperature: '24,5' }).entry).toMatchObject({ kind: 'reading', gravity: 1.048, temperature_c: 24.5, calibrated_at_c: 20, client_id: CLIENT, at: '2026-10-15T14:32:00.000Z' });
  });

  it('sends no calibration where there is nothing to correct', () => {
    expect(send({ gravity: '1.048' }).entry).toMatchObject({ temperature_c: null, calibrated_at_c: null });
  });

  it('tells at its field what is wrong, and sends nothing', () => {
    expect(send({ gravity: '1.41' })).toEqual({ entry: null, errors: { gravity: 'must be between 0.970 and 1.200' } });
    expect(send({ gravity: '' }).errors).toEqual({ gravity: 'is needed for a reading' });
    expect(send({ kind: 'neck' }).errors).toEqual({ neck: 'choose what closes the neck now' });
    expect(send({ kind: 'note' }).errors).toEqual({ text: 'write what you saw' });
    expect(send({ gravity: '1.04', at: '' }).errors).toEqual({ at: 'choose a day and a time' });
  });

  it('leaves out what an earlier choice of kind had asked for', () => {
    expect(send({ kind: 'note', text: 'clear', gravity: '1.048', volume: '4', neck: 'bung' }).entry).toMatchObject({ gravity: null, volume_l: null, neck: null });
  });
});

describe('starting a batch', () => {
  const draft = { ...newDraft('cider', NOW, ZONE), name: 'Perry', volume: '4,5', vessel: '5' };

  it('needs a name, a kind and two volumes; the rest may be left empty', () => {
    const bare = { ...draft, pitchedAt: '', gravity: '', attenuationMin: '', attenuationMax: '', tolerance: '', temperatureMin: '', temperatureMax: '' };
    expect(batchToCreate(bare, ZONE)).toMatchObject({ errors: null, batch: { name: 'Perry', volume_l: 4.5, pitched_at: null, original_gravity: null, attenuation_min_percent: null } });
    expect(batchToCreate({ ...bare, name: ' ', volume: '' }, ZONE).errors).toEqual({ name: 'must not be empty', volume: 'must be a number of litres' });
  });

  it('tells spans that do not fit at the field a person would change', () => {
    expect(batchToCreate({ ...draft, volume: '6' }, ZONE).errors).toEqual({ volume: 'is more than the vessel holds' });
    expect(batchToCreate({ ...draft, temperatureMin: '25' }, ZONE).errors).toEqual({ temperatureMax: 'must not be below the lower end' });
    expect(batchToCreate({ ...draft, attenuationMax: '' }, ZONE).errors).toEqual({ attenuationMax: 'give both ends of the range, or neither' });
  });

  it('follows the kind with its usual figures, save those that were changed by hand', () => {
    const changed = withKind({ ...draft, temperatureMin: '9' }, 'mead');
    expect(changed).toMatchObject({ kind: 'mead', temperatureMin: '9', attenuationMin: String(USUAL.mead.attenuation.min), tolerance: String(USUAL.mead.tolerance) });
  });

  it('has usual figures that its own rules accept, for every kind', () => {
    for (const kind of DRINK_KINDS) expect(batchToCreate({ ...draft, ...withKind(draft, kind) }, ZONE).errors, kind).toBeNull();
  });
});

describe('changing the set-up', () => {
  it('sends only what differs, so that two people do not undo each other', () => {
    const before = batch();
    const draft = draftOf(before, ZONE);
    expect(batchToUpdate(draft, before, ZONE)).toEqual({ change: {}, errors: null });
    expect(batchToUpdate({ ...draft, volume: '9', name: 'Stout' }, before, ZONE).change).toEqual({ volume_l: 9, name: 'Stout' });
  });

  it('can take a figure back', () => {
    expect(batchToUpdate({ ...draftOf(batch(), ZONE), gravity: '' }, batch(), ZONE).change).toEqual({ original_gravity: null });
  });
});

describe('room over the drink', () => {
  const room = { kind: 'beer', volumeL: 8, vesselL: 10, neck: 'airlock', originalGravity: 1.05, attenuation: { min: 72, max: 80 } } as const;

  it('says what the must sheet says of the same drink in the same vessel', () => {
    const volume = { lo: 8, value: 8, hi: 8 };
    const { sentence, startOn } = neckForecast('beer', volume, 10, { lo: 36, value: 38, hi: 40 });
    expect(headspaceNote(room)).toEqual({ text: sentence, tight: startOn === 'blow_off' });
    expect(headspaceNote({ ...room, neck: 'blow_off' })).toMatchObject({ tight: false });
  });

  it('is too little where foam may reach the neck, and no room at all where it does not fit', () => {
    expect(headspaceNote({ ...room, volumeL: 9.5 })).toMatchObject({ tight: true });
    expect(headspaceNote({ ...room, volumeL: 11 })).toEqual({ text: 'The vessel does not hold that much.', tight: true });
    expect(headspaceNote({ ...room, kind: 'mead', volumeL: 4.5, vesselL: 20 })).toMatchObject({ tight: false });
  });

  it('goes by what is usual where the gravity is not told, and says nothing without both volumes', () => {
    expect(headspaceNote({ ...room, originalGravity: null })?.text).toMatch(/gas|Full/);
    expect(headspaceNote({ ...room, volumeL: null })).toBeNull();
    expect(headspaceNote({ ...room, volumeL: NaN })).toBeNull();
  });

  it('is the sheet’s own word until a volume is changed', () => {
    const draft = { ...newDraft('beer', NOW, ZONE), volume: '8', vessel: '10', neck: 'airlock' as const };
    const promise = { volumeL: 8, vesselL: 10, neck: 'blow_off' as const, fits: true, sentence: 'Start on a blow-off tube: the pulp stands high.' };
    expect(roomNote(draft, promise)).toEqual({ text: promise.sentence, tight: true });
    expect(roomNote({ ...draft, volume: '7' }, promise)?.text).not.toBe(promise.sentence);
  });
});
