import { describe, expect, it } from 'vitest';
import { randomInteger, seededRandom, TapeBuilder } from '../../src/numeric/index.ts';
import type { RandomSource, Slot, TapeFunction } from '../../src/numeric/index.ts';

/** A slot beside the plain function that it should compute. */
interface Node {
  readonly slot: Slot;
  readonly of: (inputs: readonly number[]) => number;
}

const FUNCTIONS: readonly TapeFunction[] = [
  'sqrt',
  'exp',
  'log',
  'sin',
  'cos',
  'tan',
  'atan',
  'abs',
];

function randomNodes(random: RandomSource, builder: TapeBuilder): Node[] {
  const nodes: Node[] = ['p', 'q', 'r'].map((name, i) => ({
    slot: builder.input(name),
    of: (inputs) => inputs[i]!,
  }));
  nodes.push({ slot: builder.constant(0.5), of: () => 0.5 });
  for (let i = 0; i < 25; i++) nodes.push(randomNode(random, builder, nodes));
  return nodes;
}

function randomNode(random: RandomSource, builder: TapeBuilder, nodes: readonly Node[]): Node {
  const pick = (): Node => nodes[randomInteger(random, 0, nodes.length - 1)]!;
  const [a, b] = [pick(), pick()];
  const exponent = randomInteger(random, -3, 4);
  const name = FUNCTIONS[randomInteger(random, 0, FUNCTIONS.length - 1)]!;
  const choices: Node[] = [
    { slot: builder.add(a.slot, b.slot), of: (x) => a.of(x) + b.of(x) },
    { slot: builder.sub(a.slot, b.slot), of: (x) => a.of(x) - b.of(x) },
    { slot: builder.mul(a.slot, b.slot), of: (x) => a.of(x) * b.of(x) },
    { slot: builder.div(a.slot, b.slot), of: (x) => a.of(x) / b.of(x) },
    { slot: builder.min(a.slot, b.slot), of: (x) => Math.min(a.of(x), b.of(x)) },
    { slot: builder.max(a.slot, b.slot), of: (x) => Math.max(a.of(x), b.of(x)) },
    { slot: builder.neg(a.slot), of: (x) => -a.of(x) },
    { slot: builder.powInt(a.slot, exponent), of: (x) => a.of(x) ** exponent },
    { slot: builder.call(name, a.slot), of: (x) => Math[name as 'sqrt'](a.of(x)) },
  ];
  return choices[randomInteger(random, 0, choices.length - 1)]!;
}

/** Powers are rounded differently, and a difference of close numbers shows it. */
function expectClose(found: number, expected: number, what: string): void {
  if (!Number.isFinite(expected) || Math.abs(expected) > 1e12) return;
  expect(Math.abs(found - expected), what).toBeLessThanOrEqual(1e-9 * (1 + Math.abs(expected)));
}

describe('a tape', () => {
  it('computes its formula at one point', () => {
    const builder = new TapeBuilder();
    const x = builder.input('x');
    const tape = builder.build([builder.add(builder.mul(x, x), builder.constant(1))]);
    expect(tape.evaluate([3])).toEqual(Float64Array.of(10));
  });

  it('agrees with plain functions on random formulas, at a point and over a batch of mixed inputs', () => {
    const random = seededRandom(31);
    for (let trial = 0; trial < 150; trial++) {
      const builder = new TapeBuilder();
      const outputs = randomNodes(random, builder).slice(-6);
      const tape = builder.build(outputs.map((node) => node.slot));
      // More than one block, and a last block that is not full.
      const count = 700;
      const p = Float64Array.from({ length: count }, () => 1 + random());
      const r = Float64Array.from({ length: count }, () => 3 * random() - 1);
      const batch = tape.evaluateBatch([p, 0.7, r], count);
      for (const i of [0, 1, 511, 512, 699]) {
        const point = [p[i]!, 0.7, r[i]!];
        const single = tape.evaluate(point);
        outputs.forEach((node, k) => {
          const what = `seed 31, trial ${trial}, output ${k} at ${point}`;
          expect(batch[k]![i], what).toBe(single[k]);
          expectClose(single[k]!, node.of(point), what);
        });
      }
    }
  });

  it('shares equal operations, folds constants and drops what no output needs', () => {
    const builder = new TapeBuilder();
    const [a, b] = [builder.input('a'), builder.input('b')];
    const sum = builder.add(a, b);
    expect(builder.add(b, a)).toBe(sum);
    expect(builder.mul(builder.constant(2), builder.constant(3))).toBe(builder.constant(6));
    expect(builder.mul(a, builder.constant(1))).toBe(a);
    expect(builder.add(builder.constant(0), a)).toBe(a);
    expect(builder.powInt(a, 0)).toBe(builder.constant(1));
    builder.call('exp', a);
    expect(builder.build([builder.mul(sum, sum)]).length).toBe(4);
  });

  it('keeps 0 times an input, which is not 0 at infinity', () => {
    const builder = new TapeBuilder();
    const tape = builder.build([builder.mul(builder.constant(0), builder.input('a'))]);
    expect(tape.evaluate([Infinity])[0]).toBeNaN();
  });

  it('gives outputs that are inputs, constants, or the same twice', () => {
    const builder = new TapeBuilder();
    const [x, y] = [builder.input('x'), builder.input('y')];
    const tape = builder.build([x, builder.constant(4), builder.add(x, y), builder.add(y, x), y]);
    const batch = tape.evaluateBatch([Float64Array.of(1, 2), 10], 2);
    expect(batch.map((column) => Array.from(column))).toEqual([
      [1, 2],
      [4, 4],
      [11, 12],
      [11, 12],
      [10, 10],
    ]);
    expect(tape.evaluateBatch([1, 10], 0)).toEqual(new Array(5).fill(new Float64Array(0)));
  });

  it('says so when inputs are missing', () => {
    const builder = new TapeBuilder();
    const tape = builder.build([builder.add(builder.input('x'), builder.input('y'))]);
    expect(() => tape.evaluate([1])).toThrow('a tape of 2 inputs got 1');
    expect(() => tape.evaluateBatch([1], 3)).toThrow('a tape of 2 inputs got 1');
  });
});
