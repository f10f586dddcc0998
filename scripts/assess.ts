/**
 * The analysis of a log file, with no server and no database:
 *   npm run assess -- --readings FILE.csv --batch FILE.json [--every 6h] [--at TIME] [--json] [--explain]
 *   npm run assess -- --cases DIR --out DIR [--every 6h]
 */
import { mkdirSync, readdirSync, readFileSync, writeFileSync } from 'node:fs';
import { basename, join } from 'node:path';
import { parseArgs } from 'node:util';
import { parse } from 'csv-parse/sync';
import { presentAssessment } from '../lib/contracts/assessment';
import { checkSpan, instantOf, parseBatchFile, parseReadings, WrongFile, type CsvLine } from '../lib/contracts/logfile';
import { assessEvery } from '../lib/core/assess';
import { explain } from '../lib/core/explain';
import { CALL_NAMES, type BatchSetup, type Instant, type Judgement, type Reading } from '../lib/core/types';

const USAGE = 'Use: npm run assess -- --readings FILE.csv --batch FILE.json [--every 6h] [--at TIME] [--json] [--explain], or --cases DIR --out DIR [--every 6h].';

interface Case {
  setup: BatchSetup;
  readings: Reading[];
}

class Wrong extends Error {}

function read(path: string): string {
  try {
    return readFileSync(path, 'utf8').replace(/^\uFEFF/, '');
  } catch (error) {
    throw new Wrong(`${path}: cannot be read (${(error as NodeJS.ErrnoException).code ?? (error as Error).message}).`);
  }
}

/** Runs a parser; a wrong file is told with its name. */
function inFile<T>(path: string, work: () => T): T {
  try {
    return work();
  } catch (error) {
    if (error instanceof WrongFile) throw new Wrong(`${path}: ${error.message}`);
    const { code, lines } = error as { code?: string; lines?: number };
    if (code?.startsWith('CSV_')) throw new Wrong(`${path}: line ${lines ?? '?'}: ${(error as Error).message}`);
    throw error;
  }
}

function load(readingsPath: string, batchPath: string): Case {
  const left: string[] = [];
  const [lines, readings] = inFile(readingsPath, () => {
    const rows = parse(read(readingsPath), { info: true, skip_empty_lines: true, relax_column_count: true, comment: '#' }) as unknown as {
      info: { lines: number };
      record: string[];
    }[];
    const cells: CsvLine[] = rows.map((row) => ({ line: row.info.lines, cells: row.record }));
    return [cells, parseReadings(cells, left)] as const;
  });
  for (const note of left) process.stderr.write(`${readingsPath}: ${note}\n`);
  let first: Instant | null = null;
  for (const reading of readings) if (first === null || reading.at < first) first = reading.at;
  const { setup, notes } = inFile(batchPath, () => parseBatchFile(read(batchPath), first));
  for (const note of notes) process.stderr.write(`${batchPath}: ${note}\n`);
  const { pitchedAt, events } = setup;
  if (pitchedAt !== null) {
    inFile(readingsPath, () => checkSpan(pitchedAt, lines, readings, []));
    inFile(batchPath, () => checkSpan(pitchedAt, [], [], events));
  }
  return { setup, readings };
}

function hoursOf(text: string): number {
  const match = /^(\d+(?:\.\d+)?)\s*(m|min|h|d)$/.exec(text.trim());
  const value = match ? Number(match[1]) * { m: 1 / 60, min: 1 / 60, h: 1, d: 24 }[match[2] as 'm' | 'min' | 'h' | 'd'] : 0;
  if (!(value >= 0.25)) throw new Wrong(`--every "${text}": give a span of 15 min or more, such as 6h, 30min or 1d.`);
  return value;
}

/** From the pitch on, one time for each step up to the last thing known; with no step, that last time alone. */
function timesOf({ setup, readings }: Case, every: string | undefined, at: string | undefined): Instant[] {
  if (at !== undefined) {
    const instant = instantOf(at);
    if (instant === null) throw new Wrong(`--at "${at}": not a time with its zone, such as 2026-03-04T06:00:00Z.`);
    return [instant];
  }
  let last = setup.pitchedAt ?? 0;
  for (const reading of readings) last = Math.max(last, reading.at, reading.receivedAt ?? reading.at);
  for (const event of setup.events) last = Math.max(last, event.at, event.knownAt ?? event.at);
  if (every === undefined || setup.pitchedAt === null) return [last];
  const step = hoursOf(every) * 3_600_000;
  const times: Instant[] = [];
  for (let k = 0; setup.pitchedAt + k * step <= last && k < 200_000; k += 1) times.push(setup.pitchedAt + Math.round(k * step));
  return times;
}

function inWords({ assessment }: Judgement): string {
  const lines = [`${new Date(assessment.at).toISOString()}  ${assessment.stage}`];
  if (assessment.gravity) lines[0] += `  ${assessment.gravity.value.toFixed(3)}`;
  for (const name of CALL_NAMES) {
    const call = assessment.calls[name];
    const verdict = call.kind ? `${call.verdict}, ${call.kind}` : call.verdict;
    lines.push(`  ${name.padEnd(12)}${verdict.padEnd(18)}${call.headline} ${call.reason}`);
  }
  return lines.join('\n');
}

function runOne(readingsPath: string, batchPath: string, values: { every?: string; at?: string; json?: boolean; explain?: boolean }): void {
  const one = load(readingsPath, batchPath);
  const times = timesOf(one, values.every, values.at);
  if (values.explain) {
    for (const at of times) process.stdout.write(`${explain(one.setup, one.readings, at)}\n`);
    return;
  }
  for (const judgement of assessEvery(one.setup, one.readings, times, { picture: false })) {
    process.stdout.write(`${values.json ? JSON.stringify(presentAssessment(judgement.assessment)) : inWords(judgement)}\n`);
  }
}

function runCases(folder: string, out: string, every: string): number {
  mkdirSync(out, { recursive: true });
  let names: string[];
  try {
    names = readdirSync(folder).filter((name) => name.endsWith('.readings.csv')).sort();
  } catch {
    throw new Wrong(`${folder}: no such folder.`);
  }
  if (names.length === 0) throw new Wrong(`${folder}: no file there ends in .readings.csv.`);
  let wrong = 0;
  for (const name of names) {
    const id = basename(name, '.readings.csv');
    try {
      const one = load(join(folder, name), join(folder, `${id}.batch.json`));
      const lines: string[] = [];
      for (const judgement of assessEvery(one.setup, one.readings, timesOf(one, every, undefined), { picture: false })) {
        lines.push(JSON.stringify(presentAssessment(judgement.assessment)));
      }
      writeFileSync(join(out, `${id}.assess.jsonl`), lines.length > 0 ? `${lines.join('\n')}\n` : '');
    } catch (error) {
      if (!(error instanceof Wrong)) throw error;
      process.stderr.write(`${error.message}\n`);
      wrong += 1;
    }
  }
  process.stdout.write(`${names.length - wrong} of ${names.length} batches assessed into ${out}\n`);
  return wrong === 0 ? 0 : 2;
}

function main(): number {
  let values;
  try {
    ({ values } = parseArgs({
      options: {
        readings: { type: 'string' },
        batch: { type: 'string' },
        every: { type: 'string' },
        at: { type: 'string' },
        json: { type: 'boolean' },
        explain: { type: 'boolean' },
        cases: { type: 'string' },
        out: { type: 'string' },
      },
    }));
  } catch (error) {
    throw new Wrong(`${(error as Error).message} ${USAGE}`);
  }
  if (values.cases !== undefined && values.out !== undefined) return runCases(values.cases, values.out, values.every ?? '6h');
  if (values.readings === undefined || values.batch === undefined) throw new Wrong(USAGE);
  runOne(values.readings, values.batch, values);
  return 0;
}

try {
  process.exitCode = main();
} catch (error) {
  if (!(error instanceof Wrong)) throw error;
  process.stderr.write(`${error.message}\n`);
  process.exitCode = 2;
}
