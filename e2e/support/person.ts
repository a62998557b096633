import type { APIResponse, Browser, BrowserContext, Page } from '@playwright/test';
import { expect } from '@playwright/test';

/** Somebody with a browser of their own. */
export interface Person {
  readonly name: string;
  readonly email: string;
  readonly context: BrowserContext;
  readonly page: Page;
  /** The body of every answer of the API that this browser has got. */
  readonly heard: () => Promise<readonly string[]>;
  /** Errors on the pages and requests to other hosts. */
  readonly complaints: readonly string[];
}

export const PASSWORD = 'a bench of oak and slate';

/** Opens a browser context and listens to all that goes through it. */
export async function openPerson(browser: Browser, baseURL: string, name: string, email: string): Promise<Person> {
  const context = await browser.newContext({ baseURL });
  const bodies: Promise<string>[] = [];
  const complaints: string[] = [];
  context.on('response', (response) => {
    if (!response.url().startsWith(`${baseURL}/api/`)) return;
    // A page that has moved on no longer tells what it was sent; nobody saw that answer.
    bodies.push(response.text().catch(() => ''));
  });
  context.on('request', (request) => {
    const url = request.url();
    if (!/^(data|blob):/.test(url) && !url.startsWith(`${baseURL}/`)) complaints.push(`asked ${url}`);
  });
  context.on('weberror', (error) => complaints.push(error.error().message));
  const page = await context.newPage();
  return { name, email, context, page, heard: () => Promise.all(bodies), complaints };
}

interface Letter {
  readonly id: number;
  readonly to: string;
  readonly subject: string;
  readonly text: string;
}

/** Waits for the latest letter to an address whose subject fits. */
export async function findLetter({ context, email }: Person, subject: RegExp): Promise<Letter> {
  let found: Letter | undefined;
  await expect
    .poll(
      async () => {
        const { letters } = (await (await context.request.get('/api/mailbox')).json()) as { letters: Letter[] };
        found = letters.find((letter) => letter.to === email && subject.test(letter.subject));
        return found?.subject ?? 'no such letter';
      },
      { timeout: 60_000, message: `a letter to ${email}` },
    )
    .toMatch(subject);
  if (!found) throw new Error(`There is no letter to ${email}`);
  return found;
}

/** Opens the link of a letter. */
export async function followLetter(person: Person, subject: RegExp, baseURL: string): Promise<void> {
  const { text } = await findLetter(person, subject);
  const link = text.split(/\s+/).find((word) => word.startsWith(`${baseURL}/join/`));
  if (!link) throw new Error(`The letter “${text}” holds no link`);
  await person.page.goto(link);
}

/** Name and password on the page that an invitation or a sign-up opens. */
export async function makeAccount({ page, name }: Person): Promise<void> {
  await page.getByLabel('Your name, as your class knows it').fill(name);
  await page.getByLabel('Password', { exact: true }).fill(PASSWORD);
  await page.getByRole('button', { name: 'Make my account' }).click();
  await page.waitForURL((url) => !url.pathname.startsWith('/join/'));
}

/** The status of an address of the API, asked with this person's session. */
export async function statusOf({ context }: Person, path: string): Promise<number> {
  return (await context.request.get(`/api${path}`)).status();
}

/** What the API answers this person, which must be well. */
export async function ask<T>({ context }: Person, path: string): Promise<T> {
  const answer: APIResponse = await context.request.get(`/api${path}`);
  expect(answer.ok(), `${path}: ${answer.status()}`).toBe(true);
  return (await answer.json()) as T;
}
