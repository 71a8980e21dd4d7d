import { sveltekit } from '@sveltejs/kit/vite';
import { lezer } from '@lezer/generator/rollup';
import { defineConfig } from 'vite';

export default defineConfig({
  plugins: [lezer(), sveltekit()],
  worker: { format: 'es', plugins: () => [lezer()] },
});
