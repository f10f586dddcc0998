/**
 * A second truth, which shares with the first only the gravity of a liquid, what sugar
 * yields and the heat: nearly all thresholds were chosen on the first, so what this one
 * shows is what is left of them on ferments of another make. Its own tuning seeds were
 * looked at for the pace that wanes and for what may come in bottles. The papers are
 * named from memory.
 *
 * Nitrogen goes into the cells first and growth lives on that store (M. R. Droop,
 * J. Mar. Biol. Assoc. UK 48 (1968) 689–733). Sugars are taken up beside each other,
 * each in the others' way. What carries them into the cell wears out once nitrogen is
 * gone, down to a rest that goes on (A. Malherbe et al., Biotechnol. Bioeng. 86 (2004)
 * 261–272). Ethanol hinders along Hill's curve and so never quite stops it. Temperature
 * acts as in P. J. H. Sharpe, D. W. DeMichele (J. Theor. Biol. 64 (1977) 649–670). Cells
 * wake one by one, and settle once sugar is scarce: where they lie, they work slowly.
 * The constants are our own draws, the same as the first truth's where they mean the same.
 */
import { KEEP_EVERY, newTruth, pointsFrom, STEP, type Must, type Truth, type TruthEvent, type Yeast } from './ferment';

const GAS_CONSTANT = 8.314e-3;
/** kJ/mol. */
const ACTIVATION = 62;
/** g of nitrogen that 1 g of cells takes in an hour, at the most. */
const NITROGEN_UPTAKE = 0.012;
/** What is left of the carriers when all that wears out is worn. */
const LASTING = 0.05;
/** Work of a settled cell, of a swimming one's. */
const SETTLED_WORK = 0.3;
/** Share of the swimming cells that settles in an hour without sugar, and g/L of sugar that halve it. */
const SETTLING = 0.015;
const SETTLES_BELOW = 12;
/** g/L of cells among which each works half as much as alone. */
const CROWD = 6.5;

/** Work at a temperature, of that at 20 °C. */
export function sharpe(celsius: number, yeast: Pick<Yeast, 'coldest' | 'hottest'>): number {
  const kelvin = celsius + 273.15;
  const quicker = Math.exp((ACTIVATION / GAS_CONSTANT) * (1 / 293.15 - 1 / kelvin));
  const cold = (t: number): number => 1 + Math.exp((yeast.coldest + 1 - t) / 0.7);
  const hot = (t: number): number => 1 + Math.exp((t - yeast.hottest + 2) / 0.9);
  return (quicker * cold(20) * hot(20)) / (cold(celsius) * hot(celsius));
}

/** The ferment from the pitch for so many hours; one sample every half hour. */
export function secondFerment(
  yeast: Yeast,
  must: Must,
  hours: number,
  ambient: (hour: number) => number,
  heatLossH: number,
  events: readonly TruthEvent[] = [],
  startC = ambient(0),
): Truth {
  const truth = newTruth(hours);
  const sugars = [...must.sugars];
  let { rest, nitrogen } = must;
  const leastStore = 1 / yeast.cellsPerNitrogen;
  // Three sleeps one after another, as long together as the first truth's adaptation.
  const sleeping = [must.cells, 0, 0];
  const wakingH = Math.log(1 + 1 / yeast.readiness) / yeast.growth / 3;
  let swimming = 0;
  let settled = 0;
  let store = 2 * leastStore * must.cells;
  let carriers = 1;
  let ethanol = 0;
  let temperature = startC;
  let slow = 0;
  let release = 24;
  let dead = false;
  const hill = 4 + 6 * yeast.ethanolPower;
  const half = 0.85 * yeast.ethanolStop;
  const queue = [...events].sort((a, b) => a.hour - b.hour);

  for (let i = 0; i <= (truth.gravity.length - 1) * KEEP_EVERY; i += 1) {
    const hour = i * STEP;
    while (queue.length > 0 && queue[0]!.hour <= hour) {
      const event = queue.shift()!;
      sugars[0]! += event.sugar ?? 0;
      if (event.slowSugar) {
        slow += event.slowSugar;
        release = event.release ?? 24;
      }
      nitrogen += event.nitrogen ?? 0;
      const keep = event.keepCells ?? 1;
      // What lies at the bottom stays behind.
      settled *= keep < 1 ? 0.1 : 1;
      swimming *= keep;
      store *= keep;
      if (event.kill) dead = true;
    }
    const warm = sharpe(temperature, yeast);
    const room = 1 / (1 + (ethanol / half) ** hill);
    const cells = swimming + settled;
    const kept = cells > 0 ? Math.max(leastStore, store / (cells + sleeping[0]! + sleeping[1]! + sleeping[2]!)) : leastStore;
    const growth = dead ? 0 : yeast.growth * 1.4 * warm * room * (1 - leastStore / kept);
    const work = dead ? 0 : ((swimming + SETTLED_WORK * settled) * warm * room * carriers) / (1 + (cells / CROWD) ** 2);
    const eaten = sugars.map((sugar, k) => {
      const others = sugars.reduce((sum, other, j) => (j === k ? sum : sum + other / (yeast.repression[Math.min(j, 1) as 0 | 1] * 0.8)), 0);
      return (work * yeast.uptake[k as 0 | 1 | 2] * sugar) / (yeast.half[k as 0 | 1 | 2] * (1 + others) + sugar);
    });
    const all = eaten[0]! + eaten[1]! + eaten[2]!;
    const left = sugars[0]! + sugars[1]! + sugars[2]!;
    const gone = 0.3865 * 0.97 * all + (0.1885 - 5e-4 * ethanol) * yeast.ethanolYield * all;
    if (i % KEEP_EVERY === 0) {
      const k = i / KEEP_EVERY;
      truth.gravity[k] = pointsFrom(left + rest, ethanol);
      truth.temperature[k] = temperature;
      truth.rate[k] = 24 * gone;
      truth.ethanol[k] = ethanol;
    }
    const dissolved = slow / release;
    for (let k = 0; k < 3; k += 1) sugars[k] = Math.max(0, sugars[k]! + STEP * ((k === 0 ? dissolved : 0) - eaten[k]!));
    slow -= STEP * dissolved;
    rest += STEP * 0.03 * all;
    ethanol += STEP * yeast.ethanolYield * all;

    const taken = dead ? 0 : Math.min(nitrogen, (STEP * NITROGEN_UPTAKE * cells * warm * nitrogen) / (yeast.nitrogenHalf + nitrogen));
    nitrogen -= taken;
    store += taken;
    const dying = yeast.death * warm * Math.exp((ethanol - 80) / 22);
    const waking = dead ? 0 : (STEP * warm) / wakingH;
    const woken = sleeping[2]! * waking;
    sleeping[2]! += sleeping[1]! * waking - woken;
    sleeping[1]! += (sleeping[0]! - sleeping[1]!) * waking;
    sleeping[0]! -= sleeping[0]! * waking;
    const sinks = STEP * SETTLING * (yeast.repression[1] / 25) * swimming * (SETTLES_BELOW / (SETTLES_BELOW + left));
    swimming += woken + STEP * cells * growth - STEP * swimming * dying - sinks;
    settled += sinks - STEP * settled * dying;
    store -= STEP * store * dying;
    if (nitrogen < 0.2 * yeast.nitrogenHalf) carriers -= STEP * yeast.starvation * warm * (carriers - LASTING);
    temperature += STEP * ((ambient(hour) - temperature) / heatLossH + 0.31 * gone);
  }
  return truth;
}
