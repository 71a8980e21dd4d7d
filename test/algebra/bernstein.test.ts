import { describe, expect, test } from 'vitest';
import {
  evaluatePolynomial,
  rational,
  signOverBox,
  signRational,
  symbol,
  type Generator,
  type Polynomial,
  type Range,
  type Rational,
} from '../../src/algebra/index.ts';
import { randomInteger, seededRandom } from '../../src/numeric/index.ts';
import { polynomialOf } from '../control/formulas.ts';

const range = (low: number, high: number): Range => ({ low: rational(low), high: rational(high) });
const overUnitBox = (p: Polynomial) => signOverBox(p, () => range(0, 1));

describe('the sign over the unit box', () => {
  test.each([
    ['x + y + 1', 'positive'],
    ['x*y', 'nonnegative'],
    ['0 - x - 1', 'negative'],
    ['x - y', 'mixed'],
    ['x^2 - x + 1', 'positive'],
    ['4*x^2 - 4*x + 2', 'positive'],
    ['100*x^2 - 100*x + 26', 'positive'],
    ['100*x^2 - 100*x + 24', 'mixed'],
    ['x^2 - 2*x*y + y^2 + 1', 'positive'],
    ['3', 'positive'],
    ['0', 'zero'],
  ])('of %s is %s', (text, wanted) => {
    expect(overUnitBox(polynomialOf(text))).toBe(wanted);
  });

  test('is not decided where the polynomial touches 0 at a place that no halving meets', () => {
    expect(overUnitBox(polynomialOf('9*x^2 - 6*x + 1'))).toBe('undecided');
  });
});

/** Garloff, The Bernstein algorithm (1993): a range encloses a maximum at its end; here 6 of x³ on [−1, 2] minus 9. */
test('boxes need not be the unit box', () => {
  const at = (low: number, high: number, text: string) =>
    signOverBox(polynomialOf(text), () => range(low, high));
  expect(at(-1, 2, 'x^3 - 9')).toBe('negative');
  expect(at(-1, 2, 'x^3 - 8')).toBe('nonpositive');
  expect(at(-1, 2, 'x^3 - 7')).toBe('mixed');
  expect(at(2, 3, 'a*b - c')).toBe('positive');
});

test('a generator without a range leaves it undecided', () => {
  const only = (g: Generator) => (g === symbol('x') ? range(0, 1) : null);
  expect(signOverBox(polynomialOf('x + y'), only)).toBe('undecided');
});

test('agrees with values at random points of random boxes', () => {
  const random = seededRandom(12);
  const seen = new Map<string, number>();
  for (let round = 0; round < 600; round += 1) {
    const names = ['x', 'y', 'z'].slice(0, randomInteger(random, 1, 3));
    const terms = Array.from({ length: randomInteger(random, 1, 6) }, () => {
      const powers = names.map((name) => `${name}^${randomInteger(random, 0, 3)}`);
      return `(0 + ${randomInteger(random, -6, 9)})*${powers.join('*')}`.replace('+ -', '- ');
    });
    const p = polynomialOf(terms.join(' + '));
    const box = new Map(
      names.map((name): [Generator, Range] => {
        const low = randomInteger(random, -20, 15);
        return [
          symbol(name),
          { low: rational(low, 5), high: rational(low + randomInteger(random, 1, 20), 5) },
        ];
      }),
    );
    const sign = signOverBox(p, (g) => box.get(g) ?? null);
    seen.set(sign, (seen.get(sign) ?? 0) + 1);
    for (let point = 0; point < 8; point += 1) {
      const value = evaluatePolynomial(p, inside(box, randomInteger(random, 0, 4), random));
      expect(ALLOWED[sign], `${terms.join(' + ')}`).toContain(signRational(value));
    }
  }
  expect([...seen.keys()]).toEqual(expect.arrayContaining(['positive', 'negative', 'mixed']));
  expect(seen.get('undecided') ?? 0).toBeLessThan(30);
});

const ANY = [-1, 0, 1];
const ALLOWED = {
  positive: [1],
  negative: [-1],
  zero: [0],
  nonnegative: [0, 1],
  nonpositive: [-1, 0],
  mixed: ANY,
  undecided: ANY,
};

/** A random point of a box, with k = 0 its lower corner. */
function inside(
  box: ReadonlyMap<Generator, Range>,
  k: number,
  random: () => number,
): (g: Generator) => Rational {
  const values = new Map(
    [...box].map(([g, { low, high }]) => {
      const share = k === 0 ? 0 : randomInteger(random, 0, 12);
      const width = rational(high.n * low.d - low.n * high.d, high.d * low.d);
      return [
        g,
        rational(low.n * width.d * 12n + width.n * BigInt(share) * low.d, low.d * width.d * 12n),
      ];
    }),
  );
  return (g) => values.get(g) as Rational;
}
