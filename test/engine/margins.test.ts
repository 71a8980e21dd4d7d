import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { evaluateCell } from './worksheet.ts';

interface MarginCase {
  readonly id: string;
  readonly given: {
    readonly num: readonly number[];
    readonly den: readonly number[];
    readonly dead_time_s?: number;
  };
  readonly expect: Readonly<Record<string, number>>;
  readonly tolerance: number;
  readonly source: string;
  readonly how: string;
}

const CASES: readonly MarginCase[] = JSON.parse(
  readFileSync(new URL('../data/margins.json', import.meta.url), 'utf8'),
);

function polynomial(descending: readonly number[]): string {
  return descending.map((c, k) => `(${c}) * s^${descending.length - 1 - k}`).join(' + ');
}

function loopGain({ num, den, dead_time_s: delay }: MarginCase['given']): string {
  const rational = `(${polynomial(num)})/(${polynomial(den)})`;
  return delay === undefined ? rational : `delay(${delay} s) * ${rational}`;
}

interface Crossings {
  readonly crossings: readonly { frequency: number; margin: number; binding: boolean }[];
}

describe('margins agree with published ones', () => {
  test.each(CASES.map((c) => [`${c.id} (${c.source}; ${c.how})`, c] as const))('%s', (_, c) => {
    const cell = evaluateCell(
      `L = ${loopGain(c.given)}\ngm = gain_margin(L)\npm = phase_margin(L)\ndm = delay_margin(L)`,
    );
    const binding = (name: string): number =>
      (cell.result(name).parts as Crossings).crossings.find((x) => x.binding)!.frequency;
    const measured: Readonly<Record<string, () => number>> = {
      gm: () => cell.result('gm').value as number,
      w_gm: () => binding('gm'),
      pm_deg: () => ((cell.result('pm').value as number) * 180) / Math.PI,
      w_pm: () => binding('pm'),
      delay_margin_s: () => cell.result('dm').value as number,
    };
    for (const [key, wanted] of Object.entries(c.expect)) {
      const value = measured[key]();
      expect(Math.abs(value / wanted - 1), key).toBeLessThan(c.tolerance);
    }
  });
});

const LOOPS = `a is 2 1/s ± 10 %
K is 3 1/s
K, a are positive
loop drive driven by r
  y'' + a y' = u
  u = K a (r - y)
L = opened(drive, u)
`;

describe('a margin in a worksheet', () => {
  test('is written so that it is read again', () => {
    const first = evaluateCell(`${LOOPS}phase_margin(L)`);
    const { formula, value } = first.result('phase_margin(L)');
    expect(formula).toBe('phase_margin(a K/(s (s + a)))');
    expect(evaluateCell(`${LOOPS}x = ${formula}`).result('x').value).toBe(value);
  });

  test('goes through arithmetic, with, and spans that are sampled', () => {
    const cell = evaluateCell(
      `${LOOPS}x = 2 phase_margin(L) + 1\np = phase_margin(L)\nz = (phase_margin(L) with K is 6 1/s)`,
    );
    const p = cell.result('p');
    expect(cell.result('x').value).toBeCloseTo(2 * (p.value as number) + 1, 12);
    expect(cell.result('z').value).toBeLessThan(p.value as number);
    expect(p.span).toMatchObject({ how: 'sampled' });
  });

  test('of a closed loop that is not stable has no value, and says why', () => {
    const cell = evaluateCell('x = phase_margin(3/(s (s + 1)^2))\nrequire x >= 30 deg');
    expect(cell.result('x').value).toBeNull();
    expect(cell.result('x').notes).toContain(
      'No value at the nominal: the closed loop (1 + L = 0) is not stable, so that there is no margin.',
    );
    expect(cell.problems).toEqual([]);
    expect(cell.requirement('').verdict).toBe('not met');
  });

  test('that is infinite is no number, and meets a lower limit', () => {
    const cell = evaluateCell(`${LOOPS}x = gain_margin(L)\nrequire gain_margin(L) >= 6 dB`);
    expect(cell.result('x').value).toBeNull();
    expect(cell.result('x').notes[0]).toContain('it is infinite');
    expect(cell.requirement('').verdict).toBe('met');
  });

  test('of a loop that is unstable when opened is downwards', () => {
    const cell = evaluateCell('x = gain_margin(2/(s - 1))');
    expect(cell.result('x').value).toBe(0.5);
    expect(cell.result('x').notes.join(' ')).toContain('The margin is downwards');
  });

  test('of a conditionally stable loop lists both limits', () => {
    const cell = evaluateCell(
      'x = gain_margin(80 (s^2 + 2 s + 4)/(s (s + 4) (s + 6) (s^2 + 1.4 s + 1)))',
    );
    const { crossings } = cell.result('x').parts as Crossings;
    const limits = crossings.map(({ margin }) => 80 * margin).sort((p, q) => p - q);
    expect(limits.map((k) => Math.round(k * 10) / 10)).toEqual([15.6, 67.5, 163.6]);
    expect(cell.result('x').value).toBe(
      Math.max(...crossings.filter((c) => c.margin < 1).map((c) => c.margin)),
    );
    expect(cell.result('x').notes.join(' ')).toContain('conditionally stable');
  });
});

describe('margins of a loop that hides a mode', () => {
  const cell = evaluateCell(`
K is 4
C = K (s - 1)/(s + 2)
G = 1/(s - 1)
G2 = K/(s (s + 2))

loop trap driven by r
  u = C (r - y)
  y = G u

loop good driven by r
  q = G2 (r - z)
  z = q
  x' = z

cancelled = phase_margin(opened(trap, u))
behind = phase_margin(opened(good, q))
require phase_margin(opened(trap, u)) >= 45 deg
`);

  test('have no value where the cancelled mode is unstable, and no number in a requirement', () => {
    expect(cell.result('cancelled').value).toBeNull();
    expect(cell.result('cancelled').notes.join(' ')).toContain('s = 1');
    expect(cell.requirement('phase_margin')).toMatchObject({ verdict: 'not met', nominal: null });
  });

  test('stand where the mode is only behind the loop: 90° − atan(wc/2) at wc² = √20 − 2', () => {
    // |K/(jw (jw + 2))| = 1 for w² (w² + 4) = 16: w² = √20 − 2.
    const crossover = Math.sqrt(Math.sqrt(20) - 2);
    const expected = Math.PI / 2 - Math.atan(crossover / 2);
    expect(cell.result('behind').value).toBeCloseTo(expected, 9);
  });
});
