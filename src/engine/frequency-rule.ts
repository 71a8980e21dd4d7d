import { warningAt, type Problem, type Span } from '../base/index.ts';
import { formatExpression, type Expression } from '../language/index.ts';
import { angleOf, cyclesOf, fitsAnywhere, isRate, type Measure } from './measures.ts';

/** A formula and what is known of its measure. */
export interface Measured {
  readonly of: Expression;
  readonly measure: Measure;
}

/** Where a fix writes a formula that cannot stand in the place of the one that is at fault, and what goes before it. */
export interface FixPlace {
  readonly span: Span;
  readonly prefix: string;
}

/**
 * The warning for a frequency in Hz that is added to or compared with an angular frequency or s without the factor 2π,
 * with that fix; null where the rule is kept. Whatever counts angles per second is angular, `sqrt(k/J)` too.
 *
 * Source: ISO 80000-3:2019, items 3-17.1 (frequency) and 3-18 (angular frequency).
 */
export function frequencyWarning(a: Measured, b: Measured, fixAt?: FixPlace): Problem | null {
  const isFrequencies = [a, b].every(({ measure }) => isRate(measure) && !fitsAnywhere(measure));
  if (!isFrequencies) return null;
  if (isCyclic(a.measure) && isAngular(b.measure)) return warning(a.of, fixAt);
  return isCyclic(b.measure) && isAngular(a.measure) ? warning(b.of, fixAt) : null;
}

function isCyclic(measure: Measure): boolean {
  return cyclesOf(measure) === 1;
}

function isAngular(measure: Measure): boolean {
  return cyclesOf(measure) === 0 && (angleOf(measure) !== 0 || measure.laplace);
}

function warning(cyclic: Expression, fixAt: FixPlace = { span: cyclic.span, prefix: '' }): Problem {
  const text = formatExpression(cyclic);
  const factor = cyclic.kind === 'sum' ? `(${text})` : text;
  const fixed = `${fixAt.prefix}2 pi ${factor}`;
  return warningAt(
    cyclic.span,
    'frequency-without-2pi',
    `\`${text}\` is a frequency in Hz, and the other side is an angular frequency; formulas do not convert: write \`${fixed}\`.`,
    [{ title: `Write ${fixed}`, edits: [{ span: fixAt.span, insert: fixed }] }],
  );
}
