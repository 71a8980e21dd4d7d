import { expect, it } from 'vitest';
import {
  addComplex,
  argument,
  complex,
  complexExponential,
  complexRoot,
  divideComplex,
  magnitude,
  multiplyComplex,
  polynomialAt,
  randomNormal,
  seededRandom,
  subtractComplex,
} from '../../src/numeric/index.ts';
import type { Complex } from '../../src/numeric/index.ts';

const random = seededRandom(61);
const draw = (): Complex => complex(randomNormal(random), randomNormal(random));

function expectClose(a: Complex, b: Complex): void {
  expect(magnitude(subtractComplex(a, b))).toBeLessThanOrEqual(1e-14 * (1 + magnitude(b)));
}

it('complex arithmetic obeys the laws of a field', () => {
  for (let trial = 0; trial < 200; trial++) {
    const [a, b, c] = [draw(), draw(), draw()];
    expectClose(multiplyComplex(divideComplex(a, b), b), a);
    const distributed = addComplex(multiplyComplex(a, b), multiplyComplex(a, c));
    expectClose(multiplyComplex(a, addComplex(b, c)), distributed);
  }
});

it('roots square back, with a real part that is not negative, on the cut too', () => {
  for (const z of [
    draw(),
    draw(),
    complex(-4),
    complex(-4, -0),
    complex(9),
    complex(0),
    complex(0, 2),
  ]) {
    const root = complexRoot(z);
    expectClose(multiplyComplex(root, root), z);
    expect(root.re).toBeGreaterThanOrEqual(0);
  }
});

it('the exponential turns sums into products and has the argument of its imaginary part', () => {
  const [a, b] = [draw(), draw()];
  const factors = multiplyComplex(complexExponential(a), complexExponential(b));
  expectClose(complexExponential(addComplex(a, b)), factors);
  expect(argument(complexExponential(complex(3, 1.25)))).toBeCloseTo(1.25, 14);
});

it('division does not overflow where its result does not', () => {
  expectClose(divideComplex(complex(1e300, 1e300), complex(2e300, 2e300)), complex(0.5));
});

it('a polynomial is evaluated from its highest power down', () => {
  expectClose(polynomialAt([1, 2, 3], complex(0, 1)), complex(2, 2));
});
