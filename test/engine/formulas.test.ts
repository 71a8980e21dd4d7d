import { describe, expect, test } from 'vitest';
import { FUNCTIONS } from '../../src/functions/index.ts';
import { afterFix, evaluateCell } from './worksheet.ts';

const GIVEN = 'a is 2\nb is 3\nc is 5\n';

function valueOf(formula: string): unknown {
  const cell = evaluateCell(`${GIVEN}x = ${formula}`);
  expect(cell.problems).toEqual([]);
  return cell.result('x').value;
}

function problemsOf(statements: string): readonly string[] {
  return evaluateCell(GIVEN + statements).problems;
}

describe('precedence', () => {
  test.each([
    ['-a^2', -4],
    ['2^3^2', 512],
    ['a^-1', 0.5],
    ['2 a b^2', 36],
    ['a b + c', 11],
    ['-a b', -6],
    ['a -b', -1],
    ['a*b/c', 1.2],
    ['2 a b/c', 2.4],
    ['a/(b c)', 2 / 15],
    ['(a/b) c', 10 / 3],
    ['a^1/2', 1],
    ['a^(1/2)', Math.SQRT2],
    ['a < b and b < c or c < a', true],
    ['not a < b or a < c', true],
    ['not (a < b or a < c)', false],
    ['a < b <= c', true],
    ['a ≤ b', true],
    ['a ≥ b', false],
    ['a b with a is 4', 12],
    ['a < b with a is 4', false],
  ])('%s is %s', (formula, value) => {
    expect(valueOf(formula)).toBe(value);
  });

  test('`in` is the loosest: the unit is that of the whole', () => {
    const cell = evaluateCell('a is 2 mm\nx = a + a with a is 3 mm in µm');
    expect(cell.problems).toEqual([]);
    expect(cell.result('x')).toMatchObject({ value: 0.006, shown: '6000 µm' });
  });

  test('`with` after `in` is refused with the order that is meant', () => {
    const cell = 'a is 2 mm\nx = 2 a in µm with a is 3 mm';
    expect(evaluateCell(cell).problems).toEqual([
      'error at ‹with›: What a `with` replaces stands before the unit that `in` names.',
    ]);
    const fixed = afterFix(cell, 'write `… with a is 3 mm in µm`');
    expect(fixed).toBe('a is 2 mm\nx = 2 a with a is 3 mm in µm');
    expect(evaluateCell(fixed).result('x').shown).toBe('6000 µm');
  });
});

describe('the solidus', () => {
  test.each([
    ['a/b c', '(a/b) c', 'a/(b c)'],
    ['a/b*c', '(a/b)*c', 'a/(b*c)'],
    ['a/b/c', '(a/b)/c', 'a/(b/c)'],
    ['1/2 pi', '(1/2) pi', '1/(2 pi)'],
    ['1/2 [1/s] a', '(1/2 [1/s]) a', '1/(2 [1/s] a)'],
    ['a/2 b', '(a/2) b', 'a/(2 b)'],
    ['a 1/2 b', '(a 1/2) b', 'a 1/(2 b)'],
    ['a/(b c) c', '(a/(b c)) c', 'a/((b c) c)'],
  ])('%s is refused, and both readings are offered', (formula, first, second) => {
    const cell = `${GIVEN}x = ${formula}`;
    expect(evaluateCell(cell).problems).toEqual([
      `error at ‹${formula}›: \`${formula}\` can be read in two ways: ` +
        'what follows a solidus needs brackets (ISO 80000-2).',
    ]);
    for (const reading of [first, second]) {
      const fixed = afterFix(cell, `write \`${reading}\``);
      expect(fixed).toBe(`${GIVEN}x = ${reading}`);
      expect(evaluateCell(fixed).problems).toEqual([]);
    }
  });

  test.each([
    ['1/2 a', 1],
    ['c + 1/2 (a + b)', 7.5],
    ['-1/2 a', -1],
    ['1/2 a b', 3],
    ['1/2 sqrt(4)', 1],
    ['3/4 a/b', 0.5],
    ['c - 1/2 a', 4],
  ])('a number over a number at the start of a term is a coefficient: %s', (formula, value) => {
    expect(valueOf(formula)).toBe(value);
  });

  test('s^-1 is 1/s', () => {
    expect(evaluateCell('C = 2 s^-1').result('C').formula).toBe('2/s');
  });

  test('holds in units too', () => {
    const cell = 'b is 35 N m s/rad s';
    expect(evaluateCell(cell).problems).toEqual([
      'error at ‹N m s/rad s›: `N m s/rad s` can be read in two ways: ' +
        'what follows a solidus needs brackets (ISO 80000-2).',
    ]);
    expect(evaluateCell(afterFix(cell, 'write `N m s/(rad s)`')).problems).toEqual([]);
  });
});

describe('names before a bracket', () => {
  const given = 'C = 2 + 3/s\nK is 4\nw0 is 3 rad/s\n';
  const result = (formula: string) => {
    const cell = evaluateCell(`${given}x = ${formula}`);
    expect(cell.problems).toEqual([]);
    return cell.result('x');
  };

  test.each([
    ['C(s)', '(2 s + 3)/s'],
    ['2 C(s) s', '4 s + 6'],
    ['C(s) K s', '2 K s + 3 K'],
    ['C(K)', 'K (2 s + 3)/s'],
    ['C (s + 1)', '(2 s^2 + 5 s + 3)/s'],
    ['C (1)', '(2 s + 3)/s'],
    ['K (1)', 'K'],
    ['K (s + 1)', 'K s + K'],
    ['K(s + 1)', 'K s + K'],
  ])('%s is %s', (formula, derived) => {
    expect(result(formula).formula).toBe(derived);
  });

  test.each([
    ['C(3)', 3],
    ['C(-3)', 1],
    ['C(1/2)', 8],
    ['C(3 [rad/s])', 3],
    ['C(2 j)', [2, -1.5]],
    ['C(j 2 [rad/s])', [2, -1.5]],
    ['C(j w0)', [2, -1]],
    ['abs(C(j 2))', 2.5],
  ])('%s evaluates', (formula, value) => {
    expect(result(formula).value).toEqual(value);
  });

  test('where the denominator vanishes there is no value, and no problem', () => {
    expect(result('C(0)')).toMatchObject({ value: null, state: 'ready' });
    expect(result('C(0)').notes.join()).toContain(
      'it is infinite at this point, where its denominator is 0',
    );
  });

  test.each([
    ['K(0)', 'K(0)', 'multiply: `K (0)`'],
    ['K(s)', 'K(s)', 'the assumption itself: `K`'],
  ])('an assumption is no function: %s', (formula, at, title) => {
    const cell = `${given}x = ${formula}`;
    expect(evaluateCell(cell).problems).toEqual([
      `error at ‹${at}›: \`K\` is an assumption, not a function of anything, so \`${at}\` has no meaning.`,
    ]);
    expect(evaluateCell(afterFix(cell, title)).problems).toEqual([]);
  });

  test('a sum with j is asked about', () => {
    const cell = `${given}x = C(1 + j)`;
    expect(evaluateCell(cell).problems).toEqual([
      'error at ‹C(1 + j)›: `C(1 + j)` can be a product or the value of `C` at a point.',
    ]);
    expect(evaluateCell(afterFix(cell, 'evaluate: `C with s = 1 + j`')).result('x').value).toEqual([
      3.5, -1.5,
    ]);
    expect(evaluateCell(afterFix(cell, 'multiply: `C (1 + j)`')).problems).toEqual([]);
  });

  test('a misspelt name in a bracket is fixed without the bracket', () => {
    const cell = 'Kpos is 4\nC = 1/s\nx = C(Kpso)';
    expect(afterFix(cell, 'Write Kpos')).toBe('Kpos is 4\nC = 1/s\nx = C(Kpos)');
  });
});

describe('a call before a bracket', () => {
  const loop = "loop az driven by w\n  x' = w - 2 x\n";

  test('is not a value at a point, and the product needs a space', () => {
    const cell = `${loop}y = az(w -> x)(0)`;
    expect(evaluateCell(cell).problems).toEqual([
      'error at ‹az(w -> x)(›: `az(w -> x)(…)` can be a product or a value at a point: to multiply write a space before the bracket, to evaluate write `az(w -> x) with s = …`.',
    ]);
    expect(afterFix(cell, 'multiply')).toBe(`${loop}y = az(w -> x) (0)`);
    expect(evaluateCell(`${loop}y = az(w -> x) with s = 0`).result('y').value).toBe(0.5);
    expect(evaluateCell(`${loop}y = sqrt(4) (3)`).result('y').value).toBe(6);
  });
});

describe('half-typed and mistyped formulas', () => {
  test.each([
    ['x =', '=', '`=` needs a formula after it, but the line ends.'],
    ['x = a +', '+', '`+` needs a formula after it, but the line ends.'],
    ['x = (a', '(', 'This bracket is not closed.'],
    ['x = a)', ')', '`)` closes a bracket that was not opened.'],
    ['x = (a, b)', ',', 'This bracket follows no function, so it holds one formula, not a list.'],
    ['x = .5', '.5', 'A number starts with a digit: write `0.5`.'],
    ['x = 1,5', '1,5', '`1,5` is not one number: the decimal sign is a point.'],
    [
      'x = 2 3',
      '2 3',
      '`2 3` is two numbers side by side: write one number without spaces, or `*` between them.',
    ],
    ['x = a = 2', '=', 'An equation or definition has one `=`; a condition goes in brackets.'],
    [
      'x = a ± 2',
      '±',
      'A tolerance, `±`, belongs to an assumption, as in `J is 480 kg m^2 ± 8 %`.',
    ],
    ['x = 3 (a', '(', 'This bracket is not closed.'],
    ['x = a²', '²', 'The character `²` has no meaning here; write `^2`.'],
    ['x = max()', 'max()', 'max(a, b, …) takes at least 1 argument, not 0.'],
    ['x = sqrt(a, b)', 'sqrt(a, b)', 'sqrt(x) takes 1 argument, not 2.'],
    ['x = a/0', 'a/0', 'This divides by an expression that is identically 0.'],
    ['x = a/(b - b)', 'a/(b - b)', 'This divides by an expression that is identically 0.'],
    ["x = a'", "a'", "`'` is the time derivative of a signal, and `a` is an assumption."],
    ['x = s^0.5', 's^0.5', 'A root acts on parameters, and this depends on s.'],
    ['x = 1e400', '1e400', '`1e400` is not a number within 1e±300.'],
    ['x = 1e-400 a', '1e-400', '`1e-400` is not a number within 1e±300.'],
    ['x = a^1000', 'a^1000', 'The exponent 1000 is beyond 500.'],
    ['x = a^b', 'a^b', 'An exponent is a number; write other powers with exp and log.'],
    ['x = sqrt(s)', 's', 'sqrt acts on parameters, and `s` depends on s.'],
  ])('%s', (statement, at, message) => {
    const cell = evaluateCell(`${GIVEN}${statement}\ny = 2 a`);
    expect(cell.problems).toEqual([`error at ‹${at}›: ${message}`]);
    expect(cell.result('y').value).toBe(4);
  });

  test.each([
    ['x = .5', 'write `0.5`', 0.5],
    ['x = 1,5', 'write `1.5`', 1.5],
    ['x = (a', 'close the bracket', 2],
    ['x = a)', 'remove `)`', 2],
    ['x = a²', 'write `^2`', 4],
    ['x = 2 3', 'write `2*3`', 6],
  ])('%s is fixed', (statement, title, value) => {
    const fixed = evaluateCell(afterFix(GIVEN + statement, title));
    expect(fixed.problems).toEqual([]);
    expect(fixed.result('x').value).toBe(value);
  });
});

describe('functions of parameters', () => {
  test.each([
    ['sqrt(4)', 2],
    ['sqrt(a)', Math.SQRT2],
    ['sqrt(8) sqrt(2)', 4],
    ['exp(1)', Math.E],
    ['log(a)', Math.LN2],
    ['sin(30 [°])', 0.5],
    ['cos(pi/3)', 0.5],
    ['tan(a)', Math.tan(2)],
    ['atan(a)', Math.atan(2)],
    ['abs(-a)', 2],
    ['min(a, -b, c)', -3],
    ['max(a, b, 7)', 7],
    ['abs(3 + 4 j)', 5],
  ])('%s is %s', (formula, value) => {
    expect(valueOf(formula)).toBeCloseTo(value, 12);
  });

  test('a root or a logarithm that is not real has no value, and no problem', () => {
    const cell = evaluateCell('k is -4\nx = sqrt(k)\ny = log(k)');
    expect(cell.problems).toEqual([]);
    for (const name of ['x', 'y']) {
      expect(cell.result(name).value).toBeNull();
      expect(cell.result(name).notes).toEqual([
        'No value at the nominal: the formula divides by 0 there, or is not real.',
      ]);
    }
  });

  test('a complex number is shown with its unit behind', () => {
    const cell = evaluateCell(
      'w0 is 2 rad/s\nk is 3 N m/rad\nC = k + k s/w0\nx = C(2 j)\ny = 2 + j',
    );
    expect(cell.result('x').value).toEqual([3, 3]);
    expect(cell.result('x').shown).toBe('(3 + j 3) N m/rad');
    expect(cell.result('y').shown).toBe('2 + j 1');
  });

  test('a transfer function where a signal is wanted is refused, and the fixes mend it', () => {
    const cell = "loop az driven by w\n  x' = w - 2 x\ny = final(az(w -> x))";
    for (const title of ['Gain at rest: dc_gain(az(w -> x))', 'Unit step: az(w -> x)/s']) {
      const fixed = evaluateCell(afterFix(cell, title));
      expect(fixed.problems).toEqual([]);
      expect(fixed.result('y').value).toBe(0.5);
    }
  });

  test('functions that come later say so', () => {
    const later = [...FUNCTIONS.values()].filter(({ availability }) => availability === 'later');
    for (const { name } of later) {
      expect(problemsOf(`x = ${name}(1)`)).toEqual([
        `error at ‹${name}(1)›: ${name} is not available yet.`,
      ]);
    }
  });
});
