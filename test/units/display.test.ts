import katex from 'katex';
import { describe, expect, it } from 'vitest';
import {
  chooseUnit,
  coherentUnit,
  cycleFactor,
  dimensionless,
  dimensionOf,
  dimensionText,
  formatNumber,
  formatValue,
  parseUnit,
  powDimension,
  unitText,
  unitToLatex,
} from '../../src/units/index.ts';
import { unit } from './unit.ts';

describe('a value as text', () => {
  it.each([
    [-0.0289, 'mrad', '-28.9 mrad'],
    [0.3 + 4e-17, '', '0.3'],
    [0.1 + 0.2, '', '0.3'],
    [12345.6, 'N', '12346 N'],
    [1234.56, 'N', '1235 N'],
    [999999.7, '', '1e6'],
    [123456789, '', '1.235e8'],
    [1.2e-9, 'm', '1.2e-9 m'],
    [0.0001, '', '0.0001'],
    [0.00009999, '', '9.999e-5'],
    [0, 'kN', '0 kN'],
    [-0, 'kN', '0 kN'],
    [0.08, '%', '8 %'],
    [Math.PI / 4, '°', '45°'],
    [Math.PI / 4, 'deg', '45 deg'],
    [293.15, '°C', '20 °C'],
    [2, 'dB', '6.021 dB'],
    [480, 'kg m^2', '480 kg m²'],
    [3e-6, 'urad/√Hz', '3 µrad/√Hz'],
    [Infinity, 'm', 'infinite'],
    [-Infinity, 'm', '-infinite'],
    [NaN, 'm', 'not a number'],
  ])('%d in %s is written %s', (si, text, written) => {
    expect(formatValue(si, unit(text))).toBe(written);
  });

  it('follows the meaning that it is given', () => {
    expect(formatValue(5, unit('°C'), { difference: true })).toBe('5 °C');
    expect(formatValue(2, unit('dB'), { decibelsOf: 'power' })).toBe('3.01 dB');
    expect(formatNumber(Math.PI, 8)).toBe('3.1415927');
    expect(formatValue(0, unit('dB'))).toBe('-infinite');
  });
});

describe('the unit of a result', () => {
  it.each([
    ['N m', ['kN m'], 500, {}, '500 N m'],
    ['N m', ['kN m', 'N m'], 500, {}, '500 N m'],
    ['N m/rad', ['kN m/rad'], 5200, { angle: -1 }, '5.2 kN m/rad'],
    ['N m/rad', ['kN m/rad'], 5e-4, { angle: -1 }, '500 µN m/rad'],
    ['rad', ['mrad'], -0.0289, { angle: 1 }, '-28.9 mrad'],
    ['rad', [], 2e-7, { angle: 1 }, '200 nrad'],
    ['rad', ['°'], 0.5, { angle: 1 }, '28.65°'],
    ['rad', [], 7000, { angle: 1 }, '7000 rad'],
    ['kg', ['kg'], 0.002, {}, '2 g'],
    ['kg', [], 20000, {}, '20000 kg'],
    ['m^2', [], 4e-6, {}, '4 mm²'],
    ['rad^2/Hz', [], 4e-12, { angle: 2, cycles: -1 }, '4 µrad²/Hz'],
    ['Hz', [], 2500, { cycles: 1 }, '2.5 kHz'],
    ['1/s', ['Hz'], 25, {}, '25 1/s'],
    ['1/s', ['Hz'], 25, { angle: 1 }, '25 rad/s'],
    ['', ['%', 'dB', 'mrad'], 0.2, {}, '0.2'],
    ['K', ['°C'], 12, {}, '12 K'],
    ['m', ['m'], 999.96e-3, {}, '1 m'],
    ['m', ['mm'], 0, {}, '0 mm'],
    ['N m/(rad s)', [], 4100, { angle: -1 }, '4.1 kN m/(rad s)'],
  ])(
    '%s with %j typed: %d is shown, counting %j, as %s',
    (dimension, typed, si, counted, shown) => {
      const chosen = chooseUnit(unit(dimension).dimension, typed.map(unit), si, counted);
      expect(formatValue(si, chosen)).toBe(shown);
    },
  );

  it('moves the prefix without changing the value', () => {
    for (let decade = -14; decade < 14; decade++) {
      for (const text of ['kN m/rad', 'mm²', 'µrad/√Hz', 'km/h', 'g', 'kΩ']) {
        const typed = unit(text);
        const chosen = chooseUnit(typed.dimension, [typed], 3 * 10 ** decade, typed);
        const again = unit(chosen.text);
        expect(again.factor).toEqual(chosen.factor);
        expect(again.dimension).toEqual(typed.dimension);
      }
    }
  });
});

describe('the coherent unit of a dimension', () => {
  it('reads back as the same dimension with the factor 1', () => {
    const exponents = [-3, -2, -1.5, -1, -0.5, 0, 0.5, 1, 2, 4];
    for (const kg of [-1, 0, 1, 2]) {
      for (const m of exponents) {
        for (const s of exponents) {
          for (const ampere of [-1, 0, 2]) {
            const dimension = dimensionOf([kg, m, s, ampere]);
            expect(unit(dimensionText(dimension))).toMatchObject({ dimension, number: 1 });
            const counted = { angle: -1, cycles: 0.5 };
            expect(unit(dimensionText(dimension, counted))).toMatchObject({
              dimension,
              ...counted,
            });
          }
        }
      }
    }
  });

  it.each([
    [[1, 2, -2], 'N m'],
    [[1, 2], 'kg m²'],
    [[1, 0, -2], 'N/m'],
    [[1, 2, -3], 'W'],
    [[1, -1, -2], 'Pa'],
    [[1, 2, -3, -1], 'V'],
    [[1, 2, -3, -2], 'Ω'],
    [[1, 1, -2, -1], 'N/A'],
    [[0, 1, -2], 'm/s²'],
    [[0, 0, -1], '1/s'],
    [[0, 0, -0.5], '1/√s'],
    [[1, 0, -3, 0, -1], 'W/(m² K)'],
  ])('kg m s A K mol cd to %j is %s', (exponents, text) => {
    expect(dimensionText(dimensionOf(exponents))).toBe(text);
  });

  it('is empty for a pure number and shows third powers that no unit syntax has', () => {
    expect(dimensionText(dimensionless)).toBe('');
    expect(coherentUnit(dimensionless, { angle: 1 }).text).toBe('rad');
    expect(dimensionText(powDimension(dimensionOf([0, 1]), 3, 2))).toBe('m √m');
  });
});

it.each([
  ['an angular frequency in Hz', 0, 'Hz', 1 / (2 * Math.PI)],
  ['a frequency in rpm', 1, 'rpm', 2 * Math.PI],
  ['a frequency in kHz', 1, 'kHz', 1],
  ['a frequency in 1/s', 1, '1/s', 1],
  ['an angular frequency in °/s', 0, '°/s', 1],
  ['a density per Hz', 0, 'rad^2/Hz', 1],
])('%s needs the right factor of 2π', (_, cycles, text, factor) => {
  expect(cycleFactor(cycles, unit(text))).toBe(factor);
});

describe('a unit in LaTeX', () => {
  it.each([
    ['kN m/rad', '\\mathrm{kN}\\,\\mathrm{m}/\\mathrm{rad}'],
    ['N^2 m^2/Hz', '\\mathrm{N}^{2}\\,\\mathrm{m}^{2}/\\mathrm{Hz}'],
    ['kN m/(rad s)', '\\mathrm{kN}\\,\\mathrm{m}/(\\mathrm{rad}\\,\\mathrm{s})'],
    ['µrad/√Hz', '\\mu\\mathrm{rad}/\\sqrt{\\mathrm{Hz}}'],
    ['1/s', '1/\\mathrm{s}'],
    ['°', '{}^{\\circ}'],
    ['°^2', '{{}^{\\circ}}^{2}'],
    ['°C', '{}^{\\circ}\\mathrm{C}'],
    ['%', '\\%'],
    ['kΩ', '\\mathrm{k\\Omega}'],
    ['', ''],
    ['not / a / unit', '\\mathrm{not / a / unit}'],
  ])('%s is %s', (text, latex) => {
    expect(unitToLatex(text)).toBe(latex);
    katex.renderToString(latex, { throwOnError: true, strict: 'error' });
  });

  it('prints units alike however they were typed', () => {
    expect(unitText('kg  m^2')).toBe('kg m²');
    expect(unitText('(m/s)/K')).toBe('(m/s)/K');
    expect(unitText('uN·m^-1')).toBe('µN m⁻¹');
    for (const text of ['kg m^2', '(m/s)/K', '√(N² m²/Hz)', 'm (N/m)', '(N m)^2']) {
      expect(parseUnit(unitText(text))).toMatchObject({
        factor: unit(text).factor,
        dimension: unit(text).dimension,
      });
    }
  });
});
