import { describe, expect, test } from 'vitest';
import { symbol, type Sign, type SignOf } from '../../src/algebra/index.ts';
import {
  allOf,
  anyOf,
  compare,
  compileConditions,
  conditionKey,
  expandStable,
  negation,
  readable,
  reduceCondition,
  stable,
  undecided,
  type Comparison,
  type Condition,
} from '../../src/control/index.ts';
import { randomInteger, seededRandom } from '../../src/numeric/index.ts';
import { polynomialOf, positive, read, signs, unknown } from './formulas.ts';

const is = (left: string, operator: Comparison, right: string): Condition =>
  compare(read(left), operator, read(right));
const key = conditionKey;
const [yes, no]: readonly Condition[] = [
  { kind: 'truth', value: true },
  { kind: 'truth', value: false },
];

describe('conditions joined', () => {
  const [a, b] = [is('a', '>', '0'), is('b', '>', '0')];

  test('are flattened, without duplicates and without what is true anyway', () => {
    expect(allOf([a, allOf([b, a]), yes])).toEqual({ kind: 'all', of: [a, b] });
    expect(allOf([a, yes])).toBe(a);
    expect(allOf([])).toEqual(yes);
  });

  test('are false where one is false, or true where one is true', () => {
    expect(allOf([a, no])).toEqual(no);
    expect(anyOf([a, yes])).toEqual(yes);
    expect(anyOf([])).toEqual(no);
  });

  test('are negated inside', () => {
    expect(key(negation(allOf([a, b])))).toBe(key(anyOf([is('a', '<=', '0'), is('b', '<=', '0')])));
    expect(
      negation(negation(stable([{ signals: [], polynomial: polynomialOf('s + a') }]))),
    ).toEqual(stable([{ signals: [], polynomial: polynomialOf('s + a') }]));
    expect(negation(undecided('why'))).toEqual(undecided('why'));
  });
});

describe('reduced conditions', () => {
  test.each([
    ['J*K', '>', '0', 'K > 0'],
    ['0-J*K', '>', '0', '-K > 0'],
    ['K^2*(K - 1)', '>', '0', 'all'],
    ['Tw/Kp', '<', '1', 'Kp - Tw > 0'],
  ] as const)('%s %s %s becomes %s', (left, operator, right, wanted) => {
    const reduced = reduceCondition(
      is(left, operator, right),
      signs({ J: 'positive', Kp: 'positive', Tw: 'positive' }),
    );
    if (wanted === 'all') {
      expect(key(reduced)).toBe(key(allOf([is('K - 1', '>', '0'), is('K', '!=', '0')])));
    } else {
      const [polynomial] = wanted.split(' > ');
      expect(key(reduced)).toBe(key(is(polynomial.replace(/^-/, '0-'), '>', '0')));
    }
  });

  test('are decided where the signs decide them', () => {
    expect(reduceCondition(is('a + b^2', '>', '0'), positive)).toEqual(yes);
    expect(reduceCondition(is('a*b', '<', '0'), positive)).toEqual(no);
    expect(reduceCondition(is('a', '=', '0'), positive)).toEqual(no);
  });

  test('keep their meaning at random values that fit the signs', () => {
    const random = seededRandom(44);
    const names = ['a', 'b', 'c', 'd'];
    const kinds: readonly Sign[] = ['positive', 'negative', 'nonnegative', 'unknown'];
    const operators: readonly Comparison[] = ['>', '>=', '<', '<=', '=', '!='];
    const atom = (): string => {
      const forms = ['a', 'b', 'c', 'd', '(a - b)', '(a + c)', '(b*c - d)', '(d - 1)'];
      return forms[randomInteger(random, 0, forms.length - 1)];
    };
    const product = (): string =>
      Array.from({ length: randomInteger(random, 1, 3) }, () =>
        random() < 0.2 ? `${atom()}^2` : atom(),
      ).join('*');
    for (let round = 0; round < 150; round++) {
      const known = Object.fromEntries(names.map((n) => [n, kinds[randomInteger(random, 0, 3)]]));
      const signOf: SignOf = signs(known);
      const parts = Array.from({ length: randomInteger(random, 1, 3) }, () =>
        is(product(), operators[randomInteger(random, 0, 5)], random() < 0.5 ? '0' : product()),
      );
      const original = round % 2 === 0 ? allOf(parts) : anyOf(parts);
      const forms = [
        original,
        reduceCondition(original, signOf),
        readable(original, signOf, ['b', 'a'].map(symbol)),
      ];
      const compiled = compileConditions(forms, () => 'input');
      const columns = compiled.inputs.map((name) =>
        Float64Array.from({ length: 60 }, () => valueOf(known[name], random)),
      );
      const [wanted, reduced, shown] = compiled.evaluate(columns, 60);
      expect([...reduced], key(original)).toEqual([...wanted]);
      expect([...shown], key(original)).toEqual([...wanted]);
    }
  });
});

/** Small dyadic values, exact in doubles, zero included where the sign allows it. */
function valueOf(sign: Sign, random: () => number): number {
  const size = randomInteger(random, 1, 12) / 4;
  if (sign === 'positive') return size;
  if (sign === 'negative') return -size;
  if (sign === 'nonnegative') return random() < 0.2 ? 0 : size;
  return random() < 0.2 ? 0 : random() < 0.5 ? size : -size;
}

describe('conditions that others imply', () => {
  const reduced = (...conditions: Condition[]): string =>
    key(
      reduceCondition(allOf(conditions), signs({ J: 'positive', Kd: 'positive', Ki: 'positive' })),
    );

  test('are left out', () => {
    const strong = is('Kd*Kp - J*Ki', '>', '0');
    expect(reduced(is('Kp', '>', '0'), strong)).toBe(key(strong));
    expect(reduced(is('Kp + Kd', '>', '0'), strong)).toBe(key(strong));
    expect(reduced(is('Kp', '!=', '0'), strong)).toBe(key(strong));
    expect(reduced(is('x - 1', '>', '0'), is('x', '>', '0'))).toBe(key(is('x - 1', '>', '0')));
    expect(reduced(is('x - 1', '>=', '0'), is('x', '>=', '0'))).toBe(key(is('x - 1', '>=', '0')));
  });

  test('are left out where it takes two of the others', () => {
    const [a, b] = [is('x - 1', '>', '0'), is('y - 1', '>', '0')];
    expect(reduced(a, b, is('(x - 1)*(y - 1) + J', '>', '0'))).toBe(key(allOf([a, b])));
  });

  test('stay where the others do not say enough', () => {
    const [weak, strict] = [is('x', '>=', '0'), is('x', '>', '0')];
    expect(reduced(weak, is('x - y', '>', '0'))).toBe(key(allOf([weak, is('x - y', '>', '0')])));
    expect(reduced(strict, is('x*y', '>', '0'))).toContain('y');
  });
});

describe('readable conditions', () => {
  test('prefer the gains in their order', () => {
    const c = is('Kd*Kp - J*Ki', '>', '0');
    const shown = (names: readonly string[]) => key(readable(c, positive, names.map(symbol)));
    expect(shown(['Kp', 'Ki'])).toBe(key(is('Kp', '>', 'J*Ki/Kd')));
    expect(shown(['Ki', 'Kp'])).toBe(key(is('Ki', '<', 'Kd*Kp/J')));
    expect(shown([])).toBe(key(is('Kd*Kp', '>', 'J*Ki')));
  });

  test('pass over a gain whose factor has no known sign', () => {
    const c = is('x*Kp - J', '>', '0');
    expect(key(readable(c, signs({ J: 'positive' }), [symbol('Kp')]))).toBe(
      key(is('Kp*x', '>', 'J')),
    );
  });

  test('put a lone positive constant on the right', () => {
    expect(key(readable(is('1 - a*b', '>', '0'), unknown, []))).toBe(key(is('a*b', '<', '1')));
  });

  test('open what stable means', () => {
    const c = expandStable(
      stable([{ signals: ['x'], polynomial: polynomialOf('s^3 + a*s^2 + b*s + c') }]),
      positive,
    );
    expect(key(readable(c, positive, []))).toBe(key(is('a*b', '>', 'c')));
  });
});
