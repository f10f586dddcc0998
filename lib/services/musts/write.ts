import type { Transaction } from 'sequelize';
import { Must, MustVersion } from '@/db/models';
import type { Actor } from '@/lib/auth/policies';
import type { MustSheetBody } from '@/lib/contracts/musts';
import { notifyChange } from '../changes';
import { sketchOf } from './sheet';

interface Version {
  sheet: MustSheetBody;
  changeNote: string | null;
  copiedFrom?: string | null;
}

/** Writes the first version of a new sheet. */
export async function writeMust(actor: Actor, { sheet, changeNote, copiedFrom = null }: Version, now: Date, transaction: Transaction): Promise<Must> {
  const must = await Must.create({ cellarId: actor.cellarId, name: sheet.name, kind: sheet.kind, latest: 1, changedAt: now, createdAt: now }, { transaction });
  await MustVersion.create({ cellarId: actor.cellarId, mustId: must.id, version: 1, body: sheet, sketch: sketchOf(sheet), changeNote, copiedFrom, createdBy: actor.personId, createdAt: now }, { transaction });
  await notifyChange({ cellar: actor.cellarId, kind: 'must', batch: null }, transaction);
  return must;
}

/** Writes the next version of a sheet that the transaction has locked. */
export async function writeVersion(actor: Actor, must: Must, { sheet, changeNote }: Version, now: Date, transaction: Transaction): Promise<void> {
  const version = must.latest + 1;
  await MustVersion.create({ cellarId: actor.cellarId, mustId: must.id, version, body: sheet, sketch: sketchOf(sheet), changeNote, createdBy: actor.personId, createdAt: now }, { transaction });
  await must.update({ latest: version, name: sheet.name, kind: sheet.kind, changedAt: now }, { transaction });
  await notifyChange({ cellar: actor.cellarId, kind: 'must', batch: null }, transaction);
}
