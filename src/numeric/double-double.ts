import type { Complex } from './complex.ts';

/**
 * A number with about 32 digits, updated in place: an unevaluated sum of two doubles, `high + low`, with |low| at most
 * half a unit in the last place of `high`. Mutable, because root finding works on it in its innermost loop.
 *
 * Source: T. J. Dekker, A floating-point technique for extending the available precision, Numerische Mathematik 18
 * (1971), 224–242; D. E. Knuth, The Art of Computer Programming, vol. 2, 3rd ed., 4.2.2, theorem B.
 */
export class DoubleDouble {
  high = 0;
  low = 0;

  /** Adds a double. */
  addNumber(value: number): void {
    this.addPair(value, 0);
  }

  /** Adds another number. */
  add(other: DoubleDouble): void {
    this.addPair(other.high, other.low);
  }

  /** Becomes a x + b y, with doubles x and y. */
  setCombination(a: DoubleDouble, x: number, b: DoubleDouble, y: number): void {
    this.high = a.high * x;
    this.low = productError(a.high, x, this.high) + a.low * x;
    const product = b.high * y;
    this.addPair(product, productError(b.high, y, product) + b.low * y);
  }

  private addPair(high: number, low: number): void {
    const sum = this.high + high;
    const back = sum - this.high;
    const error = this.high - (sum - back) + (high - back) + (this.low + low);
    this.high = sum + error;
    this.low = error - (this.high - sum);
  }
}

/** A complex number in doubled precision, updated in place. */
export class DoubledComplex {
  re = new DoubleDouble();
  im = new DoubleDouble();
  private nextRe = new DoubleDouble();
  private nextIm = new DoubleDouble();

  /** Multiplies by a complex double. */
  times(z: Complex): void {
    this.nextRe.setCombination(this.re, z.re, this.im, -z.im);
    this.nextIm.setCombination(this.re, z.im, this.im, z.re);
    [this.re, this.nextRe] = [this.nextRe, this.re];
    [this.im, this.nextIm] = [this.nextIm, this.im];
  }

  /** Adds another number. */
  add(other: DoubledComplex): void {
    this.re.add(other.re);
    this.im.add(other.im);
  }

  /** The nearest complex double. */
  rounded(): Complex {
    return { re: this.re.high + this.re.low, im: this.im.high + this.im.low };
  }
}

/** 2^27 + 1 splits a double into two halves of 26 bits. */
const SPLITTER = 134217729;

/** The exact error of a rounded product: a b = product + error. */
function productError(a: number, b: number, product: number): number {
  const aShifted = a * SPLITTER;
  const aHigh = aShifted - (aShifted - a);
  const aLow = a - aHigh;
  const bShifted = b * SPLITTER;
  const bHigh = bShifted - (bShifted - b);
  const bLow = b - bHigh;
  return aLow * bLow - (product - aHigh * bHigh - aLow * bHigh - aHigh * bLow);
}
