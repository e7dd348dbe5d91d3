import type { Database } from '@/db/client';
import { fillBank } from './bank';
import { makeForm, plans } from './exams';
import { openSchool } from './people';
import { publish } from './results';
import { plan, sit } from './sittings';
import { setMinutes, type Stage } from './stage';

const hour = 60;
const days = 24 * hour;

/** Walks an invented school through its term by the real commands, with `app.now()` set along the way and true again at the end. */
export async function loadDemo(db: Database, say: (line: string) => void): Promise<void> {
  const stage: Stage = { db, say };
  say('Loading the demo, once: a school, its bank, a sitting that is over, one to run now, one ahead');
  await setMinutes(db, -42 * days);
  const company = await openSchool(stage);
  await setMinutes(db, -35 * days);
  await fillBank(stage, company);
  const machines = await makeForm(company, plans.machines);
  const advanced = await makeForm(company, plans.advanced);
  const startedAgo = 12 * days;
  await setMinutes(db, -startedAgo - 3 * days);
  const over = await plan(stage, company, { formId: machines, className: 'E2-A', title: plans.machines.title, room: '114', proctors: [company.proctor, company.secondProctor], startsIn: 3 * days });
  await sit(stage, company, over, startedAgo, ['Ulrike Kowal']);
  await setMinutes(db, -startedAgo + 3 * hour);
  await publish(stage, company, over);
  await setMinutes(db, -2 * hour);
  await plan(stage, company, { formId: machines, className: 'E2-B', title: plans.machines.title, room: '114', proctors: [company.proctor], startsIn: 2 * hour + 15, latest: 12 * hour });
  await plan(stage, company, { formId: advanced, className: 'E3-A', title: plans.advanced.title, room: '207', proctors: [company.proctor, company.secondProctor], startsIn: 6 * days });
  await setMinutes(db, 0);
}
