import {
  asRational,
  dependsOn,
  fractionOfRatio,
  laplace,
  ratioOf,
  symbol,
  zeroRatio,
  type Ratio,
} from '../algebra/index.ts';
import { isRefusal } from '../base/index.ts';
import { allOf, type SignalValue, type Value } from '../control/index.ts';
import {
  sourceNamed,
  type Argument,
  type Parameter,
  type ParameterKind,
  type WorksheetFunction,
} from '../functions/index.ts';
import {
  childrenOf,
  formatExpression,
  nearestName,
  type Call,
  type Expression,
} from '../language/index.ts';
import { formulaValue, kindInWords } from './arithmetic.ts';
import { constantOf } from './constants.ts';
import { angularOf, cyclesIn } from './cycles.ts';
import { parameterOf, replacementsOf } from './replacements.ts';

import type { LoopRecord, Meanings } from './meanings.ts';
import { namedSignal } from './signals.ts';
import { narrowScope, replacementKey, type ReplacementValue, type Scope } from './scope.ts';
import { sentence, stopAt } from './stop.ts';
import { stopAtUnknownName } from './unknown-name.ts';

/** Calls a worksheet function on arguments that are still text. */
export function callFunction(call: Call, scope: Scope, meanings: Meanings): Value {
  const spec = meanings.functionNamed(call.callee);
  if (!spec) unknownFunction(call, meanings);
  if (spec.availability === 'later') {
    stopAt(call.span, 'not-available-yet', `${spec.name} is not available yet.`);
  }
  const args = readArguments(call, spec, scope, meanings);
  const absent = args.find((arg) => arg.kind === 'value' && arg.value.kind === 'none');
  if (absent?.kind === 'value' && !spec.takesAbsent) return absent.value;
  const value = spec.evaluate(args, meanings.functionContext(scope));
  if (isRefusal(value)) stopAt(call.span, value.code, sentence(value.reason));
  return withInherited(value, args);
}

/** Notes of the arguments travel along, and so do the conditions under which the arguments have a value. */
function withInherited(value: Value, args: readonly Argument[]): Value {
  const inner = args.flatMap(valuesIn);
  const notes = [...new Set([...inner.flatMap((arg) => arg.notes), ...value.notes])];
  const loops = args.flatMap((arg) => (arg.kind === 'loop' ? [arg.loop] : []));
  return { ...value, when: allOf([...loops, ...inner, value].map(({ when }) => when)), notes };
}

function valuesIn(arg: Argument): readonly Value[] {
  switch (arg.kind) {
    case 'value':
    case 'band':
      return [arg.value];
    case 'signal':
      return [arg.signal];
    case 'relation':
      return arg.sides;
    case 'limit':
      return [arg.of];
    case 'loop':
    case 'name':
      return [];
  }
}

function unknownFunction(call: Call, meanings: Meanings): never {
  if (sourceNamed(call.callee)) stopAtUnknownName(call.callee, call.calleeSpan, meanings);
  const near = nearestName(call.callee, [...meanings.functionNames(), ...meanings.knownNames()]);
  stopAt(
    call.calleeSpan,
    'unknown-function',
    `There is no function ${call.callee}.${near ? ` Is ${near} meant?` : ' To multiply, leave a space before the bracket.'}`,
    near ? [{ title: `Write ${near}`, edits: [{ span: call.calleeSpan, insert: near }] }] : [],
  );
}

function readArguments(
  call: Call,
  spec: WorksheetFunction,
  scope: Scope,
  meanings: Meanings,
): Argument[] {
  checkCount(call, spec);
  const inside = withUnknowns(call, spec, scope, meanings);
  return call.args.map((arg, index) =>
    readArgument(parameterAt(spec, index), arg, spec, call, inside, meanings),
  );
}

/** The names that `solve` and `match` list as unknowns need nothing else to introduce them. */
function withUnknowns(
  call: Call,
  spec: WorksheetFunction,
  scope: Scope,
  meanings: Meanings,
): Scope {
  const unknowns = call.args.flatMap((arg, index) =>
    parameterAt(spec, index).takes === 'unknown' && arg.kind === 'name' && isNew(arg.name, meanings)
      ? [[arg.name, selfReplacement(arg.name)] as const]
      : [],
  );
  return unknowns.length === 0 ? scope : narrowScope(scope, new Map(unknowns));
}

function isNew(name: string, meanings: Meanings): boolean {
  return meanings.kindOf(name) === null && constantOf(name) === null;
}

function selfReplacement(name: string): ReplacementValue {
  const value = formulaValue(ratioOf(symbol(name)));
  const fraction = fractionOfRatio(value.ratio);
  return { value, fraction, key: replacementKey(value, fraction) };
}

/** The parameter that the argument at `index` is for; the last one repeats where it is a 'rest'. */
function parameterAt(spec: WorksheetFunction, index: number): Parameter {
  return spec.parameters[Math.min(index, spec.parameters.length - 1)];
}

function checkCount(call: Call, spec: WorksheetFunction): void {
  const least = spec.parameters.filter((parameter) => parameter.count === 'one').length;
  const most = spec.parameters.some((parameter) => parameter.count === 'rest')
    ? Infinity
    : spec.parameters.length;
  if (call.args.length >= least && call.args.length <= most) return;
  const names = spec.parameters.map(parameterText).join(', ');
  const last = most === Infinity ? least : most;
  stopAt(
    call.span,
    'argument-count',
    `${spec.name}(${names}) takes ${least === most ? least : most === Infinity ? `at least ${least}` : `${least} to ${most}`} ` +
      `argument${last === 1 ? '' : 's'}, not ${call.args.length}.`,
  );
}

function parameterText(parameter: Parameter): string {
  return parameter.count === 'rest' ? `${parameter.name}, …` : parameter.name;
}

function readArgument(
  parameter: Parameter,
  arg: Expression,
  spec: WorksheetFunction,
  call: Call,
  scope: Scope,
  meanings: Meanings,
): Argument {
  switch (parameter.takes) {
    case 'loop':
      return { kind: 'loop', loop: loopArgument(arg, spec, scope, meanings) };
    case 'loop or polynomial':
      return isLoop(arg, meanings)
        ? { kind: 'loop', loop: loopArgument(arg, spec, scope, meanings) }
        : { kind: 'value', value: valueArgument(parameter, arg, spec, scope, meanings) };
    case 'signal name':
      return {
        kind: 'name',
        name: namedSignal(arg).name,
        generator: symbol(namedSignal(arg).name),
      };
    case 'name':
    case 'unknown':
      return nameArgument(arg, scope, meanings);
    case 'relation':
      return relationArgument(arg, scope, meanings);
    case 'limit':
      return limitArgument(arg, scope, meanings);
    case 'rows':
      return rowsArgument(arg, scope, meanings);
    case 'signal':
      return { kind: 'signal', signal: signalArgument(arg, spec, call, scope, meanings) };
    case 'band':
      return bandArgument(parameter, arg, spec, scope, meanings);
    case 'frequency':
    case 'angular frequency':
      return { kind: 'value', value: frequencyArgument(parameter, arg, spec, scope, meanings) };
    case 'parameter':
    case 'formula':
    case 'matrix':
    case 'any':
      return { kind: 'value', value: valueArgument(parameter, arg, spec, scope, meanings) };
  }
}

/** Kinds of arguments that do not depend on s. */
const FREE_OF_S: ReadonlySet<ParameterKind> = new Set([
  'parameter',
  'band',
  'frequency',
  'angular frequency',
]);

function valueArgument(
  parameter: Parameter,
  arg: Expression,
  spec: WorksheetFunction,
  scope: Scope,
  meanings: Meanings,
): Value {
  const value = meanings.evaluate(arg, scope);
  if (value.kind === 'none' || parameter.takes === 'any') return value;
  if (parameter.takes === 'matrix') {
    if (value.kind === 'formula')
      return { kind: 'matrix', rows: [[value.ratio]], when: value.when, notes: value.notes };
    if (value.kind !== 'matrix') wrongKind(arg, spec, 'a matrix', value);
    return value;
  }
  if (value.kind !== 'formula') wrongKind(arg, spec, 'a formula', value);
  if (FREE_OF_S.has(parameter.takes) && dependsOn(value.ratio, laplace)) {
    stopAt(
      arg.span,
      'not-a-parameter',
      `${spec.name} acts on parameters, and \`${formatExpression(arg)}\` depends on s.`,
    );
  }
  return value;
}

/** A frequency of either kind as an angular frequency, in rad/s. */
function frequencyArgument(
  parameter: Parameter,
  arg: Expression,
  spec: WorksheetFunction,
  scope: Scope,
  meanings: Meanings,
): Value {
  const value = valueArgument(parameter, arg, spec, scope, meanings);
  if (value.kind !== 'formula') return value;
  const cycles = cyclesIn(arg, meanings) ?? (parameter.takes === 'frequency' ? 1 : 0);
  return cycles === 1 ? { ...value, ratio: angularOf(value.ratio) } : value;
}

/** A band in % (or a bare number) is relative; one with a unit is a quantity. */
function bandArgument(
  parameter: Parameter,
  arg: Expression,
  spec: WorksheetFunction,
  scope: Scope,
  meanings: Meanings,
): Argument {
  const value = valueArgument(parameter, arg, spec, scope, meanings);
  if (value.kind !== 'formula') return { kind: 'value', value };
  return { kind: 'band', value, isRelative: isPlainNumber(arg, meanings) };
}

function isPlainNumber(arg: Expression, meanings: Meanings): boolean {
  if (arg.kind === 'quantity') return arg.unit === '%' || arg.unit === '';
  const parts = childrenOf(arg.kind === 'name' ? (meanings.formulaOf(arg.name) ?? arg) : arg);
  if (arg.kind === 'name' && parts.length === 0)
    return /^%?$/.test(meanings.unitTextOf(arg.name) ?? '');
  return parts.every((part) => isPlainNumber(part, meanings));
}

function wrongKind(arg: Expression, spec: WorksheetFunction, wanted: string, value: Value): never {
  stopAt(
    arg.span,
    'wrong-kind',
    `${spec.name} takes ${wanted} here, and \`${formatExpression(arg)}\` is ${kindInWords(value)}.`,
  );
}

function isLoop(arg: Expression, meanings: Meanings): boolean {
  if (arg.kind === 'with') return isLoop(arg.of, meanings);
  return arg.kind === 'name' && meanings.kindOf(arg.name) === 'loop';
}

function loopArgument(
  arg: Expression,
  spec: WorksheetFunction,
  scope: Scope,
  meanings: Meanings,
): LoopRecord {
  if (arg.kind === 'with') {
    return loopArgument(arg.of, spec, replacementsOf(arg, scope, meanings).inside, meanings);
  }
  const kind = arg.kind === 'name' ? meanings.kindOf(arg.name) : null;
  if (arg.kind === 'name' && (kind === 'loop' || kind === 'unavailable'))
    return meanings.loopOf(arg.name, arg.span, scope);
  const loops = meanings.knownNames().filter((name) => meanings.kindOf(name) === 'loop');
  stopAt(
    arg.span,
    'not-a-loop',
    `${spec.name} takes a loop here${loops.length > 0 ? ` (${loops.join(', ')})` : ''}, not \`${formatExpression(arg)}\`.`,
  );
}

function nameArgument(arg: Expression, scope: Scope, meanings: Meanings): Argument {
  if (arg.kind !== 'name') {
    stopAt(arg.span, 'not-a-name', `A name is needed here, not \`${formatExpression(arg)}\`.`);
  }
  const kind = meanings.kindOf(arg.name);
  if (kind === 'loop' || kind === 'case') {
    stopAt(arg.span, 'not-a-name', `${arg.name} is a ${kind}; a symbol is needed here.`);
  }
  if (kind === null) meanings.valueOf(arg.name, arg.span, scope);
  return { kind: 'name', name: arg.name, generator: arg.name === 's' ? laplace : symbol(arg.name) };
}

function relationArgument(arg: Expression, scope: Scope, meanings: Meanings): Argument {
  if (arg.kind === 'relation') {
    const sides = arg.sides.map((side) => meanings.evaluate(side, scope));
    return { kind: 'relation', sides, operators: arg.operators };
  }
  return { kind: 'value', value: meanings.evaluate(arg, scope) };
}

function limitArgument(arg: Expression, scope: Scope, meanings: Meanings): Argument {
  if (arg.kind !== 'limit') {
    stopAt(arg.span, 'no-limit', 'Say what tends to what: `limit(x as s to 0)`.');
  }
  const of = meanings.evaluate(arg.of, scope);
  const variable = arg.variable === 's' ? laplace : symbol(arg.variable);
  if (arg.to.kind === 'name' && /^(infinity|∞)$/.test(arg.to.name))
    return { kind: 'limit', of, variable, to: 'infinity' };
  return {
    kind: 'limit',
    of,
    variable,
    to: parameterOf(meanings.evaluate(arg.to, scope), arg.to.span),
  };
}

function rowsArgument(arg: Expression, scope: Scope, meanings: Meanings): Argument {
  const rows = arg.kind === 'rows' ? arg.rows : [[arg]];
  const widths = new Set(rows.map((row) => row.length));
  if (widths.size > 1) {
    stopAt(
      arg.span,
      'ragged-matrix',
      `The rows have ${[...widths].join(' and ')} entries; all rows need the same number.`,
    );
  }
  const values = rows.map((row) => row.map((entry) => meanings.evaluate(entry, scope)));
  const ratios = values.map((row, i) =>
    row.map((value, k): Ratio => parameterOf(value, rows[i][k].span)),
  );
  const when = allOf(values.flat().map((value) => value.when));
  return { kind: 'value', value: { kind: 'matrix', rows: ratios, when, notes: [] } };
}

function signalArgument(
  arg: Expression,
  spec: WorksheetFunction,
  call: Call,
  scope: Scope,
  meanings: Meanings,
): SignalValue {
  const value = meanings.evaluate(arg, scope);
  if (value.kind === 'signal') return value;
  if (value.kind !== 'formula') wrongKind(arg, spec, 'a signal', value);
  if (value.origin === 'transfer') transferRefused(arg, spec, call);
  return signalOfTransform(value.ratio, formatExpression(arg), value);
}

function transferRefused(arg: Expression, spec: WorksheetFunction, call: Call): never {
  const text = formatExpression(arg);
  const at = arg.span;
  stopAt(
    at,
    'transfer-not-signal',
    `${spec.name} takes a signal, and \`${text}\` is a transfer function. ` +
      `For its gain at rest write \`dc_gain(${text})\`, for its response to a unit step \`${spec.name}(${text}/s)\`, or name a signal of a load case.`,
    [
      {
        title: `Gain at rest: dc_gain(${text})`,
        edits: [{ span: call.span, insert: `dc_gain(${text})` }],
      },
      { title: `Unit step: ${text}/s`, edits: [{ span: at, insert: `${text}/s` }] },
    ],
  );
}

/** A formula in s, taken as the transform of a signal, which is said. */
function signalOfTransform(transform: Ratio, text: string, from: Value): SignalValue {
  const note = asRational(transform) ? [] : [`\`${text}\` is taken as the transform of a signal.`];
  return {
    kind: 'signal',
    name: text,
    terms: [{ input: '', source: 'constant', transform, after: zeroRatio }],
    inputs: [],
    blocks: [],
    when: from.when,
    notes: [...from.notes, ...note],
  };
}
