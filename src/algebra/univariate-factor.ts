import type { Budget } from '../base/index.ts';
import { spend } from '../base/index.ts';
import { liftFactors } from './hensel.ts';
import { absolute, integerSquareRoot, longWork, modulo } from './integer.ts';
import {
  coefficientsIn,
  constantPolynomial,
  normalPart,
  polynomialFromCoefficients,
} from './polynomial.ts';
import { fieldNumber, type PrimeField } from './prime-field.ts';
import { factorModulo } from './prime-factor.ts';
import { gcdModulo, trimmed, type PrimePolynomial } from './prime-polynomial.ts';
import { divideExactly } from './quotient.ts';
import type { Generator, Polynomial } from './ring.ts';

type Integers = readonly bigint[];

interface ModularFactors {
  readonly field: PrimeField;
  readonly factors: readonly PrimePolynomial[];
}

const PRIMES_TRIED = 3;

/** The factors modulo the prime, of a few that keep f's degree and square-freeness, that gives the fewest. */
function fewestFactors(f: Integers): ModularFactors {
  const found: ModularFactors[] = [];
  for (let index = 0; found.length < PRIMES_TRIED; index += 1) {
    const field = fieldNumber(index);
    const image = trimmed(f.map((c) => field.reduce(c)));
    const slope = trimmed(image.slice(1).map((c, k) => field.mul(c, k + 1)));
    if (image.length < f.length || gcdModulo(image, slope, field).length > 1) continue;
    found.push({ field, factors: factorModulo(image, field) });
    if (found[found.length - 1].factors.length === 1) break;
  }
  return found.reduce((best, next) => (next.factors.length < best.factors.length ? next : best));
}

/** Twice a bound for lc(f) times any coefficient of a factor of f (M. Mignotte, Mathematics of Computation 28 (1974)). */
function coefficientBound(f: Integers): bigint {
  const norm = integerSquareRoot(f.reduce((sum, c) => sum + c * c, 0n)) + 1n;
  return (norm << BigInt(f.length)) * absolute(f[f.length - 1]);
}

/** All choices of `size` of the numbers 0 … count − 1. */
function* choices(count: number, size: number, from = 0): Iterable<readonly number[]> {
  if (size === 0) {
    yield [];
    return;
  }
  for (let k = from; k <= count - size; k += 1) {
    for (const rest of choices(count, size - 1, k + 1)) yield [k, ...rest];
  }
}

/**
 * The irreducible factors over ℤ of a primitive square-free polynomial in one generator: factors modulo a prime are
 * lifted to a modulus beyond the bound for coefficients and combined; each result is proved by division.
 *
 * Source: H. Zassenhaus, "On Hensel factorization I", Journal of Number Theory 1 (1969), 291–311.
 */
export function factorUnivariate(p: Polynomial, g: Generator, budget?: Budget): Polynomial[] {
  const f = coefficientsIn(p, g).map((c) => c.coefficients[0] ?? 0n);
  if (f.length <= 2) return [p];
  spend(budget, f.length ** 3, 'factoring a polynomial', `degree ${f.length - 1}`);
  const { field, factors } = fewestFactors(f);
  if (factors.length === 1) return [p];
  const bound = coefficientBound(f);
  let modulus = BigInt(field.prime);
  while (modulus <= bound) modulus *= modulus;
  const lifted = liftFactors(
    f.map((c) => modulo(c, modulus)),
    factors,
    field,
    modulus,
    budget,
  );
  return combine(p, g, lifted, modulus, budget);
}

/** The polynomial with the residues of least size of lc · Π of some lifted factors, without content. */
function candidate(
  lead: bigint,
  parts: readonly Integers[],
  modulus: bigint,
  g: Generator,
): Polynomial {
  const product = parts.reduce<Integers>(
    (all, part) => multiply(all, part).map((c) => modulo(c, modulus)),
    [modulo(lead, modulus)],
  );
  const symmetric = product.map((c) => (2n * c > modulus ? c - modulus : c));
  return normalPart(polynomialFromCoefficients(symmetric.map(constantPolynomial), g));
}

function multiply(a: Integers, b: Integers): bigint[] {
  const product = new Array<bigint>(a.length + b.length - 1).fill(0n);
  a.forEach((x, i) => b.forEach((y, k) => (product[i + k] += x * y)));
  return product;
}

/** Tries products of one, two, three … lifted factors until what is left cannot be split. */
function combine(
  p: Polynomial,
  g: Generator,
  lifted: readonly Integers[],
  modulus: bigint,
  budget?: Budget,
): Polynomial[] {
  for (let size = 1; 2 * size <= lifted.length; size += 1) {
    for (const chosen of choices(lifted.length, size)) {
      spend(budget, p.degrees[0] ** 2 * longWork(modulus), 'factoring a polynomial');
      const parts = chosen.map((k) => lifted[k]);
      const factor = candidate(p.coefficients[0], parts, modulus, g);
      const cofactor = divideExactly(p, factor, budget);
      if (!cofactor) continue;
      const others = lifted.filter((_, k) => !chosen.includes(k));
      return [factor, ...combine(cofactor, g, others, modulus, budget)];
    }
  }
  return [p];
}
