import { inTransaction } from '@/db/client';
import { Person } from '@/db/models';
import type { UpdateMe } from '@/lib/contracts/people';
import { NotFoundError } from '@/lib/errors';
import { audit } from '../audit/write';

/** Changes what a person says of themself. */
export async function updateMe(personId: string, input: UpdateMe): Promise<void> {
  await inTransaction(async (transaction) => {
    const person = await Person.findByPk(personId, { transaction });
    if (!person) throw new NotFoundError('account');
    const { gravity, temperature, volume } = input.units ?? {};
    await person.update(
      {
        name: input.name ?? person.name,
        timeZone: input.time_zone ?? person.timeZone,
        locale: input.locale ?? person.locale,
        gravityUnit: gravity ?? person.gravityUnit,
        temperatureUnit: temperature ?? person.temperatureUnit,
        volumeUnit: volume ?? person.volumeUnit,
      },
      { transaction },
    );
    await audit({ action: 'person.updated', subject: personId, personId, cellarId: null, detail: { fields: Object.keys(input) } }, transaction);
  });
}
