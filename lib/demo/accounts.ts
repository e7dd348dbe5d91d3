import { addressOf, classes, password, staff } from './cast';

const firstLearner = classes[1]?.learners[0]?.name ?? '';
const withoutMail = classes[1]?.learners.find((learner) => !learner.mail);

/** Accounts to look round with, printed at the start. */
export const demoAccounts = [
  { role: 'instructor', name: staff.author.name, signIn: addressOf(staff.author.name), password },
  { role: 'second instructor', name: staff.reviewer.name, signIn: addressOf(staff.reviewer.name), password },
  { role: 'proctor', name: staff.proctor.name, signIn: addressOf(staff.proctor.name), password },
  { role: 'registrar', name: staff.registrar.name, signIn: addressOf(staff.registrar.name), password },
  { role: 'student', name: firstLearner, signIn: addressOf(firstLearner), password },
  { role: 'student without e-mail', name: withoutMail?.name ?? '', signIn: withoutMail?.number ?? '', password },
];
