import { defineConfig } from 'vitest/config';

// Drives the built page, served by the real program, in a real browser. One file at a time: each has the browser alone.
export default defineConfig({
  test: {
    expect: { poll: { timeout: 20_000 } },
    include: ['test/browser/**/*.test.ts'],
    globalSetup: ['test/browser/serve-page.ts'],
    environment: 'node',
    fileParallelism: false,
    testTimeout: 60_000,
    hookTimeout: 60_000,
  },
});
