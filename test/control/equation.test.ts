import { describe, expect, test } from 'vitest';
import { algebraicToNumber, symbol, type AlgebraicNumber } from '../../src/algebra/index.ts';
import {
  compare,
  conditionKey,
  matchCoefficients,
  solutionsFor,
  solveInequality,
  solveLinearFor,
  stableIntervals,
} from '../../src/control/index.ts';
import { found, polynomial, polynomialOf, positive, read, signs, unknown } from './formulas.ts';
import { published } from './published-cases.ts';

const comparison = (left: string, operator: '>' | '<' | '<=' | '>=', right: string) =>
  compare(read(left), operator, read(right)) as Extract<
    ReturnType<typeof compare>,
    { kind: 'compare' }
  >;

describe('equations', () => {
  test.each([
    ['Kp*x', 'T', 'x', 'T/Kp'],
    ['1/(1 + K)', 'a', 'K', '(1 - a)/a'],
    ['(K - 2)^2', '0', 'K', '2'],
  ])('%s = %s for %s gives %s', (left, right, name, solution) => {
    expect(solveLinearFor(read(left), read(right), symbol(name), unknown)).toEqual(read(solution));
  });

  test('a square is solved by the sign of the unknown', () => {
    const sign = signs({ w: 'positive', k: 'positive', m: 'positive' });
    expect(solveLinearFor(read('m*w^2'), read('k'), symbol('w'), sign)).toEqual(read('sqrt(k/m)'));
    expect(solveLinearFor(read('m*w^2'), read('k'), symbol('w'), unknown)).toMatchObject({
      code: 'two-solutions',
      reason: 'w^2 is given, which leaves its sign open; say whether w is positive',
    });
  });

  test('solutions of the wrong sign are left out', () => {
    const equation = [read('(x - a)*(x + a)'), read('0')] as const;
    expect(solveLinearFor(...equation, symbol('x'), positive)).toEqual(read('a'));
    expect(found(solutionsFor(...equation, symbol('x'), unknown))).toHaveLength(2);
  });

  test.each([
    ['x', 'x', 'x', 'always-true'],
    ['a', 'b', 'x', 'unknown-absent'],
    ['x^3 + x', 'a', 'x', 'not-linear'],
    ['exp(x)', 'a', 'x', 'not-rational'],
  ])('%s = %s for %s is refused: %s', (left, right, name, code) => {
    expect(solveLinearFor(read(left), read(right), symbol(name), unknown)).toMatchObject({ code });
  });
});

describe('inequalities', () => {
  test('keep their direction under a positive factor and turn it under a negative one', () => {
    const key = (sign: 'positive' | 'negative') =>
      conditionKey(
        found(solveInequality(comparison('a*K', '>', 'b'), symbol('K'), signs({ a: sign }))),
      );
    expect(key('positive')).toBe(conditionKey(comparison('K', '>', 'b/a')));
    expect(key('negative')).toBe(conditionKey(comparison('K', '<', 'b/a')));
  });

  test('are refused where the direction is not known, with what has to be known', () => {
    expect(solveInequality(comparison('a*K', '>', 'b'), symbol('K'), unknown)).toMatchObject({
      code: 'unknown-sign',
      reason: 'the sign of what multiplies K is not known; it depends on a',
    });
  });

  test('are solved below a fraction line of known sign', () => {
    const solved = found(solveInequality(comparison('Tw/Kp', '<=', 'm'), symbol('Kp'), positive));
    expect(conditionKey(solved)).toBe(conditionKey(comparison('Kp', '>=', 'Tw/m')));
  });
});

describe('matching of coefficients', () => {
  const gains = ['Kp', 'Ki', 'Kd'].map(symbol);

  test.each(published((c) => c.kind === 'place'))('%s', (_, { given, expect: wanted }) => {
    const { A } = given as unknown as { A: string[][] };
    const { K } = wanted as unknown as { K: string[][] };
    // Companion form: det(s I − A + B K) = s³ + (k3 − a₃₃) s² + (k2 − a₃₂) s + (k1 − a₃₁).
    const [a1, a2, a3] = A[2];
    const p = polynomialOf(
      `s^3 + (k3 - (0 + ${a3}))*s^2 + (k2 - (0 + ${a2}))*s + (k1 - (0 + ${a1}))`.replaceAll(
        '+ -',
        '- ',
      ),
    );
    const q = polynomialOf('((s + 2)^2 + 16)*(s + 10)');
    const found3 = found(matchCoefficients(p, q, ['k1', 'k2', 'k3'].map(symbol)));
    expect(found3.map((m) => m.value)).toEqual(K[0].map(read));
  });

  test('places the poles of an inertia in symbols', () => {
    const p = polynomialOf('J*s^3 + Kd*s^2 + Kp*s + Ki');
    const q = polynomialOf('(s + w)*(s^2 + 2*z*w*s + w^2)');
    expect(found(matchCoefficients(p, q, gains)).map((m) => m.value)).toEqual([
      read('J*w^2*(1 + 2*z)'),
      read('J*w^3'),
      read('J*w*(1 + 2*z)'),
    ]);
  });

  test('finds the factor between the polynomials where no coefficient gives it', () => {
    const matched = found(
      matchCoefficients(
        polynomialOf('m*s^2 + c*s + 5'),
        polynomialOf('s^2 + 2*s + 10'),
        ['m', 'c'].map(symbol),
      ),
    );
    expect(matched.map((m) => m.value)).toEqual([read('1/2'), read('1')]);
  });

  test('says which coefficient cannot be matched', () => {
    expect(
      matchCoefficients(polynomialOf('s^2 + b*s + Kp'), polynomialOf('s^2 + 2*s + 9'), [
        symbol('Kp'),
      ]),
    ).toMatchObject({
      code: 'overdetermined',
      reason: 'the coefficients of s^1 cannot be matched: what is left holds none of the unknowns',
    });
  });

  test('says what nothing determines', () => {
    expect(
      matchCoefficients(
        polynomialOf('s + Kp + Ki'),
        polynomialOf('s + 2'),
        ['Kp', 'Ki'].map(symbol),
      ),
    ).toMatchObject({ code: 'underdetermined' });
  });

  test('a larger polynomial cannot equal a smaller one', () => {
    expect(
      matchCoefficients(polynomialOf('s^2 + Kp'), polynomialOf('s + 1'), [symbol('Kp')]),
    ).toMatchObject({ code: 'overdetermined' });
  });
});

describe('stable intervals of one gain', () => {
  const closed = (D: readonly number[], N: readonly number[]) =>
    polynomial(
      D.map((d, i) => {
        const n = N[i - (D.length - N.length)] ?? 0;
        return `(0 + ${d}) + K*(0 + ${n})`.replaceAll('+ -', '- ');
      }),
    );

  const valueOf = (end: AlgebraicNumber | null, none: number): number =>
    end ? algebraicToNumber(end) : none;

  const cases = published((c) => c.kind === 'gain_range');
  test.each(cases)('%s', (id, { given, expect: wanted }) => {
    const { D, N } = given as unknown as { D: number[]; N: number[] };
    const { intervals } = wanted as unknown as { intervals: (string | number)[][] };
    const found = stableIntervals([closed(D, N)], symbol('K'));
    expect(found).toHaveLength(intervals.length);
    const digits = id.startsWith('mar-010') ? 0 : 9;
    intervals.forEach(([from, to], i) => {
      expect(valueOf(found[i].from, -Infinity)).toBeCloseTo(endOf(from), digits);
      if (to === 'oo') expect(found[i].to).toBeNull();
      else expect(valueOf(found[i].to, Infinity)).toBeCloseTo(endOf(to), digits);
    });
  });

  const endOf = (end: string | number): number => {
    const [top, bottom = '1'] = String(end).split('/');
    return Number(top) / Number(bottom);
  };

  test('a gain that never matters leaves one interval without ends', () => {
    expect(stableIntervals([polynomialOf('s + 1')], symbol('K'))).toEqual([
      { from: null, to: null },
    ]);
  });

  test('a range ends where the degree falls', () => {
    // (1 − K) s² + s + 1: stable below K = 1, where the quadratic term changes sign.
    const intervals = stableIntervals([polynomialOf('s^2 - K*s^2 + s + 1')], symbol('K'));
    expect(intervals.map((i) => [i.from, valueOf(i.to, Infinity)])).toEqual([[null, 1]]);
  });
});
