import type { Fraction, Generator, Ratio } from '../algebra/index.ts';
import type { Refusal, Span } from '../base/index.ts';
import type { SignalValue, Value } from '../control/index.ts';
import type { FunctionContext, LoopMeaning, WorksheetFunction } from '../functions/index.ts';
import type { Expression } from '../language/index.ts';
import type { CustomUnits } from '../units/index.ts';
import type { Scope } from './scope.ts';

/** A loop of the worksheet, closed. */
export interface LoopRecord extends LoopMeaning {
  readonly inputs: readonly string[];
  readonly unknowns: readonly string[];
  /** The coefficients of initial values in each row, by their names `θ(0)`. */
  readonly initialRows: readonly ReadonlyMap<string, Fraction>[];
}

/**
 * What names mean while a formula is evaluated. Implemented by the worksheet's derivations on top of the incremental
 * queries; every look-up is recorded as a dependency.
 */
export interface Meanings {
  /** The value of a formula in a scope; stops with a problem at its place where it has none. */
  evaluate(expression: Expression, scope: Scope): Value;
  /** The same formula as an uncancelled fraction in s. */
  evaluateFraction(expression: Expression, scope: Scope): Fraction;
  kindOf(
    name: string,
  ): 'assumption' | 'definition' | 'loop' | 'case' | 'symbol' | 'unavailable' | null;
  valueOf(name: string, span: Span, scope: Scope): Value;
  /** Uncancelled, for loop equations. */
  fractionOf(name: string, span: Span, scope: Scope): Fraction;
  loopOf(name: string, span: Span, scope: Scope): LoopRecord;
  /** A signal of a load case; `path` is its name in the loop, `theta` or `x.theta`. */
  signalOf(caseName: string, path: string, span: Span, scope: Scope): SignalValue;
  /** Stops unless an assumption or a definition of this name can be replaced in a `with`. */
  requireReplaceable(name: string, span: Span): void;
  substitute(ratio: Ratio, by: ReadonlyMap<Generator, Ratio>): Ratio | Refusal;
  functionNamed(name: string): WorksheetFunction | undefined;
  functionNames(): readonly string[];
  functionContext(scope: Scope): FunctionContext;
  customUnits(): CustomUnits;
  /** The unit that a name was given in, as typed; null where none is. */
  unitTextOf(name: string): string | null;
  /** The formula that defines a name; null where none does. */
  formulaOf(name: string): Expression | null;
  knownNames(): readonly string[];
  /** Loops that have a signal of this name, for hints. */
  loopsWithSignal(name: string): readonly string[];
  /** Load cases of a loop, for hints. */
  casesOf(loop: string): readonly string[];
}
