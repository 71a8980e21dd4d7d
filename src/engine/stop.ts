import {
  Budget,
  BudgetExceeded,
  DEFAULT_BUDGET,
  withinBudget,
  errorAt,
  isRefusal,
  type Fix,
  type Problem,
  type Refusal,
  type Span,
} from '../base/index.ts';

/**
 * Ends the evaluation of one statement. It never leaves the engine: the query of the statement catches it and keeps
 * it as a value, so that dependants see a problem or what to wait for, not an exception.
 */
export class Stop extends Error {
  constructor(
    /** A problem of this statement, with a span relative to it. */
    readonly problem: Problem | null,
    /** The name whose problem stops this statement. */
    readonly waitsFor: string | null,
  ) {
    super(problem?.message ?? `waits for ${waitsFor}`);
    this.name = 'Stop';
  }
}

/** Stops with an error at a place in the statement. */
export function stopAt(
  span: Span,
  code: string,
  message: string,
  fixes: readonly Fix[] = [],
): never {
  throw new Stop(errorAt(span, code, message, fixes), null);
}

/** Stops because a name that the statement needs is in error itself. */
export function waitFor(name: string): never {
  throw new Stop(null, name);
}

/** The answer, or a stop at `span` with the refusal's reason. */
export function demand<T>(answer: T | Refusal, span: Span): T {
  if (isRefusal(answer)) stopAt(span, answer.code, sentence(answer.reason));
  return answer as T;
}

/** A reason as a sentence: capital, full stop. */
export function sentence(reason: string): string {
  const text = reason.trim();
  return /[.!?]$/.test(text) ? text : `${text}.`;
}

/** What a query of a statement keeps: its value, or why there is none. */
export type Outcome<T> =
  | { readonly ok: true; readonly value: T }
  | { readonly ok: false; readonly problem: Problem | null; readonly waitsFor: string | null };

/**
 * Runs the evaluation of one statement, and keeps whatever ends it as a value. This is the one boundary at which a
 * spent budget and a fault of the program itself are caught; both are reported at `span`.
 */
export function outcomeOf<T>(span: Span, evaluate: () => T): Outcome<T> {
  try {
    return { ok: true, value: withinBudget(new Budget(DEFAULT_BUDGET), evaluate) };
  } catch (error) {
    if (error instanceof Stop)
      return { ok: false, problem: error.problem, waitsFor: error.waitsFor };
    return { ok: false, problem: faultProblem(span, error), waitsFor: null };
  }
}

function faultProblem(span: Span, error: unknown): Problem {
  if (error instanceof BudgetExceeded) {
    return errorAt(
      span,
      'too-large',
      `This is too large: ${error.step} was stopped at ${error.size}. Give numbers for some symbols (\`with NAME is …\`), or split it.`,
    );
  }
  const message = error instanceof Error ? error.message : String(error);
  return errorAt(
    span,
    'our-fault',
    `Loopwright failed on this statement, which is our fault: ${message}.`,
  );
}
