import { describe, expect, it } from 'vitest';
import { isRefusal } from '../../src/base/index.ts';
import { customUnit, dimensionText, isUnitSymbol, parseUnit } from '../../src/units/index.ts';
import { PREFIXES, SYMBOLS } from '../../src/units/unit-symbols.ts';
import { unit } from './unit.ts';

function reasonOf(text: string): string {
  const answer = parseUnit(text);
  return isRefusal(answer) ? answer.reason : `no refusal: ${answer.factor.rational}`;
}

describe('a unit expression', () => {
  it.each([
    ['kN m/rad', '1000', 0, 'N m'],
    ['kN m/(rad s)', '1000', 0, 'W'],
    ['N^2 m^2/Hz', '1', 0, 'N² m² s'],
    ['N² m²/Hz', '1', 0, 'N² m² s'],
    ['N·m', '1', 0, 'N m'],
    ['N⋅m', '1', 0, 'N m'],
    ['kg m^-1 s⁻²', '1', 0, 'Pa'],
    ['kg m^(-1) s^−2', '1', 0, 'Pa'],
    ['1/s', '1', 0, '1/s'],
    ['(m/s)/K', '1', 0, 'm/(s K)'],
    ['mrad', '1/1000', 0, ''],
    ['urad', '1/1000000', 0, ''],
    ['μrad', '1/1000000', 0, ''],
    ['µrad/√Hz', '1/1000000', 0, '√s'],
    ['√(N² m²/Hz)', '1', 0, 'N m √s'],
    ['°/s', '1/180', 1, '1/s'],
    ['mdeg', '1/180000', 1, ''],
    ['′', '1/10800', 1, ''],
    ['″', '1/648000', 1, ''],
    ['rev/min', '1/30', 1, '1/s'],
    ['%', '1/100', 0, ''],
    ['%/s', '1/100', 0, '1/s'],
    ['min', '60', 0, 's'],
    ['kWh', '3600000', 0, 'N m'],
    ['km/h', '5/18', 0, 'm/s'],
    ['L/min', '1/60000', 0, 'm³/s'],
    ['mΩ', '1/1000', 0, 'Ω'],
    ['m\u2126', '1/1000', 0, 'Ω'],
    ['g', '1/1000', 0, 'kg'],
    ['Mg', '1000', 0, 'kg'],
    ['t', '1000', 0, 'kg'],
    ['', '1', 0, ''],
    ['1', '1', 0, ''],
  ])('%s is %s π^%i times a coherent unit of %s', (text, rational, pi, dimension) => {
    expect(unit(text).factor).toEqual({ rational, pi });
    expect(dimensionText(unit(text).dimension)).toBe(dimension);
  });

  it.each([
    ['rad', 1, 0],
    ['N m/rad', -1, 0],
    ['rpm', 1, 0],
    ['Hz', 0, 1],
    ['kHz', 0, 1],
    ['rad^2/Hz', 2, -1],
    ['°/√Hz', 1, -0.5],
    ['1/s', 0, 0],
  ])('%s counts angle %d and cycles %d for display', (text, angle, cycles) => {
    expect(unit(text)).toMatchObject({ angle, cycles });
  });

  it('knows that dB, °C and % are special when they stand alone', () => {
    expect(unit('dB').logarithmic).toBe('dB');
    expect(unit('°C').offset).toBe('5463/20');
    expect(unit('%').isPercent).toBe(true);
    expect(unit('%/s').isPercent).toBe(false);
  });
});

describe('a refused unit', () => {
  it.each([
    ['N/m s', "the unit 'N/m s' goes on after its solidus; write N/(m s) or (N/m) s"],
    ['kg/m/s', "the unit 'kg/m/s' goes on after its solidus; write kg/(m s) or (kg/m)/s"],
    [
      'm (N/m s) K',
      "the unit 'm (N/m s) K' goes on after its solidus; write m (N/(m s)) K or m ((N/m) s) K",
    ],
    ['Nm', "'Nm' is not a unit; did you mean N m?"],
    ['kNm', "'kNm' is not a unit; did you mean kN m?"],
    ['m2', "'m2' is not a unit; did you mean m^2?"],
    ['KHz', "'KHz' is not a unit; did you mean kHz?"],
    ['hz', "'hz' is not a unit; did you mean Hz?"],
    ['in', "'in' is not a unit; did you mean inch?"],
    ['sec', "'sec' is not a unit; did you mean s?"],
    ['furlong', "'furlong' is not a unit"],
    ['dB/s', 'dB is a logarithm and stands alone in a unit'],
    ['W/°C', '°C stands alone; in a compound unit write K'],
    ['N*m', "'*' cannot stand in the unit 'N*m'; a space multiplies"],
    ['N m)', "the unit 'N m)' has a ')' too many"],
    ['(N m', "the unit '(N m' has a bracket that is not closed"],
    ['N/', "the unit 'N/' lacks a symbol before its end"],
    ['m 1/s', "the unit 'm 1/s' has a '1' too many"],
    ['√Hz²', "the unit '√Hz²' has a power after a root; put what stands under √ in brackets"],
    ['m^99', "the unit 'm^99' has a power beyond 24"],
    [
      '√kHz',
      'the root of a unit that is 1000 SI units is not exact; use a unit whose factor is a square',
    ],
  ])('%s says: %s', (text, reason) => {
    expect(reasonOf(text)).toBe(reason);
  });
});

describe('a unit symbol', () => {
  it('has one reading with a prefix, except that the foot is not a femtotonne', () => {
    const readings = new Map<string, string[]>();
    for (const { symbol, prefixed } of SYMBOLS.values()) {
      for (const prefix of prefixed ? ['', ...PREFIXES.keys()] : ['']) {
        const text = prefix + symbol;
        readings.set(text, [...(readings.get(text) ?? []), `${prefix}|${symbol}`]);
      }
    }
    const ambiguous = [...readings.values()].filter((found) => found.length > 1);
    expect(ambiguous).toEqual([['f|t', '|ft']]);
  });

  it.each([
    ['min', true],
    ['mrad', true],
    ['µm', true],
    ['dB', true],
    ['°C', true],
    ['°', true],
    ['kmin', false],
    ['rad/s', false],
    ['mmm', false],
    ['', false],
    ['u', false],
  ])('%s is one: %s', (text, isOne) => {
    expect(isUnitSymbol(text)).toBe(isOne);
  });
});

describe('a unit of the worksheet', () => {
  const count = customUnit('count', '1.2', unit('µrad'));
  const custom = new Map(isRefusal(count) ? [] : [['count', count]]);

  it('multiplies like any other', () => {
    expect(parseUnit('count/√Hz', custom)).toMatchObject({
      factor: { rational: '3/2500000', pi: 0 },
      angle: 1,
      cycles: -0.5,
    });
    expect(isUnitSymbol('count', custom)).toBe(true);
    expect(isUnitSymbol('count')).toBe(false);
  });

  it('cannot take the symbol of a unit, be nothing, or be in °C or dB', () => {
    const reasons = [
      customUnit('mm', '3', unit('m')),
      customUnit('tick', '0', unit('m')),
      customUnit('tick', '3', unit('dB')),
      customUnit('tick', '3', unit('°C')),
    ].map((answer) => (isRefusal(answer) ? answer.reason : ''));
    expect(reasons).toEqual([
      'mm is a unit already',
      'the unit tick needs a size greater than 0',
      'tick cannot be defined in dB',
      'tick cannot be defined in °C',
    ]);
  });
});
