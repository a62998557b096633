import { expect, test } from '@playwright/test';

test('the first page asks nothing of other hosts and keeps to its content policy', async ({ page, baseURL }) => {
  const outside: string[] = [];
  const complaints: string[] = [];
  page.on('request', (request) => {
    if (!/^(data|blob):/.test(request.url()) && !request.url().startsWith(`${baseURL}/`)) outside.push(request.url());
  });
  page.on('pageerror', (error) => complaints.push(error.message));
  page.on('console', (message) => {
    // A visitor who is not signed in is told so with 401, which the browser logs.
    if (message.type() === 'error' && !message.text().includes('401')) complaints.push(message.text());
  });
  await page.goto('/');
  await expect(page.getByRole('heading', { level: 1 })).toBeVisible();
  await page.evaluate(() => document.fonts.ready);
  expect(outside).toEqual([]);
  expect(complaints).toEqual([]);
});
