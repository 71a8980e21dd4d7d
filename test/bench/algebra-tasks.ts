import {
  coefficientsIn,
  discriminant,
  fractionOfRatio,
  gcdPolynomials,
  generatorPolynomial,
  laplace,
  mulPolynomials,
  polynomialOfTermList,
  ratio,
  scalePolynomial,
  solveLinear,
  sumPolynomials,
  symbol,
  zeroPolynomial,
  type Generator,
  type Polynomial,
  type Ratio,
  type Term,
} from '../../src/algebra/index.ts';
import { isRefusal, type Refusal } from '../../src/base/index.ts';
import {
  closeLoop,
  partialFractions,
  transferFunction,
  type LoopRow,
} from '../../src/control/index.ts';
import { minorRows } from '../../src/control/hurwitz.ts';
import { read } from '../algebra/text.ts';

/** A computation of issue 3's table, with what comes out of it. */
export interface Task {
  readonly name: string;
  /** The time aimed at, in milliseconds. */
  readonly aim: number;
  readonly run: () => readonly (Ratio | Polynomial)[];
}

function granted<T extends object>(value: T | Refusal): T {
  if (isRefusal(value)) throw new Error(value.reason);
  return value;
}

/** Signals by name, each with the formula of its coefficient in an equation that sums to zero. */
type Equations = readonly Readonly<Record<string, string>>[];

function rowsOf(equations: Equations): readonly LoopRow[] {
  return equations.map((row) => ({
    coefficients: new Map(
      Object.entries(row).map(([name, text]) => [name, fractionOfRatio(read(text))]),
    ),
  }));
}

/** Closes a loop and reads transfer functions [input, signal] from it. */
function loopTask(
  equations: Equations,
  inputs: readonly string[],
  wanted: readonly (readonly [string, string])[],
): () => readonly Ratio[] {
  const rows = rowsOf(equations);
  const unknowns = [...new Set(equations.flatMap((row) => Object.keys(row)))].filter(
    (name) => !inputs.includes(name),
  );
  return () => {
    const loop = granted(closeLoop(rows, unknowns, inputs));
    return wanted.map(([input, signal]) => granted(transferFunction(loop, input, signal)).ratio);
  };
}

/** A controller with a derivative filter, a first-order actuator and a first-order sensor around a plant. */
function controlled(plant: Equations): Equations {
  return [
    { e: '1', m: '1' },
    { u: '-1', e: 'Kp + Ki/s + Kd*s/(Tf*s + 1)' },
    { f: '-1', u: '1/(Ta*s + 1)' },
    { m: '-1', x: '1/(Ts*s + 1)' },
    ...plant,
  ];
}

const RIGID = controlled([{ x: 'J*s^2', f: '-1', d: '-1' }]);
const FLEXIBLE = controlled([
  { x: 'J1*s^2 + c*s + k', y: '-c*s - k', f: '-1', d: '-1' },
  { y: 'J2*s^2 + c*s + k', x: '-c*s - k' },
]);
const MOTOR: Equations = [
  { e: '1', x: '1', r: '-1' },
  { w: '-1', e: 'Kx' },
  { g: '1', w: '-1', v: '1' },
  { i0: '-1', g: 'Kv + Kvi/s' },
  { h: '1', i0: '-1', i: '1' },
  { u: '-1', h: 'Kc + Kci/s' },
  { i: 'L*s + R', u: '-1', v: 'Ke' },
  { v: 'J*s + b', i: '-Kt', d: '-1' },
  { x: 's', v: '-1' },
];

/** a₀ sⁿ + a₁ sⁿ⁻¹ + … with a symbol for each coefficient, a₀ first. */
const symbolic = (name: string, degree: number): Polynomial[] =>
  Array.from({ length: degree + 1 }, (_, k) => generatorPolynomial(symbol(`${name}${k}`)));

function routhColumn(degree: number): () => readonly Ratio[] {
  const descending = symbolic('a', degree);
  return () => minorRows(descending).map((row) => ratio(row.entries[0], row.divisor));
}

/**
 * The variance of B/A driven by white noise of intensity 1: X(s) A(−s) + X(−s) A(s) = B(s) B(−s), and the variance is
 * the first coefficient of X over that of A.
 *
 * Source: G. C. Newton, L. A. Gould, J. F. Kaiser, Analytical Design of Linear Feedback Controls (1957), appendix E.
 */
function variance(degree: number): () => readonly Ratio[] {
  const a = symbolic('a', degree);
  const b = symbolic('b', degree - 1);
  const indices = Array.from({ length: degree }, (_, k) => k);
  return () => {
    // Row k: the coefficient of s^(2(degree − 1 − k)), divided by 2.
    const matrix = indices.map((k) =>
      indices.map((i) => {
        const place = 2 * k + 1 - i;
        const sign = place % 2 === 0 ? 1n : -1n;
        return scalePolynomial(a[place] ?? zeroPolynomial, sign);
      }),
    );
    const right = indices.map((k) => [squareCoefficient(b, k)]);
    const { numerators, determinant } = granted(solveLinear(matrix, right));
    const bottom = mulPolynomials(scalePolynomial(a[0], 2n), determinant);
    return [ratio(numerators[0][0], bottom)];
  };
}

/** The coefficient of s^(2(n − k)) in B(s) B(−s), b₀ being the coefficient of sⁿ, with the sign of row k. */
function squareCoefficient(b: readonly Polynomial[], k: number): Polynomial {
  const products = b.flatMap((x, i) => {
    const other = b[2 * k - i];
    return other ? [scalePolynomial(mulPolynomials(x, other), i % 2 === 0 ? -1n : 1n)] : [];
  });
  return sumPolynomials(products);
}

/** A fixed sequence of integers (a linear congruential generator modulo 2^32). */
function integers(seed: number): (below: number) => number {
  let state = seed >>> 0;
  return (below) => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return Math.floor((state / 2 ** 32) * below);
  };
}

function exponentRows(width: number, degree: number): number[][] {
  if (width === 0) return [[]];
  return Array.from({ length: degree + 1 }, (_, k) => k).flatMap((k) =>
    exponentRows(width - 1, degree - k).map((rest) => [k, ...rest]),
  );
}

/** A polynomial with all monomials up to a total degree and coefficients in −9 … 9. */
function densePolynomial(
  generators: readonly Generator[],
  degree: number,
  seed: number,
): Polynomial {
  const next = integers(seed);
  const terms = exponentRows(generators.length, degree).map((row): Term => ({
    coefficient: BigInt(next(19) - 9),
    exponents: new Map(row.flatMap((e, k) => (e > 0 ? [[generators[k], e] as const] : []))),
  }));
  return polynomialOfTermList(terms);
}

function denseGcd(): readonly Polynomial[] {
  const generators = [laplace, ...['a', 'b', 'c'].map(symbol)];
  const [f, g, h] = [1, 2, 3].map((seed) => densePolynomial(generators, 4, seed));
  return [mulPolynomials(f, h), mulPolynomials(g, h)];
}

/** More denominators than the factors that are kept in memory, so that every run factors. */
const DENOMINATORS = 500;

function partialFractionsTask(): () => readonly Ratio[] {
  const list = Array.from({ length: DENOMINATORS }, (_, k) =>
    read(`(3*s + 7)/((s + ${k + 1})*(2*s + 3)*(s^2 + 2*s + ${k + 5}))`),
  );
  let turn = 0;
  return () => {
    const { terms } = granted(partialFractions(list[turn++ % DENOMINATORS]));
    return terms.map((term) => term.ratio);
  };
}

/** The characteristic polynomial of task a without its sensor filter: degree 5 in s. */
function fifthDegree(): Polynomial {
  return read('J*s^2*s*(Ta*s + 1)*(Tf*s + 1) + (Kp*s + Ki)*(Tf*s + 1) + Kd*s^2').num;
}

/**
 * A chain of `stages` integrators with friction, each held to its neighbour and to its own command by a gain: two
 * signals and three symbols for each stage, all of them in one block.
 */
export function chain(stages: number): () => readonly Ratio[] {
  const equations: Equations = Array.from({ length: stages }, (_, k) => k).flatMap((k) => [
    {
      [`x${k}`]: `m${k}*s + b${k}`,
      [`u${k}`]: '-1',
      ...(k > 0 ? { [`x${k - 1}`]: `-c${k}` } : { r: '-1' }),
    },
    {
      [`u${k}`]: '1',
      [`x${k}`]: `c${k}`,
      ...(k + 1 < stages ? { [`x${k + 1}`]: `-c${k + 1}` } : {}),
    },
  ]);
  return loopTask(equations, ['r'], [['r', `x${stages - 1}`]]);
}

/** Each task by its key: made when asked for, so that a cold process prepares only its own. */
export const TASKS: Readonly<Record<string, () => Task>> = {
  a: () => ({
    name: 'a. e/d of a rigid body under three-term control',
    aim: 0.4,
    run: loopTask(RIGID, ['d'], [['d', 'e']]),
  }),
  b: () => ({
    name: 'b. the same with a two-mass flexible plant',
    aim: 2,
    run: loopTask(FLEXIBLE, ['d'], [['d', 'e']]),
  }),
  c: () => ({
    name: 'c. three nested motor loops, x/r and x/d',
    aim: 2,
    run: loopTask(
      MOTOR,
      ['r', 'd'],
      [
        ['r', 'x'],
        ['d', 'x'],
      ],
    ),
  }),
  d5: () => ({ name: 'd. Routh column of degree 5', aim: 0.1, run: routhColumn(5) }),
  d6: () => ({ name: 'd. Routh column of degree 6', aim: 0.3, run: routhColumn(6) }),
  d7: () => ({ name: 'd. Routh column of degree 7', aim: 1, run: routhColumn(7) }),
  d8: () => ({ name: 'd. Routh column of degree 8', aim: 5, run: routhColumn(8) }),
  e: () => {
    const p = fifthDegree();
    return {
      name: 'e. discriminant of the degree-5 polynomial of a',
      aim: 20,
      run: () => [discriminant(p, laplace)],
    };
  },
  eGain: () => {
    const descending = [...coefficientsIn(fifthDegree(), laplace)].reverse();
    const boundary = minorRows(descending)[4].entries[0];
    return {
      name: 'e. discriminant in Kp of its largest Hurwitz determinant',
      aim: 20,
      run: () => [discriminant(boundary, symbol('Kp'))],
    };
  },
  f3: () => ({ name: 'f. noise variance of degree 3', aim: 0.2, run: variance(3) }),
  f4: () => ({ name: 'f. noise variance of degree 4', aim: 0.4, run: variance(4) }),
  f5: () => ({ name: 'f. noise variance of degree 5', aim: 3, run: variance(5) }),
  g: () => {
    const [x, y] = denseGcd();
    return {
      name: 'g. gcd of dense polynomials in 4 variables',
      aim: 4,
      run: () => [gcdPolynomials(x, y)],
    };
  },
  h: () => ({ name: 'h. partial fractions of degree 4', aim: 1, run: partialFractionsTask() }),
};
