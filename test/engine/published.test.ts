import { describe, expect, test } from 'vitest';
import { randomInteger, seededRandom } from '../../src/numeric/index.ts';
import { numberAt, read } from '../control/formulas.ts';
import { published, type PublishedCase } from '../control/published-cases.ts';
import { evaluateCell } from './worksheet.ts';

type Coefficients = readonly (number | string)[];

/** A polynomial in s as the worksheet language writes it, from coefficients, highest power first. */
function polynomial(descending: Coefficients): string {
  const degree = descending.length - 1;
  const terms = descending.map((c, k) => {
    const power = degree - k;
    return `(${c})${power === 0 ? '' : power === 1 ? '*s' : `*s^${power}`}`;
  });
  return terms.join(' + ');
}

const quotient = ({ num, den }: { num: Coefficients; den: Coefficients }) =>
  `(${polynomial(num)})/(${polynomial(den)})`;

const kind = (wanted: string) => (c: PublishedCase) => c.kind === wanted;

interface RouthParts {
  readonly rows: readonly (readonly string[])[];
  readonly counts: { readonly right: number; readonly axis: number; readonly left: number };
}

describe('a Routh array in a worksheet agrees with published ones', () => {
  test.each(published(kind('routh')))('%s', (_, { given, expect: wanted }) => {
    const poly = polynomial(given.poly);
    const cell = evaluateCell(`routh(${poly})\nstable(${poly})`);
    const { parts, notes } = cell.result('routh');
    const { rows, counts } = parts as RouthParts;
    expect([counts.right, counts.axis, counts.left]).toEqual([wanted.rhp, wanted.jw, wanted.lhp]);
    expect(cell.result('stable').value).toBe(wanted.rhp === 0 && wanted.jw === 0);
    const said = notes.join(' ');
    if (wanted.special === 'none') {
      expect(rows.map(([first]) => numberAt(read(first), {}))).toEqual(
        (wanted.first_column as Coefficients).map((c) => numberAt(read(c), {})),
      );
      expect(said).not.toMatch(/zero row|zero first element/);
    }
    if (wanted.special === 'zero_row') expect(said).toContain('zero row');
    if (wanted.special === 'zero_first') expect(said).toContain('zero first element');
    if (wanted.special === 'root_at_origin') expect(said).toContain('root at the origin');
  });
});

/** Points of a case's box of samples, seeded. */
function samplesOf(box: Readonly<Record<string, readonly [number, number]>>, count: number) {
  const random = seededRandom(11);
  return Array.from({ length: count }, () =>
    Object.fromEntries(
      Object.entries(box).map(([name, [low, high]]) => [
        name,
        Number((low + (high - low) * random()).toFixed(3)),
      ]),
    ),
  );
}

describe('the conditions for stability in a worksheet agree with published ones', () => {
  const cases = published((c) => c.kind === 'routh_condition' || c.kind === 'region');
  test.each(cases)('%s', (_, { given, expect: wanted, kind: of }) => {
    const names = Object.keys(given.sample);
    const signs = of === 'routh_condition' ? `${names.join(', ')} are positive\n` : '';
    for (const point of samplesOf(given.sample, 40)) {
      const lines = names.map((name) => `${name} is ${point[name]}`).join('\n');
      const cell = evaluateCell(`${lines}\n${signs}stable(${polynomial(given.poly)})`);
      const holds = (wanted.all_positive as readonly string[]).every(
        (condition) => numberAt(read(condition.replace(/^(\d)-/, '0+$1-')), point) > 0,
      );
      expect(cell.problems).toEqual([]);
      expect(cell.result('stable').value, JSON.stringify(point)).toBe(holds);
    }
  });

  test('a rigid body under three-term control needs Kp > J Ki/Kd, as an engineer reads it', () => {
    const { result } = evaluateCell(`
J is 2 kg m^2
Kd is 4 N m s/rad
Ki is 1 N m/(rad s)
Kp is 3 N m/rad
tune Kp from 1 to 10 N m/rad
J, Kd, Ki are positive
loop body driven by r
  J theta'' = (Kp + Ki/s + Kd s) (r - theta)
routh(body)
stable(body)`);
    expect(result('stable').formula).toBe('Kp > J Ki/Kd');
    expect(result('routh').parts).toMatchObject({
      rows: [['J', 'Kp'], ['Kd', 'Ki'], ['(Kd Kp - J Ki)/Kd'], ['Ki']],
      conditions: ['Kp > J Ki/Kd'],
    });
  });
});

describe('the stabilising gains that a worksheet gives agree with published ones', () => {
  test.each(published(kind('gain_range')))('%s', (_, { given, expect: wanted, tolerance }) => {
    const rational = (c: number) => String(Number(c.toFixed(6)));
    const [D, N] = [given.D, given.N].map((list: readonly number[]) =>
      polynomial(list.map(rational)),
    );
    const intervals = (wanted.intervals as readonly Coefficients[]).map((ends) =>
      ends.map((end) => (end === 'oo' ? Infinity : numberAt(read(end), {}))),
    );
    const gains = intervals.flatMap(([low, high]) => insideAndOutside(low, high, tolerance.rel));
    for (const gain of [...gains, 1e-3, 1, 100, 1e4]) {
      const statements = `K is ${gain}\nsolve(stable(${D} + K (${N})), K)\nstable(${D} + K (${N}))`;
      const cell = evaluateCell(statements);
      const inside = intervals.some(([low, high]) => gain > low && gain < high);
      expect(cell.problems).toEqual([]);
      expect(cell.result('stable').value, `K = ${gain}`).toBe(inside);
      expect(cell.result('solve').value, `solved, K = ${gain}`).toBe(inside);
    }
  });

  function insideAndOutside(low: number, high: number, rel: number): readonly number[] {
    const margin = 4 * rel;
    const ends = [low, high].filter(Number.isFinite);
    const near = ends.flatMap((end) =>
      end === 0 ? [margin] : [end * (1 - margin), end * (1 + margin)],
    );
    const middle = Number.isFinite(high) ? (low + high) / 2 : 2 * Math.abs(low) + 1;
    return [...near, middle].filter((gain) => gain !== 0);
  }
});

describe('steady errors in a worksheet agree with published ones', () => {
  test.each(published(kind('sse')))('%s', (_, { given, expect: wanted }) => {
    const sources = given.inputs as readonly (readonly [string, string, number])[];
    const cases = sources.map(
      ([input, source, size], i) => `case c${i} of a\n  ${input} = ${source}(${size})`,
    );
    const H = given.H as { num: Coefficients; den: Coefficients } | undefined;
    const cell = evaluateCell(`
loop a driven by r, d
  u = (${quotient(given.C)}) (r - m)
  y = (${quotient(given.G)}) (u + d)
  m = ${H ? `(${quotient(H)}) y` : 'y'}
  e = r - y
${cases.join('\n')}
${sources.map((__, i) => `e${i} = final(c${i}.e)`).join('\n')}
t0 = system_type(opened(a, u))
k0 = error_constants(opened(a, u))`);
    expect(cell.problems).toEqual([]);
    (wanted.e as readonly string[]).forEach((value, i) => {
      const { value: found, parts, notes } = cell.result(`e${i}`);
      if (/oo|undefined/.test(value)) {
        expect(found).toBeNull();
        expect(notes.join(' ')).toMatch(/^No value: /);
        expect(parts !== null).toBe(value.includes('oo'));
      } else expect(found).toBeCloseTo(numberAt(read(value.replace(/^-/, '0-')), {}), 9);
    });
    if ('type' in wanted) expect(cell.result('t0').value).toBe(wanted.type);
    const { items } = (cell.result('k0').parts ?? { items: [] }) as {
      items: readonly { name: string; value: number | null }[];
    };
    for (const [name, key] of [
      ['position', 'Kp'],
      ['velocity', 'Kv'],
      ['acceleration', 'Ka'],
    ] as const) {
      if (!(key in wanted)) continue;
      const { value } = items.find((item) => item.name === name)!;
      expect(value).toBeCloseTo(numberAt(read(wanted[key]), {}), 9);
    }
  });
});

describe('responses in a worksheet agree with published transform pairs', () => {
  test.each(published(kind('laplace')))('%s', (_, { given, expect: wanted }) => {
    const random = seededRandom(5);
    for (let run = 0; run < 5; run++) {
      const point = {
        a: randomInteger(random, 5, 30) / 10,
        b: randomInteger(random, 31, 50) / 10,
        t: randomInteger(random, 1, 30) / 10,
      };
      const F = String(given.F).replaceAll('**', '^').replaceAll(')(', ') (');
      const cell = evaluateCell(`
a is ${point.a}
b is ${point.b}
a, b are positive
x = response(${F}) with t = ${point.t} [s]`);
      expect(cell.problems).toEqual([]);
      expect(cell.result('x').value).toBeCloseTo(numberAt(read(wanted.f), point), 9);
    }
  });

  test.each(published(kind('step_lti')))('%s', (_, { given, expect: wanted }) => {
    const H = quotient(given as unknown as { num: Coefficients; den: Coefficients });
    const time = numberAt(read(wanted.tp), {});
    const cell = evaluateCell(`
final((${H})/s)
x = response((${H})/s) with t = ${time} [s]
slope = response(${H}) with t = ${time} [s]`);
    expect(cell.result('final').value).toBe(Number(wanted.final));
    expect(cell.result('x').value).toBeCloseTo(numberAt(read(wanted.peak), {}), 9);
    expect(cell.result('slope').value).toBeCloseTo(0, 9);
  });
});

describe('gains by coefficient matching in a worksheet agree with published ones', () => {
  test.each(published(kind('place')))('%s', (_, { given, expect: wanted }) => {
    const [a0, a1, a2] = (given.A as readonly (readonly number[])[])[2];
    const poles = (given.poles as readonly (readonly number[])[]).map(
      ([re, im]) => `(s - (${re}) - (${im}) j)`,
    );
    const cell = evaluateCell(`
loop plant driven by r
  x''' = (${a0})*x + (${a1})*x' + (${a2})*x'' + u
  u = -k1 x - k2 x' - k3 x'' + r
k1, k2, k3 are real
match(characteristic(plant), ${poles.join(' ')}, k1, k2, k3)`);
    expect(cell.problems).toEqual([]);
    const { items } = cell.result('match').parts as { items: readonly { value: number }[] };
    expect(items.map(({ value }) => String(value))).toEqual((wanted.K as readonly string[][])[0]);
  });
});

describe('a loop with dead time is judged as published', () => {
  test.each(published(kind('delay_range')))('%s', (_, { given, expect: wanted }) => {
    const verdict = (k: number) =>
      evaluateCell(`
k is ${k}
L is ${given.L} s
loop a driven by r
  y' = (${given.pole})*y + k delay(L) (r - y)
stable(a)`).result('stable').value;
    const [lower, upper] = [Number(wanted.lower), Number(wanted.upper)];
    expect([0.999 * lower, 1.001 * lower, 0.999 * upper, 1.001 * upper].map(verdict)).toEqual([
      false,
      true,
      true,
      false,
    ]);
  });
});
