import type { CalibrationPointRow, CalibrationRow } from '@/db/models';
import type { CalibrationPointBody, CalibrationVersionBody } from '@/lib/contracts/calibration';
import { iso, isoOrNull } from '../../iso';

type Names = ReadonlyMap<string, string>;
const nameOf = (names: Names, id: string | null) => (id === null ? null : (names.get(id) ?? null));

export function presentPoint(row: CalibrationPointRow, names: Names): CalibrationPointBody {
  return {
    id: row.id,
    at: iso(row.at),
    source: row.source,
    inclination: row.inclination,
    gravity: row.gravity,
    temperature: row.temperature,
    sugar_g_per_l: row.sugarGPerL,
    entry_id: row.entryId,
    by: nameOf(names, row.createdBy),
  };
}

/** Points as a version froze them. */
export interface FrozenPoint {
  inclination: number;
  gravity: number;
  temperature: number;
}

export function presentVersion(row: CalibrationRow, names: Names): CalibrationVersionBody {
  const { coefficients, lowDeg, highDeg } = row;
  return {
    version: row.version,
    applies_from: iso(row.appliesFrom),
    curve:
      coefficients && lowDeg !== null && highDeg !== null
        ? { degree: coefficients.length - 1, coefficients, low: lowDeg, high: highDeg, sigma: row.sigma ?? 0, corrects_temperature: row.correctsTemperature, points: row.points as FrozenPoint[] }
        : null,
    offset: row.offsetSg,
    note: row.note,
    by: nameOf(names, row.createdBy),
    created_at: iso(row.createdAt),
    removed_at: isoOrNull(row.removedAt),
  };
}
