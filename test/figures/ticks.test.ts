import { expect, it } from 'vitest';
import { ticksOver } from '../../src/figures/ticks.ts';

const texts = (from: number, to: number, count = 5) =>
  ticksOver([from, to], count).map(({ text }) => text);

it('Ticks carry no more decimals than their step needs.', () => {
  expect(texts(0, 1)).toEqual(['0.0', '0.2', '0.4', '0.6', '0.8', '1.0']);
  expect(texts(0, 20)).toEqual(['0', '5', '10', '15', '20']);
});

it('Negative ticks have a typographic minus sign, and zero has none.', () => {
  expect(texts(-10, 10)).toEqual(['−10', '−5', '0', '5', '10']);
});

it('Very large and very small ticks share a power of ten.', () => {
  expect(texts(0, 4e6, 4)).toEqual(['0', '1·10⁶', '2·10⁶', '3·10⁶', '4·10⁶']);
  expect(texts(0, 2e-5, 4)).toEqual(['0', '0.5·10⁻⁵', '1.0·10⁻⁵', '1.5·10⁻⁵', '2.0·10⁻⁵']);
});
