import { describe, expect, test } from 'vitest';
import { positiveRoots, seededRandom, TapeBuilder } from '../../src/numeric/index.ts';

/** Π (x − r), highest power first. */
function fromRoots(roots: readonly number[]): number[] {
  return roots.reduce<number[]>((p, r) => [...p, 0].map((c, k) => c - r * (p[k - 1] ?? 0)), [1]);
}

describe('positive roots of a polynomial', () => {
  test('are those it was made of, over nine decades, without the negative ones', () => {
    const random = seededRandom(5);
    for (let k = 0; k < 500; k++) {
      const roots = Array.from({ length: 1 + Math.floor(random() * 6) }, () => {
        const size = 10 ** (9 * random() - 4);
        return random() < 0.3 ? -size : size;
      });
      const wanted = roots.filter((r) => r > 0).sort((a, b) => a - b);
      const gap = Math.min(...wanted.map((r, i) => (i === 0 ? 1 : 1 - wanted[i - 1] / r)));
      if (gap < 0.05) continue;
      const found = positiveRoots(fromRoots(roots));
      expect(found.length, `${roots}`).toBe(wanted.length);
      found.forEach((r, i) => expect(Math.abs(r / wanted[i] - 1)).toBeLessThan(1e-9));
    }
  });

  test('a place where the curve only touches the axis counts', () => {
    expect(positiveRoots([1, -4, 4])).toEqual([2]);
  });

  test('a constant, a power of x and a sum of positive terms have none', () => {
    expect([[3], [1, 0, 0], [1, 2, 3], []].map(positiveRoots)).toEqual([[], [], [], []]);
  });
});

describe('a tape that calls a function', () => {
  const sum = (values: Float64Array): number => values.reduce((a, b) => a + b, 0);

  test('calls it at every point of a batch, and once for constants', () => {
    const builder = new TapeBuilder();
    const [x, y] = [builder.input('x'), builder.input('y')];
    const found = builder.external('sum', sum, [x, builder.mul(x, y), builder.constant(1)]);
    const constant = builder.external('sum', sum, [builder.constant(2), builder.constant(3)]);
    const tape = builder.build([builder.add(found, found), constant]);
    expect([...tape.evaluate([2, 5])]).toEqual([26, 5]);
    const [column] = tape.evaluateBatch([Float64Array.of(1, 2), 5], 2);
    expect([...column]).toEqual([14, 26]);
  });
});
