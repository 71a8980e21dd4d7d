import type { Problem } from '../base/index.ts';
import type { FigureData } from '../figures/index.ts';

/**
 * What one revision of a worksheet comes to: plain frozen data, in the order of the text. The page, the memo and the
 * command read nothing else. A row that did not change since the last revision but for its place has the same `content`
 * object.
 */
export interface Report {
  readonly results: readonly Placed<ResultContent>[];
  readonly requirements: readonly Placed<RequirementContent>[];
  readonly assumptions: readonly Placed<AssumptionContent>[];
  /** Absolute spans, in order of the text. */
  readonly problems: readonly Problem[];
  /** `{e_ss}` in prose, with the present value, or null where there is none. */
  readonly references: readonly {
    readonly from: number;
    readonly to: number;
    readonly name: string;
    readonly shown: string | null;
  }[];
  readonly loops: readonly Placed<LoopContent>[];
}

/** A row at its statement: offsets in the text, 1-based first line. */
export interface Placed<Content> {
  readonly from: number;
  readonly to: number;
  readonly line: number;
  readonly content: Content;
}

export type ResultKind =
  'value' | 'transfer' | 'polynomial' | 'array' | 'condition' | 'table' | 'figure' | 'text';

export interface ResultContent {
  readonly name: string | null;
  readonly nameLatex: string | null;
  readonly kind: ResultKind;
  /** Re-readable by the worksheet language; null where the statement is in error. */
  readonly formula: string | null;
  readonly latex: string | null;
  /** Coherent SI; a ratio for gains. Null when there is none. */
  readonly value: number | readonly [number, number] | boolean | null;
  /** Coherent SI unit of `value`, null for none. */
  readonly unit: string | null;
  readonly shown: string | null;
  readonly span: SpanContent | null;
  readonly notes: readonly string[];
  /** What a result of its kind is made of, as in `check --json`: plain data. */
  readonly parts: unknown;
  readonly figure: FigureData | null;
  /** `trivial`: the same as its source, not to be repeated on the page; `error`: a problem stops it (its own or one it waits for). */
  readonly state: 'ready' | 'trivial' | 'error';
  /** When state is 'error' and the cause is elsewhere: what it waits for. */
  readonly waitsFor: { readonly name: string; readonly line: number } | null;
  /** Names of assumptions and definitions that it was computed from. */
  readonly dependsOn: readonly string[];
}

export interface SpanContent {
  readonly low: number;
  readonly high: number;
  readonly how: 'proved' | 'corners' | 'sampled';
  readonly n: number | null;
  /** In the unit of `shown`: "-44 to 0 mrad". */
  readonly shown: string;
}

export type Verdict = 'met' | 'met at nominal only' | 'not met' | 'undecided';

export interface RequirementContent {
  readonly label: string | null;
  readonly text: string;
  readonly latex: string;
  readonly verdict: Verdict;
  /** In the limit's unit; null for conditions. */
  readonly nominal: number | null;
  readonly worst: number | null;
  readonly limit: number | null;
  /** `<`, `<=`, `>=`, `>` or null for a condition. */
  readonly operator: string | null;
  readonly unit: string | null;
  readonly how: 'proved' | 'corners' | 'sampled';
  readonly n: number | null;
  /** SI values of the toleranced names at the worst point. */
  readonly at: Readonly<Record<string, number>> | null;
  /** Sentences: what fails, the block at fault, what is missing. */
  readonly notes: readonly string[];
  /** Short text of the margin for the side column: "0.12 of 0.2 mrad". */
  readonly shown: string;
  readonly waitsFor: { readonly name: string; readonly line: number } | null;
  readonly dependsOn: readonly string[];
}

export interface AssumptionContent {
  readonly name: string;
  readonly nameLatex: string;
  readonly description: string | null;
  /** As typed. */
  readonly valueText: string;
  readonly toleranceText: string | null;
  readonly sign: string | null;
  /** Nominal in the typed unit, and the typed unit; null for a symbol without a value. */
  readonly number: number | null;
  readonly unit: string | null;
  readonly unitLatex: string | null;
  /** Absolute offsets of the number's text, for editing in place; null where there is none. */
  readonly numberSpan: { readonly from: number; readonly to: number } | null;
  /** Range of the slider in the typed unit: the `tune` range, else the tolerance, else none. */
  readonly slider: {
    readonly low: number;
    readonly high: number;
    readonly why: 'tune' | 'tolerance';
  } | null;
  readonly used: boolean;
}

export interface LoopContent {
  readonly name: string;
  readonly inputs: readonly string[];
  readonly unknowns: readonly string[];
  /** The equations typeset, as read. */
  readonly equationsLatex: readonly string[];
}
