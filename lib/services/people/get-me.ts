import { QueryTypes } from 'sequelize';
import { database } from '@/db/client';
import { actionsOf, type Actor } from '@/lib/auth/policies';
import type { MeBody } from '@/lib/contracts/people';
import { localeOf } from '@/lib/texts/languages';
import type { Role } from '@/lib/core/roles';
import type { GravityUnit, TemperatureUnit, VolumeUnit } from '@/lib/core/units/chosen';
import { NotFoundError } from '@/lib/errors';

interface Row {
  personName: string;
  email: string;
  personZone: string;
  locale: string;
  gravity: GravityUnit;
  temperature: TemperatureUnit;
  volume: VolumeUnit;
  cellarId: string;
  cellarName: string;
  cellarZone: string;
  currency: string | null;
  role: Role;
}

/** Who asks, in which cellar, and which others they could look at. */
export async function getMe(actor: Actor): Promise<MeBody> {
  const rows = await database().query<Row>(
    `select p.name as "personName", p.email, p.time_zone as "personZone", p.locale, p.gravity_unit as gravity, p.temperature_unit as temperature, p.volume_unit as volume, c.id as "cellarId", c.name as "cellarName", c.time_zone as "cellarZone", c.currency, m.role
     from people p join memberships m on m.person_id = p.id join cellars c on c.id = m.cellar_id
     where p.id = $personId order by c.name, c.id`,
    { bind: { personId: actor.personId }, type: QueryTypes.SELECT },
  );
  const here = rows.find((row) => row.cellarId === actor.cellarId);
  if (!here) throw new NotFoundError('cellar');
  return {
    person: { id: actor.personId, name: here.personName, email: here.email, time_zone: here.personZone, locale: localeOf(here.locale), units: { gravity: here.gravity, temperature: here.temperature, volume: here.volume } },
    cellar: { id: here.cellarId, name: here.cellarName, time_zone: here.cellarZone, currency: here.currency, role: here.role },
    cellars: rows.map((row) => ({ id: row.cellarId, name: row.cellarName, role: row.role })),
    may: actionsOf(here.role),
  };
}
