import { describe, expect, it } from 'vitest';
import { DEMO_SHEETS } from '@/db/seed/sheets';
import { scenarioNamed } from '@/devices/simulator/scenarios';
import { reckonMust } from '@/lib/core/must/outcome';
import { demoSheet } from '@/scripts/lib/demo-sheets';
import { sheetOf } from '@/lib/services/musts/sheet';

/** How far the middle of a promise may lie from what was read at the pitch, points. */
const OFF_POINTS = 3;

describe('the sheets of the demo', () => {
  it.each(DEMO_SHEETS.map((sheet) => sheet.scenario))('%s: promises the gravity and the volume that its batch was pitched with', (name) => {
    const scenario = scenarioNamed(name);
    const sheet = demoSheet(scenario, 'some yeast');
    const result = reckonMust(sheetOf(sheet!));
    if (!result.ok) throw new Error(result.problems.map((problem) => problem.sentence).join(' '));
    const { originalGravity, volumeL, fillL } = result.outcome;
    expect(Math.abs(1000 * (originalGravity.value.value - scenario.must.gravity))).toBeLessThan(OFF_POINTS);
    expect(volumeL.value.value / scenario.volumeL).toBeGreaterThan(0.95);
    expect(volumeL.value.value / scenario.volumeL).toBeLessThan(1.05);
    expect(fillL.value.value).toBeLessThan(scenario.vessel.litres);
  });

  it('has none for a batch that was made without one', () => {
    expect(demoSheet(scenarioNamed('long-tail'), null)).toBeNull();
  });
});
