import type { Value } from '../control/index.ts';
import type { Expression } from '../language/index.ts';
import type { Unit } from '../units/index.ts';
import type { Derivations } from './derivations.ts';
import type { DimensionReport } from './dimensions.ts';
import { plainName, type Numbers, type Subject } from './numbers.ts';
import type { Queries } from './queries.ts';
import type { ResultContent } from './report.ts';
import { BASE_SCOPE } from './scope.ts';
import { Stop, stopAt } from './stop.ts';

/** What figures are made from. */
export interface FigureSources {
  readonly derivations: Derivations;
  readonly numbers: Numbers;
  readonly queries: Queries;
  /** Key of the statement among the queries. */
  readonly key: string;
  readonly dimensions: DimensionReport;
  readonly hints: readonly Unit[];
  subjectOf(formula: Expression): Subject;
}

/** What a figure adds to its row. */
export type FigureContent = Pick<ResultContent, 'figure' | 'notes' | 'dependsOn'>;

/** The value of a subject; stops where it has a problem or waits. */
export function derivedValue(subject: Subject): Value {
  const outcome = subject.derive(BASE_SCOPE);
  if (outcome.ok) return outcome.value;
  throw new Stop(outcome.problem, outcome.waitsFor);
}

/** All names that several subjects are derived from. */
export function reachOfAll(subjects: readonly Subject[]): string[] {
  return [...new Set(subjects.flatMap((subject) => [...subject.reach]))];
}

/** Stops where one of the inputs has no number. */
export function requireNumbers(
  inputs: readonly string[],
  expression: Expression | { span: Expression['span'] },
  numbers: Numbers,
): void {
  const missing = inputs.filter((name) => numbers.nominal(plainName(name)) === null);
  if (missing.length === 0) return;
  stopAt(
    expression.span,
    'no-number',
    `${missing.join(', ')} ${missing.length === 1 ? 'has' : 'have'} no value, so this cannot be drawn.`,
  );
}
