import { allOf, NO, YES, type Condition, type Value } from '../control/index.ts';
import type { Expression, Relation, RequireStatement } from '../language/index.ts';
import { formatExpression } from '../language/index.ts';
import { conditionText, expressionLatex, valueText, wordsLatex } from '../present/index.ts';
import { formatNumber, formatValue, unitText, valueIn, type Unit } from '../units/index.ts';
import type { Derivations } from './derivations.ts';
import { unitFor, type Display } from './display.ts';
import { failureOf } from './failures.ts';
import type { Evaluated, Numbers, Points, Subject } from './numbers.ts';
import type { RequirementContent, Verdict } from './report.ts';
import { missingReason } from './results.ts';
import { sampleBox, type ToleranceSample } from './tolerance.ts';
import { isMonotoneSubject, movingNames, variantsOf } from './variants.ts';

/** What a verdict is made from. */
export interface RequirementRequest {
  readonly statement: RequireStatement;
  readonly subject: Subject;
  /** How the limit is shown. */
  readonly display: Display;
  readonly hints: readonly Unit[];
}

type Content = RequirementContent;

/** The verdict on a requirement at nominal values and over the tolerances, with its margin and its worst point. */
export function requirementContent(
  request: RequirementRequest,
  derivations: Derivations,
  numbers: Numbers,
): Content {
  const { subject } = request;
  const compiled = numbers.compiled(subject, numbers.zeroScope(numbers.zeros(subject)));
  if (!compiled)
    return settled(request, 'undecided', [
      'With the values that are exactly 0 left out, this cannot be derived.',
    ]);
  if (compiled.value.kind === 'none') {
    const why = valueText(compiled.value, derivations.writing());
    return settled(request, 'not met', [`No value: ${why}`]);
  }
  if (compiled.value.kind !== 'condition')
    return settled(request, 'undecided', ['A requirement is a condition.']);
  const missing = numbers.missing(compiled);
  if (missing.length > 0) return undecidedContent(request, compiled.value, missing, derivations);
  return judge(request, compiled.value, derivations, numbers);
}

/** A requirement that a problem stops. */
export function stoppedRequirement(statement: RequireStatement): Content {
  return { ...blank(statement), verdict: 'undecided', notes: [], shown: 'undecided' };
}

/** A requirement that cannot be read. */
export function unreadRequirement(label: string | null, text: string): Content {
  return {
    ...NO_NUMBERS,
    label,
    text,
    latex: wordsLatex(text),
    operator: null,
    verdict: 'undecided',
    notes: [],
    shown: 'undecided',
  };
}

function blank(statement: RequireStatement) {
  return {
    ...NO_NUMBERS,
    label: statement.comment,
    text: formatExpression(statement.condition),
    latex: expressionLatex(statement.condition),
    operator: relationOf(statement.condition)?.operators[0] ?? null,
  };
}

const NO_NUMBERS = {
  nominal: null,
  worst: null,
  limit: null,
  unit: null,
  how: 'proved' as const,
  n: null,
  at: null,
  waitsFor: null,
  dependsOn: [],
};

function settled(request: RequirementRequest, verdict: Verdict, notes: readonly string[]): Content {
  return {
    ...blank(request.statement),
    verdict,
    notes,
    shown: verdict,
    dependsOn: [...request.subject.reach],
  };
}

/** Conditions on symbols without values are undecided, and shown reduced. */
function undecidedContent(
  request: RequirementRequest,
  value: Extract<Value, { kind: 'condition' }>,
  missing: readonly string[],
  derivations: Derivations,
): Content {
  const reduced = derivations.reduced(allOf([value.condition, value.when]));
  if (reduced.kind === 'truth') return settled(request, reduced.value ? 'met' : 'not met', []);
  const holds = conditionText(reduced, derivations.writing());
  const words = `${missing.join(', ')} ${missing.length === 1 ? 'has' : 'have'} no value`;
  return settled(request, 'undecided', [`${words}; it holds if ${holds}.`]);
}

/** The one relation that a requirement is, perhaps under a `with`, or null for other conditions. */
export function relationOf(condition: Expression): Relation | null {
  if (condition.kind === 'with') return relationOf(condition.of);
  return condition.kind === 'relation' && condition.operators.length === 1 ? condition : null;
}

function judge(
  request: RequirementRequest,
  value: Extract<Value, { kind: 'condition' }>,
  derivations: Derivations,
  numbers: Numbers,
): Content {
  const { subject } = request;
  const variants = variantsOf(subject, numbers);
  const names = movingNames(variants, numbers);
  const monotone = isMonotoneSubject(variants, names, numbers, derivations);
  const sample = sampleBox(names, monotone, numbers);
  const evaluated = numbers.evaluateSubject(subject, sample);
  if (!evaluated)
    return settled(request, 'undecided', ['Somewhere in the tolerances this cannot be derived.']);
  const holds = evaluated.verdicts.map((verdict, i) =>
    verdict === YES && evaluated.exists[i] ? 1 : 0,
  );
  const worst = worstPoint(value.condition, evaluated, holds);
  const verdict = verdictOf(holds, evaluated);
  const numbersShown = relationNumbers(request, value.condition, evaluated, worst);
  return {
    ...blank(request.statement),
    verdict,
    ...numbersShown,
    how: sample.method,
    n: sample.method === 'sampled' ? sample.n : null,
    at: names.length > 0 ? placeOf(sample, worst) : null,
    notes: notesOf(request, value, { verdict, sample, worst }, derivations, numbers),
    shown: numbersShown.shown ?? verdict,
    dependsOn: [...subject.reach],
  };
}

/** What is undecided anywhere, and refuted nowhere, is undecided. */
function verdictOf(holds: Uint8Array, { verdicts, exists }: Evaluated): Verdict {
  if (!holds.includes(0)) return 'met';
  const isRefuted = verdicts.some((verdict, i) => verdict === NO || !exists[i]);
  if (!isRefuted) return 'undecided';
  return holds[0] ? 'met at nominal only' : 'not met';
}

/** The point with the least margin of a relation; of another condition the first at which it fails, else the nominal. */
function worstPoint(
  condition: Condition,
  { columns, exists }: Evaluated,
  holds: Uint8Array,
): number {
  const absent = exists.indexOf(0);
  if (absent >= 0) return absent;
  if (condition.kind !== 'compare' || condition.operator === '=' || condition.operator === '!=') {
    return Math.max(0, holds.indexOf(0));
  }
  const sign = condition.operator === '<' || condition.operator === '<=' ? 1 : -1;
  let [worst, least] = [0, Infinity];
  for (let i = 0; i < holds.length; i++) {
    const margin = sign * (columns[1][i] - columns[0][i]);
    if (margin < least) [worst, least] = [i, margin];
  }
  return worst;
}

function placeOf(sample: ToleranceSample, index: number): Record<string, number> {
  return Object.fromEntries(sample.names.map((name) => [name, sample.columns.get(name)![index]]));
}

type Numbers3 = Pick<Content, 'nominal' | 'worst' | 'limit' | 'unit'> & { shown?: string };

/** Nominal, worst and limit of a relation, in the limit's unit. */
function relationNumbers(
  request: RequirementRequest,
  condition: Condition,
  evaluated: Evaluated,
  worst: number,
): Numbers3 {
  const none: Numbers3 = { nominal: null, worst: null, limit: null, unit: null };
  const relation = relationOf(request.statement.condition);
  if (condition.kind !== 'compare' || !relation) return none;
  const [left, right] = evaluated.columns;
  const limit = right[0];
  if (!Number.isFinite(limit)) return none;
  const unit = unitFor(
    request.display,
    Math.max(Math.abs(limit), limit === 0 ? Math.abs(left[0]) : 0),
    request.hints,
  );
  const inUnit = (si: number): number => (unit ? valueIn(si, unit) : si);
  const finite = (number: number): number | null => (Number.isFinite(number) ? number : null);
  const ends = [0, worst].map((at) => inUnit(evaluated.exists[at] ? left[at] : NaN));
  return {
    nominal: finite(ends[0]),
    worst: finite(ends[1]),
    limit: finite(inUnit(limit)),
    unit: unit && unitText(unit) !== '' ? unit.text : null,
    shown: shownMargin(ends, limit, unit, relation.operators[0]),
  };
}

function shownMargin(
  [nominal, worst]: readonly number[],
  limit: number,
  unit: Unit | null,
  operator: Relation['operators'][number],
): string {
  const write = (number: number) =>
    Number.isFinite(number)
      ? formatNumber(number, 3)
      : number === Infinity
        ? 'infinite'
        : 'no value';
  const end = unit ? formatValue(limit, unit, { digits: 3 }) : formatNumber(limit, 3);
  const values = nominal === worst ? write(nominal) : `${write(nominal)}, worst ${write(worst)},`;
  return `${values} ${operator.startsWith('>') ? 'at least' : 'of'} ${end}`;
}

interface Judgement {
  readonly verdict: Verdict;
  readonly sample: ToleranceSample;
  readonly worst: number;
}

function notesOf(
  { subject }: RequirementRequest,
  value: Extract<Value, { kind: 'condition' }>,
  { verdict, sample, worst }: Judgement,
  derivations: Derivations,
  numbers: Numbers,
): string[] {
  const notes = [...value.notes];
  const there = numbers.compiledAt(subject, sample, worst)?.value;
  const why =
    verdict === 'met' || !there ? null : failureAt(there, sample, worst, derivations, numbers);
  if (why)
    notes.push(
      verdict === 'not met'
        ? `At the nominal or at the worst point ${why}.`
        : `At the worst point ${why}.`,
    );
  if (verdict === 'met' && sample.method === 'sampled')
    notes.push(`met (sampled, n = ${sample.n}): looked at, not proved.`);
  return notes;
}

/** Why a requirement fails at a point, in words: there is no value, or a block is not stable. */
function failureAt(
  value: Value,
  sample: ToleranceSample,
  index: number,
  derivations: Derivations,
  numbers: Numbers,
): string | null {
  const writing = derivations.writing();
  if (value.kind === 'none') return `there is no value: ${valueText(value, writing)}`;
  const at = pointAt(sample, index);
  const absent = failureOf(value.when, numbers, writing, at);
  if (absent) return `there is no value: ${absent}`;
  const notFound = missingReason(
    numbers.findings(value, at).filter((finding) => Number.isNaN(finding.value)),
  );
  if (notFound) return `there is no value: ${notFound}`;
  return value.kind === 'condition'
    ? failureOf(stableParts(value.condition), numbers, writing, at)
    : null;
}

/** Only failures of stability are put in words; those of a relation are seen in its numbers. */
function stableParts(condition: Condition): Condition {
  if (condition.kind === 'compare') return { kind: 'truth', value: true };
  return condition;
}

function pointAt(sample: ToleranceSample, index: number): Points {
  const columns = new Map(
    [...sample.columns].map(([name, column]) => [name, column.slice(index, index + 1)] as const),
  );
  return { count: 1, columns };
}
