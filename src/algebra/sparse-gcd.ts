import type { Budget } from '../base/index.ts';
import { spend } from '../base/index.ts';
import { placesIn } from './frame.ts';
import { ElementSequence, fieldNumber, type PrimeField } from './prime-field.ts';
import { degreeIn } from './polynomial.ts';
import { gcdModulo, trimmed, type PrimePolynomial } from './prime-polynomial.ts';
import type { Generator, Polynomial } from './ring.ts';
import { polynomialOfUnsortedTerms } from './terms.ts';
import { interpolate, solveVandermonde } from './vandermonde.ts';

/*
 * Zippel's sparse modular algorithm. H = (γ / lc g) · g, with g the primitive gcd of a and b in the main variable
 * and γ the gcd of their leading coefficients, has integer coefficients and known images: at a point of the other
 * variables it is γ times the monic gcd of the images. Its monomials (the skeleton) are found one variable at a
 * time modulo one prime; further primes need only a linear system for the coefficients.
 *
 * Source: R. Zippel, "Probabilistic algorithms for sparse polynomials", EUROSAM '79, LNCS 72, 216–226; the leading
 * coefficient as in K. O. Geddes, S. R. Czapor, G. Labahn, Algorithms for Computer Algebra (1992), section 7.4.
 */

/** The terms of a polynomial laid out for evaluation: power of the main variable, exponents of the others. */
interface Layout {
  readonly polynomial: Polynomial;
  readonly powers: Int32Array;
  readonly rows: Int32Array;
  /** The degrees in the others. */
  readonly degrees: readonly number[];
  /** The coefficients modulo a prime; those of the last prime are kept. */
  readonly residues: (field: PrimeField) => Float64Array;
}

/** One monomial of the skeleton. */
interface Monomial {
  readonly power: number;
  readonly exponents: readonly number[];
}

interface Image {
  readonly monomials: readonly Monomial[];
  readonly values: readonly number[];
}

/** What is asked: the pair, their γ, the variables, and upper bounds for the degrees of H. */
export interface SparseProblem {
  readonly a: Polynomial;
  readonly b: Polynomial;
  readonly gamma: Polynomial;
  readonly main: Generator;
  /** All generators in canonical order, and those other than the main one. */
  readonly generators: readonly Generator[];
  readonly others: readonly Generator[];
  readonly mainDegree: number;
  readonly bounds: readonly number[];
}

function layOut(p: Polynomial, main: Generator, others: readonly Generator[]): Layout {
  const width = p.generators.length;
  const count = p.coefficients.length;
  const powers = new Int32Array(count);
  const rows = new Int32Array(count * others.length);
  p.generators.forEach((g, k) => {
    const target = others.indexOf(g);
    for (let i = 0; i < count; i += 1) {
      const exponent = p.exponents[i * width + k];
      if (g === main) powers[i] = exponent;
      else rows[i * others.length + target] = exponent;
    }
  });
  const degrees = others.map((g) => Math.max(0, degreeIn(p, g)));
  return { polynomial: p, powers, rows, degrees, residues: residuesOf(p) };
}

function residuesOf(p: Polynomial): (field: PrimeField) => Float64Array {
  let kept: Float64Array | null = null;
  let keptPrime = 0;
  return (field) => {
    if (kept && keptPrime === field.prime) return kept;
    kept = Float64Array.from(p.coefficients, (c) => field.reduce(c));
    keptPrime = field.prime;
    return kept;
  };
}

/** Values of a polynomial's terms along the points r, r², r³ … of some variables, the others fixed. */
class Progression {
  private readonly values: Float64Array;
  private readonly steps: Float64Array;
  private readonly size: number;

  constructor(
    private readonly layout: Layout,
    ratios: readonly number[],
    fixed: readonly number[],
    private readonly field: PrimeField,
  ) {
    const { polynomial, rows } = layout;
    const width = ratios.length + fixed.length;
    const tables = powerTables(layout, [...ratios, ...fixed], field);
    const residues = layout.residues(field);
    this.values = new Float64Array(polynomial.coefficients.length);
    this.steps = new Float64Array(polynomial.coefficients.length);
    for (let i = 0; i < polynomial.coefficients.length; i += 1) {
      this.steps[i] = termProduct(1, rows, i * width, tables, 0, ratios.length, field);
      this.values[i] = termProduct(
        residues[i],
        rows,
        i * width,
        tables,
        ratios.length,
        width,
        field,
      );
    }
    this.size = layout.powers.reduce((highest, power) => Math.max(highest, power), 0) + 1;
  }

  /** The image at the next point of the progression. */
  next(): PrimePolynomial {
    const coefficients = new Array<number>(this.size).fill(0);
    for (let i = 0; i < this.values.length; i += 1) {
      this.values[i] = this.field.mul(this.values[i], this.steps[i]);
      const power = this.layout.powers[i];
      coefficients[power] = this.field.add(coefficients[power], this.values[i]);
    }
    return trimmed(coefficients);
  }
}

/** The powers of a value for each of the other generators, up to their degrees. */
function powerTables(
  { degrees }: Layout,
  values: readonly number[],
  field: PrimeField,
): Float64Array[] {
  return values.map((value, k) => field.powers(value, degrees[k]));
}

/** `start` times the powers of columns from … to − 1 in a row of exponents. */
function termProduct(
  start: number,
  rows: Int32Array,
  row: number,
  tables: readonly Float64Array[],
  from: number,
  to: number,
  field: PrimeField,
): number {
  let product = start;
  for (let k = from; k < to; k += 1) {
    const exponent = rows[row + k];
    if (exponent > 0) product = field.mul(product, tables[k][exponent]);
  }
  return product;
}

function monomialValue(
  row: ArrayLike<number>,
  values: readonly number[],
  offset: number,
  field: PrimeField,
): number {
  let product = 1;
  for (let k = 0; k < values.length; k += 1) {
    const exponent = row[offset + k];
    if (exponent > 0) product = field.mul(product, field.pow(values[k], exponent));
  }
  return product;
}

/** The images of H modulo one prime. Every method answers null where a point or the skeleton was unlucky. */
class ImageFinder {
  private readonly a: Layout;
  private readonly b: Layout;
  private readonly gamma: Layout;

  constructor(
    private readonly problem: SparseProblem,
    private readonly elements: ElementSequence,
    private readonly budget?: Budget,
  ) {
    const { main, others } = problem;
    this.a = layOut(problem.a, main, others);
    this.b = layOut(problem.b, main, others);
    this.gamma = layOut(problem.gamma, main, others);
  }

  /** H modulo the prime from nothing: its monomials are found one variable at a time. */
  fresh(field: PrimeField): Image | null {
    const point = this.problem.others.map(() => this.elements.next(field));
    const first = this.imagesAlong([], point, 1, field);
    if (!first) return null;
    let image: Image | null = {
      monomials: first[0].map((_, power) => ({ power, exponents: [] })),
      values: first[0],
    };
    for (let k = 0; k < point.length && image; k += 1) {
      image = this.addVariable(withoutZeros(image), k, point, field);
    }
    return image && withoutZeros(image);
  }

  /** The coefficients of known monomials of H in the first k others, the rest fixed. */
  coefficients(
    monomials: readonly Monomial[],
    fixed: readonly number[],
    field: PrimeField,
  ): number[] | null {
    const count = this.problem.others.length - fixed.length;
    const ratios = Array.from({ length: count }, () => this.elements.next(field));
    const nodes = monomials.map((m) => monomialValue(m.exponents, ratios, 0, field));
    const groups = new Map<number, number[]>();
    monomials.forEach(({ power }, i) => groups.set(power, [...(groups.get(power) ?? []), i]));
    const longest = Math.max(...[...groups.values()].map((group) => group.length));
    const images = this.imagesAlong(ratios, fixed, longest, field);
    if (
      !images ||
      images.some((image) => image.some((c, power) => c !== 0 && !groups.has(power)))
    ) {
      return null;
    }
    const values = new Array<number>(monomials.length);
    for (const [power, group] of groups) {
      const groupNodes = group.map((i) => nodes[i]);
      if (new Set(groupNodes).size < group.length) return null;
      const sums = images.slice(0, group.length).map((image) => image[power] ?? 0);
      spend(this.budget, group.length ** 2, 'a greatest common divisor');
      solveVandermonde(groupNodes, sums, field).forEach((value, i) => (values[group[i]] = value));
    }
    return values;
  }

  private addVariable(
    image: Image,
    k: number,
    point: readonly number[],
    field: PrimeField,
  ): Image | null {
    const points = [point[k]];
    const samples = [image.values];
    while (points.length <= this.problem.bounds[k]) {
      const other = this.elements.next(field);
      if (points.includes(other)) continue;
      const fixed = [other, ...point.slice(k + 1)];
      const values = this.coefficients(image.monomials, fixed, field);
      if (!values) return null;
      points.push(other);
      samples.push(values);
    }
    const monomials: Monomial[] = [];
    const values: number[] = [];
    image.monomials.forEach(({ power, exponents }, i) => {
      const column = samples.map((sample) => sample[i]);
      interpolate(points, column, field).forEach((value, exponent) => {
        monomials.push({ power, exponents: [...exponents, exponent] });
        values.push(value);
      });
    });
    return { monomials, values };
  }

  private imagesAlong(
    ratios: readonly number[],
    fixed: readonly number[],
    count: number,
    field: PrimeField,
  ): PrimePolynomial[] | null {
    const terms = this.a.powers.length + this.b.powers.length + this.gamma.powers.length;
    spend(
      this.budget,
      Math.ceil((terms * (1 + ratios.length + fixed.length)) / 8),
      'a greatest common divisor',
    );
    const [a, b, gamma] = [this.a, this.b, this.gamma].map(
      (layout) => new Progression(layout, ratios, fixed, field),
    );
    const images: PrimePolynomial[] = [];
    for (let k = 0; k < count; k += 1) {
      const image = this.imageOf(a.next(), b.next(), gamma.next(), field);
      if (!image) return null;
      images.push(image);
    }
    return images;
  }

  private imageOf(
    a: PrimePolynomial,
    b: PrimePolynomial,
    gamma: PrimePolynomial,
    field: PrimeField,
  ): PrimePolynomial | null {
    const work = this.a.powers.length + this.b.powers.length + a.length * b.length;
    spend(this.budget, work, 'a greatest common divisor');
    const { problem } = this;
    const kept = a.length - 1 === degreeIn(problem.a, problem.main);
    if (!kept || b.length - 1 !== degreeIn(problem.b, problem.main) || gamma.length === 0)
      return null;
    const common = gcdModulo(a, b, field);
    if (common.length - 1 !== problem.mainDegree) return null;
    return common.map((c) => field.mul(c, gamma[0]));
  }
}

function withoutZeros({ monomials, values }: Image): Image {
  return {
    monomials: monomials.filter((_, i) => values[i] !== 0),
    values: values.filter((value) => value !== 0),
  };
}

/** Integer coefficients known modulo a growing product of primes, by the Chinese remainder theorem. */
class Lift {
  private modulus = 1n;
  private residues: bigint[];

  constructor(size: number) {
    this.residues = new Array<bigint>(size).fill(0n);
  }

  /** Takes in one more prime; tells whether the symmetric residues stayed the same. */
  add(values: readonly number[], field: PrimeField): boolean {
    const inverse = field.inverse(field.reduce(this.modulus));
    const previous = this.symmetric();
    this.residues = this.residues.map((residue, i) => {
      const gap = field.sub(values[i], field.reduce(residue));
      return residue + this.modulus * BigInt(field.mul(gap, inverse));
    });
    this.modulus *= BigInt(field.prime);
    return this.symmetric().every((value, i) => value === previous[i]);
  }

  symmetric(): bigint[] {
    const half = this.modulus >> 1n;
    return this.residues.map((residue) => (residue > half ? residue - this.modulus : residue));
  }
}

function assemble(
  problem: SparseProblem,
  monomials: readonly Monomial[],
  coefficients: readonly bigint[],
): Polynomial {
  const { main, others, generators } = problem;
  const places = placesIn(others, generators);
  const mainPlace = generators.indexOf(main);
  const rows = monomials.flatMap(({ power, exponents }) => {
    const row = new Array<number>(generators.length).fill(0);
    row[mainPlace] = power;
    exponents.forEach((exponent, k) => (row[places[k]] = exponent));
    return row;
  });
  return polynomialOfUnsortedTerms(generators, Int32Array.from(rows), coefficients);
}

const RESTARTS = 6;
const PRIMES_PER_SKELETON = 400;
const SMALL = 1n << 20n;

/**
 * Finds H for the problem and returns what `accept` makes of it; `accept` proves the candidate by division and
 * answers null for a wrong one. Null where no candidate was accepted: the caller has another method.
 */
export function sparseGcd(
  problem: SparseProblem,
  accept: (candidate: Polynomial) => Polynomial | null,
  budget?: Budget,
): Polynomial | null {
  const elements = new ElementSequence();
  const finder = new ImageFinder(problem, elements, budget);
  for (let restart = 0; restart < RESTARTS; restart += 1) {
    const image = finder.fresh(fieldNumber(restart));
    if (!image) continue;
    const found = liftImage(image, restart, finder, problem, accept);
    if (found) return found;
  }
  return null;
}

function liftImage(
  image: Image,
  firstPrime: number,
  finder: ImageFinder,
  problem: SparseProblem,
  accept: (candidate: Polynomial) => Polynomial | null,
): Polynomial | null {
  const lift = new Lift(image.values.length);
  lift.add(image.values, fieldNumber(firstPrime));
  const attempt = (): Polynomial | null => {
    const coefficients = lift.symmetric();
    return coefficients.includes(0n)
      ? null
      : accept(assemble(problem, image.monomials, coefficients));
  };
  if (lift.symmetric().every((c) => c < SMALL && c > -SMALL)) {
    const found = attempt();
    if (found) return found;
  }
  for (let prime = 1; prime < PRIMES_PER_SKELETON; prime += 1) {
    const field = fieldNumber(firstPrime + prime);
    const values = finder.coefficients(image.monomials, [], field);
    if (values && lift.add(values, field)) return attempt();
  }
  return null;
}
