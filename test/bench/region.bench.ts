import { bench, describe } from 'vitest';
import {
  addPolynomials,
  generatorPolynomial,
  laplace,
  mulPolynomials,
  polynomialFromCoefficients,
  symbol,
  type Polynomial,
} from '../../src/algebra/index.ts';
import { compileConditions, YES } from '../../src/control/index.ts';
import { traceRegion } from '../../src/figures/index.ts';

/** J1 J2 s⁶ + (J1 + J2) b s⁵ + … + Ki k: two masses on a belt under three gains, invented. */
function beltDrive(): Polynomial {
  const [J1, J2, b, k, Kp, Ki, Kd] = ['J1', 'J2', 'b', 'k', 'Kp', 'Ki', 'Kd'].map((name) =>
    generatorPolynomial(symbol(name)),
  );
  const pair = (x: Polynomial, y: Polynomial): Polynomial =>
    addPolynomials(mulPolynomials(x, b), mulPolynomials(y, k));
  const ascending = [
    mulPolynomials(Ki, k),
    pair(Ki, Kp),
    pair(Kp, Kd),
    pair(Kd, b),
    mulPolynomials(addPolynomials(J1, J2), k),
    mulPolynomials(addPolynomials(J1, J2), b),
    mulPolynomials(J1, J2),
  ];
  return polynomialFromCoefficients(ascending, laplace);
}

const values: Readonly<Record<string, number>> = { Kd: 40, k: 50, b: 3, J1: 4, J2: 2 };

const compiled = compileConditions(
  [{ kind: 'stable', blocks: [{ signals: ['θ'], polynomial: beltDrive() }] }],
  () => 'input',
);

function holds(xs: Float64Array, ys: Float64Array): Uint8Array {
  const gains: Readonly<Record<string, Float64Array>> = { Kp: xs, Ki: ys };
  const inputs = compiled.inputs.map((name) => gains[name] ?? values[name]);
  return compiled.evaluate(inputs, xs.length)[0].map((v) => (v === YES ? 1 : 0));
}

const side = { from: 0, to: 40, n: 400 };

describe('a gain plane, 400 × 400 samples, one block of degree 6 in s', () => {
  bench('traced from a compiled stability condition', () => {
    traceRegion({
      x: side,
      y: side,
      conditions: [{ label: 'stable', latex: null, nominal: holds, tolerance: [] }],
    });
  });

  bench('tracing alone, the condition a disc', () => {
    const disc = (xs: Float64Array, ys: Float64Array): Float64Array =>
      xs.map((x, i) => 100 - (x - 20) ** 2 - (ys[i] - 20) ** 2);
    traceRegion({
      x: side,
      y: side,
      conditions: [{ label: 'disc', latex: null, nominal: disc, tolerance: [] }],
    });
  });
});
