import { lezer } from '@lezer/generator/rollup';
import { defineConfig } from 'vite';

/** The command is one bundled file, so that a check starts in a fraction of a second. */
export default defineConfig({
  plugins: [lezer()],
  publicDir: false,
  ssr: { noExternal: true },
  build: {
    ssr: 'src/cli/main.ts',
    outDir: 'build/cli',
    target: 'node20',
    rollupOptions: { output: { entryFileNames: 'loopwright.js' } },
  },
});
