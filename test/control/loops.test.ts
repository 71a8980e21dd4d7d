import { describe, expect, test } from 'vitest';
import {
  addRatios,
  dependsOn,
  determinant,
  divRatios,
  equalPolynomials,
  equalRatios,
  evaluateRatio,
  fractionOfRatio,
  isZeroRatio,
  laplace,
  mulRatios,
  polynomialKey,
  rational,
  ratioOfFraction,
  ratioFromPolynomial,
  ratioFromRational,
  zeroPolynomial,
  zeroRatio,
  type Ratio,
} from '../../src/algebra/index.ts';
import { InvariantError, isRefusal } from '../../src/base/index.ts';
import { certify } from '../../src/control/certificate.ts';
import {
  blocksOf,
  closeLoop,
  hiddenModesNote,
  openedAt,
  propernessOf,
  transferFunction,
  type ClosedLoop,
  type LoopRow,
} from '../../src/control/index.ts';
import { randomInteger, seededRandom } from '../../src/numeric/index.ts';
import { equation, found, polynomialOf, read } from './formulas.ts';

const C = 'Kp + Ki/s + Kd*s';

/** A dish driven through a three-term controller: J θ'' + b θ' = T + w, T = C (r − θ − n), e = r − θ. */
function dish(): ClosedLoop {
  return found(
    closeLoop(
      [
        equation({ theta: 'J*s^2 + b*s', T: '0-1', w: '0-1' }),
        equation({ T: 1, r: `0-(${C})`, theta: C, n: C }),
        equation({ e: 1, r: '0-1', theta: 1 }),
      ],
      ['theta', 'T', 'e'],
      ['r', 'w', 'n'],
    ),
  );
}

describe('a dish under three-term control', () => {
  const loop = dish();

  test('its characteristic polynomial is that of the equations', () => {
    const wanted = polynomialOf('J*s^3 + (b + Kd)*s^2 + Kp*s + Ki');
    expect(polynomialKey(loop.characteristic)).toBe(polynomialKey(wanted));
  });

  test('the error is a block of its own behind the feedback', () => {
    expect(loop.blocks.map((b) => b.signals)).toEqual([['theta', 'T'], ['e']]);
    expect(blocksOf(loop, 'theta').map((b) => b.signals)).toEqual([['theta', 'T']]);
    expect(blocksOf(loop, 'e')).toHaveLength(2);
  });

  test('the error under a torque is -s/characteristic', () => {
    const transfer = found(transferFunction(loop, 'w', 'e'));
    expect(transfer.ratio).toEqual(read('(0-s)/(J*s^3 + (b + Kd)*s^2 + Kp*s + Ki)'));
    expect(transfer.hidden).toBeNull();
  });

  test('opened at the torque its gain is C over the plant', () => {
    expect(found(openedAt(loop, 'T', 1)).ratio).toEqual(read(`(${C})/(J*s^2 + b*s)`));
  });

  test('opened at the angle it has the same gain', () => {
    // J θ'' + b θ' is not a left side `theta = …`; written so, the gain is the same.
    const rows = [equation({ theta: 1, T: '0-1/(J*s^2 + b*s)' }), ...dish().rows.slice(1)];
    const other = found(closeLoop(rows, loop.unknowns, loop.inputs));
    expect(found(openedAt(other, 'theta', 0)).ratio).toEqual(read(`(${C})/(J*s^2 + b*s)`));
  });

  test('names that it does not have are refused', () => {
    expect(transferFunction(loop, 'v', 'e')).toMatchObject({
      reason: 'v is not an input of the loop',
    });
    expect(transferFunction(loop, 'w', 'x')).toMatchObject({
      reason: 'x is not a signal of the loop',
    });
  });
});

describe('hidden modes', () => {
  /** y = G u, u = C (r − y) with the plant's pole at s = 1 cancelled by the controller. */
  const loop = found(
    closeLoop(
      [
        equation({ y: 1, u: '0-1/(s - 1)' }),
        equation({ u: 1, r: '0-(s - 1)/(s + 2)', y: '(s - 1)/(s + 2)' }),
      ],
      ['y', 'u'],
      ['r'],
    ),
  );

  test('a cancelled unstable pole stays in the characteristic polynomial', () => {
    expect(polynomialKey(loop.characteristic)).toBe(polynomialKey(polynomialOf('(s - 1)*(s + 3)')));
  });

  test('the transfer function says that it hides it', () => {
    const transfer = found(transferFunction(loop, 'r', 'y'));
    expect(transfer.ratio).toEqual(read('1/(s + 3)'));
    expect(transfer.hidden).toEqual(polynomialOf('s - 1'));
    expect(hiddenModesNote(loop, transfer)).toBe('hides a mode at s = 1');
  });

  test('an integration behind the loop is hidden from it but did not cancel', () => {
    const behind = found(
      closeLoop(
        [equation({ y: 's + 2', r: '0-1' }), equation({ p: 's', y: '0-1' })],
        ['y', 'p'],
        ['r'],
      ),
    );
    const transfer = found(transferFunction(behind, 'r', 'y'));
    expect(transfer.hidden).toEqual(polynomialOf('s'));
    expect(transfer.cancelled).toBeNull();
    expect(hiddenModesNote(behind, transfer)).toBeNull();
    expect(blocksOf(behind, 'y')).toHaveLength(1);
  });
});

describe('loops that determine nothing', () => {
  test('an equation too few names the signals', () => {
    const answer = closeLoop([equation({ x: 1, y: 1, r: 1 })], ['x', 'y', 'z'], ['r']);
    expect(answer).toMatchObject({
      code: 'structurally-singular',
      reason: 'x, y and z need 3 equations, but only equation 1 holds them',
    });
  });

  test('two equations for one signal are named', () => {
    const answer = closeLoop(
      [equation({ x: 1, r: 1 }), equation({ x: 2, r: 1 }), equation({ y: 1, z: 1 })],
      ['x', 'y', 'z'],
      ['r'],
    );
    expect(answer).toMatchObject({
      code: 'structurally-singular',
      reason:
        'y and z need 2 equations, but only equation 3 holds them; equations 1 and 2 are too many for x alone',
    });
  });

  test('an algebraic loop of gain −1 is singular', () => {
    const answer = closeLoop(
      [equation({ e: 1, y: 1, r: '0-1' }), equation({ y: 1, e: 1 })],
      ['e', 'y'],
      ['r'],
    );
    expect(answer).toMatchObject({
      code: 'singular-loop',
      reason: 'equations 1 and 2 do not determine e and y: their determinant is zero for every s',
    });
  });
});

test('a clearing factor without s is divided out, a factor of s never', () => {
  const loop = found(
    closeLoop(
      [equation({ y: '1/(m*s)', u: '0-1/m' }), equation({ u: '1/s', r: 1 })],
      ['y', 'u'],
      ['r'],
    ),
  );
  expect(loop.blocks.map((b) => polynomialKey(b.polynomial))).toEqual([
    polynomialKey(polynomialOf('1')),
    polynomialKey(polynomialOf('1')),
  ]);
  const derivative = found(closeLoop([equation({ y: 's', u: '0-s' })], ['y'], ['u']));
  expect(derivative.characteristic).toEqual(polynomialOf('s'));
});

test.each([
  ['1/(s + 1)', 'strictly proper'],
  ['s/(s + 1)', 'proper'],
  ['s^2/(s + 1)', 'improper'],
  ['0', 'strictly proper'],
  ['exp(0-s*Td)/(s + 1)', 'strictly proper'],
])('%s is %s', (text, properness) => {
  expect(propernessOf(read(text))).toBe(properness);
});

type Random = () => number;

function randomCoefficient(random: Random): string {
  const c = (): string => `(${randomInteger(random, -5, 5)})`.replace('(-', '(0-');
  const forms = [
    () => c(),
    () => `${c()}*s + ${c()}`,
    () => `a*s + ${c()}`,
    () => `${c()}/(s + ${randomInteger(random, 0, 3)})`,
    () => `(k*s + ${c()})/(s*(s + 1))`,
    () => `(s - 1)*${c()}/(s + 2)`,
  ];
  return forms[randomInteger(random, 0, forms.length - 1)]();
}

function randomRows(random: Random, size: number): LoopRow[] {
  return Array.from({ length: size }, (_, i) => {
    const coefficients: Record<string, string> = {};
    for (let k = 0; k < size; k++) {
      if (k === i || random() < 0.3) coefficients[`x${k}`] = randomCoefficient(random);
    }
    if (random() < 0.5 || i === 0) coefficients.u = randomCoefficient(random);
    return equation(coefficients);
  });
}

const at = (r: Ratio, point: Readonly<Record<string, ReturnType<typeof rational>>>) =>
  evaluateRatio(r, (g) => point[g.name]);

describe('against the raw equations', () => {
  test('solutions satisfy every equation at random rational points, 2 to 8 signals', () => {
    const random = seededRandom(31);
    const seen = { solved: 0, checks: 0, refused: 0, hidden: 0 };
    for (let round = 0; round < 150; round++) {
      const size = 2 + (round % 7);
      const unknowns = Array.from({ length: size }, (_, k) => `x${k}`);
      const rows = randomRows(random, size);
      const loop = closeLoop(rows, unknowns, ['u']);
      if (isRefusal(loop)) {
        seen.refused += 1;
        continue;
      }
      seen.solved += 1;
      const transfers = new Map<string, Ratio>([['u', read(1)]]);
      for (const x of unknowns) {
        const transfer = found(transferFunction(loop, 'u', x));
        if (transfer.hidden) seen.hidden += 1;
        transfers.set(x, transfer.ratio);
      }
      for (let i = 0; i < 4; i++) {
        const value = (): ReturnType<typeof rational> =>
          rational(randomInteger(random, -40, 40), randomInteger(random, 1, 9));
        const point = { s: value(), a: value(), k: value() };
        for (const row of rows) {
          const terms = [...row.coefficients].map(
            ([name, c]) =>
              [at(ratioOfFraction(c), point), at(transfers.get(name)!, point)] as const,
          );
          if (terms.some(([c, x]) => isRefusal(c) || isRefusal(x))) continue;
          const sum = terms.reduce((total, [c, x]) => {
            const [left, right] = [found(c), found(x)];
            return addRatios(total, mulRatios(ratioFromRational(left), ratioFromRational(right)));
          }, zeroRatio);
          expect(isZeroRatio(sum)).toBe(true);
          seen.checks += 1;
        }
      }
    }
    expect(seen.solved).toBeGreaterThan(100);
    expect(seen.checks).toBeGreaterThan(2000);
    expect(seen.hidden).toBeGreaterThan(20);
  });

  test('the product of the blocks is the determinant of all cleared rows up to a factor free of s', () => {
    const random = seededRandom(8);
    for (let round = 0; round < 40; round++) {
      const size = 2 + (round % 4);
      const unknowns = Array.from({ length: size }, (_, k) => `x${k}`);
      const loop = closeLoop(randomRows(random, size), unknowns, ['u']);
      if (isRefusal(loop)) continue;
      const matrix = loop.cleared.map((row) =>
        unknowns.map((x) => row.coefficients.get(x) ?? zeroPolynomial),
      );
      const factor = divRatios(
        ratioFromPolynomial(determinant(matrix)),
        ratioFromPolynomial(loop.characteristic),
      );
      expect(dependsOn(factor, laplace)).toBe(false);
    }
  });

  test('1 + L vanishes where the characteristic polynomial does', () => {
    const random = seededRandom(77);
    let checked = 0;
    for (let round = 0; round < 40; round++) {
      const rows = [
        equation({ y: 1, u: `0-1/(s + ${randomInteger(random, 1, 4)})` }),
        equation({ u: 1, y: `(K + ${randomInteger(random, 1, 5)}/s)`, r: '0-1' }),
      ];
      const loop = found(closeLoop(rows, ['y', 'u'], ['r']));
      for (const [name, row] of [
        ['y', 0],
        ['u', 1],
      ] as const) {
        const gain = found(openedAt(loop, name, row));
        const onePlus = addRatios(read(1), gain.ratio);
        expect(equalPolynomials(onePlus.num, loop.characteristic)).toBe(true);
        checked += 1;
      }
    }
    expect(checked).toBe(80);
  });
});

test('a solution that does not satisfy its equation is taken for our bug', () => {
  const row = equation({ y: 's + a', r: '0-b' });
  certify(
    row,
    new Map([
      ['r', read(1)],
      ['y', read('b/(s + a)')],
    ]),
  );
  expect(() =>
    certify(
      row,
      new Map([
        ['r', read(1)],
        ['y', read('b/(s - a)')],
      ]),
    ),
  ).toThrow(InvariantError);
});

test('dead time in a loop stays an exact function of s', () => {
  const loop = found(
    closeLoop(
      [equation({ y: 's + 1', u: '0-exp(0-s*Td)' }), equation({ u: 1, y: 'K', r: '0-K' })],
      ['y', 'u'],
      ['r'],
    ),
  );
  const transfer = found(transferFunction(loop, 'r', 'y'));
  expect(equalRatios(transfer.ratio, read('K*exp(0-s*Td)/(s + 1 + K*exp(0-s*Td))'))).toBe(true);
  expect(fractionOfRatio(transfer.ratio).den).toEqual(loop.characteristic);
});
