import AxeBuilder from '@axe-core/playwright';
import { expect, test, type ConsoleMessage, type Page } from '@playwright/test';

/** One page as one person meets it. */
export interface Look {
  /** Said where something is wrong. */
  readonly name: string;
  readonly address: string;
  /** What is done on the page before it is looked at, such as opening a tab. */
  readonly act?: (page: Page) => Promise<unknown>;
  /** Answers that the page may get, such as 404 for what is not there; the browser logs them as errors. */
  readonly refused?: readonly number[];
}

const WIDE = { width: 1440, height: 900 };
const PHONE = { width: 390, height: 844 };

/**
 * Looks at pages one after the other: no error, no other host, nothing sideways, nothing that axe objects to, wide
 * in the light and narrow in the dark. All that is wrong is told, not only the first.
 */
export async function lookAt(page: Page, baseURL: string, looks: readonly Look[]): Promise<void> {
  let heard: string[] = [];
  let refused: readonly number[] = [];
  const isForeseen = (message: ConsoleMessage) =>
    // What looks into a closed frame from the test is refused there.
    message.location().url === 'about:srcdoc' ||
    refused.some((status) => message.text().includes(`the server responded with a status of ${status}`));
  page.on('pageerror', (error) => heard.push(error.message));
  page.on('console', (message) => {
    if (message.type() === 'error' && !isForeseen(message)) heard.push(`${message.text()} ${message.location().url}`);
  });
  page.on('request', (request) => {
    const url = request.url();
    if (!/^(data|blob):/.test(url) && !url.startsWith(`${baseURL}/`)) heard.push(`asked ${url}`);
  });
  for (const look of looks) {
    heard = [];
    refused = look.refused ?? [];
    await test.step(look.name, async () => {
      const wrong = await findWrong(page, look).catch((error: unknown) => [String(error)]);
      expect.soft([...heard, ...wrong], look.name).toEqual([]);
    });
  }
}

async function findWrong(page: Page, { address, act }: Look): Promise<string[]> {
  await page.setViewportSize(WIDE);
  await page.emulateMedia({ colorScheme: 'light', reducedMotion: 'reduce' });
  await page.goto(address);
  await settle(page);
  if (act) {
    await act(page);
    await settle(page);
  }
  const wrong = [...(await findOverflow(page)), ...(await findViolations(page))];
  await page.emulateMedia({ colorScheme: 'dark' });
  await page.setViewportSize(PHONE);
  return [...wrong, ...(await findOverflow(page)), ...(await findViolations(page))];
}

/** Everything that was fetched is there. */
async function settle(page: Page): Promise<void> {
  const isGallery = new URL(page.url()).pathname === '/parts';
  await expect(page.getByRole('heading', { level: 1 }).first()).toBeVisible();
  // The gallery of parts shows what waiting looks like.
  if (!isGallery) await expect(page.locator('output.waiting, main [aria-busy="true"]')).toHaveCount(0);
  await page.evaluate(() => document.fonts.ready);
}

async function findOverflow(page: Page): Promise<string[]> {
  const { width } = page.viewportSize() ?? WIDE;
  const widest = await page.evaluate(() => document.documentElement.scrollWidth);
  return widest > width ? [`${widest} px wide at ${width}`] : [];
}

async function findViolations(page: Page): Promise<string[]> {
  // A letter's own page in its frame is not ours, and the hundredth entry of a list is like the tenth.
  const axe = new AxeBuilder({ page }).exclude('iframe').exclude('li:nth-child(n+25)');
  const { violations } = await axe.analyze();
  const where = `${page.viewportSize()?.width} px`;
  return violations.map(
    ({ id, nodes }) =>
      `${where}, ${id}: ${nodes.map(({ html, target }) => `${target.join(' ')} ${html.slice(0, 160)}`).join(' | ')}`,
  );
}
