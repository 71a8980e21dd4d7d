import { describe, expect, test, vi } from 'vitest';
import {
  algebraicToNumber,
  coefficientsIn,
  derivativeRatio,
  equalRatios,
  factorPolynomial,
  fractionOfRatio,
  gcdPolynomials,
  generatorsOf,
  isConstantPolynomial,
  isZeroPolynomial,
  isZeroRatio,
  laplace,
  quotientOf,
  ratioFromPolynomial,
  substituteRatio,
  type Generator,
  type Polynomial,
} from '../../src/algebra/index.ts';
import { isRefusal } from '../../src/base/index.ts';
import {
  closeLoop,
  compileConditions,
  finalValue,
  allOf,
  matchCoefficients,
  openedAt,
  partialFractions,
  solveLinearFor,
  stabilityConditions,
  stableIntervals,
  transferFunction,
  YES,
  type GainInterval,
} from '../../src/control/index.ts';
import {
  polynomialRoots,
  randomInteger,
  seededRandom,
  type RandomSource,
} from '../../src/numeric/index.ts';
import { found, numberAt, positive, signal, unknown } from './formulas.ts';
import { dual, minus, ONE, over, plus, times, toPower, ZERO, type Dual } from './modular.ts';
import {
  difference,
  movedTo,
  number,
  pick,
  power,
  product,
  quotient,
  randomFormula,
  randomNumber,
  randomPlace,
  randomPolynomial,
  S,
  sum,
  SYMBOLS,
  valueOf,
  valueOfRatio,
  variable,
  type Formula,
} from './problem.ts';
import { determinantAt, randomLoop, somewhere } from './random-loop.ts';

/*
 * Random problems whose answers are compared with values found on a second route, modulo a prime, by arithmetic of the
 * tests' own. ROUNDS=10 in the environment runs ten times as many, each round from seeds of its own.
 */
const ROUNDS = Number(process.env.ROUNDS ?? 1);
vi.setConfig({ testTimeout: 60_000 * ROUNDS });

/** Runs `count` problems in each round, each from its own seed, which is named where one fails. */
function problems(count: number, solve: (random: RandomSource, index: number) => void): void {
  for (let index = 0; index < count * ROUNDS; index += 1) {
    try {
      solve(seededRandom(index + 1), index);
    } catch (error) {
      throw new Error(`the problem of seed ${index + 1}: ${String(error)}`, { cause: error });
    }
  }
}

const few = (random: RandomSource): readonly Generator[] =>
  SYMBOLS.slice(0, randomInteger(random, 1, 5));

/** That our form of a formula has the formula's value. */
function expectValue({ exact, at }: Formula, random: RandomSource): void {
  const values = somewhere(
    () => randomPlace(random),
    (place) => [valueOfRatio(exact, place).value, at(place).value],
  );
  if (values) expect(values[0]).toBe(values[1]);
}

describe('exact algebra', () => {
  test('6 000 formulas have the value of their recipe', () => {
    problems(6000, (random) => {
      expectValue(randomFormula(random, few(random), randomInteger(random, 1, 4)), random);
    });
  });

  test('2 000 products that are multiplied out are the same as in factors, and sums in another order', () => {
    problems(2000, (random) => {
      const [a, b, c] = [1, 2, 2].map((depth) => randomFormula(random, few(random), depth));
      const [folded, flat] = [product(a, sum(b, c)), sum(product(a, c), product(b, a))];
      expect(equalRatios(folded.exact, flat.exact)).toBe(true);
      expect(isZeroRatio(difference(folded, flat).exact)).toBe(true);
    });
  });

  test('2 000 common divisors hold what was put in and leave nothing in common', () => {
    problems(2000, (random) => {
      const symbols = few(random);
      const [f, g, h] = [2, 2, 2].map((degree) => randomPolynomial(random, symbols, degree));
      const [a, b] = [product(f, g).exact.num, product(f, h).exact.num];
      if (isZeroPolynomial(a) || isZeroPolynomial(b)) return;
      const common = gcdPolynomials(a, b);
      const [left, right] = [quotientOf(a, common), quotientOf(b, common)];
      expect(isConstantPolynomial(gcdPolynomials(left, right))).toBe(true);
      const withIt = gcdPolynomials(common, f.exact.num);
      expect(coefficientsIn(withIt, laplace)).toHaveLength(
        coefficientsIn(f.exact.num, laplace).length,
      );
    });
  });

  test('1 500 polynomials are the product of their factors', () => {
    problems(1500, (random) => {
      const symbols = few(random);
      const parts = Array.from({ length: randomInteger(random, 1, 3) }, () =>
        randomPolynomial(random, symbols, randomInteger(random, 1, 2)),
      );
      const p = parts.reduce(product).exact.num;
      if (isZeroPolynomial(p)) return;
      const { unit, factors } = factorPolynomial(p);
      const place = randomPlace(random);
      const whole = factors.reduce(
        (value, { factor, multiplicity }) =>
          times(value, toPower(valueOf(factor, place), multiplicity)),
        dual(unit),
      );
      expect(whole.value).toBe(valueOf(p, place).value);
    });
  });

  test('1 500 derivatives are the slopes of dual numbers', () => {
    problems(1500, (random) => {
      const symbols = few(random);
      const by = random() < 0.3 ? laplace : pick(random, symbols);
      const { exact, at } = randomFormula(random, symbols, randomInteger(random, 1, 3));
      const slope = found(derivativeRatio(exact, by));
      const slopes = somewhere(
        () => randomPlace(random, by),
        (place) => [valueOfRatio(slope, place).value, at(place).slope],
      );
      if (slopes) expect(slopes[0]).toBe(slopes[1]);
    });
  });

  test('1 500 formulas with one put into another have the value of both in turn', () => {
    problems(1500, (random) => {
      const symbols = few(random);
      const outer = randomFormula(random, symbols, randomInteger(random, 1, 3));
      const inner = randomFormula(random, symbols, 1);
      const name = pick(random, symbols);
      const put = substituteRatio(outer.exact, new Map([[name, inner.exact]]));
      if (isRefusal(put)) return;
      const at: Formula['at'] = (place) => outer.at(movedTo(place, name, inner.at(place)));
      expectValue({ exact: put, at }, random);
    });
  });
});

describe('loops', () => {
  /** Sizes that are drawn, and how many symbols of twelve they have. */
  const SIZES = [2, 2, 2, 2, 3, 3, 3, 4, 4, 5, 6, 7, 8];

  test('3 000 loops of 2 to 8 signals have the transfer functions of the rule of Cramer', () => {
    const seen = { solved: 0, singular: 0 };
    problems(3000, (random, index) => {
      const size = SIZES[index % SIZES.length];
      const symbols = SYMBOLS.slice(0, randomInteger(random, 1, size < 4 ? 6 : 12));
      const loop = randomLoop(random, size, symbols);
      const closed = closeLoop(loop.rows, loop.unknowns, ['u']);
      const places = () => randomPlace(random);
      if (isRefusal(closed)) {
        expect(somewhere(places, (place) => determinantAt(loop, place)) ?? 0n).toBe(0n);
        seen.singular += 1;
        return;
      }
      const name = pick(random, loop.unknowns);
      const transfer = transferFunction(closed, 'u', name);
      if (isRefusal(transfer)) throw new Error(transfer.reason);
      const values = somewhere(places, (place) => {
        const [above, below] = [determinantAt(loop, place, name), determinantAt(loop, place)];
        return [valueOfRatio(transfer.ratio, place), over(dual(above), dual(below))];
      });
      if (values) expect(values[0].value).toBe(values[1].value);
      seen.solved += 1;
    });
    expect(seen.solved).toBeGreaterThan(2000);
    expect(seen.singular).toBeGreaterThan(50);
  });

  test('1 500 characteristic polynomials are the determinant, up to a factor free of s', () => {
    problems(1500, (random, index) => {
      const loop = randomLoop(random, SIZES[index % 10], SYMBOLS.slice(0, 6));
      const closed = closeLoop(loop.rows, loop.unknowns, ['u']);
      if (isRefusal(closed)) return;
      const factors = somewhere(
        () => randomPlace(random),
        (place) =>
          [1n, 2n].map((s) => {
            const there = movedTo(place, laplace, dual(10n ** 9n + s));
            const cleared = closed.cleared.reduce(
              (value, { multiplier }) => times(value, valueOf(multiplier, there)),
              dual(determinantAt(loop, there)),
            );
            return over(cleared, valueOf(closed.characteristic, there)).value;
          }),
      );
      if (factors) expect(factors[0]).toBe(factors[1]);
    });
  });

  test('1 000 loops broken at a signal have 1 + L = 0 where they had their modes', () => {
    problems(1000, (random, index) => {
      const loop = randomLoop(random, SIZES[index % 10], SYMBOLS.slice(0, 5));
      const recipes = loop.recipes.map((row, i) => (i === 0 ? row : withOne(row, `x${i}`)));
      const rows = loop.rows.map((row, i) =>
        i === 0
          ? row
          : {
              coefficients: new Map(row.coefficients).set(
                `x${i}`,
                fractionOfRatio(number(1n).exact),
              ),
            },
      );
      const closed = closeLoop(rows, loop.unknowns, ['u']);
      if (isRefusal(closed)) return;
      const at = randomInteger(random, 1, rows.length - 1);
      const gain = openedAt(closed, `x${at}`, at);
      if (isRefusal(gain)) return;
      const broken = recipes.map((row, i) =>
        i === at ? row : new Map([...row].filter(([name]) => name !== `x${at}`)),
      );
      const { unknowns } = loop;
      const values = somewhere(
        () => randomPlace(random),
        (place) => [
          dual(determinantAt({ unknowns, recipes }, place)),
          times(
            dual(determinantAt({ unknowns, recipes: broken }, place)),
            plus(ONE, valueOfRatio(gain.ratio, place)),
          ),
        ],
      );
      if (values) expect(values[0].value).toBe(values[1].value);
    });
  });
});

function withOne(row: ReadonlyMap<string, Formula>, name: string): ReadonlyMap<string, Formula> {
  return new Map(row).set(name, number(1n));
}

/** A polynomial in s whose coefficients are all positive symbols and numbers. */
function positivePolynomial(random: RandomSource, degree: number): Formula {
  let total = number(0n);
  for (let k = 0; k <= degree; k += 1) {
    const factor =
      random() < 0.6
        ? variable(pick(random, SYMBOLS.slice(0, 6)))
        : number(BigInt(randomInteger(random, 1, 9)));
    total = sum(total, product(factor, power(S, k)));
  }
  return total;
}

describe('control', () => {
  test('1 500 final values are the numbers left where s goes to 0', () => {
    problems(1500, (random) => {
      const [a, b, n] = [1, 1, 2].map((degree) => positivePolynomial(random, degree));
      const gain = quotient(n, product(a, b));
      const order = randomInteger(random, 0, 2);
      const exact = quotient(product(gain, power(S, order)), power(S, order + 1)).exact;
      const value = finalValue(signal([{ transform: exact }]), positive);
      if (value.kind !== 'formula') throw new Error(value.reason);
      expectValue(
        { exact: value.ratio, at: (place) => gain.at(movedTo(place, laplace, ZERO)) },
        random,
      );
    });
  });

  test('1 500 sums of partial fractions have the value of the whole', () => {
    problems(1500, (random) => {
      const symbols = few(random).slice(0, 2);
      const factors = Array.from({ length: randomInteger(random, 1, 3) }, () =>
        power(
          sum(S, random() < 0.5 ? variable(pick(random, symbols)) : randomNumber(random)),
          randomInteger(random, 1, 2),
        ),
      );
      const whole = quotient(
        randomPolynomial(random, symbols, randomInteger(random, 0, 4)),
        factors.reduce(product),
      );
      const parts = partialFractions(whole.exact);
      if (isRefusal(parts)) throw new Error(parts.reason);
      const total = parts.polynomial
        .map((c, k) => product({ exact: c, at: (place) => valueOfRatio(c, place) }, power(S, k)))
        .map(({ exact }) => exact)
        .concat(parts.terms.map((term) => term.ratio));
      const values = somewhere(
        () => randomPlace(random),
        (place) => [
          total.reduce((value, r) => plus(value, valueOfRatio(r, place)), ZERO),
          whole.at(place),
        ],
      );
      if (values) expect(values[0].value).toBe(values[1].value);
    });
  });

  test('1 000 placements make the polynomials equal up to a factor', () => {
    problems(1000, (random) => {
      const degree = randomInteger(random, 2, 4);
      const gains = SYMBOLS.slice(0, degree);
      const others = SYMBOLS.slice(6, 9);
      const lead = variable(pick(random, others));
      const closed = gains.reduce(
        (total, gain, k) => {
          const known = product(variable(pick(random, others)), randomNumber(random));
          const scale = number(BigInt(randomInteger(random, 1, 5)));
          return sum(total, product(sum(known, product(scale, variable(gain))), power(S, k)));
        },
        product(lead, power(S, degree)),
      );
      const wanted = Array.from({ length: degree }, () => sum(S, randomNumber(random))).reduce(
        product,
      );
      const matched = matchCoefficients(closed.exact.num, wanted.exact.num, gains);
      if (isRefusal(matched)) throw new Error(matched.reason);
      const place = randomPlace(random);
      const placed = matched.reduce(
        (where, { gain, value }) => movedTo(where, gain, valueOfRatio(value, place)),
        place,
      );
      const factors = [3n, 4n].map((s) => {
        const at = (f: Formula): Dual => f.at(movedTo(placed, laplace, dual(s * 10n ** 9n)));
        return over(at(closed), at(wanted)).value;
      });
      expect(factors[0]).toBe(factors[1]);
    });
  });

  test('1 500 solutions satisfy their equations', () => {
    problems(1500, (random) => {
      const [x, ...symbols] = SYMBOLS.slice(0, 5);
      const [a, b, c, d] = [1, 1, 1, 1].map((depth) => randomFormula(random, symbols, depth));
      const left = product(a, sum(variable(x), b));
      const right = quotient(sum(c, product(d, variable(x))), number(7n));
      const solution = solveLinearFor(left.exact, right.exact, x, unknown);
      if (isRefusal(solution)) return;
      const values = somewhere(
        () => randomPlace(random),
        (place) => {
          const solved = movedTo(place, x, valueOfRatio(solution, place));
          return minus(left.at(solved), right.at(solved));
        },
      );
      if (values) expect(values.value).toBe(0n);
    });
  });

  test('2 000 conditions for stability hold exactly where all roots lie to the left', () => {
    let compared = 0;
    problems(2000, (random) => {
      const degree = randomInteger(random, 1, 5);
      const p = positivePolynomial(random, degree).exact.num;
      const conditions = allOf(stabilityConditions(p, positive));
      const { inputs, evaluate } = compileConditions([conditions], () => 'input');
      const values = Object.fromEntries(
        SYMBOLS.map((g) => [g.name, randomInteger(random, 1, 40) / 8]),
      );
      const [[verdict]] = evaluate(
        inputs.map((name) => Float64Array.of(values[name])),
        1,
      );
      const roots = polynomialRoots(numbersAt(p, values));
      const largest = Math.max(...roots.map((root) => root.re));
      if (Math.abs(largest) < 1e-6) return;
      compared += 1;
      expect(verdict === YES).toBe(largest < 0);
    });
    expect(compared).toBeGreaterThan(1500);
  });
});

/** The gains of an interval: its ends as numbers. */
function endsOf({ from, to }: GainInterval): readonly [number, number] {
  return [from ? algebraicToNumber(from) : -Infinity, to ? algebraicToNumber(to) : Infinity];
}

describe('one gain', () => {
  test('1 000 loops are stable just at the gains of their intervals', () => {
    const seen = { stable: 0, unstable: 0 };
    problems(1000, (random) => {
      const gain = variable(SYMBOLS[0]);
      const part = (low: number, high: number): Formula =>
        number(BigInt(randomInteger(random, low, high)));
      const degree = randomInteger(random, 1, 4);
      const p = Array.from({ length: degree + 1 }, (_, k) => {
        const share =
          random() < 0.6
            ? product(part(-3, 4), power(gain, randomInteger(random, 1, 2)))
            : part(0, 5);
        return product(sum(part(0, 9), share), power(S, k));
      }).reduce(sum).exact.num;
      if (!generatorsOf(p).includes(laplace)) return;
      const intervals = stableIntervals([p], SYMBOLS[0]).map(endsOf);
      for (let point = 0; point < 6; point += 1) {
        const value = randomInteger(random, -4000, 4000) / 512;
        if (intervals.flat().some((end) => Math.abs(end - value) < 1e-4)) continue;
        const roots = polynomialRoots(numbersAt(p, { [SYMBOLS[0].name]: value }));
        const largest = Math.max(...roots.map((root) => root.re));
        if (roots.length === 0 || Math.abs(largest) < 1e-6) continue;
        const isInside = intervals.some(([low, high]) => low < value && value < high);
        expect(isInside).toBe(largest < 0);
        seen[isInside ? 'stable' : 'unstable'] += 1;
      }
    });
    expect(seen.stable).toBeGreaterThan(500);
    expect(seen.unstable).toBeGreaterThan(500);
  });
});

/** The coefficients of s, highest first, where the symbols have these values. */
function numbersAt(p: Polynomial, values: Readonly<Record<string, number>>): readonly number[] {
  return [...coefficientsIn(p, laplace)]
    .reverse()
    .map((c) => numberAt(ratioFromPolynomial(c), values));
}
