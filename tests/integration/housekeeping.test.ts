import { beforeEach, describe, expect, it } from 'vitest';
import { SignIn } from '@/db/models';
import { dropWhatIsOld } from '@/lib/services/housekeeping';
import { useDatabase } from '../support/database';
import { buildPerson } from '../support/factories';

const db = useDatabase();
const DAY = 86_400_000;
const ago = (days: number) => new Date(Date.now() - days * DAY);

describe('what is old', () => {
  beforeEach(() => db.sequelize.query('delete from heartbeats'));

  it('goes: sign-ins three months after their end, and not before', async () => {
    const { id: personId } = await buildPerson();
    const make = (expiresAt: Date, endedAt: Date | null) => SignIn.create({ personId, expiresAt, endedAt }).then((row) => row.id);
    await make(ago(91), null);
    await make(ago(-10), ago(91));
    const kept = [await make(ago(-10), null), await make(ago(-10), ago(89)), await make(ago(89), null)];
    await dropWhatIsOld();
    expect((await SignIn.findAll({ where: { personId } })).map((row) => row.id).toSorted()).toEqual(kept.toSorted());
  });

  it('goes also where something before it cannot be dropped', async () => {
    await db.sequelize.query(`insert into heartbeats (part, instance, at) values ('worker', 'gone', now() - interval '2 days'), ('worker', 'here', now())`);
    await db.sequelize.query('alter table outbox rename to outbox_elsewhere');
    try {
      await dropWhatIsOld();
    } finally {
      await db.sequelize.query('alter table outbox_elsewhere rename to outbox');
    }
    const [left] = await db.sequelize.query('select instance from heartbeats');
    expect(left).toEqual([{ instance: 'here' }]);
  });
});
