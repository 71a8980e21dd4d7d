import { ElementSequence, type PrimeField } from './prime-field.ts';
import {
  divideModulo,
  gcdModulo,
  monic,
  powerModulo,
  subtractModulo,
  trimmed,
  type PrimePolynomial,
} from './prime-polynomial.ts';

interface DegreePart {
  readonly product: PrimePolynomial;
  readonly degree: number;
}

/** Products of the irreducible factors of each degree: those of degree d divide x^(p^d) − x. */
function byDegree(f: PrimePolynomial, field: PrimeField): DegreePart[] {
  const parts: DegreePart[] = [];
  let rest = f;
  let power: PrimePolynomial = [0, 1];
  for (let degree = 1; 2 * degree < rest.length; degree += 1) {
    power = powerModulo(power, BigInt(field.prime), rest, field);
    const product = gcdModulo(subtractModulo(power, [0, 1], field), rest, field);
    if (product.length === 1) continue;
    parts.push({ product, degree });
    rest = divideModulo(rest, product, field).quotient;
    power = divideModulo(power, rest, field).remainder;
  }
  return rest.length > 1 ? [...parts, { product: rest, degree: rest.length - 1 }] : parts;
}

/** Splits a product of irreducible factors of one degree with random elements. */
function split(
  { product, degree }: DegreePart,
  field: PrimeField,
  elements: ElementSequence,
): PrimePolynomial[] {
  if (product.length - 1 === degree) return [product];
  const exponent = (BigInt(field.prime) ** BigInt(degree) - 1n) / 2n;
  for (;;) {
    const element = trimmed(product.slice(1).map(() => elements.next(field)));
    const power = powerModulo(element, exponent, product, field);
    const factor = gcdModulo(subtractModulo(power, [1], field), product, field);
    if (factor.length <= 1 || factor.length === product.length) continue;
    const cofactor = divideModulo(product, factor, field).quotient;
    return [factor, cofactor].flatMap((part) => split({ product: part, degree }, field, elements));
  }
}

/**
 * The monic irreducible factors of a square-free polynomial modulo an odd prime.
 *
 * Source: D. G. Cantor, H. Zassenhaus, "A new algorithm for factoring polynomials over finite fields", Mathematics
 * of Computation 36 (1981), 587–592.
 */
export function factorModulo(f: PrimePolynomial, field: PrimeField): readonly PrimePolynomial[] {
  const elements = new ElementSequence(11);
  return byDegree(monic(f, field), field).flatMap((part) => split(part, field, elements));
}
