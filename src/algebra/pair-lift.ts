import type { Budget } from '../base/index.ts';
import { spend } from '../base/index.ts';
import { inverseOf, longWork, modulo } from './integer.ts';
import {
  addPolynomials,
  coefficientsIn,
  constantPolynomial,
  degreeIn,
  generatorPower,
  isZeroPolynomial,
  leadingCoefficientIn,
  mapTerms,
  mulPolynomials,
  polynomialFromCoefficients,
  subPolynomials,
  termCount,
  zeroPolynomial,
} from './polynomial.ts';
import type { Generator, Polynomial } from './ring.ts';

/*
 * Hensel lifting of a product of two polynomials from one generator to many, one generator after another, over the
 * field of integers modulo a prime that exceeds twice every coefficient. The other generators are shifted so that
 * the point of expansion is 0: then "modulo (y − α)^k" is leaving out powers of y.
 *
 * Source: P. S. Wang, "An improved multivariate polynomial factoring algorithm", Mathematics of Computation 32 (1978),
 * 1215–1231, sections 4 and 5; K. O. Geddes, S. R. Czapor, G. Labahn, Algorithms for Computer Algebra (1992), section 6.5.
 */

/** Two polynomials. */
export type Pair = readonly [Polynomial, Polynomial];

/** What is lifted: the product in all generators, the leading coefficient that both factors get, the modulus. */
export interface LiftProblem {
  readonly product: Polynomial;
  readonly lead: Polynomial;
  readonly main: Generator;
  readonly others: readonly Generator[];
  readonly prime: bigint;
}

const STEP = 'factoring a polynomial';

/** The residues of least size of all coefficients. */
export function symmetricResidues(p: Polynomial, prime: bigint): Polynomial {
  const half = prime >> 1n;
  return mapTerms(p, (c) => {
    const residue = modulo(c, prime);
    return residue > half ? residue - prime : residue;
  });
}

/** The value at 0 of generators: the terms without them. */
function atZero(p: Polynomial, generators: readonly Generator[]): Polynomial {
  return generators.reduce((part, g) => coefficientsIn(part, g)[0] ?? zeroPolynomial, p);
}

/** Solves d₁ v + d₂ u = c for fixed u and v, in the main generator and the first few others. */
class Diophantine {
  private readonly inner: Diophantine | null;
  private readonly last: Generator | undefined;
  private readonly bezout: Pair | null;

  constructor(
    private readonly u: Polynomial,
    private readonly v: Polynomial,
    private readonly problem: LiftProblem,
    others: readonly Generator[],
    private readonly budget?: Budget,
  ) {
    this.last = others[others.length - 1];
    this.inner = this.last
      ? new Diophantine(
          atZero(u, [this.last]),
          atZero(v, [this.last]),
          problem,
          others.slice(0, -1),
          budget,
        )
      : null;
    this.bezout = this.last ? null : bezoutPair(u, v, problem, budget);
  }

  /** d₁ of lower degree than u and d₂ of lower degree than v in the main generator. */
  solve(c: Polynomial): Pair {
    if (isZeroPolynomial(c)) return [zeroPolynomial, zeroPolynomial];
    return this.last && this.inner ? this.solveIn(this.last, this.inner, c) : this.solveInMain(c);
  }

  private solveInMain(c: Polynomial): Pair {
    // No common factor was seen, but there is one modulo the prime: the product will not agree.
    if (!this.bezout) return [zeroPolynomial, zeroPolynomial];
    const [s, t] = this.bezout;
    const { quotient, rest } = this.divide(this.times(s, c), this.u);
    return [rest, this.reduce(addPolynomials(this.times(t, c), this.times(quotient, this.v)))];
  }

  /** Power by power of the last generator, each from the equation at 0. */
  private solveIn(g: Generator, inner: Diophantine, c: Polynomial): Pair {
    let [first, second] = inner.solve(atZero(c, [g]));
    let gap = subPolynomials(c, this.combine(first, second));
    const highest = degreeIn(this.problem.product, g);
    for (let power = 1; power <= highest && !isZeroPolynomial(gap); power += 1) {
      gap = this.reduce(gap);
      const [x, y] = inner.solve(coefficientsIn(gap, g)[power] ?? zeroPolynomial);
      const [dx, dy] = [x, y].map((d) => mulPolynomials(d, generatorPower(g, power)));
      first = addPolynomials(first, dx);
      second = addPolynomials(second, dy);
      gap = subPolynomials(gap, this.combine(dx, dy));
    }
    return [first, second];
  }

  private combine(first: Polynomial, second: Polynomial): Polynomial {
    return this.reduce(addPolynomials(this.times(first, this.v), this.times(second, this.u)));
  }

  private reduce(p: Polynomial): Polynomial {
    spend(this.budget, termCount(p), STEP);
    return symmetricResidues(p, this.problem.prime);
  }

  private times(a: Polynomial, b: Polynomial): Polynomial {
    return this.reduce(mulPolynomials(a, b, this.budget));
  }

  private divide(a: Polynomial, b: Polynomial): { quotient: Polynomial; rest: Polynomial } {
    return divideInMain(a, b, this.problem, this.budget);
  }
}

/** Quotient and remainder over the field, in the main generator alone. */
function divideInMain(
  a: Polynomial,
  b: Polynomial,
  { main, prime }: LiftProblem,
  budget?: Budget,
): { quotient: Polynomial; rest: Polynomial } {
  const rest = coefficientsIn(a, main).map((c) => c.coefficients[0] ?? 0n);
  const divisor = coefficientsIn(b, main).map((c) => c.coefficients[0] ?? 0n);
  const inverse = inverseOf(divisor[divisor.length - 1], prime);
  const quotient: bigint[] = [];
  spend(budget, rest.length * divisor.length * longWork(prime), STEP);
  for (let shift = rest.length - divisor.length; shift >= 0; shift -= 1) {
    const factor = modulo(rest[shift + divisor.length - 1] * inverse, prime);
    quotient[shift] = factor;
    divisor.forEach((c, k) => (rest[shift + k] = modulo(rest[shift + k] - factor * c, prime)));
  }
  const build = (list: readonly bigint[]): Polynomial =>
    symmetricResidues(polynomialFromCoefficients(list.map(constantPolynomial), main), prime);
  return { quotient: build(quotient), rest: build(rest.slice(0, divisor.length - 1)) };
}

/** s and t with s v + t u = 1 in the main generator, or null where u and v have a common factor. */
function bezoutPair(
  u: Polynomial,
  v: Polynomial,
  problem: LiftProblem,
  budget?: Budget,
): Pair | null {
  const { main, prime } = problem;
  let [a, b] = [v, u];
  let [sa, sb]: Polynomial[] = [constantPolynomial(1n), zeroPolynomial];
  let [ta, tb]: Polynomial[] = [zeroPolynomial, constantPolynomial(1n)];
  while (!isZeroPolynomial(b)) {
    const { quotient, rest } = divideInMain(a, b, problem, budget);
    const next = (x: Polynomial, y: Polynomial): Polynomial =>
      symmetricResidues(subPolynomials(x, mulPolynomials(quotient, y)), prime);
    [a, b] = [b, rest];
    [sa, sb] = [sb, next(sa, sb)];
    [ta, tb] = [tb, next(ta, tb)];
  }
  if (degreeIn(a, main) > 0) return null;
  const inverse = constantPolynomial(inverseOf(a.coefficients[0], prime));
  const scaled = (p: Polynomial): Polynomial =>
    symmetricResidues(mulPolynomials(p, inverse), prime);
  return [scaled(sa), scaled(ta)];
}

/** p with another leading coefficient in the main generator. */
function withLead(p: Polynomial, lead: Polynomial, main: Generator): Polynomial {
  const gap = subPolynomials(lead, leadingCoefficientIn(p, main));
  return addPolynomials(p, mulPolynomials(gap, generatorPower(main, degreeIn(p, main))));
}

/** The pair in one more generator, whose product agrees with `target`, or null where there is none. */
function liftOnce(
  pair: Pair,
  g: Generator,
  problem: LiftProblem,
  known: readonly Generator[],
  later: readonly Generator[],
  budget?: Budget,
): Pair | null {
  const { main, prime } = problem;
  const target = atZero(problem.product, later);
  const lead = atZero(problem.lead, later);
  const equation = new Diophantine(pair[0], pair[1], problem, known, budget);
  let [u, v] = pair.map((p) => withLead(p, lead, main));
  const gapOf = (): Polynomial =>
    symmetricResidues(subPolynomials(target, mulPolynomials(u, v, budget)), prime);
  let gap = gapOf();
  for (let power = 1; power <= degreeIn(target, g) && !isZeroPolynomial(gap); power += 1) {
    spend(budget, termCount(gap), STEP);
    const [du, dv] = equation.solve(coefficientsIn(gap, g)[power] ?? zeroPolynomial);
    u = addPolynomials(u, mulPolynomials(du, generatorPower(g, power)));
    v = addPolynomials(v, mulPolynomials(dv, generatorPower(g, power)));
    gap = gapOf();
  }
  return isZeroPolynomial(gap) ? [u, v] : null;
}

/**
 * The pair of polynomials in all generators whose product is `product`, with the leading coefficient `lead` each,
 * and which is the given pair at 0 of the other generators; null where there is none. Both images are coprime and have
 * the value of `lead` at 0 as leading coefficients, modulo the prime.
 */
export function liftPair(pair: Pair, problem: LiftProblem, budget?: Budget): Pair | null {
  const { others } = problem;
  let lifted: Pair | null = pair;
  for (let k = 0; k < others.length && lifted; k += 1) {
    lifted = liftOnce(lifted, others[k], problem, others.slice(0, k), others.slice(k + 1), budget);
  }
  return lifted;
}
