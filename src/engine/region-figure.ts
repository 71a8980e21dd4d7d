import {
  compileConditions,
  expandStable,
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
  derivedValue,
  reachOfAll,
  requireNumbers,
  type FigureContent,
  type FigureSources,
} from './figure-sources.ts';
import { plainName, type Numbers, type Subject } from './numbers.ts';
import { BASE_SCOPE } from './scope.ts';
import { Stop, stopAt } from './stop.ts';
import { sampleBox } from './tolerance.ts';

/** Samples on each side of a gain plane. */
const REGION_SAMPLES = 400;

/** A gain plane: where conditions hold at nominal values and over the tolerances. */
export function regionContent(node: DrawStatement, sources: FigureSources): FigureContent {
  if (node.of.length !== 2)
    stopAt(
      node.figureSpan,
      'two-gains',
      'A region is drawn over two gains: `draw region of Kp, Ki where …`.',
    );
  if (node.where.length === 0)
    stopAt(node.figureSpan, 'no-condition', 'Say where the region is: `where stable(az), …`.');
  const sides = node.of.map((gain) => gainSide(gain, sources));
  const subjects = node.where.map((condition) => sources.subjectOf(condition));
  const conditions = subjects.map((subject, index) =>
    conditionOf(derivedValue(subject), node.where[index]),
  );
  const [x, y] = sides;
  const figure: RegionFigure = {
    kind: 'region',
    title: node.title,
    x: x.axis,
    y: y.axis,
    ...traced(node, x, y, conditions, subjects, sources),
    point: { x: x.present, y: y.present, draggable: true },
    notes: [],
  };
  return { figure, notes: [], dependsOn: reachOfAll(subjects) };
}

function conditionOf(value: Value, expression: Expression): Extract<Value, { kind: 'condition' }> {
  if (value.kind === 'condition') return value;
  const why = value.kind === 'none' ? value.reason : 'it is not a condition';
  return stopAt(
    expression.span,
    'not-a-condition',
    `\`${formatExpression(expression)}\` cannot bound a region: ${why}.`,
  );
}

interface GainSide {
  readonly name: string;
  readonly axis: Axis;
  readonly unit: Unit;
  /** The present value in the axis's unit. */
  readonly present: number;
}

/** One side of a gain plane: the tuned range of the gain, in its typed unit. */
function gainSide(gain: Expression, { queries, numbers, derivations }: FigureSources): GainSide {
  if (gain.kind !== 'name')
    stopAt(gain.span, 'not-a-gain', 'A region is drawn over the names of two gains.');
  const reading = numbers.reading(gain.name);
  if (!reading)
    stopAt(
      gain.span,
      'not-a-gain',
      `${gain.name} is not an assumption with a value, so it cannot be a side of a region.`,
    );
  if (!reading.ok) throw new Stop(null, gain.name);
  const tune = queries.input<Catalogue>('catalogue').tunes.get(gain.name);
  if (!tune) {
    stopAt(
      gain.span,
      'not-tuned',
      `${gain.name} has no range to draw over; add \`tune ${gain.name} from … to …\`.`,
    );
  }
  const { unit, value } = reading.value;
  const bounds = readBounds(
    tune.node.from,
    tune.node.to,
    unit,
    gain.name,
    derivations.customUnits(),
  );
  const [from, to] = bounds.map((si) => valueIn(si, unit));
  if (!(from < to))
    stopAt(gain.span, 'empty-range', `The range over which ${gain.name} is tuned is empty.`);
  const text = unitText(unit);
  const name = nameToText(gain.name);
  const axis: Axis = {
    name: gain.name,
    label: text ? `gain ${name}, ${text}` : `gain ${name}`,
    unit: text,
    from,
    to,
  };
  return { name: gain.name, axis, unit, present: valueIn(value.value, unit) };
}

/** Corner sets of the tolerances that the area is checked at, at the most. */
const MOST_REGION_CORNERS = 32;

function traced(
  node: DrawStatement,
  x: GainSide,
  y: GainSide,
  conditions: readonly Extract<Value, { kind: 'condition' }>[],
  subjects: readonly Subject[],
  sources: FigureSources,
): Pick<RegionFigure, 'nominalArea' | 'toleranceArea' | 'boundaries'> {
  const parts = conditions.flatMap((value, index) =>
    boundaryParts(value, node.where[index], sources),
  );
  const requests = parts.map((part) => regionCondition(part, x, y, sources));
  const compiledInputs = compileConditions(
    parts.map((part) => part.condition),
    sources.numbers.resolve,
  ).inputs;
  requireNumbers(compiledInputs, { span: node.figureSpan }, sources.numbers);
  const inputs = [...new Set(subjects.flatMap((subject) => [...subject.reach]))];
  const others = inputs.filter((name) => name !== x.name && name !== y.name);
  const values = others
    .map((name) => `${sources.numbers.nominal(name)}${sources.numbers.bounds(name)}`)
    .join(' ');
  const names = parts.map((part) => part.text).join(';');
  const key = `region:${sources.key}:${x.axis.from} ${x.axis.to} ${y.axis.from} ${y.axis.to} ${values} ${names}`;
  return sources.queries.get(key, () =>
    traceRegion({
      x: { from: x.axis.from, to: x.axis.to, n: REGION_SAMPLES },
      y: { from: y.axis.from, to: y.axis.to, n: REGION_SAMPLES },
      conditions: requests,
    }),
  );
}

interface BoundaryPart {
  readonly condition: Condition;
  readonly text: string;
  readonly latex: string | null;
}

/** A stability condition is labelled by the inequalities that it comes to, where they are short. */
function boundaryParts(
  value: Extract<Value, { kind: 'condition' }>,
  expression: Expression,
  { derivations }: FigureSources,
): BoundaryPart[] {
  const whole: Condition =
    value.when.kind === 'truth'
      ? value.condition
      : { kind: 'all', of: [value.condition, value.when] };
  const { readable, writing } = derivations.functionContext(BASE_SCOPE);
  if (value.condition.kind === 'stable') {
    const reduced = readable(expandStable(value.condition, writing.signOf));
    const text = conditionText(reduced, writing);
    if (text.length <= LONGEST_LABEL)
      return [{ condition: whole, text, latex: conditionLatex(reduced, writing) }];
  }
  return [{ condition: whole, text: formatExpression(expression), latex: null }];
}

const LONGEST_LABEL = 40;

function regionCondition(
  part: BoundaryPart,
  x: GainSide,
  y: GainSide,
  { numbers }: FigureSources,
): RegionCondition {
  const compiled = compileConditions([part.condition], numbers.resolve);
  const marginAt =
    (at: ReadonlyMap<string, number>): BatchMargin =>
    (xs, ys) => {
      const own = new Map<string, Float64Array>([
        [x.name, xs.map((value) => value * x.unit.number)],
        [y.name, ys.map((value) => value * y.unit.number)],
      ]);
      const inputs = compiled.inputs.map(
        (name) => own.get(name) ?? at.get(name) ?? numbers.nominal(plainName(name)) ?? NaN,
      );
      // What cannot be told counts as not holding.
      return compiled.evaluate(inputs, xs.length)[0].map((verdict) => (verdict === YES ? 1 : 0));
    };
  return {
    label: part.text,
    latex: part.latex,
    nominal: marginAt(new Map()),
    tolerance: cornersOf(compiled.inputs, x, y, numbers).map(marginAt),
  };
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
  const step = Math.max(1, Math.ceil((sample.count - 1) / MOST_REGION_CORNERS));
  const corners: ReadonlyMap<string, number>[] = [];
  for (let i = 1; i < sample.count; i += step) {
    corners.push(new Map(names.map((name) => [name, sample.columns.get(name)![i]] as const)));
  }
  return corners;
}
