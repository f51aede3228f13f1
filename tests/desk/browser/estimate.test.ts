import { readFileSync } from 'node:fs';
import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { DEMOS } from '../../../app/desk/demos';
import { Estimate } from '../../../core/estimate';
import { fingerprintOf } from '../../../core/report/canonical';
import type { Report } from '../../../core/report/report';
import { assessText } from '../../helpers/estimate';
import { launch, visit } from './page';

/** The estimate in a real Chromium, on a pool of real workers, against the core run in Node. */

const MAY_HIT = DEMOS.find(({ id }) => id === 'may-hit')?.text ?? '';

let browser: Browser;
beforeAll(async () => {
  browser = await launch();
});
afterAll(async () => {
  await browser.close();
});

async function words(page: Page): Promise<string> {
  const text = await page.locator('.estimate-words').textContent();
  return (text ?? '').replaceAll('\u202f', '');
}

async function wordsLike(page: Page, pattern: RegExp): Promise<string> {
  for (let i = 0; i < 1200; i++) {
    const text = await words(page);
    if (pattern.test(text)) return text;
    await page.waitForTimeout(50);
  }
  throw new Error(`the estimate stays at: ${await words(page)}`);
}

/** What must agree to the bit; the interval may differ in its last digits, as Math.log does between engines. */
function countsOf(report: Report): { count: number; impacts: number } | null {
  const ensemble = report.impactProbability?.ensemble;
  return ensemble === undefined ? null : { count: ensemble.count, impacts: ensemble.impacts };
}

/** Waits until nothing is carried any more. */
async function atRest(page: Page): Promise<void> {
  await page
    .locator('.estimate .button[aria-disabled="true"]', { hasText: 'Stop' })
    .waitFor({ timeout: 60_000 });
}

const press = (page: Page, name: string) =>
  page.locator('.estimate').getByRole('button', { name, exact: true }).click();

async function savedReport(page: Page): Promise<Report> {
  const [file] = await Promise.all([
    page.waitForEvent('download', { timeout: 30_000 }),
    page.getByRole('button', { name: 'Report', exact: true }).click(),
  ]);
  return JSON.parse(readFileSync(await file.path(), 'utf8'));
}

describe('the estimate', () => {
  it('follows an uncertain case, stops and carries on, with the counts of Node at every stop', async () => {
    const { page, errors, close } = await visit(browser);
    try {
      const { basis, host } = await assessText(MAY_HIT);
      const inNode = new Estimate(basis, 1);

      await page.locator('textarea.paste-text').fill(MAY_HIT);
      await wordsLike(page, /^All 10000 clones carried; [1-9]/);
      await atRest(page);
      const first = await savedReport(page);
      const counts = countsOf(await inNode.run(10_000, host));
      expect(first.impactProbability?.seed).toBe(1);
      expect(counts?.impacts).toBeGreaterThan(30);
      expect(countsOf(first)).toEqual(counts);
      expect(first.fingerprint).toBe(fingerprintOf(first));
      expect(await page.locator('.model-fingerprint').textContent()).toContain(first.fingerprint);

      await press(page, 'Carry on to');
      await wordsLike(page, /^\d+ of 100000 clones carried/);
      await wordsLike(page, /^(?!10000 )\d+ of 100000/);
      await press(page, 'Stop');
      await atRest(page);
      const stopped = countsOf(await savedReport(page));
      const count = stopped?.count ?? 0;
      expect(count).toBeGreaterThan(10_000);
      expect(count).toBeLessThan(100_000);
      expect(stopped).toEqual(countsOf(await inNode.run(count, host)));
      expect(await words(page)).toContain(`${count} of 100000 clones carried`);

      await press(page, 'Carry on to');
      await wordsLike(page, new RegExp(`^(?!${count} )\\d+ of 100000`));
      await press(page, 'Stop');
      await atRest(page);
      const further = countsOf(await savedReport(page));
      expect(further?.count).toBeGreaterThan(count);
      expect(errors).toEqual([]);
    } finally {
      await close();
    }
  });

  it('ends at once when the case is edited, and the new case gets its own', async () => {
    const { page, errors, close } = await visit(browser);
    try {
      await page.locator('textarea.paste-text').fill(MAY_HIT);
      await wordsLike(page, /^All 10000 clones carried; [1-9]/);
      await atRest(page);
      await press(page, 'Carry on to');
      await wordsLike(page, /^\d+ of 100000 clones carried/);
      // Without a covariance there is nothing to carry, and the line goes with the old report.
      await page.locator('textarea.paste-text').fill(DEMOS[1].text);
      await page.locator('.estimate').waitFor({ state: 'detached', timeout: 30_000 });
      await page.locator('textarea.paste-text').fill(MAY_HIT);
      await wordsLike(page, /^All 10000 clones carried; [1-9]/);
      expect(errors).toEqual([]);
    } finally {
      await close();
    }
  });

  it('is worked from the keyboard, and the focus stays where it was', async () => {
    const { page, close } = await visit(browser);
    try {
      await page.locator('textarea.paste-text').fill(MAY_HIT);
      await wordsLike(page, /^All 10000 clones carried; [1-9]/);
      await atRest(page);
      const goOn = page.locator('.estimate').getByRole('button', { name: 'Carry on to' });
      await goOn.focus();
      await page.keyboard.press('Enter');
      await wordsLike(page, /^\d+ of 100000 clones carried/);
      const focused = () => page.evaluate(() => document.activeElement?.textContent);
      expect(await focused()).toBe('Carry on to');
      await page.keyboard.press('Shift+Tab');
      expect(await focused()).toBe('Stop');
      await page.keyboard.press('Enter');
      await atRest(page);
      expect(await focused()).toBe('Stop');
    } finally {
      await close();
    }
  });
});
