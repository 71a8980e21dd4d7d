import { laplace, mulRatios, powRatio, ratioOf, zeroRatio, type Ratio } from '../algebra/index.ts';
import { transferFunction, type FormulaValue } from '../control/index.ts';
import { hiddenNote } from '../functions/index.ts';
import {
  nearestName,
  nameToText,
  type Expression,
  type Member,
  type Name,
} from '../language/index.ts';
import { formulaValue } from './arithmetic.ts';
import { replacementsOf } from './replacements.ts';

import type { LoopRecord, Meanings } from './meanings.ts';
import type { Scope } from './scope.ts';
import { demand, stopAt } from './stop.ts';

/** `storm.x.theta` is the root `storm` and the path `x.theta`; `(storm with …).e` narrows the scope of its root. */
export function signalPath(
  member: Member,
  scope: Scope,
  meanings: Meanings,
): { root: Name; path: string; rootScope: Scope } {
  const names = [member.name];
  let of: Expression = member.of;
  let rootScope = scope;
  for (;;) {
    if (of.kind === 'member') {
      names.unshift(of.name);
      of = of.of;
    } else if (of.kind === 'with') {
      rootScope = replacementsOf(of, rootScope, meanings).inside;
      of = of.of;
    } else break;
  }
  if (of.kind !== 'name') {
    stopAt(member.span, 'no-member', 'A signal is named by its load case: `case.signal`.');
  }
  return { root: of, path: names.join('.'), rootScope };
}

/** A signal in `->`: its name in the loop, and how often it is differentiated. */
export function namedSignal(expression: Expression): { name: string; order: number } {
  if (expression.kind === 'name') return { name: expression.name, order: 0 };
  if (expression.kind === 'derivative') {
    const inner = namedSignal(expression.of);
    return { name: inner.name, order: inner.order + expression.order };
  }
  if (expression.kind === 'member') {
    return { name: `${namedSignal(expression.of).name}.${expression.name}`, order: 0 };
  }
  stopAt(
    expression.span,
    'not-a-signal',
    "A signal of the loop is named here, with `'` for its derivatives.",
  );
}

/** The signal's name, after checking that the loop has it. */
export function requireSignal(
  loop: LoopRecord,
  expression: Expression,
  which: 'input' | 'any',
): string {
  const { name } = namedSignal(expression);
  const names = which === 'input' ? loop.inputs : [...loop.inputs, ...loop.unknowns];
  if (names.includes(name)) return name;
  const near = nearestName(name, names);
  const hint = near ? ` Is ${near} meant?` : '';
  const list = names.map(nameToText).join(', ');
  stopAt(
    expression.span,
    'unknown-signal',
    which === 'input'
      ? `${name} is not an input of ${loop.name}; its inputs are ${list}.${hint}`
      : `${name} is not a signal of ${loop.name}; its signals are ${list}.${hint}`,
    near ? [{ title: `Write ${near}`, edits: [{ span: expression.span, insert: near }] }] : [],
  );
}

/** `az(w -> theta')`: the transfer function in lowest terms, with what it hides. */
export function transferOf(
  loop: LoopRecord,
  from: Expression,
  to: Expression,
  write: (ratio: Ratio) => string,
): FormulaValue {
  const input = requireSignal(loop, from, 'input');
  const signal = requireSignal(loop, to, 'any');
  const order = namedSignal(to).order - namedSignal(from).order;
  const factor = powRatio(ratioOf(laplace), order);
  const { when } = loop;
  if (loop.inputs.includes(signal)) {
    return formulaValue(input === signal ? factor : zeroRatio, { origin: 'transfer', when });
  }
  const transfer = demand(transferFunction(loop.closed, input, signal), to.span);
  const note = hiddenNote(transfer.hidden, write);
  return formulaValue(mulRatios(transfer.ratio, factor), {
    hidden: transfer.cancelled,
    origin: 'transfer',
    when,
    notes: note ? [note] : [],
  });
}
