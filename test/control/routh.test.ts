import { describe, expect, test } from 'vitest';
import {
  addRatios,
  equalRatios,
  mulRatios,
  ratioKey,
  symbol,
  type Ratio,
} from '../../src/algebra/index.ts';
import { isRefusal } from '../../src/base/index.ts';
import {
  allOf,
  conditionKey,
  countRoots,
  readable,
  routhArray,
  stabilityConditions,
  type Condition,
  type RouthArray,
} from '../../src/control/index.ts';
import { polynomialRoots, randomInteger, seededRandom } from '../../src/numeric/index.ts';
import {
  coefficientList,
  found,
  numberAt,
  polynomial,
  positive,
  read,
  signs,
  unknown,
} from './formulas.ts';
import { published } from './published-cases.ts';

const asEpsilon = (text: string): string => text.replaceAll('eps', 'ε');

function arrayOf(coefficients: readonly (number | string)[]): RouthArray {
  return found(routhArray(polynomial(coefficients), unknown));
}

const SPECIAL: Readonly<Record<string, (a: RouthArray) => boolean>> = {
  none: (a) => a.rows.every((row) => row.special === null),
  zero_first: (a) => a.rows.some((row) => row.special === 'zero first element'),
  zero_row: (a) => a.rows.some((row) => row.special === 'zero row'),
  root_at_origin: (a) => a.notes.some((note) => note.includes('a root at the origin')),
};

function sameUpToPositiveFactor(a: readonly Ratio[], b: readonly Ratio[]): boolean {
  return (
    a.length === b.length &&
    a.every((x, i) => equalRatios(mulRatios(x, b[0]), mulRatios(b[i], a[0])))
  );
}

describe('published Routh arrays', () => {
  test.each(published((c) => c.kind === 'routh'))('%s', (_, { given, expect: wanted }) => {
    const array = arrayOf(given.poly);
    const {
      rhp,
      jw,
      lhp,
      special,
      first_column: column,
      auxiliary,
    } = wanted as unknown as {
      rhp: number;
      jw: number;
      lhp: number;
      special: string;
      first_column?: string[];
      auxiliary?: number[];
    };
    expect(array.counts).toEqual({ right: rhp, axis: jw, left: lhp });
    expect(SPECIAL[special](array)).toBe(true);
    const entries = array.rows.map((row) => row.entries[0]);
    if (column)
      expect(entries.map(ratioKey)).toEqual(column.map((t) => ratioKey(read(asEpsilon(t)))));
    if (auxiliary) {
      expect(
        sameUpToPositiveFactor(
          coefficientList(array.auxiliaries[0]),
          auxiliary.map((c) => read(`0+${c}`)),
        ),
      ).toBe(true);
    }
    expect(array.conditions.length === 0).toBe(rhp + jw === 0);
  });
});

/** Whether a conjunction of comparisons with zero holds at numbers for its symbols. */
function holdsAt(
  conditions: readonly Condition[],
  values: Readonly<Record<string, number>>,
): boolean {
  return conditions.every((c) => {
    if (c.kind === 'truth') return c.value;
    if (c.kind !== 'compare') throw new Error(c.kind);
    const difference = numberAt(c.left, values) - numberAt(c.right, values);
    return c.operator === '>'
      ? difference > 0
      : c.operator === '<'
        ? difference < 0
        : difference !== 0;
  });
}

describe('published stability conditions', () => {
  test.each(published((c) => c.kind === 'routh_condition' || c.kind === 'region'))(
    '%s',
    (_, { given, expect: wanted }) => {
      const { poly, sample } = given as unknown as {
        poly: string[];
        sample: Record<string, [number, number]>;
      };
      const required = (wanted.all_positive as unknown as string[]).map(read);
      const known = Object.values(sample).every(([low]) => low > 0);
      const conditions = stabilityConditions(polynomial(poly), known ? positive : unknown);
      const random = seededRandom(17);
      for (let i = 0; i < 300; i++) {
        const values = Object.fromEntries(
          Object.entries(sample).map(([name, [low, high]]) => [
            name,
            low + (high - low) * random(),
          ]),
        );
        expect(holdsAt(conditions, values)).toBe(required.every((r) => numberAt(r, values) > 0));
      }
    },
  );
});

const text = (c: Condition): string => conditionKey(c);
const condition = (left: string, operator: '>' | '<', right: string): Condition => ({
  kind: 'compare',
  operator,
  left: read(left),
  right: read(right),
});

describe('conditions as an engineer reads them', () => {
  const preferred = ['Kp', 'Kd', 'Ki'].map(symbol);

  test('a rigid body under three-term control asks Kp > J Ki/Kd', () => {
    const array = found(routhArray(polynomial(['J', 'Kd', 'Kp', 'Ki']), positive));
    expect(array.conditions).toHaveLength(1);
    const shown = readable(array.conditions[0], positive, preferred);
    expect(text(shown)).toBe(text(condition('Kp', '>', 'J*Ki/Kd')));
  });

  test('a cubic of symbols asks a1 a2 > a0 a3', () => {
    const [only, ...others] = stabilityConditions(polynomial(['a0', 'a1', 'a2', 'a3']), positive);
    expect(others).toEqual([]);
    expect(text(readable(only, positive, []))).toBe(text(condition('a1*a2', '>', 'a0*a3')));
  });

  test('conditions that fix a sign simplify the others', () => {
    const plant = signs({ J: 'positive' });
    const all = allOf(stabilityConditions(polynomial(['J', 'Kd', 'Kp', 'Ki']), plant));
    const shown = readable(all, plant, preferred);
    expect(shown.kind === 'all' && shown.of.map(text).sort()).toEqual(
      [condition('Kd', '>', '0'), condition('Ki', '>', '0'), condition('Kp', '>', 'J*Ki/Kd')]
        .map(text)
        .sort(),
    );
  });

  test('a polynomial of one gain is solved for it', () => {
    const shown = stabilityConditions(polynomial(['1', 'K - 4']), unknown);
    expect(shown.map((c) => text(readable(c, unknown, [])))).toEqual([
      text(condition('K', '>', '4')),
    ]);
  });

  test('a missing coefficient leaves no stable case', () => {
    expect(stabilityConditions(polynomial(['J', 0, 'Kp']), positive)).toEqual([
      { kind: 'truth', value: false },
    ]);
  });

  test('known signs leave nothing to ask of a second-order polynomial', () => {
    expect(stabilityConditions(polynomial(['J', 'b', 'Kp']), positive)).toEqual([]);
  });
});

/** Random integer polynomials with many zero rows, zero first elements and imaginary pairs. */
function randomPolynomial(random: () => number): number[] {
  const factors = [
    () => [1, randomInteger(random, -4, 6)],
    () => [1, 0, randomInteger(random, -3, 5)],
    () => [1, randomInteger(random, -2, 4), randomInteger(random, -2, 6)],
    () => [1, ...Array.from({ length: 3 }, () => randomInteger(random, -2, 5))],
    () => [
      randomInteger(random, 1, 3),
      0,
      randomInteger(random, -2, 2),
      0,
      randomInteger(random, 1, 4),
    ],
  ];
  let product = [randomInteger(random, 0, 4) === 0 ? -2 : 1];
  const count = randomInteger(random, 1, 3);
  for (let i = 0; i < count; i++) {
    const factor = factors[randomInteger(random, 0, factors.length - 1)]();
    const next = Array<number>(product.length + factor.length - 1).fill(0);
    product.forEach((a, k) => factor.forEach((b, m) => (next[k + m] += a * b)));
    product = next;
  }
  return product;
}

const AXIS = 1e-4;

describe('Routh against roots', () => {
  const random = seededRandom(20240);
  const samples = Array.from({ length: 5000 }, () => randomPolynomial(random));

  test('exact counts agree with numeric roots on 5 000 polynomials, repeated imaginary pairs included', () => {
    for (const descending of samples) {
      const roots = polynomialRoots(descending);
      const near = roots.filter((r) => Math.abs(r.re) <= AXIS).length;
      const counts = countRoots(descending.map(BigInt).reverse());
      const numeric = {
        right: roots.filter((r) => r.re > AXIS).length,
        axis: near,
        left: roots.filter((r) => r.re < -AXIS).length,
      };
      expect(counts, descending.join(' ')).toEqual(numeric);
    }
  });

  test('the array says stable exactly where all roots lie to the left', () => {
    const seen = { row: 0, first: 0 };
    for (const descending of samples.slice(0, 1200)) {
      const array = arrayOf(descending.map((c) => `0+${c}`));
      const { right, axis } = countRoots(descending.map(BigInt).reverse());
      expect(array.conditions.length === 0, descending.join(' ')).toBe(right + axis === 0);
      if (SPECIAL.zero_row(array)) seen.row += 1;
      if (SPECIAL.zero_first(array)) seen.first += 1;
    }
    expect(seen.row).toBeGreaterThan(100);
    expect(seen.first).toBeGreaterThan(50);
  });

  test('symbolic conditions agree with roots at random values', () => {
    for (let degree = 1; degree <= 6; degree++) {
      const names = Array.from({ length: degree + 1 }, (_, k) => `a${k}`);
      const conditions = stabilityConditions(polynomial(names), unknown);
      for (let i = 0; i < 60; i++) {
        const sign = i % 3 === 0 ? -1 : 1;
        const values = names.map(
          (_, k) => sign * (k === 0 ? 1 : randomInteger(random, 1, 30) / 3 - (i % 5 === 0 ? 1 : 0)),
        );
        const stable = polynomialRoots(values).every((r) => r.re < 0);
        const at = Object.fromEntries(names.map((name, k) => [name, values[k]]));
        expect(holdsAt(conditions, at), values.join(' ')).toBe(stable);
      }
    }
  });
});

describe('degenerate polynomials', () => {
  test('the zero polynomial is refused', () => {
    expect(routhArray(polynomial([0]), unknown)).toMatchObject({
      code: 'zero-polynomial',
      reason: 'the polynomial is zero: every s is a root',
    });
  });

  test('a constant has one row and no roots', () => {
    const array = arrayOf([3]);
    expect(array.rows).toHaveLength(1);
    expect(array.counts).toEqual({ right: 0, axis: 0, left: 0 });
    expect(array.conditions).toEqual([]);
  });

  test('a first-order polynomial has two rows', () => {
    expect(arrayOf([2, 1]).rows.map((row) => row.power)).toEqual([1, 0]);
  });

  test('dead time is refused with the way out', () => {
    const p = addRatios(read('s'), read('exp(-s*Td)')).num;
    const answer = routhArray(p, unknown);
    expect(isRefusal(answer) && answer.reason).toContain('rational_delay(Td, n)');
  });

  test('repeated zero rows each give an auxiliary polynomial', () => {
    // (s² + 1)² (s + 1): the double pair makes two rows vanish.
    const array = arrayOf([1, 1, 2, 2, 1, 1]);
    expect(array.auxiliaries).toHaveLength(2);
    expect(array.notes.filter((note) => note.startsWith('zero row'))).toHaveLength(2);
    expect(array.counts).toEqual({ right: 0, axis: 4, left: 1 });
  });

  test('a symbol called ε keeps its meaning beside the ε of the array', () => {
    const array = arrayOf([1, 'ε', 3, '3*ε', 5]);
    expect(array.rows[1].entries[0]).toEqual(read('ε'));
    expect(array.rows[2].special).toBe('zero first element');
    expect(array.rows[2].entries[0]).toEqual(read('ε_0'));
  });

  test.each(['1e9', '1e-9'])('scaling s by %s changes no count', (scale) => {
    const scaled = [1, 2, 3, 4, 5].map((c, k) => (k === 0 ? c : `${c}*${scale}**${k}`));
    expect(arrayOf(scaled).counts).toEqual({ right: 2, axis: 0, left: 2 });
  });
});
