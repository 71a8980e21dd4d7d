import { describe, expect, test } from 'vitest';
import type { Quantity, Statement, ToleranceClause } from '../../src/language/index.ts';
import { readCell, shapeOf } from './shape.ts';

function quantity({ text, unit }: Quantity): string {
  return `${text}|${unit}`;
}

function tolerance(clause: ToleranceClause | null): string {
  if (!clause) return '';
  if (clause.kind === 'range') return ` from ${quantity(clause.from)} to ${quantity(clause.to)}`;
  return ` ± ${quantity(clause.half)}${clause.sigmas ? ` at ${clause.sigmas}` : ''}`;
}

function names(list: readonly { readonly name: string }[]): string {
  return list.map(({ name }) => name).join(' ');
}

/** What a statement says, in one line. */
function said(node: Statement): string {
  switch (node.kind) {
    case 'assumption':
      return `${node.name} is ${quantity(node.value)}${tolerance(node.tolerance)}`;
    case 'unit':
      return `unit ${node.name} is ${quantity(node.value)}`;
    case 'sign':
      return `${names(node.names)} ${node.sign}`;
    case 'has-unit':
      return `${names(node.names)} has ${node.unit}`;
    case 'tune':
      return `tune ${node.name} ${quantity(node.from)} ${quantity(node.to)}`;
    case 'points':
      return `points ${names(node.points)}: ${node.assumptions.map((a) => `${a.name} ${a.values.map(quantity).join(' ')}${tolerance(a.tolerance)}${a.comment ? ` # ${a.comment}` : ''}`).join('; ')}`;
    case 'definition':
      return `${node.name} = ${shapeOf(node.formula)}`;
    case 'formula':
      return shapeOf(node.formula);
    case 'loop':
      return `loop ${node.name} by ${names(node.inputs)}: ${[
        ...node.uses.map((use) => `uses ${use.loop.name} ${use.prefix?.name}`),
        ...node.equations.map(({ left, right }) => `${shapeOf(left)} = ${shapeOf(right)}`),
      ].join('; ')}`;
    case 'case':
      return `case ${node.name} of ${node.loop.name}: ${[
        ...node.inputs.map(
          (line) =>
            `${line.input.name}${line.order} = ${line.sources.map((term) => `${term.sign} ${shapeOf(term.source)}${term.after ? ` after ${shapeOf(term.after)}` : ''}`).join(', ')}`,
        ),
        ...node.starts.map(
          (line) => `${shapeOf(line.signal)}${line.order} at ${shapeOf(line.value)}`,
        ),
      ].join('; ')}`;
    case 'require':
      return `require ${shapeOf(node.condition)}${node.band ? ` for ${node.band.variable.name} ${shapeOf(node.band.from)} ${shapeOf(node.band.to)}` : ''}`;
    case 'draw':
      return `draw ${node.figure} ${node.of.map(shapeOf).join(' ')} | ${Object.entries({
        where: node.where.map(shapeOf).join(' '),
        over: node.over && shapeOf(node.over),
        from: node.from && shapeOf(node.from),
        to: node.to && shapeOf(node.to),
        for: node.for?.name,
        title: node.title,
      })
        .filter(([, value]) => value)
        .map(([key, value]) => `${key} ${value}`)
        .join(' | ')}`;
    case 'explain':
      return `explain ${shapeOf(node.formula)}`;
    case 'tabulate':
      return `tabulate ${node.columns.map(shapeOf).join(' ')} ${node.for.map((study) => `for ${study.name.name} ${study.by} ${study.values.map(shapeOf).join(' ')}${study.steps ? ` / ${study.steps}` : ''}`).join(' ')}`;
    case 'broken':
      return 'broken';
  }
}

describe('a statement', () => {
  test.each([
    ['J is 480 kg m^2', 'J is 480|kg m^2'],
    ['J is 480 kg m^2 ± 8 %', 'J is 480|kg m^2 ± 8|%'],
    ['J is 480 kg m^2 +- 12 kg m^2', 'J is 480|kg m^2 ± 12|kg m^2'],
    ['J is 480 ± 20 kg m^2', 'J is 480| ± 20|kg m^2'],
    ['J is 480 kg m^2 ± 8 % at 3 sigma', 'J is 480|kg m^2 ± 8|% at 3'],
    ['Tw is 260 N m from 0 to 400 N m', 'Tw is 260|N m from 0| to 400|N m'],
    ['x is -5 °C ± 2 K', 'x is -5|°C ± 2|K'],
    ['x is 25 1/s', 'x is 25|1/s'],
    ['x is 4e-12 rad^2/Hz', 'x is 4e-12|rad^2/Hz'],
    ['x is 3 µrad/√Hz', 'x is 3|µrad/√Hz'],
    ['x is 2 N·m^-1 (kg s)^2', 'x is 2|N·m^-1 (kg s)^2'],
    ['x is 45°', 'x is 45|°'],
    ['x is −3', 'x is -3|'],
    ['x is 2 nounit', 'x is 2|nounit'],
    ['theta_0 is 2 mrad', 'θ_0 is 2|mrad'],
    ['J, Kp are positive', 'J Kp positive'],
    ['J is real', 'J real'],
    ['q has unit N/m', 'q has N/m'],
    ['tune Kp from -1 to 20 kN m/rad', 'tune Kp -1| 20|kN m/rad'],
    ['unit count is 1.2 µrad', 'unit count is 1.2|µrad'],
    [
      'points empty, full\n  m is 12, 48 kg ± 2 % # mass',
      'points empty full: m 12| 48|kg ± 2|% # mass',
    ],
    ['x = a + b', 'x = (+ a b)'],
    ['x = final(constant(storm.e)) in mrad', 'x = (in (final! (constant! storm.e)) mrad)'],
    ['x = rows(1, 2 |\n  3, 4)', 'x = (rows! (rows 1 2 | 3 4))'],
    ['abs(x) <= 2', '(<= (abs! x) 2)'],
    ['Kp > J Ki/Kd', '(> Kp (* J Ki /Kd))'],
    [
      "loop az driven by r, w\n  J theta'' + c (theta - x)' = T + w\n  uses stage as p\n  T = C(s) (r - p.theta)\n  uses base",
      'loop az by r w: uses stage p; uses base undefined; (+ (* J (d2 θ)) (* c (d1 (+ θ (- x))))) = (+ T w); T = (* C s (+ r (- p.θ)))',
    ],
    [
      "case storm of az\n  w = step(2 N) - 2 ramp(R) after 5 s + noise(Sw) after T1 + 1\n  xb'' = noise(Sa)\n  theta starts at 3 mrad\n  theta' starts at 2 w",
      'case storm of az: w0 = 1 (step! [2 N]), -1 (* 2 (ramp! R)) after [5 s], 1 (noise! Sw) after T1, 1 1; xb2 = 1 (noise! Sa); θ0 at [3 mrad]; θ1 at (* 2 w)',
    ],
    ['require abs(x) <= 0.2 mrad', 'require (<= (abs! x) [0.2 mrad])'],
    [
      "require density(storm.x'', f) <= 1e-8 m^2/(s^4 Hz) for f from 5 Hz to 200 Hz",
      'require (<= (density! (d2 storm.x) f) [1e-8 m^2/(s^4 Hz)]) for f [5 Hz] [200 Hz]',
    ],
    ['require x <= mask("file.csv")', 'require (<= x (mask! "file.csv"))'],
    [
      'draw region of Kp, Ki where stable(az), phase_margin(L) >= 45 deg titled "gains"',
      'draw region Kp Ki | where (stable! az) (>= (phase_margin! L) [45 deg]) | title gains',
    ],
    ['draw response of storm.e, y over 20 s', 'draw response storm.e y | over [20 s]'],
    ['draw frequency of H from 0.1 Hz to 100 Hz', 'draw frequency H | from [0.1 Hz] | to [100 Hz]'],
    ['draw roots of az for Kp from a to 2 b', 'draw roots az | from a | to (* 2 b) | for Kp'],
    ['explain x in mm', 'explain (in x mm)'],
    ['tabulate x, y for Kp is 8, 9, 10 kN m/rad', 'tabulate x y for Kp is 8 9 [10 kN m/rad]'],
    ['tabulate x for Kp from 1 to 2 kN, 12 steps', 'tabulate x for Kp range 1 [2 kN] / 12'],
    ['tabulate x for C = C1, C2', 'tabulate x for C = C1 C2'],
  ])('%s says %s', (text, meaning) => {
    const [statement, ...others] = readCell(text);
    expect(others).toEqual([]);
    expect(statement!.problems).toEqual([]);
    expect(said(statement!.node)).toBe(meaning);
  });

  test('keeps the readable lines of its block beside one that is not', () => {
    const [loop] = readCell('loop az driven by r\n  a = r +\n  b = 2 r');
    expect(said(loop!.node)).toBe('loop az by r: b = (* 2 r)');
    expect(loop!.problems).toHaveLength(1);
  });

  test('that is broken still tells what it would have defined', () => {
    const nodes = readCell('x = (\ny is\nC(s) = 2').map(({ node }) => node);
    expect(nodes).toMatchObject([
      { kind: 'broken', name: 'x' },
      { kind: 'broken', name: 'y' },
      { kind: 'broken', name: 'C' },
    ]);
  });

  test('never takes its neighbours down', () => {
    const nodes = readCell('a = 1\nb = ((2 +\nc = 3\nd is is\n"e\nf = 4');
    expect(nodes.map(({ node }) => said(node))).toEqual([
      'a = 1',
      'broken',
      'c = 3',
      'broken',
      'broken',
      'f = 4',
    ]);
  });

  test('has its comment, which quotes do not begin', () => {
    const comments = readCell(
      'a is 1 # mass # of all\nb = "x # y"\nc = 2 +\n  # alone\n  3 # end\nloop d\n  e = f # inner',
    ).map(({ node }) => node.comment);
    expect(comments).toEqual(['mass # of all', null, 'end', null]);
  });

  test('is frozen all the way down', () => {
    const { node } = readCell('x = a + b')[0]!;
    expect(Object.isFrozen(node)).toBe(true);
    expect(node.kind === 'definition' && Object.isFrozen(node.formula.span)).toBe(true);
  });
});

describe('a name before a bracket', () => {
  test.each([
    ['loop K', '(K! (+ r (- 1)))'],
    ['K = 2', '(* K (+ r (- 1)))'],
    ['K is 2', '(* K (+ r (- 1)))'],
    ['K is positive', '(* K (+ r (- 1)))'],
    ['sin = 2', '(* K (+ r (- 1)))'],
  ])('is read by what the worksheet says it is, before or after: %s', (line, shape) => {
    const read = (text: string) => readCell(text).map(({ node }) => said(node));
    expect(read(`${line}\nK(r - 1)`)[1]).toBe(shape);
    expect(read(`K(r - 1)\n${line}`)[0]).toBe(shape);
  });

  test('that is a worksheet name hides the function of that name', () => {
    expect(readCell('gain is 3\ny = gain (2 + x)').map(({ node }) => said(node))[1]).toBe(
      'y = (* gain (+ 2 x))',
    );
    expect(readCell('y = gain (2 + x)').map(({ node }) => said(node))[0]).toBe(
      'y = (gain! (+ 2 x))',
    );
  });

  test('in a loop is a signal where it stands alone elsewhere, and a misspelt function where it does not', () => {
    const [loop] = readCell('loop a driven by r\n  x = T(r - x)\n  T = dely(2)\n  y = T(s) + z(s)');
    expect(said(loop!.node)).toBe(
      'loop a by r: x = (* T (+ r (- x))); T = (dely! 2); y = (+ (T@ s) (z! s))',
    );
  });
});
