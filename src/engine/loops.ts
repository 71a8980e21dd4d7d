import type { Budget, Span } from '../base/index.ts';
import {
  allOf,
  blocksOf,
  closeLoop,
  type ClosedLoop,
  type Condition,
  type LoopRow,
  type StabilityBlock,
} from '../control/index.ts';
import { nameToText, nearestName, type LoopStatement } from '../language/index.ts';
import {
  addForms,
  linearForm,
  negateForm,
  refuseConstant,
  signalNamed,
  type SignalNames,
} from './equations.ts';
import { existenceOf } from './existence.ts';
import type { LoopRecord, Meanings } from './meanings.ts';
import { pathsIn } from './paths.ts';
import type { Scope } from './scope.ts';
import { demand, stopAt } from './stop.ts';

/** An equation as taken in, with the names that its signals get. */
interface Equation {
  readonly statement: LoopStatement;
  readonly index: number;
  readonly prefix: string;
}

/** How loops find the statements of the loops that they use. */
export interface LoopSource {
  loopStatement(name: string, span: Span): LoopStatement;
  /** Whether an assumption, a definition or a symbol of this name exists: then it is a coefficient. */
  isCoefficient(name: string): boolean;
}

/** Reads and closes a loop; stops where it is not a well-posed linear system. */
export function readLoop(
  statement: LoopStatement,
  scope: Scope,
  meanings: Meanings,
  source: LoopSource,
  budget: Budget,
): LoopRecord {
  const equations = equationsOf(statement, '', source);
  const inputs = statement.inputs.map((input) => input.name);
  const unknowns = unknownsOf(equations, inputs, source);
  checkCounts(statement, equations, unknowns, source);
  const forms = equations.map((equation) =>
    readEquation(equation, inputs, unknowns, scope, meanings),
  );
  const rows: LoopRow[] = forms.map((form) => ({ coefficients: form.signals }));
  const closed = demand(closeLoop(rows, unknowns, inputs, budget), statement.nameSpan);
  return {
    name: statement.name,
    closed,
    rows,
    inputs,
    unknowns,
    initialRows: forms.map((form) => form.initials),
    definedBy: definedBy(equations, inputs, unknowns),
    when: existenceOfCoefficients(equations, [...inputs, ...unknowns], scope, meanings),
    blocks: (signal) => judgedBlocks(closed, inputs, signal),
  };
}

function judgedBlocks(
  closed: ClosedLoop,
  inputs: readonly string[],
  signal: string | null,
): readonly StabilityBlock[] {
  if (signal === null) return closed.blocks;
  return inputs.includes(signal) ? [] : blocksOf(closed, signal);
}

function existenceOfCoefficients(
  equations: readonly Equation[],
  signals: readonly string[],
  scope: Scope,
  meanings: Meanings,
): Condition {
  const known = new Set(signals);
  return allOf(
    equations.flatMap(({ statement, index, prefix }) => {
      const { left, right } = statement.equations[index];
      const isSignal = (name: string) => known.has(prefix + name);
      return [left, right].map((side) => existenceOf(side, scope, meanings, isSignal));
    }),
  );
}

function equationsOf(statement: LoopStatement, prefix: string, source: LoopSource): Equation[] {
  const own = statement.equations.map((_, index) => ({ statement, index, prefix }));
  const used = statement.uses.flatMap((use) => {
    const inner = source.loopStatement(use.loop.name, use.loop.span);
    return equationsOf(inner, use.prefix ? `${prefix}${use.prefix.name}.` : prefix, source);
  });
  return [...used, ...own];
}

/** Every name in the equations that is neither an input nor a coefficient, in order of appearance. */
function unknownsOf(
  equations: readonly Equation[],
  inputs: readonly string[],
  source: LoopSource,
): string[] {
  const unknowns = new Set<string>();
  for (const equation of equations) {
    for (const name of signalNamesIn(equation, source)) {
      if (!inputs.includes(name)) unknowns.add(name);
    }
  }
  return [...unknowns];
}

function signalNamesIn(equation: Equation, source: LoopSource): string[] {
  const { left, right } = equation.statement.equations[equation.index];
  const names = [...pathsIn(left), ...pathsIn(right)];
  return names
    .filter((name) => isSignalName(name, equation.statement, source))
    .map((name) => equation.prefix + name);
}

/** In its own loop an input is a signal even where an assumption has its name (that is reported elsewhere). */
function isSignalName(name: string, statement: LoopStatement, source: LoopSource): boolean {
  if (statement.inputs.some((input) => input.name === name)) return true;
  const root = name.split('.')[0];
  if (name.includes('.')) return statement.uses.some((use) => use.prefix?.name === root);
  return !source.isCoefficient(name);
}

function readEquation(
  equation: Equation,
  inputs: readonly string[],
  unknowns: readonly string[],
  scope: Scope,
  meanings: Meanings,
) {
  const { left, right, span } = equation.statement.equations[equation.index];
  const signals = new Set([...inputs, ...unknowns]);
  const names: SignalNames = {
    signalOf: (name) => (signals.has(equation.prefix + name) ? equation.prefix + name : null),
  };
  const form = addForms(
    linearForm(left, names, scope, meanings),
    negateForm(linearForm(right, names, scope, meanings)),
  );
  refuseConstant(form, span);
  if (form.signals.size === 0)
    stopAt(span, 'empty-equation', 'This equation says nothing of any signal: 0 = 0.');
  return form;
}

function definedBy(
  equations: readonly Equation[],
  inputs: readonly string[],
  unknowns: readonly string[],
): ReadonlyMap<string, number> {
  const signals = new Set([...inputs, ...unknowns]);
  const map = new Map<string, number>();
  equations.forEach((equation, row) => {
    const name = signalNamed(equation.statement.equations[equation.index].left, {
      signalOf: (own) => own,
    });
    if (name !== null && signals.has(equation.prefix + name)) map.set(equation.prefix + name, row);
  });
  return map;
}

function checkCounts(
  statement: LoopStatement,
  equations: readonly Equation[],
  unknowns: readonly string[],
  source: LoopSource,
): void {
  if (equations.length === unknowns.length) return;
  const count = `${statement.name} has ${amount(equations.length, 'equation')} for ${amount(unknowns.length, 'unknown')}`;
  const list = unknowns.length > 0 ? ` (${unknowns.map(nameToText).join(', ')})` : '';
  const hint =
    equations.length < unknowns.length
      ? misspelling(equations, unknowns, statement, source)
      : takenNames(statement, source);
  stopAt(
    statement.nameSpan,
    equations.length < unknowns.length ? 'too-few-equations' : 'too-many-equations',
    `${count}${list}. ${hint}`,
  );
}

function amount(count: number, noun: string): string {
  return `${count} ${noun}${count === 1 ? '' : 's'}`;
}

/** The unknown that stands only once and looks like another name. */
function misspelling(
  equations: readonly Equation[],
  unknowns: readonly string[],
  statement: LoopStatement,
  source: LoopSource,
): string {
  const uses = equations.flatMap((equation) => signalNamesIn(equation, source));
  const inputs = statement.inputs.map((input) => input.name);
  for (const unknown of unknowns) {
    if (uses.filter((name) => name === unknown).length > 1) continue;
    const near = nearestName(unknown, [
      ...unknowns.filter((other) => other !== unknown),
      ...inputs,
    ]);
    if (near) return `Is ${unknown} a misspelt ${near}?`;
  }
  return 'Add an equation, name the missing inputs after `driven by`, or give a coefficient its value.';
}

function takenNames(statement: LoopStatement, source: LoopSource): string {
  const taken = statement.equations
    .map((equation) => (equation.left.kind === 'name' ? equation.left.name : null))
    .filter((name): name is string => name !== null && source.isCoefficient(name));
  if (taken.length === 0) return 'Take one equation away, or name what it is to determine.';
  return `${taken.join(', ')} already ${taken.length === 1 ? 'has a meaning' : 'have meanings'} outside the loop, so it is a coefficient here; rename it in one of the two places.`;
}
