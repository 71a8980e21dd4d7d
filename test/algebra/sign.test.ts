import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  applyFunction,
  evaluatePolynomial,
  generatorPolynomial,
  rational,
  signOfPolynomial,
  signOfRatio,
  signRational,
  zeroPolynomial,
  type Generator,
  type Ratio,
  type Sign,
} from '../../src/algebra/index.ts';
import { GENERATORS, polynomials } from './arbitraries.ts';
import { read, readPolynomial } from './text.ts';

const KNOWN: Readonly<Record<string, Sign>> = {
  J: 'positive',
  b: 'positive',
  Kd: 'positive',
  Ki: 'nonnegative',
  n: 'negative',
  z: 'zero',
};

const signOf = (g: Generator): Sign => KNOWN[g.name] ?? 'unknown';

describe('the sign of a polynomial', () => {
  it.each<[string, Sign]>([
    ['J*b + Kd', 'positive'],
    ['-J*b*Kd', 'negative'],
    ['J + Ki', 'positive'],
    ['Ki', 'nonnegative'],
    ['J*Ki', 'nonnegative'],
    ['J - b', 'unknown'],
    ['n*J', 'negative'],
    ['n^2 + Ki', 'positive'],
    ['x^2', 'nonnegative'],
    ['x^2 + J', 'positive'],
    ['x^3', 'unknown'],
    ['x^2 - 2*x*y + y^2', 'nonnegative'],
    ['x^2 - x*y + y^2', 'nonnegative'],
    ['x^2 + x + 1', 'positive'],
    ['-x^2 + x - 1', 'negative'],
    ['x^2 + 3*x + 1', 'unknown'],
    ['J^2 - J*b + b^2', 'positive'],
    ['z*x', 'zero'],
    ['0', 'zero'],
    ['-3', 'negative'],
    ['s', 'unknown'],
    ['s^2', 'unknown'],
    ['j^2*J', 'negative'],
    ['x^4 - x + 1', 'positive'],
    ['x^4 - x', 'unknown'],
    ['J^3 - J^2 - J + 2', 'positive'],
    ['n^3 - n^2 + n - 1', 'negative'],
    ['n^3 + 2*n^2 + 2', 'unknown'],
    ['Ki^3', 'nonnegative'],
    ['pi - 0*x', 'positive'],
  ])('%s is %s', (text, expected) => {
    expect(signOfPolynomial(readPolynomial(text), signOf)).toBe(expected);
  });

  it('is never contradicted by values', () => {
    const signs = fc.array(
      fc.constantFrom<Sign>(
        'positive',
        'negative',
        'nonnegative',
        'nonpositive',
        'zero',
        'unknown',
      ),
      {
        minLength: GENERATORS.length,
        maxLength: GENERATORS.length,
      },
    );
    const sizes = fc.array(fc.integer({ min: -9, max: 9 }), {
      minLength: GENERATORS.length,
      maxLength: GENERATORS.length,
    });
    fc.assert(
      fc.property(
        polynomials({ generators: 4, terms: 3, degree: 2 }),
        signs,
        sizes,
        (p, given, values) => {
          const claimed = signOfPolynomial(p, (g) => given[GENERATORS.indexOf(g)]);
          const at = (g: Generator) => {
            const k = GENERATORS.indexOf(g);
            return rational(fitting(given[k], values[k]));
          };
          expect(ALLOWED[claimed]).toContain(signRational(evaluatePolynomial(p, at)));
        },
      ),
      { seed: 20_250, numRuns: 400 },
    );
  });
});

const ALLOWED: Readonly<Record<Sign, readonly number[]>> = {
  positive: [1],
  negative: [-1],
  zero: [0],
  nonnegative: [0, 1],
  nonpositive: [-1, 0],
  unknown: [-1, 0, 1],
};

/** A value of the given sign near `value`. */
function fitting(sign: Sign, value: number): number {
  if (sign === 'unknown') return value;
  if (sign === 'zero') return 0;
  const size = Math.abs(value) + (sign === 'positive' || sign === 'negative' ? 1 : 0);
  return sign === 'positive' || sign === 'nonnegative' ? size : -size;
}

describe('the sign of a ratio', () => {
  it('is that of the numerator times that of the denominator where it is defined', () => {
    expect(signOfRatio(read('J*Ki/Kd'), signOf)).toBe('nonnegative');
    expect(signOfRatio(read('b/Ki'), signOf)).toBe('positive');
    expect(signOfRatio(read('b/x'), signOf)).toBe('unknown');
    expect(signOfRatio(read('b/(n*x^2)'), signOf)).toBe('negative');
  });

  it('knows functions that have a sign of their own', () => {
    const of = (name: string, text: string): Sign =>
      signOfRatio(applyFunction(name, [read(text)]) as Ratio, signOf);
    expect(of('exp', 'x')).toBe('positive');
    expect(of('sqrt', 'J*b')).toBe('positive');
    expect(of('sqrt', 'x')).toBe('nonnegative');
    expect(of('abs', 'x')).toBe('nonnegative');
    expect(of('abs', 'n')).toBe('positive');
    expect(of('atan', 'n')).toBe('negative');
    expect(of('exp', '-s*J')).toBe('unknown');
    expect(signOfPolynomial(zeroPolynomial, signOf)).toBe('zero');
    expect(signOfPolynomial(generatorPolynomial(GENERATORS[0]), signOf)).toBe('unknown');
  });
});
