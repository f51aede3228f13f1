import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { Ajv } from 'ajv';
import type { Browser, Download, Page } from 'playwright-core';
import { PNG } from 'pngjs';
import { afterAll, beforeAll, describe, expect, inject, it } from 'vitest';
import { DEMOS } from '../../../app/desk/demos';
import { fingerprintOf } from '../../../core/report/canonical';
import { answer, launch, type Visit, visit } from './page';

/** The duty analyst's job in a real Chromium, on the built page with its own policy. */

let browser: Browser;
beforeAll(async () => {
  browser = await launch();
});
afterAll(async () => {
  await browser.close();
});

/** Runs a test on a page of its own, and fails it for any error the page told of. */
async function on(
  test: (visited: Visit) => Promise<void>,
  ...options: Parameters<typeof visit> extends [unknown, ...infer Rest] ? Rest : never
): Promise<void> {
  const visited = await visit(browser, ...options);
  try {
    await test(visited);
    expect(visited.errors).toEqual([]);
  } finally {
    await visited.close();
  }
}

const sheet = (page: Page) => page.locator('textarea.paste-text');
const slider = (page: Page) => page.locator('.ribbon-slider');

async function download(page: Page, name: string): Promise<{ file: Download; bytes: Buffer }> {
  const [file] = await Promise.all([
    page.waitForEvent('download', { timeout: 30_000 }),
    page.getByRole('button', { name, exact: true }).click(),
  ]);
  return { file, bytes: readFileSync(await file.path()) };
}

/** Waits until the answer is no longer the one given. */
async function newAnswer(page: Page, old: string): Promise<string> {
  for (let i = 0; i < 200; i++) {
    const text = await answer(page);
    if (text !== old) return text;
    await page.waitForTimeout(50);
  }
  throw new Error('the answer did not change');
}

describe('the desk', () => {
  it('opens with the invented demo already assessed, and says that it is invented', () =>
    on(async ({ page }) => {
      expect(await answer(page)).toMatch(/^Passes 16 240 km from Earth’s centre/);
      expect(await page.locator('#findings').textContent()).toMatch(/invented case/);
      expect(await sheet(page).inputValue()).toBe(DEMOS[0].text);
    }));

  it('asks no other host for anything', () =>
    on(async ({ page, requests }) => {
      await page.waitForTimeout(1500);
      const origin = new URL(inject('pageUrl')).origin;
      const elsewhere = requests.filter(
        (url) => !/^(?:blob|data):/.test(url) && new URL(url).origin !== origin,
      );
      expect(elsewhere).toEqual([]);
      expect(requests.length).toBeGreaterThan(3);
    }));

  it('gives the finding of a pasted OPM, of free text and of elements', () =>
    on(async ({ page }) => {
      let before = await answer(page);
      await sheet(page).fill(DEMOS[0].text.replace('X = -116968342.9423', 'X = -116968300.0'));
      before = await newAnswer(page, before);
      expect(before).toMatch(/^Passes .* km from Earth’s centre/);
      await sheet(page).fill(DEMOS[1].text);
      before = await newAnswer(page, before);
      expect(before).toMatch(/3\.120 million km/);
      await sheet(page).fill(DEMOS[3].text);
      before = await newAnswer(page, before);
      expect(before).toMatch(/strikes the Earth/);
      expect(await page.locator('#findings').textContent()).toMatch(/civil-protection authority/);
    }));

  it('shows what is wrong beside its line and keeps the text and the last good result', () =>
    on(async ({ page }) => {
      const before = await answer(page);
      const bad = DEMOS[0].text.replace('Y = 10740112.8277', 'Y = 1074o112.8277');
      await sheet(page).fill(bad);
      const problem = page.locator('.problem-error').first();
      await problem.waitFor();
      const words = (await problem.textContent()) ?? '';
      expect(words).toMatch(/1074o112\.8277/);
      expect(words).toMatch(/12/);
      expect(await page.locator('.paste-mark').count()).toBeGreaterThan(0);
      expect(await sheet(page).inputValue()).toBe(bad);
      expect(await answer(page)).toBe(before);
    }));

  it('asks where two readings are possible, and goes on with the answer', () =>
    on(async ({ page }) => {
      const before = await answer(page);
      await sheet(page).fill(DEMOS[2].text.replace('2034-09-20T00:00:00 TDB', '09/10/2034 TDB'));
      const question = page.locator('.question').first();
      await question.waitFor();
      await question.getByRole('button').last().click();
      expect(await newAnswer(page, before)).not.toBe(before);
    }));

  it('takes an edit of a field as understood', () =>
    on(async ({ page }) => {
      const before = await answer(page);
      await page.locator('.fields-group select').first().waitFor();
      const axes = page.getByRole('combobox', { name: /axes/i }).first();
      await axes.selectOption('EclipticJ2000');
      expect(await newAnswer(page, before)).not.toBe(before);
    }));

  it('opens a case file that is dropped on the page', () =>
    on(async ({ page }) => {
      const before = await answer(page);
      const transfer = await page.evaluateHandle((text) => {
        const data = new DataTransfer();
        data.items.add(new File([text], 'case.txt', { type: 'text/plain' }));
        return data;
      }, DEMOS[4].text);
      for (const type of ['dragenter', 'dragover', 'drop']) {
        await page.dispatchEvent('body', type, { dataTransfer: transfer });
      }
      expect(await newAnswer(page, before)).toMatch(/Moon’s centre/);
    }));
});

describe('the ribbon', () => {
  it('is a slider that the keyboard moves and that speaks date and distance', () =>
    on(async ({ page }) => {
      const ribbon = slider(page);
      await ribbon.focus();
      expect(await ribbon.getAttribute('role')).toBe('slider');
      const said = async () => (await ribbon.getAttribute('aria-valuetext')) ?? '';
      const value = async () => Number(await ribbon.getAttribute('aria-valuenow'));
      const first = await value();
      expect(await said()).toMatch(/2031 May 14/);
      await page.keyboard.press('ArrowRight');
      await page.keyboard.press('ArrowRight');
      expect(await value()).toBeGreaterThan(first);
      await page.keyboard.press('Home');
      expect(await said()).toMatch(/2031 January 2|2031 Jan(?:uary)? (?:29|30)/);
      expect(await said()).toMatch(/km|au/);
      await page.keyboard.press('End');
      expect(await said()).toMatch(/2032/);
    }));

  it('plays slowly where it matters: the clock moves by itself', () =>
    on(
      async ({ page }) => {
        const said = async () => (await slider(page).getAttribute('aria-valuetext')) ?? '';
        const before = await said();
        await page.getByRole('button', { name: /^play/i }).click();
        await page.waitForTimeout(800);
        expect(await said()).not.toBe(before);
        await page.getByRole('button', { name: /^pause/i }).click();
        // What the slider speaks follows the clock a little later.
        await page.waitForTimeout(400);
        const paused = await said();
        await page.waitForTimeout(400);
        expect(await said()).toBe(paused);
      },
      { reducedMotion: 'no-preference' },
    ));
});

describe('what is handed over', () => {
  it('is a JSON report that its schema accepts and a PNG plate with the same fingerprint', () =>
    on(async ({ page }) => {
      // Until the estimate is in, the next report may take this one's place between two downloads.
      await page.locator('.estimate-words', { hasText: /^All/ }).waitFor({ timeout: 60_000 });
      const { bytes: json, file } = await download(page, 'Report');
      const report = JSON.parse(json.toString('utf8'));
      const schema = await page.evaluate(async () =>
        (await fetch('./schema/report.schema.json')).json(),
      );
      const validate = new Ajv({ strict: false }).compile(schema);
      expect([validate(report), validate.errors]).toEqual([true, null]);
      expect(fingerprintOf(report)).toBe(report.fingerprint);
      expect(file.suggestedFilename()).toMatch(/\.json$/);

      await page.locator('canvas').first().waitFor();
      const { bytes: png } = await download(page, 'Plate');
      expect(png.toString('latin1')).toContain(`Fingerprint\0\0\0\0\0${report.fingerprint}`);
      const plate = PNG.sync.read(png);
      expect([plate.width, plate.height]).toEqual([2400, 1350]);
      // Not blank: ink on paper all over, both scenes included.
      const inked = (x0: number, y0: number, x1: number, y1: number): number => {
        const paper = plate.data.subarray(0, 3);
        let count = 0;
        for (let y = y0; y < y1; y++) {
          for (let x = x0; x < x1; x++) {
            const at = (y * plate.width + x) * 4;
            const off = [0, 1, 2].some((k) => Math.abs(plate.data[at + k] - paper[k]) > 40);
            if (off) count += 1;
          }
        }
        return count / ((x1 - x0) * (y1 - y0));
      };
      expect(inked(60, 60, 2340, 260)).toBeGreaterThan(0.01);
      expect(inked(70, 340, 800, 865)).toBeGreaterThan(0.003);
      expect(inked(840, 340, 1570, 865)).toBeGreaterThan(0.003);
      expect(inked(60, 920, 1580, 1230)).toBeGreaterThan(0.01);
      expect(inked(60, 1280, 1200, 1340)).toBeGreaterThan(0.02);
    }));

  it('is an OEM, a CSV and a case file that brings the desk back', () =>
    on(async ({ page }) => {
      const { bytes: oem } = await download(page, 'OEM');
      expect(oem.toString('utf8')).toMatch(/^CCSDS_OEM_VERS = 3\.0/);
      const { bytes: csv } = await download(page, 'CSV');
      expect(csv.toString('utf8')).toMatch(/^jdTdb,/);
      const { bytes: file } = await download(page, 'Case');
      const before = await answer(page);
      await sheet(page).fill(DEMOS[1].text);
      await newAnswer(page, before);
      await sheet(page).fill(file.toString('utf8'));
      expect(await newAnswer(page, await answer(page))).toBe(before);
    }));
});

describe('the page', () => {
  it('has no serious accessibility fault, in both variants', async () => {
    const source = readFileSync(createRequire(import.meta.url).resolve('axe-core'), 'utf8');
    for (const colorScheme of ['light', 'dark'] as const) {
      await on(
        async ({ page }) => {
          await page.waitForTimeout(500);
          // The page's policy lets no script be added; the test's own world is not bound by it.
          await page.evaluate(source);
          const found = await page.evaluate(async () => {
            const { axe } = globalThis as unknown as {
              axe: {
                run(): Promise<{
                  violations: { id: string; impact: string; nodes: { html: string }[] }[];
                }>;
              };
            };
            return (await axe.run()).violations
              .filter(({ impact }) => impact === 'serious' || impact === 'critical')
              .map(({ id, nodes }) => `${id}: ${nodes.map(({ html }) => html).join(' | ')}`);
          });
          expect(found).toEqual([]);
        },
        { colorScheme },
      );
    }
  });

  it('works without WebGL: says so, and the rest goes on', async () => {
    const plain = await launch(['--disable-gpu', '--disable-3d-apis']);
    try {
      const { page, close } = await visit(plain);
      expect(await answer(page)).toMatch(/^Passes/);
      const said = page.getByText(/WebGL/).first();
      await said.waitFor();
      const { bytes } = await download(page, 'Plate');
      expect(PNG.sync.read(bytes).width).toBe(2400);
      await close();
    } finally {
      await plain.close();
    }
  });

  it('fits its parts side by side at 1024 × 768 without scrolling the page', () =>
    on(
      async ({ page }) => {
        const scrolled = await page.evaluate(() => {
          window.scrollTo(500, 500);
          return [window.scrollX, window.scrollY];
        });
        expect(scrolled).toEqual([0, 0]);
        for (const part of ['.paste-text', '#findings', '.ribbon-slider']) {
          const box = await page.locator(part).first().boundingBox();
          expect(box?.width ?? 0).toBeGreaterThan(150);
          expect(box?.height ?? 0).toBeGreaterThan(80);
        }
      },
      { viewport: { width: 1024, height: 768 } },
    ));
});
