/** The people of the demo; all invented. */
export const DEMO_SCHOOL = { name: 'Brackenfell School', timeZone: 'Europe/Dublin' } as const;

/** One password for everybody, so that each role can be tried at once. */
export const DEMO_PASSWORD = 'slate and paper';

export interface DemoPerson {
  readonly name: string;
  readonly role: 'admin' | 'teacher' | 'student';
  /** An address, or a user name in the class without e-mail. */
  readonly signInName: string;
}

export interface DemoStudent extends DemoPerson {
  readonly alias: string;
  /** Chance of a derivation without a slip. */
  readonly care: number;
  /** Chance of finding the first fault, or seeing that there is none. */
  readonly eye: number;
  /** How sure this person says to be, in tenths. */
  readonly sureness: readonly [from: number, to: number];
}

const address = (name: string) => `${name}@brackenfell.example`;

export const ADMIN: DemoPerson = { name: 'Henrike Solvang', role: 'admin', signInName: address('henrike.solvang') };
export const MIRA: DemoPerson = { name: 'Mira Castellan', role: 'teacher', signInName: address('mira.castellan') };
export const ILSE: DemoPerson = { name: 'Ilse Varga', role: 'teacher', signInName: address('ilse.varga') };
/** Helps in one class; for the school an assistant is nobody special. */
export const TOBIAS: DemoPerson = { name: 'Tobias Renn', role: 'student', signInName: address('tobias.renn') };

type Row = readonly [name: string, signIn: string, alias: string, care: number, eye: number, from: number, to: number];

function toStudents(rows: readonly Row[]): DemoStudent[] {
  return rows.map(([name, signInName, alias, care, eye, from, to]) => ({
    name,
    role: 'student',
    signInName,
    alias,
    care,
    eye,
    sureness: [from, to],
  }));
}

/** Class 10C, by e-mail. */
export const STUDENTS_10C = toStudents([
  ['Noor Haddadin', address('noor.haddadin'), 'Flint Heron', 0.75, 0.9, 5, 8],
  ['Tomasz Wierzba', address('tomasz.wierzba'), 'Copper Lathe', 0.35, 0.5, 3, 6],
  ['Amelie Rouvray', address('amelie.rouvray'), 'Quiet Kestrel', 0.45, 0.75, 4, 7],
  ['Kwabena Dartey', address('kwabena.dartey'), 'Linen Brook', 0.85, 0.95, 6, 8],
  ['Vy Truong', address('vy.truong'), 'Tidal Compass', 0.9, 0.9, 5, 8],
  ['Rafael Quintanilha', address('rafael.quintanilha'), 'Birch Lantern', 0.45, 0.3, 5, 8],
  ['Saskia Overbeek', address('saskia.overbeek'), 'Umber Otter', 0.65, 0.6, 2, 5],
  ['Deniz Karahan', address('deniz.karahan'), 'Chalk Harbour', 0.55, 0.45, 2, 6],
  ['Hana Mizukoshi', address('hana.mizukoshi'), 'Silver Wren', 0.85, 0.85, 4, 8],
  ['Oskar Lindqvell', address('oskar.lindqvell'), 'Pewter Loom', 0.55, 0.4, 3, 7],
  ['Priya Anantharam', address('priya.anantharam'), 'Indigo Prism', 0.75, 0.7, 3, 7],
  ['Mateo Larrondo', address('mateo.larrondo'), 'Hazel Ferry', 0.45, 0.2, 4, 8],
  ['Yael Rosenthaler', address('yael.rosenthaler'), 'Calm Cairn', 0.75, 0.65, 3, 6],
  ['Finnian Corrigall', address('finnian.corrigall'), 'Misty Rudder', 0.45, 0.35, 1, 4],
]);

/** Class 9A, by user name. */
export const STUDENTS_9A = toStudents([
  ['Zofia Malkowicz', 'zofia.m', 'Amber Kiln', 0.45, 0.8, 4, 8],
  ['Ibrahim Senghore', 'ibrahim.s', 'Slate Plover', 0.85, 0.9, 5, 8],
  ['Luca Bertagnoli', 'luca.b', 'Ochre Mill', 0.45, 0.25, 4, 8],
  ['Aroha Tepania', 'aroha.t', 'Pine Swift', 0.75, 0.7, 3, 6],
  ['Jonas Ebbesvik', 'jonas.e', 'North Weir', 0.55, 0.4, 2, 6],
  ['Meixin Laoshi', 'meixin.l', 'Rowan Gauge', 0.9, 0.95, 6, 8],
  ['Elif Sarikaya', 'elif.s', 'Sandy Shore', 0.65, 0.6, 3, 7],
  ['Callum Strathairn', 'callum.s', 'Iron Thistle', 0.45, 0.3, 2, 5],
  ['Anais Delacombe', 'anais.d', 'Maple Reed', 0.65, 0.55, 3, 6],
  ['Viktor Radoslavin', 'viktor.r', 'Even Dial', 0.55, 0.5, 4, 7],
]);

/** Those whom the sign-in page and `npm start` offer, with what else is worth saying of them. */
export const DEMO_ACCOUNTS: readonly DemoPerson[] = [
  MIRA,
  ILSE,
  TOBIAS,
  ADMIN,
  ...STUDENTS_10C.slice(0, 3),
  ...STUDENTS_9A.slice(0, 1),
];
