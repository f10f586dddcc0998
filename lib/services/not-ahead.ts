import { InvalidError } from '@/lib/errors';

/** A clock that is a little ahead is no reason to refuse. */
const AHEAD_MS = 10 * 60_000;

/** When something happened, as it was told. @throws InvalidError at that field where it has not happened yet */
export function notAhead(at: string, now: number, field = 'at', says = 'lies ahead'): Date {
  const date = new Date(at);
  if (date.getTime() > now + AHEAD_MS) throw new InvalidError('The time lies ahead.', { [field]: [says] });
  return date;
}
