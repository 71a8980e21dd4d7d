import { coverSpans } from '../base/index.ts';
import type { Arrow, Expression, RelationOperator, Replacement } from './ast.ts';
import { bracketContent, bracketUse, type BracketUse } from './brackets.ts';
import {
  closeBracket,
  failBareFraction,
  isShortChain,
  refuseBracketAfter,
  refuseBracketAfterCall,
  refuseEvaluation,
  refuseLooseBracket,
  refusePlusMinus,
  whyNoDerivative,
} from './formula-refusals.ts';
import { replacement } from './fixes.ts';
import { nameOf, readName } from './name-reading.ts';
import { canonicalName } from './names.ts';
import {
  readBracketedUnit,
  readQuantity,
  readSlotQuantity,
  readUnit,
  refuseUnitInFormula,
} from './quantities.ts';
import type { LineReader } from './reader.ts';
import {
  isOwnNumber,
  numberOf,
  productOf,
  readCoefficient,
  refuseNumberAfterNumber,
  refuseUnclearSolidus,
  startsFactor,
  type Chain,
} from './terms.ts';
import type { Token } from './tokens.ts';

const RELATIONS: ReadonlySet<string> = new Set(['<', '<=', '=', '>=', '>']);

/** The functions that list names which nothing else needs to introduce. */
const LISTS_UNKNOWNS: ReadonlySet<string> = new Set(['solve', 'match']);

/** Reads a whole formula, the loosest level: `in`. With `slot`, its first number may carry a unit. */
export function readFormula(reader: LineReader, slot = false): Expression {
  return reader.nested(() => readIn(reader, slot));
}

/** Reads a condition of `require` or `where`, in which the right of a relation is a quantity slot. */
export function readCondition(reader: LineReader): Expression {
  reader.limitsAreSlots = true;
  const condition = readFormula(reader);
  reader.limitsAreSlots = false;
  return condition;
}

/** Reads what a quantity slot holds: a number with a unit, a number, or a formula. */
export function readSlot(reader: LineReader): Expression {
  return reader.nested(() => readSum(reader, true));
}

function readIn(reader: LineReader, slot: boolean): Expression {
  let of = readWith(reader, slot);
  for (let length = 0; reader.accept('in') && isShortChain(reader, length); length++) {
    const unit = readUnit(reader, '`in` needs a unit');
    of = { kind: 'in-unit', span: reader.spanFrom(of.span.from), of, ...unit };
  }
  refuseWithAfterIn(reader, of);
  return of;
}

/** `with` binds tighter than `in`, so that it stands before it. */
function refuseWithAfterIn(reader: LineReader, of: Expression): void {
  const first = reader.peek();
  if (of.kind !== 'in-unit' || !first || !reader.accept('with')) return;
  readReplacements(reader);
  const shown = { from: of.of.span.to, to: of.unitSpan.to };
  const replaced = reader.spanFrom(first.from);
  const { source } = reader;
  const swapped = `${source.slice(shown.to, replaced.to)}${source.slice(shown.from, shown.to)}`;
  const message = 'What a `with` replaces stands before the unit that `in` names.';
  reader.refuse(first, 'with-after-in', message, [
    replacement({ from: shown.from, to: replaced.to }, swapped, `write \`…${swapped}\``),
  ]);
}

function readWith(reader: LineReader, slot: boolean): Expression {
  let of = readOr(reader, slot);
  for (let length = 0; reader.accept('with') && isShortChain(reader, length); length++) {
    const replacements = readReplacements(reader);
    of = { kind: 'with', span: reader.spanFrom(of.span.from), of, replacements };
  }
  return of;
}

function readReplacements(reader: LineReader): readonly Replacement[] {
  const open = reader.accept('(');
  if (!open) return [readReplacement(reader)];
  const replacements = [readReplacement(reader)];
  while (reader.accept(',')) replacements.push(readReplacement(reader));
  closeBracket(reader, open);
  return replacements;
}

function readReplacement(reader: LineReader): Replacement {
  const name = readName(reader, '`with` needs the name that is replaced');
  const by = reader.accept('is') ? 'is' : '=';
  if (by === '=') reader.expect('=', 'A replacement, `Kp is 2` or `C = C2`,');
  const value = by === 'is' ? readAssumedValue(reader) : readSum(reader, false);
  return { span: reader.spanFrom(name.span.from), name: name.name, nameSpan: name.span, by, value };
}

/** What follows `is` where a formula stands: a number with a unit; a bare number is a number literal. */
export function readAssumedValue(reader: LineReader): Expression {
  const quantity = readQuantity(reader, '`is`');
  if (quantity.unit !== '') return quantity;
  const text = quantity.text.replace(/^-/, '');
  const number: Expression = { kind: 'number', span: quantity.span, text };
  if (text === quantity.text) return number;
  return { kind: 'negation', span: quantity.span, of: number };
}

function readOr(reader: LineReader, slot: boolean): Expression {
  return readLogical(reader, 'or', () => readLogical(reader, 'and', () => readNot(reader, slot)));
}

function readLogical(
  reader: LineReader,
  operator: 'and' | 'or',
  readOperand: () => Expression,
): Expression {
  const operands = [readOperand()];
  while (reader.accept(operator)) operands.push(readOperand());
  if (operands.length === 1) return operands[0]!;
  return { kind: 'logical', span: reader.spanFrom(operands[0]!.span.from), operator, operands };
}

function readNot(reader: LineReader, slot: boolean): Expression {
  const not = reader.accept('not');
  if (!not) return readRelation(reader, slot);
  const of = reader.nested(() => readNot(reader, false));
  return { kind: 'not', span: reader.spanFrom(not.from), of };
}

function readRelation(reader: LineReader, slot: boolean): Expression {
  const sides = [readSum(reader, slot)];
  const operators: RelationOperator[] = [];
  while (isRelation(reader.peek())) {
    operators.push(reader.take().text as RelationOperator);
    sides.push(readSum(reader, reader.limitsAreSlots));
  }
  if (sides.length === 1) return sides[0]!;
  return { kind: 'relation', span: reader.spanFrom(sides[0]!.span.from), sides, operators };
}

function isRelation(token: Token | undefined): boolean {
  return token?.kind === 'symbol' && RELATIONS.has(token.text);
}

/** Reads a sum, the tightest level that holds no relation. */
export function readSum(reader: LineReader, slot: boolean): Expression {
  const terms = [readTerm(reader, slot)];
  const signs: (1 | -1)[] = [1];
  while (reader.isAt('+') || reader.isAt('-')) {
    signs.push(reader.take().text === '-' ? -1 : 1);
    terms.push(readTerm(reader, false));
  }
  refusePlusMinus(reader);
  if (terms.length === 1) return terms[0]!;
  return { kind: 'sum', span: reader.spanFrom(terms[0]!.span.from), terms, signs };
}

/** Reads a term: factors, multiplied by a space or `*`, and at most one solidus. */
export function readTerm(reader: LineReader, slot: boolean): Expression {
  const quantity = slot ? readSlotQuantity(reader) : null;
  const coefficient = quantity ? null : readCoefficient(reader);
  const start = coefficient ?? (quantity ? [quantity] : null);
  const chain: Chain = {
    runs: [quantity ? [quantity] : readRun(reader, start ?? [])],
    operators: [],
  };
  while (reader.isAt('*') || reader.isAt('·') || reader.isAt('/')) {
    chain.operators.push(reader.take().text === '/' ? '/' : '*');
    chain.runs.push(readRun(reader, []));
  }
  refuseUnclearSolidus(reader, chain);
  return productOf(chain, coefficient !== null);
}

/** Reads juxtaposed factors onto those that were read before. */
function readRun(reader: LineReader, factors: Expression[]): Expression[] {
  if (factors.length === 0) factors.push(readSigned(reader));
  for (;;) {
    if (isOwnNumber(reader, factors)) refuseUnitInFormula(reader);
    if (!startsFactor(reader.peek())) return factors;
    refuseNumberAfterNumber(reader);
    factors.push(readPower(reader));
  }
}

function readSigned(reader: LineReader): Expression {
  if (reader.accept('+')) return reader.nested(() => readSigned(reader));
  const sign = reader.accept('-');
  if (!sign) return readPower(reader);
  const of = reader.nested(() => readSigned(reader));
  return { kind: 'negation', span: reader.spanFrom(sign.from), of };
}

function readPower(reader: LineReader): Expression {
  const base = readPostfix(reader);
  if (!reader.accept('^')) return base;
  const exponent = reader.nested(() => readSigned(reader));
  return { kind: 'power', span: reader.spanFrom(base.span.from), base, exponent };
}

function readPostfix(reader: LineReader): Expression {
  const isBracket = reader.isAt('(');
  const from = reader.place;
  let e = readAtom(reader);
  for (let length = 0; isMemberDot(reader) && isShortChain(reader, length); length++)
    e = readMember(reader, e, from);
  refuseLooseBracket(reader);
  return readDerivative(reader, e, isBracket && e.kind !== 'member', from);
}

function isMemberDot(reader: LineReader): boolean {
  return reader.isAt('.') && reader.peek(1)?.kind === 'name';
}

function readMember(reader: LineReader, of: Expression, from: number): Expression {
  reader.take();
  const { name, span } = nameOf(reader.take());
  const member: Expression = {
    kind: 'member',
    span: reader.spanFrom(from),
    of,
    name,
    nameSpan: span,
  };
  refuseBracketAfter(reader, member);
  return member;
}

function readDerivative(
  reader: LineReader,
  of: Expression,
  isBracket: boolean,
  from: number,
): Expression {
  const first = reader.peek();
  let order = 0;
  while (reader.accept("'")) order += 1;
  if (order === 0) return of;
  const span = reader.spanFrom(from);
  const reason = whyNoDerivative(reader, of, isBracket);
  if (reason) reader.refuse(coverSpans(of.span, first!), 'not-a-signal', reason);
  return { kind: 'derivative', span, of, order };
}

function readAtom(reader: LineReader): Expression {
  const token = reader.peek();
  if (token?.kind === 'number') return readNumber(reader);
  if (token?.kind === 'name') return readNamed(reader);
  if (token?.kind === 'text') return readText(reader);
  if (reader.isAt('(')) return reader.nested(() => readBracket(reader));
  if (reader.isAt('.') && reader.peek(1)?.kind === 'number') return failBareFraction(reader);
  return reader.failUnexpected(
    reader.position === 0
      ? 'A formula is needed here'
      : `\`${reader.previous.text}\` needs a formula after it`,
  );
}

function readNumber(reader: LineReader): Expression {
  const token = reader.take();
  return reader.isAt('[') ? readBracketedUnit(reader, token) : numberOf(token);
}

function readText(reader: LineReader): Expression {
  const token = reader.take();
  return { kind: 'text', span: { from: token.from, to: token.to }, text: token.text.slice(1, -1) };
}

function readBracket(reader: LineReader): Expression {
  const open = reader.take();
  const e = readFormula(reader);
  if (reader.isAt(','))
    reader.fail(
      reader.peek()!,
      'unexpected',
      'This bracket follows no function, so it holds one formula, not a list.',
    );
  closeBracket(reader, open);
  const span = reader.spanFrom(open.from);
  return e.kind === 'name' ? { ...e, span, wordSpan: e.wordSpan ?? e.span } : { ...e, span };
}

function readNamed(reader: LineReader): Expression {
  const token = reader.take();
  if (!reader.isAt('(')) return nameOf(token);
  const use = bracketUse(reader, token);
  if (use === 'multiply') return nameOf(token);
  return reader.nested(() => {
    if (use !== 'call') return readEvaluation(reader, token, use);
    const call = readCall(reader, token);
    refuseBracketAfterCall(reader, call);
    return call;
  });
}

/** Reads `C(s)`, `L(0)` and `L(j w)`; a bracket that holds no such point is left to be a factor. */
function readEvaluation(reader: LineReader, token: Token, use: BracketUse): Expression {
  const name = nameOf(token);
  const content = bracketContent(reader);
  if (content === 'factor' || (content === 'unclear' && use === 'no-value')) return name;
  const open = reader.take();
  const at = readFormula(reader);
  closeBracket(reader, open);
  const span = reader.spanFrom(token.from);
  if (use === 'no-value' || content === 'unclear')
    refuseEvaluation(reader, name, { span, open, at }, use);
  return { kind: 'evaluation', span, name: name.name, nameSpan: name.span, at };
}

function readCall(reader: LineReader, token: Token): Expression {
  const open = reader.take();
  const { limitsAreSlots, namesMayBeUnknown } = reader;
  reader.limitsAreSlots = false;
  reader.namesMayBeUnknown ||= LISTS_UNKNOWNS.has(token.text);
  const kind = reader.kindOf(canonicalName(token.text));
  const callee = kind === null ? token.text : canonicalName(token.text);
  const args = reader.isAt(')') ? [] : readArguments(reader, callee);
  Object.assign(reader, { limitsAreSlots, namesMayBeUnknown });
  closeBracket(reader, open);
  const calleeSpan = { from: token.from, to: token.to };
  return { kind: 'call', span: reader.spanFrom(token.from), callee, calleeSpan, args };
}

function readArguments(reader: LineReader, callee: string): readonly Expression[] {
  if (callee === 'rows') return [readRows(reader)];
  const args: Expression[] = [];
  do args.push(readArgument(reader, callee, args.length));
  while (reader.accept(','));
  return args;
}

function readArgument(reader: LineReader, callee: string, index: number): Expression {
  const e = readFormula(reader, reader.context.vocabulary.slotArguments(callee, index));
  if (reader.accept('->')) return readArrow(reader, e);
  return reader.accept('as') ? readLimit(reader, e) : e;
}

/** Reads what follows `->`: all signals up to the closing bracket. */
function readArrow(reader: LineReader, from: Expression): Arrow {
  const to: Expression[] = [];
  do to.push(readFormula(reader));
  while (reader.accept(','));
  return { kind: 'arrow', span: reader.spanFrom(from.span.from), from, to };
}

function readLimit(reader: LineReader, of: Expression): Expression {
  const variable = readName(reader, '`as` needs the name that goes to a limit');
  reader.expect('to', 'A limit, `x as s to 0`,');
  const to = readSlot(reader);
  return { kind: 'limit', span: reader.spanFrom(of.span.from), of, variable: variable.name, to };
}

function readRows(reader: LineReader): Expression {
  const from = reader.place;
  const rows: Expression[][] = [];
  do rows.push(readRow(reader));
  while (reader.accept('|'));
  return { kind: 'rows', span: reader.spanFrom(from), rows };
}

function readRow(reader: LineReader): Expression[] {
  const row: Expression[] = [];
  do row.push(readFormula(reader));
  while (reader.accept(','));
  return row;
}
