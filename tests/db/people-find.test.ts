import { afterAll, beforeAll, expect, it } from 'vitest';
import { saveClass, saveTerm } from '@/lib/classes/commands';
import { find } from '@/lib/find/queries';
import { openTestDatabase, type TestDatabase } from '@/tests/support/database';
import { firstRegistrar, newPerson, type Person } from '@/tests/support/people';

let database: TestDatabase;
let registrar: Person;
beforeAll(async () => {
  database = await openTestDatabase();
  registrar = await firstRegistrar(database.app);
  const term = await saveTerm(registrar.context, null, { name: 'Autumn', startsOn: '2026-09-01', endsOn: '2026-12-18' });
  if (!term.ok) throw new Error(term.says);
  await saveClass(registrar.context, null, { termId: term.value.id, name: 'Shunt 100%', title: '', instructorIds: [] });
});
afterAll(() => database.close());

it('finds what each role may see, and signs of a pattern mean themselves', async () => {
  const [instructor, student] = [await newPerson(registrar, ['instructor'], { name: 'Zoë Shunt' }), await newPerson(registrar, ['student'])];
  await database.owner.insertInto('template').values({ slug: 'shunt-one', text: '-', title: 'Shunt motor' }).execute();
  const titles = async (person: Person, text: string) => (await find(person.context, text)).map((hit) => hit.title);
  expect(await titles(registrar, 'shunt')).toEqual(['Zoë Shunt', 'Shunt 100%, Autumn']);
  expect(await titles(instructor, 'SHUNT')).toEqual(['Shunt motor']);
  expect(await titles(student, 'shunt')).toEqual([]);
  expect(await titles(registrar, '0%')).toEqual(['Shunt 100%, Autumn']);
  expect(await titles(registrar, '%%')).toEqual([]);
  expect(await titles(registrar, 's')).toEqual([]);
});
