import { sveltekit } from '@sveltejs/kit/vite';
import { lezer } from '@lezer/generator/rollup';
import { defineConfig } from 'vite';

export default defineConfig({
  plugins: [lezer(), sveltekit()],
  // The page's security policy allows no font from a data address.
  build: { assetsInlineLimit: 0 },
  worker: { format: 'es', plugins: () => [lezer()] },
});
