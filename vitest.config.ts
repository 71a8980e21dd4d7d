import { lezer } from '@lezer/generator/rollup';
import { defineConfig } from 'vitest/config';

export default defineConfig({
  plugins: [lezer()],
  test: {
    include: ['test/**/*.test.ts'],
    testTimeout: 60_000,
    hookTimeout: 120_000,
  },
});
