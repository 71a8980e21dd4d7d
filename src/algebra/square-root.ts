import type { Budget } from '../base/index.ts';
import { functionOf, imaginary } from './generator.ts';
import { absolute, integerSquareRoot } from './integer.ts';
import { constantPolynomial, contentOf, unscalePolynomial } from './polynomial.ts';
import { rational, type Rational } from './rational.ts';
import { asRational, mulRatios, ratio, ratioFromRational, ratioOf, zeroRatio } from './ratio.ts';
import type { Ratio } from './ring.ts';

/** value = outside² · Π inside, with distinct insides that are primes as far as trial division reaches. */
interface SquareParts {
  readonly outside: bigint;
  readonly inside: readonly bigint[];
}

const TRIAL_LIMIT = 10_000n;

function squareParts(value: bigint): SquareParts {
  let rest = value;
  let outside = 1n;
  const inside: bigint[] = [];
  for (
    let prime = 2n;
    prime < TRIAL_LIMIT && prime * prime <= rest;
    prime += prime === 2n ? 1n : 2n
  ) {
    let odd = false;
    for (; rest % prime === 0n; rest /= prime) {
      if (odd) outside *= prime;
      odd = !odd;
    }
    if (odd) inside.push(prime);
  }
  const root = integerSquareRoot(rest);
  if (root * root === rest) return { outside: outside * root, inside };
  return { outside, inside: [...inside, rest] };
}

function integerRatio(value: bigint): Ratio {
  return ratioFromRational(rational(value));
}

/** The square root of a rational number: a rational times square roots of primes, times j if negative. */
function rootOfRational(r: Rational): Ratio {
  const { outside, inside } = squareParts(absolute(r.n) * r.d);
  const roots = inside.map((prime) => ratioOf(functionOf('sqrt', [integerRatio(prime)])));
  const scale = ratioFromRational(rational(outside, r.d));
  const signed = r.n < 0n ? [ratioOf(imaginary), ...roots] : roots;
  return signed.reduce((product, root) => mulRatios(product, root), scale);
}

/**
 * The principal square root: exact for numbers (sqrt(12) is 2 sqrt(3), sqrt(6) is sqrt(2) sqrt(3), so that equal
 * numbers have equal forms); otherwise a kernel with the square numbers drawn out (sqrt(4 a) is 2 sqrt(a)).
 * Squares of symbols stay inside, since their signs are not known here.
 */
export function sqrtOf(r: Ratio, budget?: Budget): Ratio {
  const number = asRational(r);
  if (number) return number.n === 0n ? zeroRatio : rootOfRational(number);
  const [top, bottom] = [contentOf(r.num), contentOf(r.den)];
  const { outside, inside } = squareParts(top * bottom);
  const kept = inside.reduce((product, prime) => product * prime, 1n);
  const argument = mulRatios(
    ratio(unscalePolynomial(r.num, top), unscalePolynomial(r.den, bottom), budget),
    integerRatio(kept),
  );
  const root = ratioOf(functionOf('sqrt', [argument]));
  return mulRatios(root, ratio(constantPolynomial(outside), constantPolynomial(bottom)));
}
