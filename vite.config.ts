import react from '@vitejs/plugin-react';
import { defineConfig } from 'vitest/config';

/** While developing, Vite puts styles into the page itself; the built page's policy allows none. */
const stylesWhileDeveloping = {
  name: 'styles-while-developing',
  apply: 'serve' as const,
  transformIndexHtml: (html: string) =>
    html.replace("style-src 'self'", "style-src 'self' 'unsafe-inline'"),
};

export default defineConfig({
  plugins: [react(), stylesWhileDeveloping],
  base: './',
  build: { target: 'es2023', sourcemap: false, assetsInlineLimit: 0, chunkSizeWarningLimit: 1000 },
  worker: { format: 'es' },
  server: { port: 5173 },
  preview: { port: 4173 },
  test: {
    // Two cores are what the tests must fit on; by itself vitest would leave one of them out.
    maxWorkers: 2,
    testTimeout: 60_000,
    hookTimeout: 120_000,
    projects: [
      {
        extends: true,
        test: {
          name: 'code',
          setupFiles: 'tests/seed.ts',
          include: ['tests/**/*.test.ts', 'tests/**/*.test.tsx'],
          exclude: ['tests/desk/browser/**'],
        },
      },
      {
        extends: true,
        test: {
          name: 'page',
          // A real browser in software rendering, on a machine that may be busy.
          testTimeout: 180_000,
          include: ['tests/desk/browser/**/*.test.ts'],
          globalSetup: 'tests/desk/browser/serve.ts',
          fileParallelism: false,
        },
      },
    ],
  },
});
