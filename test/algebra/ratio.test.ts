import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { isRefusal, type Refusal } from '../../src/base/index.ts';
import {
  addRatios,
  addRational,
  applyFunction,
  asRational,
  dependsOn,
  dependsOnLaplace,
  derivativeRatio,
  divRatios,
  equalRatios,
  evaluateRatio,
  functionOf,
  gcdPolynomials,
  generatorsOf,
  imaginary,
  inverseRatio,
  isOnePolynomial,
  isZeroRatio,
  laplace,
  leadingCoefficientSign,
  limitRatio,
  mulRatios,
  mulRational,
  negRatio,
  oneRatio,
  pi,
  powRatio,
  ratioFromRational,
  ratioKey,
  ratioOf,
  rational,
  sqrtOf,
  subRatios,
  substituteRatio,
  symbol,
  symbolsOfRatio,
  zeroRatio,
  type Ratio,
} from '../../src/algebra/index.ts';
import { GENERATORS, points, ratios, ROOTS, RUNS } from './arbitraries.ts';
import { read } from './text.ts';

const shape = { generators: 4, terms: 4, degree: 2 };

function value(answer: Ratio | Refusal): Ratio {
  if (isRefusal(answer)) throw new Error(answer.reason);
  return answer;
}

const apply = (name: string, ...args: string[]): Ratio =>
  value(applyFunction(name, args.map(read)));

describe('rational functions', () => {
  it('form a field, with one form for each value', () => {
    fc.assert(
      fc.property(ratios(shape), ratios(shape), ratios(shape), (a, b, c) => {
        const left = mulRatios(addRatios(a, b), c);
        const right = addRatios(mulRatios(c, b), mulRatios(a, c));
        expect(ratioKey(left)).toBe(ratioKey(right));
        expect(equalRatios(left, right)).toBe(true);
        expect(isZeroRatio(subRatios(left, right))).toBe(true);
        if (!isZeroRatio(b)) expect(equalRatios(mulRatios(divRatios(a, b), b), a)).toBe(true);
        if (!isZeroRatio(b)) {
          expect(equalRatios(powRatio(b, -2), inverseRatio(mulRatios(b, b)))).toBe(true);
        }
      }),
      RUNS,
    );
  });

  it('are in lowest terms with a positive denominator', () => {
    fc.assert(
      fc.property(ratios(shape), ratios(shape), (a, b) => {
        for (const r of [addRatios(a, b), mulRatios(a, b), subRatios(a, b)]) {
          if (isZeroRatio(r)) continue;
          expect(isOnePolynomial(gcdPolynomials(r.num, r.den))).toBe(true);
          expect(leadingCoefficientSign(r.den)).toBe(1);
        }
      }),
      RUNS,
    );
  });

  it('agree with arithmetic on values at random points', () => {
    fc.assert(
      fc.property(ratios(shape), ratios(shape), points(), (a, b, at) => {
        const [x, y] = [evaluateRatio(a, at), evaluateRatio(b, at)];
        if (isRefusal(x) || isRefusal(y)) return;
        expect(evaluateRatio(addRatios(a, b), at)).toEqual(addRational(x, y));
        expect(evaluateRatio(mulRatios(a, b), at)).toEqual(mulRational(x, y));
      }),
      RUNS,
    );
  });

  it('say which symbols they contain, also inside functions', () => {
    const r = mulRatios(read('J*s'), apply('exp', '-s*Td'));
    expect(symbolsOfRatio(r).map((g) => g.name)).toEqual(['J', 'Td']);
    expect(dependsOn(apply('sin', 'a + b'), symbol('b'))).toBe(true);
    expect(dependsOn(apply('sin', 'a + b'), symbol('c'))).toBe(false);
    expect(dependsOnLaplace(functionOf('exp', [read('s*Td')]))).toBe(true);
    expect(dependsOnLaplace(functionOf('exp', [read('a')]))).toBe(false);
  });

  it('are numbers only without generators', () => {
    expect(asRational(read('(2*a)/(4*a)'))).toEqual({ n: 1n, d: 2n });
    expect(asRational(read('a'))).toBeNull();
    expect(asRational(ratioOf(pi))).toBeNull();
    expect(asRational(zeroRatio)).toEqual({ n: 0n, d: 1n });
  });
});

describe('j and square roots', () => {
  /** Sums of products of j, a, sqrt(2), sqrt(3), sqrt(a). */
  const surds = fc
    .array(fc.tuple(fc.integer({ min: -3, max: 3 }), fc.subarray([...ROOTS])), { maxLength: 4 })
    .map((terms) =>
      terms.reduce(
        (sum, [k, factors]) =>
          addRatios(
            sum,
            factors.reduce((p, f) => mulRatios(p, f), ratioFromRational(rational(k))),
          ),
        zeroRatio,
      ),
    );

  it('form a field in which denominators are free of them', () => {
    fc.assert(
      fc.property(surds, surds, surds, (a, b, c) => {
        expect(ratioKey(mulRatios(addRatios(a, b), c))).toBe(
          ratioKey(addRatios(mulRatios(a, c), mulRatios(b, c))),
        );
        if (isZeroRatio(b)) return;
        const quotient = divRatios(a, b);
        expect(generatorsOf(quotient.den).some((g) => g.square)).toBe(false);
        expect(equalRatios(mulRatios(quotient, b), a)).toBe(true);
      }),
      { ...RUNS, numRuns: 40 },
    );
  });

  it('reduce their squares', () => {
    const j = ratioOf(imaginary);
    expect(equalRatios(powRatio(j, 2), ratioFromRational(rational(-1)))).toBe(true);
    expect(equalRatios(powRatio(j, -1), negRatio(j))).toBe(true);
    expect(equalRatios(powRatio(apply('sqrt', 'a/b'), 4), read('a^2/b^2'))).toBe(true);
    expect(equalRatios(mulRatios(read('1/(a + j*b)'), read('a^2 + b^2')), read('a - j*b'))).toBe(
      true,
    );
  });

  it('of numbers have one form', () => {
    expect(equalRatios(apply('sqrt', '4'), read('2'))).toBe(true);
    expect(equalRatios(apply('sqrt', '9/4'), read('3/2'))).toBe(true);
    expect(equalRatios(apply('sqrt', '0'), zeroRatio)).toBe(true);
    expect(equalRatios(apply('sqrt', '6'), mulRatios(apply('sqrt', '2'), apply('sqrt', '3')))).toBe(
      true,
    );
    expect(equalRatios(apply('sqrt', '1/2'), divRatios(apply('sqrt', '2'), read('2')))).toBe(true);
    expect(equalRatios(apply('sqrt', '-4'), read('2*j'))).toBe(true);
    const nested = sqrtOf(addRatios(oneRatio, apply('sqrt', '2')));
    expect(equalRatios(powRatio(nested, 2), addRatios(oneRatio, apply('sqrt', '2')))).toBe(true);
    expect(isZeroRatio(subRatios(mulRatios(inverseRatio(nested), nested), oneRatio))).toBe(true);
  });

  it('of squares of symbols are not opened, and nothing is claimed about a vanishing conjugate', () => {
    const root = apply('sqrt', 'a^2');
    expect(equalRatios(root, read('a'))).toBe(false);
    const gap = subRatios(root, read('a'));
    const inverse = inverseRatio(gap);
    const at = new Map([[symbol('a'), read('-3')]]);
    expect(ratioKey(value(substituteRatio(inverse, at)))).toBe(ratioKey(read('1/6')));
  });
});

describe('functions of parameters', () => {
  it('take their exact values', () => {
    expect(equalRatios(apply('exp', '0'), oneRatio)).toBe(true);
    expect(equalRatios(apply('log', '1'), zeroRatio)).toBe(true);
    expect(
      equalRatios(apply('cos', '5/6*pi'), divRatios(negRatio(apply('sqrt', '3')), read('2'))),
    ).toBe(true);
    expect(equalRatios(apply('sin', '-pi/6'), read('-1/2'))).toBe(true);
    expect(equalRatios(apply('tan', '3*pi/4'), read('-1'))).toBe(true);
    expect(equalRatios(apply('atan', '-1'), read('-pi/4'))).toBe(true);
    expect(equalRatios(apply('abs', '-7/2'), read('7/2'))).toBe(true);
    expect(equalRatios(apply('max', '2', '7/2', '-9'), read('7/2'))).toBe(true);
    expect(applyFunction('log', [zeroRatio])).toEqual({
      kind: 'refusal',
      code: 'undefined',
      reason: 'the logarithm of 0 is not defined',
    });
    expect(isRefusal(applyFunction('tan', [read('pi/2')]))).toBe(true);
  });

  it('agree with floating point where they are exact', () => {
    for (let k = -30; k <= 30; k += 1) {
      for (const name of ['sin', 'cos'] as const) {
        const exact = apply(name, `${k}/12*pi`);
        const number = numeric(exact);
        if (number !== null) expect(number).toBeCloseTo(Math[name]((k / 12) * Math.PI), 12);
      }
    }
  });

  it('respect parity and turn exp of a sum into a product', () => {
    expect(equalRatios(apply('sin', 'b - a'), negRatio(apply('sin', 'a - b')))).toBe(true);
    expect(equalRatios(apply('cos', 'b - a'), apply('cos', 'a - b'))).toBe(true);
    const both = mulRatios(apply('exp', '-s*T1'), apply('exp', '-s*T2'));
    expect(equalRatios(apply('exp', '-s*(T1 + T2)'), both)).toBe(true);
    expect(equalRatios(mulRatios(apply('exp', 'a'), apply('exp', '-a')), oneRatio)).toBe(true);
    expect(generatorsOf(apply('exp', '-2*s*Td').den)).toEqual([]);
  });
});

/** The double of a rational combination of square roots of primes, or null for other functions. */
function numeric(r: Ratio): number | null {
  let sum = 0;
  const den = asRational(inverseRatio(ratioFromDen(r)));
  if (!den || r.num.generators.some((g) => g.name !== 'sqrt')) return null;
  const width = r.num.generators.length;
  r.num.coefficients.forEach((c, i) => {
    let term = Number(c);
    r.num.generators.forEach((g, k) => {
      const inside = asRational((g.args as readonly Ratio[])[0]) as { n: bigint };
      term *= Math.sqrt(Number(inside.n)) ** r.num.exponents[i * width + k];
    });
    sum += term;
  });
  return (sum * Number(den.n)) / Number(den.d);
}

function ratioFromDen(r: Ratio): Ratio {
  return divRatios(oneRatio, mulRatios(inverseRatio({ ...oneRatio, num: r.den }), oneRatio));
}

describe('substitution', () => {
  it('agrees with evaluation at the replaced values', () => {
    fc.assert(
      fc.property(ratios(shape), ratios(shape), ratios(shape), points(), (r, x, y, at) => {
        const [a, b] = [GENERATORS[1], GENERATORS[2]];
        const replaced = substituteRatio(
          r,
          new Map([
            [a, x],
            [b, y],
          ]),
        );
        const [u, v] = [evaluateRatio(x, at), evaluateRatio(y, at)];
        if (isRefusal(replaced) || isRefusal(u) || isRefusal(v)) return;
        const direct = evaluateRatio(r, (g) => (g === a ? u : g === b ? v : at(g)));
        if (!isRefusal(direct)) expect(evaluateRatio(replaced, at)).toEqual(direct);
      }),
      RUNS,
    );
  });

  it('replaces all at once, so that two symbols can change places', () => {
    const swap = new Map([
      [symbol('a'), read('b')],
      [symbol('b'), read('a')],
    ]);
    expect(equalRatios(value(substituteRatio(read('a/(b + 1)'), swap)), read('b/(a + 1)'))).toBe(
      true,
    );
  });

  it('reaches inside functions', () => {
    const at = new Map([[symbol('a'), read('4')]]);
    expect(equalRatios(value(substituteRatio(apply('sqrt', 'a'), at)), read('2'))).toBe(true);
    const off = new Map([[symbol('Td'), zeroRatio]]);
    expect(equalRatios(value(substituteRatio(apply('exp', '-s*Td'), off)), oneRatio)).toBe(true);
  });

  it('is refused where a denominator vanishes', () => {
    const refusal = {
      kind: 'refusal',
      code: 'division-by-zero',
      reason: 'the denominator becomes zero',
    };
    expect(substituteRatio(read('1/(a - b)'), new Map([[symbol('a'), read('b')]]))).toEqual(
      refusal,
    );
    const inside = apply('sin', '1/a');
    expect(substituteRatio(inside, new Map([[symbol('a'), zeroRatio]]))).toEqual(refusal);
    expect(evaluateRatio(read('1/a'), () => rational(0))).toEqual(refusal);
  });
});

describe('derivatives', () => {
  it('obey the product and quotient rules', () => {
    fc.assert(
      fc.property(ratios(shape), ratios(shape), (a, b) => {
        const d = (r: Ratio): Ratio => value(derivativeRatio(r, laplace));
        const product = addRatios(mulRatios(d(a), b), mulRatios(a, d(b)));
        expect(equalRatios(d(mulRatios(a, b)), product)).toBe(true);
      }),
      { ...RUNS, numRuns: 30 },
    );
  });

  it.each([
    [apply('exp', '-s*Td'), 's', mulRatios(read('-Td'), apply('exp', '-s*Td'))],
    [apply('sqrt', 'a*b'), 'a', divRatios(read('b/2'), apply('sqrt', 'a*b'))],
    [apply('log', 'a^2 + 1'), 'a', read('2*a/(a^2 + 1)')],
    [apply('atan', 'a'), 'a', read('1/(a^2 + 1)')],
    [apply('sin', '2*a'), 'a', mulRatios(read('2'), apply('cos', '2*a'))],
    [apply('cos', 'a'), 'a', negRatio(apply('sin', 'a'))],
    [divRatios(oneRatio, apply('exp', 'a^2')), 'a', mulRatios(read('-2*a'), apply('exp', '-a^2'))],
  ])('go through functions by the chain rule (case %#)', (r, name, expected) => {
    const x = name === 's' ? laplace : symbol(name);
    expect(ratioKey(value(derivativeRatio(r, x)))).toBe(ratioKey(expected));
  });

  it('are refused for functions with corners', () => {
    expect(derivativeRatio(apply('abs', 'a'), symbol('a'))).toEqual({
      kind: 'refusal',
      code: 'not-differentiable',
      reason: 'abs has no derivative in closed form',
    });
  });
});

describe('limits', () => {
  const a = symbol('a');
  it.each<[string, Ratio | 'infinity', string]>([
    ['(s^2 - a^2)/(s - a)', 'infinity', 'infinite'],
    ['(3*s^2 + 1)/(2*s^2 + s)', 'infinity', '3/2'],
    ['(s + 1)/(s^2 + 1)', 'infinity', '0'],
    ['(K*s + 1)/(s + 2)', zeroRatio, '1/2'],
    ['1/s', zeroRatio, 'infinite'],
  ])('of %s at %o is %s', (text, to, expected) => {
    const answer = limitRatio(read(text), laplace, to);
    if (isRefusal(answer)) expect(answer.code).toBe(expected);
    else expect(ratioKey(answer)).toBe(ratioKey(read(expected)));
  });

  it('tell the sign where both sides agree', () => {
    const reason = (text: string, to: Ratio | 'infinity'): string =>
      (limitRatio(read(text), a, to) as Refusal).reason;
    expect(reason('-1/(a - 2)^2', read('2'))).toBe('it grows without bound towards −∞');
    expect(reason('-1/(a - 2)^3', read('2'))).toBe('it grows without bound');
    expect(reason('7*a^3/(a + 1)', 'infinity')).toBe('it grows without bound towards +∞');
    expect(reason('b*a', 'infinity')).toBe('it grows without bound');
  });

  it('of functions follow from derivatives where both parts vanish', () => {
    const delayed = divRatios(subRatios(oneRatio, apply('exp', '-s*Td')), read('s'));
    expect(ratioKey(value(limitRatio(delayed, laplace, zeroRatio)))).toBe(ratioKey(read('Td')));
    const curve = divRatios(subRatios(oneRatio, apply('cos', 'a*b')), read('a^2'));
    expect(ratioKey(value(limitRatio(curve, a, zeroRatio)))).toBe(ratioKey(read('b^2/2')));
    expect((limitRatio(apply('exp', '-s*Td'), laplace, 'infinity') as Refusal).code).toBe(
      'undefined',
    );
  });
});
