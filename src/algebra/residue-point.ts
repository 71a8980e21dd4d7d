import { laplace } from './generator.ts';
import { termValues } from './point-image.ts';
import { ElementSequence, fieldNumber, type PrimeField } from './prime-field.ts';
import type { Generator, Polynomial, Ratio } from './ring.ts';

/** The index-th largest prime below 2^26 that is 9 modulo 16: then −1 and 2 are squares, as j and sqrt(2) need. */
function fieldWithRoots(index: number): PrimeField {
  let left = index;
  for (let k = 0; ; k += 1) {
    const field = fieldNumber(k);
    if (field.prime % 16 === 9 && left-- === 0) return field;
  }
}

/**
 * A square root of a ≠ 0 modulo a prime p that is 9 modulo 16, or null where a is no square: a^((p+7)/16) times the
 * eighth root of unity that makes it fit, if one does (the method of A. Tonelli, where p − 1 is 8 times an odd number).
 * Source: H. Cohen, A Course in Computational Algebraic Number Theory, Springer, 1993, section 1.5.1.
 */
function rootModulo(a: number, field: PrimeField): number | null {
  const { prime } = field;
  let root = field.pow(a, (prime + 7) / 16);
  const turn = eighthRootOfUnity(field);
  for (let k = 0; k < 8; k += 1) {
    if (field.mul(root, root) === a) return root;
    root = field.mul(root, turn);
  }
  return null;
}

/** A primitive eighth root of unity modulo a prime that is 9 modulo 16, from the first number that is no square. */
function eighthRootOfUnity(field: PrimeField): number {
  const { prime } = field;
  for (let k = 2; ; k += 1) {
    if (field.pow(k, (prime - 1) / 2) === prime - 1) return field.pow(k, (prime - 1) / 8);
  }
}

/** A residue other than 0 that a text and a seed fix (the hash of G. Fowler, L. C. Noll, K.-P. Vo, 32 bits). */
function residueOf(text: string, seed: number, field: PrimeField): number {
  let hash = (0x811c9dc5 ^ Math.imul(seed, 0x9e3779b1)) >>> 0;
  for (let i = 0; i < text.length; i += 1) {
    hash = Math.imul(hash ^ text.charCodeAt(i), 0x01000193) >>> 0;
  }
  return new ElementSequence(hash).next(field);
}

/**
 * A random point at which exact results are compared: a residue modulo a prime for every generator, one that fits the
 * relation of j and of square roots. Two different polynomials agree at it with a chance of about degree/2^26.
 *
 * Seed and name fix a value, so that two points of one seed differ only in `s`. A value is null where there is none: at
 * a pole, or where a square root would have to be taken of what is no square there.
 */
export class ResiduePoint {
  readonly field: PrimeField;
  private readonly values = new Map<Generator, number | null>();

  constructor(
    private readonly seed: number,
    s?: number,
  ) {
    this.field = fieldWithRoots(seed % 8);
    if (s !== undefined) this.assign(laplace, s);
  }

  /** Gives a generator a value, before any other is asked for that depends on it. */
  assign(g: Generator, value: number | null): void {
    this.values.set(g, value);
  }

  /** The value of a generator. */
  generator(g: Generator): number | null {
    const known = this.values.get(g);
    if (known !== undefined) return known;
    const value = g.square ? this.rootOf(g.square) : residueOf(g.key, this.seed, this.field);
    this.values.set(g, value);
    return value;
  }

  private rootOf(square: Ratio): number | null {
    const value = this.ratio(square);
    if (value === null || value === 0) return value;
    return rootModulo(value, this.field);
  }

  /** The value of a polynomial. */
  polynomial(p: Polynomial): number | null {
    const point = new Map<Generator, number>();
    for (const g of p.generators) {
      const value = this.generator(g);
      if (value === null) return null;
      point.set(g, value);
    }
    return termValues(p, point, this.field).reduce((sum, term) => this.field.add(sum, term), 0);
  }

  /** The value of a quotient of polynomials. */
  ratio({ num, den }: { readonly num: Polynomial; readonly den: Polynomial }): number | null {
    const [top, bottom] = [this.polynomial(num), this.polynomial(den)];
    if (top === null || bottom === null || bottom === 0) return null;
    return this.field.mul(top, this.field.inverse(bottom));
  }
}
