import { QueryTypes, type Transaction } from 'sequelize';
import { database } from '../client';

export interface BatchStateRow<A> {
  assessedAt: Date;
  assessment: A;
}

/** The last judgement kept of a batch, as it goes over the wire. */
export async function batchState<A>(batchId: string, transaction?: Transaction): Promise<BatchStateRow<A> | null> {
  const [row] = await database().query<BatchStateRow<A>>(`select assessed_at as "assessedAt", assessment from batch_states where batch_id = $batchId`, {
    bind: { batchId },
    type: QueryTypes.SELECT,
    transaction,
  });
  return row ?? null;
}

interface NewBatchState {
  batchId: string;
  cellarId: string;
  at: Date;
  /** What it was judged from: `judgementMark` before the log was read. */
  mark?: string | null;
  assessment: unknown;
  /** As the shelf's lanes take them. */
  curve: unknown;
  expected: unknown;
  /** As the batch page takes it. */
  drawing?: unknown;
}

export async function saveBatchState({ batchId, cellarId, at, mark = null, assessment, curve, expected, drawing = null }: NewBatchState, transaction: Transaction): Promise<void> {
  await database().query(
    `insert into batch_states (batch_id, cellar_id, assessed_at, mark, assessment, curve, expected, drawing) values ($batchId, $cellarId, $at, $mark, $assessment, $curve, $expected, $drawing)
     on conflict (batch_id) do update set assessed_at = excluded.assessed_at, mark = excluded.mark, assessment = excluded.assessment, curve = excluded.curve, expected = excluded.expected, drawing = excluded.drawing`,
    { bind: { batchId, cellarId, at, mark, assessment: JSON.stringify(assessment), curve: JSON.stringify(curve), expected: JSON.stringify(expected), drawing: drawing === null ? null : JSON.stringify(drawing) }, transaction },
  );
}

/** Keeps a judgement in which a verdict changed. */
export async function keepAssessment(row: { cellarId: string; batchId: string; at: Date; changed: string[]; assessment: unknown }, transaction: Transaction): Promise<void> {
  await database().query(`insert into assessments (cellar_id, batch_id, at, changed, assessment) values ($cellarId, $batchId, $at, $changed, $assessment)`, {
    bind: { ...row, assessment: JSON.stringify(row.assessment) },
    transaction,
  });
}

/** Working batches not judged since `before`, the longest waiting first. */
export async function batchesToJudge(before: Date): Promise<string[]> {
  const rows = await database().query<{ id: string }>(
    `select b.id from batches b left join batch_states s on s.batch_id = b.id
     where s.assessed_at is null or (b.state = 'working' and s.assessed_at < $before)
     order by s.assessed_at nulls first, b.id`,
    { bind: { before }, type: QueryTypes.SELECT },
  );
  return rows.map((row) => row.id);
}

type KeptPoint = { at: string; gravity: number; lo: number; hi: number };

/** The curve of the last judgement kept, as it goes over the wire; empty before the first. `whole`: each of its points, not those of a lane. */
export async function keptCurve(batchId: string, { whole = false } = {}): Promise<KeptPoint[]> {
  const curve = whole ? `coalesce((drawing -> 'curve')::json, curve::json)` : 'curve';
  const [row] = await database().query<{ curve: KeptPoint[] }>(`select ${curve} as curve from batch_states where batch_id = $batchId`, { bind: { batchId }, type: QueryTypes.SELECT });
  return row?.curve ?? [];
}
