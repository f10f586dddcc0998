import type { z } from 'zod';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import type { MustResultBody, MustSheetBody, reckonedMust, scaleMustForm, solveMustForm } from '@/lib/contracts/musts';
import { amountFor, scaleToFill } from '@/lib/core/must/solve';
import { InvalidError } from '@/lib/errors';
import { bodyOf, resultOf, sheetOf } from './sheet';

type Reckoned = z.infer<typeof reckonedMust>;

/** What a sheet promises, without keeping it. */
export async function reckonSheet(actor: Actor, sheet: MustSheetBody): Promise<MustResultBody> {
  authorize(actor, 'musts.read');
  return resultOf(sheet);
}

/** The same must for another vessel. */
export async function scaleSheetTo(actor: Actor, input: z.infer<typeof scaleMustForm>): Promise<Reckoned> {
  authorize(actor, 'musts.read');
  const scaled = scaleToFill(sheetOf(input.sheet), input.fill_l, input.vessel_l ?? input.sheet.vessel_l);
  if (!scaled) throw new InvalidError('This sheet cannot be scaled as long as it cannot be reckoned.', { sheet: ['cannot be reckoned yet'] });
  const sheet = bodyOf(scaled, input.sheet);
  return { sheet, result: resultOf(sheet) };
}

/** The amount of one line for a wanted gravity or strength. */
export async function solveSheet(actor: Actor, input: z.infer<typeof solveMustForm>): Promise<Reckoned> {
  authorize(actor, 'musts.read');
  const wanted = 'original' in input.wanted ? input.wanted : { abvPercent: input.wanted.abv_percent };
  const solved = amountFor(sheetOf(input.sheet), input.line, wanted);
  if (!solved.ok) throw new InvalidError('No amount of it does that.', { line: [solved.sentence] });
  const sheet = bodyOf(solved.sheet, input.sheet);
  return { sheet, result: resultOf(sheet) };
}
