import { execFile } from 'node:child_process';
import { randomBytes } from 'node:crypto';
import { readFileSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { promisify } from 'node:util';
import { expect, test, type Page } from '@playwright/test';
import pg from 'pg';
import { enterField, linesOf, mathsField, pasteMaths, saidIn, typeMaths } from './support/maths.ts';
import {
  ask,
  findLetter,
  followLetter,
  makeAccount,
  openPerson,
  PASSWORD,
  statusOf,
  type Person,
} from './support/person.ts';
import {
  ADMIN,
  AUTHORS,
  FIRST_TRY,
  GIVEN,
  MENDED,
  RULINGS,
  TASK,
  TEACHER,
  valueOfGiven,
  valueOfSlip,
  type Author,
  type Finding,
} from './support/story-cast.ts';

// One round, from an empty school to its standings, played in seven browsers.
test.describe.configure({ mode: 'serial', timeout: 240_000 });

const root = fileURLToPath(new URL('..', import.meta.url));
const tag = randomBytes(3).toString('hex');
const school = `Tarn Hill School ${tag}`;
const className = `8D ${tag}`;

interface Dealt {
  readonly reviewer: Person;
  readonly author: Author;
  readonly finding: Finding;
  readonly address: string;
}

let base = '';
let admin: Person;
let teacher: Person;
let students: Person[];
let roundId = '';
let classId = '';
const dealt: Dealt[] = [];
const ownAddress = new Map<string, string>();

test.beforeAll(async ({ browser, baseURL }) => {
  base = baseURL ?? '';
  const open = (name: string) =>
    openPerson(browser, base, name, `${name.toLowerCase().replace(' ', '.')}.${tag}@tarnhill.example`);
  admin = await open(ADMIN);
  teacher = await open(TEACHER);
  students = await Promise.all(AUTHORS.map(({ name }) => open(name)));
});
test.afterAll(async () => {
  for (const { context } of [admin, teacher, ...students]) await context.close();
});

const authorOf = ({ name }: Person): Author => {
  const found = AUTHORS.find((each) => each.name === name);
  if (!found) throw new Error(`${name} writes nothing`);
  return found;
};
const toDay = async ({ page }: Person) => {
  await page.goto('/');
  await expect(page.getByRole('heading', { level: 1 })).toBeVisible();
};

/** Words that stand for something a student may not know before the round is settled. */
const HIDDEN = /"(?:ruling|rulings|reached|evidence|witness|firstFault|points|decidedBy|author|reviewer)":/;

/** No student has been sent a verdict, points or somebody else's name, by the page or behind it. */
async function expectNothingLeaked(): Promise<void> {
  for (const student of students) {
    const heard = await student.heard();
    expect(heard.length).toBeGreaterThan(0);
    const others = students.filter((each) => each !== student);
    for (const body of heard) {
      expect(HIDDEN.exec(body)?.[0], `${student.name} was sent ${body}`).toBeUndefined();
      for (const { name, email } of others) {
        expect(body).not.toContain(name);
        expect(body).not.toContain(email);
      }
      for (const reason of Object.values(RULINGS)) expect(body).not.toContain(reason);
    }
  }
}

test('a school begins with one command, and its admin invites a teacher', async () => {
  const made = await promisify(execFile)(
    process.execPath,
    [
      path.join(root, 'node_modules/tsx/dist/cli.mjs'),
      'api/boot/create-school.ts',
      `--name=${school}`,
      '--time-zone=Europe/Lisbon',
      `--admin-name=${ADMIN}`,
      `--admin-email=${admin.email}`,
    ],
    {
      cwd: root,
      env: {
        ...process.env,
        BASE_URL: base,
        DATABASE_URL: readFileSync(process.env['E2E_DATABASE_FILE'] ?? '', 'utf8'),
      },
    },
  );
  const link = made.stdout.split(/\s+/).find((word) => word.startsWith(`${base}/join/`)) ?? '';

  await admin.page.goto(link);
  await expect(admin.page.getByRole('heading', { name: `Join ${school}.` })).toBeVisible();
  await expect(admin.page.getByText(`You sign in with ${admin.email}.`)).toBeVisible();
  await makeAccount(admin);
  await teacher.page.goto(link);
  await expect(teacher.page.getByRole('heading', { name: 'This link does not open.' })).toBeVisible();

  await admin.page.getByRole('link', { name: 'School', exact: true }).click();
  const { page } = admin;
  await expect(page.getByRole('heading', { name: school })).toBeVisible();
  await page.getByLabel('Name', { exact: true }).fill(TEACHER);
  await page.getByLabel('E-mail', { exact: true }).fill(teacher.email);
  await page.getByRole('button', { name: 'Send the invitation' }).click();
  await expect(page.getByText(`Invited ${TEACHER}.`)).toBeVisible();
  await followLetter(teacher, /invites you to/, base);
  await expect(teacher.page.getByText(`${school} invites you as a teacher.`)).toBeVisible();
  await makeAccount(teacher);
  await expect(teacher.page.getByRole('link', { name: 'Classes' })).toBeVisible();
  await expect(teacher.page.getByRole('link', { name: 'School', exact: true })).toBeHidden();
});

test('the teacher makes a class and writes a task', async () => {
  const { page } = teacher;
  await page.getByRole('link', { name: 'Classes' }).click();
  await page.getByRole('button', { name: 'New class' }).click();
  await page.getByLabel('Name', { exact: true }).fill(className);
  await page.getByLabel('Time zone').selectOption('Europe/Lisbon');
  await page.getByRole('button', { name: 'Make the class' }).click();
  await expect(page.getByRole('heading', { level: 1, name: className })).toBeVisible();
  classId = new URL(page.url()).pathname.split('/').at(-1) ?? '';

  await page.getByRole('link', { name: 'Tasks' }).click();
  await page.getByRole('link', { name: 'Write a task' }).first().click();
  await page.getByLabel('Title').fill(TASK);
  await enterField(mathsField(page, 'Given line'));
  await typeMaths(page, GIVEN);
  await page.getByLabel('Goal').selectOption({ label: 'Expanded: multiplied out and collected' });
  await page.getByLabel('Notes for the class').fill('One line for each thing that you do.');
  await page.getByRole('button', { name: 'Keep this task' }).click();
  await expect(page.getByText('The task is in your collection.')).toBeVisible();
  await expect(page.getByRole('heading', { level: 1, name: TASK })).toBeVisible();
});

test('five students ask to join with the class code, and the teacher lets them in', async () => {
  const { page } = teacher;
  await page.goto(`/classes/${classId}`);
  await page.getByRole('tab', { name: 'Ways in' }).click();
  const code = await page.getByRole('textbox', { name: 'Class code' }).inputValue();
  await Promise.all(students.map((student) => signUp(student, code)));
  // Nobody is in by the code alone.
  expect(await ask<{ classes: unknown[] }>(students[0] as Person, '/me')).toMatchObject({ classes: [] });

  await page.goto(`/classes/${classId}`);
  for (const { name } of students) {
    await page.getByRole('button', { name: `Let in ${name}` }).click();
    await expect(page.getByRole('button', { name: `Let in ${name}` })).toBeHidden();
  }
  const people = page.getByRole('table', { name: 'People of the class' });
  for (const { name, email } of students) {
    await expect(people.getByRole('row').filter({ hasText: name })).toContainText(email);
  }
  for (const student of students) {
    await toDay(student);
    await expect(student.page.getByText('No round is running for you')).toBeVisible();
    await expect(student.page.getByRole('link', { name: 'Classes' })).toBeHidden();
    expect(await statusOf(student, `/classes/${classId}`)).toBe(403);
  }
});

async function signUp(student: Person, code: string): Promise<void> {
  const { page, email } = student;
  await page.goto('/signup');
  await page.getByLabel('Class code').fill(code);
  await page.getByRole('button', { name: 'Go on' }).click();
  await expect(page.getByRole('heading', { name: `Join ${className}.` })).toBeVisible();
  await page.getByLabel('School e-mail').fill(email);
  await page.getByRole('button', { name: 'Send the link' }).click();
  await expect(page.getByRole('heading', { name: 'Look into your mail.' })).toBeVisible();
  await followLetter(student, /Make your account/, base);
  await expect(page.getByText('Your teacher lets you in.')).toBeVisible();
  await makeAccount(student);
}

test('a student signs out, and in again', async () => {
  const { page, email, name } = students[0] as Person;
  await page.getByRole('link', { name: new RegExp(name) }).click();
  await page.getByRole('button', { name: 'Sign out here' }).click();
  await expect(page.getByRole('heading', { name: 'Find the first slip.' })).toBeVisible();
  await page.goto(`/classes/${classId}`);
  await expect(page.getByLabel('E-mail or user name')).toBeVisible();
  await page.goto('/signin');
  await page.getByLabel('E-mail or user name').fill(email);
  await page.getByLabel('Password', { exact: true }).fill(`${PASSWORD}!`);
  await page.getByRole('button', { name: 'Sign in', exact: true }).click();
  await expect(page.getByRole('alert')).toBeVisible();
  await page.getByLabel('Password', { exact: true }).fill(PASSWORD);
  await page.getByRole('button', { name: 'Sign in', exact: true }).click();
  await expect(page.getByText('No round is running for you')).toBeVisible();
});

/** Moves the round on by hand and returns what the dialog says it will do. */
async function moveOn(act: string, confirm = act): Promise<string> {
  const { page } = teacher;
  await page.goto(`/rounds/${roundId}`);
  await page.getByRole('button', { name: act, exact: true }).first().click();
  const dialog = page.getByRole('dialog');
  await expect(dialog.getByRole('list', { name: 'What it will do' })).toBeVisible();
  const words = await saidIn(dialog);
  await dialog.getByRole('button', { name: confirm, exact: true }).click();
  await expect(dialog).toBeHidden();
  return words;
}

test('the teacher plans a round and opens it by hand', async () => {
  const { page } = teacher;
  await page.goto(`/classes/${classId}`);
  await page.getByRole('link', { name: 'Plan a round' }).click();
  await expect(page.getByLabel('Class', { exact: true })).toHaveValue(classId);
  await expect(page.getByLabel('Task').locator('option:checked')).toHaveText(TASK);
  await expect(page.getByLabel('Reviews of each derivation')).toHaveValue('2');
  await page.getByRole('button', { name: 'Plan this round' }).click();
  await expect(page.getByRole('region', { name: 'What will happen' })).toContainText('5 will be asked to write');
  roundId = new URL(page.url()).pathname.split('/').at(-1) ?? '';
  for (const student of students) {
    expect(await ask<{ things: unknown[] }>(student, '/today')).toMatchObject({ things: [], waiting: [] });
  }

  const effects = await moveOn('Open now');
  expect(effects).toContain('The task is fixed as it stands now.');
  expect(effects).toContain('Writing opens for 5 people.');
  await expect(page.getByText('Writing is open.')).toBeVisible();
  await Promise.all(students.map((student) => findLetter(student, /^Writing is open/)));
});

/** Writes a derivation on the sheet, Enter after each line. */
async function write(page: Page, lines: readonly string[]): Promise<void> {
  for (const [i, line] of lines.entries()) {
    const field = mathsField(page, `line ${i + 1}`);
    await expect(field).toBeVisible();
    if (i === 0) await enterField(field);
    await expect(field).toBeFocused();
    // An open bracket would be closed by the field as it is typed, and stays open when it is pasted.
    if (line.split('(').length > line.split(')').length) await pasteMaths(page, line);
    else await typeMaths(page, line);
    if (i < lines.length - 1) await page.keyboard.press('Enter');
  }
}

async function handIn(page: Page, lines: readonly string[]): Promise<void> {
  await page.getByRole('button', { name: 'Hand in your derivation' }).click();
  const dialog = page.getByRole('dialog', { name: 'Hand in your derivation?' });
  const posted = dialog.getByRole('listitem');
  await expect(posted).toHaveCount(lines.length + 1);
  for (const [i, line] of [GIVEN, ...lines].entries()) expect(await saidIn(posted.nth(i))).toContain(line);
  await dialog.getByRole('button', { name: 'Hand in', exact: true }).click();
  await expect(page.getByRole('button', { name: 'Take it back and go on writing' })).toBeVisible();
}

test('each writes on the sheet and hands in; one takes it back and hands in again', async () => {
  for (const student of students) {
    const { page } = student;
    const { lines, name } = authorOf(student);
    await toDay(student);
    await page.getByRole('link', { name: 'Write your derivation' }).click();
    await expect(page.getByText('One line for each thing that you do.')).toBeVisible();
    const isFirstTry = name === 'Lumi Szabo';
    const typed = isFirstTry ? FIRST_TRY : lines;
    await write(page, typed);
    if (name === 'Piet Harrowgate') await expect(page.getByText('Line 1 cannot be read.').first()).toBeVisible();
    await handIn(page, typed);
    if (isFirstTry) {
      await page.getByRole('button', { name: 'Take it back and go on writing' }).click();
      await expect(page.getByRole('button', { name: 'Hand in your derivation' })).toBeVisible();
      await rewrite(page, lines);
      await handIn(page, lines);
    }
    await expect(page.locator('main')).not.toContainText(/does not follow|first fault|correct|wrong/i);
  }
  await teacher.page.goto(`/rounds/${roundId}`);
  await expect(teacher.page.getByRole('region', { name: 'How everyone stands' })).toContainText('5 handed in');
  await expectNothingLeaked();
});

/** Replaces what stands on the lines, one after the other. */
async function rewrite(page: Page, lines: readonly string[]): Promise<void> {
  for (const [i, line] of lines.entries()) {
    const field = mathsField(page, `line ${i + 1}`);
    const enter = page.getByRole('button', { name: `Write on line ${i + 1}`, exact: true });
    await expect(field.or(enter)).toBeVisible();
    if (!(await field.isVisible())) await enter.press('Enter');
    await enterField(field);
    await page.keyboard.press('Control+a');
    await typeMaths(page, line);
  }
}

test('reviewing is opened by hand: each is dealt two derivations, never their own', async () => {
  const effects = await moveOn('Open reviewing now');
  expect(effects).toContain('5 derivations are dealt, 2 reviews for each reviewer.');
  await expect(teacher.page.getByText('The derivations are dealt.')).toBeVisible();
  const seen = new Map<string, number>();
  for (const reviewer of students) {
    const { page } = reviewer;
    await toDay(reviewer);
    await expect(page.getByRole('link', { name: 'Review two derivations' })).toBeVisible();
    for (const address of await reviewAddresses(reviewer)) {
      await page.goto(address);
      const derivation = page.getByRole('list', { name: 'The derivation, step by step' });
      await expect(derivation).toBeVisible();
      const lines = (await linesOf(derivation)).slice(1);
      const author = AUTHORS.find((each) => each.lines.join(' ; ') === lines.join(' ; '));
      if (!author) throw new Error(`Nobody wrote ${lines.join(' ; ')}`);
      expect(author.name).not.toBe(reviewer.name);
      const place = seen.get(author.name) ?? 0;
      seen.set(author.name, place + 1);
      dealt.push({ reviewer, author, finding: author.findings[place] as Finding, address });
    }
  }
  expect([...seen.values()]).toEqual([2, 2, 2, 2, 2]);
  // Nobody reviews whoever reviews them.
  const pairs = new Set(dealt.map(({ reviewer, author }) => `${reviewer.name} ${author.name}`));
  for (const { reviewer, author } of dealt) expect(pairs.has(`${author.name} ${reviewer.name}`)).toBe(false);
});

async function reviewAddresses(reviewer: Person): Promise<string[]> {
  const { things } = await ask<{ things: { kind: string; reviews: { reviewId: string }[] }[] }>(reviewer, '/today');
  const found = things.find(({ kind }) => kind === 'review')?.reviews ?? [];
  expect(found).toHaveLength(2);
  return found.map(({ reviewId }) => `/reviews/${reviewId}`);
}

/** The step on which the Tab key first stops, reached by that key. */
async function tabToSteps(page: Page): Promise<void> {
  const isOnStep = () =>
    page.evaluate(() => document.activeElement?.matches('input[type=radio][name^=step-]') ?? false);
  await page.getByRole('main').focus();
  for (let presses = 0; presses < 30 && !(await isOnStep()); presses += 1) await page.keyboard.press('Tab');
  expect(await isOnStep()).toBe(true);
}

async function makeFinding(page: Page, { pick, sure, kind, shouldBe, why }: Finding, steps: number): Promise<void> {
  const step = (number: number) => page.getByRole('radio', { name: new RegExp(`^step ${number}, from`) });
  await tabToSteps(page);
  for (let number = 2; number <= steps; number += 1) await page.keyboard.press('ArrowDown');
  await expect(step(steps)).toBeFocused();
  if (typeof pick === 'number') {
    for (let number = steps; number > pick; number -= 1) await page.keyboard.press('ArrowUp');
    await page.keyboard.press('Enter');
    await expect(step(pick)).toBeChecked();
    // The last term of the line.
    await page.keyboard.press('ArrowLeft');
  } else if (pick === 'none') {
    await page.getByRole('button', { name: 'There is no fault' }).press('Enter');
    await expect(page.getByText('You say that every step follows.')).toBeVisible();
  }
  if (kind) {
    await page.getByRole('radio', { name: new RegExp(`^${kind}`) }).press('Space');
    await expect(page.getByRole('radio', { name: new RegExp(`^${kind}`) })).toBeChecked();
  }
  if (shouldBe) {
    await enterField(mathsField(page, `What line ${pick} should have been`));
    await typeMaths(page, shouldBe);
  }
  await page.getByLabel('Why', { exact: true }).fill(why);
  const slider = page.getByRole('slider', { name: /How sure are you/ });
  await slider.press('Home');
  for (let place = 0; place < sure; place += 1) await slider.press('ArrowRight');
  await expect(slider).toHaveValue(String(sure));
  if (typeof pick === 'number') await expect(page.getByText('This step is it')).toBeVisible();
}

test('each reviews two derivations by keyboard, and sees nothing of what others find', async () => {
  for (const { reviewer, author, finding, address } of dealt) {
    const { page } = reviewer;
    await page.goto(address);
    await expect(page.getByRole('heading', { level: 1, name: TASK })).toBeVisible();
    const main = page.getByRole('main');
    for (const { why } of author.findings) await expect(main).not.toContainText(why);
    await makeFinding(page, finding, author.lines.length);
    if (finding.shouldBe) {
      await expect(main).not.toContainText(/follows from the line above|does not follow either/);
      expect(await saidIn(main)).toContain(author.name === 'Milo Brandvold' ? 'You marked -4x' : 'You marked +15');
    }
    await page.getByRole('button', { name: finding.sure === 0 ? 'Hand in “can’t tell”' : 'Hand in finding' }).click();
    await expect(page.getByText('Handed in.', { exact: true })).toBeVisible();
  }
  const [again] = dealt;
  if (!again) throw new Error('Nothing was dealt');
  const { page } = again.reviewer;
  await page.goto(again.address);
  await page.getByRole('button', { name: 'Take it back' }).click();
  await expect(page.getByText('Handed in.', { exact: true })).toBeHidden();
  await page.getByRole('button', { name: /^Hand in/ }).click();
  await expect(page.getByText('Handed in.', { exact: true })).toBeVisible();

  const [one, other] = [dealt[0], dealt.find(({ reviewer }) => reviewer !== again.reviewer)];
  if (one && other) expect(await statusOf(one.reviewer, other.address)).toBe(404);
  await teacher.page.goto(`/rounds/${roundId}`);
  await expect(teacher.page.getByRole('region', { name: 'How everyone stands' })).toContainText('10');
  await expectNothingLeaked();
});

test('authors read their findings without names or points, and accept or contest them', async () => {
  expect(await moveOn('Open answering now')).toContain('Authors see 10 findings, without names.');
  for (const student of students) {
    const { page } = student;
    const { findings } = authorOf(student);
    const asked = findings.filter(({ pick }) => typeof pick === 'number');
    if (asked.length > 0) {
      await toDay(student);
      await page.getByRole('link', { name: /^Answer (one|two) findings?$/ }).click();
      await expect(page.getByRole('heading', { name: 'What your two reviewers found' })).toBeVisible();
      ownAddress.set(student.name, new URL(page.url()).pathname);
      await findLetter(student, /^Findings on your derivation/);
    } else {
      await toDay(student);
      await expect(page.getByText(/Nothing to answer/)).toBeVisible();
    }
    for (const finding of asked) await answer(page, finding);
    const main = page.getByRole('main');
    await expect(main).not.toContainText(/points|verdict is|first fault/i);
    for (const other of students) if (other !== student) await expect(main).not.toContainText(other.name);
  }
  await expectNothingLeaked();
});

async function answer(page: Page, { why, answer: given }: Finding): Promise<void> {
  const note = page.getByRole('article').filter({ hasText: why });
  if (given === 'accept') {
    await note.getByRole('radio', { name: 'I see it: accepted' }).check();
  } else if (given) {
    await note.getByRole('radio', { name: 'I contest it' }).check();
    await note.getByLabel('Why you contest it').fill(given.contest);
    await note.getByRole('button', { name: 'Contest', exact: true }).click();
  }
  await expect(note.getByText('Saved', { exact: true })).toBeVisible();
}

test('the teacher rules by keyboard on what is contested and what is undecided', async () => {
  const { page } = teacher;
  await page.goto('/');
  await page.getByRole('link', { name: /^Disputes/ }).click();
  // Signe's contest would change nothing: the verdict answers it.
  const queue = page.getByRole('navigation', { name: 'Disputes, most people first' });
  await expect(queue.getByRole('listitem')).toHaveCount(2);
  await expect(queue.getByText('contested finding')).toBeVisible();
  await expect(queue.getByText('undecided')).toBeVisible();
  for (const left of [2, 1]) {
    const open = page.getByRole('region', { name: 'Does step 1 follow?' });
    await expect(open.getByRole('heading', { name: 'The findings' })).toBeVisible();
    for (const { name } of students) await expect(open).not.toContainText(name);
    const isContested = (await open.getByText('There is a minus before the x').count()) > 0;
    if (isContested) {
      await expect(open.getByText('Minus x times minus 4 is plus 4x.')).toBeVisible();
      expectWitness(await saidIn(open));
      await open.getByRole('button', { name: 'Show the names' }).click();
      await expect(open.getByText('Milo Brandvold').first()).toBeVisible();
      // Away from the button, so that the keys are the desk's again.
      await open.getByRole('button', { name: 'Show the names' }).waitFor({ state: 'detached' });
    } else {
      await expect(open.getByText(/could not be read/).first()).toBeVisible();
    }
    await page.keyboard.press('2');
    await expect(page.getByRole('radio', { name: /Step 1 fails/ })).toBeChecked();
    await page.keyboard.type(isContested ? RULINGS.contested : RULINGS.undecided);
    await expect(page.getByText(/scored by it when the round settles/)).toBeVisible();
    await page.keyboard.press('Enter');
    if (left > 1) await expect(queue.getByRole('listitem')).toHaveCount(left - 1);
  }
  await expect(page.getByRole('heading', { name: 'Nothing is in dispute.' })).toBeVisible();

  for (const student of students) {
    expect((await student.context.request.get('/api/disputes')).ok()).toBe(true);
    expect(await ask<unknown[]>(student, '/disputes')).toEqual([]);
    expect(await statusOf(student, `/rounds/${roundId}/board`)).toBe(404);
    const own = ownAddress.get(student.name);
    if (own) await student.page.goto(own);
    await expect(student.page.getByRole('main')).not.toContainText(/first fault|does not follow from the given/);
  }
  const [stranger, address] = [students[0], ownAddress.get('Milo Brandvold')];
  if (stranger) expect(await statusOf(stranger, String(address))).toBe(404);
  await expectNothingLeaked();
});

/** The values beside the fault are those of the given and of the author's line. */
function expectWitness(words: string): void {
  const found = /At ?x=(-?\d+) the line above is (-?\d+), this one is (-?\d+)/.exec(words);
  expect(found, words).not.toBeNull();
  const [at, above, below] = (found ?? []).slice(1).map(Number);
  expect([above, below]).toEqual([valueOfGiven(at ?? NaN), valueOfSlip(at ?? NaN)]);
  expect(above).not.toBe(below);
}

test('when the round is settled every author sees the verdict, its evidence and the findings', async () => {
  const effects = await moveOn('Settle now');
  expect(effects).toContain('The verdicts on 5 derivations and all points are shown.');
  await expect(teacher.page.getByText('The round is settled.')).toBeVisible();
  for (const student of students) {
    const { page } = student;
    const author = authorOf(student);
    await toDay(student);
    await expect(page.getByRole('link', { name: 'Look at a settled round' })).toBeVisible();
    await page.getByRole('link', { name: 'See why' }).click();
    await expect(page.getByRole('heading', { level: 1, name: author.verdict })).toBeVisible();
    for (const { why } of author.findings) await expect(page.getByText(`“${why}”`)).toBeVisible();
    const main = page.getByRole('main');
    await expect(main).not.toContainText(/[+−]\d+ points/);
    for (const other of students) if (other !== student) await expect(main).not.toContainText(other.name);
    await findLetter(student, /^Settled/);
  }
  const milo = students[1]?.page;
  const piet = students[3]?.page;
  if (!milo || !piet) throw new Error('Somebody is missing');
  const edge = milo.getByRole('list', { name: 'The derivation as it was judged' });
  expectWitness(await saidIn(edge));
  await expect(edge.getByText('first fault').first()).toBeVisible();
  await expect(edge.getByText('carried').first()).toBeVisible();
  await expect(milo.getByText(`“${RULINGS.contested}”`)).toBeVisible();
  await expect(piet.getByText(`“${RULINGS.undecided}”`)).toBeVisible();
  await expect(piet.getByText(RULINGS.contested)).toBeHidden();
});

test('reviewers see their points and why, and nobody’s name', async () => {
  for (const { reviewer, author, finding, address } of dealt) {
    const { page } = reviewer;
    await page.goto(address);
    await expect(page.getByRole('heading', { level: 1, name: finding.headline })).toBeVisible();
    const figures = page.locator('.result-figures');
    await expect(figures).toContainText(`${finding.points} points`);
    await expect(page.getByText('The checker advises, your teacher decides.')).toBeVisible();
    await expect(page.getByRole('main')).not.toContainText(author.name);
    const [first] = author.findings;
    if (author.name === 'Milo Brandvold' && finding === first) {
      await expect(page.getByText('You named the kind of slip. You marked the very term.')).toBeVisible();
      await expect(page.getByText('it follows from the line above.')).toBeVisible();
    }
  }
});

test('an author mends the derivation, and the mend is checked', async () => {
  const { page } = students[1] as Person;
  await page.goto(ownAddress.get('Milo Brandvold') ?? '');
  await page.getByRole('button', { name: 'Mend it' }).click();
  await expect(page.getByRole('heading', { name: 'Your mend' })).toBeVisible();
  // The sheet begins with the line that went wrong; the rest is written anew.
  const [first, last] = MENDED;
  await rewrite(page, [first]);
  await page.keyboard.press('Enter');
  await expect(mathsField(page, 'line 2')).toBeFocused();
  await typeMaths(page, last);
  await page.getByRole('button', { name: 'Have the mend checked' }).click();
  await expect(page.getByRole('heading', { name: 'The mend holds: every step follows.' })).toBeVisible({
    timeout: 60_000,
  });
  await toDay(students[1] as Person);
  await expect(page.getByText('Yours: first fault at step 1, mended')).toBeVisible();
});

test('the standings say why there is no list, and show everyone their own line alone', async () => {
  const { page } = students[0] as Person;
  await toDay(students[0] as Person);
  await page.getByRole('link', { name: 'Standings' }).click();
  await expect(page.getByText(/You, as \w+/)).toBeVisible();
  await letTwoDaysPass();
  await expect(async () => {
    await page.reload();
    await expect(page.getByText('There is no list while fewer than eight people have four findings each.')).toBeVisible(
      { timeout: 3_000 },
    );
  }).toPass({ timeout: 60_000 });
  await expect(page.getByRole('table')).toBeHidden();
  for (const other of students.slice(1)) await expect(page.getByRole('main')).not.toContainText(other.name);
  await teacher.page.goto(`/standings?class=${classId}`);
  await expect(teacher.page.getByText('There is no list while fewer than eight people')).toBeVisible();
  await expect(teacher.page.getByText(/You, as/)).toBeHidden();
});

/** As far as the list is concerned, which is never made within a day of a settling; its job then runs at once. */
async function letTwoDaysPass(): Promise<void> {
  const client = new pg.Client({ connectionString: readFileSync(process.env['E2E_DATABASE_FILE'] ?? '', 'utf8') });
  await client.connect();
  try {
    await client.query(`update round set settled_at = settled_at - interval '2 days' where id = $1`, [roundId]);
    await client.query(`insert into pgboss.job (name, data) values ('standings-sheets', '{}')`);
  } finally {
    await client.end();
  }
}

test('no page has failed or asked anything of another host', () => {
  for (const { name, complaints } of [admin, teacher, ...students]) expect(complaints, name).toEqual([]);
});
