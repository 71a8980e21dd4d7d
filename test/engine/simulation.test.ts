import { describe, expect, test } from 'vitest';
import {
  matrixExponential,
  matrixOf,
  oneNorm,
  randomInteger,
  seededRandom,
} from '../../src/numeric/index.ts';
import { evaluateCell } from './worksheet.ts';

/** States of a random loop, x' = A x + b r, written as a worksheet and as numbers. */
interface RandomLoop {
  readonly A: readonly (readonly number[])[];
  readonly b: readonly number[];
}

const STATES = 4;

/** Sparse, so that some states feed others and are not fed back; steps of 1/2, so that roots differ in kind. */
function randomLoop(random: () => number): RandomLoop {
  const entry = (share: number) => (random() < share ? randomInteger(random, -4, 4) / 2 : 0);
  const indices = [...Array(STATES).keys()];
  const A = indices.map((i) =>
    indices.map((k) => (i === k ? -randomInteger(random, 0, 4) / 2 : entry(0.35))),
  );
  return { A, b: indices.map(() => entry(0.6)) };
}

function worksheetOf({ A, b }: RandomLoop, statements: string): string {
  const equations = A.map((row, i) => {
    const terms = [...row.map((a, k) => `(${a})*x${k}`), `(${b[i]})*r`];
    const present = terms.filter((_, k) => (k < STATES ? row[k] : b[i]) !== 0);
    return `  x${i}' = ${present.length > 0 ? present.join(' + ') : '0 r'}`;
  });
  return `
loop a driven by r
${equations.join('\n')}
  e = r - x0
case c of a
  r = step(3)
case g of a
  r = ramp(1/2)
case h of a
  x1 starts at 2
  r = step(3) - step(1) after 1 s
${statements}`;
}

/** The states after a time, with r(t) = level + slope t and given initial states, by the matrix exponential. */
function statesAfter(
  { A, b }: RandomLoop,
  time: number,
  input: { readonly level: number; readonly slope: number },
  start: readonly number[] = A.map(() => 0),
): readonly number[] {
  const rows = [
    ...A.map((row, i) => [...row, b[i], 0]),
    [...A.map(() => 0), 0, 1],
    [...A.map(() => 0), 0, 0],
  ].map((row) => row.map((a) => a * time));
  const exponential = matrixExponential(matrixOf(rows));
  const state = [...start, input.level, input.slope];
  return A.map((_, i) =>
    state.reduce((sum, x, k) => sum + exponential.data[i * state.length + k] * x, 0),
  );
}

/** The states that a state depends on, itself included. */
function upstream({ A }: RandomLoop, state: number): readonly number[] {
  const found = new Set([state]);
  for (const i of found) A[i].forEach((a, k) => a !== 0 && found.add(k));
  return [...found].sort();
}

/** One state after a time, in the loop cut down to what it depends on, so that nothing else swamps it. */
function stateAfter(
  loop: RandomLoop,
  state: number,
  time: number,
  input: { readonly level: number; readonly slope: number },
): number {
  const states = upstream(loop, state);
  const A = states.map((i) => states.map((k) => loop.A[i][k]));
  const b = states.map((i) => loop.b[i]);
  return statesAfter({ A, b }, time, input)[states.indexOf(state)];
}

/** Whether the motion of these states decays; null where it is too slow to tell by simulating. */
function decays({ A }: RandomLoop, states: readonly number[]): boolean | null {
  const sub = states.map((i) => states.map((k) => 400 * A[i][k]));
  const size = oneNorm(matrixExponential(matrixOf(sub)));
  if (size < 1e-6) return true;
  return size > 1e-2 ? false : null;
}

describe('random loops as worksheets, against simulation by the matrix exponential', () => {
  const random = seededRandom(20);
  const loops = Array.from({ length: 60 }, () => randomLoop(random));
  const finals = [...Array(STATES).keys()].map((i) => `f${i} = final(c.x${i})`).join('\n');

  test('a final value is where the simulation comes to rest, and there is none where it does not', () => {
    let [existing, missing] = [0, 0];
    for (const loop of loops) {
      const cell = evaluateCell(worksheetOf(loop, finals));
      expect(cell.problems).toEqual([]);
      for (let i = 0; i < STATES; i++) {
        const settled = decays(loop, upstream(loop, i));
        const { value, notes } = cell.result(`f${i}`);
        if (settled === null) continue;
        if (settled)
          expect(value, JSON.stringify(loop)).toBeCloseTo(
            stateAfter(loop, i, 400, { level: 3, slope: 0 }),
            6,
          );
        else {
          expect(value, JSON.stringify(loop)).toBeNull();
          expect(notes.join(' ')).toContain('No value: ');
        }
        if (settled) existing++;
        else missing++;
      }
    }
    expect(existing).toBeGreaterThan(40);
    expect(missing).toBeGreaterThan(40);
  });

  test('a loop is stable exactly where the simulation decays, whole and for each signal', () => {
    const verdicts = [...Array(STATES).keys()].map((i) => `s${i} = stable(a, x${i})`).join('\n');
    for (const loop of loops) {
      const cell = evaluateCell(worksheetOf(loop, `whole = stable(a)\n${verdicts}`));
      const all = decays(loop, [...Array(STATES).keys()]);
      if (all !== null) expect(cell.result('whole').value, JSON.stringify(loop)).toBe(all);
      for (let i = 0; i < STATES; i++) {
        const settled = decays(loop, upstream(loop, i));
        if (settled === null) continue;
        expect(cell.result(`s${i}`).value, JSON.stringify(loop)).toBe(settled);
      }
    }
  });

  test('an error under a ramp grows at the rate that is said, or settles', () => {
    for (const loop of loops) {
      if (decays(loop, upstream(loop, 0)) !== true) continue;
      const { value, parts } = evaluateCell(worksheetOf(loop, 'q = final(g.e)')).result('q');
      const [early, late] = [300, 400].map(
        (time) => time / 2 - stateAfter(loop, 0, time, { level: 0, slope: 1 / 2 }),
      );
      const rate = (late - early) / 100;
      if (Math.abs(rate) < 1e-9) expect(value, JSON.stringify(loop)).toBeCloseTo(late, 5);
      else {
        expect(value, JSON.stringify(loop)).toBeNull();
        const { growth } = parts as { growth: { rate: string; power: number } };
        const said = evaluateCell(`x = ${growth.rate}`).result('x').value;
        expect(growth.power).toBe(1);
        expect(said, JSON.stringify(loop)).toBeCloseTo(rate, 6);
      }
    }
  });

  test('a closed-form response follows the simulation, from an initial state and with a later source', () => {
    for (const loop of loops.slice(0, 25)) {
      const statements = [0.4, 2.5].flatMap((time) =>
        [0, 1, 2].map((i) => `y${i}${time * 10} = response(h.x${i}) with t = ${time} [s]`),
      );
      const cell = evaluateCell(worksheetOf(loop, statements.join('\n')));
      expect(cell.problems).toEqual([]);
      const start = loop.A.map((_, i) => (i === 1 ? 2 : 0));
      const early = statesAfter(loop, 0.4, { level: 3, slope: 0 }, start);
      const one = statesAfter(loop, 1, { level: 3, slope: 0 }, start);
      const late = statesAfter(loop, 1.5, { level: 2, slope: 0 }, one);
      for (const i of [0, 1, 2]) {
        expect(cell.result(`y${i}4`).value, JSON.stringify(loop)).toBeCloseTo(early[i], 7);
        expect(cell.result(`y${i}25`).value, JSON.stringify(loop)).toBeCloseTo(late[i], 6);
      }
    }
  });

  test('an initial value is that of the equations just after t = 0', () => {
    for (const loop of loops.slice(0, 25)) {
      const names = [...Array(STATES).keys()];
      const statements = names.flatMap((i) => [
        `v${i} = initial(h.x${i})`,
        `w${i} = initial(h.x${i}')`,
      ]);
      const cell = evaluateCell(worksheetOf(loop, statements.join('\n')));
      expect(cell.problems).toEqual([]);
      for (const i of names) {
        expect(cell.result(`v${i}`).value).toBe(i === 1 ? 2 : 0);
        expect(cell.result(`w${i}`).value, JSON.stringify(loop)).toBeCloseTo(
          2 * loop.A[i][1] + 3 * loop.b[i],
          12,
        );
      }
    }
  });
});

describe('same', () => {
  const random = seededRandom(8);
  const atom = () => ['a', 'b', 'c', 's', '2', '3'][randomInteger(random, 0, 5)];
  const formula = (depth: number): string => {
    if (depth === 0) return atom();
    const [x, y] = [formula(depth - 1), formula(depth - 1)];
    const forms = [`(${x} + ${y})`, `(${x} - ${y})`, `(${x}*${y})`, `(${x}/(${y}))`];
    return forms[random() < 0.2 ? 3 : randomInteger(random, 0, 2)];
  };
  const verdict = (left: string, right: string) => {
    const cell = evaluateCell(`a, b, c are positive\nx = same(${left}, ${right})`);
    return cell.problems.length > 0 ? null : cell.result('x').value;
  };

  test('holds of what the laws of arithmetic make equal, and of nothing changed', () => {
    let judged = 0;
    for (let run = 0; run < 60; run++) {
      const [x, y, z] = [formula(2), formula(2), formula(1)];
      const laws = [
        [`${x}*(${y} + ${z})`, `${x}*${y} + ${x}*${z}`],
        [`${x} - ${y}`, `-(${y} - ${x})`],
        [`(${x} + ${y})^2`, `${x}^2 + 2*${x}*${y} + ${y}^2`],
      ];
      for (const [left, right] of laws) {
        const held = verdict(left, right);
        if (held === null) continue;
        judged++;
        expect(held, `${left} and ${right}`).toBe(true);
        expect(verdict(left, `${right} + 1/1000 a`)).toBe(false);
      }
    }
    expect(judged).toBeGreaterThan(100);
  });
});
