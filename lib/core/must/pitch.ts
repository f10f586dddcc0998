/** Yeast rehydration and pitch: a checklist with temperatures. */
import { how, type How } from '../how/how';
import { practice } from '../how/sources';
import type { Yeast } from './ingredients';

export interface PitchStep {
  key: 'sulphite' | 'cool' | 'sanitise' | 'water' | 'rehydrate' | 'temper' | 'aerate' | 'pitch' | 'neck';
  sentence: string;
  caution: string | null;
}

export interface PitchCheck {
  steps: readonly PitchStep[];
  /** What speaks against pitching now. */
  stops: readonly string[];
  how: How;
}

/** Warmest water for dry yeast, °C, and the largest step into the must: common practice; the packet wins. */
const REHYDRATE_C = { min: 35, max: 40 } as const;
const LARGEST_STEP_C = 10;
/** Sulphite that is not bound by then holds the yeast back: common practice. */
const SULPHITE_WAIT_H = 24;
/** Above this yeast dies; above that glass cracks. */
const YEAST_DIES_C = 43;
const HOT_FOR_GLASS_C = 50;

/** Whether sulphite is among what goes in. */
export const sulphited = (lines: readonly { ingredient: { preservative: string | null } }[]): boolean => lines.some(({ ingredient }) => ingredient.preservative === 'sulphite');

/** The steps from the must to the pitched vessel, and what stands in the way at the must's temperature. */
export function pitchChecklist(input: { yeast: Yeast | null; dryYeastG: number | null; mustC: number | null; glass: boolean; /** Sulphite is among what goes in. */ sulphited: boolean }): PitchCheck {
  const { yeast, dryYeastG, mustC, glass } = input;
  const stops: string[] = [];
  if (mustC !== null && mustC >= HOT_FOR_GLASS_C && glass) stops.push('Too hot for glass: it cracks, and scalds. Cool it in metal first.');
  if (mustC !== null && mustC >= YEAST_DIES_C) stops.push(`At ${mustC} °C the yeast dies. Cool the must.`);
  else if (mustC !== null && yeast && mustC > yeast.temperatureC.max) stops.push(`${mustC} °C is over the yeast’s ${yeast.temperatureC.max} °C. Cool the must.`);
  else if (mustC !== null && yeast && mustC < yeast.temperatureC.min) stops.push(`${mustC} °C is under the yeast’s ${yeast.temperatureC.min} °C. Warm the must slowly.`);
  const waterMl = dryYeastG === null ? null : Math.round(dryYeastG * 10);
  const range = yeast ? `${yeast.temperatureC.min} to ${yeast.temperatureC.max} °C` : 'the yeast’s range';
  const steps: PitchStep[] = [
    ...(input.sulphited ? ([{ key: 'sulphite', sentence: `Wait ${SULPHITE_WAIT_H} h from when the sulphite went in, loosely covered, then stir well.`, caution: 'Sooner, and the yeast may not start. Its powder and gas hurt eyes and lungs, worst with asthma: air the room.' }] as const) : []),
    { key: 'cool', sentence: `Bring the must to ${range}.`, caution: 'Never hot liquid into cold glass. Lift a full vessel with both hands, or not at all.' },
    { key: 'sanitise', sentence: 'Clean and sanitise all that touches the must from here on.', caution: null },
    ...(dryYeastG === null
      ? []
      : ([
          { key: 'water', sentence: `Boil ${waterMl} ml of water and let it cool to ${REHYDRATE_C.min} to ${REHYDRATE_C.max} °C.`, caution: 'Not hotter: above 43 °C the yeast dies. Boiling water scalds.' },
          { key: 'rehydrate', sentence: `Sprinkle ${dryYeastG} g of yeast on it, wait 15 minutes, stir. No DAP in this water.`, caution: null },
          { key: 'temper', sentence: `Add must by spoonfuls until the two are within ${LARGEST_STEP_C} °C.`, caution: null },
        ] as const)),
    { key: 'aerate', sentence: 'Shake or stir air into the must, now and not later.', caution: null },
    { key: 'pitch', sentence: 'Pitch. Write down the time and the gravity.', caution: null },
    { key: 'neck', sentence: 'Close the neck with what the sheet says. Never seal a vessel that works.', caution: 'Carbon dioxide collects low in small rooms. Air the room.' },
  ];
  return {
    steps,
    stops,
    how: how('water ten times the yeast, 35 to 40 °C, 15 minutes, steps of at most 10 °C', practice('rehydration of dry yeast; the packet wins'), [
      ['must', mustC, '°C'],
      ['dry yeast', dryYeastG, 'g'],
    ]),
  };
}
