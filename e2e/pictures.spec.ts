import { statSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { expect, test, type Browser, type Page } from '@playwright/test';
import { DEMO, read, signedIn } from './support/demo.ts';
import { enterField, mathsField, typeMaths } from './support/maths.ts';
import type { ReviewAnswer } from '../shared/schemas/review.ts';
import type { TodayAnswer } from '../shared/schemas/today.ts';

// Makes the picture in the README anew: PICTURES=1 npm run test:e2e -- e2e/pictures.spec.ts

const target = fileURLToPath(new URL('pictures/review.png', import.meta.url));

/** The line that the picture is about: (x+1)(x-6) was multiplied out to end in +6. */
const WANTED = '4x^2-12x+9-(x^2-5x+6)';

/** Who is dealt which derivation is drawn by lot, so the one for the picture is looked for. */
async function openReview(browser: Browser, baseURL: string): Promise<Page> {
  const names = ['noor.haddadin', 'oskar.lindqvell', 'mateo.larrondo', 'amelie.rouvray', 'tomasz.wierzba', 'vy.truong'];
  for (const name of names) {
    const context = await signedIn(browser, baseURL, DEMO.student.replace('noor.haddadin', name));
    const { things } = await read<TodayAnswer>(context, '/today');
    for (const thing of things) {
      if (thing.kind !== 'review') continue;
      for (const { reviewId, state } of thing.reviews) {
        const { lines } = await read<ReviewAnswer>(context, `/reviews/${reviewId}`);
        const isOpen = state === 'not-begun' || state === 'begun';
        if (!isOpen || lines[1]?.tex.replaceAll(/\\left|\\right| /g, '') !== WANTED) continue;
        const page = await context.newPage();
        await page.emulateMedia({ colorScheme: 'light', reducedMotion: 'reduce' });
        await page.setViewportSize({ width: 1440, height: 1500 });
        await page.goto(`/reviews/${reviewId}`);
        return page;
      }
    }
    await context.close();
  }
  throw new Error('Nobody has the wanted derivation to review');
}

test('a review for the README', async ({ browser, baseURL }) => {
  const page = await openReview(browser, String(baseURL));
  const first = page.getByRole('radio', { name: /^step 1, from/ });
  await first.focus();
  await first.press('Enter');
  await first.press('ArrowLeft');
  await page.getByRole('radio', { name: /^Wrong sign/ }).press('Space');
  await enterField(mathsField(page, 'What line 1 should have been'));
  await typeMaths(page, '4x^2-12x+9-(x^2-5x-6)');
  await page.getByLabel('Why', { exact: true }).fill('One times minus 6 is minus 6.');
  await page.getByRole('slider', { name: /How sure are you/ }).fill('6');
  await expect(page.getByText('Saved as you type')).toBeVisible();
  await page.getByRole('slider', { name: /How sure are you/ }).blur();
  await page.evaluate(() => document.fonts.ready);
  const box = await page.locator('.sure').boundingBox();
  const height = Math.ceil((box?.y ?? 0) + (box?.height ?? 0)) + 10;
  await page.screenshot({ path: target, clip: { x: 170, y: 0, width: 1150, height } });
  expect(statSync(target).size).toBeLessThan(300_000);
  await page.context().close();
});
