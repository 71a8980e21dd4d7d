import { describe, expect, test } from 'vitest';
import {
  divRatios,
  isZeroRatio,
  mulRatios,
  negFraction,
  oneFraction,
  powRatio,
  ratioKey,
  type Fraction,
  type Ratio,
} from '../../src/algebra/index.ts';
import {
  blocksOf,
  closeLoop,
  conditionKey,
  dcGain,
  errorConstants,
  finalValue,
  initialValue,
  openedAt,
  polesOf,
  systemType,
  transferFunction,
  zerosOf,
  type ClosedLoop,
  type SignalValue,
  type SourceKind,
} from '../../src/control/index.ts';
import { randomInteger, seededRandom, timeResponse } from '../../src/numeric/index.ts';
import {
  equation,
  found,
  numberAt,
  numbersOf,
  polynomialOf,
  positive,
  quotient,
  read,
  signal,
  unknown,
} from './formulas.ts';
import { published } from './published-cases.ts';

interface Polynomials {
  readonly num: readonly number[];
  readonly den: readonly number[];
}

/** e = r − y, u = C (r − H y), y = G (u + d), with nothing cancelled. */
function servo(
  c: Polynomials,
  g: Polynomials,
  h: Polynomials = { num: [1], den: [1] },
): ClosedLoop {
  const fraction = (f: Polynomials): Fraction => ({
    num: quotient({ num: f.num, den: [1] }).num,
    den: quotient({ num: f.den, den: [1] }).num,
  });
  const [controller, plant, sensor] = [c, g, h].map(fraction);
  const minus = negFraction;
  const rows = [
    { e: oneFraction, r: minus(oneFraction), y: oneFraction },
    { m: oneFraction, r: minus(oneFraction), y: sensor },
    { u: oneFraction, m: minus(controller) },
    { y: oneFraction, u: minus(plant), d: minus(plant) },
  ].map((row) => ({ coefficients: new Map<string, Fraction>(Object.entries(row)) }));
  return found(closeLoop(rows, ['e', 'm', 'u', 'y'], ['r', 'd']));
}

const SOURCES: Readonly<Record<string, { kind: SourceKind; power: number }>> = {
  step: { kind: 'constant', power: 1 },
  ramp: { kind: 'drifting', power: 2 },
  parabola: { kind: 'drifting', power: 3 },
};

function signalUnder(
  loop: ClosedLoop,
  name: string,
  input: string,
  source: string,
  size: string | number = 1,
): SignalValue {
  const { kind, power } = SOURCES[source];
  const transfer = found(transferFunction(loop, input, name));
  const transform = mulRatios(transfer.ratio, divRatios(read(size), powRatio(read('s'), power)));
  return signal([{ input, source: kind, transform }], blocksOf(loop, name));
}

type Wanted = Readonly<Record<string, string | number | readonly string[]>>;

describe('published steady errors', () => {
  const cases = published((c) => c.kind === 'sse');

  test.each(cases)('%s', (_, { given, expect: wanted }) => {
    const { C, G, H, inputs } = given as unknown as {
      C: Polynomials;
      G: Polynomials;
      H?: Polynomials;
      inputs: [string, string, number][];
    };
    const loop = servo(C, G, H);
    const errors = (wanted as unknown as { e: string[] }).e;
    inputs.forEach(([input, source, size], i) => {
      const value = finalValue(signalUnder(loop, 'e', input, source, size), unknown);
      const shown =
        value.kind === 'formula'
          ? ratioKey(value.ratio)
          : value.growth
            ? isNegative(value.growth.rate)
              ? '-oo'
              : 'oo'
            : 'undefined';
      const symbol = ['oo', '-oo', 'undefined'].includes(errors[i]);
      expect(shown).toBe(symbol ? errors[i] : ratioKey(read(`0+${errors[i]}`)));
    });
  });

  test.each(cases.filter(([, c]) => 'type' in c.expect))('type and constants: %s', (_, c) => {
    const { C, G } = c.given as unknown as { C: Polynomials; G: Polynomials };
    const wanted = c.expect as unknown as Wanted;
    const gain = found(openedAt(servo(C, G), 'u', 2)).ratio;
    expect(found(systemType(gain)).type).toBe(wanted.type);
    const constants = found(errorConstants(gain));
    const names = { Kp: 'position', Kv: 'velocity', Ka: 'acceleration' } as const;
    for (const [name, key] of Object.entries(names)) {
      const value = constants[key];
      if (!(name in wanted)) continue;
      expect(value.kind === 'formula' && ratioKey(value.ratio)).toBe(
        ratioKey(read(String(wanted[name]))),
      );
    }
  });
});

const isNegative = (r: Ratio): boolean => numberAt(r, {}) < 0;

describe('the dish in symbols', () => {
  const rows = (controller: string) => [
    equation({ theta: 'J*s^2 + b*s', T: '0-1', w: '0-1' }),
    equation({ T: 1, r: `0-(${controller})`, theta: controller }),
    equation({ e: 1, r: '0-1', theta: 1 }),
  ];
  const loop = (controller: string): ClosedLoop =>
    found(closeLoop(rows(controller), ['theta', 'T', 'e'], ['r', 'w']));

  test('under two-term control a steady torque leaves -Tw/Kp', () => {
    const value = finalValue(signalUnder(loop('Kp + Kd*s'), 'e', 'w', 'step', 'Tw'), positive);
    expect(value).toMatchObject({ kind: 'formula', ratio: read('0-Tw/Kp') });
    expect(conditionKey(value.when)).toBe('true');
  });

  test('the integral leaves nothing, where the loop is stable', () => {
    const value = finalValue(
      signalUnder(loop('Kp + Ki/s + Kd*s'), 'e', 'w', 'step', 'Tw'),
      positive,
    );
    expect(value).toMatchObject({ kind: 'formula', ratio: read('0') });
    expect(value.when).toMatchObject({
      kind: 'stable',
      blocks: [{ signals: ['theta', 'T'], polynomial: polynomialOf('J*s^3+(b+Kd)*s^2+Kp*s+Ki') }],
    });
  });

  test('a ramp of torque against two terms grows, with its rate', () => {
    const value = finalValue(signalUnder(loop('Kp + Kd*s'), 'e', 'w', 'ramp', 'R'), positive);
    expect(value).toMatchObject({
      kind: 'none',
      reason: 'grows without bound, as t',
      growth: { rate: read('0-R/Kp'), power: 1 },
    });
  });

  test('a ramp that stops growing leaves a value: two opposite ramps, one later', () => {
    const { ratio } = found(transferFunction(loop('Kp + Kd*s'), 'w', 'e'));
    const ramp = (sign: string, after: string) => ({
      source: 'drifting' as const,
      transform: mulRatios(ratio, read(`${sign}R/s^2`)),
      after: read(after),
    });
    const x = signal([ramp('', '0'), ramp('0-', 'T0')], blocksOf(loop('Kp + Kd*s'), 'e'));
    expect(finalValue(x, positive)).toMatchObject({ kind: 'formula', ratio: read('0-R*T0/Kp') });
  });

  test('without damping there is no final value for any gains', () => {
    const undamped = found(
      closeLoop([equation({ theta: 'J*s^2 + Kp', w: '0-1' })], ['theta'], ['w']),
    );
    expect(finalValue(signalUnder(undamped, 'theta', 'w', 'step', 'Tw'), positive)).toMatchObject({
      kind: 'none',
      reason:
        'the part of the loop with theta has poles on or right of the imaginary axis for all values (its term in s^1 is missing)',
    });
  });
});

describe('existence comes first', () => {
  const first = (den: string, transform: string, source: SourceKind = 'constant') =>
    finalValue(
      signal(
        [{ transform: read(transform), source }],
        [{ signals: ['x', 'y'], polynomial: polynomialOf(den) }],
      ),
      unknown,
    );

  test('a pole in the right half plane is named with its place', () => {
    expect(first('s - 2', '1/(s*(s - 2))')).toMatchObject({
      reason: 'the part of the loop with x and y has a pole at s = 2 in the right half plane',
    });
  });

  test('poles on the axis are named with their place', () => {
    expect(first('s^2 + 10', '1/(s*(s^2 + 10))')).toMatchObject({
      reason: 'the part of the loop with x and y has poles at s = ± 3.16 j on the imaginary axis',
    });
  });

  test('a hidden unstable mode leaves no value although the transform settles', () => {
    expect(first('(s - 1)*(s + 3)', '1/(s*(s + 3))')).toMatchObject({
      reason: 'the part of the loop with x and y has a pole at s = 1 in the right half plane',
    });
  });

  test('a hidden mode at the origin leaves no value', () => {
    expect(first('s*(s + 3)', '1/(s*(s + 3))')).toMatchObject({
      reason: 'the part of the loop with x and y hides a mode at s = 0, which does not decay',
    });
  });

  test('an impulse through one integration leaves a value', () => {
    expect(first('s*(s + 3)', '6/(s*(s + 3))', 'impulsive')).toMatchObject({ ratio: read('2') });
  });

  test('a sine keeps a signal moving', () => {
    expect(first('s + 3', '1/((s + 3)*(s^2 + 4))', 'periodic')).toMatchObject({
      reason: 'the sine in w keeps it moving',
    });
  });

  test('a sine whose frequency is blocked does not', () => {
    expect(first('s + 3', '1/(s + 3)', 'periodic')).toMatchObject({ ratio: read('0') });
  });

  test('noise has no final value', () => {
    expect(first('s + 3', '1/(s + 3)', 'random')).toMatchObject({
      reason: 'the noise in w keeps it moving; constant(…) leaves it out',
    });
  });

  test('a formula in s is judged on its own poles', () => {
    expect(
      finalValue(signal([{ input: '', transform: read('1/(s*(s - 1))') }]), unknown),
    ).toMatchObject({
      reason: 'the transform has a pole at s = 1 in the right half plane',
    });
    expect(finalValue(signal([{ transform: read('1/(s*(s + a))') }]), positive)).toMatchObject({
      ratio: read('1/a'),
    });
  });

  test('a dead time counts in the expansion at s = 0', () => {
    const x = signal([{ transform: read('(1 - exp(0-s*Td))/s^2') }]);
    expect(finalValue(x, positive)).toMatchObject({ kind: 'formula', ratio: read('Td') });
  });
});

describe('initial values', () => {
  test.each([
    ['1/(s + 2)', '1'],
    ['(3*s + 1)/(s*(s + 2))', '3'],
    ['a/(s*(s + 2))', '0'],
  ])('%s starts at %s', (transform, value) => {
    expect(initialValue(signal([{ transform: read(transform) }]))).toMatchObject({
      ratio: read(value),
    });
  });

  test('an improper transform is an impulse', () => {
    expect(initialValue(signal([{ transform: read('s/(s + 1)') }]))).toMatchObject({
      reason: 'an impulse at t = 0, from w',
    });
  });

  test('what begins later does not count', () => {
    const x = signal([{ transform: read('1/s'), after: read('5') }]);
    expect(initialValue(x)).toMatchObject({ ratio: read('0') });
  });
});

describe('figures of a loop gain', () => {
  test('a pole at the origin makes the gain infinite', () => {
    expect(dcGain(read('1/(s*(s + 1))'))).toMatchObject({ reason: 'infinite: a pole at s = 0' });
    expect(dcGain(read('K/(s + a)'))).toMatchObject({ ratio: read('K/a') });
  });

  test('poles and zeros are those in lowest terms', () => {
    const h = read('(s + 1)/((s + 1)*(s + 2))');
    expect(found(polesOf(h)).polynomial).toEqual(polynomialOf('s + 2'));
    expect(found(zerosOf(read('(s - 3)/(s + 2)'))).polynomial).toEqual(polynomialOf('s - 3'));
  });
});

describe('against simulation', () => {
  test('final values are where the matrix exponential settles', () => {
    const random = seededRandom(5);
    let checked = 0;
    for (let round = 0; round < 250; round++) {
      const c = {
        num: [
          randomInteger(random, 0, 3),
          randomInteger(random, 1, 9),
          randomInteger(random, 0, 4),
        ],
        den: [1, 0],
      };
      const g = {
        num: [randomInteger(random, 1, 5)],
        den: [1, randomInteger(random, 0, 6), randomInteger(random, 0, 6)],
      };
      const loop = servo(c, g);
      const source = ['step', 'ramp', 'parabola'][round % 3];
      const x = signalUnder(loop, 'e', round % 2 === 0 ? 'r' : 'd', source, 2);
      const value = finalValue(x, unknown);
      const { num, den } = numbersOf(x.terms[0].transform);
      if (isZeroRatio(x.terms[0].transform)) continue;
      const late = timeResponse(num, den, { kind: 'impulse', size: 1 }, 40, 11);
      if ('kind' in late && late.kind === 'refusal') continue;
      const samples = late as Float64Array;
      if (value.kind === 'formula') {
        const wanted = numberAt(value.ratio, {});
        const slow = Math.abs(samples[10] - samples[9]);
        expect(Math.abs(samples[10] - wanted)).toBeLessThan(1e-6 + 30 * slow);
        checked += 1;
      } else if (value.growth) {
        const predicted =
          (numberAt(value.growth.rate, {}) * 400 ** value.growth.power) /
          (value.growth.power === 2 ? 2 : 1);
        expect(samples[10] / predicted).toBeGreaterThan(0.5);
        expect(samples[10] / predicted).toBeLessThan(2);
        checked += 1;
      }
    }
    expect(checked).toBeGreaterThan(80);
  });

  test('signals without a final value do not settle', () => {
    const random = seededRandom(6);
    let unsettled = 0;
    for (let round = 0; round < 120; round++) {
      const g = { num: [1], den: [1, randomInteger(random, -1, 1), randomInteger(random, -2, 4)] };
      const x = signalUnder(
        servo({ num: [randomInteger(random, 1, 4)], den: [1] }, g),
        'y',
        'r',
        'step',
      );
      const value = finalValue(x, unknown);
      if (value.kind === 'formula' || isZeroRatio(x.terms[0].transform)) continue;
      const { num, den } = numbersOf(x.terms[0].transform);
      const samples = timeResponse(
        num,
        den,
        { kind: 'impulse', size: 1 },
        0.37,
        400,
      ) as Float64Array;
      const tail = samples.slice(-40);
      const spread = Math.max(...tail) - Math.min(...tail);
      expect(spread).toBeGreaterThan(1e-3);
      unsettled += 1;
    }
    expect(unsettled).toBeGreaterThan(30);
  });
});
