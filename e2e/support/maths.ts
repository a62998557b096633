import { expect, type Locator, type Page } from '@playwright/test';

/** A maths field by its label; what has the role inside it is never in sight. */
export function mathsField(page: Page, label: string): Locator {
  return page.locator(`math-field[aria-label="${label}"]`);
}

/** Puts the caret into a maths field. */
export async function enterField(field: Locator): Promise<void> {
  await field.click();
  await expect(field).toBeFocused();
}

/** Types maths as a person does, a key at a time; after a digit on high the caret goes back to the line. */
export async function typeMaths(page: Page, maths: string): Promise<void> {
  for (const piece of maths.split(/(?<=\^\d)/)) {
    await page.keyboard.type(piece, { delay: 15 });
    if (/\^\d$/.test(piece)) await page.keyboard.press('ArrowRight');
  }
}

/** Pastes text where the caret stands in a maths field. */
export async function pasteMaths(page: Page, text: string): Promise<void> {
  await page.locator('math-field').evaluate((field, clip) => {
    const clipboardData = new DataTransfer();
    clipboardData.setData('text/plain', clip);
    field.dispatchEvent(
      new ClipboardEvent('paste', { clipboardData, bubbles: true, cancelable: true, composed: true }),
    );
  }, text);
}

/** What stands there, with maths as its TeX without blanks and without what only sets its size. */
export async function saidIn(place: Locator): Promise<string> {
  return await place.evaluate((element) => {
    const copy = element.cloneNode(true) as Element;
    for (const maths of copy.querySelectorAll('.katex')) {
      const tex = maths.querySelector('annotation')?.textContent ?? '';
      maths.replaceWith(tex.replaceAll(/\\displaystyle|\\left|\\right| /g, ''));
    }
    return (copy.textContent ?? '').replaceAll(/\s+/g, ' ').trim();
  });
}

/** The lines of a derivation on a page, as TeX, the given first. */
export async function linesOf(derivation: Locator): Promise<string[]> {
  const lines = await derivation.locator('.mx').all();
  return await Promise.all(lines.map((line) => saidIn(line)));
}
