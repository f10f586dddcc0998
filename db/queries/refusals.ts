import { QueryTypes } from 'sequelize';
import { database } from '../client';

/** Rows in one statement: a flood of refused messages goes in pieces, with no long transaction. */
const PIECE = 10_000;

/** Deletes refusals received before this time, ms since 1970; returns how many. */
export async function deleteRefusalsBefore(before: number): Promise<number> {
  let deleted = 0;
  for (;;) {
    const rows = await database().query<{ id: number }>(
      `delete from refusals where id in (select id from refusals where received_at < to_timestamp($before::float8 / 1000) limit ${PIECE}) returning id`,
      { bind: { before }, type: QueryTypes.SELECT },
    );
    deleted += rows.length;
    if (rows.length < PIECE) return deleted;
  }
}
