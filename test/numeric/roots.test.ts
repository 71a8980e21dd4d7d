import { describe, expect, it } from 'vitest';
import {
  addComplex,
  argument,
  divideComplex,
  magnitude,
  polynomialAt,
  polynomialRoots,
  randomInteger,
  rootsWithMultiplicity,
  seededRandom,
  subtractComplex,
} from '../../src/numeric/index.ts';
import type { Complex } from '../../src/numeric/index.ts';
import counts from '../data/root-counts.json' with { type: 'json' };
import { integerPolynomial, product, withRoots } from './polynomials.ts';

const real = (re: number): Complex => ({ re, im: 0 });

/** Roots as the sorted list that `polynomialRoots` gives, conjugates added. */
function listed(roots: readonly Complex[]): Complex[] {
  return roots
    .flatMap(({ re, im }) =>
      im === 0
        ? [{ re, im }]
        : [
            { re, im },
            { re, im: -im },
          ],
    )
    .sort((a, b) => b.re - a.re || b.im - a.im);
}

describe('the roots of a polynomial', () => {
  it.each([
    [[1, 0, 4], [{ re: 0, im: 2 }]],
    [
      [1, 2, 1],
      [real(-1), real(-1)],
    ],
    [
      [1, 4, 6, 4, 1],
      [real(-1), real(-1), real(-1), real(-1)],
    ],
    [
      [1, 0.2, 0.01],
      [real(-0.1), real(-0.1)],
    ],
    [
      [1, 0, 2, 0, 1],
      [
        { re: 0, im: 1 },
        { re: 0, im: 1 },
      ],
    ],
    [
      [0, 0, 2, 4, 0, 0],
      [real(0), real(0), real(-2)],
    ],
    [
      [1e300, 3e300, 3e300, 1e300],
      [real(-1), real(-1), real(-1)],
    ],
    [
      [1e-300, 3e-300, 2e-300],
      [real(-1), real(-2)],
    ],
    [
      [1, 1e9, 1e9],
      [real(-1.000000001), real(-999999999)],
    ],
    [[5], []],
    [[0, 0], []],
    [[], []],
  ])('of %j are exact to the last digits', (coefficients, roots) => {
    const found = polynomialRoots(coefficients);
    expect(found).toHaveLength(listed(roots).length);
    listed(roots).forEach((root, i) => {
      const gap = magnitude(subtractComplex(found[i]!, root));
      expect(gap).toBeLessThanOrEqual(4 * Number.EPSILON * magnitude(root));
    });
  });

  it('are NaN where a coefficient is not finite', () => {
    expect(polynomialRoots([1, Infinity, 2])).toEqual([
      { re: NaN, im: NaN },
      { re: NaN, im: NaN },
    ]);
  });

  it('are 1 to 10 for Wilkinson’s polynomial of degree 10 (J. H. Wilkinson, The perfidious polynomial, 1984; from memory)', () => {
    const roots = Array.from({ length: 10 }, (_, i) => real(i + 1));
    polynomialRoots(withRoots(roots)).forEach((root, i) => {
      expect(root.im).toBe(0);
      expect(Math.abs(root.re - (10 - i))).toBeLessThan(1e-13);
    });
  });

  it('are not merged in Wilkinson’s polynomial of degree 20, whose coefficients are rounded', () => {
    const roots = polynomialRoots(withRoots(Array.from({ length: 20 }, (_, i) => real(i + 1))));
    roots.forEach((root, i) => expect(Math.abs(root.re - (20 - i))).toBeLessThan(1e-2));
  });

  it('spread over twelve decades come out to full precision', () => {
    const roots = [-1e-6, -1e-3, -1, -1e3, -1e6].map(real);
    polynomialRoots(withRoots(roots)).forEach((root, i) => {
      expect(Math.abs(root.re / roots[i]!.re - 1)).toBeLessThan(1e-14);
    });
  });

  it.each(counts)('of $poly lie as published ($source; $how)', ({ poly, rhp, jw, lhp }) => {
    const roots = polynomialRoots(poly);
    // A double pair on the axis is known only to the root of the rounding.
    const near = (root: Complex): number => 1e-7 * magnitude(root);
    expect(roots.filter((root) => root.re > near(root))).toHaveLength(rhp);
    expect(roots.filter((root) => Math.abs(root.re) <= near(root))).toHaveLength(jw);
    expect(roots.filter((root) => root.re < -near(root))).toHaveLength(lhp);
  });
});

describe('random polynomials', () => {
  it('vanish at their roots, which multiply back to them', () => {
    const random = seededRandom(11);
    for (let trial = 0; trial < 1500; trial++) {
      const coefficients = integerPolynomial(random, randomInteger(random, 1, 14));
      const roots = polynomialRoots(coefficients);
      const lead = coefficients[0]!;
      const rebuilt = withRoots(roots.filter((root) => root.im >= 0)).map((c) => c * lead);
      const size = Math.max(...rebuiltBound(roots)) * lead;
      coefficients.forEach((c, i) => {
        expect(Math.abs(rebuilt[i]! - c), `seed 11, trial ${trial}: ${coefficients}`).toBeLessThan(
          1e-13 * size,
        );
      });
      for (const root of roots) {
        const terms = coefficients.reduce((sum, c) => sum * magnitude(root) + Math.abs(c), 0);
        expect(magnitude(polynomialAt(coefficients, root))).toBeLessThanOrEqual(1e-14 * terms);
      }
    }
  });

  it('with repeated and complex roots give them back with their multiplicities', () => {
    const random = seededRandom(12);
    for (let trial = 0; trial < 300; trial++) {
      const chosen = Array.from({ length: randomInteger(random, 1, 3) }, () => ({
        root: { re: randomInteger(random, -6, 6), im: randomInteger(random, 0, 4) },
        multiplicity: randomInteger(random, 1, 3),
      }));
      const roots = chosen.flatMap(({ root, multiplicity }) =>
        new Array<Complex>(multiplicity).fill(root),
      );
      const found = polynomialRoots(withRoots(roots));
      expect(found).toHaveLength(listed(roots).length);
      listed(roots).forEach((root) => {
        const gaps = found.map((other) => magnitude(subtractComplex(other, root)));
        const [gap] = gaps
          .sort((a, b) => a - b)
          .slice(listed(roots).filter((r) => same(r, root)).length - 1);
        expect(gap, `seed 12, trial ${trial}: ${JSON.stringify(roots)}`).toBeLessThan(1e-9);
      });
    }
  });

  it('wind about 0 along a circle as often as there are roots inside it', () => {
    const random = seededRandom(13);
    for (let trial = 0; trial < 200; trial++) {
      const coefficients = integerPolynomial(random, randomInteger(random, 1, 10));
      const centre = { re: 2 * random() - 1, im: 2 * random() - 1 };
      const radius = 0.2 + random();
      const distances = polynomialRoots(coefficients).map((root) =>
        magnitude(subtractComplex(root, centre)),
      );
      if (distances.some((distance) => Math.abs(distance / radius - 1) < 0.01)) continue;
      const inside = distances.filter((distance) => distance < radius).length;
      const turns = windings(coefficients, centre, radius);
      expect(turns, `seed 13, trial ${trial}: ${coefficients}`).toBeCloseTo(inside, 9);
    }
  });

  it('come with exact conjugate pairs in a fixed order, whatever their scale', () => {
    const random = seededRandom(14);
    for (let trial = 0; trial < 300; trial++) {
      const coefficients = integerPolynomial(random, randomInteger(random, 2, 12));
      const scale = 10 ** randomInteger(random, -9, 9);
      const roots = polynomialRoots(coefficients.map((c, i) => c * scale ** i));
      expect(listed(roots.filter((root) => root.im >= 0))).toEqual(roots);
      polynomialRoots(coefficients).forEach((root, i) => {
        const gap = Math.abs(magnitude(roots[i]!) / scale - magnitude(root));
        expect(gap, `seed 14, trial ${trial}: ${coefficients}`).toBeLessThan(
          1e-5 * (1 + magnitude(root)),
        );
      });
    }
  });
});

it('distinct roots take the multiplicity of their factor', () => {
  expect(
    rootsWithMultiplicity([
      { coefficients: [1, 3], multiplicity: 2 },
      { coefficients: [1, 0, 1], multiplicity: 1 },
    ]),
  ).toEqual([
    { root: { re: -3, im: 0 }, multiplicity: 2 },
    { root: { re: 0, im: 1 }, multiplicity: 1 },
    { root: { re: 0, im: -1 }, multiplicity: 1 },
  ]);
});

/** Coefficients of ∏ (s + |r|): how large the sums are from which the coefficients come. */
function rebuiltBound(roots: readonly Complex[]): number[] {
  return roots.map((root) => [1, magnitude(root)]).reduce(product, [1]);
}

function same(a: Complex, b: Complex): boolean {
  return a.re === b.re && a.im === b.im;
}

/** How often p(z) turns about 0 as z goes once round a circle. */
function windings(coefficients: readonly number[], centre: Complex, radius: number): number {
  const steps = 4000;
  const values = Array.from({ length: steps + 1 }, (_, k) => {
    const angle = (2 * Math.PI * k) / steps;
    const offset = { re: radius * Math.cos(angle), im: radius * Math.sin(angle) };
    return polynomialAt(coefficients, addComplex(centre, offset));
  });
  const turns = values.slice(1).map((value, k) => argument(divideComplex(value, values[k]!)));
  return turns.reduce((sum, turn) => sum + turn, 0) / (2 * Math.PI);
}
