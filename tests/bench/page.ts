import { mkdtempSync, readdirSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { gzipSync } from 'node:zlib';
import { chromium, type Page } from 'playwright-core';
import { build, preview } from 'vite';
import { findChromium } from '../../.ci/chromium.mjs';
import { DEMOS } from '../../app/desk/demos';
import { writeCaseFile } from '../../core/case/case-file';
import { readCase } from '../../core/case/read';
import { smallBodyRecord } from '../helpers/record';
import { middle, print } from './print';

/**
 * The built page in a Chromium that renders in software: sizes, first paint, time from paste to the
 * first finding, long tasks while the worker runs, frames a second while the clock runs.
 */
export async function benchPage(): Promise<void> {
  const outDir = mkdtempSync(join(tmpdir(), 'skimline-bench-'));
  await build({ logLevel: 'warn', build: { outDir, emptyOutDir: true } });
  sizes(join(outDir, 'assets'));
  const server = await preview({ logLevel: 'warn', build: { outDir }, preview: { port: 0 } });
  const url = server.resolvedUrls?.local[0] ?? '';
  const executablePath = findChromium();
  if (executablePath === null) throw new Error('no Chromium: see .ci/chromium.mjs');
  const browser = await chromium.launch({
    executablePath,
    args: ['--no-sandbox', '--use-angle=swiftshader', '--enable-unsafe-swiftshader'],
  });
  try {
    const context = await browser.newContext({ viewport: { width: 1280, height: 720 } });
    const page = await context.newPage();
    // What the runner's compiler leaves in functions that are sent to the page.
    await page.addInitScript('globalThis.__name = (f) => f;');
    await page.addInitScript(() => {
      const seen = globalThis as unknown as { longTasks: number[] };
      seen.longTasks = [];
      new PerformanceObserver((list) => {
        for (const entry of list.getEntries()) seen.longTasks.push(entry.duration);
      }).observe({ type: 'longtask', buffered: true });
    });
    // The browser itself starts up on another page: its own start is not the page's.
    const blank = await context.newPage();
    await blank.setContent('<p>starting</p><canvas></canvas>');
    await blank.waitForTimeout(1500);
    await blank.close();
    await page.goto(url);
    await page.locator('.finding-answer').first().waitFor();
    const paint = await page.evaluate(
      () =>
        new Promise<number>((resolve) => {
          new PerformanceObserver((list) => {
            const entry = list.getEntriesByName('first-contentful-paint')[0];
            if (entry !== undefined) resolve(entry.startTime);
          }).observe({ type: 'paint', buffered: true });
        }),
    );
    print('first contentful paint', paint, 'ms', { target: '1000 ms' });
    await page.waitForTimeout(3000);
    print('longest task while the page opens', await longest(page), 'ms');
    const year: number[] = [];
    const twenty: number[] = [];
    for (let i = 0; i < 7; i++) {
      const wobble = `${(i + 1) / 1000}`;
      year.push(
        await paste(page, DEMOS[0].text.replace('883009.1765', `883009.1765${wobble.slice(2)}`)),
      );
      twenty.push(await paste(page, publishedText(i)));
    }
    print('paste to finding, a pass ten weeks ahead', middle(year), 'ms', { target: '300 ms' });
    print('paste to finding, twenty years', middle(twenty), 'ms', { target: '600 ms' });
    print('longest task while the worker ran', await longest(page), 'ms', { target: '50 ms' });
    await paste(page, DEMOS[0].text);
    await page.waitForTimeout(500);
    await page.getByRole('button', { name: /^play/i }).click();
    const frames = await page.evaluate(
      () =>
        new Promise<number>((resolve) => {
          let count = 0;
          const start = performance.now();
          const step = (): void => {
            count += 1;
            const passed = performance.now() - start;
            if (passed < 4000) requestAnimationFrame(step);
            else resolve((count * 1000) / passed);
          };
          requestAnimationFrame(step);
        }),
    );
    print('frames a second with both scenes, software rendering, 1280 × 720', frames, '', {
      target: '20',
    });
    print('longest task while the clock ran', await longest(page), 'ms');
  } finally {
    await browser.close();
    await server.close();
    rmSync(outDir, { recursive: true, force: true });
  }
}

function sizes(folder: string): void {
  for (const name of readdirSync(folder).filter((item) => item.endsWith('.js'))) {
    const packed = gzipSync(readFileSync(join(folder, name)));
    print(`size of ${name}`, packed.length / 1000, 'kB gzip');
  }
}

/** The longest task since the last call. */
async function longest(page: Page): Promise<number> {
  return page.evaluate(() => {
    const seen = globalThis as unknown as { longTasks: number[] };
    const most = Math.max(0, ...seen.longTasks);
    seen.longTasks = [];
    return most;
  });
}

/** Milliseconds from the text being put into the paste area to another answer on the page. */
async function paste(page: Page, text: string): Promise<number> {
  return page.evaluate(
    (content) =>
      new Promise<number>((resolve) => {
        const area = document.querySelector<HTMLTextAreaElement>('textarea.paste-text');
        const findings = document.querySelector('#findings');
        if (area === null || findings === null) throw new Error('the desk is not there');
        const data = new DataTransfer();
        data.setData('text/plain', content);
        const start = performance.now();
        const watch = new MutationObserver(() => {
          if (document.querySelector('.findings-stale') !== null) return;
          if (document.querySelector('.finding-answer') === null) return;
          watch.disconnect();
          resolve(performance.now() - start);
        });
        watch.observe(findings, { subtree: true, childList: true, characterData: true });
        area.focus();
        area.select();
        const pasted = new ClipboardEvent('paste', {
          clipboardData: data,
          bubbles: true,
          cancelable: true,
        });
        // A made-up event inserts nothing by itself: what the browser would do is done by hand.
        if (!area.dispatchEvent(pasted)) return;
        const value = Object.getOwnPropertyDescriptor(HTMLTextAreaElement.prototype, 'value');
        value?.set?.call(area, content);
        area.dispatchEvent(
          new InputEvent('input', { bubbles: true, inputType: 'insertFromPaste' }),
        );
      }),
    text,
  );
}

/** The open record's elements as a case file that asks for the span to 2029. */
function publishedText(i: number): string {
  const of = (label: string): string =>
    smallBodyRecord.orbit.elements.find((item) => item.label === label)?.value ?? '';
  const text = `heliocentric ecliptic J2000, case ${'abcdefgh'[i]}
Epoch JD ${smallBodyRecord.orbit.epoch} TDB
q = ${of('q')} au
e = ${of('e')}
i = ${of('i')}
node = ${of('node')}
argp = ${of('peri')}
Tp = JD ${of('tp')}
`;
  const choices = { spanTo: '2029-06-01' };
  const { case: orbit } = readCase(text, choices);
  if (orbit === null) throw new Error('the record does not read');
  return writeCaseFile(orbit, { text, choices, clockTdbSeconds: null, plateFindings: [] });
}
