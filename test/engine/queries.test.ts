import { describe, expect, test } from 'vitest';
import { Queries } from '../../src/engine/queries.ts';

/** A graph of sums over numeric inputs that counts what runs. */
function sums() {
  const queries = new Queries();
  const runs: string[] = [];
  const define = (name: string, compute: () => number) => () =>
    queries.get(name, () => {
      runs.push(name);
      return compute();
    });
  const set = (values: Record<string, number>) => {
    runs.length = 0;
    queries.advance(new Map(Object.entries(values)));
  };
  return { queries, runs, define, set, input: (name: string) => queries.input<number>(name) };
}

describe('incremental queries', () => {
  test('a chain runs once, and again only from what changed on', () => {
    const { runs, define, set, input } = sums();
    const a = define('a', () => input('x') + 1);
    const b = define('b', () => a() + 1);
    const c = define('c', () => b() + input('y'));
    set({ x: 1, y: 10 });
    expect(c()).toBe(13);
    expect(runs).toEqual(['c', 'b', 'a']);
    set({ x: 1, y: 20 });
    expect(c()).toBe(23);
    expect(runs).toEqual(['c']);
  });

  test('a diamond runs each corner once', () => {
    const { runs, define, set, input } = sums();
    const top = define('top', () => input('x'));
    const left = define('left', () => top() * 2);
    const right = define('right', () => top() * 3);
    const bottom = define('bottom', () => left() + right());
    set({ x: 1 });
    expect(bottom()).toBe(5);
    set({ x: 2 });
    expect(bottom()).toBe(10);
    expect([...runs].sort()).toEqual(['bottom', 'left', 'right', 'top']);
  });

  test('readers of a value that came out the same are left alone', () => {
    const { runs, define, set, input } = sums();
    const sign = define('sign', () => Math.sign(input('x')));
    const tail = define('tail', () => sign() * 100);
    set({ x: 3 });
    expect(tail()).toBe(100);
    set({ x: 8 });
    expect(tail()).toBe(100);
    expect(runs).toEqual(['sign']);
  });

  test('what is not asked for does not run', () => {
    const { runs, define, set, input } = sums();
    const a = define('a', () => input('x'));
    set({ x: 1 });
    a();
    set({ x: 2 });
    expect(runs).toEqual([]);
  });

  test('what a query reads may change from run to run', () => {
    const { runs, define, set, input } = sums();
    const chosen = define('chosen', () => (input('which') > 0 ? input('x') : input('y')));
    set({ which: 1, x: 5, y: 7 });
    expect(chosen()).toBe(5);
    set({ which: 0, x: 5, y: 7 });
    expect(chosen()).toBe(7);
    set({ which: 0, x: 6, y: 7 });
    expect(chosen()).toBe(7);
    expect(runs).toEqual([]);
  });

  test('a query that throws is run again, and leaves nothing behind', () => {
    const { define, set, input } = sums();
    const half = define('half', () => {
      if (input('x') % 2 !== 0) throw new Error('odd');
      return input('x') / 2;
    });
    set({ x: 1 });
    expect(half).toThrow('odd');
    set({ x: 4 });
    expect(half()).toBe(2);
  });

  test('a query that reads itself is a bug, and is said to be one', () => {
    const { queries } = sums();
    const self = (): number => queries.get('self', () => self() + 1);
    expect(self).toThrow('the query self reads itself');
  });
});
