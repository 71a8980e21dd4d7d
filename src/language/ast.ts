import type { Problem, Span } from '../base/index.ts';

/**
 * Formulas and statements as trees.
 *
 * Every span inside a statement is relative to the statement's first character, so that a statement whose text did
 * not change is the same frozen object wherever it has moved to; `PlacedStatement.from` places it in the worksheet.
 * Names are canonical: spelled-out Greek is replaced by the letter (`theta_m` is `θ_m`), see `names.ts`.
 */
export type Expression =
  | NumberLiteral
  | Quantity
  | Name
  | TextLiteral
  | Member
  | Derivative
  | Call
  | Evaluation
  | Arrow
  | Sum
  | Product
  | Negation
  | Power
  | Relation
  | Logical
  | Not
  | With
  | InUnit
  | Limit
  | Rows;

/** A bare number; `text` is its decimal form as typed, `1.2e-3`. */
export interface NumberLiteral {
  readonly kind: 'number';
  readonly span: Span;
  readonly text: string;
}

/** A number with a unit: in a quantity slot (`9 kN m/rad`), or in square brackets in a formula (`3 [rad/s]`). */
export interface Quantity {
  readonly kind: 'quantity';
  readonly span: Span;
  /** Decimal text with its sign, `-3.5e2`. */
  readonly text: string;
  /** Unit expression as typed, without brackets; empty where a slot holds a bare number. */
  readonly unit: string;
  readonly unitSpan: Span;
}

export interface Name {
  readonly kind: 'name';
  readonly span: Span;
  /** Its word alone, where brackets around it belong to the span. */
  readonly wordSpan?: Span;
  readonly name: string;
}

/** Text in quotes, for file names. */
export interface TextLiteral {
  readonly kind: 'text';
  readonly span: Span;
  readonly text: string;
}

/** `storm.e`, `(storm with Ki is 0).e`, and `x.theta` where a loop `uses stage as x`. */
export interface Member {
  readonly kind: 'member';
  readonly span: Span;
  readonly of: Expression;
  readonly name: string;
  readonly nameSpan: Span;
}

/** `theta''`: the `order`-th time derivative of a signal or of a bracket in a loop. */
export interface Derivative {
  readonly kind: 'derivative';
  readonly span: Span;
  readonly of: Expression;
  readonly order: number;
}

/** A call of a function or of a loop. `az(w -> e, T)` has the arguments [Arrow(w → e, T)]. */
export interface Call {
  readonly kind: 'call';
  readonly span: Span;
  readonly callee: string;
  readonly calleeSpan: Span;
  readonly args: readonly Expression[];
}

/** `L(0)`, `L(j w)`, `C(s)`: a definition or a signal directly before a bracket. */
export interface Evaluation {
  readonly kind: 'evaluation';
  readonly span: Span;
  readonly name: string;
  readonly nameSpan: Span;
  readonly at: Expression;
}

/** `w -> e` and `w -> theta, T`: from an input to one or more signals. */
export interface Arrow {
  readonly kind: 'arrow';
  readonly span: Span;
  readonly from: Expression;
  readonly to: readonly Expression[];
}

/** `a + b - c`; `signs[i]` is +1 or −1 for `terms[i]`. */
export interface Sum {
  readonly kind: 'sum';
  readonly span: Span;
  readonly terms: readonly Expression[];
  readonly signs: readonly (1 | -1)[];
}

/** `2 a b`, `a * b`, `a/b`; `inverted[i]` says that `factors[i]` divides. */
export interface Product {
  readonly kind: 'product';
  readonly span: Span;
  readonly factors: readonly Expression[];
  readonly inverted: readonly boolean[];
}

export interface Negation {
  readonly kind: 'negation';
  readonly span: Span;
  readonly of: Expression;
}

export interface Power {
  readonly kind: 'power';
  readonly span: Span;
  readonly base: Expression;
  readonly exponent: Expression;
}

/** `a < b <= c`: `operators[i]` stands between `sides[i]` and `sides[i+1]`. */
export interface Relation {
  readonly kind: 'relation';
  readonly span: Span;
  readonly sides: readonly Expression[];
  readonly operators: readonly RelationOperator[];
}

export type RelationOperator = '<' | '<=' | '=' | '>=' | '>';

export interface Logical {
  readonly kind: 'logical';
  readonly span: Span;
  readonly operator: 'and' | 'or';
  readonly operands: readonly Expression[];
}

export interface Not {
  readonly kind: 'not';
  readonly span: Span;
  readonly of: Expression;
}

/** One replacement of a `with`: `Kp is 2 kN m/rad` (value a Quantity or a formula) or `C = C2`. */
export interface Replacement {
  readonly span: Span;
  readonly name: string;
  readonly nameSpan: Span;
  readonly by: 'is' | '=';
  readonly value: Expression;
}

export interface With {
  readonly kind: 'with';
  readonly span: Span;
  readonly of: Expression;
  readonly replacements: readonly Replacement[];
}

/** `x in mrad`. */
export interface InUnit {
  readonly kind: 'in-unit';
  readonly span: Span;
  readonly of: Expression;
  readonly unit: string;
  readonly unitSpan: Span;
}

/** The argument `x as s to 0` of `limit`. */
export interface Limit {
  readonly kind: 'limit';
  readonly span: Span;
  readonly of: Expression;
  readonly variable: string;
  readonly to: Expression;
}

/** The argument `a, b | c, d` of `rows`. */
export interface Rows {
  readonly kind: 'rows';
  readonly span: Span;
  readonly rows: readonly (readonly Expression[])[];
}

export type Sign = 'positive' | 'negative' | 'nonnegative' | 'real';

/** A tolerance as typed. Numbers without a unit take the nominal's. */
export type ToleranceClause =
  | {
      readonly kind: 'half-width';
      readonly span: Span;
      readonly half: Quantity;
      /** `at 3 sigma`: normal, the half-width being so many standard deviations; null for hard bounds. */
      readonly sigmas: string | null;
    }
  | { readonly kind: 'range'; readonly span: Span; readonly from: Quantity; readonly to: Quantity };

export type Statement =
  | AssumptionStatement
  | UnitStatement
  | SignStatement
  | HasUnitStatement
  | TuneStatement
  | PointsStatement
  | DefinitionStatement
  | FormulaStatement
  | LoopStatement
  | CaseStatement
  | RequireStatement
  | DrawStatement
  | ExplainStatement
  | TabulateStatement
  | BrokenStatement;

interface StatementBase {
  /** Relative to the statement: from 0 to the end of its last character, comment excluded. */
  readonly span: Span;
  /** Text of the comment at the end of the (first line of the) statement, without `#`; null if there is none. */
  readonly comment: string | null;
}

export interface AssumptionStatement extends StatementBase {
  readonly kind: 'assumption';
  readonly name: string;
  readonly nameSpan: Span;
  readonly value: Quantity;
  readonly tolerance: ToleranceClause | null;
}

/** `unit count is 1.2 µrad`. */
export interface UnitStatement extends StatementBase {
  readonly kind: 'unit';
  readonly name: string;
  readonly nameSpan: Span;
  readonly value: Quantity;
}

export interface SignStatement extends StatementBase {
  readonly kind: 'sign';
  readonly names: readonly Name[];
  readonly sign: Sign;
}

export interface HasUnitStatement extends StatementBase {
  readonly kind: 'has-unit';
  readonly names: readonly Name[];
  readonly unit: string;
  readonly unitSpan: Span;
}

export interface TuneStatement extends StatementBase {
  readonly kind: 'tune';
  readonly name: string;
  readonly nameSpan: Span;
  readonly from: Quantity;
  readonly to: Quantity;
}

/** `points empty, half, full` with the assumptions that move together. */
export interface PointsStatement extends StatementBase {
  readonly kind: 'points';
  readonly points: readonly Name[];
  readonly assumptions: readonly {
    readonly span: Span;
    readonly name: string;
    readonly nameSpan: Span;
    readonly values: readonly Quantity[];
    readonly tolerance: ToleranceClause | null;
    readonly comment: string | null;
  }[];
}

export interface DefinitionStatement extends StatementBase {
  readonly kind: 'definition';
  readonly name: string;
  readonly nameSpan: Span;
  readonly formula: Expression;
}

export interface FormulaStatement extends StatementBase {
  readonly kind: 'formula';
  readonly formula: Expression;
}

export interface LoopStatement extends StatementBase {
  readonly kind: 'loop';
  readonly name: string;
  readonly nameSpan: Span;
  readonly inputs: readonly Name[];
  readonly uses: readonly {
    readonly span: Span;
    readonly loop: Name;
    readonly prefix: Name | null;
  }[];
  readonly equations: readonly {
    readonly span: Span;
    readonly left: Expression;
    readonly right: Expression;
  }[];
}

export interface CaseStatement extends StatementBase {
  readonly kind: 'case';
  readonly name: string;
  readonly nameSpan: Span;
  readonly loop: Name;
  /** `w = step(Tw) + ramp(R) after 5 s`; `order` > 0 for an input given by its derivative, `xb'' = …`. */
  readonly inputs: readonly {
    readonly span: Span;
    readonly input: Name;
    readonly order: number;
    readonly sources: readonly SourceTerm[];
  }[];
  /** `theta starts at 3 mrad`; `order` 1 for `theta' starts at 1 mrad/s`. */
  readonly starts: readonly {
    readonly span: Span;
    readonly signal: Expression;
    readonly order: number;
    readonly value: Expression;
  }[];
}

/** One source of a sum: `-step(Tw) after 5 s` is sign −1, the call, and a delay. */
export interface SourceTerm {
  readonly span: Span;
  readonly sign: 1 | -1;
  /** A Call of a source; a coefficient in front, `2 step(A)`, makes it a Product. */
  readonly source: Expression;
  readonly after: Expression | null;
}

export interface RequireStatement extends StatementBase {
  readonly kind: 'require';
  readonly condition: Expression;
  /** `for f from 5 Hz to 200 Hz`. */
  readonly band: {
    readonly variable: Name;
    readonly from: Expression;
    readonly to: Expression;
  } | null;
}

export interface DrawStatement extends StatementBase {
  readonly kind: 'draw';
  readonly figure:
    | 'region'
    | 'response'
    | 'frequency'
    | 'nyquist'
    | 'roots'
    | 'spectrum'
    | 'diagram'
    | 'budget'
    | 'simulation';
  readonly figureSpan: Span;
  /** What is drawn: `Kp, Ki` of a region, signals of a response. */
  readonly of: readonly Expression[];
  readonly where: readonly Expression[];
  /** `over 20 s`. */
  readonly over: Expression | null;
  /** `from 0.1 Hz to 100 Hz`, and `for Kp from a to b`. */
  readonly from: Expression | null;
  readonly to: Expression | null;
  readonly for: Name | null;
  readonly title: string | null;
}

export interface ExplainStatement extends StatementBase {
  readonly kind: 'explain';
  readonly formula: Expression;
}

export interface TabulateStatement extends StatementBase {
  readonly kind: 'tabulate';
  readonly columns: readonly Expression[];
  readonly for: readonly {
    readonly by: 'is' | '=' | 'range';
    readonly name: Name;
    /** The values, or [from, to] of a range. */
    readonly values: readonly Expression[];
    /** `12 steps`. */
    readonly steps: string | null;
  }[];
}

/** A statement that could not be read; its problems say why. `name` is what it would have defined, if that is clear. */
export interface BrokenStatement extends StatementBase {
  readonly kind: 'broken';
  readonly name: string | null;
  /** What it would be if it could be read; null where not even that is clear. */
  readonly meant: Exclude<Statement['kind'], 'broken'> | null;
}

/** A statement at its place in the worksheet. */
export interface PlacedStatement {
  readonly node: Statement;
  /** Offset in the worksheet's text of the statement's first character. */
  readonly from: number;
  /** Offset just past its last line (comments and indented lines included, line end excluded). */
  readonly to: number;
  /** Problems of reading it, with spans relative to `from`. An error here means that `node` is 'broken' or partial. */
  readonly problems: readonly Problem[];
}
