import { expect, it } from 'vitest';
import { complexText, rootsLatex, rootsText } from '../../src/present/roots.ts';

it('Conjugate roots are written as one, real ones alone, with four digits.', () => {
  const roots = [
    { re: -2, im: 3.14159265 },
    { re: -2, im: -3.14159265 },
    { re: -5, im: 0 },
  ];
  expect(rootsText(roots)).toBe('s ≈ -2 ± 3.142 j, -5');
  expect(rootsLatex(roots)).toBe('s\\approx -2\\pm 3.142\\,\\mathrm{j},\\; -5');
});

it('Roots on the axis have no real part, and a repeated pair is written twice.', () => {
  const pair = [
    { re: 0, im: 1 },
    { re: 0, im: -1 },
  ];
  expect(rootsText(pair)).toBe('s ≈ ±j');
  expect(rootsText([...pair, ...pair])).toBe('s ≈ ±j, ±j');
});

it('No roots is said in a word.', () => {
  expect(rootsText([])).toBe('none');
});

it('A single complex number has its sign.', () => {
  expect(complexText({ re: 1.5, im: -0.25 })).toBe('1.5 - 0.25 j');
  expect(complexText({ re: 0, im: -2 })).toBe('-2 j');
  expect(complexText({ re: 1e-3, im: 0 })).toBe('0.001');
});
