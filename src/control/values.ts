import type { Fraction, Generator, Polynomial, Ratio } from '../algebra/index.ts';
import type { ResponseImpulse, ResponseTerm } from './time-function.ts';

/**
 * What a formula of a worksheet stands for, in symbols.
 *
 * A value never carries numbers of assumptions; those are put in by the numeric stage. `when` is what must hold for
 * the value to exist (a final value exists only where its poles allow it); it travels along with every value that is
 * computed from it. `notes` are sentences that are shown with the result.
 */
export type Value =
  | FormulaValue
  | NoValue
  | ConditionValue
  | SignalValue
  | MatrixValue
  | ArrayValue
  | RootsValue
  | PartsValue
  | TextValue;

interface ValueBase {
  readonly when: Condition;
  readonly notes: readonly string[];
}

/** A rational function of parameters and perhaps of s (a transfer function, a polynomial, a parameter). */
export interface FormulaValue extends ValueBase {
  readonly kind: 'formula';
  readonly ratio: Ratio;
  /** Factor of the characteristic polynomial that cancelled on the way, in s; null if none did. */
  readonly hidden: Polynomial | null;
  /** A transfer function read from a loop is refused where a signal is wanted. */
  readonly origin: 'formula' | 'transfer';
  /** How it is to be written, where a function such as `expand` asked for it. */
  readonly form?: WrittenForm;
}

/** A form asked for by name; `collected` by powers of a symbol or of s. */
export type WrittenForm =
  | { readonly kind: 'expanded' }
  | { readonly kind: 'factored' }
  | { readonly kind: 'time constants' | 'poles and zeros' }
  | { readonly kind: 'collected'; readonly by: Generator };

/** A value that does not exist or is infinite, with the reason in words. Never a problem. */
export interface NoValue extends ValueBase {
  readonly kind: 'none';
  readonly reason: string;
  /** Growth of a final value that does not exist: x ~ rate · t^power / power!. */
  readonly growth: { readonly rate: Ratio; readonly power: number } | null;
}

export interface ConditionValue extends ValueBase {
  readonly kind: 'condition';
  readonly condition: Condition;
}

export interface MatrixValue extends ValueBase {
  readonly kind: 'matrix';
  readonly rows: readonly (readonly Ratio[])[];
}

/** A Routh array with its special cases and conditions, see `routh.ts`. */
export interface ArrayValue extends ValueBase {
  readonly kind: 'array';
  readonly routh: RouthArray;
}

/** Poles or zeros: the roots in s of an exact polynomial. */
export interface RootsValue extends ValueBase {
  readonly kind: 'roots';
  readonly of: 'poles' | 'zeros' | 'roots';
  readonly polynomial: Polynomial;
}

/** Several named formulas: the gains of `match`, the constants of `error_constants`, terms of `partial_fractions`. */
export interface PartsValue extends ValueBase {
  readonly kind: 'parts';
  readonly parts: readonly { readonly name: string; readonly value: Value }[];
  /** `sum`: the parts add up to the whole (partial fractions); `list` otherwise. */
  readonly joined: 'sum' | 'list';
}

interface ResponseBase {
  readonly kind: 'response';
  readonly impulses: readonly ResponseImpulse[];
  readonly when: Condition;
  readonly notes: readonly string[];
}

/** A signal as a function of t ≥ 0: the sum of its terms, exact, or in decimals where roots had to be found numerically. */
export type Response = ResponseBase &
  (
    | { readonly exact: true; readonly terms: readonly ResponseTerm<Ratio>[] }
    | { readonly exact: false; readonly terms: readonly ResponseTerm<number>[] }
  );

/** A closed-form response, as it is written and as what it is. */
export interface TextValue extends ValueBase {
  readonly kind: 'text';
  readonly response: Response;
  readonly text: string;
  readonly latex: string;
}

export type SourceKind = 'constant' | 'drifting' | 'impulsive' | 'periodic' | 'random' | 'initial';

/**
 * White noise: what stands behind every random source. Terms of one `id` and one density are the same noise on several
 * paths; all others are independent.
 */
export interface WhiteNoise {
  readonly id: string;
  /** One-sided, per Hz. */
  readonly density: Ratio;
}

/**
 * One source's share of a signal: X(s) = transform · e^(−s·after). A random share has no transform of its own: there
 * `transform` is the transfer function from the white noise to the signal.
 */
export interface SignalTerm {
  readonly input: string;
  readonly source: SourceKind;
  readonly transform: Ratio;
  /** Seconds by which the source begins later; zero if it does not. */
  readonly after: Ratio;
  /** Of a random share only. */
  readonly noise?: WhiteNoise;
  /** Of a periodic share only: the angular frequency of its line. */
  readonly frequency?: Ratio;
}

export interface SignalValue extends ValueBase {
  readonly kind: 'signal';
  /** How it is called: `storm.e`. */
  readonly name: string;
  readonly terms: readonly SignalTerm[];
  /** The inputs of its loop; empty for a formula taken as a transform. */
  readonly inputs: readonly string[];
  /** The blocks of the loop that the signal depends on, uncancelled; empty for a formula taken as a transform. */
  readonly blocks: readonly StabilityBlock[];
}

/** A block of a loop: signals that feed each other, with its characteristic polynomial in s, uncancelled. */
export interface StabilityBlock {
  readonly signals: readonly string[];
  readonly polynomial: Polynomial;
}

export type Comparison = '>' | '>=' | '=' | '!=' | '<' | '<=';

/** A statement about parameters that can be true or false. Ratios in it are free of s. */
export type Condition =
  | { readonly kind: 'truth'; readonly value: boolean }
  | {
      readonly kind: 'compare';
      readonly left: Ratio;
      readonly operator: Comparison;
      readonly right: Ratio;
    }
  /** All roots of every block's polynomial in the open left half plane. */
  | { readonly kind: 'stable'; readonly blocks: readonly StabilityBlock[] }
  | { readonly kind: 'all' | 'any'; readonly of: readonly Condition[] }
  | { readonly kind: 'not'; readonly of: Condition }
  | { readonly kind: 'undecided'; readonly reason: string };

export const ALWAYS: Condition = Object.freeze({ kind: 'truth', value: true });

export interface RouthRow {
  /** Power of s at the left of the row. */
  readonly power: number;
  readonly entries: readonly Ratio[];
  /** What was done to this row: its first element replaced by ε, or the whole zero row by the auxiliary derivative. */
  readonly special: 'zero first element' | 'zero row' | null;
}

export interface RouthArray {
  readonly rows: readonly RouthRow[];
  /** The auxiliary polynomial (in s) of every zero row, in order. */
  readonly auxiliaries: readonly Polynomial[];
  /** Conditions that together say: all roots in the open left half plane. Reduced by the signs known. */
  readonly conditions: readonly Condition[];
  /** Root counts, where all entries are numbers: right half plane, axis, left half plane. */
  readonly counts: { readonly right: number; readonly axis: number; readonly left: number } | null;
  readonly notes: readonly string[];
}

/** One equation of a loop: Σ coefficient · signal = 0, fractions uncancelled; signals that do not occur are left out. */
export interface LoopRow {
  readonly coefficients: ReadonlyMap<string, Fraction>;
}
