import { describe, expect, it } from 'vitest';
import { InvalidError } from '@/lib/errors';
import { notAhead } from '@/lib/services/not-ahead';

const NOW = Date.parse('2026-03-04T12:00:00Z');

describe('a time that is told', () => {
  it('may be a little ahead, as clocks are', () => {
    expect(notAhead('2026-03-04T13:10:00+01:00', NOW).toISOString()).toBe('2026-03-04T12:10:00.000Z');
  });

  it('is refused at its field where it has not come yet', () => {
    expect.assertions(2);
    try {
      notAhead('2026-03-04T12:10:01Z', NOW, 'pitched_at');
    } catch (error) {
      expect(error).toBeInstanceOf(InvalidError);
      expect((error as InvalidError).fields).toEqual({ pitched_at: ['lies ahead'] });
    }
  });
});
