import { describe, expect, it } from 'vitest';
import { airNote } from '@/lib/core/gas/air';

describe('the air of the room', () => {
  it('reaches the limit in the time that its litres take: 150 L make 0.5 % of 30 m³', () => {
    // 30 m³ hold 150 L at 5000 ppm; fresh air has 420 of them already.
    const note = airNote(15, 4, 30);
    expect(note?.rise.value).toBe(500);
    expect(note?.hours).toBe(9);
    expect(note?.sentence).toContain('4 vessels give off 15.0 L');
  });

  it('rises with the gas and falls with the room, and is rounded to the safe side', () => {
    expect(airNote(7, 2)!.hours).toBeLessThan(airNote(6, 2)!.hours);
    expect(airNote(6.01, 2)!.rise.value).toBe(310);
    expect(airNote(8, 2, 40)!.hours).toBeGreaterThan(airNote(8, 2, 20)!.hours);
  });

  it('says nothing where a closed room takes longer than a day', () => {
    expect(airNote(3.6, 3)).toBeNull();
    expect(airNote(4, 3)).not.toBeNull();
    expect(airNote(0, 0)).toBeNull();
    expect(airNote(Number.NaN, 1)).toBeNull();
  });
});
