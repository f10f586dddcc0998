import { describe, expect, it } from 'vitest';
import { barWords, unsentRow } from '@/components/offline/words';

const NOW = Date.parse('2026-10-15T14:32:00Z');
const at = (clock: string) => Date.parse(`2026-10-15T${clock}:00Z`);
const facts = { offlineSince: null, keptSince: null, waiting: 0, refused: [], stopped: null, now: NOW, timeZone: 'UTC' };
const said = (given: Partial<Parameters<typeof barWords>[0]>) => {
  const words = barWords({ ...facts, ...given });
  return words && `${words.strong} ${words.rest}`;
};

describe('the bar under the header', () => {
  it('says nothing while all is well', () => {
    expect(barWords(facts)).toBeNull();
  });

  it.each([
    ['since when there is no network, on a page that was open', { offlineSince: at('14:05') }, 'Offline since 14:05. Showing what was known then. It catches up by itself.'],
    ['how old what was kept is, on a page opened without one', { offlineSince: at('14:30'), keptSince: at('13:58') }, 'Offline. Shown as of 13:58. It catches up by itself.'],
    ['the day too, where it was another', { offlineSince: at('14:30'), keptSince: at('13:58') - 2 * 86_400_000 }, 'Offline. Shown as of Tue 13:58. It catches up by itself.'],
    ['how many notes wait', { offlineSince: at('14:05'), waiting: 2 }, 'Offline since 14:05. Showing what was known then. It catches up by itself. 2 notes wait to be sent.'],
    ['that the network is slow where it is up', { keptSince: at('14:20') }, 'Shown as of 14:20. The network is slow; it catches up by itself.'],
    ['that they wait for a signing in', { waiting: 1, stopped: 'signed-out' as const }, '1 note waits on this device. Sign in again and they are sent.'],
    ['that one was not taken', { refused: [{ batchId: 'b1' }] }, '1 note was not taken. It is still on this device, with what was wrong.'],
  ])('says %s', (_name, given, sentence) => {
    expect(said(given)).toBe(sentence);
  });

  it('says nothing of a slow network while what is shown is as good as new', () => {
    expect(barWords({ ...facts, keptSince: NOW - 60_000 })).toBeNull();
  });

  it('leads to the batch whose note was not taken', () => {
    expect(barWords({ ...facts, refused: [{ batchId: 'b1' }] })?.link).toEqual({ href: '/batches/b1', word: 'Look at it' });
  });

  it('leads to the rounds where it was a job', () => {
    expect(barWords({ ...facts, refused: [{ batchId: null }] })?.link).toEqual({ href: '/rounds', word: 'Look at it' });
  });
});

describe('an entry that waits', () => {
  it('reads as it will in the log', () => {
    expect(unsentRow({ input: { kind: 'reading', at: '2026-10-15T14:00:00Z', gravity: 1.0412 } })).toMatchObject({ kind: 'reading', figure: '1.041', own: null });
    expect(unsentRow({ input: { kind: 'note', at: '2026-10-15T14:00:00Z', text: 'Smells of pears.' } })).toMatchObject({ kind: 'note', text: '', own: 'Smells of pears.', figure: null });
    expect(unsentRow({ input: { kind: 'neck', at: '2026-10-15T14:00:00Z', neck: 'airlock' } }).text).toBe('Airlock put on.');
  });
});
