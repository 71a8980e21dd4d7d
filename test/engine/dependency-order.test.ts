import { describe, expect, test } from 'vitest';
import { dependenciesOf } from '../../src/engine/dependency-order.ts';
import { seededRandom } from '../../src/numeric/index.ts';
import { evaluateCell } from './worksheet.ts';

function randomGraph(seed: number): Map<string, string[]> {
  const random = seededRandom(seed);
  const names = Array.from({ length: 1 + Math.floor(random() * 8) }, (_, k) => `n${k}`);
  const density = random() * 0.5;
  return new Map(names.map((name) => [name, names.filter(() => random() < density)]));
}

/** All that can be reached from a name in one step or more. */
function reached(graph: ReadonlyMap<string, readonly string[]>, from: string): Set<string> {
  const found = new Set(graph.get(from));
  for (const name of found) for (const next of graph.get(name)!) found.add(next);
  return found;
}

describe('the order of dependencies', () => {
  test('finds the circles that reachability finds (seeds 1 to 300)', () => {
    for (let seed = 1; seed <= 300; seed++) {
      const graph = randomGraph(seed);
      const { circles } = dependenciesOf(graph.keys(), (name) => graph.get(name)!);
      const inCircle = [...graph.keys()].filter((name) => reached(graph, name).has(name));
      expect([...circles.flat()].sort(), `seed ${seed}`).toEqual(inCircle.sort());
      for (const circle of circles) {
        for (const a of circle) {
          for (const b of circle) expect(reached(graph, a).has(b), `seed ${seed}`).toBe(true);
        }
      }
    }
  });

  test('puts every name after those it refers to (seeds 1 to 300)', () => {
    for (let seed = 1; seed <= 300; seed++) {
      const graph = randomGraph(seed);
      const { order } = dependenciesOf(graph.keys(), (name) => graph.get(name)!);
      expect([...order].sort()).toEqual([...graph.keys()].sort());
      const place = new Map(order.map((name, index) => [name, index]));
      for (const [name, references] of graph) {
        for (const next of references) {
          if (reached(graph, next).has(name)) continue;
          expect(place.get(next)!, `seed ${seed}`).toBeLessThan(place.get(name)!);
        }
      }
    }
  });

  test('takes a chain of a hundred thousand', () => {
    const { order, circles } = dependenciesOf(['0'], (name) =>
      Number(name) < 100_000 ? [String(Number(name) + 1)] : [],
    );
    expect([order.length, order[0], circles.length]).toEqual([100_001, '100000', 0]);
  });
});

test.each([
  ['downwards', (lines: string[]) => lines],
  ['upwards', (lines: string[]) => [...lines].reverse()],
])('a long chain of definitions is evaluated %s', (_, arranged) => {
  const lines = Array.from({ length: 250 }, (_unused, k) => `a${k + 1} = a${k} + 1`);
  const cell = evaluateCell(['a0 is 1', ...arranged(lines)].join('\n'));
  expect(cell.problems).toEqual([]);
  expect(cell.result('a250')).toMatchObject({ value: 251, formula: 'a249 + 1' });
});

test('many assumptions are read', () => {
  const lines = Array.from({ length: 3000 }, (_, k) => `q${k} is ${k}`);
  expect(evaluateCell(lines.join('\n')).problems).toEqual([]);
});
