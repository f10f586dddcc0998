/**
 * The solver beside SciPy's curve_fit on the same data, starts and bounds:
 *   npm run bench:fit [-- --sets N]
 * 4- and 5-parameter logistic and the kinetic curve, 500 and 3,000 points, whole
 * and half-finished curves; then how long judgements and refusals take. The last line
 * is one JSON object.
 */
import { spawn, spawnSync } from 'node:child_process';
import { createInterface } from 'node:readline';
import { parseArgs } from 'node:util';
import { fitModel, modelGravity, startOf, type ModelName } from '../../lib/core/fit/models';
import { Random } from '../../tests/evaluation/random';
import { assessments, cellarHistory, refusals } from './assessments';

const { values } = parseArgs({ options: { sets: { type: 'string', default: '240' }, python: { type: 'string', default: 'python3' } } });
const SETS = Number(values.sets);

interface Case {
  id: number;
  model: ModelName;
  points: number;
  half: boolean;
  t: number[];
  g: number[];
  start: number[];
  lower: number[];
  upper: number[];
}

const BOUNDS: Record<'logistic' | 'logistic5' | 'kinetic', { lower: number[]; upper: number[] }> = {
  logistic: { lower: [0, -60, 0.01, -20], upper: [200, 150, 30, 120] },
  logistic5: { lower: [0, -60, 0.01, -40, 0.05], upper: [200, 150, 30, 120, 20] },
  kinetic: { lower: [0, -60, -6, -4, -6, -6], upper: [200, 150, 3, 3.5, 3, 6] },
};

function makeCase(id: number): Case {
  const random = new Random(2026, `fit ${id}`);
  const model = (['logistic', 'logistic5', 'kinetic'] as const)[id % 3]!;
  const points = Math.floor(id / 3) % 2 === 0 ? 500 : 3000;
  const half = Math.floor(id / 6) % 2 === 1;
  const og = random.between(40, 110);
  const fg = random.between(-10, 15);
  const truth: Record<string, number[]> = {
    logistic: [og, fg, random.between(0.4, 2), random.between(2, 8)],
    logistic5: [og, fg, random.between(0.4, 2), random.between(1, 6), random.between(0.4, 2)],
    kinetic: [og, fg, random.normal(-1, 0.5), random.normal(0.1, 0.4), random.normal(-1.2, 0.6), random.normal(-0.5, 0.8)],
  };
  const p = truth[model]!;
  // A whole curve runs until 97 % is done, a half-finished one until 60 %.
  let end = 0.5;
  while (end < 90 && (modelGravity(model, p, end) - fg) / (og - fg) > (half ? 0.4 : 0.03)) end += 0.25;
  const t: number[] = [];
  const g: number[] = [];
  for (let i = 0; i < points; i += 1) {
    const day = (end * (i + 0.5)) / points;
    t.push(day);
    g.push(modelGravity(model, p, day) + random.normal(0, 1));
  }
  const { lower, upper } = BOUNDS[model];
  const start = startOf(model, Float64Array.from(t), Float64Array.from(g)).map((value, j) => Math.min(upper[j]! - 1e-6, Math.max(lower[j]! + 1e-6, value)));
  return { id, model, points, half, t, g, start, lower, upper };
}

interface Theirs {
  id: number;
  trf: { ms: number; rss: number | null; p: number[]; se: number[] } | null;
  lm: { ms: number; rss: number | null } | null;
}

const quantile = (list: readonly number[], q: number): number => {
  const sorted = [...list].sort((a, b) => a - b);
  return sorted[Math.min(sorted.length - 1, Math.floor(q * sorted.length))] ?? Number.NaN;
};

async function main(): Promise<void> {
  if (spawnSync(values.python, ['-c', 'import scipy'], { stdio: 'ignore' }).status !== 0) {
    process.stderr.write('bench:fit: python3 with scipy is wanted beside it (Debian: python3-scipy).\n');
    process.exit(2);
  }
  const python = spawn(values.python, ['scripts/bench/fit.py'], {
    stdio: ['pipe', 'pipe', 'inherit'],
    env: { ...process.env, OMP_NUM_THREADS: '1', OPENBLAS_NUM_THREADS: '1' },
  });
  const answers = createInterface({ input: python.stdout })[Symbol.asyncIterator]();
  const rows: { case: Case; ms: number; rss: number; theirs: Theirs; parameters: number; errors: number; posed: boolean }[] = [];
  for (let id = 0; id < SETS; id += 1) {
    const one = makeCase(id);
    python.stdin.write(`${JSON.stringify({ ...one, half: undefined })}\n`);
    const theirs = JSON.parse((await answers.next()).value as string) as Theirs;
    const options = { start: one.start, lower: one.lower, upper: one.upper };
    fitModel(one.model, one.t, one.g, options);
    const begun = performance.now();
    const ours = fitModel(one.model, one.t, one.g, options);
    const ms = performance.now() - begun;
    if (ours.reason === 'no fit') throw new Error(`no fit of set ${id}`);
    const fit = ours;
    // Well posed: SciPy's bounded solver found a place inside the bounds with errors well under the values.
    const inside = theirs.trf?.p.every((value, j) => value > one.lower[j]! + 1e-3 && value < one.upper[j]! - 1e-3) ?? false;
    const posed = inside && !one.half && one.model === 'logistic';
    const apart = (a: readonly number[] | null, b: readonly number[] | undefined): number => (a && b ? Math.max(...a.map((value, j) => Math.abs(value / b[j]! - 1))) : Number.POSITIVE_INFINITY);
    rows.push({
      case: one,
      ms,
      rss: 'sumOfSquares' in fit ? fit.sumOfSquares : Number.POSITIVE_INFINITY,
      theirs,
      parameters: 'parameters' in fit ? apart(fit.parameters, theirs.trf?.p) : Number.POSITIVE_INFINITY,
      errors: 'standardErrors' in fit ? apart(fit.standardErrors, theirs.trf?.se) : Number.POSITIVE_INFINITY,
      posed,
    });
  }
  python.stdin.end();

  const groups: Record<string, unknown>[] = [];
  for (const model of ['logistic', 'logistic5', 'kinetic'] as const) {
    for (const points of [500, 3000]) {
      for (const half of [false, true]) {
        const some = rows.filter((row) => row.case.model === model && row.case.points === points && row.case.half === half);
        const trf = some.flatMap((row) => (row.theirs.trf ? [row.theirs.trf.ms] : []));
        groups.push({
          model,
          points,
          half,
          sets: some.length,
          ours: { median: quantile(some.map((row) => row.ms), 0.5), p95: quantile(some.map((row) => row.ms), 0.95) },
          scipy: { median: quantile(trf, 0.5), p95: quantile(trf, 0.95) },
        });
      }
    }
  }
  for (const group of groups) {
    const { model, points, half, sets, ours, scipy } = group as { model: string; points: number; half: boolean; sets: number; ours: { median: number; p95: number }; scipy: { median: number; p95: number } };
    process.stdout.write(`${model.padEnd(10)} ${String(points).padStart(5)} ${half ? 'half ' : 'whole'} ${String(sets).padStart(3)} sets  ours ${ours.median.toFixed(2)} (p95 ${ours.p95.toFixed(2)}) ms  SciPy trf ${scipy.median.toFixed(2)} (${scipy.p95.toFixed(2)}) ms  ratio ${(ours.median / scipy.median).toFixed(2)}\n`);
  }
  const best = (row: (typeof rows)[number]): number => Math.min(row.rss, row.theirs.trf?.rss ?? Number.POSITIVE_INFINITY, row.theirs.lm?.rss ?? Number.POSITIVE_INFINITY);
  const withinBest = rows.filter((row) => row.rss <= 1.001 * best(row)).length;
  const scipyWithinBest = rows.filter((row) => (row.theirs.trf?.rss ?? Number.POSITIVE_INFINITY) <= 1.001 * best(row)).length;
  const ratio = quantile(rows.map((row) => row.ms), 0.5) / quantile(rows.flatMap((row) => (row.theirs.trf ? [row.theirs.trf.ms] : [])), 0.5);
  const ratio95 = quantile(rows.map((row) => row.ms), 0.95) / quantile(rows.flatMap((row) => (row.theirs.trf ? [row.theirs.trf.ms] : [])), 0.95);
  const posed = rows.filter((row) => row.posed);
  const result = {
    sets: rows.length,
    medianRatio: ratio,
    p95Ratio: ratio95,
    withinBest,
    scipyWithinBest,
    wellPosed: posed.length,
    parametersApart: Math.max(...posed.map((row) => row.parameters)),
    standardErrorsApart: Math.max(...posed.map((row) => row.errors)),
    assess8640: assessments(),
    history100S: cellarHistory(),
    refusal: refusals(),
    groups,
  };
  process.stdout.write(`median ratio ${ratio.toFixed(2)}, p95 ratio ${ratio95.toFixed(2)}; sum of squares within 0.1 % of the best: ours ${withinBest}, SciPy trf ${scipyWithinBest} of ${rows.length}\n`);
  for (const [name, { ms, stage, stalled }] of Object.entries(result.assess8640)) process.stdout.write(`an assessment of 8,640 readings, ${name.padEnd(5)} ${ms.toFixed(1)} ms (median of 31; ${stage}: ${stalled})\n`);
  process.stdout.write(`a history, 100 batches of 30 days judged every 6 h: ${result.history100S.toFixed(1)} s\n`);
  process.stdout.write(`no fit of input that has none: ${result.refusal.ms.toFixed(1)} ms at the longest (${result.refusal.input})\n`);
  process.stdout.write(`${JSON.stringify(result)}\n`);
}

void main();
