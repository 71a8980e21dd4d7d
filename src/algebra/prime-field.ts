import { invariant } from '../base/index.ts';

/**
 * Arithmetic modulo a prime below 2^26, in doubles: a product is below 2^52 and therefore exact, and the rounded
 * quotient is off by at most one.
 */
export class PrimeField {
  private readonly inverseOfPrime: number;
  private readonly bigPrime: bigint;

  constructor(readonly prime: number) {
    this.inverseOfPrime = 1 / prime;
    this.bigPrime = BigInt(prime);
  }

  add(a: number, b: number): number {
    const sum = a + b;
    return sum >= this.prime ? sum - this.prime : sum;
  }

  sub(a: number, b: number): number {
    const difference = a - b;
    return difference < 0 ? difference + this.prime : difference;
  }

  mul(a: number, b: number): number {
    const product = a * b;
    const rest = product - Math.floor(product * this.inverseOfPrime) * this.prime;
    if (rest < 0) return rest + this.prime;
    return rest >= this.prime ? rest - this.prime : rest;
  }

  pow(base: number, exponent: number): number {
    let result = 1;
    let square = base;
    for (let rest = exponent; rest > 0; rest = Math.floor(rest / 2)) {
      if (rest % 2 === 1) result = this.mul(result, square);
      square = this.mul(square, square);
    }
    return result;
  }

  /** The inverse of a ≠ 0, by the extended Euclidean algorithm. */
  inverse(a: number): number {
    invariant(a !== 0, 'the inverse of zero modulo a prime');
    let [older, newer] = [this.prime, a];
    let [olderFactor, newerFactor] = [0, 1];
    while (newer !== 1) {
      const quotient = Math.floor(older / newer);
      [older, newer] = [newer, older - quotient * newer];
      [olderFactor, newerFactor] = [newerFactor, olderFactor - quotient * newerFactor];
    }
    return newerFactor < 0 ? newerFactor + this.prime : newerFactor;
  }

  /** The residue of an integer. */
  reduce(a: bigint): number {
    const rest = Number(a % this.bigPrime);
    return rest < 0 ? rest + this.prime : rest;
  }

  /** The powers 1, a, …, a^highest. */
  powers(a: number, highest: number): Float64Array {
    const powers = new Float64Array(highest + 1);
    powers[0] = 1;
    for (let k = 1; k <= highest; k += 1) powers[k] = this.mul(powers[k - 1], a);
    return powers;
  }
}

function isPrime(n: number): boolean {
  for (let divisor = 3; divisor * divisor <= n; divisor += 2) {
    if (n % divisor === 0) return false;
  }
  return n % 2 === 1;
}

const fields: PrimeField[] = [];

/** The field of the index-th largest prime below 2^26; cached. */
export function fieldNumber(index: number): PrimeField {
  while (fields.length <= index) {
    let candidate = fields.length > 0 ? fields[fields.length - 1].prime - 2 : 2 ** 26 - 1;
    while (!isPrime(candidate)) candidate -= 2;
    fields.push(new PrimeField(candidate));
  }
  return fields[index];
}

/** A fixed sequence of field elements (a linear congruential generator modulo 2^32): the same in every run. */
export class ElementSequence {
  private state: number;

  constructor(seed = 1) {
    this.state = seed >>> 0;
  }

  /** The next element other than 0. */
  next(field: PrimeField): number {
    this.state = (Math.imul(this.state, 1664525) + 1013904223) >>> 0;
    return 1 + Math.floor((this.state / 2 ** 32) * (field.prime - 1));
  }
}
