import type { Transaction } from 'sequelize';
import { MustVersion } from '@/db/models';
import { DEMO_SHEETS, type DemoLine, type DemoSheet } from '@/db/seed/sheets';
import type { Scenario } from '@/devices/simulator/scenario';
import type { Actor } from '@/lib/auth/policies';
import { snakeKeys } from '@/lib/contracts/case';
import { mustSheetSchema, type MustSheetBody } from '@/lib/contracts/musts';
import { catalogued } from '@/lib/core/must/catalogue';
import type { MustLine, Yeast } from '@/lib/core/must/ingredients';
import { between, exactly } from '@/lib/core/units/range';
import { writeMust } from '@/lib/services/musts/write';

/** Weighed a day before the pitch. */
const BEFORE_MS = 86_400_000;

function lineOf(line: DemoLine, index: number): MustLine & { note: string | null } {
  const known = catalogued(line.of);
  if (!known) throw new Error(`The catalogue has no ${line.of}.`);
  const quantity = typeof line.amount === 'number' ? exactly(line.amount) : between(line.amount[0], line.amount[1]);
  const measured = line.brix === undefined ? {} : ({ extractShare: exactly(line.brix / 100), source: 'told by the person or measured', status: 'told' } as const);
  return { id: `line-${index + 1}`, ingredient: { ...known, ...measured, name: line.name ?? known.name }, amount: { quantity, unit: line.unit }, costPerUnit: line.cost ?? null, note: line.note ?? null };
}

/** The yeast as its packet tells it. */
function yeastOf(name: string, { packet, kind }: Scenario, sheet: DemoSheet): Yeast {
  const { attenuation, toleranceAbv, temperature } = packet;
  return {
    name,
    // In a beer the attenuation is the yeast's; in the others all the sugar goes.
    attenuation: kind === 'beer' ? between(attenuation.min, attenuation.max) : null,
    toleranceAbv: between(toleranceAbv - 1, toleranceAbv + 1),
    temperatureC: { min: temperature.minC, max: temperature.maxC },
    nitrogenNeed: sheet.need,
    diastatic: false,
    status: 'told',
  };
}

/** The sheet of a demo batch as it is kept; null where it was made without one. */
export function demoSheet(scenario: Scenario, yeast: string | null): MustSheetBody | null {
  const sheet = DEMO_SHEETS.find((item) => item.scenario === scenario.name);
  if (!sheet) return null;
  return mustSheetSchema.parse({
    name: scenario.title,
    kind: scenario.kind,
    lines: snakeKeys(sheet.lines.map(lineOf)),
    yeast: snakeKeys(yeastOf(yeast ?? 'yeast of the house', scenario, sheet)),
    boiled_away_l: sheet.boiledL ?? 0,
    vessel_l: scenario.vessel.litres,
    method: sheet.method,
  });
}

/** Writes the sheet of a batch. @returns its version, for the batch to keep; null where it has none. */
export async function writeSheet(brewer: Actor, scenario: Scenario, yeast: string | null, pitchedAt: Date, transaction: Transaction): Promise<string | null> {
  const sheet = demoSheet(scenario, yeast);
  if (!sheet) return null;
  const must = await writeMust(brewer, { sheet, changeNote: null }, new Date(pitchedAt.getTime() - BEFORE_MS), transaction);
  const version = await MustVersion.findOne({ where: { mustId: must.id, version: 1 }, transaction, rejectOnEmpty: true });
  return version.id;
}
