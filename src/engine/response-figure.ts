import {
  coefficientsIn,
  dependsOn,
  dependsOnLaplace,
  generatorsOfRatio,
  laplace,
  ratioFromPolynomial,
  zeroRatio,
  type Ratio,
} from '../algebra/index.ts';
import { isRefusal } from '../base/index.ts';
import { compileRatios, type SignalValue, type Value } from '../control/index.ts';
import type { Curve, Point, ResponseFigure } from '../figures/index.ts';
import { formatExpression, type DrawStatement, type Expression } from '../language/index.ts';
import { timeResponse } from '../numeric/index.ts';
import { parseUnit, unitText, valueIn, type Unit } from '../units/index.ts';
import { displayOf, unitFor, type Display } from './display.ts';
import { parameterOf } from './replacements.ts';
import { failureOf } from './failures.ts';
import {
  derivedValue,
  reachOfAll,
  requireNumbers,
  type FigureContent,
  type FigureSources,
} from './figure-sources.ts';
import { plainName, type Numbers, type Points } from './numbers.ts';
import { BASE_SCOPE } from './scope.ts';
import { stopAt } from './stop.ts';
import { sampleBox, spreadPoints } from './tolerance.ts';

/** Points on a curve over time, besides the first. */
const CURVE_POINTS = 400;
/** Curves in one figure; more cannot be told apart. */
const MOST_CURVES = 12;
/** Points of the tolerances that a band is drawn over, at the most. */
const MOST_BAND_POINTS = 32;

/** The responses of signals over time, each with its band over the tolerances. */
export function responseContent(node: DrawStatement, sources: FigureSources): FigureContent {
  if (node.of.length > MOST_CURVES) {
    stopAt(
      node.figureSpan,
      'too-many-curves',
      `A figure holds at most ${MOST_CURVES} curves, and these are ${node.of.length}; draw several figures.`,
    );
  }
  const duration = durationOf(node, sources);
  const time = timeAxis(node, duration, sources);
  const subjects = node.of.map((signal) => sources.subjectOf(signal));
  const drawn = node.of.map((expression, index) =>
    drawCurve(expression, derivedValue(subjects[index]), duration, time.to, sources),
  );
  const notes = [...new Set(drawn.flatMap((one) => one.notes))];
  const figure: ResponseFigure = {
    kind: 'response',
    title: node.title,
    x: time,
    curves: drawn.map((one) => one.curve),
    diverges: drawn.map((one) => one.diverges).find((words) => words !== null) ?? null,
    notes,
  };
  return { figure, notes, dependsOn: reachOfAll(subjects) };
}

function durationOf(node: DrawStatement, { derivations, numbers }: FigureSources): number {
  if (!node.over)
    return stopAt(
      node.figureSpan,
      'no-duration',
      'Say over how long: `draw response of storm.e over 20 s`.',
    );
  const ratio = parameterOf(derivations.evaluate(node.over, BASE_SCOPE), node.over.span);
  if (dependsOn(ratio, laplace))
    stopAt(node.over.span, 'not-a-time', 'A duration does not depend on s.');
  const duration = numbers.valueOfRatio(ratio);
  if (duration === null || !(duration > 0) || !Number.isFinite(duration)) {
    return stopAt(node.over.span, 'empty-range', 'The duration of a response is a time above 0.');
  }
  return duration;
}

/** The axis of time, in the unit that the duration is typed in: `over 6 h` is read in hours. */
function timeAxis(
  { over }: DrawStatement,
  duration: number,
  { derivations }: FigureSources,
): ResponseFigure['x'] {
  const typed = over?.kind === 'quantity' && over.unit !== '' ? over.unit : 's';
  const unit = parseUnit(typed, derivations.customUnits());
  if (isRefusal(unit)) return { name: 't', label: 'time t, s', unit: 's', from: 0, to: duration };
  const text = unitText(unit);
  return { name: 't', label: `time t, ${text}`, unit: text, from: 0, to: valueIn(duration, unit) };
}

interface DrawnCurve {
  readonly curve: Curve;
  readonly diverges: string | null;
  readonly notes: readonly string[];
}

function drawCurve(
  expression: Expression,
  value: Value,
  duration: number,
  axisEnd: number,
  sources: FigureSources,
): DrawnCurve {
  const { signal, left } = withoutNoise(signalIn(expression, value));
  const { numbers, derivations } = sources;
  const compiled = compileSignal(signal, expression, numbers);
  requireNumbers(compiled.inputs, expression, numbers);
  const names = compiled.inputs.filter(
    (name) => plainName(name) === name && numbers.bounds(name) !== null,
  );
  const sample = sampleBox(names, names.length <= Math.log2(MOST_BAND_POINTS), numbers);
  const drawn = [0, ...spreadPoints(sample, MOST_BAND_POINTS)];
  const columns = new Map(
    [...sample.columns].map(([name, column]) => [name, Float64Array.from(drawn, (i) => column[i])]),
  );
  const responses = compiled.responses({ count: drawn.length, columns }, duration, expression);
  const label = formatExpression(expression);
  const failure =
    signal.blocks.length === 0
      ? null
      : failureOf({ kind: 'stable', blocks: signal.blocks }, numbers, derivations.writing());
  return {
    curve: curveIn(expression, label, responses, axisEnd, names.length > 0, sources),
    diverges:
      failure && isGrowing(responses[0]) ? `${label} grows without bound: ${failure}` : null,
    notes: [
      ...signal.notes,
      ...left,
      ...(names.length > 0 ? [`Band: ${drawn.length - 1} points of the tolerances.`] : []),
    ],
  };
}

function signalIn(expression: Expression, value: Value): SignalValue {
  if (value.kind === 'signal') return value;
  if (value.kind === 'formula' && value.origin === 'formula') {
    const term = {
      input: '',
      source: 'constant' as const,
      transform: value.ratio,
      after: zeroRatio,
    };
    const { when, notes } = value;
    return {
      kind: 'signal',
      name: formatExpression(expression),
      terms: [term],
      inputs: [],
      blocks: [],
      when,
      notes,
    };
  }
  return stopAt(
    expression.span,
    'not-a-signal',
    `\`${formatExpression(expression)}\` is not a signal; name a signal of a load case, or multiply a transfer function by the transform of a source, \`H/s\`.`,
  );
}

/** A curve over time shows what is certain; noise is left out, in words. */
function withoutNoise(signal: SignalValue): { signal: SignalValue; left: readonly string[] } {
  const terms = signal.terms.filter((term) => !term.noise);
  if (terms.length === signal.terms.length) return { signal, left: [] };
  return { signal: { ...signal, terms }, left: [`The noise in ${signal.name} is left out.`] };
}

interface CompiledSignal {
  readonly inputs: readonly string[];
  /** One array of values over time for each point. */
  responses(points: Points, duration: number, expression: Expression): Float64Array[];
}

/** A term's numerator, denominator (highest power first) and delay, as places among the outputs of one tape. */
interface TermPlaces {
  readonly numerator: readonly number[];
  readonly denominator: readonly number[];
  readonly after: number;
}

function compileSignal(
  signal: SignalValue,
  expression: Expression,
  numbers: Numbers,
): CompiledSignal {
  const ratios: Ratio[] = [];
  const place = (ratio: Ratio): number => ratios.push(ratio) - 1;
  const terms = signal.terms.map((term): TermPlaces => {
    refuseDelay(term.transform, expression);
    const descending = (p: Ratio['num']) =>
      [...coefficientsIn(p, laplace)].reverse().map((c) => place(ratioFromPolynomial(c)));
    return {
      numerator: descending(term.transform.num),
      denominator: descending(term.transform.den),
      after: place(term.after),
    };
  });
  const { tape, inputs, outputs } = compileRatios(ratios, numbers.resolve);
  return {
    inputs,
    responses(points, duration, at) {
      const columns = tape.evaluateBatch(numbers.inputs(inputs, points), points.count);
      const numberAt = (i: number) => (index: number) => columns[outputs[index].re][i];
      return Array.from({ length: points.count }, (_, i) =>
        sumOfTerms(terms, numberAt(i), duration, at),
      );
    },
  };
}

function refuseDelay(transform: Ratio, expression: Expression): void {
  if (!generatorsOfRatio(transform).some((g) => g !== laplace && dependsOnLaplace(g))) return;
  stopAt(
    expression.span,
    'not-available-yet',
    'A response with a dead time is not available yet; use `rational_delay`.',
  );
}

function sumOfTerms(
  terms: readonly TermPlaces[],
  number: (index: number) => number,
  duration: number,
  expression: Expression,
): Float64Array {
  const sum = new Float64Array(CURVE_POINTS + 1);
  for (const term of terms) {
    const response = termResponse(
      term.numerator.map(number),
      term.denominator.map(number),
      number(term.after),
      duration,
      expression,
    );
    for (let i = 0; i < sum.length; i++) sum[i] += response[i];
  }
  return sum;
}

/** x(t − after) on the curve's times: the impulse response of its transform, 0 before it begins. */
function termResponse(
  numerator: number[],
  denominator: number[],
  after: number,
  duration: number,
  expression: Expression,
): Float64Array {
  const step = duration / CURVE_POINTS;
  const first = Math.ceil(after / step - 1e-9);
  const values = new Float64Array(CURVE_POINTS + 1);
  const count = values.length - first;
  const begun = Math.max(0, first * step - after);
  const impulse = { kind: 'impulse', size: 1 } as const;
  const response = timeResponse(numerator, denominator, impulse, step, Math.max(1, count), begun);
  if (isRefusal(response)) {
    const text = formatExpression(expression);
    const reason = `\`${text}\` cannot be drawn over time: ${response.reason}.`;
    return stopAt(expression.span, response.code, reason);
  }
  if (count > 0) values.set(response, first);
  return values;
}

function isGrowing(values: Float64Array): boolean {
  const size = (from: number, to: number) => Math.max(...[...values.slice(from, to)].map(Math.abs));
  const half = Math.floor(values.length / 2);
  return !(size(half, values.length) <= size(0, half));
}

function curveIn(
  expression: Expression,
  label: string,
  responses: readonly Float64Array[],
  axisEnd: number,
  hasBand: boolean,
  { dimensions, derivations, hints }: FigureSources,
): Curve {
  const display = displayOf(
    expression,
    dimensions.measureOf(expression),
    derivations.customUnits(),
  );
  const last = lastDrawn(responses[0]);
  const unit = unitOfCurve(responses[0].slice(0, last + 1), display, hints);
  const show = (si: number) => (unit ? valueIn(si * display.factor, unit) : si);
  const points = Array.from(responses[0].slice(0, last + 1), (value, i): Point => [
    (i * axisEnd) / CURVE_POINTS,
    show(value),
  ]);
  const text = unit ? unitText(unit) : '';
  return {
    label,
    axisLabel: text ? `${label}, ${text}` : label,
    unit: text,
    points,
    band: hasBand ? bandOf(responses, last, show) : null,
    baseline: false,
  };
}

/** A diverging curve is drawn until it leaves every scale. */
const LARGEST_DRAWN = 1e12;

function lastDrawn(values: Float64Array): number {
  const early = Math.max(1e-300, ...[...values.slice(0, 1 + CURVE_POINTS / 10)].map(Math.abs));
  const beyond = values.findIndex((value) => !(Math.abs(value) <= LARGEST_DRAWN * early));
  return beyond < 0 ? values.length - 1 : Math.max(0, beyond - 1);
}

function unitOfCurve(values: Float64Array, display: Display, hints: readonly Unit[]): Unit | null {
  const largest = values.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
  return unitFor(display, largest, hints);
}

function bandOf(
  responses: readonly Float64Array[],
  last: number,
  show: (si: number) => number,
): Curve['band'] {
  const low: number[] = [];
  const high: number[] = [];
  for (let i = 0; i <= last; i++) {
    const values = responses.map((response) => response[i]).filter(Number.isFinite);
    low.push(show(Math.min(...values)));
    high.push(show(Math.max(...values)));
  }
  return { low, high };
}
