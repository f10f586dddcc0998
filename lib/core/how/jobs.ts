/** Why a job stands on the rounds, and when: of a call its rule and what it was held to, of a clock how long it runs. */
import { NO_MORE_AFTER, PORTIONS_AT } from '../additions/nutrients';
import { TEST_AFTER_DAYS } from '../bottling/conditioning';
import { AIRLOCK_EVERY_DAYS, CALL_OF_KIND, READ_EVERY_DAYS } from '../rounds/wanted';
import { how, type How } from './how';
import { howOfCall, type Evidence } from './judged';
import { ours, practice, SOURCES } from './sources';

const RULES: Partial<Record<string, How>> = {
  reading: how(`${READ_EVERY_DAYS.working} days after the last reading while it works, ${READ_EVERY_DAYS.terminal} once it has stopped; nothing while a float was heard within a day`, SOURCES.ownRule),
  airlock: how(`every ${AIRLOCK_EVERY_DAYS} days from when the airlock went on or was last seen to`, practice('the water in an airlock dries up in two or three weeks')),
  feed: how(
    `portions are due when ${PORTIONS_AT.map((share) => `${Math.round(100 * share)} %`).join(', ')} of the fermentable sugar is used, none after ${Math.round(100 * NO_MORE_AFTER)} %; grams: the nitrogen that is missing, shared among the portions that are not past. Its inputs stand in the batch’s cellar work, under Additions`,
    SOURCES.nitrogenDemand,
  ),
  fining_b: how('the first dose, and the wait that was told with it', practice('an hour between the two parts is usual; the packet wins')),
  settle: how('the last dose, and the days to settle that were told with it', practice('usual days of finings; the packet wins')),
  test_bottle: how(`${TEST_AFTER_DAYS} days after it was bottled`, practice('a bottle is opened to feel its pressure after a week')),
  condition: how('the day from which the lot is ready; the lot says how it comes about', ours('with sugar for fizz two weeks at 20 °C, longer in the cold; still, one week')),
  pressure: how('at once, when a bottle gushed', SOURCES.ownRule),
};

/** Null for what a person put down: they know why. */
export function howOfJob({ kind, source, evidence }: { kind: string; source: string; evidence: readonly Evidence[] | null }): How | null {
  const call = source === 'call' ? CALL_OF_KIND[kind] : undefined;
  if (call) return howOfCall(call, evidence ?? []);
  return source === 'person' ? null : (RULES[kind] ?? null);
}
