/** Where a gravity in the log comes from. */
import { how, type How } from './how';
import { memory, SOURCES } from './sources';

/** Points that a gravity by refractometer may be off by in a drink with alcohol, about two times in three. From memory. */
export const REFRACTOMETER_OFF_POINTS = 4;

const ALCOHOL_READ = memory('what alcohol adds to the reading is recalled (a handbook’s concentrative properties), not checked against a source; the extracts are Balling’s. Not to bottle by');

export interface LoggedReading {
  gravity: number;
  /** As read, before the correction. */
  read: number | null;
  sampleC: number | null;
  calibratedC: number | null;
  /** What a refractometer showed; null: a hydrometer. */
  brix: number | null;
  /** There was no alcohol in it yet. */
  must: boolean;
}

/** Formula, inputs and source of a logged gravity; null where it stands as it was read. */
export function howOfReading({ gravity, read, sampleC, calibratedC, brix, must }: LoggedReading): How | null {
  if (brix !== null) {
    const inputs = [
      ['reading', brix, '°Bx'],
      ['sample', sampleC ?? 'corrected by the instrument', sampleC === null ? '' : '°C'],
      ['gravity', gravity, 'SG'],
    ] as const;
    if (must) return how('°Bx taken to 20 °C, then the cubic through NBS Circular C440 backwards', SOURCES.oivRefractometer, inputs);
    return how(`°Bx taken to 20 °C; it shows the extract that is left and the alcohol: from the original gravity, both by Balling, the gravity that shows this much; ± ${(REFRACTOMETER_OFF_POINTS / 1000).toFixed(3)}`, ALCOHOL_READ, inputs);
  }
  if (read === null || sampleC === null || Math.abs(read - gravity) < 0.00005) return null;
  return how('density shown, glass expansion allowed for; the solution of that density, widened by its alcohol too, taken to 20 °C', SOURCES.iso1768, [
    ['reading', read, 'SG'],
    ['sample', sampleC, '°C'],
    ['hydrometer made for', calibratedC ?? 20, '°C'],
  ]);
}
