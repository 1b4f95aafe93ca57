import { svelte } from '@sveltejs/vite-plugin-svelte';
import { defineConfig } from 'vite';

// The page: its root is the board's room, so that index.html lives with the pages it opens.
export default defineConfig({
  root: 'src/board',
  base: './',
  publicDir: '../../static',
  plugins: [svelte({ configFile: '../../svelte.config.js' })],
  worker: { format: 'es' },
  build: {
    outDir: '../../dist/board',
    emptyOutDir: true,
    target: 'es2022',
    chunkSizeWarningLimit: 6000,
  },
});
