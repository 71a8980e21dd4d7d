import { describe, expect, test } from 'vitest';
import { afterFix, evaluateCell } from './worksheet.ts';

function problemsOf(cell: string): readonly string[] {
  return evaluateCell(cell).problems;
}

describe('names of a worksheet', () => {
  test('may be used before the place that defines them', () => {
    const cell = evaluateCell('x = 2 a\na is 3');
    expect(cell.problems).toEqual([]);
    expect(cell.result('x').value).toBe(6);
  });

  test('are shared by all cells', () => {
    const cell = evaluateCell('x = 2 a\n```\n\nprose\n\n```loop\na is 3');
    expect(cell.result('x').value).toBe(6);
  });

  test('that are given twice are errors at all places, and what depends on them has no value', () => {
    const cell = evaluateCell('a is 3\nb is 1\na = 4\nx = 2 a\ny = 2 b');
    const message = 'a is defined twice, in lines 2 and 4; keep one, or rename the other.';
    expect(cell.problems).toEqual([`error at ‹a›: ${message}`, `error at ‹a›: ${message}`]);
    expect(cell.result('x')).toMatchObject({
      state: 'error',
      value: null,
      waitsFor: { name: 'a', line: 2 },
    });
    expect(cell.result('y').value).toBe(2);
  });

  test('that are given three times name all three places', () => {
    expect(problemsOf('a is 3\na is 4\na is 5')[0]).toBe(
      'error at ‹a›: a is defined 3 times, in lines 2, 3 and 4; keep one, or rename the other.',
    );
  });

  test('that are given twice stand for the first in the check of dimensions', () => {
    expect(problemsOf('a is 3 m\na is 4 s\nb is 1 s\nx = a + b')).toContain(
      'error at ‹a + b›: `a + b` adds m to s.',
    );
  });

  test('that define each other in a circle are errors at all places', () => {
    const cell = evaluateCell('p = q + 1\nq = r + 2\nr = p\nz = p + 1\nw = 5');
    const message =
      'p, q, r are defined in a circle, in lines 2, 3 and 4; break it at one of them.';
    expect(cell.problems).toEqual(['p', 'q', 'r'].map((name) => `error at ‹${name}›: ${message}`));
    expect(cell.result('z')).toMatchObject({ state: 'error', waitsFor: { name: 'p', line: 2 } });
    expect(cell.result('w').value).toBe(5);
  });

  test('that define themselves are errors', () => {
    expect(problemsOf('x = x + 1')).toEqual(['error at ‹x›: x is defined by itself.']);
  });

  test('of a loop must not depend on the loop', () => {
    const message = 'a, K are defined in a circle, in lines 2 and 4; break it at one of them.';
    expect(problemsOf("loop a driven by w\n  x' = w - K x\nK = 2 dc_gain(a(w -> x))")).toEqual([
      `error at ‹a›: ${message}`,
      `error at ‹K›: ${message}`,
    ]);
  });

  test('of a loop may depend on another loop', () => {
    const cell = evaluateCell(
      "loop a driven by w\n  x' = w - 4 x\nK = dc_gain(a(w -> x))\nloop b driven by v\n  y' = v - K y\nb(v -> y)",
    );
    expect(cell.problems).toEqual([]);
    expect(cell.result('b(v -> y)').formula).toBe('4/(4 s + 1)');
  });

  test('are introduced by an assumption, a definition, a sign or a unit', () => {
    const cell = evaluateCell('a is 3\nb = 2\nk is positive\nq has unit N/m\nx = a b k q');
    expect(cell.problems).toEqual([]);
    expect(cell.result('x').notes).toEqual(['No number: k, q have no value.']);
  });

  test('that nothing introduces are errors with the nearest spelling', () => {
    const cell = 'Kp_max is 3\nx = 2 Kp_mx';
    expect(problemsOf(cell)).toEqual([
      'error at ‹Kp_mx›: Nothing introduces Kp_mx. Is Kp_max meant?',
    ]);
    expect(afterFix(cell, 'Write Kp_max')).toBe('Kp_max is 3\nx = 2 Kp_max');
  });

  test('that nothing introduces and nothing resembles are told how to be introduced', () => {
    expect(problemsOf('x = 2 q')).toEqual([
      'error at ‹q›: Nothing introduces q. Give it a value (`q is …`), a definition or a sign.',
    ]);
  });

  test('of solve and match need nothing to introduce them', () => {
    const cell = evaluateCell('solve(2 x + 3 = 0, x)\nmatch(s^2 + a s + b, s^2 + 2 s + 5, a, b)');
    expect(cell.problems).toEqual([]);
    expect(cell.result('solve').formula).toBe('-3/2');
  });

  test('are the same in Greek letters and spelled out', () => {
    const cell = evaluateCell(
      'omega_n is 3 rad/s\nzeta is 0.5\nx = 2 ζ ω_n\nmu is 2\ny = µ + μ\nOmega is 4\nz = 2 Ω\nphi2 is 7\nu = φ2',
    );
    expect(cell.problems).toEqual([]);
    expect(['x', 'y', 'z', 'u'].map((name) => cell.result(name).value)).toEqual([3, 4, 8, 7]);
  });

  test('that hold the name of a Greek letter otherwise are left alone', () => {
    const cell = evaluateCell('thetas is 1\nbetan is 2\nx = thetas + betan');
    expect(cell.result('x').formula).toBe('thetas + betan');
  });

  test('given in Greek and spelled out are given twice', () => {
    expect(problemsOf('theta is 3\nθ is 4')).toHaveLength(2);
  });

  test('that typeset alike are errors', () => {
    expect(problemsOf('Kp is 9\nK_p is 8')).toEqual([
      'error at ‹K_p›: K_p and Kp (line 2) are typeset alike; use one spelling, or rename one.',
    ]);
    expect(problemsOf('e1 is 9\ne_1 is 8')).toHaveLength(1);
    expect(problemsOf('em is 9\ne_m is 8')).toEqual([]);
  });

  test.each([
    ['s is 3', 's', 'the Laplace variable'],
    ['t = 5', 't', 'time'],
    ['j is 2', 'j', 'the imaginary unit'],
    ['pi is 3', 'pi', 'the number π'],
    ['π is 3', 'π', 'the number π'],
    ['with is 4', 'with', 'a word of the language'],
    ['loop = 4', 'loop', 'a word of the language'],
    ['unit is 4', 'unit', 'a word of the language'],
    ['a, s are positive', 's', 'the Laplace variable'],
    ["loop s driven by w\n  x' = w", 's', 'the Laplace variable'],
    ["loop a driven by s\n  x' = w", 's', 'the Laplace variable'],
    ['t has unit m', 't', 'time'],
  ])('that the language reserves are refused once: %s', (cell, name, what) => {
    const problems = problemsOf(cell).filter((problem) => problem.includes('choose another'));
    expect(problems).toEqual([`error at ‹${name}›: \`${name}\` is ${what}; choose another name.`]);
  });

  test('may be e, and words of figures', () => {
    const cell = evaluateCell('e is 3\nregion is 2\nover2 is 1\nx = e region');
    expect(cell.problems).toEqual([]);
    expect(cell.result('x').value).toBe(6);
  });

  test.each([
    ['final is 3'],
    ['final = 3'],
    ['final is positive'],
    ['step is 3'],
    ["loop final driven by w\n  x' = w"],
  ])('that hide a function are noted: %s', (cell) => {
    const name = /final|step/.exec(cell)![0];
    expect(problemsOf(cell)).toEqual([
      `warning at ‹${name}›: ${name} hides the function of that name in this worksheet.`,
    ]);
  });

  test('that hide a source are named where the source is used', () => {
    const cell = "step is 3\nloop a driven by w\n  x' = w\ncase c of a\n  w = step(A)\nA is 2";
    expect(problemsOf(cell)[1]).toBe(
      'error at ‹step›: The name step of this worksheet hides the source; rename it.',
    );
  });
});

describe('statements on a name', () => {
  test.each([
    ['q has unit N/m\nq has unit N', 'q', 'q has a unit in line 2 already; keep one.'],
    [
      'tune k from 1 to 2\nk is 1\ntune k from 1 to 3',
      'k',
      'k is tuned in line 2 already; keep one.',
    ],
    [
      'q has unit N/m\nq is 3 N/m',
      'q',
      'q is given in line 3, which gives its unit too; take this line away.',
    ],
    [
      'q has unit N/m\nq = 3',
      'q',
      'q is given in line 3, which gives its unit too; take this line away.',
    ],
    ['tune k from 1 to 2', 'k', 'k has no value to tune; add `k is …`.'],
    [
      'tune k from 1 to 2\nk = 3',
      'k',
      'k is not an assumption, so it cannot be tuned; give it a value with `k is …`.',
    ],
  ])('are refused where they say it again or need more: %s', (cell, at, message) => {
    expect(problemsOf(cell)).toEqual([`error at ‹${at}›: ${message}`]);
  });
});

describe('signals', () => {
  const loop = "loop az driven by w\n  x' = 2 w - 4 x\n";

  test('are reached from outside through a load case', () => {
    const cell = evaluateCell(`${loop}case storm of az\n  w = step(2)\ny = final(storm.x)`);
    expect(cell.problems).toEqual([]);
    expect(cell.result('y').value).toBe(1);
  });

  test('that are named outside without a case are errors with the way', () => {
    expect(problemsOf(`${loop}y = 2 x`)).toEqual([
      'error at ‹x›: x is a signal of az; outside the loop it is reached through a load case, `case.x`.',
    ]);
  });

  test('that are named outside are fixed with the one case that has them', () => {
    const cell = `${loop}case storm of az\n  w = step(2)\ny = final(x)`;
    expect(problemsOf(cell)).toEqual([
      'error at ‹x›: x is a signal of az; outside the loop it is reached through a load case, `storm.x`.',
    ]);
    expect(problemsOf(afterFix(cell, 'Write storm.x'))).toEqual([]);
  });

  test('that the loop does not have are errors with its signals', () => {
    expect(
      problemsOf(`${loop}case storm of az\n  w = step(2)\ny = final(storm.q)\naz(w -> q)`),
    ).toEqual([
      'error at ‹storm.q›: q is not a signal of az; its signals are w, x.',
      'error at ‹q›: q is not a signal of az; its signals are w, x.',
    ]);
  });

  test.each([
    ["x is 2 m\nloop az driven by w\n  x'' = w - 4 x", "`x''`", 'x', 4],
    ["w = 3\nloop az driven by w\n  x' = w - 4 x", 'an input', 'w', 3],
    [
      "T is 3\nloop az driven by w\n  x' = w - T\n  T = 3 x",
      'the left side of an equation',
      'T',
      5,
    ],
  ])('that have a value outside are coefficients: %s', (cell, shown, name, line) => {
    expect(problemsOf(cell)).toEqual([
      `error at ‹${name}›: ${name} is given in line 2, so it is a coefficient of az, ` +
        `but line ${line} uses it as a signal (${shown}); rename one of the two.`,
    ]);
  });

  test('that are misspelt are named with the count of equations', () => {
    const cell = "loop az driven by w\n  theta'' = torque - 3 theta'\n  torque = w - 2 thta\n";
    expect(problemsOf(cell)).toEqual([
      'error at ‹az›: az has 2 equations for 3 unknowns (theta, torque, thta). Is thta a misspelt theta?',
    ]);
  });
});

describe('words in place of values', () => {
  test.each([
    ['x = 2 sqrt', 'sqrt', 'sqrt is a function; its argument stands in brackets, `sqrt(x)`.'],
    [
      'x = noise(3)',
      'noise',
      'noise is a source; sources stand in the lines of a load case, `w = noise(…)`.',
    ],
    ['x = 2 e', 'e', "Nothing introduces e; Euler's number is `exp(1)`."],
    ['x = t + 1', 't', 'Formulas stand in s; use `response(x)` for a function of t.'],
  ])('get a way out: %s', (cell, at, message) => {
    expect(problemsOf(cell)).toEqual([`error at ‹${at}›: ${message}`]);
  });

  test('misspelt functions are suggested', () => {
    const cell = 'x = sqr(4)';
    expect(problemsOf(cell)).toEqual(['error at ‹sqr›: There is no function sqr. Is sqrt meant?']);
    expect(evaluateCell(afterFix(cell, 'Write sqrt')).result('x').value).toBe(2);
  });
});
