import {
  coefficientsIn,
  degreeIn,
  divRatios,
  factorPolynomial,
  laplace,
  negRatio,
  ratioFromPolynomial,
  type Polynomial,
  type Ratio,
} from '../algebra/index.ts';

/** What a transfer function hides, in words: `hides a mode at s = 0`; null if it hides nothing. */
export function hiddenNote(
  hidden: Polynomial | null,
  write: (ratio: Ratio) => string,
): string | null {
  if (!hidden) return null;
  const places = factorPolynomial(hidden)
    .factors.filter(({ factor }) => degreeIn(factor, laplace) > 0)
    .map(
      ({ factor, multiplicity }) =>
        place(factor, write) + (multiplicity > 1 ? ` (${multiplicity} times)` : ''),
    );
  if (places.length === 0) return null;
  const several = places.length > 1 || degreeIn(hidden, laplace) > 1;
  return `It hides ${several ? 'modes' : 'a mode'} at ${places.join(' and ')}.`;
}

function place(factor: Polynomial, write: (ratio: Ratio) => string): string {
  if (degreeIn(factor, laplace) > 1) return `the roots of ${write(ratioFromPolynomial(factor))}`;
  const [constant, slope] = coefficientsIn(factor, laplace);
  return `s = ${write(negRatio(divRatios(ratioFromPolynomial(constant), ratioFromPolynomial(slope))))}`;
}
