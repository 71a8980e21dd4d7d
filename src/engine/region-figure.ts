import { generatorsOfRatio, generatorsWithin } from '../algebra/index.ts';
import {
  compileConditions,
  FOUND_NUMBERS,
  expandStable,
  NO,
  YES,
  type Condition,
  type Value,
} from '../control/index.ts';
import {
  traceRegion,
  type Axis,
  type BatchMargin,
  type RegionCondition,
  type RegionFigure,
  type RegionTrace,
} from '../figures/index.ts';
import {
  formatExpression,
  nameToText,
  type DrawStatement,
  type Expression,
} from '../language/index.ts';
import { conditionLatex, conditionText } from '../present/index.ts';
import { unitText, valueIn, type Unit } from '../units/index.ts';
import { readBounds } from './assumptions.ts';
import type { Catalogue } from './catalogue.ts';
import {
  reachOfAll,
  requireNumbers,
  type FigureContent,
  type FigureSources,
} from './figure-sources.ts';
import { rangeAround } from './gain-range.ts';
import { plainName, type Numbers, type Subject } from './numbers.ts';
import { BASE_SCOPE } from './scope.ts';
import { outcomeOf, Stop, stopAt, type Outcome } from './stop.ts';
import { sampleBox, spreadPoints } from './tolerance.ts';

/** Samples on each side of a gain plane. */
const REGION_SAMPLES = 400;
/** The same where a condition is searched for at every sample, such as a margin. */
const SEARCHED_SAMPLES = 64;

/** A gain plane: where conditions hold at nominal values and over the tolerances. Dragging its point redraws nothing else. */
export function regionContent(node: DrawStatement, sources: FigureSources): FigureContent {
  if (node.of.length !== 2) {
    stopAt(
      node.figureSpan,
      'two-gains',
      'A region is drawn over two gains: `draw region of Kp, Ki where …`.',
    );
  }
  if (node.where.length === 0) {
    stopAt(node.figureSpan, 'no-condition', 'Say where the region is: `where stable(az), …`.');
  }
  const subjects = node.where.map((condition) => sources.subjectOf(condition));
  const [x, y] = node.of.map((gain) => settled(gainSide(gain, sources)));
  const { trace, notes } = settled(
    sources.queries.get(`region:${sources.key}`, () => traceOf(node, subjects, sources)),
  );
  const figure: RegionFigure = {
    kind: 'region',
    title: node.title,
    x: x.axis,
    y: y.axis,
    ...trace,
    baseline: [],
    names: [...new Set([x.name, y.name, ...reachOfAll(subjects)])].map(nameToText),
    point: {
      x: presentValue(x, sources.numbers),
      y: presentValue(y, sources.numbers),
      draggable: true,
    },
    notes,
  };
  return { figure, notes, dependsOn: reachOfAll(subjects) };
}

function settled<T>(outcome: Outcome<T>): T {
  if (outcome.ok) return outcome.value;
  throw new Stop(outcome.problem, outcome.waitsFor);
}

interface GainSide {
  readonly name: string;
  readonly axis: Axis;
  readonly unit: Unit;
}

/** One side of a gain plane: the tuned range of the gain, in its typed unit, else a round one around its value. */
function gainSide(gain: Expression, sources: FigureSources): Outcome<GainSide> {
  return sources.queries.get(
    `gain-side:${sources.key}:${gain.span.from}`,
    () => outcomeOf(gain.span, () => readGainSide(gain, sources)),
    (a, b) => JSON.stringify(a) === JSON.stringify(b),
  );
}

function readGainSide(
  gain: Expression,
  { queries, numbers, derivations }: FigureSources,
): GainSide {
  if (gain.kind !== 'name')
    return stopAt(gain.span, 'not-a-gain', 'A region is drawn over the names of two gains.');
  const reading = numbers.reading(gain.name);
  if (!reading) {
    return stopAt(
      gain.span,
      'not-a-gain',
      `${gain.name} is not an assumption with a value, so it cannot be a side of a region.`,
    );
  }
  if (!reading.ok) throw new Stop(null, gain.name);
  const tune = queries.input<Catalogue>('catalogue').tunes.get(gain.name);
  const { unit, value } = reading.value;
  const bounds = tune
    ? readBounds(tune.node.from, tune.node.to, unit, gain.name, derivations.customUnits()).map(
        (si) => valueIn(si, unit),
      )
    : rangeAround(valueIn(value.value, unit));
  if (!bounds) {
    const fix = `add \`tune ${gain.name} from … to …\``;
    return stopAt(gain.span, 'not-tuned', `${gain.name} has no range to draw over; ${fix}.`);
  }
  const [from, to] = bounds;
  if (!(from < to))
    stopAt(gain.span, 'empty-range', `The range over which ${gain.name} is tuned is empty.`);
  return { name: gain.name, axis: axisOf(gain.name, unitText(unit), from, to), unit };
}

function axisOf(gain: string, unit: string, from: number, to: number): Axis {
  const name = nameToText(gain);
  return { name: gain, label: unit ? `gain ${name}, ${unit}` : `gain ${name}`, unit, from, to };
}

function presentValue(side: GainSide, numbers: Numbers): number {
  return valueIn(numbers.nominal(side.name)!, side.unit);
}

interface NotedTrace {
  readonly trace: RegionTrace;
  readonly notes: readonly string[];
}

function traceOf(
  node: DrawStatement,
  subjects: readonly Subject[],
  sources: FigureSources,
): Outcome<NotedTrace> {
  return outcomeOf(node.span, () => {
    const [x, y] = node.of.map((gain) => settled(gainSide(gain, sources)));
    const conditions = subjects.map((subject, index) =>
      regionPart(subject, node.where[index], [x, y], sources),
    );
    const requests = conditions.map((part) => regionCondition(part, x, y, node, sources.numbers));
    const samples = conditions.some((part) => isSearched(part.condition))
      ? SEARCHED_SAMPLES
      : REGION_SAMPLES;
    const corners = Math.max(...requests.map((request) => request.tolerance.length));
    const trace = traceRegion({
      x: { from: x.axis.from, to: x.axis.to, n: samples },
      y: { from: y.axis.from, to: y.axis.to, n: samples },
      conditions: requests,
    });
    const words = `The area over the tolerances holds at ${corners} points of them: looked at, not proved.`;
    return { trace, notes: corners > 0 ? [words] : [] };
  });
}

/** The condition as derived with the values that are exactly 0 left out, those of the two gains excepted. */
function regionPart(
  subject: Subject,
  expression: Expression,
  sides: readonly GainSide[],
  sources: FigureSources,
): BoundaryPart {
  const { numbers } = sources;
  const zeros = numbers.zeros(subject).filter((name) => !sides.some((side) => side.name === name));
  const value = settled(subject.derive(numbers.zeroScope(zeros)));
  if (value.kind === 'condition') return boundaryPart(value, expression, sources);
  const why = value.kind === 'none' ? value.reason : 'it is not a condition';
  return stopAt(
    expression.span,
    'not-a-condition',
    `\`${formatExpression(expression)}\` cannot bound a region: ${why}.`,
  );
}

/** Whether a condition holds a number that is searched for. */
function isSearched(condition: Condition): boolean {
  switch (condition.kind) {
    case 'compare':
      return [condition.left, condition.right]
        .flatMap((side) => generatorsWithin(generatorsOfRatio(side)))
        .some((g) => g.kind === 'function' && FOUND_NUMBERS.has(g.name));
    case 'all':
    case 'any':
      return condition.of.some(isSearched);
    case 'not':
      return isSearched(condition.of);
    default:
      return false;
  }
}

/** Corner sets of the tolerances that the area is checked at, at the most. */
const MOST_REGION_CORNERS = 32;

interface BoundaryPart {
  readonly condition: Condition;
  readonly text: string;
  readonly latex: string | null;
}

/** A stability condition is labelled by the inequalities that it comes to, where they are short. */
function boundaryPart(
  value: Extract<Value, { kind: 'condition' }>,
  expression: Expression,
  { derivations }: FigureSources,
): BoundaryPart {
  const whole: Condition =
    value.when.kind === 'truth'
      ? value.condition
      : { kind: 'all', of: [value.condition, value.when] };
  const { readable, writing } = derivations.functionContext(BASE_SCOPE);
  if (value.condition.kind === 'stable') {
    const reduced = readable(expandStable(value.condition, writing.signOf));
    const text = conditionText(reduced, writing);
    if (text.length <= LONGEST_LABEL) {
      return { condition: whole, text, latex: conditionLatex(reduced, writing) };
    }
  }
  return { condition: whole, text: formatExpression(expression), latex: null };
}

const LONGEST_LABEL = 40;

function regionCondition(
  part: BoundaryPart,
  x: GainSide,
  y: GainSide,
  node: DrawStatement,
  numbers: Numbers,
): RegionCondition {
  const compiled = compileConditions([part.condition], numbers.resolve);
  const others = compiled.inputs.filter((name) => name !== x.name && name !== y.name);
  requireNumbers(others, { span: node.figureSpan }, numbers);
  const marginAt =
    (at: ReadonlyMap<string, number>): BatchMargin =>
    (xs, ys) => {
      const own = new Map([
        [x.name, inSI(xs, x.unit)],
        [y.name, inSI(ys, y.unit)],
      ]);
      const inputs = compiled.inputs.map(
        (name) => own.get(name) ?? at.get(name) ?? numbers.nominal(plainName(name)) ?? NaN,
      );
      const [verdicts] = compiled.evaluate(inputs, xs.length);
      // What cannot be told counts as not holding.
      for (let i = 0; i < verdicts.length; i++) if (verdicts[i] !== YES) verdicts[i] = NO;
      return verdicts;
    };
  return {
    label: part.text,
    latex: part.latex,
    nominal: marginAt(new Map()),
    tolerance: cornersOf(compiled.inputs, x, y, numbers).map(marginAt),
  };
}

function inSI(values: Float64Array, unit: Unit): Float64Array {
  const si = new Float64Array(values.length);
  for (let i = 0; i < si.length; i++) si[i] = values[i] * unit.number;
  return si;
}

/** Corners of the tolerances of all but the two gains; of many corners a fixed selection. */
function cornersOf(
  inputs: readonly string[],
  x: GainSide,
  y: GainSide,
  numbers: Numbers,
): ReadonlyMap<string, number>[] {
  const names = inputs.filter(
    (name) =>
      name !== x.name &&
      name !== y.name &&
      plainName(name) === name &&
      numbers.bounds(name) !== null,
  );
  if (names.length === 0) return [];
  const sample = sampleBox(names, true, numbers);
  return spreadPoints(sample, MOST_REGION_CORNERS).map(
    (i) => new Map(names.map((name) => [name, sample.columns.get(name)![i]] as const)),
  );
}
