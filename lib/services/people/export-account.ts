import { Person } from '@/db/models';
import { writtenBy } from '@/db/queries/own-data';
import { trail } from '@/db/queries/trail';
import { systemClock, type Clock } from '@/lib/clock';
import { NotFoundError } from '@/lib/errors';
import { audit } from '../audit/write';

const MOST_LINES = 50_000;

/** All that is kept about one person: who they are, where they belong, what they wrote, what happened to their account. No secrets. */
export async function exportAccount(personId: string, clock: Clock = systemClock): Promise<string> {
  const person = await Person.findByPk(personId);
  if (!person) throw new NotFoundError('account');
  await audit({ action: 'account.exported', subject: personId, personId, cellarId: null });
  const lines = await trail({ cellarId: null, personId, limit: MOST_LINES });
  return JSON.stringify(
    {
      format: 'fallbright.person/1',
      exported_at: new Date(clock.now()).toISOString(),
      person: {
        id: person.id,
        name: person.name,
        email: person.email,
        time_zone: person.timeZone,
        locale: person.locale,
        units: { gravity: person.gravityUnit, temperature: person.temperatureUnit, volume: person.volumeUnit },
        made_at: person.createdAt.toISOString(),
        second_factor_since: person.totpConfirmedAt?.toISOString() ?? null,
      },
      ...(await writtenBy(personId)),
      account_trail: lines.map(({ at, action, address, means }) => ({ at: at.toISOString(), action, address, means })),
    },
    null,
    2,
  );
}
