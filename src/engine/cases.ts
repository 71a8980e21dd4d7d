import {
  asRational,
  isZeroRatio,
  laplace,
  mulRatios,
  negRatio,
  oneRatio,
  powRatio,
  ratioOf,
  zeroRatio,
  divRatios,
  dependsOn,
  type Ratio,
} from '../algebra/index.ts';
import type { Budget } from '../base/index.ts';
import {
  allOf,
  closeLoop,
  transferFunction,
  type Condition,
  type FormulaValue,
  type LoopRow,
  type SignalTerm,
  type SignalValue,
  type SourceKind,
} from '../control/index.ts';
import { sourceNamed } from '../functions/index.ts';
import {
  formatExpression,
  nameToText,
  nearestName,
  type CaseStatement,
  type Expression,
  type SourceTerm,
} from '../language/index.ts';
import { formulaValue } from './arithmetic.ts';
import { initialValueName } from './equations.ts';
import { parameterOf } from './replacements.ts';

import type { LoopRecord, Meanings } from './meanings.ts';
import type { Scope } from './scope.ts';
import { namedSignal, requireSignal } from './signals.ts';
import { demand, stopAt } from './stop.ts';

/** A load case: its loop, and what acts on each input. */
export interface CaseRecord {
  readonly name: string;
  readonly loop: LoopRecord;
  readonly acting: readonly ActingSource[];
  /** Initial values as further inputs, named `θ(0)`. */
  readonly starts: readonly {
    readonly input: string;
    readonly signal: string;
    readonly value: Ratio;
    readonly when: Condition;
  }[];
}

interface ActingSource {
  readonly input: string;
  readonly kind: SourceKind;
  /** Transform of the input's share. */
  readonly transform: Ratio;
  readonly after: Ratio;
  /** What must hold for its size to have a value. */
  readonly when: Condition;
}

/** Reads a load case; stops at unknown inputs, unknown sources and sources that are not available yet. */
export function readCase(statement: CaseStatement, scope: Scope, meanings: Meanings): CaseRecord {
  const loop = meanings.loopOf(statement.loop.name, statement.loop.span, scope);
  refuseSecondLines(statement);
  const acting = statement.inputs.flatMap((line) => {
    const input = requireSignal(loop, line.input, 'input');
    return line.sources.map((term) => readSource(term, input, line.order, scope, meanings));
  });
  return {
    name: statement.name,
    loop,
    acting,
    starts: readStarts(statement, loop, scope, meanings),
  };
}

/** A case gives each input and each initial value in one line. */
function refuseSecondLines({ inputs, starts, name }: CaseStatement): void {
  const given = new Set<string>();
  for (const { input, span } of inputs) {
    if (given.has(input.name))
      stopAt(
        span,
        'given-twice',
        `${nameToText(input.name)} is given twice in ${name}; add its sources in one line.`,
      );
    given.add(input.name);
  }
  for (const { signal, order, span } of starts) {
    const text = formatExpression(signal) + "'".repeat(order);
    if (given.has(`${text} starts`))
      stopAt(span, 'given-twice', `${text} starts twice in ${name}; keep one of the two lines.`);
    given.add(`${text} starts`);
  }
}

function readSource(
  term: SourceTerm,
  input: string,
  order: number,
  scope: Scope,
  meanings: Meanings,
): ActingSource {
  const { factor, call } = splitSource(term.source);
  const source = sourceNamed(call.callee);
  if (!source) unknownSource(call);
  if (source.availability === 'later') {
    stopAt(call.span, 'not-available-yet', `The source ${call.callee} is not available yet.`);
  }
  if (call.args.length !== 1) {
    stopAt(call.span, 'argument-count', `${call.callee} takes one argument: ${source.summary}`);
  }
  const amounts = (factor ? [factor, call.args[0]] : [call.args[0]]).map((part) =>
    amountOf(part, 'The size of a source', scope, meanings),
  );
  const after = term.after
    ? amountOf(term.after, 'The time after `after`', scope, meanings)
    : formulaValue(zeroRatio);
  if (term.after && (asRational(after.ratio)?.n ?? 0n) < 0n)
    stopAt(term.after.span, 'negative-time', 'A source begins at t = 0 at the earliest.');
  const size = amounts.map(({ ratio }) => ratio).reduce((a, b) => mulRatios(a, b));
  return {
    input,
    kind: source.kindAfterIntegrations(order),
    transform: divRatios(
      term.sign < 0 ? negRatio(size) : size,
      powRatio(ratioOf(laplace), source.power + order),
    ),
    after: after.ratio,
    when: allOf([...amounts, after].map(({ when }) => when)),
  };
}

/** The value of a parameter in a line of a case. */
function amountOf(
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
function splitSource(source: Expression): {
  factor: Expression | null;
  call: Extract<Expression, { kind: 'call' }>;
} {
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

function unknownSource(call: Extract<Expression, { kind: 'call' }>): never {
  const near = nearestName(call.callee, [
    'step',
    'ramp',
    'parabola',
    'impulse',
    'sine',
    'noise',
    'shaped',
    'measured',
  ]);
  stopAt(
    call.calleeSpan,
    'unknown-source',
    `There is no source ${call.callee}.${near ? ` Is ${near} meant?` : ''} Sources are step, ramp, parabola and impulse.`,
    near ? [{ title: `Write ${near}`, edits: [{ span: call.calleeSpan, insert: near }] }] : [],
  );
}

function readStarts(
  statement: CaseStatement,
  loop: LoopRecord,
  scope: Scope,
  meanings: Meanings,
): CaseRecord['starts'] {
  return statement.starts.map((start) => {
    const { name } = namedSignal(start.signal);
    const signal = requireSignal(loop, start.signal, 'any');
    if (loop.inputs.includes(signal))
      stopAt(
        start.span,
        'input-starts',
        `${nameToText(signal)} is an input of ${loop.name}; its value from t = 0 on is that of its source.`,
      );
    const input = initialValueName(name, start.order);
    if (!loop.initialRows.some((row) => row.has(input))) {
      stopAt(
        start.span,
        'no-initial-value',
        `${name}${"'".repeat(start.order)} cannot start at a value of its own: no equation of ${loop.name} ` +
          `differentiates it ${start.order + 1 === 1 ? '' : `${start.order + 1} times `}with \`'\`.`,
      );
    }
    const { ratio, when } = amountOf(start.value, 'An initial value', scope, meanings);
    return { input, signal, value: ratio, when };
  });
}

/** A signal of a case: the share of every source, and of every initial value. */
export function signalIn(
  record: CaseRecord,
  signal: string,
  budget: Budget,
  demandAt: Expression['span'],
): SignalValue {
  const { loop } = record;
  const terms = record.acting.map((acting): SignalTerm => {
    const transfer = transferRatio(loop, acting.input, signal, demandAt);
    const { input, kind: source, after } = acting;
    return { input, source, transform: mulRatios(transfer, acting.transform), after };
  });
  const initial = record.starts.map((start): SignalTerm => {
    const transfer = initialTransfer(loop, start.input, signal, budget, demandAt);
    const transform = mulRatios(transfer, start.value);
    return { input: start.input, source: 'initial', transform, after: zeroRatio };
  });
  return {
    kind: 'signal',
    name: `${record.name}.${signal}`,
    terms: [...terms, ...initial].filter((term) => !isZeroRatio(term.transform)),
    inputs: loop.inputs,
    blocks: loop.blocks(signal),
    when: allOf([loop.when, ...[...record.acting, ...record.starts].map(({ when }) => when)]),
    notes: [],
  };
}

function transferRatio(
  loop: LoopRecord,
  input: string,
  signal: string,
  span: Expression['span'],
): Ratio {
  if (loop.inputs.includes(signal)) return input === signal ? oneRatio : zeroRatio;
  return demand(transferFunction(loop.closed, input, signal), span).ratio;
}

/** How an initial value enters: as one more input of the loop, with the coefficients that L{x'} = sX − x(0) gives. */
function initialTransfer(
  loop: LoopRecord,
  input: string,
  signal: string,
  budget: Budget,
  span: Expression['span'],
): Ratio {
  if (loop.inputs.includes(signal)) return zeroRatio;
  const rows: LoopRow[] = loop.rows.map((row, index) => {
    const share = loop.initialRows[index].get(input);
    return share ? { coefficients: new Map([...row.coefficients, [input, share]]) } : row;
  });
  const closed = demand(closeLoop(rows, loop.unknowns, [...loop.inputs, input], budget), span);
  return demand(transferFunction(closed, input, signal), span).ratio;
}
