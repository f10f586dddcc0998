/**
 * The truth of the evaluation: a mechanistic ferment that shares no equation with
 * the curve the core fits. Sugars are taken up one after another as in J.-M.
 * Engasser et al. (EBC 1981) and D. A. Gee, W. F. Ramirez (J. Inst. Brew. 100 (1994)
 * 321–329): glucose represses the second sugar, both repress the third. Growth is
 * limited by nitrogen (Cramer, Vlassides, Block, Biotechnol. Bioeng. 77 (2002)
 * 49–60), starts after an adaptation (Baranyi, Roberts, Int. J. Food Microbiol. 23
 * (1994) 277–294) and is slowed by ethanol (Levenspiel, Biotechnol. Bioeng. 22
 * (1980) 1671–1687). Cells die by ethanol. Temperature acts through the cardinal
 * model of Rosso et al. (J. Theor. Biol. 162 (1993) 447–463). The constants are our
 * own draws about the magnitudes in those papers.
 */

export interface Yeast {
  growth: number;
  nitrogenHalf: number;
  /** g of cells from 1 g of nitrogen. */
  cellsPerNitrogen: number;
  /** Start of the adaptation; small is a long lag. */
  readiness: number;
  uptake: [number, number, number];
  half: [number, number, number];
  /** g/L of the sugar before that halves the uptake of the next. */
  repression: [number, number];
  ethanolStop: number;
  ethanolPower: number;
  death: number;
  /** Loss of uptake once nitrogen is gone, per h. */
  starvation: number;
  coldest: number;
  best: number;
  hottest: number;
  ethanolYield: number;
}

export interface Must {
  /** g/L of the three sugars, quickest first. */
  sugars: [number, number, number];
  /** g/L of extract that no yeast takes. */
  rest: number;
  /** g/L of nitrogen that yeast can use. */
  nitrogen: number;
  /** g/L of cells pitched. */
  cells: number;
}

export interface TruthEvent {
  hour: number;
  /** g/L of the quickest sugar at once. */
  sugar?: number;
  /** g/L of the quickest sugar that dissolves with a time constant of `release` h. */
  slowSugar?: number;
  release?: number;
  nitrogen?: number;
  /** Share of the cells that stay (racking). */
  keepCells?: number;
  kill?: boolean;
}

export interface Truth {
  /** h between samples. */
  step: number;
  gravity: Float64Array;
  temperature: Float64Array;
  /** Points a day, positive while it falls by fermentation. */
  rate: Float64Array;
  ethanol: Float64Array;
}

/** Rosso's cardinal temperature model, 0 to 1. */
export function cardinal(t: number, coldest: number, best: number, hottest: number): number {
  if (t <= coldest || t >= hottest) return 0;
  const top = (t - hottest) * (t - coldest) ** 2;
  const bottom = (best - coldest) * ((best - coldest) * (t - best) - (best - hottest) * (best + coldest - 2 * t));
  return Math.max(0, top / bottom);
}

/** A make of ferment: the truth from the pitch for so many hours. */
export type Ferment = typeof ferment;

/** h of one step of the integration; every so many of them one is kept. */
export const STEP = 0.1;
export const KEEP_EVERY = 5;

/** Room for the samples of so many hours. */
export function newTruth(hours: number): Truth {
  const step = STEP * KEEP_EVERY;
  const samples = (): Float64Array => new Float64Array(Math.floor(hours / step) + 1);
  return { step, gravity: samples(), temperature: samples(), rate: samples(), ethanol: samples() };
}

/** Gravity points of a liquid with so much extract and ethanol, g/L. */
export function pointsFrom(extract: number, ethanol: number): number {
  return 0.3865 * extract - (0.1885 * ethanol - 2.5e-4 * ethanol * ethanol);
}

/** The ferment from the pitch for so many hours; one sample every half hour. */
export function ferment(
  yeast: Yeast,
  must: Must,
  hours: number,
  ambient: (hour: number) => number,
  heatLossH: number,
  events: readonly TruthEvent[] = [],
  startC = ambient(0),
): Truth {
  const truth = newTruth(hours);
  let [s1, s2, s3] = must.sugars;
  let { cells, nitrogen } = must;
  let rest = must.rest;
  let ethanol = 0;
  let adapted = yeast.readiness;
  let vigour = 1;
  let temperature = startC;
  let slow = 0;
  let release = 24;
  let dead = false;
  const queue = [...events].sort((a, b) => a.hour - b.hour);
  const at20 = cardinal(20, yeast.coldest, yeast.best, yeast.hottest) || 1;

  for (let i = 0; i <= (truth.gravity.length - 1) * KEEP_EVERY; i += 1) {
    const hour = i * STEP;
    while (queue.length > 0 && queue[0]!.hour <= hour) {
      const event = queue.shift()!;
      s1 += event.sugar ?? 0;
      if (event.slowSugar) {
        slow += event.slowSugar;
        release = event.release ?? 24;
      }
      nitrogen += event.nitrogen ?? 0;
      cells *= event.keepCells ?? 1;
      if (event.kill) dead = true;
    }
    const warm = cardinal(temperature, yeast.coldest, yeast.best, yeast.hottest) / at20;
    const room = Math.max(0, 1 - ethanol / yeast.ethanolStop) ** yeast.ethanolPower;
    const ready = adapted / (1 + adapted);
    const growth = dead ? 0 : yeast.growth * warm * ready * (nitrogen / (yeast.nitrogenHalf + nitrogen)) * room;
    const act = dead ? 0 : cells * warm * ready * room * vigour;
    const v1 = (act * yeast.uptake[0] * s1) / (yeast.half[0] + s1);
    const v2 = (((act * yeast.uptake[1] * s2) / (yeast.half[1] + s2)) * yeast.repression[0]) / (yeast.repression[0] + s1);
    const v3 = (((act * yeast.uptake[2] * s3) / (yeast.half[2] + s3)) * yeast.repression[1]) / (yeast.repression[1] + s1 + s2);
    const eaten = v1 + v2 + v3;
    const gone = 0.3865 * 0.97 * eaten + (0.1885 - 5e-4 * ethanol) * yeast.ethanolYield * eaten;
    if (i % KEEP_EVERY === 0) {
      const k = i / KEEP_EVERY;
      truth.gravity[k] = pointsFrom(s1 + s2 + s3 + rest, ethanol);
      truth.temperature[k] = temperature;
      truth.rate[k] = 24 * gone;
      truth.ethanol[k] = ethanol;
    }
    const dissolved = slow / release;
    s1 = Math.max(0, s1 + STEP * (dissolved - v1));
    slow -= STEP * dissolved;
    s2 = Math.max(0, s2 - STEP * v2);
    s3 = Math.max(0, s3 - STEP * v3);
    rest += STEP * 0.03 * eaten;
    ethanol += STEP * yeast.ethanolYield * eaten;
    nitrogen = Math.max(0, nitrogen - (STEP * growth * cells) / yeast.cellsPerNitrogen);
    const dying = yeast.death * warm * (ethanol / 80) ** 2;
    cells += STEP * cells * (growth - dying);
    adapted = Math.min(1e6, adapted * (1 + STEP * yeast.growth * warm));
    if (nitrogen < 0.2 * yeast.nitrogenHalf) vigour *= 1 - STEP * yeast.starvation * warm;
    temperature += STEP * ((ambient(hour) - temperature) / heatLossH + 0.31 * gone);
  }
  return truth;
}
