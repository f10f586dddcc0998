import { QueryTypes, type Transaction } from 'sequelize';
import { database } from '../client';

/** Removes a cellar and all that is in it. Readings hang on no foreign key, so that taking them in costs none: they go first. */
export async function forgetCellar(cellarId: string, transaction: Transaction): Promise<void> {
  await database().query(`delete from readings where sensor_id in (select id from sensors where cellar_id = $cellarId)`, { bind: { cellarId }, transaction });
  await database().query(`delete from cellars where id = $cellarId`, { bind: { cellarId }, transaction });
}

export interface SoleKept {
  id: string;
  name: string;
  others: number;
  batches: number;
}

/** Cellars that nobody but this person keeps, with how many others share each and how many batches it has. */
export function soleKeptBy(personId: string, transaction?: Transaction): Promise<SoleKept[]> {
  return database().query<SoleKept>(
    `select c.id, c.name, (select count(*)::int from memberships o where o.cellar_id = c.id and o.person_id <> $personId) as others, (select count(*)::int from batches b where b.cellar_id = c.id) as batches
     from memberships m join cellars c on c.id = m.cellar_id
     where m.person_id = $personId and m.role = 'keeper' and not exists (select 1 from memberships k where k.cellar_id = c.id and k.role = 'keeper' and k.person_id <> $personId)
     order by c.name, c.id`,
    { bind: { personId }, type: QueryTypes.SELECT, transaction },
  );
}
