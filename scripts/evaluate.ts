/**
 * The calls against simulated batches whose truth is known:
 *   npm run evaluate -- [--seed N] [--equations first|second] [--out DIR] [--misses]
 * The last line is one JSON object.
 */
import { mkdirSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { parseArgs } from 'node:util';
import { catalogue, GROUPS, MISTOLD_GROUPS, PITCHED } from '../tests/evaluation/catalogue';
import { naiveLooks } from '../tests/evaluation/naive';
import { ferment, type Ferment } from '../tests/evaluation/ferment';
import { pictures } from '../tests/evaluation/plots';
import { misses, summarise, tables } from '../tests/evaluation/report';
import { lookAt } from '../tests/evaluation/run';
import { addCase, newScore, type Score } from '../tests/evaluation/score';
import { secondFerment } from '../tests/evaluation/second-ferment';
import { Truths } from '../tests/evaluation/truths';

/** Two makes of ferment. Thresholds and factors were chosen on the tuning seeds; the reporting seeds were looked at only to report. */
const MAKES = {
  first: { ferment, tuning: [1, 2, 11, 12, 13], reporting: [101, 102] },
  second: { ferment: secondFerment, tuning: [401, 402, 403], reporting: [301, 302] },
} as const;
type Make = keyof typeof MAKES;
const isMake = (text: string): text is Make => Object.hasOwn(MAKES, text);

interface Result {
  ours: Score;
  naive: Score;
}

const newResult = (): Result => ({ ours: newScore(), naive: newScore() });

/** Adds the catalogue of a seed to each of the results. */
function evaluate(seed: number, groups: readonly (readonly [string, number])[], simulate: Ferment, results: readonly Result[]): void {
  for (const batch of catalogue(seed, groups, simulate)) {
    const truths = new Truths(batch);
    const looks = lookAt(batch, PITCHED);
    const thumb = naiveLooks(batch, PITCHED);
    for (const result of results) {
      addCase(result.ours, batch, truths, looks);
      addCase(result.naive, batch, truths, thumb);
    }
  }
}

const USE = 'Use: npm run evaluate -- [--seed N] [--equations first|second] [--out DIR] [--misses]';

function wrong(sentence: string): never {
  process.stderr.write(`${sentence}\n`);
  process.exit(2);
}

function options() {
  try {
    return parseArgs({ options: { seed: { type: 'string' }, equations: { type: 'string' }, out: { type: 'string', default: '.data/evaluation' }, misses: { type: 'boolean' } } });
  } catch (error) {
    return wrong(`${(error as Error).message}. ${USE}`);
  }
}

const { values } = options();
const seed = values.seed === undefined ? null : Number(values.seed);
if (seed !== null && (values.seed!.trim() === '' || !Number.isInteger(seed))) wrong(`--seed "${values.seed}": a whole number is wanted.`);
const asked = values.equations;
if (asked !== undefined && !isMake(asked)) wrong(`--equations "${asked}": first or second is wanted. ${USE}`);
// A seed asked for without its make is one of the first.
const makes: readonly Make[] = asked !== undefined ? [asked] : seed !== null ? ['first'] : ['first', 'second'];

const print = (text: string): void => void process.stdout.write(`${text}\n`);
const summaryOf = ({ ours, naive }: Result, mistold: Result) => ({ ours: summarise(ours), naive: summarise(naive), mistold: summarise(mistold.ours) });
const titleOf = (make: Make, what: string, { ours }: Result): string => `${make} equations, ${what}: ${ours.batches} batches, ${ours.months.toFixed(0)} batch-months`;

function show(title: string, all: Result, mistold: Result): ReturnType<typeof summaryOf> {
  const summary = summaryOf(all, mistold);
  print(`\n== ${title}\n${tables(summary.ours, summary.naive)}`);
  if (values.misses) print(misses(all.ours));
  print(`\n-- ${title.split(':')[0]}: batches wrongly told (${MISTOLD_GROUPS.map(([name]) => name).join(', ')})\n${tables(summary.mistold, summarise(mistold.naive))}`);
  return summary;
}

mkdirSync(values.out, { recursive: true });
print('One look every 3 h with what had been received by then; false alarms per batch-month of 30.4 days; "thumb" are rules of thumb on raw readings.');
const report: Partial<Record<Make, { tuningSeeds: readonly number[]; reportingSeeds: readonly number[]; seeds: Record<string, ReturnType<typeof summaryOf>>; pooled: ReturnType<typeof summaryOf> }>> = {};
for (const make of makes) {
  const { ferment: simulate, tuning, reporting } = MAKES[make];
  const seeds = seed === null ? reporting : [seed];
  print(`\nFerments by the ${make} equations. Seeds used for tuning: ${tuning.join(', ')}. Seeds kept for reporting: ${reporting.join(', ')}. This run: ${seeds.join(', ')}.`);
  const pooled = { all: newResult(), mistold: newResult() };
  const summaries: Record<string, ReturnType<typeof summaryOf>> = {};
  for (const one of seeds) {
    const own = { all: newResult(), mistold: newResult() };
    evaluate(one, GROUPS, simulate, [own.all, pooled.all]);
    evaluate(one, MISTOLD_GROUPS, simulate, [own.mistold, pooled.mistold]);
    summaries[one] = show(titleOf(make, `seed ${one}`, own.all), own.all, own.mistold);
    for (const { name, svg } of pictures(own.all.ours)) writeFileSync(join(values.out, `${make}-seed-${one}-${name}`), svg);
  }
  report[make] = { tuningSeeds: tuning, reportingSeeds: reporting, seeds: summaries, pooled: seeds.length > 1 ? show(titleOf(make, `seeds ${seeds.join(' and ')} together`, pooled.all), pooled.all, pooled.mistold) : summaryOf(pooled.all, pooled.mistold) };
}
print(`\nPictures in ${values.out}`);
print(JSON.stringify(report));
