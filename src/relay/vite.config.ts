import { fileURLToPath } from 'node:url';
import { defineConfig } from 'vite';

// The command line: plain Node modules; libraries stay where npm put them.
export default defineConfig({
  root: fileURLToPath(new URL('../..', import.meta.url)),
  publicDir: false,
  build: {
    ssr: true,
    target: 'node20',
    outDir: 'dist/relay',
    copyPublicDir: false,
    rolldownOptions: {
      // The second is what each thread of a scan runs.
      input: { main: 'src/relay/main.ts', 'scan-worker': 'src/relay/scan/worker.ts' },
      output: { entryFileNames: '[name].js', chunkFileNames: '[name]-[hash].js' },
    },
  },
});
