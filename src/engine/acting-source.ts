import {
  asRational,
  dependsOn,
  divRatios,
  isZeroRatio,
  laplace,
  mulRatios,
  negRatio,
  oneRatio,
  powRatio,
  ratioOf,
  zeroRatio,
  type Ratio,
} from '../algebra/index.ts';
import {
  allOf,
  type Condition,
  type FormulaValue,
  type SourceKind,
  type WhiteNoise,
} from '../control/index.ts';
import { SOURCES, sourceNamed, type Source, type SourceArgument } from '../functions/index.ts';
import {
  formatExpression,
  nearestName,
  type Expression,
  type SourceTerm,
} from '../language/index.ts';
import { formulaValue } from './arithmetic.ts';
import { angularOf, cyclesIn } from './cycles.ts';
import type { Meanings } from './meanings.ts';
import { parameterOf } from './replacements.ts';
import type { Scope } from './scope.ts';
import { stopAt } from './stop.ts';

/** A source that acts on an input of a load case. */
export interface ActingSource {
  readonly input: string;
  readonly kind: SourceKind;
  /** Transform of the input's share; of a random one the path from its white noise to the input. */
  readonly transform: Ratio;
  readonly after: Ratio;
  /** What must hold for its size to have a value. */
  readonly when: Condition;
  readonly noise?: WhiteNoise;
  /** Of a line, in rad/s. */
  readonly frequency?: Ratio;
}

/** Where a source stands: its input, given by a derivative of some order, and a name for its noise. */
export interface SourcePlace {
  readonly input: string;
  readonly order: number;
  readonly id: string;
}

type SourceCall = Extract<Expression, { kind: 'call' }>;

/** Reads a source of a case; stops at unknown sources and at those that are not available yet. */
export function readSource(
  term: SourceTerm,
  { input, order, id }: SourcePlace,
  scope: Scope,
  meanings: Meanings,
): ActingSource {
  const { factor, call } = splitSource(term.source);
  const source = availableSource(call);
  const args = source.parameters.map((parameter, index) =>
    readArgument(parameter, call.args[index], scope, meanings),
  );
  const scale = factor
    ? amountOf(factor, 'The size of a source', scope, meanings)
    : formulaValue(oneRatio);
  const after = readAfter(term, scope, meanings);
  const { transform, density, frequency } = source.formula(args.map(({ ratio }) => ratio));
  const size = term.sign < 0 ? negRatio(scale.ratio) : scale.ratio;
  return {
    input,
    kind: source.kindAfterIntegrations(order),
    transform: divRatios(mulRatios(size, transform), powRatio(ratioOf(laplace), order)),
    after: after.ratio,
    when: allOf([...args, scale, after].map(({ when }) => when)),
    ...(density && { noise: { id, density } }),
    ...(frequency && { frequency }),
  };
}

function availableSource(call: SourceCall): Source {
  const source = sourceNamed(call.callee);
  if (!source) unknownSource(call);
  if (source.availability === 'later')
    stopAt(call.span, 'not-available-yet', `The source ${call.callee} is not available yet.`);
  const { length } = source.parameters;
  if (call.args.length !== length) {
    const count = ['no arguments', 'one argument', 'two arguments'][length];
    stopAt(call.span, 'argument-count', `${call.callee} takes ${count}: ${source.summary}.`);
  }
  return source;
}

function readArgument(
  { takes }: SourceArgument,
  arg: Expression,
  scope: Scope,
  meanings: Meanings,
): FormulaValue {
  switch (takes) {
    case 'transfer': {
      const value = meanings.evaluate(arg, scope);
      parameterOf(value, arg.span);
      return value as FormulaValue;
    }
    case 'frequency':
      return frequencyOf(arg, scope, meanings);
    case 'density':
      return densityIn(arg, scope, meanings);
    case 'size':
    case 'file':
      return amountOf(arg, 'The size of a source', scope, meanings);
  }
}

/** The frequency of a line in rad/s; without a unit it is in Hz. */
function frequencyOf(arg: Expression, scope: Scope, meanings: Meanings): FormulaValue {
  const value = amountOf(arg, 'The frequency of a source', scope, meanings);
  if (isZeroRatio(value.ratio) || isNegative(value.ratio))
    stopAt(arg.span, 'not-a-frequency', 'The frequency of a sine is above 0.');
  const isCyclic = (cyclesIn(arg, meanings) ?? 1) === 1;
  return isCyclic ? { ...value, ratio: angularOf(value.ratio) } : value;
}

/** A one-sided density per Hz; an amplitude density, per √Hz, is squared. */
function densityIn(arg: Expression, scope: Scope, meanings: Meanings): FormulaValue {
  const value = amountOf(arg, 'A density', scope, meanings);
  if (isNegative(value.ratio))
    stopAt(arg.span, 'negative-density', 'A power spectral density is not negative.');
  return cyclesIn(arg, meanings) === -1 / 2
    ? { ...value, ratio: mulRatios(value.ratio, value.ratio) }
    : value;
}

function isNegative(ratio: Ratio): boolean {
  return (asRational(ratio)?.n ?? 0n) < 0n;
}

function readAfter({ after }: SourceTerm, scope: Scope, meanings: Meanings): FormulaValue {
  if (!after) return formulaValue(zeroRatio);
  const value = amountOf(after, 'The time after `after`', scope, meanings);
  if (isNegative(value.ratio))
    stopAt(after.span, 'negative-time', 'A source begins at t = 0 at the earliest.');
  return value;
}

/** The value of a parameter in a line of a case. */
export function amountOf(
  expression: Expression,
  what: string,
  scope: Scope,
  meanings: Meanings,
): FormulaValue {
  const value = meanings.evaluate(expression, scope);
  const ratio = parameterOf(value, expression.span);
  if (dependsOn(ratio, laplace))
    stopAt(expression.span, 'not-a-parameter', `${what} does not depend on s.`);
  return value as FormulaValue;
}

/** `2 step(A)` is a factor and the call. */
function splitSource(source: Expression): { factor: Expression | null; call: SourceCall } {
  if (source.kind === 'call') return { factor: null, call: source };
  if (source.kind === 'product' && !source.inverted.at(-1)) {
    const call = source.factors.at(-1)!;
    if (call.kind === 'call') {
      const [rest, inverted] = [source.factors.slice(0, -1), source.inverted.slice(0, -1)];
      const factor = rest.length === 1 ? rest[0] : { ...source, factors: rest, inverted };
      return { factor, call };
    }
  }
  refuseHiddenSource(source);
  stopAt(
    source.span,
    'not-a-source',
    `\`${formatExpression(source)}\` is not a source; for a constant load write \`step(…)\`.`,
  );
}

/** A worksheet name hides a source as it hides a function; `step(3)` is a product then. */
function refuseHiddenSource(source: Expression): void {
  if (source.kind !== 'product') return;
  const hidden = source.factors.find(
    (factor) => factor.kind === 'name' && sourceNamed(factor.name),
  );
  if (hidden?.kind !== 'name') return;
  const message = `The name ${hidden.name} of this worksheet hides the source; rename it.`;
  stopAt(hidden.span, 'source-hidden', message);
}

function unknownSource(call: SourceCall): never {
  const near = nearestName(
    call.callee,
    SOURCES.map(({ name }) => name),
  );
  const names = SOURCES.filter(({ availability }) => availability === 'now').map(
    ({ name }) => name,
  );
  const list = `${names.slice(0, -1).join(', ')} and ${names.at(-1)}`;
  stopAt(
    call.calleeSpan,
    'unknown-source',
    `There is no source ${call.callee}.${near ? ` Is ${near} meant?` : ''} Sources are ${list}.`,
    near ? [{ title: `Write ${near}`, edits: [{ span: call.calleeSpan, insert: near }] }] : [],
  );
}
