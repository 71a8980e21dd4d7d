import { expect, it } from 'vitest';
import { withMinus } from '../../src/ui/results/minus.ts';

it('sets a minus sign before numbers and between terms, and leaves hyphens in words', () => {
  expect(withMinus('-16.61 µm/s')).toBe('−16.61 µm/s');
  expect(withMinus('0.4361 - j 0.01038')).toBe('0.4361 − j 0.01038');
  expect(withMinus('a two-term loop, 2e-3')).toBe('a two-term loop, 2e-3');
});
