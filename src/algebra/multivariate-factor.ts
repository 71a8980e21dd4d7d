import type { Budget } from '../base/index.ts';
import { spend } from '../base/index.ts';
import { contentIn, gcdPolynomials } from './gcd.ts';
import { absolute, bitLength, inverseOf, longWork } from './integer.ts';
import { liftPair, symmetricResidues, type LiftProblem, type Pair } from './pair-lift.ts';
import {
  addPolynomials,
  coefficientsIn,
  constantPolynomial,
  degreeIn,
  derivativePolynomial,
  generatorPolynomial,
  isConstantPolynomial,
  leadingCoefficientIn,
  leadingTermCount,
  mulPolynomials,
  normalPart,
  productOfPolynomials,
  scalePolynomial,
  zeroPolynomial,
} from './polynomial.ts';
import { divideExactly, quotientOf } from './quotient.ts';
import { ElementSequence, fieldNumber } from './prime-field.ts';
import type { Generator, Polynomial } from './ring.ts';
import { factorUnivariate } from './univariate-factor.ts';

/** A point of the generators other than the main one, with the irreducible factors of p there. */
interface Expansion {
  readonly main: Generator;
  readonly others: readonly Generator[];
  readonly point: readonly bigint[];
  readonly images: readonly Polynomial[];
}

/** Exponents of Mersenne primes 2^n − 1: moduli whose primality is long known (sequence A000043 of the OEIS). */
const MERSENNE_EXPONENTS = [127, 521, 1279, 2203, 4423];
const POINTS_TRIED = 24;
const POINTS_COMPARED = 3;
/** More factors at a point than this make too many pairs: they stay together. */
const MOST_IMAGES = 8;

/** The generator whose leading coefficient both factors of a pair have to carry at the least cost. */
function cheapestMain(p: Polynomial): Generator {
  const cost = (g: Generator): number => leadingTermCount(p, g) * 8 + degreeIn(p, g);
  return p.generators.reduce((best, g) => (cost(g) < cost(best) ? g : best));
}

/** p with g + value for g. */
function shifted(p: Polynomial, g: Generator, value: bigint, budget?: Budget): Polynomial {
  if (value === 0n) return p;
  const step = addPolynomials(generatorPolynomial(g), constantPolynomial(value));
  return coefficientsIn(p, g).reduceRight(
    (sum, c) => addPolynomials(mulPolynomials(sum, step, budget), c),
    zeroPolynomial,
  );
}

function shiftedAll(
  p: Polynomial,
  { others, point }: Expansion,
  sign: 1n | -1n,
  budget?: Budget,
): Polynomial {
  return others.reduce((sum, g, k) => shifted(sum, g, sign * point[k], budget), p);
}

/** p at a point of all but one generator. */
function imageIn(
  p: Polynomial,
  others: readonly Generator[],
  point: readonly bigint[],
): Polynomial {
  return others.reduce(
    (part, g, k) =>
      coefficientsIn(part, g).reduceRight(
        (sum, c) => addPolynomials(scalePolynomial(sum, point[k]), c),
        zeroPolynomial,
      ),
    p,
  );
}

function isSquareFree(image: Polynomial, g: Generator, budget?: Budget): boolean {
  return isConstantPolynomial(gcdPolynomials(image, derivativePolynomial(image, g), budget));
}

/** 0 at first, then more and more often another small number: every one that is not 0 costs terms. */
function coordinate(turn: number, elements: ElementSequence): bigint {
  const field = fieldNumber(0);
  const span = Math.ceil(turn / 2);
  const moved = elements.next(field) % POINTS_TRIED < turn;
  return moved ? BigInt((elements.next(field) % (2 * span + 1)) - span) : 0n;
}

/** The point, of a few at which p keeps its degree and is square-free, with the fewest factors; null if none is found. */
function bestExpansion(p: Polynomial, main: Generator, budget?: Budget): Expansion | null {
  const others = p.generators.filter((g) => g !== main);
  const elements = new ElementSequence(5);
  const found: Expansion[] = [];
  for (let turn = 0; turn < POINTS_TRIED && found.length < POINTS_COMPARED; turn += 1) {
    const point = others.map(() => coordinate(turn, elements));
    const image = imageIn(p, others, point);
    spend(
      budget,
      p.exponents.length * longWork(image.coefficients[0] ?? 0n),
      'factoring a polynomial',
    );
    if (degreeIn(image, main) < degreeIn(p, main) || !isSquareFree(image, main, budget)) continue;
    found.push({ main, others, point, images: factorUnivariate(normalPart(image), main, budget) });
    if (found[found.length - 1].images.length === 1) break;
  }
  const fewest = (best: Expansion, next: Expansion): Expansion =>
    next.images.length < best.images.length ? next : best;
  return found.length === 0 ? null : found.reduce(fewest);
}

/** A prime beyond twice the coefficients of any factor of p (bound of A. O. Gelfond), or null where none is kept. */
function primeBeyond(p: Polynomial): bigint | null {
  const largest = p.coefficients.reduce((most, c) => (absolute(c) > most ? absolute(c) : most), 1n);
  const degrees = p.degrees.reduce((sum, degree) => sum + degree, 0);
  const bits =
    bitLength(largest) + Math.ceil(1.5 * degrees) + bitLength(BigInt(p.coefficients.length));
  const exponent = MERSENNE_EXPONENTS.find((n) => n > bits + 2);
  return exponent === undefined ? null : (1n << BigInt(exponent)) - 1n;
}

/** The choices of at most half of the images; of two equal halves only one. */
function* halves(count: number): Iterable<readonly number[]> {
  const all = Array.from({ length: 2 ** count }, (_, mask) =>
    [...Array(count).keys()].filter((k) => (mask >> k) & 1),
  );
  for (let size = 1; 2 * size <= count; size += 1) {
    yield* all.filter(
      (chosen) => chosen.length === size && (2 * size < count || chosen.includes(0)),
    );
  }
}

/** The factor of p that some of its images belong to, or null. */
function factorWith(
  p: Polynomial,
  chosen: readonly number[],
  expansion: Expansion,
  problem: LiftProblem,
  budget?: Budget,
): Polynomial | null {
  const { main, others, images } = expansion;
  const { prime, lead } = problem;
  const leadAtZero = imageIn(
    lead,
    others,
    others.map(() => 0n),
  );
  const [u, v] = [true, false].map((inside) => {
    const product = productOfPolynomials(
      images.filter((_, k) => chosen.includes(k) === inside),
      budget,
    );
    const scale = inverseOf(product.coefficients[0], prime) * leadAtZero.coefficients[0];
    return symmetricResidues(scalePolynomial(product, scale), prime);
  });
  const lifted = liftPair([u, v], problem, budget);
  if (!lifted) return null;
  const candidate = shiftedAll(symmetricResidues(lifted[0], prime), expansion, -1n, budget);
  const factor = normalPart(quotientOf(candidate, contentIn(candidate, main, budget), budget));
  return divideExactly(p, factor, budget) ? factor : null;
}

/**
 * Two factors over ℤ of a square-free polynomial in several generators that is primitive in each of them, the first
 * one irreducible: factors at a point are paired and lifted, and the result is proved by division. Null where there are
 * none, and where a coefficient bound or the number of pairs is too large to say.
 *
 * Source: P. S. Wang, "An improved multivariate polynomial factoring algorithm", Mathematics of Computation 32 (1978),
 * 1215–1231, with the whole leading coefficient given to both factors of a pair.
 */
export function splitMultivariate(p: Polynomial, budget?: Budget): Pair | null {
  const main = cheapestMain(p);
  const expansion = bestExpansion(p, main, budget);
  if (!expansion || expansion.images.length === 1 || expansion.images.length > MOST_IMAGES) {
    return null;
  }
  const lead = leadingCoefficientIn(p, main);
  const product = shiftedAll(mulPolynomials(p, lead, budget), expansion, 1n, budget);
  const prime = primeBeyond(product);
  if (prime === null) return null;
  const problem: LiftProblem = {
    product: symmetricResidues(product, prime),
    lead: symmetricResidues(shiftedAll(lead, expansion, 1n, budget), prime),
    main,
    others: expansion.others,
    prime,
  };
  for (const chosen of halves(expansion.images.length)) {
    const factor = factorWith(p, chosen, expansion, problem, budget);
    if (factor) return [factor, quotientOf(p, factor, budget)];
  }
  return null;
}
