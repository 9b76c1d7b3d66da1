import { fileURLToPath } from 'node:url';
import { defineConfig } from 'vitest/config';

const alias = { '@shared': fileURLToPath(new URL('./shared', import.meta.url)) };
/** UTC unless `npm test` runs a suite in another zone on purpose. */
const env = { TZ: process.env['TEST_TZ'] ?? 'UTC' };
const globalSetup = fileURLToPath(new URL('./test/database/global-setup.ts', import.meta.url));

const product = fileURLToPath(new URL('./test/e2e/product.ts', import.meta.url));

/** The browser's own specs run under `ng test`; everything else runs here, a project a kind. */
export default defineConfig({
  resolve: { alias },
  cacheDir: '.angular/vite',
  test: {
    projects: [
      { resolve: { alias }, test: { name: 'shared', include: ['shared/**/*.spec.ts'], env } },
      {
        resolve: { alias },
        test: {
          name: 'server',
          include: ['{server,emails,scripts}/**/*.spec.ts', 'test/server/**/*.spec.ts'],
          env,
          globalSetup,
          testTimeout: 30_000,
          hookTimeout: 60_000,
        },
      },
      {
        resolve: { alias },
        test: { name: 'published', include: ['test/published/**/*.spec.ts'], env },
      },
      {
        resolve: { alias },
        test: {
          name: 'e2e',
          include: ['test/e2e/**/*.spec.ts'],
          env,
          globalSetup: product,
          testTimeout: 180_000,
          hookTimeout: 180_000,
          fileParallelism: false,
        },
      },
    ],
  },
});
