import { randomBytes } from 'node:crypto';
import AxeBuilder from '@axe-core/playwright';
import { expect, request, test, type APIRequestContext, type Page } from '@playwright/test';

type Json = Record<string, unknown>;

let teacher: APIRequestContext;
let student: APIRequestContext;
let classId: string;
let taskId: string;
let address: string;

async function post(caller: APIRequestContext, path: string, data: Json): Promise<Json> {
  const answer = await caller.post(`/api${path}`, { data });
  expect(answer.ok(), `${path}: ${answer.status()} ${await answer.text()}`).toBe(true);
  return (await answer.text()) === '' ? {} : ((await answer.json()) as Json);
}

const inHours = (hours: number) => new Date(Date.now() + hours * 3_600_000).toISOString();

/** A class of its own with one student, and a task; every test opens a round of its own. */
test.beforeAll(async ({ baseURL }) => {
  const caller = () => request.newContext({ baseURL, extraHTTPHeaders: { origin: baseURL ?? '' } });
  const accounts = (await (await (await caller()).get('/api/demo/accounts')).json()) as Json[];
  const demo = accounts.find(({ what }) => String(what).includes('teacher'));
  teacher = await caller();
  await post(teacher, '/session', { name: demo?.['signInName'], password: demo?.['password'] });
  const name = `Sheets ${randomBytes(4).toString('hex')}`;
  const { id } = await post(teacher, '/classes', { name, timeZone: 'Europe/Lisbon', hasEmail: false });
  classId = String(id);
  const ofClass = async () => (await (await teacher.get(`/api/classes/${classId}`)).json()) as Json;
  student = await caller();
  await post(student, '/sign-up/by-name', {
    code: (await ofClass())['joinCode'],
    name: 'Ines Falk',
    userName: `ines${randomBytes(4).toString('hex')}`,
    password: 'a bench of oak and slate',
  });
  const [asked] = (await ofClass())['requests'] as Json[];
  await post(teacher, `/classes/${classId}/requests/${String(asked?.['id'])}`, { accept: true });
  const task = await post(teacher, '/tasks', {
    title: 'Two brackets',
    instructions: '',
    given: '(x+4)(x-7)',
    goal: { kind: 'expanded' },
    assumptions: [],
    settings: {},
  });
  taskId = String(task['id']);
});

test.beforeEach(async ({ context }) => {
  const plan = {
    classId,
    taskId,
    opensAt: inHours(1),
    writingEndsAt: inHours(3),
    reviewingEndsAt: inHours(5),
    answeringEndsAt: inHours(7),
    settlesAt: inHours(9),
  };
  const { id } = await post(teacher, '/rounds', plan);
  await post(teacher, `/rounds/${String(id)}/stage`, { to: 'writing' });
  address = `/rounds/${String(id)}/write`;
  await context.addCookies((await student.storageState()).cookies);
});

async function openSheet(page: Page): Promise<void> {
  await page.goto(address);
  await expect(page.locator('math-field')).toBeVisible();
}

/** Types as a person does, a key at a time, into whatever has the focus. */
const type = (page: Page, text: string) => page.keyboard.type(text, { delay: 20 });
const savedWords = (page: Page) => page.getByText(/Saved \d\d:\d\d, here and at school/);

/** What stands on each line, as TeX: the live field's value, or the annotation of the set maths. */
async function lines(page: Page): Promise<string[]> {
  return await page.locator('.sheet-line').evaluateAll((items) =>
    items.map((item) => {
      const field = item.querySelector('math-field');
      const set = item.querySelector('.mx annotation')?.textContent ?? '';
      return (field ? (field as HTMLInputElement).value : set).replace('\\displaystyle', '').replaceAll(' ', '');
    }),
  );
}

async function paste(page: Page, text: string): Promise<void> {
  await page.locator('math-field').evaluate((field, clip) => {
    const clipboardData = new DataTransfer();
    clipboardData.setData('text/plain', clip);
    field.dispatchEvent(
      new ClipboardEvent('paste', { clipboardData, bubbles: true, cancelable: true, composed: true }),
    );
  }, text);
}

test('is written line by line from the keyboard alone, and undone', async ({ page }) => {
  await openSheet(page);
  await type(page, 'x^2');
  await page.keyboard.press('ArrowRight');
  await type(page, '-7x+4x-28');
  await page.keyboard.press('Tab');
  await type(page, 'each with each');
  await page.keyboard.press('Enter');
  await expect(page.locator('.sheet-line')).toHaveCount(2);
  await page.keyboard.press('Enter');
  await expect.poll(() => lines(page)).toEqual(['x^2-7x+4x-28', 'x^2-7x+4x-28']);
  await expect(savedWords(page)).toBeVisible();

  await page.waitForTimeout(600);
  await type(page, '+0');
  await expect.poll(() => lines(page)).toEqual(['x^2-7x+4x-28', 'x^2-7x+4x-28+0']);
  await page.keyboard.press('Control+z');
  await expect.poll(() => lines(page)).toEqual(['x^2-7x+4x-28', 'x^2-7x+4x-28']);
  await page.keyboard.press('Control+z');
  await page.keyboard.press('Control+z');
  await expect.poll(() => lines(page)).toEqual(['x^2-7x+4x-28']);
  await page.keyboard.press('Control+y');
  await page.keyboard.press('Control+y');
  await expect.poll(() => lines(page)).toEqual(['x^2-7x+4x-28', 'x^2-7x+4x-28']);

  await page.keyboard.press('Shift+Enter');
  await type(page, 'Now collect.');
  await page.keyboard.press('ArrowUp');
  await type(page, '+1');
  await expect.poll(() => lines(page)).toEqual(['x^2-7x+4x-28', 'x^2-7x+4x-28+1']);
  await page.keyboard.press('Alt+ArrowUp');
  await expect.poll(() => lines(page)).toEqual(['x^2-7x+4x-28+1', 'x^2-7x+4x-28']);
  await expect(page.getByText('Now collect.')).toBeVisible();
});

test('takes pasted lines, typed or TeX, as steps', async ({ page }) => {
  await openSheet(page);
  await paste(page, 'x^2 - 7x + 4x - 28\nx^2 - 3x - 28');
  await expect(page.locator('.sheet-line')).toHaveCount(2);
  await page.keyboard.press('Enter');
  await expect(page.getByRole('textbox', { name: 'line 3', exact: true })).toBeFocused();
  await paste(page, '\\begin{align} y &= \\frac{1}{2} \\\\ 2y &= 1 \\end{align}');
  await expect.poll(() => lines(page)).toEqual(['x^2-7x+4x-28', 'x^2-3x-28', 'y=\\frac{1}{2}', '2y=1']);
  await expect(page.getByRole('textbox', { name: 'line 4', exact: true })).toBeFocused();
  await page.keyboard.press('Control+z');
  await expect.poll(async () => (await lines(page)).length).toBe(3);
});

test('says how a line is read, names what cannot be, and never whether it is right', async ({ page }) => {
  await openSheet(page);
  await paste(page, 'x^2-(7x\nx^2-3x-28');
  const first = page.locator('.sheet-line').first();
  await expect(first.getByText('Cannot be read yet.')).toBeVisible();
  await first.getByRole('button', { name: 'Close it at the end' }).click();
  await expect(first.getByText('Cannot be read yet.')).toBeHidden();
  await expect(page.locator('main')).not.toContainText(/wrong|right answer|correct|does not follow/i);
});

test('loses nothing offline, when the tab is closed, and after a reload', async ({ page, context }) => {
  await openSheet(page);
  await type(page, 'x-28');
  await expect(savedWords(page)).toBeVisible();
  await context.setOffline(true);
  await type(page, '+5');
  await expect(page.getByText('Kept in this browser, offline.')).toBeVisible();
  await context.setOffline(false);
  await page.evaluate(() => window.dispatchEvent(new Event('online')));
  await expect(savedWords(page)).toBeVisible();

  await context.setOffline(true);
  await type(page, '+6');
  await page.close({ runBeforeUnload: false });
  await context.setOffline(false);
  const again = await context.newPage();
  await openSheet(again);
  await expect.poll(() => lines(again)).toEqual(['x-28+5+6']);
  await expect(savedWords(again)).toBeVisible();

  await type(again, '+7');
  await again.reload();
  await expect.poll(() => lines(again)).toEqual(['x-28+5+6+7']);
});

test('keeps both when two windows have written, and asks', async ({ page, context }) => {
  await openSheet(page);
  await type(page, 'x');
  await expect(savedWords(page)).toBeVisible();
  await page.waitForTimeout(1_500);
  const other = await context.newPage();
  await openSheet(other);
  await other.locator('math-field').click();
  await other.keyboard.press('End');
  await type(other, '+22');
  await other.waitForTimeout(2_000);
  await expect(savedWords(other)).toBeVisible();
  // The first window has not heard of it: it was typing at the same time.
  await page.locator('math-field').evaluate((field) => (field as HTMLElement).focus());
  await page.locator('math-field').pressSequentially('+11', { delay: 5 });
  await expect(page.getByText('This sheet was changed in two windows.')).toBeVisible();
  await page.getByRole('button', { name: /Keep both/ }).click();
  await expect(savedWords(page)).toBeVisible();
  await expect.poll(() => lines(page)).toEqual(['x+11', 'x+22']);
});

test('shows what is posted, hands in, and can be taken back', async ({ page }) => {
  await openSheet(page);
  await paste(page, 'x^2-7x+4x-28\nx^2-3x-28');
  await page.getByRole('button', { name: 'Hand in your derivation' }).click();
  const dialog = page.getByRole('dialog', { name: 'Hand in your derivation?' });
  await expect(dialog.getByRole('listitem')).toHaveCount(3);
  await dialog.getByRole('button', { name: 'Hand in', exact: true }).click();
  await expect(page.getByRole('button', { name: 'Take it back and go on writing' })).toBeVisible();
  await page.reload();
  await page.getByRole('button', { name: 'Take it back and go on writing' }).click();
  await expect(page.locator('math-field')).toBeVisible();
});

test('has nothing that axe objects to', async ({ page }) => {
  const check = async () => {
    const { violations } = await new AxeBuilder({ page }).analyze();
    const said = violations.map(({ id, nodes }) => `${id}: ${nodes.map(({ html }) => html.slice(0, 200)).join(' | ')}`);
    expect(said).toEqual([]);
  };
  await openSheet(page);
  await check();
  await paste(page, '1/2x\nx^2-(7x\nx^2-3x-28');
  await page.getByRole('button', { name: 'Change a line' }).click();
  await check();
});
