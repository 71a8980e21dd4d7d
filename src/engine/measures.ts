import { dimensionText, type Dimension, type Unit } from '../units/index.ts';

/**
 * What the check of dimensions knows of an expression.
 *
 * `exponents` are those of the seven SI base units, then of the plane angle and of the cycle. Angle and cycle count as
 * 1: they are kept for display and for the rule on frequencies, and never make two measures disagree. `unknowns` are
 * exponents of dimensions still to be inferred (signals, symbols without a value).
 */
export interface Measure {
  readonly exponents: readonly number[];
  readonly unknowns: ReadonlyMap<string, number>;
  /** Holds a name without a unit: fits wherever it stands. */
  readonly free: boolean;
  /** Holds a bare number. */
  readonly bare: boolean;
  /** Holds a quantity with a unit, so that a bare number beside it is a pure number. */
  readonly rigid: boolean;
  /** Holds s, which is an angular frequency. */
  readonly laplace: boolean;
  /** Is a ratio of densities, of which decibels are 10 log10. */
  readonly densities: boolean;
}

const BASES = 7;
const ANGLE = 7;
const CYCLE = 8;
const NO_UNKNOWNS: ReadonlyMap<string, number> = new Map();

function measure(exponents: readonly number[], more: Partial<Measure> = {}): Measure {
  return {
    exponents,
    unknowns: NO_UNKNOWNS,
    free: false,
    bare: false,
    rigid: false,
    laplace: false,
    densities: false,
    ...more,
  };
}

const NONE: readonly number[] = Array.from({ length: BASES + 2 }, () => 0);

function exponentsOf(base: number, value: number, angle = 0): number[] {
  return NONE.map((_, index) => (index === base ? value : index === ANGLE ? angle : 0));
}

const SECOND = 2;

export const NUMBER = measure(NONE, { bare: true });
export const PURE = measure(NONE, { rigid: true });
export const FREE = measure(NONE, { free: true });
export const ANGULAR = measure(exponentsOf(ANGLE, 1), { rigid: true });
export const TIME = measure(exponentsOf(SECOND, 1), { rigid: true });
export const ANGULAR_FREQUENCY = measure(exponentsOf(SECOND, -1, 1), { rigid: true });
/** A frequency f, in cycles per second. */
export const FREQUENCY = measure(
  NONE.map((_, index) => (index === SECOND ? -1 : index === CYCLE ? 1 : 0)),
  { rigid: true },
);
/** What a time derivative multiplies by: no unit is typed in it, so that by itself it makes no measure rigid. */
export const DERIVATIVE = measure(exponentsOf(SECOND, -1));
export const LAPLACE = measure(exponentsOf(SECOND, -1), { laplace: true });

/** The measure of a unit. */
export function measureOfUnit(unit: Unit): Measure {
  return measure([...unit.dimension.exponents, unit.angle, unit.cycles], { rigid: true });
}

/** A dimension still to be inferred. */
export function unknownMeasure(name: string): Measure {
  return measure(NONE, { unknowns: new Map([[name, 1]]) });
}

/** The measure of a product. */
export function mulMeasures(a: Measure, b: Measure): Measure {
  return {
    exponents: a.exponents.map((exponent, index) => exponent + b.exponents[index]),
    unknowns: addUnknowns(a.unknowns, b.unknowns),
    free: a.free || b.free,
    bare: a.bare || b.bare,
    rigid: a.rigid || b.rigid,
    laplace: a.laplace || b.laplace,
    densities: a.densities || b.densities,
  };
}

function addUnknowns(
  a: ReadonlyMap<string, number>,
  b: ReadonlyMap<string, number>,
): ReadonlyMap<string, number> {
  if (a.size === 0) return b;
  if (b.size === 0) return a;
  const sum = new Map(a);
  for (const [name, exponent] of b) {
    const total = (sum.get(name) ?? 0) + exponent;
    if (total === 0) sum.delete(name);
    else sum.set(name, total);
  }
  return sum;
}

/** The measure of a power. */
export function powMeasure(a: Measure, exponent: number): Measure {
  return {
    ...a,
    densities: a.densities && Math.abs(exponent) === 1,
    exponents: a.exponents.map((own) => own * exponent),
    unknowns:
      exponent === 0
        ? NO_UNKNOWNS
        : new Map([...a.unknowns].map(([name, own]) => [name, own * exponent])),
  };
}

export function divMeasures(a: Measure, b: Measure): Measure {
  return mulMeasures(a, powMeasure(b, -1));
}

/** The measure of a quotient; of two densities per Hz it is known to be one. */
export function quotientOf(above: Measure, below: Measure): Measure {
  const densities = cyclesOf(above) === -1 && cyclesOf(below) === -1;
  const quotient = divMeasures(above, below);
  return densities ? { ...quotient, densities } : quotient;
}

/** 2π f: the factor turns cycles into angles. */
export function cyclesToAngle(a: Measure): Measure {
  const exponents = a.exponents.map((own, index) =>
    index === ANGLE ? own + a.exponents[CYCLE] : index === CYCLE ? 0 : own,
  );
  return { ...a, exponents };
}

/** ω/(2π): a rate becomes a frequency in cycles; anything else stays what it is. */
export function angleToCycles(a: Measure): Measure {
  if (!isRate(a) || cyclesOf(a) !== 0 || fitsAnywhere(a)) return a;
  return withCounted(a, 0, 1);
}

/**
 * What is said of angles by the unit that a measure is shown in: `sqrt(k/m) in rad/s` is an angular frequency. Hertz is
 * not taken so, since it needs the factor 2π.
 */
export function saidAngle(a: Measure, unit: Measure): Measure {
  return cyclesOf(a) === 0 && cyclesOf(unit) === 0 ? withCounted(a, angleOf(unit), 0) : a;
}

function withCounted(a: Measure, angle: number, cycles: number): Measure {
  const exponents = a.exponents.map((own, index) =>
    index === ANGLE ? angle : index === CYCLE ? cycles : own,
  );
  return { ...a, exponents };
}

/** Whether it fits wherever it stands: a name without a unit, or a bare number with nothing rigid beside it. */
export function fitsAnywhere(a: Measure): boolean {
  return a.free || (a.bare && !a.rigid);
}

export function angleOf(a: Measure): number {
  return a.exponents[ANGLE];
}

/**
 * The power of rad that is worth showing: rad and per rad, in the units of the trade (N m/rad, rad/s²). Higher powers
 * and roots, which formulas such as J ω² and c/√(k J) bring about, are left out, and a pure number is not per rad. A
 * density keeps the powers that it was given in (rad²/Hz).
 */
export function shownAngle(a: Measure): number {
  const angle = angleOf(a);
  if (cyclesOf(a) < 0) return angle;
  return angle === 1 || (angle === -1 && !hasNoDimension(a)) ? angle : 0;
}

/** The power of Hz that is worth showing: a ratio of a frequency and an angular frequency is a pure number. */
export function shownCycles(a: Measure): number {
  return hasNoDimension(a) ? 0 : cyclesOf(a);
}

function hasNoDimension(a: Measure): boolean {
  return a.exponents.slice(0, BASES).every((exponent) => exponent === 0);
}

export function cyclesOf(a: Measure): number {
  return a.exponents[CYCLE];
}

/** The dimension, where nothing is left to infer. */
export function dimensionIn(a: Measure): Dimension {
  return { exponents: a.exponents.slice(0, BASES) };
}

/** A pure number per angle to which a bare number is added is a pure number: 1 + s/ω. */
export function withoutPerAngle(a: Measure): Measure {
  return hasNoDimension(a) && a.unknowns.size === 0 && angleOf(a) < 0 ? withCounted(a, 0, 0) : a;
}

/** Whether it has neither a dimension nor an angle, and nothing is left to infer. */
export function isPure(a: Measure): boolean {
  return a.unknowns.size === 0 && a.exponents.every((own, index) => own === 0 || index === CYCLE);
}

/** Whether it is a frequency or a rate: 1/s. */
export function isRate(a: Measure): boolean {
  return (
    a.unknowns.size === 0 &&
    a.exponents.slice(0, BASES).every((own, index) => own === (index === SECOND ? -1 : 0))
  );
}

/** The measure in words: `N m`, `rad`, `a pure number`; `[x] 1/s` where the unit of x is not known. */
export function measureText(a: Measure): string {
  const text = dimensionText(dimensionIn(a), {
    angle: a.exponents[ANGLE],
    cycles: a.exponents[CYCLE],
  });
  const known = text === '1' ? '' : text;
  const unknown = [...a.unknowns].map(unknownText).join(' ');
  return [unknown, known].filter((part) => part !== '').join(' ') || 'a pure number';
}

/** The unit of a signal or a symbol, as ISO 80000-1 writes it: `[x]`, `[x]^2`. */
function unknownText([key, exponent]: readonly [string, number]): string {
  const name = key.slice(key.lastIndexOf('.') + 1).replace(/^symbol /, '');
  return `[${name}]${exponent === 1 ? '' : `^${exponent}`}`;
}

/** The dimensions inferred so far, and the one way to add to them. */
export class Inference {
  private readonly bound: Map<string, Measure>;

  constructor(bound: ReadonlyMap<string, Measure> = new Map()) {
    this.bound = new Map(bound);
  }

  /** Another inference that knows the same so far. */
  copy(): Inference {
    return new Inference(this.bound);
  }

  /** The measure with everything put in that is known. */
  settle(a: Measure): Measure {
    let settled = a;
    for (
      let known = firstKnown(settled, this.bound);
      known;
      known = firstKnown(settled, this.bound)
    ) {
      const [name, exponent] = known;
      const unknowns = new Map(settled.unknowns);
      unknowns.delete(name);
      const value = powMeasure(this.bound.get(name)!, exponent);
      const sum = mulMeasures({ ...settled, unknowns }, value);
      settled = {
        ...sum,
        free: settled.free,
        bare: settled.bare,
        rigid: sum.rigid,
        laplace: settled.laplace,
        densities: settled.densities,
      };
    }
    return settled;
  }

  /** Makes two measures agree by inferring an unknown; false where they disagree and a unit is to blame. */
  unify(a: Measure, b: Measure): boolean {
    if (fitsAnywhere(a) || fitsAnywhere(b)) return true;
    const [left, right] = [this.settle(a), this.settle(b)];
    const difference = divMeasures(left, right);
    const [unknown] = difference.unknowns;
    if (!unknown && !difference.rigid) return true;
    if (!unknown)
      return difference.exponents.slice(0, BASES).every((exponent) => Math.abs(exponent) < 1e-9);
    const [name, exponent] = unknown;
    const others = new Map(difference.unknowns);
    others.delete(name);
    const value = powMeasure(
      { ...difference, unknowns: others, free: false, bare: false },
      -1 / exponent,
    );
    this.bound.set(name, { ...value, laplace: false });
    return true;
  }
}

function firstKnown(a: Measure, bound: ReadonlyMap<string, Measure>): [string, number] | undefined {
  for (const unknown of a.unknowns) if (bound.has(unknown[0])) return unknown;
  return undefined;
}
