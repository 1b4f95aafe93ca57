import { svelte } from '@sveltejs/vite-plugin-svelte';
import { defineConfig } from 'vitest/config';

// Fast tests of every room run here in Node; the page itself is driven in a real browser by `test/browser/run.mjs`.
export default defineConfig({
  plugins: [svelte()],
  test: {
    include: ['test/**/*.test.ts'],
    exclude: ['test/browser/**'],
    environment: 'node',
    testTimeout: 30_000,
    env: { TZ: 'America/New_York' },
  },
});
