import { lettersIn, REASON_MIN_LETTERS } from '@/lib/core/bottling/verdict';
import { InvalidError } from '@/lib/errors';

/** A reason that says something, as it stays on the lot. @throws InvalidError at the field that it was written in. */
export function writtenReason(field: string, reason: string): string {
  if (lettersIn(reason) < REASON_MIN_LETTERS) throw new InvalidError('The reason says too little.', { [field]: [`write why, in at least ${REASON_MIN_LETTERS} letters: it stays on the lot`] });
  return reason.trim();
}
