/**
 * Exact counts of the roots of a polynomial over ℤ right of, on and left of the imaginary axis.
 *
 * Roots that lie symmetric to the origin are the roots of the common factor of the even and the odd part; the rest
 * is counted by a Sturm chain on the imaginary axis, so that no case needs an ε.
 * Source: F. R. Gantmacher, The Theory of Matrices, vol. 2, Chelsea, 1959, ch. XV, §§ 2–6.
 *
 * Polynomials here are arrays of integers in ascending powers without trailing zeros; [] is zero.
 */
type Integers = readonly bigint[];

export interface RootCounts {
  readonly right: number;
  readonly axis: number;
  readonly left: number;
}

const absolute = (a: bigint): bigint => (a < 0n ? -a : a);

function gcd(a: bigint, b: bigint): bigint {
  while (b !== 0n) [a, b] = [b, a % b];
  return absolute(a);
}

function trimmed(p: Integers): bigint[] {
  let length = p.length;
  while (length > 0 && p[length - 1] === 0n) length -= 1;
  return p.slice(0, length);
}

/** Divided by the positive integer content, so that signs stay. */
function primitive(p: Integers): bigint[] {
  const short = trimmed(p);
  const content = short.reduce(gcd, 0n);
  return content > 1n ? short.map((c) => c / content) : short;
}

/** A positive multiple of the remainder of a by b. */
function remainder(a: Integers, b: Integers): bigint[] {
  let rest = trimmed(a);
  const lead = b[b.length - 1];
  const scale = absolute(lead);
  while (rest.length >= b.length) {
    const factor = (lead < 0n ? -1n : 1n) * rest[rest.length - 1];
    const shift = rest.length - b.length;
    rest = primitive(
      rest.map((c, i) => scale * c - (i >= shift ? factor * b[i - shift] : 0n)).slice(0, -1),
    );
  }
  return rest;
}

function commonFactor(a: Integers, b: Integers): bigint[] {
  let [x, y] = [primitive(a), primitive(b)];
  while (y.length > 0) [x, y] = [y, remainder(x, y)];
  return x;
}

/** a/b for a divisor b with integer content 1; exact over ℚ, returned as a primitive polynomial. */
function quotient(a: Integers, b: Integers): bigint[] {
  let rest = trimmed(a);
  const lead = b[b.length - 1];
  const result: bigint[] = Array<bigint>(Math.max(rest.length - b.length + 1, 0)).fill(0n);
  while (rest.length >= b.length) {
    const shift = rest.length - b.length;
    const factor = rest[rest.length - 1];
    for (let i = 0; i < result.length; i++) result[i] *= lead;
    result[shift] += factor;
    rest = trimmed(rest.map((c, i) => lead * c - (i >= shift ? factor * b[i - shift] : 0n)));
  }
  return primitive(result);
}

function derivative(p: Integers): bigint[] {
  return p.slice(1).map((c, i) => c * BigInt(i + 1));
}

/** The chain f, g, −rem(f, g), …, down to a constant multiple of the common factor. */
function sturmChain(f: Integers, g: Integers): bigint[][] {
  const chain = [primitive(f), primitive(g)];
  for (;;) {
    const [a, b] = chain.slice(-2);
    if (b.length === 0) return chain.slice(0, -1);
    chain.push(remainder(a, b).map((c) => -c));
  }
}

function signChanges(signs: readonly bigint[]): number {
  const nonzero = signs.filter((x) => x !== 0n);
  return nonzero.filter((x, i) => i > 0 && x < 0n !== nonzero[i - 1] < 0n).length;
}

const atPlusInfinity = (p: Integers): bigint => p[p.length - 1];
const atMinusInfinity = (p: Integers): bigint =>
  p.length % 2 === 0 ? -p[p.length - 1] : p[p.length - 1];

/** Number of distinct negative roots of a polynomial that does not vanish at 0. */
function countNegative(p: Integers): number {
  const chain = sturmChain(p, derivative(p));
  return signChanges(chain.map(atMinusInfinity)) - signChanges(chain.map((q) => q[0]));
}

/** Negative roots counted with multiplicity: those of p, of gcd(p, p′), of the next such gcd, … */
function countNegativeWithMultiplicity(p: Integers): number {
  let count = 0;
  for (let rest = primitive(p); rest.length > 1; rest = commonFactor(rest, derivative(rest))) {
    count += countNegative(rest);
  }
  return count;
}

const everySecond = (p: Integers, from: number): bigint[] =>
  trimmed(p.filter((_, i) => i % 2 === from));

/** Counts of a polynomial in s² whose roots lie symmetric to the origin, none of them 0; `g` in x = s². */
function countSymmetric(g: Integers): RootCounts {
  const degree = g.length - 1;
  const negative = countNegativeWithMultiplicity(g);
  return { right: degree - negative, axis: 2 * negative, left: degree - negative };
}

/** Real and imaginary part of p(jω)/j^n, as polynomials in ω: a₀ωⁿ − a₂ωⁿ⁻² + …, a₁ωⁿ⁻¹ − a₃ωⁿ⁻³ + … */
function partsOnAxis(p: Integers): { readonly real: bigint[]; readonly imaginary: bigint[] } {
  const n = p.length - 1;
  const part = (parity: number): bigint[] =>
    trimmed(
      p.map((c, power) => {
        const k = n - power;
        if (k % 2 !== parity) return 0n;
        return Math.floor(k / 2) % 2 === 0 ? c : -c;
      }),
    );
  return { real: part(0), imaginary: part(1) };
}

/** Counts of a polynomial without roots symmetric to the origin. */
function countAsymmetric(p: Integers): RootCounts {
  const n = p.length - 1;
  const { real, imaginary } = partsOnAxis(p);
  const chain = sturmChain(real, imaginary);
  const index = signChanges(chain.map(atMinusInfinity)) - signChanges(chain.map(atPlusInfinity));
  const right = (n - index) / 2;
  return { right, axis: 0, left: n - right };
}

/**
 * Counts the roots of a nonzero polynomial right of, on, and left of the imaginary axis, with multiplicity, exactly.
 *
 * `ascending`: integer coefficients, constant term first. Cost: cubic in the degree, times the growth of integers.
 */
export function countRoots(ascending: Integers): RootCounts {
  const p = primitive(ascending);
  const atOrigin = Math.max(
    p.findIndex((c) => c !== 0n),
    0,
  );
  const rest = p.slice(atOrigin);
  const symmetric = commonFactor(everySecond(rest, 0), everySecond(rest, 1));
  const spread = symmetric.flatMap((c, i) => (i === 0 ? [c] : [0n, c]));
  const counts = [countSymmetric(symmetric), countAsymmetric(quotient(rest, spread))];
  const total = (side: keyof RootCounts): number => counts[0][side] + counts[1][side];
  return { right: total('right'), axis: total('axis') + atOrigin, left: total('left') };
}
