import type { Transaction } from 'sequelize';
import { Person } from '@/db/models';

/** Names of people by their id, in one query. */
export async function namesOf(ids: ReadonlyArray<string | null>, transaction?: Transaction): Promise<Map<string, string>> {
  const wanted = [...new Set(ids.filter((id) => id !== null))];
  if (wanted.length === 0) return new Map();
  const people = await Person.findAll({ attributes: ['id', 'name'], where: { id: wanted }, transaction });
  return new Map(people.map((person) => [person.id, person.name]));
}
