import {
  coefficientsIn,
  dependsOn,
  isConstantPolynomial,
  laplace,
  ratioFromPolynomial,
  rationalToNumber,
  asRational,
} from '../algebra/index.ts';
import type {
  Condition,
  Finding,
  FormulaValue,
  NoValue,
  PartsValue,
  RootsValue,
  Value,
} from '../control/index.ts';
import { ALWAYS, allOf, compileRatios, foundMultiple, UNDECIDED, YES } from '../control/index.ts';
import { formatExpression, nameToLatex, type Expression } from '../language/index.ts';
import { polynomialRoots } from '../numeric/index.ts';
import {
  formulaText,
  jsonComplex,
  jsonNumber,
  jsonRoots,
  matrixRows,
  rootsLatex,
  valueLatex,
  valueText,
  type Writing,
} from '../present/index.ts';
import { formatNumber, unitText, valueIn, type Unit } from '../units/index.ts';
import type { Derivations } from './derivations.ts';
import { coherentText, showSpan, showValue, unitFor, type Display } from './display.ts';
import { failureOf } from './failures.ts';
import {
  asMagnitude,
  plainName,
  type Compiled,
  type Evaluated,
  type Numbers,
  type Points,
  type Subject,
} from './numbers.ts';
import { DERIVATIVE, mulMeasures, powMeasure } from './measures.ts';
import type { ResultContent, ResultKind, SpanContent } from './report.ts';
import { vanishingNotes } from './vanishing.ts';
import { sampleBox } from './tolerance.ts';
import { isMonotoneSubject, movingNames, variantsOf } from './variants.ts';
import { writtenForm, type Written } from './written.ts';

const NOMINAL: Points = { count: 1, columns: new Map() };

/** What a result is made from. */
export interface ResultRequest {
  readonly name: string | null;
  readonly expression: Expression;
  readonly subject: Subject;
  readonly display: Display;
  readonly hints: readonly Unit[];
  readonly notes: readonly string[];
}

/** The content of a result that can be derived: formula, value, span, parts. */
export function resultContent(
  value: Value,
  request: ResultRequest,
  derivations: Derivations,
  numbers: Numbers,
): ResultContent {
  const writing = derivations.writing();
  const nominal = nominalValue(request, numbers, derivations);
  const written = numbers.derivedForm(request.subject, 'written', (derived) =>
    writtenForm(derived, derivations.writing()),
  )!;
  const { formula } = written;
  const { display } = request;
  const shown = shownText(nominal.value, display, request.hints);
  const parts = written.array ?? partsOf(value, numbers, writing);
  const hasNoDecibels = Array.isArray(nominal.value) && display.fixed?.logarithmic;
  return {
    name: request.name,
    nameLatex: request.name && nameToLatex(request.name),
    kind: kindOf(value),
    formula,
    latex: latexOf(value, written, numbers),
    value: nominal.value,
    unit: value.kind === 'condition' ? null : coherentText(display.measure),
    shown,
    span: typeof nominal.value === 'number' ? spanOf(request, numbers, derivations) : null,
    notes: [
      ...new Set([
        ...derivations.provisions(value),
        ...value.notes,
        ...written.notes,
        ...request.notes,
        ...display.notes,
        ...(hasNoDecibels
          ? ['A complex number has no decibels; take its magnitude, `abs(…)`.']
          : []),
        ...vanishingNotes(request.subject, numbers, derivations),
        ...nominal.notes,
      ]),
    ],
    parts,
    figure: null,
    state: isTrivial(value, request, formula) ? 'trivial' : 'ready',
    waitsFor: null,
    dependsOn: [...request.subject.reach],
  };
}

/** The content of a result that a problem stops. */
export function erroneousContent(name: string | null, kind: ResultKind): ResultContent {
  return {
    name,
    nameLatex: name && nameToLatex(name),
    kind,
    formula: null,
    latex: null,
    value: null,
    unit: null,
    shown: null,
    span: null,
    notes: [],
    parts: null,
    figure: null,
    state: 'error',
    waitsFor: null,
    dependsOn: [],
  };
}

function kindOf(value: Value): ResultKind {
  switch (value.kind) {
    case 'formula':
      if (!dependsOn(value.ratio, laplace)) return 'value';
      return isConstantPolynomial(value.ratio.den) ? 'polynomial' : 'transfer';
    case 'condition':
      return 'condition';
    case 'array':
      return 'array';
    case 'signal':
      return 'transfer';
    case 'parts':
      return 'table';
    case 'text':
      return 'text';
    case 'none':
    case 'matrix':
    case 'roots':
      return 'value';
  }
}

/** A plain number is not repeated under its source. */
function isTrivial(value: Value, request: ResultRequest, formula: string | null): boolean {
  if (value.kind !== 'formula' || !request.name) return false;
  return (
    request.expression.kind === 'number' ||
    (dependsOn(value.ratio, laplace) && formula === formatExpression(request.expression))
  );
}

interface NominalValue {
  readonly value: ResultContent['value'];
  readonly notes: readonly string[];
}

const NO_VALUE: NominalValue = { value: null, notes: [] };

function nominalValue(
  request: ResultRequest,
  numbers: Numbers,
  derivations: Derivations,
): NominalValue {
  const { subject } = request;
  const writing = derivations.writing();
  const compiled = numbers.compiled(subject, numbers.zeroScope(numbers.zeros(subject)));
  if (!compiled)
    return {
      value: null,
      notes: ['With the values that are exactly 0 left out, this cannot be derived.'],
    };
  const { value } = compiled;
  if (value.kind === 'none') {
    const failure = failureOf(value.when, numbers, writing) ?? valueText(value, writing);
    return {
      value: null,
      notes: [`No value: ${failure}`, ...growthNotes(value, request, numbers)],
    };
  }
  if (value.kind !== 'formula' && value.kind !== 'condition') return NO_VALUE;
  if (value.kind === 'formula' && !compiled.ratios) return NO_VALUE;
  const missing = numbers.missing(compiled);
  if (missing.length > 0) return valueWithout(missing, value, derivations);
  const evaluated = numbers.evaluate(compiled, NOMINAL);
  if (!evaluated.exists[0]) return absentAtNominal(subject, compiled, numbers, writing);
  const undecided = undecidedReason(compiled, evaluated, numbers, writing);
  if (undecided) return { value: null, notes: [`Undecided: ${undecided}.`] };
  const notes = numbers.findings(value, NOMINAL).flatMap((finding) => finding.notes);
  return { value: numberIn(compiled, evaluated), notes };
}

/** How fast a signal grows that has no final value, as a number with its unit. */
function growthNotes(
  { growth }: NoValue,
  { display, hints }: ResultRequest,
  numbers: Numbers,
): readonly string[] {
  const rate = growth && numbers.valueOfRatio(growth.rate);
  if (!growth || rate === null || !Number.isFinite(rate)) return [];
  const measure =
    display.measure && mulMeasures(display.measure, powMeasure(DERIVATIVE, growth.power));
  const shown = showValue(rate, { ...display, fixed: null, measure, factor: 1 }, hints);
  return [
    growth.power === 1
      ? `At the nominal values the rate is ${shown}.`
      : `At the nominal values that derivative is ${shown}.`,
  ];
}

/** Without some of the numbers only the signs can decide a condition. */
function valueWithout(
  missing: readonly string[],
  value: Value,
  derivations: Derivations,
): NominalValue {
  const reduced =
    value.kind === 'condition' && value.when === ALWAYS
      ? derivations.reduced(value.condition)
      : null;
  if (reduced?.kind === 'truth') return { value: reduced.value, notes: [] };
  const verb = missing.length === 1 ? 'has' : 'have';
  return { value: null, notes: [`No number: ${missing.join(', ')} ${verb} no value.`] };
}

/** Why a condition can be told neither true nor false at the nominal; null for all else. */
function undecidedReason(
  { value }: Compiled,
  { verdicts }: Evaluated,
  numbers: Numbers,
  writing: Writing,
): string | null {
  if (value.kind !== 'condition' || verdicts[0] !== UNDECIDED) return null;
  return failureOf(value.condition, numbers, writing);
}

function numberIn(compiled: Compiled, evaluated: Evaluated): ResultContent['value'] {
  if (compiled.value.kind === 'condition')
    return evaluated.verdicts[0] === UNDECIDED ? null : evaluated.verdicts[0] === YES;
  const [output] = compiled.ratios!.outputs;
  const re = evaluated.columns[output.re][0];
  return output.im === null
    ? jsonNumber(re)
    : jsonComplex({ re, im: evaluated.columns[output.im][0] });
}

/**
 * Where the formula divides by 0 at the nominal, or is one for other values (two roots that are equal there), it is
 * derived anew in exact numbers before it is given up. What is unstable there needs no second look.
 */
function absentAtNominal(
  subject: Subject,
  compiled: Compiled,
  numbers: Numbers,
  writing: Writing,
): NominalValue {
  const failure = failureOf(compiled.value.when, numbers, writing);
  if (failure && failureOf(stabilityIn(compiled.value.when), numbers, writing))
    return { value: null, notes: [`No value at the nominal: ${failure}.`] };
  const scope = numbers.exactScope(subject);
  const exact = scope && numbers.compiled(subject, scope);
  if (exact?.value.kind === 'none')
    return { value: null, notes: [`No value at the nominal: ${valueText(exact.value, writing)}`] };
  if (exact?.value.kind === 'formula' && exact.ratios && numbers.missing(exact).length === 0) {
    const evaluated = numbers.evaluate(exact, NOMINAL);
    const leavesTheReals = isComplex(exact) && !isComplex(compiled);
    if (evaluated.exists[0] && !leavesTheReals)
      return {
        value: numberIn(exact, evaluated),
        notes: ['Derived anew at the nominal values, where the formula does not hold.'],
      };
  }
  const why =
    failure ??
    missingReason(numbers.findings(compiled.value, NOMINAL)) ??
    'the formula divides by 0 there, or is not real';
  return { value: null, notes: [`No value at the nominal: ${why}.`] };
}

/** Why a number that is searched for does not exist; null where all do. */
export function missingReason(findings: readonly Finding[]): string | null {
  return findings.find(({ reason }) => reason !== null)?.reason ?? null;
}

/** The part of a condition that asks for stability. */
function stabilityIn(condition: Condition): Condition {
  const parts = condition.kind === 'all' ? condition.of : [condition];
  return allOf(parts.filter((part) => part.kind === 'stable'));
}

function isComplex(compiled: Compiled): boolean {
  return compiled.ratios !== null && compiled.ratios.outputs.some((output) => output.im !== null);
}

function shownText(
  value: ResultContent['value'],
  display: Display,
  hints: readonly Unit[],
): string | null {
  if (value === null) return null;
  if (typeof value === 'boolean') return value ? 'holds' : 'does not hold';
  if (typeof value === 'number') return showValue(value, display, hints);
  return complexText(
    value,
    display.fixed?.logarithmic ? { ...display, fixed: null } : display,
    hints,
  );
}

function complexText(
  [re, im]: readonly [number, number],
  display: Display,
  hints: readonly Unit[],
): string {
  const unit = unitFor(display, Math.hypot(re, im), hints);
  const [real, imaginary] = [re, Math.abs(im)].map((part) =>
    formatNumber(unit ? valueIn(part * display.factor, unit) : part),
  );
  const number = `${real} ${im < 0 ? '-' : '+'} j ${imaginary}`;
  const text = unit ? unitText(unit) : '';
  return text ? `(${number}) ${text}` : number;
}

function spanOf(
  request: ResultRequest,
  numbers: Numbers,
  derivations: Derivations,
): SpanContent | null {
  const variants = variantsOf(request.subject, numbers);
  const names = movingNames(variants, numbers);
  if (names.length === 0 || variants.some(({ compiled }) => !hasRealValue(compiled))) return null;
  const monotone = isMonotoneSubject(variants, names, numbers, derivations);
  const sample = sampleBox(names, monotone, numbers);
  const evaluated = numbers.evaluateSubject(request.subject, sample);
  if (!evaluated || evaluated.exists.includes(0)) return null;
  let [low, high] = [Infinity, -Infinity];
  for (const value of evaluated.columns[0]) {
    low = Math.min(low, value);
    high = Math.max(high, value);
  }
  const magnitude = variants
    .map(({ compiled }) => asMagnitude(numbers.opened((compiled!.value as FormulaValue).ratio)))
    .find(
      (part) => part && sample.method === 'corners' && changesSign(part.inner, sample, numbers),
    );
  if (magnitude && magnitude.factor > 0) low = 0;
  else if (magnitude) high = 0;
  const n = sample.method === 'sampled' ? sample.n : null;
  return {
    low,
    high,
    how: sample.method,
    n,
    shown: showSpan(low, high, request.display, request.hints),
  };
}

function hasRealValue(compiled: Compiled | null): boolean {
  return (
    compiled?.value.kind === 'formula' &&
    compiled.ratios !== null &&
    compiled.ratios.outputs[0].im === null
  );
}

/** A magnitude is 0 somewhere between corners of opposite sign. */
function changesSign(inner: FormulaValue['ratio'], sample: Points, numbers: Numbers): boolean {
  const { tape, inputs, outputs } = compileRatios([inner], numbers.resolve);
  const column = tape.evaluateBatch(numbers.inputs(inputs, sample), sample.count)[outputs[0].re];
  return column.some((value) => value <= 0) && column.some((value) => value >= 0);
}

/** Where in the tolerances a value does not exist: the first such point, in words. */
export function absentPlace(
  request: ResultRequest,
  numbers: Numbers,
): Readonly<Record<string, number>> | null {
  const names = movingNames(variantsOf(request.subject, numbers), numbers);
  if (names.length === 0) return null;
  const sample = sampleBox(names, false, numbers);
  const evaluated = numbers.evaluateSubject(request.subject, sample);
  const index = evaluated ? evaluated.exists.indexOf(0) : -1;
  if (index < 0) return null;
  return Object.fromEntries(names.map((name) => [name, sample.columns.get(name)![index]]));
}

/** Roots are set in numbers where they have any. */
function latexOf(value: Value, written: Written, numbers: Numbers): string {
  const roots = value.kind === 'roots' ? rootNumbers(value, numbers) : null;
  return roots ? rootsLatex(roots) : written.latex;
}

function rootNumbers(value: RootsValue, numbers: Numbers) {
  const coefficients = [...coefficientsIn(value.polynomial, laplace)]
    .reverse()
    .map(ratioFromPolynomial);
  const { tape, inputs, outputs } = compileRatios(coefficients, numbers.resolve);
  if (inputs.some((input) => numbers.nominal(plainName(input)) === null)) return null;
  const column = tape.evaluate(inputs.map((input) => numbers.nominal(plainName(input))!));
  const values = outputs.map((output) => column[output.re]);
  return values.every(Number.isFinite) ? polynomialRoots(values) : null;
}

/** The parts of a result, as plain data for the page and for `check --json`. */
function partsOf(value: Value, numbers: Numbers, writing: Writing): unknown {
  switch (value.kind) {
    case 'roots': {
      const roots = rootNumbers(value, numbers);
      return roots && jsonRoots(roots);
    }
    case 'matrix':
      return { rows: matrixRows(value.rows, writing) };
    case 'parts':
      return listParts(value, numbers, writing);
    case 'none':
      return (
        value.growth && {
          growth: { rate: formulaText(value.growth.rate, writing), power: value.growth.power },
        }
      );
    case 'formula':
      return crossingsOf(value, numbers);
    default:
      return null;
  }
}

/** All crossings of a margin, the binding one marked. */
function crossingsOf(value: FormulaValue, numbers: Numbers): unknown {
  if (!foundMultiple(value.ratio)) return null;
  const [finding] = numbers.findings(value, NOMINAL);
  if (!finding || finding.crossings.length === 0) return null;
  const crossings = finding.crossings.map(({ frequency, margin, binding }) => ({
    frequency: jsonNumber(frequency),
    margin: jsonNumber(margin),
    binding,
  }));
  return { crossings };
}

function listParts(value: PartsValue, numbers: Numbers, writing: Writing): unknown {
  return {
    joined: value.joined,
    items: value.parts.map((part) => ({
      name: part.name,
      formula: valueText(part.value, writing),
      latex: valueLatex(part.value, writing),
      value: partNumber(part.value, numbers),
      reason: part.value.kind === 'none' ? part.value.reason : null,
    })),
  };
}

function partNumber(value: Value, numbers: Numbers): number | null {
  if (value.kind !== 'formula' || dependsOn(value.ratio, laplace)) return null;
  const exact = asRational(value.ratio);
  const number = exact ? rationalToNumber(exact) : numbers.valueOfRatio(value.ratio);
  return number === null ? null : jsonNumber(number);
}
