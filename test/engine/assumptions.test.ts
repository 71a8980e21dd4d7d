import { describe, expect, test } from 'vitest';
import { evaluateCell } from './worksheet.ts';

const rowsOf = (cell: string) => {
  const { problems, report } = evaluateCell(cell);
  expect(problems).toEqual([]);
  return report.assumptions.map(({ content }) => content);
};

/** Nominal and span of twice a name, in SI. */
const spanOf = (assumption: string) => {
  const { problems, result } = evaluateCell(`${assumption}\nq1 = 2 x`);
  expect(problems).toEqual([]);
  const { value, span } = result('q1');
  return [value, span?.low ?? null, span?.high ?? null].map((si) =>
    si === null ? null : Number((Number(si) / 2).toPrecision(12)),
  );
};

describe('an assumption', () => {
  test('is listed with its description, tolerance, sign and slider', () => {
    const [J, Tw, Kp] = rowsOf(`J is 480 kg m^2 ± 8 %   # dish and counterweight
Tw is 260 N m from 0 to 400 N m
Kp is 9 kN m/rad
tune Kp from 1 to 20 kN m/rad
J is positive`);
    expect(J).toMatchObject({
      name: 'J',
      description: 'dish and counterweight',
      number: 480,
      unit: 'kg m²',
      sign: 'positive',
      slider: { low: 441.6, high: 518.4, why: 'tolerance' },
      used: false,
    });
    expect(Tw).toMatchObject({ slider: { low: 0, high: 400, why: 'tolerance' }, sign: null });
    expect(Kp).toMatchObject({ number: 9, slider: { low: 1, high: 20, why: 'tune' } });
  });

  test.each([
    ['x is 2 m ± 10 %', 2, 1.8, 2.2],
    ['x is -2 m ± 10 %', -2, -2.2, -1.8],
    ['x is 3 m ± 50 cm', 3, 2.5, 3.5],
    ['x is 3 m +- 50 cm', 3, 2.5, 3.5],
    ['x is 480 ± 20 kg', 480, 460, 500],
    ['x is 4 m from 3 to 6 m', 4, 3, 6],
    ['x is 4 from 3 to 6 m', 4, 3, 6],
    ['x is 3 m ± 8 % at 3 sigma', 3, 2.76, 3.24],
    ['x is 3 ± 1', 3, 2, 4],
    ['x is 10 % ± 2', 0.1, 0.08, 0.12],
    ['x is 20 °C ± 5 K', 293.15, 288.15, 298.15],
    ['x is 2 kN from 1500 to 2500 N', 2000, 1500, 2500],
    ['x is 5 m', 5, null, null],
  ])('%s is nominally %d, between %d and %d', (assumption, nominal, low, high) => {
    expect(spanOf(assumption)).toEqual([nominal, low, high]);
  });

  test.each([
    [
      'x is 0 m ± 10 %',
      '10 %',
      'x is 0, so a tolerance in % is 0 too; give it as a quantity or a range.',
    ],
    ['x is 5 m from 6 to 7 m', 'from 6 to 7 m', 'The nominal of x, 5 m, is outside its range.'],
    [
      'x is 5 m from 7 to 3 m',
      '7 to 3 m',
      'The range runs backwards; the smaller number comes first.',
    ],
    [
      'x is 10 % ± 5 %',
      '5 %',
      'x is in %, so ± % could mean two things; give the tolerance as a number without unit.',
    ],
    [
      'x is 20 °C ± 5 %',
      '5 %',
      'A percentage of a temperature in °C has no meaning; give the tolerance in K.',
    ],
    ['x is 5 m ± 2 s', 's', 'x is given in m, and s does not fit it.'],
    ['x is 3 m\ntune x from 1 to 2 s', '1', 'x is given in m, and s does not fit it.'],
    [
      'x is 3 m\ntune x from 5 to 4 m',
      '5 to 4 m',
      'The range runs backwards; the smaller number comes first.',
    ],
    ['tune x from 1 to 2', 'x', 'x has no value to tune; add `x is …`.'],
    [
      'x = 3\ntune x from 1 to 2',
      'x',
      'x is not an assumption, so it cannot be tuned; give it a value with `x is …`.',
    ],
  ])('%s is refused', (assumption, place, message) => {
    expect(evaluateCell(assumption).problems).toEqual([`error at ‹${place}›: ${message}`]);
  });
});

describe('a sign statement', () => {
  test.each([
    ['x is -2 1/s\nx is positive', 'x is -2 1/s, which contradicts that it is positive (line 3).'],
    ['x is 0 1/s\nx is positive', 'x is 0 1/s, which contradicts that it is positive (line 3).'],
    [
      'x is 2 1/s from -1 to 3 1/s\nx is positive',
      'x can be from -1 to 3 1/s, which contradicts that it is positive (line 3).',
    ],
    ['x is 3\nx is negative', 'x is 3, which contradicts that it is negative (line 3).'],
    [
      'a is 2 ± 1\nb is 2.5\nx = a - b\nx is negative',
      'x can be from -1.5 to 0.5, which contradicts that it is negative (line 5).',
    ],
  ])('%s is contradicted by the value', (lines, message) => {
    const cell = evaluateCell(`${lines}\nq1 = final(1/(s (s + x)))\nrequire stable(s + x) # R-1`);
    expect(cell.problems).toEqual([`error at ‹x›: ${message}`]);
    expect(cell.result('q1')).toMatchObject({
      state: 'error',
      value: null,
      waitsFor: { name: 'x' },
    });
    expect(cell.requirement('R-1')).toMatchObject({
      verdict: 'undecided',
      waitsFor: { name: 'x' },
    });
  });

  test.each([
    'x is 0 m\nx is nonnegative',
    'x is -3 m\nx is real',
    'a is 2\nx = a^2\nx is positive',
  ])('%s is not contradicted', (lines) => {
    expect(evaluateCell(lines).problems).toEqual([]);
  });

  test('makes a symbol without a value', () => {
    const { problems, result, report } = evaluateCell(`
q1 has unit N/m
x is 3 m
F = q1 x in N
require F <= 3 N # R-1
q1 is positive`);
    expect(problems).toEqual([]);
    expect(result('F')).toMatchObject({ formula: 'q1 x', value: null, unit: 'N' });
    expect(result('F').notes).toEqual(['No number: q1 has no value.']);
    expect(report.requirements[0].content.verdict).toBe('undecided');
  });
});
