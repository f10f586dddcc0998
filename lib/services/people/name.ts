import { Person } from '@/db/models';
import { NotFoundError } from '@/lib/errors';

/** The person's name. @throws NotFoundError */
export async function nameOf(personId: string): Promise<string> {
  const person = await Person.findByPk(personId, { attributes: ['name'] });
  if (!person) throw new NotFoundError('account');
  return person.name;
}
