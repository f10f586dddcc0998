/** Why a drink stays cloudy: the usual causes, the test for each, the usual remedy. */
import type { Source } from '../how/how';
import { practice } from '../how/sources';

export const HAZE_CAUSES = ['pectin', 'protein', 'yeast', 'starch', 'bacteria', 'metal', 'chill'] as const;
export type HazeCause = (typeof HAZE_CAUSES)[number];

export interface Haze extends Source {
  cause: HazeCause;
  where: string;
  test: string;
  shows: string;
  remedy: string;
  caution: string | null;
}

const practiceOf = practice('household tests for haze');

export const HAZES: readonly Haze[] = [
  { cause: 'yeast', where: 'Young, still working, or moved lately.', test: 'Stand a glass in the cold for a week.', shows: 'It clears from the top, with a soft layer below.', remedy: 'Wait, keep it cool, rack. Two-part finings where time is short.', caution: 'A haze of yeast in a drink thought finished: check the gravity.', ...practiceOf },
  { cause: 'pectin', where: 'Fruit that was heated, stone fruit, hard-pressed fruit.', test: '1 part drink into 3 parts methylated or rectified spirit, shake, wait an hour.', shows: 'Threads or jelly.', remedy: 'Pectic enzyme; early is best, in a finished drink twice the dose and three weeks warm.', caution: 'Spirit burns: no flame near. Throw the test away, never drink it.', ...practiceOf },
  { cause: 'protein', where: 'Grain, flowers, some fruit; clouds when warmed.', test: 'Warm a glass to 80 °C in a water bath, let it cool.', shows: 'It turns cloudier or flocks.', remedy: 'Bentonite.', caution: 'Warm the glass slowly: hot liquid and cold glass crack.', ...practiceOf },
  { cause: 'starch', where: 'Grain, unripe apples, bananas, roots.', test: 'A drop of iodine in a spoonful on white china.', shows: 'Blue or black.', remedy: 'Amylase, some days warm.', caution: 'Amylase makes new sugar: it works again. Throw the test away.', ...practiceOf },
  { cause: 'bacteria', where: 'Silky swirls, a new smell or taste, film on top.', test: 'Swirl it against the light; smell it.', shows: 'Silky threads that move with the swirl.', remedy: 'Sulphite and rack if it still tastes good. Else pour it away.', caution: 'Clean everything it touched.', ...practiceOf },
  { cause: 'metal', where: 'Touched iron, copper or brass.', test: 'A pinch of citric acid in a glass.', shows: 'It clears overnight.', remedy: 'Citric acid in small steps.', caution: 'Do not drink from a batch that stood in bare metal that is not made for drinks.', ...practiceOf },
  { cause: 'chill', where: 'Clear warm, cloudy cold.', test: 'Let a cold glass come to room temperature.', shows: 'It clears as it warms.', remedy: 'None needed. Cold for two weeks and rack off, if it matters.', caution: null, ...practiceOf },
];
