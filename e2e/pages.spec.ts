import { expect, test, type BrowserContext, type Page } from '@playwright/test';
import { DEMO, read, signedIn } from './support/demo.ts';
import { lookAt, type Look } from './support/page-check.ts';
import type { BoardAnswer, RoundListItem, Stage } from '../shared/schemas/round.ts';
import type { TodayAnswer } from '../shared/schemas/today.ts';

// Every page of the router, for each kind of person who meets it, in the demo as it is seeded.
test.describe.configure({ mode: 'parallel', timeout: 300_000 });

const NOWHERE = '00000000-0000-4000-8000-000000000000';

const tab = (name: string) => (page: Page) => page.getByRole('tab', { name: new RegExp(`^${name}`) }).click();
const press =
  (name: string | RegExp, exact = true) =>
  (page: Page) =>
    page.getByRole('button', { name, exact }).first().click();
const openDialog = (name: string | RegExp) => async (page: Page) => {
  await press(name)(page);
  await expect(page.getByRole('dialog').or(page.getByRole('alertdialog'))).toBeVisible();
};
const withField = (page: Page) => expect(page.locator('math-field').first()).toBeVisible();

async function look(context: BrowserContext, baseURL: string | undefined, looks: readonly Look[]): Promise<void> {
  await lookAt(await context.newPage(), String(baseURL), looks);
  await context.close();
}

test('pages for everyone', async ({ browser, baseURL }) => {
  const context = await browser.newContext({ baseURL });
  const answers = [401];
  await look(context, baseURL, [
    { name: 'sign in', address: '/signin', refused: answers },
    {
      name: 'sign in, refused',
      address: '/signin',
      refused: [401, 422],
      act: async (page) => {
        await page.getByRole('button', { name: 'Sign in', exact: true }).click();
        await expect(page.locator('[aria-invalid]').first()).toBeVisible();
      },
    },
    { name: 'join with a code', address: '/signup', refused: answers },
    { name: 'ask for a way back', address: '/reset', refused: answers },
    { name: 'a reset link that is over', address: `/reset/${'x'.repeat(43)}`, refused: [401, 404, 410] },
    { name: 'an invitation that is over', address: `/join/${'x'.repeat(43)}`, refused: [401, 404, 410] },
    { name: 'an address that is over', address: `/account/email/${'x'.repeat(43)}`, refused: [401, 404, 410] },
    { name: 'sent to sign in', address: '/tasks', refused: answers },
    { name: 'the parts', address: '/parts', refused: answers },
    {
      name: 'the mailbox',
      address: '/mailbox',
      refused: answers,
      act: (page) => page.getByRole('list', { name: 'Letters' }).getByRole('button').first().click(),
    },
  ]);
});

/** A round of each stage. */
async function roundsOf(context: BrowserContext): Promise<Map<Stage, RoundListItem>> {
  const all = await read<RoundListItem[]>(context, '/rounds');
  return new Map(all.map((round) => [round.stage, round]));
}

/** Somebody's derivation in a round. */
async function derivationIn(context: BrowserContext, round: RoundListItem | undefined): Promise<string> {
  const { people } = await read<BoardAnswer>(context, `/rounds/${round?.id}/board`);
  const id = people.find(({ derivationId }) => derivationId !== null)?.derivationId;
  expect(id).toBeTruthy();
  return `/derivations/${id}`;
}

test('a teacher’s rounds, derivations and disputes', async ({ browser, baseURL }) => {
  const context = await signedIn(browser, String(baseURL), DEMO.teacher);
  const rounds = await roundsOf(context);
  const at = (stage: Stage) => `/rounds/${rounds.get(stage)?.id}`;
  const disputes = await read<{ disputeId: string; kind: string }[]>(context, '/disputes');
  const kinds = new Map(disputes.map((each) => [each.kind, each.disputeId]));
  expect(disputes.length).toBeGreaterThan(0);
  await look(context, baseURL, [
    { name: 'today', address: '/' },
    { name: 'all settled rounds', address: '/', act: press('Show all settled rounds') },
    ...(['planned', 'writing', 'reviewing', 'answering', 'settled'] as const).map((stage) => ({
      name: `the board, ${stage}`,
      address: at(stage),
    })),
    { name: 'settings of a planned round', address: `${at('planned')}?settings` },
    { name: 'settings of a running round', address: `${at('reviewing')}?settings` },
    { name: 'moving a round on', address: at('writing'), act: openDialog('Open reviewing now') },
    { name: 'more time', address: at('writing'), act: openDialog('Give more time') },
    { name: 'planning a round', address: '/rounds/new' },
    { name: 'a derivation under review', address: await derivationIn(context, rounds.get('reviewing')) },
    { name: 'a settled derivation', address: await derivationIn(context, rounds.get('settled')) },
    ...[...kinds].map(([kind, id]) => ({ name: `a dispute: ${kind}`, address: `/disputes?case=${id}` })),
    {
      name: 'a dispute being ruled',
      address: '/disputes',
      act: (page) => page.locator('.rulings label').first().click(),
    },
    { name: 'standings', address: '/standings' },
    { name: 'no such page', address: '/nowhere' },
    { name: 'no such round', address: `/rounds/${NOWHERE}`, refused: [404] },
    { name: 'no such derivation', address: `/derivations/${NOWHERE}`, refused: [404] },
    { name: 'no such class', address: `/classes/${NOWHERE}`, refused: [404] },
    { name: 'no such task', address: `/tasks/${NOWHERE}`, refused: [404] },
  ]);
});

test('a teacher’s classes and tasks', async ({ browser, baseURL }) => {
  const context = await signedIn(browser, String(baseURL), DEMO.teacherWithoutMail);
  const [mine] = await read<{ id: string }[]>(context, '/classes');
  const [task] = await read<{ id: string }[]>(context, '/tasks');
  const inClass = `/classes/${mine?.id}`;
  await look(context, baseURL, [
    { name: 'classes', address: '/classes' },
    { name: 'a new class', address: '/classes', act: press('New class') },
    { name: 'people of a class', address: inClass },
    { name: 'ways into a class', address: inClass, act: tab('Ways in') },
    { name: 'people kept apart', address: inClass, act: tab('Keep apart') },
    { name: 'settings of a class', address: inClass, act: tab('Settings') },
    { name: 'removing somebody', address: inClass, act: openDialog(/^Remove /) },
    { name: 'tasks', address: '/tasks' },
    { name: 'a new task', address: '/tasks/new', act: withField },
    { name: 'a task', address: `/tasks/${task?.id}`, act: withField },
    { name: 'account', address: '/account' },
    { name: 'help', address: '/help' },
  ]);
});

test('an assistant’s and an admin’s pages', async ({ browser, baseURL }) => {
  const assistant = await signedIn(browser, String(baseURL), DEMO.assistant);
  const rounds = await roundsOf(assistant);
  await look(assistant, baseURL, [
    { name: 'an assistant’s today', address: '/' },
    { name: 'an assistant’s board', address: `/rounds/${rounds.get('writing')?.id}` },
    { name: 'an assistant’s desk', address: '/disputes' },
    { name: 'an assistant’s standings', address: '/standings' },
    { name: 'an assistant’s account', address: '/account' },
  ]);
  await look(await signedIn(browser, String(baseURL), DEMO.admin), baseURL, [
    { name: 'an admin at the start', address: '/' },
    { name: 'people of the school', address: '/admin' },
    { name: 'the school', address: '/admin', act: tab('School') },
    { name: 'the trail', address: '/admin', act: tab('Trail') },
    { name: 'disabling somebody', address: '/admin', act: openDialog(/^Disable /) },
    ...['/classes', '/tasks', '/rounds/new', '/disputes', '/standings', '/account'].map((address) => ({
      name: `an admin at ${address}`,
      address,
      refused: [403],
    })),
  ]);
});

/** The addresses of what a student has to do. */
async function thingsOf(context: BrowserContext, who: string): Promise<Look[]> {
  const { things } = await read<TodayAnswer>(context, '/today');
  return things.flatMap((thing): Look[] => {
    const name = (what: string) => `${what} of ${who}, round ${thing.number}`;
    if (thing.kind === 'write')
      return [{ name: name('the sheet'), address: `/rounds/${thing.roundId}/write`, act: withField }];
    if (thing.kind === 'answer')
      return [{ name: name('findings to answer'), address: `/derivations/${thing.derivationId}` }];
    const reviews = thing.reviews.slice(0, 2).map(({ reviewId }, i) => ({
      name: name(`review ${i + 1}`),
      address: `/reviews/${reviewId}`,
    }));
    if (thing.kind === 'review' || !thing.own) return reviews;
    const own = { name: name('the verdict'), address: `/derivations/${thing.own.derivationId}` };
    return [own, ...reviews];
  });
}

test('a student’s pages', async ({ browser, baseURL }) => {
  const context = await signedIn(browser, String(baseURL), DEMO.student);
  const things = await thingsOf(context, 'Noor');
  const { things: due } = await read<TodayAnswer>(context, '/today');
  const review = due.find(({ kind }) => kind === 'review');
  expect(new Set(due.map(({ kind }) => kind))).toEqual(new Set(['write', 'review', 'look']));
  const open = things.find(({ name }) => name.startsWith('review 1'));
  await look(context, baseURL, [
    { name: 'a student’s today', address: '/' },
    ...things,
    {
      name: 'a step picked and a term marked',
      address: String(open?.address),
      act: async (page) => {
        const first = page.getByRole('radio', { name: /^step 1, from/ });
        await first.focus();
        await first.press('Enter');
        await first.press('ArrowRight');
        await withField(page);
      },
    },
    { name: 'a sheet that was handed in', address: `/rounds/${review?.roundId}/write` },
    { name: 'a student’s standings', address: '/standings' },
    { name: 'a student’s account', address: '/account' },
    { name: 'a student’s help', address: '/help' },
    // The board is not theirs: they go on to what the round asks of them.
    { name: 'the round of a letter', address: `/rounds/${review?.roundId}`, refused: [404] },
    { name: 'no such review', address: `/reviews/${NOWHERE}`, refused: [404] },
    { name: 'no such sheet', address: `/rounds/${NOWHERE}/write`, refused: [404] },
    ...['/admin', '/classes', '/tasks', '/tasks/new', '/rounds/new', '/disputes', `/classes/${NOWHERE}`].map(
      (address) => ({ name: `a student at ${address}`, address, refused: [403, 404] }),
    ),
  ]);
});

test('other students’ pages', async ({ browser, baseURL }) => {
  const other = await signedIn(browser, String(baseURL), DEMO.otherStudent);
  const things = await thingsOf(other, 'Amelie');
  const faulty = (await read<TodayAnswer>(other, '/today')).things.find(
    (thing) => thing.kind === 'look' && thing.own?.mend === 'none' && thing.own.firstFault !== null,
  );
  const address = faulty?.kind === 'look' ? `/derivations/${faulty.own?.derivationId}` : '';
  expect(address).not.toBe('');
  await look(other, baseURL, [
    { name: 'Amelie’s today', address: '/' },
    ...things,
    {
      name: 'a mend',
      address,
      act: async (page) => {
        await press('Mend it')(page);
        await withField(page);
      },
    },
    { name: 'contesting', address, act: openDialog('Contest this verdict') },
  ]);
  const answering = await signedIn(browser, String(baseURL), DEMO.studentWhoAnswers);
  const findings = (await thingsOf(answering, 'Tomasz')).filter(({ name }) => name.startsWith('findings'));
  expect(findings.length).toBeGreaterThan(0);
  await look(answering, baseURL, findings);
  const young = await signedIn(browser, String(baseURL), DEMO.studentWithoutMail);
  await look(young, baseURL, [
    { name: 'Zofia’s today', address: '/' },
    ...(await thingsOf(young, 'Zofia')),
    { name: 'Zofia’s standings', address: '/standings' },
    { name: 'Zofia’s account', address: '/account' },
  ]);
});
