import type { Transaction } from 'sequelize';
import { Batch, Entry } from '@/db/models';
import { DEMO_PEOPLE, type DemoBatch } from '@/db/seed/demo';
import type { SimulatedBatch, SimulatedEvent } from '@/devices/simulator/generate';
import { catalogued } from '@/lib/core/must/catalogue';
import { finingIn } from '@/lib/services/finings/start';
import { readAt, type Household } from './demo-past';
import { writeWater } from './demo-rounds';
import { writeSheet } from './demo-sheets';

const HOUR = 3_600_000;
const MINUTE = 60_000;

type Told = Pick<DemoBatch, 'yeast' | 'place' | 'notes'> & { tag: number | null };

/** The batch from its sheet, with its log as people would have written it: each entry made when it happened. */
export async function writeBatch(house: Household, demo: Told, simulated: SimulatedBatch, transaction: Transaction): Promise<string> {
  const { cellarId, people, brewer, hand } = house;
  const { scenario, setup, events } = simulated;
  const pitchedAt = new Date(setup.pitchedAt!);
  const keeper = people.get(DEMO_PEOPLE[0]!.name)!;
  const lastNeck = events.findLast((event) => event.kind === 'neck')?.neck;
  const batch = await Batch.create(
    {
      cellarId,
      name: scenario.title,
      kind: setup.kind,
      drinkColour: scenario.colour,
      vesselKind: scenario.vessel.kind,
      tag: demo.tag,
      place: demo.place,
      volumeL: setup.volumeL,
      vesselL: setup.vesselL,
      neck: lastNeck ?? scenario.neck,
      pitchedAt,
      originalGravity: setup.originalGravity,
      yeast: demo.yeast,
      attenuationMinPercent: setup.attenuation ? Math.round(setup.attenuation.min * 1000) / 10 : null,
      attenuationMaxPercent: setup.attenuation ? Math.round(setup.attenuation.max * 1000) / 10 : null,
      alcoholToleranceAbv: setup.alcoholToleranceAbv,
      temperatureMinC: setup.temperature?.minC ?? null,
      temperatureMaxC: setup.temperature?.maxC ?? null,
      mustVersionId: await writeSheet(brewer, scenario, demo.yeast, pitchedAt, transaction),
      createdBy: brewer.personId,
      createdAt: pitchedAt,
      updatedAt: pitchedAt,
    },
    { transaction },
  );
  const write = (at: number, personId: string, more: Partial<Entry> & Pick<Entry, 'kind'>) =>
    Entry.create({ ...more, cellarId, batchId: batch.id, at: new Date(at), createdAt: new Date(at), personId, gravityRead: more.kind === 'reading' ? (more.gravity ?? null) : null }, { transaction });

  await write(pitchedAt.getTime(), brewer.personId, { kind: 'pitch', text: demo.yeast ? `${capital(demo.yeast)}, rehydrated.` : null, gravity: setup.originalGravity });
  for (const [index, event] of events.entries()) await write(event.at, index % 2 === 0 ? brewer.personId : hand.personId, entryOf(event, simulated));
  for (const note of demo.notes ?? []) await write(pitchedAt.getTime() + note.atH * HOUR, people.get(note.by) ?? keeper, { kind: 'observation', text: note.text });
  return batch.id;
}

const capital = (text: string) => text.replace(/^./, (letter) => letter.toUpperCase());

/** The log shows an entry's kind by itself; the text says what is more. A feed is told as what went in. */
function entryOf(event: SimulatedEvent, { scenario, setup }: SimulatedBatch): Partial<Entry> & Pick<Entry, 'kind'> {
  const { at, kind, text, ...told } = event;
  const rest = capital(text.replace(/^Hydrometer[.,]?\s*/, '')) || null;
  const nitrogen = scenario.events.find((item) => item.text === text && setup.pitchedAt! + item.atH * HOUR === at)?.nitrogen;
  const nutrient = catalogued('complex-nutrient')!;
  if (nitrogen === undefined) return { kind, text: rest, ...told };
  const grams = Number(((1000 * nitrogen * setup.volumeL) / nutrient.yanMgPerG.value).toFixed(1));
  return { kind: 'addition', text: rest, detail: { substance: 'nutrient', ingredient: nutrient.key, name: nutrient.name, grams } };
}

/** What is under way when the demo opens. */
export async function writeToday(house: Household, demo: DemoBatch, batchId: string, simulated: SimulatedBatch, now: number, transaction: Transaction): Promise<void> {
  const { cellarId, brewer, hand } = house;
  const batch = await Batch.findByPk(batchId, { transaction, rejectOnEmpty: true });
  const airlockSince = simulated.events.findLast((event) => event.kind === 'neck' && event.neck === 'airlock')?.at ?? simulated.setup.pitchedAt!;
  await writeWater(house, demo, batch, airlockSince, now, transaction);
  for (const atH of demo.readAtH ?? []) {
    const at = simulated.setup.pitchedAt! + atH * HOUR;
    const gravity = readAt(simulated, at);
    await Entry.create({ cellarId, batchId, kind: 'reading', at: new Date(at), createdAt: new Date(at), gravity, gravityRead: gravity, personId: hand.personId }, { transaction });
  }
  if (!demo.fining) return;
  const at = now - demo.fining.startedMinAgo * MINUTE;
  await finingIn(brewer, batchId, { at: new Date(at).toISOString(), text: null, client_id: null, fining: demo.fining.fining, dose: demo.fining.dose, interval_min: null, settle_days: null }, { now: () => at }, transaction);
}
