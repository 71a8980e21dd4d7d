import { all, create } from 'mathjs';
import { describe, expect, it } from 'vitest';
import { isRefusal } from '../../src/base/index.ts';
import { equalDimensions, quantityToSI } from '../../src/units/index.ts';
import type { QuantityMeaning, SiQuantity } from '../../src/units/index.ts';
import cases from '../data/unit-conversions.json' with { type: 'json' };
import { unit } from './unit.ts';

function inSI(number: string, text: string, meaning?: QuantityMeaning): SiQuantity {
  const quantity = quantityToSI(number, unit(text), meaning);
  if (isRefusal(quantity)) throw new Error(quantity.reason);
  return quantity;
}

describe('published conversion factors', () => {
  it.each(cases)('$unit: $source ($how)', (published) => {
    const { value } = inSI(published.count ?? '1', published.unit);
    expect(Math.abs(value / published.expect - 1)).toBeLessThan(published.tolerance.rel);
    expect(equalDimensions(unit(published.unit).dimension, unit(published.in).dimension)).toBe(
      true,
    );
  });

  // A. Thompson, B. N. Taylor, NIST Special Publication 811 (2008), appendix B.8; from memory.
  it.each([
    ['inch', 'm', 2.54e-2],
    ['ft', 'm', 3.048e-1],
    ['yd', 'm', 9.144e-1],
    ['mi', 'm', 1.609344e3],
    ['lb', 'kg', 4.535924e-1],
    ['oz', 'kg', 2.834952e-2],
    ['slug', 'kg', 1.45939e1],
    ['slug ft^2', 'kg m^2', 1.355818],
    ['lbf', 'N', 4.448222],
    ['kgf', 'N', 9.80665],
    ['lbf inch', 'N m', 1.129848e-1],
    ['lbf/ft', 'N/m', 1.45939e1],
    ['psi', 'Pa', 6.894757e3],
    ['atm', 'Pa', 1.01325e5],
    ['bar', 'Pa', 1e5],
    ['mmHg', 'Pa', 1.333224e2],
    ['deg', 'rad', 1.745329e-2],
    ['arcmin', 'rad', 2.908882e-4],
    ['kn', 'm/s', 5.144444e-1],
    ['km/h', 'm/s', 2.777778e-1],
    ['L', 'm^3', 1e-3],
    ['d', 's', 8.64e4],
    ['kWh', 'J', 3.6e6],
  ])('1 %s is as many %s as NIST SP 811 prints (from memory)', (text, si, printed) => {
    expect(Math.abs(unit(text).number / printed - 1)).toBeLessThan(5e-7);
    expect(unit(si).number).toBe(1);
    expect(equalDimensions(unit(text).dimension, unit(si).dimension)).toBe(true);
  });
});

describe('our units against an independent table', () => {
  // Without psi, which mathjs rounds: it is lbf/inch², 6e-11 away.
  const { unit: theirs } = create(all);
  it.each([
    ['m', 'm'],
    ['g', 'g'],
    ['A', 'A'],
    ['K', 'K'],
    ['mol', 'mol'],
    ['cd', 'cd'],
    ['N', 'N'],
    ['J', 'J'],
    ['W', 'W'],
    ['Pa', 'Pa'],
    ['V', 'V'],
    ['C', 'C'],
    ['F', 'F'],
    ['H', 'H'],
    ['T', 'T'],
    ['Wb', 'Wb'],
    ['S', 'S'],
    ['Ω', 'ohm'],
    ['Hz', 'Hz'],
    ['rad', 'rad'],
    ['°', 'deg'],
    ['arcmin', 'arcmin'],
    ['arcsec', 'arcsec'],
    ['mN', 'mN'],
    ['GPa', 'GPa'],
    ['µV', 'uV'],
    ['mbar', 'mbar'],
    ['dm', 'dm'],
    ['hPa', 'hPa'],
    ['daN', 'daN'],
    ['cL', 'cL'],
    ['kg m^2/s^2', 'kg m^2/s^2'],
  ])('%s is the %s of mathjs, to rounding', (our, their) => {
    const factor = theirs(1, their).toSI().value as unknown as number;
    expect(Math.abs(unit(our).number / factor - 1)).toBeLessThan(1e-12);
  });
});

describe('a quantity in SI units', () => {
  it.each([
    ['1.2', 'µrad', 3n, 2500000n, 0],
    ['45', '°', 1n, 4n, 1],
    ['-3.5e2', 'mm', -7n, 20n, 0],
    ['−2', 'kN', -2000n, 1n, 0],
    ['+.5', '%', 1n, 200n, 0],
    ['0.1', '', 1n, 10n, 0],
    ['7200', 'rpm', 240n, 1n, 1],
    ['20', '°C', 5863n, 20n, 0],
    ['0', 'm', 0n, 1n, 0],
    ['20', 'dB', 10n, 1n, 0],
    ['-40', 'dB', 1n, 100n, 0],
  ])('%s %s is exactly %d/%d π^%d', (number, text, n, d, piPower) => {
    expect(inSI(number, text)).toMatchObject({ exactRational: { n, d }, piPower, exact: true });
  });

  it('takes °C without its zero point where it is a difference', () => {
    expect(inSI('5', '°C', { difference: true }).exactRational).toEqual({ n: 5n, d: 1n });
  });

  it('takes decibels as 20 log10 of amplitudes and 10 log10 of densities, and says that they are rounded', () => {
    expect(inSI('6', 'dB')).toMatchObject({ value: 10 ** 0.3, exact: false });
    expect(inSI('3', 'dB', { decibelsOf: 'power' })).toMatchObject({
      value: 10 ** 0.3,
      exact: false,
    });
  });

  it('rounds once: every decimal comes out as the double that the language reads', () => {
    for (const number of [
      '0.1',
      '1.1',
      '2.675',
      '123456.789',
      '9007199254740993',
      '4.35e-12',
      '1e22',
      '8e-290',
    ]) {
      expect(inSI(number, '').value).toBe(Number(number));
    }
    expect(inSI('1.2', 'µrad').value).toBe(1.2e-6);
    expect(inSI('4e-12', 'rad^2/Hz').value).toBe(4e-12);
  });

  it.each(['', '.', 'x', '1e', '1e400', '1e-400', `1${'0'.repeat(400)}`])(
    'refuses %s as a number',
    (number) => {
      expect(quantityToSI(number, unit('m'))).toMatchObject({ code: 'number-range' });
    },
  );
});
