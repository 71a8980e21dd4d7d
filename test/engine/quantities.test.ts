import { describe, expect, test } from 'vitest';
import { afterFix, evaluateCell } from './worksheet.ts';

function problemsOf(cell: string): readonly string[] {
  return evaluateCell(cell).problems;
}

describe('quantities', () => {
  test.each([
    ['9 kN m/rad', 9000, 'N m/rad'],
    ['0.2 mrad', 0.0002, 'rad'],
    ['12 Hz', 12, 'Hz'],
    ['8 %', 0.08, null],
    ['1.2e-3', 0.0012, null],
    ['45°', Math.PI / 4, 'rad'],
    ['25 1/s', 25, '1/s'],
    ['-3 m^-2', -3, '1/m²'],
    ['+4 m', 4, 'm'],
    ['3 kg·m^2', 3, 'kg m²'],
    ['3 (N m)/(rad s)', 3, 'N m/(rad s)'],
    ['5 µrad/√Hz', 5e-6, 'rad/√Hz'],
    ['100 rpm', (100 * 2 * Math.PI) / 60, 'rad/s'],
    ['20 °C', 293.15, 'K'],
    ['2 inch', 0.0508, 'm'],
    ['0.04 N^2 m^2/Hz', 0.04, 'N² m²/Hz'],
  ])('%s', (quantity, value, unit) => {
    const cell = evaluateCell(`a is ${quantity}\nx = a`);
    expect(cell.problems).toEqual([]);
    expect(cell.result('x').value).toBeCloseTo(value, 12);
    expect(cell.result('x').unit).toBe(unit);
  });

  test('6 dB is a ratio', () => {
    const cell = evaluateCell('g is 6 dB\nx = 2 g in dB');
    expect(cell.result('x').value).toBeCloseTo(2 * 10 ** 0.3, 12);
    expect(cell.result('x').shown).toBe('12.02 dB');
  });

  test.each([
    ['v is 5 m²', '²', 'The character `²` has no meaning here; write `^2`.'],
    ['v is 3 Nm', 'Nm', "'Nm' is not a unit; did you mean N m?"],
    ['v is 3 foo', 'foo', "'foo' is not a unit."],
    ['v is 3 kg*m', '*', 'In a unit a space or `·` multiplies, not `*`.'],
    ['v is 3 /s', '/', 'A unit that only divides has 1 before its solidus.'],
    ['v is 2 in', 'in', '`in` shows a value in a unit; the inch is written `inch`.'],
    ['v is 3 kg/°C', 'kg/°C', '°C stands alone; in a compound unit write K.'],
    ['v is 12 000 N', '12 000', '`12 000` is not one number: a number has no spaces in it.'],
    ['v is 0,2 m', '0,2', '`0,2` is not one number: the decimal sign is a point.'],
    ['v is', 'is', '`v is` needs a number, but the line ends.'],
    ['v is m', 'm', '`is` gives `v` a number with a unit; for a formula write `v = m`.'],
    ['v is 3 kg ±', '±', '`±` needs a number, but the line ends.'],
    ['v is 3 kg from 2', '2', 'A range, `from 1 to 20`, needs `to` here, but the line ends.'],
  ])('%s is refused', (statement, at, message) => {
    const cell = evaluateCell(`${statement}\na is 2\ny = 2 a`);
    expect(cell.problems).toEqual([`error at ‹${at}›: ${message}`]);
    expect(cell.result('y').value).toBe(4);
  });

  test.each([
    ['v is 5 m²', 'write `^2`', 'v is 5 m^2'],
    ['v is 3 kg*m', 'write a space', 'v is 3 kg m'],
    ['v is 3 /s', 'write `1/s`', 'v is 3 1/s'],
    ['v is 2 in', 'write `inch`', 'v is 2 inch'],
    ['v is 12 000 N', 'write `12000`', 'v is 12000 N'],
    ['v is 0,2 m', 'write `0.2`', 'v is 0.2 m'],
  ])('%s is fixed', (statement, title, fixed) => {
    expect(afterFix(statement, title)).toBe(fixed);
    expect(problemsOf(fixed)).toEqual([]);
  });
});

describe('quantity slots', () => {
  test.each([
    ['after `is`, units only: m is also a mass', 'm is 3 kg\nx is 2 m\ny = x', 2],
    ['after `in`, units only', 'm is 3 kg\nx is 2000 mm\ny = x in m', 2],
    ['in the time of a delay', 'y = (delay(2 s) with s = 1)', Math.exp(-2)],
    ['in a limit', 'a is 3 m\ny = a', 3],
  ])('%s', (_, cell, value) => {
    const evaluated = evaluateCell(cell);
    expect(evaluated.problems).toEqual([]);
    expect(evaluated.result('y').value).toBeCloseTo(value, 12);
  });

  test('where every unit symbol is a name too, both readings are offered', () => {
    const cell = 'm is 3 kg\nx is 3 m\nrequire x <= 2 m';
    expect(problemsOf(cell)).toEqual([
      'error at ‹2 m›: `2 m` can be a quantity or a product, because `m` is also given in this worksheet.',
    ]);
    const quantity = afterFix(cell, 'a quantity: `2 [m]`');
    expect(quantity).toBe('m is 3 kg\nx is 3 m\nrequire x <= 2 [m]');
    expect(evaluateCell(quantity).requirement('x').limit).toBe(2);
    const product = afterFix(cell, 'a product: `(2 m)`');
    expect(problemsOf(product)).toEqual([
      'error at ‹x <= (2 m)›: `x` is in m and cannot be compared with `2 m`, which is in kg.',
    ]);
  });

  test('where one of the unit symbols is no name, it is a quantity', () => {
    expect(problemsOf('m is 3 kg\nx is 3 N m\nrequire x <= 2 N m')).toEqual([]);
  });

  test.each([
    ['require x <= 2 a', 'a formula'],
    ['require x <= a', 'a name'],
    ['require x <= 2 [m]', 'a bracketed unit'],
    ['require x <= 2 m and x >= 1 m', 'two'],
    ['require x <= a + 2 m', 'a sum is a formula'],
  ])('%s: %s', (statement) => {
    const problems = problemsOf(`a is 2 m\nx is 1 m\n${statement}`);
    expect(problems).toEqual(
      statement.endsWith('a + 2 m')
        ? ['error at ‹m›: In a formula a unit stands in square brackets after its number: `2 [m]`.']
        : [],
    );
  });

  test('in the sources of a case', () => {
    const cell = evaluateCell(
      "loop a driven by w\n  x' = w - 2 x\ncase c of a\n  w = step(4 N) after 3 s\ny = final(c.x)\nz = c.x with t = 4 [s]",
    );
    expect(cell.problems).toEqual([]);
    expect(cell.result('y').value).toBe(2);
    expect(cell.result('z').value).toBeCloseTo(2 * (1 - Math.exp(-2)), 12);
  });

  test('in a formula a name is a symbol, and a unit stands in brackets', () => {
    const cell = evaluateCell('J is 4\nTd is 2 s\nx = 2 s + J\ny = 3 [rad/s] J\nz = 1/2 [s]');
    expect(cell.problems).toEqual([]);
    expect(cell.result('x').formula).toBe('2 s + J');
    expect(cell.result('y')).toMatchObject({ value: 12 });
    expect(cell.result('z')).toMatchObject({ value: 0.5, unit: '1/s' });
  });

  test('a definition that was meant as an assumption is warned of', () => {
    const cell = 'Td = 2 s';
    expect(problemsOf(cell)).toEqual([
      'warning at ‹2 s›: `2 s` is twice the Laplace variable; for seconds write `Td is 2 s`.',
    ]);
    expect(afterFix(cell, 'write `Td is 2 s`')).toBe('Td is 2 s');
    expect(problemsOf('x = 2 m')).toEqual([
      'error at ‹2 m›: In a formula `m` is a name, not a unit; for the quantity write `x is 2 m`.',
    ]);
    expect(problemsOf('C = 2/s\nx = 2 C s')).toEqual([]);
  });
});

describe('decibels', () => {
  const spanOf = (assumption: string) => {
    const cell = evaluateCell(`g is ${assumption}\nx = g in dB`);
    expect(cell.problems).toEqual([]);
    return cell.result('x');
  };

  test.each(['6 dB ± 1 dB', '6 dB ± 1', '6 ± 1 dB', '6 dB from 5 to 7 dB'])(
    'a tolerance in dB is added in dB: %s',
    (assumption) => {
      const { span } = spanOf(assumption);
      expect(span!.low).toBeCloseTo(10 ** (5 / 20), 12);
      expect(span!.high).toBeCloseTo(10 ** (7 / 20), 12);
      expect(span!.shown).toBe('5 to 7 dB');
    },
  );

  test('a tolerance in % of decibels is refused', () => {
    expect(problemsOf('g is 6 dB ± 10 %')).toEqual([
      'error at ‹10 %›: g is in dB, so ± % could mean two things; give the tolerance in dB.',
    ]);
  });

  test('are 10 log10 of a ratio of densities', () => {
    const cell = evaluateCell(
      'S is 4 m^2/Hz\nS1 is 1 m^2/Hz\nx = S/S1 in dB\ny = 2 x in dB\nz = sqrt(S/S1) in dB\nk is 4\nu = k in dB',
    );
    expect(cell.problems).toEqual([]);
    expect(['x', 'y', 'z', 'u'].map((name) => cell.result(name).shown)).toEqual([
      '6.021 dB',
      '9.031 dB',
      '6.021 dB',
      '12.04 dB',
    ]);
  });

  test('of a ratio of densities are not typed as a limit', () => {
    const cell = 'S is 4 m^2/Hz\nS1 is 1 m^2/Hz\nrequire S/S1 <= 10 dB';
    expect(problemsOf(cell)).toEqual([
      'error at ‹10 dB›: `S/S1` is a ratio of densities, of which decibels are 10 log10; write the ratio itself, `10`.',
    ]);
    expect(evaluateCell(afterFix(cell, 'Write 10')).requirement('S/S1').verdict).toBe('met');
  });

  test('are refused of what has a dimension', () => {
    expect(problemsOf('v is 3 m\nx = v in dB')).toEqual([
      'error at ‹dB›: `v` is in m, so it cannot be shown in dB.',
    ]);
    expect(problemsOf('v is 3 m\nrequire v <= 3 dB')).toHaveLength(1);
    expect(problemsOf('v is 3 dB/m')).toHaveLength(1);
  });

  test('are not of a complex number', () => {
    const cell = evaluateCell('C = 2 + 3/s\nx = C(3 j) in dB\ny = abs(C(3 j)) in dB');
    expect(cell.result('x')).toMatchObject({ value: [2, -1], shown: '2 - j 1' });
    expect(cell.result('x').notes).toEqual([
      'A complex number has no decibels; take its magnitude, `abs(…)`.',
    ]);
    expect(cell.result('y').shown).toBe('6.99 dB');
  });
});

describe('temperatures', () => {
  const given = 'c is 20 °C\nd is 3 K\nc2 is 25 °C\n';

  test('are shown in °C', () => {
    const cell = evaluateCell(`${given}x = c in °C\ny = c + d in °C\nz = c`);
    expect(cell.problems).toEqual([]);
    expect(['x', 'y', 'z'].map((name) => cell.result(name).shown)).toEqual([
      '20 °C',
      '23 °C',
      '293.1 K',
    ]);
  });

  test('have tolerances in °C that are differences', () => {
    for (const half of ['2 °C', '2 K', '2']) {
      const cell = evaluateCell(`c is 20 °C ± ${half}\nx = c`);
      expect(cell.problems).toEqual([]);
      expect(cell.result('x').span).toMatchObject({ low: 291.15, high: 295.15 });
    }
  });

  test('have no tolerance in %', () => {
    expect(problemsOf('c is 20 °C ± 5 %')).toEqual([
      'error at ‹5 %›: A percentage of a temperature in °C has no meaning; give the tolerance in K.',
    ]);
  });

  test('have differences in K only', () => {
    const cell = `${given}x = c - c2 in °C`;
    expect(problemsOf(cell)).toEqual([
      'error at ‹°C›: `c - c2` is a difference of temperatures, and °C has a zero point; show it in K.',
    ]);
    expect(evaluateCell(afterFix(cell, 'Write K')).result('x').shown).toBe('-5 K');
  });

  test('are not compared with differences', () => {
    const cell = `${given}require abs(c - c2) <= 6 °C`;
    expect(problemsOf(cell)).toEqual([
      'error at ‹6 °C›: `abs(c - c2)` is a difference of temperatures, and `6 [°C]` is a temperature; a difference is given in K.',
    ]);
    expect(evaluateCell(afterFix(cell, 'Write K')).requirement('abs').verdict).toBe('met');
    expect(evaluateCell(`${given}require c <= 25 °C`).requirement('c').verdict).toBe('met');
  });

  test('are not what signals begin at', () => {
    const loop = "loop a driven by r\n  T' = 3 [1/s] (r - T)\ncase k of a\n";
    expect(problemsOf(`${loop}  r = step(20 °C)`)).toEqual([
      'warning at ‹20 °C›: `20 [°C]` is a temperature, and signals begin at 0, which is absolute zero; give the rise in K.',
    ]);
    expect(problemsOf(`${loop}  r = step(5 K)\nx = final(k.T) in °C`)).toEqual([
      'error at ‹°C›: `final(k.T)` is a difference of temperatures, and °C has a zero point; show it in K.',
    ]);
  });
});

describe('units of the worksheet', () => {
  test('are added in any order', () => {
    const cell = evaluateCell(
      'x is 5 pair\ny = x in count\nunit pair is 2 count\nunit count is 1.2 µrad',
    );
    expect(cell.problems).toEqual([]);
    expect(cell.result('y')).toMatchObject({ shown: '10 count', unit: 'rad' });
    expect(cell.result('y').value).toBeCloseTo(12e-6, 18);
  });

  test.each([
    ['unit foo is 3 bar2', 'bar2', "'bar2' is not a unit; did you mean bar^2?"],
    ['unit m is 3 kg', 'm', 'm is a unit already; choose another name.'],
    ['unit q is -3 m', 'm', 'the unit q needs a size greater than 0.'],
    ['unit q is 3 °C', '°C', 'q cannot be defined in °C.'],
    ['k has unit foo', 'foo', "'foo' is not a unit."],
    ['x = 3 in foo', 'foo', "'foo' is not a unit."],
    ['x = 3 [foo]', 'foo', "'foo' is not a unit."],
    [
      'x = 3 [m s/kg s]',
      'm s/kg s',
      '`m s/kg s` can be read in two ways: what follows a solidus needs brackets (ISO 80000-2).',
    ],
    ['x = [m]', '[', '`=` needs a formula after it, not `[`.'],
    [
      'x = 3 [m] [s]',
      '[',
      'Square brackets hold the unit of the number before them, as in `3 [rad/s]`.',
    ],
    ['x = 3 []', ']', 'A square bracket after a number needs a unit, not `]`.'],
    ['x = 5 [N m', '[', 'This bracket is not closed.'],
    [
      'x = 5 N m + 3',
      'N m',
      'In a formula a unit stands in square brackets after its number: `5 [N m]`.',
    ],
  ])('%s is refused', (statement, at, message) => {
    expect(problemsOf(statement)).toEqual([`error at ‹${at}›: ${message}`]);
  });

  test('are added once', () => {
    const cell = evaluateCell('unit count is 1 µrad\nunit count is 3 rad\nx is 5 count\ny = x');
    expect(cell.problems).toEqual([
      'error at ‹count›: The unit count is added in line 2 already; keep one.',
    ]);
    expect(cell.result('y').value).toBe(5e-6);
  });
});
