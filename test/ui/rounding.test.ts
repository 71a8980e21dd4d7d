import { describe, expect, it } from 'vitest';
import { numberText, readNumber, roundDragged } from '../../src/ui/rounding.ts';
import { writtenUnit } from '../../src/ui/written-unit.ts';

describe('rounding of dragged numbers', () => {
  it('keeps three significant digits', () => {
    expect(roundDragged(9.0512, 20)).toBe(9.05);
    expect(roundDragged(12_345, 20_000)).toBe(12_300);
    expect(roundDragged(-0.98765, 2)).toBe(-0.988);
    expect(roundDragged(3.14159e-9, 1e-8)).toBe(3.14e-9);
  });

  it('is no finer than a thousandth of the decade of the range', () => {
    expect(roundDragged(0.01784, 40)).toBe(0.02);
    expect(roundDragged(0.001, 40)).toBe(0);
  });

  it('leaves zero zero, and is at rest on what it gave', () => {
    expect(roundDragged(0, 40)).toBe(0);
    for (const value of [26.4, 0.07, 1.1, 39.9]) {
      expect(roundDragged(roundDragged(value, 40), 40)).toBe(roundDragged(value, 40));
    }
  });
});

describe('text of numbers', () => {
  it('writes decimals that the language reads', () => {
    expect([9.05, -0.2, -0, 1.2e-7, 1e21].map(numberText)).toEqual([
      '9.05',
      '-0.2',
      '0',
      '1.2e-7',
      '1e21',
    ]);
  });

  it('takes what is typed into a field as the number it is', () => {
    expect(['9.05', ' 12 ', '1.2e-3', '−4', '+3', '.5', '7.'].map(readNumber)).toEqual([
      '9.05',
      '12',
      '1.2e-3',
      '-4',
      '3',
      '.5',
      '7.',
    ]);
  });

  it('refuses what is no number', () => {
    expect(['', '9,05', '3 kN', 'e5', '1e', '--1', 'Infinity'].map(readNumber)).toEqual(
      Array(7).fill(null),
    );
  });

  it('prints powers of units raised', () => {
    expect(writtenUnit('kg m^2')).toBe('kg m²');
    expect(writtenUnit('m^-1 s^10')).toBe('m⁻¹ s¹⁰');
    expect(writtenUnit('deg/s')).toBe('°/s');
  });
});
