import { generatorDependsOn, imaginary } from './generator.ts';
import { coefficientsIn } from './polynomial.ts';
import type { Generator, Polynomial, Ratio } from './ring.ts';

/** A closed interval that surely holds a real number; computed in doubles, rounded outwards. */
export interface Enclosure {
  readonly low: number;
  readonly high: number;
}

/** More than the error of any one operation or function of doubles, relative and (for subnormal results) absolute. */
const RELATIVE = 8 * Number.EPSILON;
const ABSOLUTE = 1e-300;

function enclosing(low: number, high: number): Enclosure {
  const padding = (x: number): number => Math.abs(x) * RELATIVE + ABSOLUTE;
  return { low: low - padding(low), high: high + padding(high) };
}

const exactly = (x: number): Enclosure => ({ low: x, high: x });

function plus(a: Enclosure, b: Enclosure): Enclosure {
  return enclosing(a.low + b.low, a.high + b.high);
}

function times(a: Enclosure, b: Enclosure): Enclosure {
  const ends = [a.low * b.low, a.low * b.high, a.high * b.low, a.high * b.high];
  return enclosing(Math.min(...ends), Math.max(...ends));
}

const holdsZero = ({ low, high }: Enclosure): boolean => !(low > 0 || high < 0);

function inverse(a: Enclosure): Enclosure | null {
  return holdsZero(a) ? null : enclosing(1 / a.high, 1 / a.low);
}

function magnitude({ low, high }: Enclosure): Enclosure {
  if (low >= 0) return { low, high };
  return high <= 0 ? { low: -high, high: -low } : { low: 0, high: Math.max(-low, high) };
}

/** A function that changes no faster than its argument, as sin and cos. */
function steady(f: (x: number) => number, { low, high }: Enclosure): Enclosure | null {
  const middle = (low + high) / 2;
  if (Math.abs(middle) > 1e6) return null;
  const radius = (high - low) / 2 + 1e-15 * (1 + Math.abs(middle));
  return enclosing(f(middle) - radius, f(middle) + radius);
}

const rising = (f: (x: number) => number, { low, high }: Enclosure): Enclosure =>
  enclosing(f(low), f(high));

type RealFunction = (args: readonly Enclosure[]) => Enclosure | null;

const FUNCTIONS: ReadonlyMap<string, RealFunction> = new Map<string, RealFunction>([
  ['sqrt', ([x]) => (x.low < 0 ? null : rising(Math.sqrt, x))],
  ['exp', ([x]) => rising(Math.exp, x)],
  ['log', ([x]) => (x.low <= 0 ? null : rising(Math.log, x))],
  ['atan', ([x]) => rising(Math.atan, x)],
  ['sin', ([x]) => steady(Math.sin, x)],
  ['cos', ([x]) => steady(Math.cos, x)],
  ['tan', ([x]) => tangent(x)],
  ['abs', ([x]) => magnitude(x)],
  ['min', (args) => extreme(Math.min, args)],
  ['max', (args) => extreme(Math.max, args)],
]);

function tangent(x: Enclosure): Enclosure | null {
  const [sine, cosine] = [steady(Math.sin, x), steady(Math.cos, x)];
  const secant = cosine && inverse(cosine);
  return sine && secant && times(sine, secant);
}

function extreme(f: (...list: number[]) => number, args: readonly Enclosure[]): Enclosure {
  return { low: f(...args.map((x) => x.low)), high: f(...args.map((x) => x.high)) };
}

/** The value of a symbol, of s, or of an unknown function. */
export type RealPoint = (g: Generator, isNominal: boolean) => number;

function encloseGenerator(g: Generator, point: RealPoint, isNominal: boolean): Enclosure | null {
  if (g.kind === 'constant') return enclosing(Math.PI, Math.PI);
  if (!g.args) return exactly(point(g, isNominal));
  if (g.binds) return null;
  const args: Enclosure[] = [];
  for (const argument of g.args) {
    const value = enclose(argument, point, isNominal || g.name === 'nominal');
    if (!value) return null;
    args.push(value);
  }
  if (g.name === 'nominal') return args[0];
  return FUNCTIONS.get(g.name)?.(args) ?? null;
}

function encloseReal(p: Polynomial, point: RealPoint, isNominal: boolean): Enclosure | null {
  const values: Enclosure[] = [];
  for (const g of p.generators) {
    const value = encloseGenerator(g, point, isNominal);
    if (!value) return null;
    values.push(value);
  }
  const width = values.length;
  let sum = exactly(0);
  p.coefficients.forEach((coefficient, i) => {
    let term = enclosing(Number(coefficient), Number(coefficient));
    values.forEach((value, k) => {
      for (let e = p.exponents[i * width + k]; e > 0; e -= 1) term = times(term, value);
    });
    sum = plus(sum, term);
  });
  return Number.isFinite(sum.low) && Number.isFinite(sum.high) ? sum : null;
}

function enclose(r: Ratio, point: RealPoint, isNominal: boolean): Enclosure | null {
  const num = encloseReal(r.num, point, isNominal);
  const den = encloseReal(r.den, point, isNominal);
  const inverted = den && inverse(den);
  return num && inverted && times(num, inverted);
}

/**
 * Whether a ratio is surely not 0 at a point: its value there exists and has an enclosure without 0. j may stand in it,
 * but not inside functions; false where the doubles cannot tell, or functions leave the reals.
 */
export function isSurelyNonzero(r: Ratio, point: RealPoint): boolean {
  const den = encloseReal(r.den, point, false);
  if (!den || holdsZero(den)) return false;
  const nested = r.num.generators.some((g) => g !== imaginary && generatorDependsOn(g, imaginary));
  if (nested) return false;
  return coefficientsIn(r.num, imaginary).some((part) => {
    const value = encloseReal(part, point, false);
    return value !== null && !holdsZero(value);
  });
}
