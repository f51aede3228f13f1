import { type Browser, type BrowserContextOptions, chromium, type Page } from 'playwright-core';
import { inject } from 'vitest';
import { findChromium } from '../../../.ci/chromium.mjs';

/** A real Chromium on the built page, with what happened on it kept for the test to look at. */

export interface Visit {
  page: Page;
  /** Every address that was asked for. */
  requests: string[];
  /** Errors of the page: uncaught exceptions and messages on the console. */
  errors: string[];
  close(): Promise<void>;
}

export async function launch(extra: string[] = []): Promise<Browser> {
  const executablePath = findChromium();
  if (executablePath === null) throw new Error('no Chromium: see .ci/chromium.mjs');
  return chromium.launch({
    executablePath,
    args: [
      '--no-sandbox',
      '--use-angle=swiftshader',
      '--enable-unsafe-swiftshader',
      '--disable-background-networking',
      '--disable-component-update',
      '--disable-sync',
      '--no-first-run',
      ...extra,
    ],
  });
}

/** Opens the page; `ready` waits for the first report. */
export async function visit(
  browser: Browser,
  options: BrowserContextOptions = {},
  ready = true,
): Promise<Visit> {
  const context = await browser.newContext({
    viewport: { width: 1440, height: 900 },
    acceptDownloads: true,
    reducedMotion: 'reduce',
    ...options,
  });
  const page = await context.newPage();
  const requests: string[] = [];
  const errors: string[] = [];
  page.on('request', (request) => requests.push(request.url()));
  page.on('pageerror', (error) => errors.push(error.message));
  page.on('console', (message) => {
    if (message.type() === 'error') errors.push(message.text());
  });
  await page.goto(inject('pageUrl'));
  if (ready) await answer(page);
  return { page, requests, errors, close: () => context.close() };
}

/** The text of the first finding, once there is one that is not about an older case. */
export async function answer(page: Page): Promise<string> {
  const first = page.locator('.finding-answer .finding-text').first();
  await first.waitFor({ timeout: 30_000 });
  return ((await first.textContent()) ?? '').replace(/[\u2009\u202f\u00a0]/g, ' ');
}
