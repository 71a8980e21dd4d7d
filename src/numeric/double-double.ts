/**
 * Sums and products of doubles with about 32 digits: an unevaluated sum of two doubles, `high + low`, with
 * |low| ≤ half a unit in the last place of `high`. Kept in the static fields of this class instead of in
 * objects, because root finding calls it in its innermost loop.
 *
 * Source: T. J. Dekker, A floating-point technique for extending the available precision, Numerische Mathematik 18
 * (1971), 224–242; D. E. Knuth, The Art of Computer Programming, vol. 2, 3rd ed., 4.2.2, theorem B.
 */
export class DoubleDouble {
  high: number;
  low: number;

  constructor(high = 0, low = 0) {
    this.high = high;
    this.low = low;
  }

  /** Becomes `value`. */
  set(value: number): void {
    this.high = value;
    this.low = 0;
  }

  /** Becomes `other`. */
  copy(other: DoubleDouble): void {
    this.high = other.high;
    this.low = other.low;
  }

  /** Adds a double. */
  addNumber(value: number): void {
    this.addPair(value, 0);
  }

  /** Adds another number. */
  add(other: DoubleDouble): void {
    this.addPair(other.high, other.low);
  }

  /** Adds `other` times a double. */
  addProduct(other: DoubleDouble, factor: number): void {
    const product = other.high * factor;
    this.addPair(product, productError(other.high, factor, product) + other.low * factor);
  }

  private addPair(high: number, low: number): void {
    const sum = this.high + high;
    const back = sum - this.high;
    const error = this.high - (sum - back) + (high - back) + (this.low + low);
    this.high = sum + error;
    this.low = error - (this.high - sum);
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
