import {
  asRational,
  coefficientsIn,
  constantValue,
  generatorsOf,
  isConstantPolynomial,
  isZeroPolynomial,
  polynomialKey,
  rational,
  rationalToNumber,
  termsOf,
} from '../algebra/index.ts';
import type { Generator, Polynomial, Ratio } from '../algebra/index.ts';
import { invariant } from '../base/index.ts';
import { TapeBuilder } from '../numeric/index.ts';
import type { Slot, Tape, TapeFunction } from '../numeric/index.ts';
import { FOUND_NUMBERS, type FoundNumber } from './found-numbers.ts';
import { transferSlots, type TransferSlots } from './transfer-slots.ts';

/** What a generator stands for in numbers: a formula to put in its place, or an input of the tape. */
export type Resolve = (g: Generator) => Ratio | 'input';

/** Slots of a real and an imaginary part; null where the value is real. */
export interface ComplexSlot {
  readonly re: Slot;
  readonly im: Slot | null;
}

const FUNCTIONS: ReadonlySet<string> = new Set<TapeFunction>([
  'sqrt',
  'exp',
  'log',
  'sin',
  'cos',
  'tan',
  'atan',
  'abs',
]);

/** Coefficients beyond this size are scaled down in numerator and denominator alike, so that doubles hold them. */
const LARGE = 2n ** 900n;

function largestCoefficient(p: Polynomial): bigint {
  return termsOf(p).reduce((m, { coefficient: c }) => {
    const size = c < 0n ? -c : c;
    return size > m ? size : m;
  }, 1n);
}

/**
 * Turns exact ratios into the steps of one tape, with shared parts computed once. Derived parameters are put in by
 * `resolve`; `nominal(x)` is x with every input NAME read from the input `nominal(NAME)`; values with j become two
 * slots.
 */
export class RatioCompiler {
  private readonly slots = new Map<string, ComplexSlot>();
  private readonly resolving = new Set<string>();

  constructor(
    private readonly builder: TapeBuilder,
    private readonly resolve: Resolve,
  ) {}

  /** The slots of a ratio. */
  ratio(r: Ratio, nominal = false): ComplexSlot {
    const exact = asRational(r);
    if (exact) return this.real(rationalToNumber(exact));
    const largest = [r.num, r.den].map(largestCoefficient);
    const scale = largest.some((c) => c > LARGE)
      ? largest[0] > largest[1]
        ? largest[0]
        : largest[1]
      : 1n;
    const numerator = this.polynomial(r.num, nominal, scale);
    return this.divide(numerator, this.polynomial(r.den, nominal, scale));
  }

  /** The slots of a polynomial divided by an integer, by Horner's rule in one generator after the other. */
  polynomial(p: Polynomial, nominal = false, scale = 1n): ComplexSlot {
    if (isConstantPolynomial(p)) {
      return this.real(rationalToNumber(rational(constantValue(p), scale)));
    }
    const key = `${nominal}|${scale}|${polynomialKey(p)}`;
    const known = this.slots.get(key) ?? this.horner(p, nominal, scale);
    this.slots.set(key, known);
    return known;
  }

  private horner(p: Polynomial, nominal: boolean, scale: bigint): ComplexSlot {
    const [g] = generatorsOf(p);
    const base = this.generator(g, nominal);
    const coefficients = coefficientsIn(p, g);
    let power = coefficients.length - 1;
    let sum = this.polynomial(coefficients[power], nominal, scale);
    for (let k = power - 1; k >= 0; k--) {
      if (isZeroPolynomial(coefficients[k])) continue;
      const product = this.multiply(sum, this.power(base, power - k));
      sum = this.add(product, this.polynomial(coefficients[k], nominal, scale));
      power = k;
    }
    return this.multiply(sum, this.power(base, power));
  }

  private generator(g: Generator, nominal: boolean): ComplexSlot {
    const key = `${nominal}|${g.key}`;
    const known = this.slots.get(key);
    if (known) return known;
    invariant(!this.resolving.has(key), `${g.name} is defined by itself`);
    this.resolving.add(key);
    const slot = this.newGenerator(g, nominal);
    this.resolving.delete(key);
    this.slots.set(key, slot);
    return slot;
  }

  private newGenerator(g: Generator, nominal: boolean): ComplexSlot {
    if (g.kind === 'imaginary')
      return { re: this.builder.constant(0), im: this.builder.constant(1) };
    if (g.kind === 'constant') return this.real(Math.PI);
    if (g.kind === 'function') return this.functionOf(g, nominal);
    const meaning = this.resolve(g);
    if (meaning !== 'input') return this.ratio(meaning, nominal);
    const name = nominal ? `nominal(${g.name})` : g.name;
    return { re: this.builder.input(name), im: null };
  }

  private functionOf(g: Generator, nominal: boolean): ComplexSlot {
    const args = g.args ?? [];
    if (g.name === 'nominal') return this.ratio(args[0], true);
    const found = FOUND_NUMBERS.get(g.name);
    if (found) return this.foundNumber(g, found, nominal);
    const slots = args.map((a) => this.ratio(a, nominal));
    if (g.name === 'min' || g.name === 'max') return this.extreme(g.name, slots);
    invariant(FUNCTIONS.has(g.name) && slots.length === 1, `${g.name} cannot be computed`);
    const [{ re, im }] = slots;
    if (im === null) return { re: this.builder.call(g.name as TapeFunction, re), im: null };
    return this.complexFunction(g.name, re, im);
  }

  private foundNumber(g: Generator, { find }: FoundNumber, nominal: boolean): ComplexSlot {
    const layout = this.transfers(g.args ?? [], nominal);
    if (!layout) return this.real(NaN);
    const key = `${nominal}|${g.key}`;
    const value = (values: Float64Array): number => find(...layout.read(values)).value;
    return { re: this.builder.external(key, value, layout.slots), im: null };
  }

  /** Functions of s as a row of slots; null where they hold one that is no dead time, or j. */
  transfers(args: readonly Ratio[], nominal = false): TransferSlots | null {
    let isReal = true;
    const realPart = ({ re, im }: ComplexSlot): Slot => {
      if (im !== null) isReal = false;
      return re;
    };
    const layout = transferSlots(args, {
      polynomial: (p) => realPart(this.polynomial(p, nominal)),
      ratio: (r) => realPart(this.ratio(r, nominal)),
    });
    return isReal ? layout : null;
  }

  private extreme(name: 'min' | 'max', slots: readonly ComplexSlot[]): ComplexSlot {
    if (slots.some(({ im }) => im !== null)) return this.real(NaN);
    return { re: slots.map(({ re }) => re).reduce((a, b) => this.builder[name](a, b)), im: null };
  }

  /** exp, sqrt (principal value) and abs of re + j im; other functions of complex numbers have no value here. */
  private complexFunction(name: string, re: Slot, im: Slot): ComplexSlot {
    const b = this.builder;
    const size = b.call('sqrt', b.add(b.mul(re, re), b.mul(im, im)));
    if (name === 'abs') return { re: size, im: null };
    if (name === 'exp') {
      const factor = b.call('exp', re);
      return { re: b.mul(factor, b.call('cos', im)), im: b.mul(factor, b.call('sin', im)) };
    }
    if (name !== 'sqrt') return this.real(NaN);
    const root = b.call('sqrt', b.div(b.add(size, re), b.constant(2)));
    return { re: root, im: b.div(im, b.mul(b.constant(2), root)) };
  }

  private real(value: number): ComplexSlot {
    return { re: this.builder.constant(value), im: null };
  }

  private add(x: ComplexSlot, y: ComplexSlot): ComplexSlot {
    const re = this.builder.add(x.re, y.re);
    if (x.im === null || y.im === null) return { re, im: x.im ?? y.im };
    return { re, im: this.builder.add(x.im, y.im) };
  }

  private multiply(x: ComplexSlot, y: ComplexSlot): ComplexSlot {
    const b = this.builder;
    if (x.im === null && y.im === null) return { re: b.mul(x.re, y.re), im: null };
    if (x.im === null) return { re: b.mul(x.re, y.re), im: b.mul(x.re, y.im!) };
    if (y.im === null) return this.multiply(y, x);
    return {
      re: b.sub(b.mul(x.re, y.re), b.mul(x.im, y.im)),
      im: b.add(b.mul(x.re, y.im), b.mul(x.im, y.re)),
    };
  }

  private divide(x: ComplexSlot, y: ComplexSlot): ComplexSlot {
    const b = this.builder;
    if (y.im === null)
      return { re: b.div(x.re, y.re), im: x.im === null ? null : b.div(x.im, y.re) };
    const size = b.add(b.mul(y.re, y.re), b.mul(y.im, y.im));
    const { re, im } = this.multiply(x, { re: y.re, im: b.neg(y.im) });
    return { re: b.div(re, size), im: b.div(im!, size) };
  }

  private power(x: ComplexSlot, exponent: number): ComplexSlot {
    if (x.im === null) return { re: this.builder.powInt(x.re, exponent), im: null };
    let product: ComplexSlot = this.real(1);
    for (let k = 0; k < exponent; k++) product = this.multiply(product, x);
    return product;
  }
}

/** Where the parts of a compiled ratio stand among the outputs of its tape; `im` is null where it is real. */
export interface CompiledRatio {
  readonly re: number;
  readonly im: number | null;
}

export interface CompiledRatios {
  readonly tape: Tape;
  /** Names of the inputs, in the order in which the tape takes them. */
  readonly inputs: readonly string[];
  readonly outputs: readonly CompiledRatio[];
}

/**
 * Compiles ratios to one tape.
 *
 * `resolve` says for every symbol (and s, if it occurs) whether it is an input or stands for a formula, which is put in
 * its place. pi is a number, j makes two outputs, `nominal(x)` reads the inputs `nominal(NAME)`.
 */
export function compileRatios(ratios: readonly Ratio[], resolve: Resolve): CompiledRatios {
  const builder = new TapeBuilder();
  const compiler = new RatioCompiler(builder, resolve);
  const slots = ratios.map((r) => compiler.ratio(r));
  const places: Slot[] = [];
  const outputs = slots.map(({ re, im }) => {
    places.push(re);
    const first = places.length - 1;
    if (im !== null) places.push(im);
    return { re: first, im: im === null ? null : first + 1 };
  });
  const tape = builder.build(places);
  return { tape, inputs: tape.inputs, outputs };
}

/** The number that a ratio without symbols is; NaN where it has none (an even root of a negative number, j). */
export function numberOf(r: Ratio): number {
  const exact = asRational(r);
  if (exact) return rationalToNumber(exact);
  const { tape, inputs, outputs } = compileRatios([r], () => 'input');
  invariant(inputs.length === 0, `a number with the symbols ${inputs.join(', ')}`);
  const values = tape.evaluate([]);
  const { re, im } = outputs[0];
  return im === null || values[im] === 0 ? values[re] : NaN;
}
