import { describe, expect, test } from 'vitest';
import {
  childrenOf,
  formatExpression,
  namesIn,
  parseFormula,
  walk,
  type Expression,
} from '../../src/language/index.ts';
import { randomSource } from './random.ts';
import { NAME_KINDS, shapeOf } from './shape.ts';
import { VOCABULARY } from './vocabulary.ts';

const span = { from: 0, to: 0 };

function parsed(text: string): Expression {
  const { expression, problems } = parseFormula(text, VOCABULARY, NAME_KINDS);
  expect(problems, text).toEqual([]);
  return expression!;
}

/** A random formula of numbers, names and operations, as the engine could build it. */
function randomFormula(random: (below: number) => number, depth: number): Expression {
  const part = () => randomFormula(random, depth - 1);
  const parts = () => Array.from({ length: 2 + random(2) }, part);
  switch (depth > 0 ? random(7) : random(2)) {
    case 0:
      return { kind: 'number', span, text: ['2', '0.5', '3e-1', '7'][random(4)]! };
    case 1:
      return { kind: 'name', span, name: ['a', 'b', 'Kp', 'θ'][random(4)]! };
    case 2: {
      const terms = parts();
      return { kind: 'sum', span, terms, signs: terms.map(() => (random(2) ? 1 : -1)) };
    }
    case 3:
    case 4: {
      const factors = parts();
      return { kind: 'product', span, factors, inverted: factors.map(() => random(3) === 0) };
    }
    case 5:
      return { kind: 'negation', span, of: part() };
    default:
      return {
        kind: 'power',
        span,
        base: part(),
        exponent: { kind: 'number', span, text: String(1 + random(2)) },
      };
  }
}

const VALUES: Readonly<Record<string, number>> = { a: 1.3, b: -0.7, Kp: 2.9, θ: 0.4 };

function valueOf(e: Expression): number {
  switch (e.kind) {
    case 'number':
      return Number(e.text);
    case 'name':
      return VALUES[e.name]!;
    case 'sum':
      return e.terms.reduce((sum, term, k) => sum + e.signs[k]! * valueOf(term), 0);
    case 'product':
      return e.factors.reduce(
        (product, factor, k) => product * valueOf(factor) ** (e.inverted[k] ? -1 : 1),
        1,
      );
    case 'negation':
      return -valueOf(e.of);
    case 'power':
      return valueOf(e.base) ** valueOf(e.exponent);
    default:
      throw new Error(e.kind);
  }
}

describe('the text of a formula', () => {
  test.each([
    'a + b - c',
    'a b/c',
    'a/(b c)',
    '-1/2 s',
    '-(1/2) pi',
    'a (1/2) s',
    '1/2 s',
    '-a b',
    '-(a + b) c',
    'a^(b + 1)',
    '(a b)^2',
    'a^-1',
    '2*3 x',
    'C (r - θ)',
    'C(s) L(j w)',
    "θ''",
    "storm.e'",
    '(storm with Ki is 0 N m/(rad s)).e',
    'az(w -> e, T)',
    'x with (Kp is 2 kN m/rad, C = C2)',
    'x in mrad',
    'a < b <= c',
    'not a = b and c > d or e',
    'step(2 [N])',
    'limit(x as s to 0)',
    'rows(a, b | c, d)',
    'mask("a.csv")',
    '1/2 [s]',
    '3 [rad/s] y',
    '(a or b) and c',
    'a - (b - c)',
    'a + (-b)',
    '(a/b) c',
    'solve(a = b, a)',
    '(a <= b) = c',
    '2 (3 + a) 4',
  ])('%s is written as it was typed', (text) => {
    expect(formatExpression(parsed(text))).toBe(text);
  });

  test('reads as a formula of the same value (seeded)', () => {
    const random = randomSource(5);
    for (let k = 0; k < 1500; k++) {
      const e = randomFormula(random, 4);
      const text = formatExpression(e);
      const [value, again] = [valueOf(e), valueOf(parsed(text))];
      if (Number.isFinite(value) && Math.abs(value) > 1e-9)
        expect(again / value, `${shapeOf(e)} as ${text}`).toBeCloseTo(1, 8);
    }
  });

  test('settles when it is read and written again (seeded)', () => {
    const random = randomSource(6);
    for (let k = 0; k < 500; k++) {
      const text = formatExpression(randomFormula(random, 4));
      const again = formatExpression(parsed(formatExpression(parsed(text))));
      expect(formatExpression(parsed(again))).toBe(again);
    }
  });
});

describe('the parts of a formula', () => {
  test('are visited from the outside in', () => {
    const kinds: string[] = [];
    walk(parsed('a + b^2 sin(c)'), (part) => kinds.push(part.kind));
    expect(kinds).toEqual(['sum', 'name', 'product', 'power', 'name', 'number', 'call', 'name']);
  });

  test.each([
    ["theta'' + C(j w) a", ['θ', 'C', 'j', 'w', 'a']],
    ['az(w -> e) + b', ['az', 'b']],
    ['(storm with Kp is 2).e', ['storm']],
    ['x with C = D + 1', ['x', 'D']],
    ['limit(x as s to b) in mm', ['limit', 'x', 'b']],
    ['rows(a, b | c, 2 [m])', ['rows', 'a', 'b', 'c']],
    ['a < b and not c "x"', null],
  ])('%s refers to %j', (text, names) => {
    const { expression } = parseFormula(text, VOCABULARY, NAME_KINDS);
    expect(expression ? namesIn(expression) : null).toEqual(names);
  });

  test('directly inside are in the order of the text', () => {
    expect(childrenOf(parsed('x with (a is 2, b = c)')).map(shapeOf)).toEqual(['x', '2', 'c']);
  });
});
