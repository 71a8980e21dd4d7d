import { describe, expect, test } from 'vitest';
import {
  evaluateRatio,
  mulRatios,
  numberToRational,
  rationalToNumber,
  symbol,
} from '../../src/algebra/index.ts';
import {
  allOf,
  compare,
  compileConditions,
  compileRatios,
  cornersOf,
  negation,
  NO,
  numberOf,
  stable,
  undecided,
  UNDECIDED,
  YES,
} from '../../src/control/index.ts';
import { polynomialRoots, randomInteger, seededRandom } from '../../src/numeric/index.ts';
import { found, numberAt, polynomialOf, read } from './formulas.ts';

const input = () => 'input' as const;
const JW = mulRatios(read('sqrt(0 - 1)'), read('w'));

describe('compiled ratios', () => {
  test('agree with exact evaluation at random points', () => {
    const random = seededRandom(4);
    const r = read('(J*s^3 + (b + Kd)*s^2 + Kp*s + Ki)/(s*(J*s + b)^2 + 3/7)');
    const { tape, inputs } = compileRatios([r], input);
    for (let i = 0; i < 200; i++) {
      const values = inputs.map(() => randomInteger(random, 1, 200) / 8);
      const at = new Map(inputs.map((name, k) => [name, numberToRational(values[k])]));
      const exact = rationalToNumber(found(evaluateRatio(r, (g) => at.get(g.name)!)));
      expect(tape.evaluate(values)[0] / exact).toBeCloseTo(1, 12);
    }
  });

  test('put in derived parameters and keep only what these rest on', () => {
    const { inputs, tape } = compileRatios([read('wn^2 + wn')], (g) =>
      g === symbol('wn') ? read('sqrt(k/m)') : 'input',
    );
    expect([...inputs].sort()).toEqual(['k', 'm']);
    expect(tape.evaluate(inputs.map((name) => (name === 'k' ? 8 : 2)))[0]).toBeCloseTo(6, 14);
  });

  test('read the inputs of nominal(x) under their nominal names', () => {
    const { inputs, tape } = compileRatios([read('J/nominal(J*w^2)')], input);
    expect([...inputs].sort()).toEqual(['J', 'nominal(J)', 'nominal(w)']);
    const at = new Map([
      ['J', 6],
      ['nominal(J)', 3],
      ['nominal(w)', 2],
    ]);
    expect(tape.evaluate(inputs.map((name) => at.get(name)!))[0]).toBe(0.5);
  });

  test('make two outputs of a value with j', () => {
    const { inputs, tape, outputs } = compileRatios([read('1/(1 + jw*T)')], (g) =>
      g === symbol('jw') ? JW : 'input',
    );
    const values = tape.evaluate(inputs.map((name) => (name === 'w' ? 2 : 0.5)));
    expect([values[outputs[0].re], values[outputs[0].im!]]).toEqual([0.5, -0.5]);
  });

  test('know the elementary functions and pi', () => {
    expect(numberOf(read('sin(pi/7) + exp(1) + atan(2)'))).toBeCloseTo(
      Math.sin(Math.PI / 7) + Math.E + Math.atan(2),
      14,
    );
    expect(numberOf(read('sqrt(0 - 2)'))).toBeNaN();
  });

  test('survive coefficients beyond the range of doubles', () => {
    const huge = '7'.repeat(400);
    expect(numberAt(read(`(${huge}*x + 1)/(${huge}*x)`), { x: 2 })).toBe(1);
  });
});

describe('compiled conditions', () => {
  const evaluate = (
    condition: Parameters<typeof allOf>[0][number],
    values: Record<string, number[]>,
  ) => {
    const compiled = compileConditions([condition], input);
    const columns = compiled.inputs.map((name) => Float64Array.from(values[name]));
    return compiled.evaluate(columns, Object.values(values)[0].length)[0];
  };
  const kp = compare(read('Kp'), '>', read('J*Ki/Kd'));

  test('comparisons give a verdict', () => {
    const verdicts = evaluate(kp, { Kp: [3, 1], J: [1, 1], Ki: [2, 2], Kd: [1, 1] });
    expect([...verdicts]).toEqual([YES, NO]);
  });

  test('what is not a number is undecided', () => {
    const verdicts = evaluate(kp, { Kp: [NaN], J: [1], Ki: [2], Kd: [1] });
    expect([...verdicts]).toEqual([UNDECIDED]);
  });

  test('undecided parts decide nothing unless another part does', () => {
    const open = undecided('not known');
    expect([
      ...evaluate(allOf([kp, open]), { Kp: [3, 1], J: [1, 1], Ki: [2, 2], Kd: [1, 1] }),
    ]).toEqual([UNDECIDED, NO]);
  });

  test('stability agrees with numeric roots over a grid', () => {
    const block = { signals: ['x'], polynomial: polynomialOf('J*s^4 + 2*s^3 + a*s^2 + b*s + 1') };
    const random = seededRandom(9);
    const draw = (low: number, high: number) =>
      Array.from({ length: 2000 }, () => low + (high - low) * random());
    const [a, b, J] = [draw(-1, 5), draw(-1, 5), draw(0.2, 2)];
    const verdicts = evaluate(stable([block]), { a, b, J });
    let yes = 0;
    verdicts.forEach((v, i) => {
      const left = polynomialRoots([J[i], 2, a[i], b[i], 1]).every((r) => r.re < 0);
      expect(v).toBe(left ? YES : NO);
      yes += v;
    });
    expect(yes).toBeGreaterThan(200);
    expect(
      [...evaluate(negation(stable([block])), { a, b, J })].filter((v) => v === NO),
    ).toHaveLength(yes);
  });

  test('where the leading coefficient is exactly 0 the degree falls', () => {
    const block = { signals: ['x'], polynomial: polynomialOf('J*s^2 + b*s + k') };
    const verdicts = evaluate(stable([block]), {
      J: [0, 0, 1],
      b: [1, -1, 1],
      k: [2, 2, 2],
    });
    expect([...verdicts]).toEqual([YES, NO, YES]);
  });
});

describe('corners of a box', () => {
  const box = [
    { name: 'J', low: 1, high: 2 },
    { name: 'b', low: 5, high: 5 },
    { name: 'k', low: -1, high: 1 },
  ];

  test('are all combinations of bounds', () => {
    const { columns, count, complete } = cornersOf(box, 100);
    expect([count, complete]).toEqual([4, true]);
    const points = Array.from({ length: count }, (_, i) => columns.map((c) => c[i]).join(' '));
    expect(points.sort()).toEqual(['1 5 -1', '1 5 1', '2 5 -1', '2 5 1']);
  });

  test('past the limit are a spread selection, the same every time', () => {
    const many = Array.from({ length: 30 }, (_, i) => ({ name: `p${i}`, low: 0, high: 1 }));
    const { columns, count, complete } = cornersOf(many, 256);
    expect([count, complete]).toEqual([256, false]);
    expect(cornersOf(many, 256)).toEqual({ columns, count, complete });
    const points = Array.from({ length: count }, (_, i) => columns.map((c) => c[i]).join(''));
    expect(new Set(points).size).toBe(256);
    for (const column of columns) {
      const high = column.reduce((sum, x) => sum + x, 0);
      expect(high).toBeGreaterThan(64);
      expect(high).toBeLessThan(192);
    }
  });
});
