import { describe, expect, test } from 'vitest';
import {
  laplace,
  ratioFromRational,
  rational,
  ResiduePoint,
  symbol,
  type Ratio,
} from '../../src/algebra/index.ts';
import { InvariantError } from '../../src/base/index.ts';
import {
  certifyAtOrigin,
  certifyCharacteristic,
  certifyFinalValue,
  certifyMatch,
  certifyOpening,
  certifyRouth,
  certifySolution,
  certifySum,
} from '../../src/control/certificate.ts';
import { routhArray, type SignalTerm } from '../../src/control/index.ts';
import { descendingInS } from '../../src/control/s-polynomial.ts';
import { equation, found, polynomialOf, read, signal, unknown } from './formulas.ts';

const rows = [equation({ y: 's + a', u: '0-1/s' }), equation({ u: 1, y: 'K', r: '0-K' })];
const opened = [equation({ y: 's + a', u: '0-1/s' }), equation({ u: 1, v: 'K' })];
const multipliers = [polynomialOf('s'), polynomialOf('1')];

function term(transform: string): SignalTerm {
  return signal([{ transform: read(transform) }]).terms[0];
}

/** Each certificate with the true result and with one that is wrong by a sign, a factor or a term. */
const CERTIFICATES: readonly (readonly [string, (text: string) => void, string, string])[] = [
  [
    'a characteristic polynomial',
    (text) => certifyCharacteristic(rows, ['y', 'u'], polynomialOf(text), multipliers),
    's^2 + a*s + K',
    's^2 + a*s - K',
  ],
  [
    'a loop gain',
    (text) => certifyOpening(rows, opened, ['y', 'u'], read(text)),
    'K/(s*(s + a))',
    '0-K/(s*(s + a))',
  ],
  [
    'partial fractions',
    (text) => certifySum(read('1/(s*(s + a))'), [read('1/(a*s)'), read(text)]),
    '0-1/(a*(s + a))',
    '1/(a*(s + a))',
  ],
  [
    'a final value',
    (text) =>
      certifyFinalValue([term('1/(s*(s + a))'), term('1/s^2'), term('0-1/s^2')], read(text)),
    '1/a',
    '1',
  ],
  ['a value at the origin', (text) => certifyAtOrigin(read('K/(s + a)'), read(text)), 'K/a', 'a/K'],
  [
    'a gain that was matched',
    (text) =>
      certifyMatch(
        polynomialOf('J*s^2 + b*s + K'),
        polynomialOf('s^2 + 2*z*w*s + w^2'),
        new Map([
          [symbol('K'), read('J*w^2')],
          [symbol('b'), read(text)],
        ]),
      ),
    '2*J*z*w',
    '2*z*w',
  ],
  [
    'a solution with a square root',
    (text) => certifySolution(polynomialOf('m*w^2 - k'), symbol('w'), read(text)),
    'sqrt(k/m)',
    'sqrt(k)',
  ],
];

describe.each(CERTIFICATES)('%s', (_, certify, right, wrong) => {
  test('passes where it is right', () => {
    expect(() => certify(right)).not.toThrow();
  });

  test('is taken for our bug where it is wrong', () => {
    expect(() => certify(wrong)).toThrow(InvariantError);
  });
});

test('an entry of a Routh array that is wrong is taken for our bug', () => {
  const p = polynomialOf('s^4 + a*s^3 + b*s^2 + c*s + d');
  const { rows: regular } = found(routhArray(p, unknown));
  const wrong = regular.map((row) => (row.power === 1 ? { ...row, entries: [read('c')] } : row));
  expect(() => certifyRouth(descendingInS(p), wrong)).toThrow(InvariantError);
});

describe('a random point', () => {
  const values = (r: Ratio): readonly (number | null)[] =>
    Array.from({ length: 24 }, (_, seed) => new ResiduePoint(seed).ratio(r));

  test.each(['a', 'a/b', '2', '3*a + sqrt(b)', '0-1'])('keeps the relation of sqrt(%s)', (text) => {
    let seen = 0;
    for (let seed = 0; seed < 24; seed++) {
      const point = new ResiduePoint(seed);
      const [root, square] = [point.ratio(read(`sqrt(${text})`)), point.ratio(read(text))];
      if (root === null) continue;
      expect(point.field.mul(root, root)).toBe(square);
      seen += 1;
    }
    expect(seen).toBeGreaterThan(3);
  });

  test('has no value at a pole, nor for the root of what is no square there', () => {
    expect(new ResiduePoint(1, 0).ratio(read('1/s'))).toBeNull();
    expect(values(read('sqrt(a)'))).toContain(null);
    expect(values(read('sqrt(a)')).some((value) => value !== null)).toBe(true);
  });

  test('differs from another of its seed in s alone', () => {
    const [one, other] = [3, 4].map((s) => new ResiduePoint(1, s));
    expect(one.generator(symbol('a'))).toBe(other.generator(symbol('a')));
    expect([one, other].map((point) => point.generator(laplace))).toEqual([3, 4]);
  });

  test('takes fractions of integers modulo its prime', () => {
    const point = new ResiduePoint(5);
    const half = point.ratio(ratioFromRational(rational(1, 2))) as number;
    expect(point.field.mul(half, 2)).toBe(1);
  });
});
