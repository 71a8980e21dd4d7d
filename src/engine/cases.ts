import { isZeroRatio, mulRatios, oneRatio, zeroRatio, type Ratio } from '../algebra/index.ts';
import type { Budget } from '../base/index.ts';
import {
  allOf,
  closeLoop,
  transferFunction,
  type Condition,
  type LoopRow,
  type SignalTerm,
  type SignalValue,
} from '../control/index.ts';
import {
  formatExpression,
  nameToText,
  type CaseStatement,
  type Expression,
} from '../language/index.ts';
import { amountOf, readSource, type ActingSource } from './acting-source.ts';
import { initialValueName } from './equations.ts';

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

/** Reads a load case; stops at unknown inputs, unknown sources and sources that are not available yet. */
export function readCase(statement: CaseStatement, scope: Scope, meanings: Meanings): CaseRecord {
  const loop = meanings.loopOf(statement.loop.name, statement.loop.span, scope);
  refuseSecondLines(statement);
  const acting = statement.inputs.flatMap((line) => {
    const input = requireSignal(loop, line.input, 'input');
    return line.sources.map((term, index) => {
      const place = { input, order: line.order, id: `${statement.name}.${input}#${index}` };
      return readSource(term, place, scope, meanings);
    });
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
    const { input, kind: source, after, noise, frequency } = acting;
    const transform = mulRatios(transfer, acting.transform);
    return {
      input,
      source,
      transform,
      after,
      ...(noise && { noise }),
      ...(frequency && { frequency }),
    };
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
