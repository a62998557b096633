import { expect, test, type Page } from '@playwright/test';

/** Signs in as one of the people whom the sign-in page offers. */
async function tryAs(page: Page, name: string): Promise<void> {
  await page.goto('/signin');
  const people = page.getByRole('region', { name: 'Try it as' });
  await people.getByRole('button', { name }).click();
  if (new URL(page.url()).pathname === '/signin') await page.getByRole('button', { name: 'Sign in' }).click();
  await page.waitForURL((url) => url.pathname !== '/signin');
}

test('the sign-in page offers a person of each role, and says what waits for them', async ({ page }) => {
  await page.goto('/signin');
  const people = page.getByRole('region', { name: 'Try it as' });
  for (const words of [
    /teacher of 10C/,
    /assistant of 10C/,
    /admin of the school/,
    /student in 10C/,
    /student in 9A/,
  ]) {
    await expect(people.getByText(words).first()).toBeVisible();
  }
});

test('a student finds a derivation to write', async ({ page }) => {
  await tryAs(page, 'Noor Haddadin');
  await expect(page.getByText('Less than, with a minus').first()).toBeVisible();
});

test('the teacher finds running rounds and disputes', async ({ page }) => {
  await tryAs(page, 'Mira Castellan');
  await expect(page.getByText('A root and a line').first()).toBeVisible();
  await page.goto('/disputes');
  await expect(page.getByRole('heading', { name: /Does step \d+ follow\?/ })).toBeVisible();
});

test('the latest letters lie in the mailbox', async ({ page }) => {
  await page.goto('/mailbox');
  await expect(page.getByText('noor.haddadin@brackenfell.example').first()).toBeVisible({ timeout: 30_000 });
});
