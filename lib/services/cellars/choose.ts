import { Membership } from '@/db/models';
import { NotFoundError } from '@/lib/errors';

/** @throws NotFoundError where the person does not belong to that cellar. */
export async function chooseCellar(personId: string, cellarId: string): Promise<void> {
  if ((await Membership.count({ where: { personId, cellarId } })) === 0) throw new NotFoundError('cellar');
}
