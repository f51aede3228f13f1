import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { build, preview } from 'vite';
import type { TestProject } from 'vitest/node';

/** Builds the page once into a folder of its own and serves it for the browser tests. */

declare module 'vitest' {
  export interface ProvidedContext {
    pageUrl: string;
  }
}

export default async function setup(project: TestProject): Promise<() => Promise<void>> {
  const outDir = mkdtempSync(join(tmpdir(), 'skimline-page-'));
  await build({ logLevel: 'warn', build: { outDir, emptyOutDir: true } });
  const server = await preview({ logLevel: 'warn', build: { outDir }, preview: { port: 0 } });
  const url = server.resolvedUrls?.local[0];
  if (url === undefined) throw new Error('the preview server gave no address');
  project.provide('pageUrl', url);
  return async () => {
    await server.close();
    rmSync(outDir, { recursive: true, force: true });
  };
}
