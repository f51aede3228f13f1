import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { DEMOS } from '../../../app/desk/demos';
import { launch, visit } from './page';

/** The target plane with real clones in a real Chromium. */

const MAY_HIT = DEMOS.find(({ id }) => id === 'may-hit')?.text ?? '';

let browser: Browser;
beforeAll(async () => {
  browser = await launch();
});
afterAll(async () => {
  await browser.close();
});

const plain = (text: string | null) => (text ?? '').replaceAll('\u2009', ' ');

/** How many pixels of the clones' layer are inked. */
const inked = (page: Page) =>
  page.locator('.plane-surface canvas').evaluate((element) => {
    if (!(element instanceof HTMLCanvasElement)) throw new Error('no canvas');
    const image = element.getContext('2d')?.getImageData(0, 0, element.width, element.height);
    if (image === undefined) throw new Error('no picture');
    let count = 0;
    for (let i = 3; i < image.data.length; i += 4) if (image.data[i] > 0) count++;
    return count;
  });

async function said(page: Page, pattern: RegExp): Promise<string> {
  const line = page.locator('.plane [role="status"]');
  for (let i = 0; i < 200; i++) {
    const text = plain(await line.textContent());
    if (pattern.test(text)) return text;
    await page.waitForTimeout(50);
  }
  throw new Error(`the plane says: ${await line.textContent()}`);
}

describe('the target plane', () => {
  it('draws the clones as they come, and is read, moved and zoomed from the keyboard', async () => {
    const { page, errors, close } = await visit(browser);
    try {
      await page.locator('textarea.paste-text').fill(MAY_HIT);
      await page.locator('.estimate-words', { hasText: /^All/ }).waitFor({ timeout: 60_000 });
      await page.getByRole('radio', { name: 'Target plane' }).check({ force: true });
      const surface = page.locator('.plane-surface');
      await surface.waitFor();
      // Marks are printed in the frame after the surface stands.
      await expect.poll(() => inked(page), { timeout: 30_000 }).toBeGreaterThan(1000);
      // What the sheet shows of the line of variations waits for the last report.
      await page.locator('.plane-line-words').first().waitFor({ timeout: 60_000 });

      await surface.focus();
      await page.keyboard.press('d');
      // R √(1 + 2GM/(R v²)) = 10 618 km at the invented 8.4 km/s, with 15 % of margin.
      expect(await said(page, /nearer edge/)).toBe('12 211 km from the middle to the nearer edge');
      const whole = await inked(page);
      for (let i = 0; i < 12; i++) await page.keyboard.press('+');
      // Not nearer than the Earth's radius.
      expect(await said(page, /^6 /)).toBe('6 378 km from the middle to the nearer edge');
      for (let i = 0; i < 20; i++) await page.keyboard.press('-');
      expect(await said(page, /million/)).toBe(
        '1.00 million km from the middle to the nearer edge',
      );
      await expect.poll(() => inked(page), { timeout: 30_000 }).toBeLessThan(whole / 10);
      await page.keyboard.press('0');
      await page.keyboard.press('ArrowRight');

      await page.keyboard.press('n');
      expect(await said(page, /^Clone/)).toMatch(/^Clone [\d ]+.* hits: B·T .* km, B·R .* km, /);
      await page.getByRole('radio', { name: 'ξ, ζ' }).check({ force: true });
      expect(await said(page, /ξ/)).toMatch(
        / hits: ξ .* km, ζ .* km, distance .*, speed .* km\/s$/,
      );
      expect(await page.locator('.plane-figures').textContent()).toContain('ξ towards ζ');
      expect(errors).toEqual([]);
    } finally {
      await close();
    }
  });

  it('zooms about the pointer, is dragged, and tells of the clone under it', async () => {
    const { page, errors, close } = await visit(browser);
    try {
      await page.locator('textarea.paste-text').fill(MAY_HIT);
      await page.locator('.estimate-words', { hasText: /^All/ }).waitFor({ timeout: 60_000 });
      await page
        .locator('.estimate .button[aria-disabled="true"]', { hasText: 'Stop' })
        .waitFor({ timeout: 60_000 });
      await page.getByRole('radio', { name: 'Target plane' }).check({ force: true });
      const mark = page.locator('.plane-aim-open');
      const at = async () => {
        const box = await mark.boundingBox();
        if (box === null) throw new Error('the aim is not on the sheet');
        return { x: box.x + box.width / 2, y: box.y + box.height / 2 };
      };
      const before = await at();
      await page.mouse.move(before.x, before.y);
      await page.mouse.wheel(0, -300);
      await said(page, /nearer edge/);
      const zoomed = await at();
      expect(Math.hypot(zoomed.x - before.x, zoomed.y - before.y)).toBeLessThan(2);
      // Clones crowd about the aim: one is under the pointer.
      await page.mouse.move(zoomed.x + 5, zoomed.y + 5);
      await page.locator('.plane-clone').waitFor();
      expect(await page.locator('.plane-clone').textContent()).toMatch(/^Clone .*B·T.*B·R.*speed/);

      await page.mouse.down();
      await page.mouse.move(zoomed.x + 45, zoomed.y - 25, { steps: 3 });
      await page.mouse.up();
      const dragged = await at();
      // A pixel or two for what the browser rounds.
      expect(Math.abs(dragged.x - zoomed.x - 40)).toBeLessThan(2);
      expect(Math.abs(dragged.y - zoomed.y + 30)).toBeLessThan(2);
      await page.mouse.dblclick(dragged.x, dragged.y);
      await page.waitForTimeout(200);
      const fitted = await at();
      expect(Math.hypot(fitted.x - before.x, fitted.y - before.y)).toBeLessThan(1);
      expect(errors).toEqual([]);
    } finally {
      await close();
    }
  });
});
