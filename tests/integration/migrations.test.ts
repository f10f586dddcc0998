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

it('migrates once when several processes start together', async () => {
  const ran = await Promise.all([migrate(db.sequelize), migrate(db.sequelize)]);
  expect(ran.flat()).toHaveLength(0);
});
