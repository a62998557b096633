import { expect, type Browser, type BrowserContext } from '@playwright/test';

export const DEMO_PASSWORD = 'slate and paper';
const at = (name: string) => `${name}@brackenfell.example`;

/** People of the demo, by what they are. */
export const DEMO = {
  teacher: at('mira.castellan'),
  teacherWithoutMail: at('ilse.varga'),
  assistant: at('tobias.renn'),
  admin: at('henrike.solvang'),
  student: at('noor.haddadin'),
  otherStudent: at('amelie.rouvray'),
  studentWhoAnswers: at('tomasz.wierzba'),
  studentWithoutMail: 'zofia.m',
} as const;

/** A browser in which somebody of the demo is signed in already. */
export async function signedIn(browser: Browser, baseURL: string, name: string): Promise<BrowserContext> {
  const context = await browser.newContext({ baseURL });
  const answer = await context.request.post('/api/session', {
    data: { name, password: DEMO_PASSWORD },
    headers: { origin: baseURL },
  });
  expect(answer.ok(), `${name} signs in: ${answer.status()}`).toBe(true);
  return context;
}

/** What the API answers somebody. */
export async function read<T>(context: BrowserContext, path: string): Promise<T> {
  const answer = await context.request.get(`/api${path}`);
  expect(answer.ok(), `${path}: ${answer.status()}`).toBe(true);
  return (await answer.json()) as T;
}
