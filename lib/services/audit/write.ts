import type { Transaction } from 'sequelize';
import { AuditRow } from '@/db/models';
import type { Actor } from '@/lib/auth/policies';
import { currentOrigin } from '@/lib/origin';

interface AuditLine {
  /** What was done, `noun.verb`. */
  action: string;
  /** Identifier of what it was done to. */
  subject: string;
  personId: string | null;
  cellarId: string | null;
  /** What was changed; never a secret. */
  detail?: Record<string, unknown>;
}

/** Writes down who did what, and from where, in the transaction that did it. */
export async function audit(line: AuditLine, transaction?: Transaction): Promise<void> {
  const origin = currentOrigin();
  await AuditRow.create({ ...line, detail: line.detail ?? {}, address: origin?.address ?? null, means: origin?.means ?? null }, { transaction });
}

export const auditBy = (actor: Actor, action: string, subject: string, detail: Record<string, unknown>, transaction: Transaction) =>
  audit({ action, subject, personId: actor.personId, cellarId: actor.cellarId, detail }, transaction);
