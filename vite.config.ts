import { svelte } from '@sveltejs/vite-plugin-svelte';
import { fileURLToPath } from 'node:url';
import { defineConfig } from 'vite';

// The page: its root is the board's room, so that index.html lives with the pages it opens.
export default defineConfig({
  root: fileURLToPath(new URL('src/board', import.meta.url)),
  base: './',
  publicDir: '../../static',
  plugins: [svelte({ configFile: '../../svelte.config.js' })],
  worker: { format: 'es' },
  build: {
    outDir: '../../dist/board',
    emptyOutDir: true,
    // Read by the size budget, test/first-load.mjs.
    manifest: true,
    target: 'es2022',
    chunkSizeWarningLimit: 6000,
  },
});
