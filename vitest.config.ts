import { fileURLToPath } from 'node:url';
import { quasar, transformAssetUrls } from '@quasar/vite-plugin';
import vue from '@vitejs/plugin-vue';
import { defineConfig } from 'vitest/config';

// A test without an assertion cannot fail. Tests of the server assert through supertest too, which is not counted.
const expect = { requireAssertions: true };

const at = (path: string): string => fileURLToPath(new URL(path, import.meta.url));

export default defineConfig({
  test: {
    projects: [
      {
        test: {
          name: 'shared',
          expect,
          environment: 'node',
          include: ['tests/shared/**/*.test.ts', 'tests/scripts/**/*.test.ts'],
        },
      },
      {
        plugins: [vue({ template: { transformAssetUrls } }), quasar({ autoImportComponentCase: 'kebab' })],
        // Under Vitest `quasar` would resolve to its server bundle.
        resolve: { alias: { quasar: at('./node_modules/quasar/dist/quasar.client.js'), src: at('./src') } },
        test: { name: 'src', expect, environment: 'happy-dom', include: ['tests/src/**/*.test.ts'] },
      },
      {
        test: {
          name: 'server',
          environment: 'node',
          include: ['tests/server/**/*.test.ts'],
          globalSetup: ['tests/support/database.ts'],
          testTimeout: 30_000,
          hookTimeout: 60_000,
        },
      },
      {
        test: {
          name: 'browser',
          environment: 'node',
          include: ['tests/browser/**/*.test.ts'],
          globalSetup: ['tests/support/database.ts'],
          testTimeout: 240_000,
          hookTimeout: 240_000,
          fileParallelism: false,
        },
      },
    ],
  },
});
