import { DECISIONS, type Decision } from './truths';
import { mean, quantile, type Score } from './score';

/** Goals of the analysis specification: least recall, most false alarms a batch-month, most median delay in h. */
const GOALS: Record<Decision, { recall: number; falseAlarms: number; delay: number | null }> = {
  started: { recall: 0.98, falseAlarms: 0.02, delay: 12 },
  'overdue start': { recall: 0.95, falseAlarms: 0.02, delay: null },
  'past peak': { recall: 0.93, falseAlarms: 0.06, delay: 18 },
  'airlock ok': { recall: 0.92, falseAlarms: 0.02, delay: 27 },
  sluggish: { recall: 0.85, falseAlarms: 0.03, delay: null },
  stuck: { recall: 0.88, falseAlarms: 0.08, delay: 54 },
  terminal: { recall: 0.92, falseAlarms: 0.04, delay: 50 },
  'ready to rack': { recall: 0.93, falseAlarms: 0.1, delay: 18 },
  'ready to bottle': { recall: 0.92, falseAlarms: 0.04, delay: 78 },
  'sensor frozen': { recall: 0.95, falseAlarms: 0.03, delay: 12 },
  // Our own goal: the specification has none.
  'sensor drifting': { recall: 0.8, falseAlarms: 0.02, delay: null },
  'working again': { recall: 0.95, falseAlarms: 0.02, delay: null },
  temperature: { recall: 0.98, falseAlarms: 0.1, delay: null },
};
/** Of 224 batches, as many wrong at any look. */
const WRONG_GOALS = { unsafe: 9 / 224, unsafeStuck: 1 / 46, stuck: 9 / 224, airlock: 3 / 224 };
const FORECAST_GOALS = { 25: { fg: 1.8, date: 2.5 }, 50: { fg: 1.9, date: 1.2 }, 75: { fg: 1.65, date: 0.75 } } as const;

const two = (value: number): string => (Number.isFinite(value) ? value.toFixed(2) : '–');
const one = (value: number): string => (Number.isFinite(value) ? value.toFixed(1) : '–');

export interface Summary {
  decisions: Record<Decision, { recall: number; soundRecall: number; falsePerMonth: number; delayMedian: number; delayP90: number; moments: number }>;
  batches: number;
  months: number;
  unsafeBottle: number;
  unsafeBottleStuck: number;
  stuckBatches: number;
  wrongStuck: number;
  wrongAirlock: number;
  forecasts: Record<string, { n: number; fgMae: number; in80: number; in95: number; width80: number; dated: number; dateMedian: number; dateMean: number; dateIn80: number }>;
  rackDateMae: number;
  rateRmse: number;
}

export function summarise(score: Score): Summary {
  const decisions = Object.fromEntries(
    DECISIONS.map((decision) => {
      const tally = score.tallies[decision];
      return [
        decision,
        {
          recall: tally.detected / tally.moments,
          soundRecall: tally.soundDetected / tally.soundMoments,
          falsePerMonth: tally.falseAlarms / score.months,
          delayMedian: quantile(tally.delays, 0.5),
          delayP90: quantile(tally.delays, 0.9),
          moments: tally.moments,
        },
      ];
    }),
  ) as Summary['decisions'];
  const forecasts = Object.fromEntries(
    ([25, 50, 75] as const).map((share) => {
      const f = score.forecasts[share];
      const n = f.finalError.length;
      return [
        share,
        {
          n,
          fgMae: mean(f.finalError),
          in80: f.in80 / n,
          in95: f.in95 / n,
          width80: mean(f.width80),
          dated: f.dates / n,
          dateMedian: quantile(f.dateError, 0.5),
          dateMean: mean(f.dateError),
          dateIn80: f.dateIn80 / f.dates,
        },
      ];
    }),
  );
  return {
    decisions,
    batches: score.batches,
    months: score.months,
    unsafeBottle: score.unsafeBottle.length,
    unsafeBottleStuck: score.unsafeBottleStuck.length,
    stuckBatches: score.stuckBatches,
    wrongStuck: score.wrongStuck.length,
    wrongAirlock: score.wrongAirlock.length,
    forecasts,
    rackDateMae: mean(score.rackError),
    rateRmse: quantile(score.rateErrors, 0.5),
  };
}

/** The tables, rules of thumb beside the calls, each figure with its goal and whether it is met. */
export function tables(ours: Summary, naive: Summary): string {
  const lines: string[] = [];
  const verdict = (met: boolean): string => (met ? 'met' : 'NOT MET');
  lines.push('decision          n    recall thumb | recall (sound float) false/month delay h median/p90 | goal');
  for (const decision of DECISIONS) {
    const a = ours.decisions[decision];
    const b = naive.decisions[decision];
    const goal = GOALS[decision];
    const met = a.recall >= goal.recall - 0.005 && a.falsePerMonth <= goal.falseAlarms + 0.0005 && (goal.delay === null || a.delayMedian <= goal.delay);
    lines.push(
      `${decision.padEnd(17)} ${String(a.moments).padEnd(4)} ${two(b.recall)} ${two(b.falsePerMonth).padStart(5)} | ${two(a.recall)} (${two(a.soundRecall)})  ${a.falsePerMonth.toFixed(3)}  ${one(a.delayMedian)}/${one(a.delayP90)}`.padEnd(76) +
        `| >= ${goal.recall}, <= ${goal.falseAlarms}${goal.delay === null ? '' : `, <= ${goal.delay} h`}: ${a.moments === 0 ? 'no case' : verdict(met)}`,
    );
  }
  lines.push('', 'whole batches with a wrong statement at any look        thumb  ours  goal');
  const whole = (text: string, b: number, a: number, of: number, share: number): void => {
    const most = Math.floor(share * of + 1e-9);
    lines.push(`${text.padEnd(55)} ${String(b).padStart(5)} ${String(a).padStart(5)}  <= ${most} of ${of}: ${verdict(a <= most)}`);
  };
  whole('"ready to bottle" while more than 1 point is to come', naive.unsafeBottle, ours.unsafeBottle, ours.batches, WRONG_GOALS.unsafe);
  whole('... of those stuck with more than 6 points of sugar', naive.unsafeBottleStuck, ours.unsafeBottleStuck, ours.stuckBatches, WRONG_GOALS.unsafeStuck);
  whole('"stuck" while not', naive.wrongStuck, ours.wrongStuck, ours.batches, WRONG_GOALS.stuck);
  whole('"airlock ok" while the gas is too strong', naive.wrongAirlock, ours.wrongAirlock, ours.batches, WRONG_GOALS.airlock);
  lines.push('', 'forecast at a share of the time to the end   25 %        50 %        75 %');
  const row = (text: string, figure: (s: Summary['forecasts'][string]) => string, from: Summary): void => {
    lines.push(`${text.padEnd(44)} ${(['25', '50', '75'] as const).map((share) => figure(from.forecasts[share]!).padEnd(11)).join(' ')}`);
  };
  row('final gravity, mean error, points: thumb', (f) => two(f.fgMae), naive);
  row('final gravity, mean error, points: ours', (f) => two(f.fgMae), ours);
  row('80 % / 95 % interval holds', (f) => `${two(f.in80)}/${two(f.in95)}`, ours);
  row('width of the 80 % interval, points', (f) => one(f.width80), ours);
  row('share of the batches that are told a date', (f) => two(f.dated), ours);
  row('date of the end, median error, d: thumb', (f) => two(f.dateMedian), naive);
  row('date of the end, median error, d: ours', (f) => two(f.dateMedian), ours);
  row('date of the end, mean error, d: ours', (f) => two(f.dateMean), ours);
  row('80 % interval of the date holds', (f) => two(f.dateIn80), ours);
  const met = (['25', '50', '75'] as const).map((share) => {
    const f = ours.forecasts[share]!;
    const goal = FORECAST_GOALS[Number(share) as 25 | 50 | 75];
    return `FG ${verdict(f.fgMae <= goal.fg)}, cover ${verdict(f.in80 >= 0.76 && f.in80 <= 0.9 && f.in95 >= 0.92 && f.in95 <= 0.99)}, date ${verdict(f.dateMedian <= goal.date)}`;
  });
  lines.push(`goals: FG <= 1.8/1.9/1.65, 80 in .76-.90, 95 in .92-.99, date <= 2.5/1.2/.75 d`, ...met.map((text, i) => `  at ${[25, 50, 75][i]} %: ${text}`));
  lines.push(`rack date, mean error ${two(ours.rackDateMae)} d (goal 1.3: ${verdict(ours.rackDateMae <= 1.3)}); rate error ${two(ours.rateRmse)} points/d (goal 1.8: ${verdict(ours.rateRmse <= 1.8)})`);
  return lines.join('\n');
}

/** What went wrong, by group. */
export function misses(score: Score): string {
  const lines: string[] = [];
  for (const decision of DECISIONS) {
    const tally = score.tallies[decision];
    if (tally.missed.length > 0) lines.push(`missed ${decision}: ${tally.missed.join('; ')}`);
    if (tally.wrong.length > 0) lines.push(`wrong ${decision}: ${tally.wrong.join('; ')}`);
  }
  if (score.unsafeBottle.length > 0) lines.push(`unsafe to bottle: ${score.unsafeBottle.join('; ')}`);
  return lines.join('\n');
}
