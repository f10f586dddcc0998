import { QueryTypes } from 'sequelize';
import { expect, it } from 'vitest';
import { migrate, migrator } from '@/db/migrate';
import { Batch, Cellar, Entry, Membership, Person, Sensor } from '@/db/models';
import { useDatabase } from '../support/database';

const db = useDatabase();

it('keeps rows through the models with the database filling in what was left out', async () => {
  const cellar = await Cellar.create({ name: 'Low barn' });
  const person = await Person.create({ name: 'Ada', email: 'ada@barn.example' });
  await Membership.create({ cellarId: cellar.id, personId: person.id, role: 'keeper' });
  const batch = await Batch.create({ cellarId: cellar.id, name: 'Rye beer', kind: 'beer', drinkColour: 'amber', vesselKind: 'carboy', volumeL: 9, vesselL: 10, neck: 'airlock' });
  await Entry.create({ cellarId: cellar.id, batchId: batch.id, kind: 'note', at: new Date(0), text: 'Smells of bread.' });
  await Sensor.create({ cellarId: cellar.id, identifier: 'fs-aaaa', secretHash: Buffer.alloc(32), name: 'Float one' });

  const kept = await Batch.findByPk(batch.id, { rejectOnEmpty: true });
  expect(kept.state).toBe('working');
  expect(kept.createdAt).toBeInstanceOf(Date);
  expect((await Person.findByPk(person.id, { rejectOnEmpty: true })).timeZone).toBe('UTC');
  expect((await Sensor.findOne({ rejectOnEmpty: true })).intervalS).toBe(900);
});

it('goes down and up again on a database with data in it', async () => {
  const all = await migrator(db.sequelize).executed();
  expect(all.length).toBeGreaterThan(0);
  await migrator(db.sequelize).down({ to: 0 });
  expect(await migrator(db.sequelize).executed()).toHaveLength(0);
  expect(await migrate(db.sequelize)).toEqual(all.map((item) => item.name));
  expect(await Cellar.count()).toBe(0);
});

it('takes cautions that were lifted before they had a table of their own out of the trail', async () => {
  await migrator(db.sequelize).down({ migrations: ['0012-lifted-cautions'] });
  const cellar = await Cellar.create({ name: 'Low barn' });
  const batch = await Batch.create({ cellarId: cellar.id, name: 'Perry', kind: 'cider', drinkColour: 'pale', vesselKind: 'carboy', volumeL: 9, vesselL: 10, neck: 'airlock' });
  const [[lot]] = (await db.sequelize.query(
    `insert into lots (cellar_id, batch_id, code, name, bottled_at, ready_from, volume_l, sparkle, bench) values ($cellarId, $batchId, 'LB-1', 'Perry', now(), now(), 4, 'light', '{}') returning id`,
    { bind: { cellarId: cellar.id, batchId: batch.id } },
  )) as unknown as [[{ id: string }]];
  const line = (subject: string, action: string, detail: object) => db.sequelize.query(`insert into audit (cellar_id, action, subject, detail, at) values ($cellarId, $action, $subject, $detail::jsonb, '2026-03-01T12:00:00Z')`, { bind: { cellarId: cellar.id, action, subject, detail: JSON.stringify(detail) } });
  await line(lot.id, 'lot.caution-lifted', { code: 'LB-1', caution: 'A bottle gushed.', reason: 'Three opened since, all still.' });
  await line('not an id', 'lot.caution-lifted', { caution: 'x', reason: 'y' });
  await line(lot.id, 'lot.updated', {});
  await migrate(db.sequelize);
  expect(await db.sequelize.query('select lot_id as lot, caution, reason, at, cellar_id as cellar from caution_lifts', { type: QueryTypes.SELECT })).toEqual([
    { lot: lot.id, caution: 'A bottle gushed.', reason: 'Three opened since, all still.', at: new Date('2026-03-01T12:00:00Z'), cellar: cellar.id },
  ]);
  await cellar.destroy();
});

it('migrates once when several processes start together', async () => {
  const ran = await Promise.all([migrate(db.sequelize), migrate(db.sequelize)]);
  expect(ran.flat()).toHaveLength(0);
});

it.each([
  ['the trail of a cellar', `select id from audit a where a.cellar_id = '00000000-0000-0000-0000-000000000000' order by a.id desc limit 50`, 'audit_cellar_newest'],
  ['what one person did to their account', `select id from audit a where a.cellar_id is null and a.person_id = '00000000-0000-0000-0000-000000000000' order by a.id desc limit 50`, 'audit_person_newest'],
  ['the alerts of a cellar', `select id from alerts a where a.cellar_id = '00000000-0000-0000-0000-000000000000' order by a.opened_at desc, a.id desc limit 50`, 'alerts_cellar_newest'],
  ['the test messages of a person', `select id from outbox where person_id = '00000000-0000-0000-0000-000000000000' and created_at > now() - interval '10 minutes'`, 'outbox_person_newest'],
])('reads %s in order, from an index', async (_what, sql, index) => {
  const plan = await db.sequelize.transaction(async (transaction) => {
    // The tables are empty here; only what an index cannot do is left to a scan or a sort.
    await db.sequelize.query('set local enable_seqscan = off; set local enable_bitmapscan = off', { transaction });
    return JSON.stringify(await db.sequelize.query(`explain ${sql}`, { transaction, type: QueryTypes.SELECT }));
  });
  expect(plan).toContain(index);
  expect(plan).not.toContain('Sort');
});
