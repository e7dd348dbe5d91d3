/** Everybody of the demo's school. All of it is invented; addresses end in .test, so that no mail can leave. */
export const school = { name: 'Kettle Ridge Trades College', domain: 'kettleridge.test', zone: 'America/Edmonton' } as const;
export const password = 'brush and yoke 7';

export type StaffKey = 'registrar' | 'author' | 'reviewer' | 'proctor' | 'secondProctor';
export const staff: Record<StaffKey, { name: string; roles: ('instructor' | 'proctor' | 'registrar')[] }> = {
  registrar: { name: 'Petra Lindgren', roles: ['registrar'] },
  author: { name: 'Ilse Marchetti', roles: ['instructor'] },
  reviewer: { name: 'Bram Okafor', roles: ['instructor'] },
  proctor: { name: 'Mara Osei', roles: ['proctor'] },
  secondProctor: { name: 'Jun Halloran', roles: ['proctor', 'instructor'] },
};

export type Need = { extraPercent?: number; restMinutes?: number; largePrint?: boolean; reason: string };
export type Learner = { name: string; number: string; mail: boolean; need?: Need };

const people = (first: number, names: readonly string[], more: Record<string, Partial<Learner>> = {}): Learner[] =>
  names.map((name, place) => ({ name, number: `KR-${first + place}`, mail: true, ...more[name] }));

/** Three classes, forty-one learners: names of one word, accents, some without e-mail, some with accommodations. */
export const classes: readonly { name: string; title: string; learners: Learner[] }[] = [
  {
    name: 'E2-A', title: 'Electrician, second period, morning',
    learners: people(20380, [
      'Adaeze Abara', 'Hana Amari', 'Casper Brandt', 'Fabio Castellan', 'Gaëlle Dufresne', 'Ivar Eklund', 'Kira Ferrante', 'Viola Gantry',
      'Wes Holloway', 'Yrjö Ilves', 'Zara Jessop', 'Ulrike Kowal', 'Suharto', 'Dorota Varga',
    ], {
      'Hana Amari': { need: { restMinutes: 20, reason: 'Letter of the school nurse, on file.' } },
      'Fabio Castellan': { mail: false },
      Suharto: { mail: false },
      'Yrjö Ilves': { need: { extraPercent: 25, reason: 'Assessment of the learning centre, on file.' } },
    }),
  },
  {
    name: 'E2-B', title: 'Electrician, second period, afternoon',
    learners: people(20420, [
      'Oriel Tamsin Vance', 'Malin Lindqvist', 'Tobi Okoye', 'Jelena Petrov', 'Edda Quill', 'Rune Rasmussen', 'Naoko Sato', 'Lewis Thorne',
      'Sora Ueda', 'Piers Whitlock', 'Deniz Yılmaz', 'Britta Zeller', 'Anouk Beaulieu',
    ], {
      'Edda Quill': { need: { extraPercent: 25, reason: 'Assessment of the learning centre, on file.' } },
      'Rune Rasmussen': { mail: false },
      'Sora Ueda': { need: { largePrint: true, reason: 'Low vision.' } },
    }),
  },
  {
    name: 'E3-A', title: 'Electrician, third period',
    learners: people(20210, [
      'Aldo Bianchi', 'Chidi Eze', 'Ffion Griffith', 'Goran Horvat', 'Ingrid Jónsdóttir', 'Kofi Mensah', 'Lucía Navarro', 'Matthias Ödegaard',
      'Noor Rahimi', 'Priya Sandhu', 'Quentin Tremblay', 'Rosa Ugarte', 'Stellan Vik', 'Wanda Xavier',
    ], { 'Goran Horvat': { mail: false }, 'Noor Rahimi': { need: { extraPercent: 50, restMinutes: 15, reason: 'Assessment of the learning centre, on file.' } } }),
  },
];

/** "Gaëlle Dufresne" → gaelle.dufresne@kettleridge.test. */
export const addressOf = (name: string): string =>
  `${name.normalize('NFKD').replace(/ı/g, 'i').replace(/ø|Ø/g, 'o').replace(/[\u0300-\u036f]/g, '').toLowerCase().replace(/[^a-z]+/g, '.')}@${school.domain}`;
