import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  addRational,
  compareRational,
  divRational,
  mulRational,
  numberToRational,
  parseRational,
  powRational,
  rational,
  rationalToNumber,
  rationalToText,
  subRational,
} from '../../src/algebra/index.ts';
import { bitLength, integerGcd, integerSquareRoot } from '../../src/algebra/integer.ts';
import { rationals, RUNS } from './arbitraries.ts';

describe('rational numbers', () => {
  it('are kept in lowest terms with a positive denominator', () => {
    expect(rational(6, -8)).toEqual({ n: -3n, d: 4n });
    expect(rational(0, -5)).toEqual({ n: 0n, d: 1n });
  });

  it('read decimals exactly', () => {
    expect(rationalToText(parseRational('1.2e-3'))).toBe('3/2500');
    expect(rationalToText(parseRational('-4e-12'))).toBe('-1/250000000000');
    expect(rationalToText(parseRational('480'))).toBe('480');
    expect(rationalToText(parseRational('.5'))).toBe('1/2');
    expect(rationalToText(parseRational('2.E3'))).toBe('2000');
  });

  it('refuse what is not a decimal', () => {
    for (const text of ['', '.', '1e', 'e5', '1.2.3', '0x10', '1e99999', 'NaN']) {
      expect(() => parseRational(text)).toThrow('is not a decimal number');
    }
  });

  it('form a field with an order', () => {
    fc.assert(
      fc.property(rationals(), rationals(), rationals(), (a, b, c) => {
        expect(mulRational(a, addRational(b, c))).toEqual(
          addRational(mulRational(a, b), mulRational(a, c)),
        );
        expect(addRational(subRational(a, b), b)).toEqual(a);
        if (b.n !== 0n) expect(mulRational(divRational(a, b), b)).toEqual(a);
        if (a.n !== 0n) expect(mulRational(powRational(a, -3), powRational(a, 3)).n).toBe(1n);
        expect(compareRational(a, b)).toBe(Math.sign(rationalToNumber(subRational(a, b))));
      }),
      RUNS,
    );
  });
});

describe('the nearest double', () => {
  it('agrees with the reading of the same decimal by the language itself', () => {
    const decimals = fc
      .tuple(
        fc.bigInt({ min: -(10n ** 25n), max: 10n ** 25n }),
        fc.integer({ min: -360, max: 320 }),
      )
      .map(([digits, exponent]) => `${digits}e${exponent}`);
    fc.assert(
      fc.property(decimals, (text) => {
        expect(rationalToNumber(parseRational(text)) + 0).toBe(Number(text) + 0);
      }),
      { ...RUNS, numRuns: 600 },
    );
  });

  it('is exact on every double, subnormal ones included', () => {
    fc.assert(
      fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), (x) => {
        expect(rationalToNumber(numberToRational(x)) + 0).toBe(x + 0);
      }),
      { ...RUNS, numRuns: 600 },
    );
    for (let k = -1074; k <= 1023; k += 1) {
      expect(
        rationalToNumber(k < 0 ? rational(1n, 1n << BigInt(-k)) : rational(1n << BigInt(k))),
      ).toBe(2 ** k);
    }
  });

  it('rounds ties to even and overflows to infinity', () => {
    expect(rationalToNumber(rational(2n ** 53n + 1n))).toBe(2 ** 53);
    expect(rationalToNumber(rational(2n ** 53n + 3n))).toBe(2 ** 53 + 4);
    expect(rationalToNumber(rational(-(2n ** 1024n)))).toBe(-Infinity);
    expect(rationalToNumber(rational(1n, 2n ** 1075n))).toBe(0);
    expect(rationalToNumber(rational(3n, 2n ** 1076n))).toBe(2 ** -1074);
  });
});

describe('integers', () => {
  it('have their gcd, length and square root', () => {
    fc.assert(
      fc.property(
        fc.bigInt({ min: 0n, max: 2n ** 200n }),
        fc.bigInt({ min: 1n, max: 2n ** 90n }),
        (a, b) => {
          const common = integerGcd(a * b, b * 6n);
          expect((a * b) % common).toBe(0n);
          expect(common % b).toBe(0n);
          expect(bitLength(a)).toBe(a === 0n ? 0 : a.toString(2).length);
          const root = integerSquareRoot(a);
          expect(root * root <= a && (root + 1n) ** 2n > a).toBe(true);
        },
      ),
      RUNS,
    );
  });
});
