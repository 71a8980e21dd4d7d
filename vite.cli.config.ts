import { chmodSync } from 'node:fs';
import { lezer } from '@lezer/generator/rollup';
import { defineConfig } from 'vite';

const COMMAND = 'build/cli/loopwright.js';

/** The command's code is bundled, so that a check starts in a fraction of a second. */
export default defineConfig({
  plugins: [
    lezer(),
    { name: 'make-command-executable', closeBundle: () => chmodSync(COMMAND, 0o755) },
  ],
  publicDir: false,
  ssr: { noExternal: true },
  build: {
    ssr: 'src/cli/main.ts',
    outDir: 'build/cli',
    target: 'node20',
    rollupOptions: {
      output: { entryFileNames: 'loopwright.js', chunkFileNames: '[name]-[hash].js' },
    },
  },
});
