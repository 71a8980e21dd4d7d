import { refuse, type Budget, type Refusal } from '../base/index.ts';
import { dependsOnLaplace, functionOf, pi } from './generator.ts';
import { absolute } from './integer.ts';
import { ratioKey } from './key.ts';
import { contentOf, leadingCoefficientSign, polynomialOfTermList, termsOf } from './polynomial.ts';
import {
  addRational,
  compareRational,
  negRational,
  oneRational,
  rational,
  subRational,
  type Rational,
} from './rational.ts';
import {
  asRational,
  divRatios,
  generatorsOfRatio,
  isOneRatio,
  isZeroRatio,
  mulRatios,
  negRatio,
  oneRatio,
  powRatio,
  ratio,
  ratioFromRational,
  ratioOf,
  zeroRatio,
} from './ratio.ts';
import type { Ratio } from './ring.ts';
import { sqrtOf } from './square-root.ts';

type Rule = (args: readonly Ratio[], budget?: Budget) => Ratio | Refusal;

/**
 * The value of a function of exact arguments: simplified where that is exact (exp(0) is 1, sqrt(4) is 2, sin(−a)
 * is −sin(a), exp of a sum is a product), otherwise the function itself as a kernel. Knows sqrt, exp, log, sin,
 * cos, tan, atan, abs, min and max; any other name gives a kernel. Refused (`undefined`) where there is no value.
 */
export function applyFunction(
  name: string,
  args: readonly Ratio[],
  budget?: Budget,
): Ratio | Refusal {
  const rule = RULES.get(name);
  return rule ? rule(args, budget) : kernel(name, ...args);
}

function kernel(name: string, ...args: readonly Ratio[]): Ratio {
  return ratioOf(functionOf(name, args));
}

function isNegative(r: Ratio): boolean {
  return leadingCoefficientSign(r.num) < 0;
}

const LARGEST_POWER = 1000n;

/** exp of one term c · m as a power of a kernel: exp(m/q)^p for c = p/q, and exp(−s …) for a delay. */
function expOfTerm(term: Ratio, budget?: Budget): Ratio {
  const size = contentOf(term.num);
  const power = size <= LARGEST_POWER ? size : 1n;
  const base = mulRatios(term, ratioFromRational(rational(1n, power)), budget);
  const delays = generatorsOfRatio(term).some(dependsOnLaplace);
  const flip = isNegative(base) !== delays;
  const root = kernel('exp', flip ? negRatio(base) : base);
  return powRatio(root, flip ? -Number(power) : Number(power), budget);
}

function expOf(argument: Ratio, budget?: Budget): Ratio {
  return termsOf(argument.num)
    .map((term) => ratio(polynomialOfTermList([term]), argument.den, budget))
    .reduce((product, term) => mulRatios(product, expOfTerm(term, budget), budget), oneRatio);
}

function logOf(argument: Ratio): Ratio | Refusal {
  if (isZeroRatio(argument)) return refuse('undefined', 'the logarithm of 0 is not defined');
  return isOneRatio(argument) ? zeroRatio : kernel('log', argument);
}

/** q where the argument is q pi for a rational q, otherwise null. */
function multipleOfPi(argument: Ratio): Rational | null {
  return asRational(divRatios(argument, ratioOf(pi)));
}

/** The cosines of the angles in the first quadrant that are square roots of rationals: cos² by angle over pi. */
const SQUARED_COSINES: readonly (readonly [angle: Rational, square: Rational])[] = [
  [rational(0), rational(1)],
  [rational(1, 6), rational(3, 4)],
  [rational(1, 4), rational(1, 2)],
  [rational(1, 3), rational(1, 4)],
  [rational(1, 2), rational(0)],
];

/** cos(q pi), or null where it is not in the table. */
function knownCosine(q: Rational): Ratio | null {
  const turns = (absolute(q.n) / q.d) % 2n;
  const part = rational(absolute(q.n) % q.d, q.d);
  const obtuse = compareRational(part, rational(1, 2)) > 0;
  const acute = obtuse ? subRational(oneRational, part) : part;
  const entry = SQUARED_COSINES.find(([angle]) => compareRational(angle, acute) === 0);
  if (!entry) return null;
  const value = sqrtOf(ratioFromRational(entry[1]));
  return obtuse !== (turns === 1n) ? negRatio(value) : value;
}

function cosOf(argument: Ratio): Ratio {
  const q = multipleOfPi(argument);
  return (
    (q && knownCosine(q)) ?? kernel('cos', isNegative(argument) ? negRatio(argument) : argument)
  );
}

function sinOf(argument: Ratio): Ratio {
  const q = multipleOfPi(argument);
  return (q && knownCosine(addRational(rational(1, 2), negRational(q)))) ?? odd('sin', argument);
}

function tanOf(argument: Ratio): Ratio | Refusal {
  const q = multipleOfPi(argument);
  if (!q || !knownCosine(q)) return odd('tan', argument);
  const cosine = cosOf(argument);
  if (isZeroRatio(cosine))
    return refuse('undefined', 'the tangent of a right angle is not defined');
  return divRatios(sinOf(argument), cosine);
}

function atanOf(argument: Ratio): Ratio {
  if (isNegative(argument)) return negRatio(atanOf(negRatio(argument)));
  if (isOneRatio(argument)) return mulRatios(ratioOf(pi), ratioFromRational(rational(1, 4)));
  return isZeroRatio(argument) ? zeroRatio : kernel('atan', argument);
}

/** An odd function of the argument with a positive leading coefficient. */
function odd(name: string, argument: Ratio): Ratio {
  return isNegative(argument) ? negRatio(kernel(name, negRatio(argument))) : kernel(name, argument);
}

function absOf(argument: Ratio, budget?: Budget): Ratio {
  const size = rational(contentOf(argument.num), contentOf(argument.den));
  if (asRational(argument)) return ratioFromRational(size);
  const base = mulRatios(argument, ratioFromRational(rational(size.d, size.n)), budget);
  const inner = kernel('abs', isNegative(base) ? negRatio(base) : base);
  return mulRatios(inner, ratioFromRational(size));
}

/** min or max: the numbers are settled, equal arguments once, in a fixed order. */
function extremeOf(name: 'min' | 'max', args: readonly Ratio[]): Ratio {
  const wanted = name === 'min' ? -1 : 1;
  let best: Rational | null = null;
  const others = new Map<string, Ratio>();
  for (const argument of args) {
    const number = asRational(argument);
    if (!number) others.set(ratioKey(argument), argument);
    else if (!best || compareRational(number, best) === wanted) best = number;
  }
  const sorted = [...others.keys()].sort().map((key) => others.get(key) as Ratio);
  const all = best ? [ratioFromRational(best), ...sorted] : sorted;
  return all.length === 1 ? all[0] : kernel(name, ...all);
}

const RULES: ReadonlyMap<string, Rule> = new Map<string, Rule>([
  ['sqrt', ([argument], budget) => sqrtOf(argument, budget)],
  ['exp', ([argument], budget) => expOf(argument, budget)],
  ['log', ([argument]) => logOf(argument)],
  ['sin', ([argument]) => sinOf(argument)],
  ['cos', ([argument]) => cosOf(argument)],
  ['tan', ([argument]) => tanOf(argument)],
  ['atan', ([argument]) => atanOf(argument)],
  ['abs', ([argument], budget) => absOf(argument, budget)],
  ['min', (args) => extremeOf('min', args)],
  ['max', (args) => extremeOf('max', args)],
]);
