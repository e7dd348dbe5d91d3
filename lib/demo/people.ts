import { createRegistrar, inviteAccount } from '@/lib/people/commands';
import { giveAccommodation } from '@/lib/accommodations/commands';
import { enrol, saveClass, saveTerm } from '@/lib/classes/commands';
import { saveSchool } from '@/lib/school/commands';
import { schoolSettings } from '@/lib/school/model';
import { readSchool } from '@/lib/school/queries';
import { readClock } from '@/db/clock';
import { localDay } from '@/lib/school/times';
import { addressOf, classes, type Learner, password, school, staff, type StaffKey } from './cast';
import { asAccount, giveCredential, must, type Player, type Stage } from './stage';

export type Company = Record<StaffKey, Player> & { classes: Map<string, { id: string; learners: (Player & { learner: Learner })[] }> };

const day = 86_400_000;

/** The registrar opens the school: settings, staff, term, classes, learners, accommodations. */
export async function openSchool({ db, say }: Stage): Promise<Company> {
  const first = must(await createRegistrar(db, { name: staff.registrar.name, email: addressOf(staff.registrar.name) }), 'the first registrar');
  const registrar = asAccount(db, first.id, staff.registrar.name, ['registrar']);
  await giveCredential(db, first.id, password);
  const before = await readSchool(db);
  must(await saveSchool(registrar, {
    ...schoolSettings.parse({}), ...before.settings, name: school.name, version: before.version, zone: school.zone, locale: 'en-CA',
    office: 'Room 12, 08:00 to 16:00', helpAddress: `exams@${school.domain}`, senderName: `${school.name}, exam office`, senderAddress: `exams@${school.domain}`,
  }), 'the school settings');
  const players = { registrar } as Record<StaffKey, Player>;
  for (const key of ['author', 'reviewer', 'proctor', 'secondProctor'] as const) {
    const person = staff[key];
    const { id } = must(await inviteAccount(registrar, { name: person.name, sortName: '', email: addressOf(person.name), learnerNumber: '', roles: person.roles }, false), person.name);
    await giveCredential(db, id, password);
    players[key] = asAccount(db, id, person.name, person.roles);
  }
  const now = await readClock(db);
  const place = { zone: school.zone, locale: 'en-CA' as const };
  const term = must(await saveTerm(registrar, null, {
    name: `Term of ${new Intl.DateTimeFormat('en-CA', { month: 'long', year: 'numeric', timeZone: school.zone }).format(now)}`,
    startsOn: localDay(now, place), endsOn: localDay(new Date(now.getTime() + 120 * day), place),
  }), 'the term');
  const company: Company = { ...players, classes: new Map() };
  for (const cls of classes) {
    const instructorIds = [players.author.id, players.reviewer.id];
    const { id } = must(await saveClass(registrar, null, { termId: term.id, name: cls.name, title: cls.title, instructorIds }), cls.name);
    const learners = [];
    for (const learner of cls.learners) learners.push(await addLearner(company, learner, localDay(now, place)));
    must(await enrol(registrar, id, learners.map((learner) => learner.id)), `enrolment of ${cls.name}`);
    company.classes.set(cls.name, { id, learners });
    say(`  class ${cls.name}: ${learners.length} learners`);
  }
  return company;
}

async function addLearner({ registrar }: Company, learner: Learner, today: string): Promise<Player & { learner: Learner }> {
  const { db } = registrar;
  const email = learner.mail ? addressOf(learner.name) : '';
  const { id } = must(await inviteAccount({ ...registrar }, { name: learner.name, sortName: '', email, learnerNumber: learner.number, roles: ['student'] }, false), learner.name);
  await giveCredential(db as Player['db'] as Stage['db'], id, password);
  if (learner.need) {
    const { extraPercent = 0, restMinutes = 0, largePrint = false, reason } = learner.need;
    must(await giveAccommodation(registrar, id, { extraPercent, extraMinutes: 0, restMinutes, largePrint, separateRoom: false, reason, since: today, until: '' }), `accommodation of ${learner.name}`);
  }
  return { ...asAccount(db as Stage['db'], id, learner.name, ['student']), learner };
}
