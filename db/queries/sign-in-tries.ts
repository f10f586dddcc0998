import { QueryTypes } from 'sequelize';
import { database } from '../client';

export interface TryRule {
  /** Tries without a wait. */
  free: number;
  /** The wait after the first try beyond those; it doubles with each one more. */
  firstWaitS: number;
  mostWaitS: number;
}

/** This long without a try forgets the count. */
const FORGET = '1 day';

/**
 * Counts a try before it is made, so that tries sent at once are counted too.
 * One statement: a locked key changes no row.
 * @returns seconds to wait, or 0 where the try may be made.
 */
export async function countTry(key: string, rule: TryRule): Promise<number> {
  const admitted = await database().query<{ key: string }>(
    `insert into sign_in_tries as t (key, tries, last_at, locked_until) values ($key, 1, now(), now())
     on conflict (key) do update set
       tries = case when t.last_at < now() - interval '${FORGET}' then 1 else t.tries + 1 end,
       last_at = now(),
       locked_until = case
         when t.last_at < now() - interval '${FORGET}' or t.tries < $free then now()
         else now() + make_interval(secs => least($most::float8, $first::float8 * power(2, least(t.tries - $free, 30))))
       end
     where t.locked_until <= now()
     returning key`,
    { bind: { key, free: rule.free, first: rule.firstWaitS, most: rule.mostWaitS }, type: QueryTypes.SELECT },
  );
  if (admitted.length > 0) return 0;
  const [locked] = await database().query<{ wait: number }>(`select extract(epoch from locked_until - now())::float8 as wait from sign_in_tries where key = $key`, {
    bind: { key },
    type: QueryTypes.SELECT,
  });
  return Math.max(1, Math.ceil(locked?.wait ?? 1));
}

/** The try was right: an account starts anew; an address gets its one try back, so that one good account does not cover for guesses at others. */
export async function tryWasRight(account: string, address: string): Promise<void> {
  await database().query(
    `with a as (delete from sign_in_tries where key = $account)
     update sign_in_tries set tries = greatest(tries - 1, 0), locked_until = now() where key = $address`,
    { bind: { account, address } },
  );
}

/** The try was no guess: as if it had not been made. */
export async function takeTryBack(keys: readonly string[]): Promise<void> {
  await database().query(`update sign_in_tries set tries = greatest(tries - 1, 0), locked_until = now() where key = any($keys::text[])`, { bind: { keys } });
}

/** Drops what no longer counts. */
export async function forgetOldTries(): Promise<void> {
  await database().query(`delete from sign_in_tries where last_at < now() - interval '${FORGET}'`);
}
