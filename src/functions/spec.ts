import type { Budget, Refusal } from '../base/index.ts';
import type { Generator, Ratio, Sign } from '../algebra/index.ts';
import type {
  ClosedLoop,
  Condition,
  FormulaValue,
  LoopRow,
  SignalValue,
  StabilityBlock,
  Value,
} from '../control/index.ts';
import type { RelationOperator } from '../language/index.ts';
import type { Writing } from '../present/index.ts';

/**
 * The description of one worksheet function. The same object feeds evaluation, completion, hover help, the reference
 * and the errors, so that they cannot disagree.
 */
export interface WorksheetFunction {
  readonly name: string;
  /** One sentence. */
  readonly summary: string;
  /** The published source of the method, or null where it is a definition. */
  readonly source: string | null;
  /** Cells whose last line uses the function; run by the tests. */
  readonly example: string;
  readonly parameters: readonly Parameter[];
  /** Unit of the result, for the check of dimensions. */
  readonly unit: UnitRule;
  /** `later`: known to the language, but refused until it is built. */
  readonly availability: 'now' | 'later';
  /** Whether it can say something of an argument that has no value; others pass it on. */
  readonly takesAbsent?: boolean;
  evaluate(args: readonly Argument[], context: FunctionContext): Value | Refusal;
}

export type ParameterKind =
  /** A formula without s: a parameter. */
  | 'parameter'
  /** A frequency in Hz or in rad/s, handed on as an angular frequency; without a unit it is taken in Hz. */
  | 'frequency'
  /** The same, taken in rad/s where it has no unit. */
  | 'angular frequency'
  /** A rational function of s, or a parameter. */
  | 'formula'
  /** A signal `storm.e`, or a formula in s taken as its transform. */
  | 'signal'
  | 'loop'
  /** A loop or a polynomial in s. */
  | 'loop or polynomial'
  | 'signal name'
  | 'name'
  /** A name that the call itself introduces, as `solve` does its unknown. */
  | 'unknown'
  | 'relation'
  | 'limit'
  | 'matrix'
  /** A band about a final value: in % of it, or a quantity. */
  | 'band'
  /** Rows of entries, `a, b | c, d`. */
  | 'rows'
  | 'any';

export interface Parameter {
  readonly name: string;
  readonly takes: ParameterKind;
  /** Zero or one argument for 'optional', zero or more for 'rest'. */
  readonly count: 'one' | 'optional' | 'rest';
  /** A quantity slot: a number followed only by a unit is a quantity. */
  readonly slot: boolean;
}

/** A required argument. */
export function one(name: string, takes: ParameterKind): Parameter {
  return { name, takes, count: 'one', slot: false };
}

/** A required argument that is a quantity slot. */
export function slot(name: string): Parameter {
  return { name, takes: 'parameter', count: 'one', slot: true };
}

/** A required frequency, in Hz or in rad/s; `unitless` is what it is in without a unit. */
export function frequencySlot(
  name: string,
  unitless: 'frequency' | 'angular frequency',
): Parameter {
  return { name, takes: unitless, count: 'one', slot: true };
}

/** A frequency that may be left out. */
export function optionalFrequency(name: string): Parameter {
  return { name, takes: 'frequency', count: 'optional', slot: true };
}

/** An argument that may be left out. */
export function optional(name: string, takes: ParameterKind): Parameter {
  return { name, takes, count: 'optional', slot: false };
}

/** Any number of further arguments. */
export function rest(name: string, takes: ParameterKind): Parameter {
  return { name, takes, count: 'rest', slot: false };
}

/**
 * Unit of a result: that of the first argument (`common`: of all, which must agree; `signal`: of the signal, or of the
 * transform times 1/s), of the second, its square root, its square (`density`: per Hz; `bandwidth`: times Hz), first over
 * second, a number (`pure`: of a pure argument), a
 * time, an angular frequency, or not checked.
 */
export type UnitRule =
  | 'first'
  | 'second'
  | 'common'
  | 'signal'
  | 'root'
  | 'square'
  | 'density'
  | 'bandwidth'
  | 'quotient'
  | 'number'
  | 'pure'
  | 'time'
  | 'angle'
  | 'angular frequency'
  | 'unchecked';

export type Argument =
  | { readonly kind: 'value'; readonly value: Value }
  | { readonly kind: 'signal'; readonly signal: SignalValue }
  | { readonly kind: 'band'; readonly value: FormulaValue; readonly isRelative: boolean }
  | { readonly kind: 'loop'; readonly loop: LoopMeaning }
  | { readonly kind: 'name'; readonly name: string; readonly generator: Generator }
  | {
      readonly kind: 'relation';
      readonly sides: readonly Value[];
      readonly operators: readonly RelationOperator[];
    }
  | {
      readonly kind: 'limit';
      readonly of: Value;
      readonly variable: Generator;
      readonly to: Ratio | 'infinity';
    };

/** A loop of the worksheet, closed, as functions see it. */
export interface LoopMeaning {
  readonly name: string;
  readonly closed: ClosedLoop;
  readonly rows: readonly LoopRow[];
  /** Equations whose whole left side is a signal: signal → row. */
  readonly definedBy: ReadonlyMap<string, number>;
  /** What must hold for its coefficients to have a value; they may be results of other loops. */
  readonly when: Condition;
  blocks(signal: string | null): readonly StabilityBlock[];
}

export interface FunctionContext {
  readonly signOf: (g: Generator) => Sign;
  readonly budget: Budget;
  /** The formula with every derived parameter opened down to assumptions. */
  readonly open: (ratio: Ratio) => Ratio;
  /** The formula with only those derived parameters opened that a symbol stands behind. */
  readonly openFor: (ratio: Ratio, behind: Generator) => Ratio;
  /** Gains that are tuned, in order of the worksheet: what conditions are solved for first. */
  readonly tuned: readonly Generator[];
  /** A condition as an engineer reads it. */
  readonly readable: (condition: Condition) => Condition;
  /** How a formula is written in messages. */
  readonly write: (ratio: Ratio) => string;
  /** How the worksheet's formulas are written. */
  readonly writing: Writing;
}
