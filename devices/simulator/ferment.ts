import { CRAMER_2002, rates, type CramerParameters } from './cramer';
import { gravityOf, sugarOf } from './density';
import { rungeKutta } from './integrate';

/** The yeast as it really is: the published parameters and what home fermentations need beside them. */
export interface YeastTruth extends CramerParameters {
  /** Cells at the pitch, g/L; 0.1 as in the published runs. */
  cells: number;
  /** Hours until the cells are at work; the published model has growth alone. */
  lagH: number;
  /** Ethanol at which uptake and growth end, g/L: (1 - E/limit), O. Levenspiel, Biotechnology and Bioengineering 22 (1980) 1671. */
  ethanolLimit: number;
  /** At and below this temperature it rests, °C. */
  dormantC: number;
}

export const YEAST: YeastTruth = { ...CRAMER_2002, cells: 0.1, lagH: 10, ethanolLimit: Infinity, dormantC: 5 };

/** A change to the liquid. Volumes in L, masses in g. */
export interface Dose {
  atH: number;
  sugarG?: number;
  fruitG?: number;
  sugarShare?: number;
  releaseH?: number;
  volumeL?: number;
  gravity?: number;
  nitrogen?: number;
  cellsKept?: number;
}

/** What is really the case at one time. */
export interface Truth {
  gravity: number;
  temperatureC: number;
  gasLPerH: number;
  /** Fermentable sugar in solution and not yet in solution, g/L. */
  sugarLeft: number;
  ethanol: number;
}

/** Hours between two integration steps. */
const STEP = 0.1;
const COLD_BAND_C = 4;
/** CO2 with the ethanol, g/g, and its volume at 20 °C and 1 bar, L/g (ideal gas). */
const CO2_PER_ETHANOL = 44.0095 / 46.0684;
const LITRES_PER_GRAM = (0.083145 * 293.15) / 44.0095;
/** Warming per g/L of ethanol, K: 100 kJ/mol of hexose (Williams, Am. J. Enol. Vitic. 33 (1982) 149) over two mol of ethanol, in water. */
const KELVIN_PER_ETHANOL = 100 / (2 * 46.0684) / 4.186;
/** Sugar takes this much room in solution, L/g (ICUMSA, 20 °C, dilute). */
const SUGAR_VOLUME = 0.00062;

/** A smooth 0 to 1 between two limits. */
function ramp(value: number, low: number, high: number): number {
  const share = Math.min(1, Math.max(0, (value - low) / (high - low)));
  return share * share * (3 - 2 * share);
}

/** Plain factor of our own, 1 at 20 °C: rates double in 10 K (common practice), and end with the heat above 34 °C. */
export function warmthFactor(temperatureC: number): number {
  return 2 ** ((temperatureC - 20) / 10) * (1 - ramp(temperatureC, 34, 42));
}

/** Extract that this must keep, g/L, when its fermentable part is gone and it stands at `dryGravity`. */
export function unfermentable(gravity: number, dryGravity: number, yieldEthanol: number): number {
  const total = sugarOf(gravity);
  let low = 0;
  let high = total;
  for (let round = 0; round < 50; round += 1) {
    const middle = (low + high) / 2;
    if (gravityOf(middle, yieldEthanol * (total - middle)) < dryGravity) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}

/** Places in the integrated state. */
const CELLS = 0;
const NITROGEN = 1;
const ETHANOL = 2;
const SUGAR = 3;
const PIECES = 4;
const WARMTH = 5;

/**
 * One ferment, stepped forward from the pitch on a grid of its own, so that what
 * it is at a time never depends on how often it was asked.
 */
export class Ferment {
  private step = 0;
  private state: number[];
  private before: Truth;
  private after: Truth;
  private dose = 0;
  private releasePerH = 0;
  private fixed: number;
  private readonly doses: readonly Dose[];

  constructor(
    must: { gravity: number; dryGravity: number; nitrogen: number },
    private readonly yeast: YeastTruth,
    private volumeL: number,
    private readonly room: (hours: number) => number,
    doses: readonly Dose[] = [],
  ) {
    this.doses = [...doses].sort((one, other) => one.atH - other.atH);
    this.fixed = unfermentable(must.gravity, must.dryGravity, yeast.yieldEthanol);
    const sugar = sugarOf(must.gravity) - this.fixed;
    this.state = [yeast.cells, must.nitrogen, 0, sugar, 0, room(0)];
    this.before = this.after = this.truth();
  }

  /** What is the case so many hours after the pitch. Asked in ascending order only. */
  at(hours: number): Truth {
    if (hours < (this.step - 1) * STEP) throw new RangeError('A ferment does not run backwards.');
    while (this.step * STEP < hours) this.advance();
    const share = this.step === 0 ? 0 : 1 - (this.step * STEP - hours) / STEP;
    const mix = (name: keyof Truth) => this.before[name] + share * (this.after[name] - this.before[name]);
    return {
      gravity: mix('gravity'),
      temperatureC: mix('temperatureC'),
      gasLPerH: mix('gasLPerH'),
      sugarLeft: mix('sugarLeft'),
      ethanol: mix('ethanol'),
    };
  }

  private advance(): void {
    const time = this.step * STEP;
    this.before = this.after;
    for (let next = this.doses[this.dose]; next && next.atH <= time; next = this.doses[this.dose]) {
      this.add(next);
      this.dose += 1;
      this.before = this.truth();
    }
    this.state = rungeKutta((at, state) => this.slopes(at, state), time, this.state, STEP);
    this.step += 1;
    this.after = this.truth();
  }

  private slopes(time: number, state: readonly number[]): number[] {
    const { yeast } = this;
    const [cells = 0, nitrogen = 0, ethanol = 0, sugar = 0, pieces = 0, temperatureC = 20] = state;
    const warmth = warmthFactor(temperatureC);
    const awake = yeast.lagH > 0 ? 1 - Math.exp(-((time / yeast.lagH) ** 4)) : 1;
    const able = Math.max(0, 1 - ethanol / yeast.ethanolLimit);
    const active = warmth * awake * able * ramp(temperatureC, yeast.dormantC, yeast.dormantC + COLD_BAND_C);
    const flow = rates(yeast, { cells, nitrogen, ethanol, sugar }, active, active, warmth);
    const released = this.releasePerH * pieces;
    const lossH = 4 + 0.6 * this.volumeL;
    return [
      flow.cells,
      flow.nitrogen,
      flow.ethanol,
      flow.sugar + released,
      -released,
      (this.room(time) - temperatureC) / lossH + KELVIN_PER_ETHANOL * flow.ethanol,
    ];
  }

  private add(dose: Dose): void {
    const sugarG = dose.sugarG ?? 0;
    const addedL = dose.volumeL ?? 0;
    const volumeL = this.volumeL + addedL + SUGAR_VOLUME * sugarG;
    const dilution = this.volumeL / volumeL;
    for (const place of [CELLS, NITROGEN, ETHANOL, SUGAR, PIECES]) this.state[place] = (this.state[place] ?? 0) * dilution;
    this.fixed *= dilution;
    this.volumeL = volumeL;
    this.raise(SUGAR, sugarG / volumeL + (dose.gravity ? (sugarOf(dose.gravity) * addedL) / volumeL : 0));
    this.raise(NITROGEN, dose.nitrogen ?? 0);
    this.raise(PIECES, ((dose.fruitG ?? 0) * (dose.sugarShare ?? 0.1)) / volumeL);
    if (dose.releaseH) this.releasePerH = 1 / dose.releaseH;
    this.state[CELLS] = (this.state[CELLS] ?? 0) * (dose.cellsKept ?? 1);
  }

  private raise(place: number, by: number): void {
    this.state[place] = (this.state[place] ?? 0) + by;
  }

  private truth(): Truth {
    const ethanol = this.state[ETHANOL] ?? 0;
    const sugar = this.state[SUGAR] ?? 0;
    const made = this.slopes(this.step * STEP, this.state)[ETHANOL] ?? 0;
    return {
      gravity: gravityOf(Math.max(0, sugar) + this.fixed, ethanol),
      temperatureC: this.state[WARMTH] ?? 20,
      gasLPerH: made * CO2_PER_ETHANOL * LITRES_PER_GRAM * this.volumeL,
      sugarLeft: Math.max(0, sugar) + (this.state[PIECES] ?? 0),
      ethanol,
    };
  }
}
