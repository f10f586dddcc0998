import { expect, it } from 'vitest';
import { countWords } from '@/components/data/words';

it('what an import brought is told in the order that people ask, with its words in number', () => {
  expect(countWords({ jobs: 1, lots: 2, batches: 1, entries: 71, readings: 26_846 })).toBe('1 batch, 71 entries, 26 846 readings, 2 lots, 1 job');
  expect(countWords({ refused: 1, readings: 1_000_000, doubled: 0 })).toBe('1 000 000 readings, 0 doubled, 1 refused');
  expect(countWords({ batches: 0, entries: 1 })).toBe('0 batches, 1 entry');
});
