import type { Span } from '../base/index.ts';
import type { Expression, Quantity } from './ast.ts';
import { bracketing, insertion, replacement } from './fixes.ts';
import { canonicalName, CONSTANT_MEANINGS } from './names.ts';
import type { LineReader } from './reader.ts';
import { solidusFixes, solidusMessage } from './solidus.ts';
import type { Token } from './tokens.ts';
import { scanUnit, type UnitScan } from './unit-scan.ts';

/** A unit as typed, with one space where white space was, and its place. */
export interface UnitText {
  readonly unit: string;
  readonly unitSpan: Span;
}

const SLOT_ENDS: ReadonlySet<string> = new Set('+ - ± * < <= = >= > , | ) ] ->'.split(' '));

function joined(tokens: readonly Token[]): string {
  return tokens.map((token, k) => (k > 0 && token.spaced ? ` ${token.text}` : token.text)).join('');
}

/** Takes a scanned unit; says where it breaks the solidus rule. */
function takeUnit(reader: LineReader, scan: UnitScan): UnitText {
  const tokens = reader.tokens.slice(reader.position, scan.end);
  reader.position = scan.end;
  const unitSpan = { from: tokens[0]!.from, to: tokens.at(-1)!.to };
  if (scan.unclear) {
    const { unclear } = scan;
    const span = { from: unclear.numerator.from, to: unclear.rest.to };
    reader.refuse(
      span,
      'solidus',
      solidusMessage(unclear, reader.source),
      solidusFixes(unclear, reader.source),
    );
  }
  return { unit: joined(tokens), unitSpan };
}

/** Reads a unit where nothing else may stand: after `in`, `has unit`, and in square brackets. */
export function readUnit(reader: LineReader, purpose: string): UnitText {
  const scan = scanUnit(reader.tokens, reader.position);
  if (scan) return takeUnit(reader, scan);
  const { span } = reader.failUnexpected(purpose);
  return { unit: '', unitSpan: span };
}

/** The sign and number at the reader's place, or null: the number of tokens, and the decimal text. */
function signedNumber(reader: LineReader): { length: number; text: string } | null {
  const hasSign = reader.isAt('-') || reader.isAt('+');
  const number = reader.peek(hasSign ? 1 : 0);
  if (number?.kind !== 'number') return null;
  const sign = reader.isAt('-') ? '-' : '';
  return { length: hasSign ? 2 : 1, text: sign + number.text };
}

/** Reads a number with an optional unit, where no formula may stand. */
export function readQuantity(reader: LineReader, purpose: string): Quantity {
  const from = reader.place;
  const number = signedNumber(reader);
  if (!number) {
    const { span } = reader.failUnexpected(`${purpose} needs a number`);
    return { kind: 'quantity', span, text: '0', unit: '', unitSpan: span };
  }
  reader.position += number.length;
  const end = reader.previous.to;
  const scan = scanUnit(reader.tokens, reader.position);
  const unit = scan ? takeUnit(reader, scan) : { unit: '', unitSpan: { from: end, to: end } };
  refuseSplitNumber(reader);
  refuseUnitSlip(reader);
  return { kind: 'quantity', span: reader.spanFrom(from), text: number.text, ...unit };
}

/** `12 000` and `0,2` are numbers to the eye, but not to the language. */
function refuseSplitNumber(reader: LineReader): void {
  const before = reader.previous;
  const next = reader.peek();
  const isComma = next?.text === ',' && !next.spaced;
  const second = isComma ? reader.peek(1) : next;
  if (before.kind !== 'number' || second?.kind !== 'number' || (isComma && second.spaced)) return;
  const whole = `${before.text}${isComma ? '.' : ''}${second.text}`;
  const span = { from: before.from, to: second.to };
  const reason = isComma ? 'the decimal sign is a point' : 'a number has no spaces in it';
  reader.fail(span, 'split-number', `\`${reader.text(span)}\` is not one number: ${reason}.`, [
    replacement(span, whole),
  ]);
}

/** `3 in`: `in` is a word of the language and never the inch. */
function refuseInch(reader: LineReader): void {
  const token = reader.peek();
  if (reader.previous.kind !== 'number' || !token || !reader.isAt('in')) return;
  if (scanUnit(reader.tokens, reader.position + 1)) return;
  reader.fail(token, 'unit-form', '`in` shows a value in a unit; the inch is written `inch`.', [
    replacement(token, 'inch'),
  ]);
}

/** `5 kg*m` and `5 /s` look like units, but are not written so. */
function refuseUnitSlip(reader: LineReader): void {
  refuseInch(reader);
  const [sign, symbol] = [reader.peek(), reader.peek(1)];
  const isUnit = symbol?.kind === 'name' && reader.context.isUnit(symbol.text);
  if (!sign || !isUnit) return;
  if (reader.isAt('*'))
    reader.fail(sign, 'unit-form', 'In a unit a space or `·` multiplies, not `*`.', [
      replacement(sign, ' ', 'write a space'),
    ]);
  if (reader.isAt('/') && reader.previous.kind === 'number')
    reader.fail(sign, 'unit-form', 'A unit that only divides has 1 before its solidus.', [
      { title: `write \`1/${symbol.text}\``, edits: [insertion(sign.from, '1')] },
    ]);
}

/**
 * After a number in a formula: a unit without its square brackets. Symbols that are names here are not taken for units,
 * nor is anything in a loop, where every name is a signal.
 */
export function refuseUnitInFormula(reader: LineReader): void {
  if (reader.previous.kind !== 'number' || reader.scope.part === 'loop') return;
  const scan = scanUnit(reader.tokens, reader.position);
  if (!scan?.symbols.length || !scan.symbols.every((token) => isOnlyUnit(reader, token))) return;
  const number = reader.previous;
  const unit = { from: reader.peek()!.from, to: reader.tokens[scan.end - 1]!.to };
  const [shown, bracketed] = [reader.text(number), `[${reader.text(unit)}]`];
  reader.position = scan.end;
  reader.refuse(
    unit,
    'unit-in-formula',
    `In a formula a unit stands in square brackets after its number: \`${shown} ${bracketed}\`.`,
    [
      {
        title: `write \`${shown} ${bracketed}\``,
        edits: [insertion(unit.from, '['), insertion(unit.to, ']')],
      },
    ],
  );
}

function isOnlyUnit(reader: LineReader, token: Token): boolean {
  if (!reader.context.isUnit(token.text)) return false;
  if (token.kind === 'unit-sign') return true;
  const name = canonicalName(token.text);
  return !CONSTANT_MEANINGS.has(name) && !reader.namesMayBeUnknown && !reader.kindOf(name);
}

/** Whether a quantity slot ends at a token: at an operator, a comma, a keyword, a closing bracket, the line's end. */
function endsSlot(token: Token | undefined): boolean {
  if (!token || token.kind === 'keyword') return true;
  return token.kind === 'symbol' && SLOT_ENDS.has(token.text);
}

/** Reads a number that only a unit follows, in a slot that could hold a formula too; null if it is not one. */
export function readSlotQuantity(reader: LineReader): Quantity | null {
  const from = reader.place;
  const number = signedNumber(reader);
  if (!number) return null;
  const scan = scanUnit(reader.tokens, reader.position + number.length);
  if (!scan || !endsSlot(reader.tokens[scan.end])) return null;
  if (!scan.symbols.every((token) => reader.context.isUnit(token.text))) return null;
  reader.position += number.length;
  const unit = takeUnit(reader, scan);
  const quantity: Quantity = {
    kind: 'quantity',
    span: reader.spanFrom(from),
    text: number.text,
    ...unit,
  };
  refuseAmbiguousUnit(reader, quantity, scan.symbols);
  return quantity;
}

/** Where every unit symbol is a worksheet name too, `2 m` may be a quantity or a product. */
function refuseAmbiguousUnit(
  reader: LineReader,
  { span, unitSpan }: Quantity,
  symbols: readonly Token[],
): void {
  if (
    !symbols.length ||
    !symbols.every((token) => reader.context.kindOf(canonicalName(token.text)))
  )
    return;
  const quantity = reader.text(span);
  const names = [...new Set(symbols.map((token) => `\`${token.text}\``))].join(' and ');
  const bracketedUnit = `${reader.text({ from: span.from, to: unitSpan.from })}[${reader.text(unitSpan)}]`;
  reader.refuse(
    span,
    'ambiguous-unit',
    `\`${quantity}\` can be a quantity or a product, because ${names} ${symbols.length > 1 ? 'are' : 'is'} also given in this worksheet.`,
    [
      {
        title: `a quantity: \`${bracketedUnit}\``,
        edits: [insertion(unitSpan.from, '['), insertion(unitSpan.to, ']')],
      },
      bracketing(span, `a product: \`(${quantity})\``),
    ],
  );
}

/** Reads `[rad/s]` after a number, in a formula: a quantity that is one atom. */
export function readBracketedUnit(reader: LineReader, number: Token): Expression {
  const open = reader.take();
  const unit = readUnit(reader, 'A square bracket after a number needs a unit');
  if (!reader.accept(']')) reader.fail(open, 'unclosed-bracket', `This bracket is not closed.`);
  return { kind: 'quantity', span: reader.spanFrom(number.from), text: number.text, ...unit };
}

/**
 * The unit that a reader of `Td = 2 s` may have meant: a formula that is a number and unit symbols only. It gives the
 * text of the quantity, or null.
 */
export function quantityInFormula(
  reader: LineReader,
): { text: string; symbols: readonly Token[] } | null {
  const number = signedNumber(reader);
  if (!number) return null;
  const start = reader.position + number.length;
  const scan = scanUnit(reader.tokens, start);
  if (!scan || scan.end < reader.tokens.length || scan.symbols.length === 0) return null;
  if (!scan.symbols.every((token) => reader.context.isUnit(token.text))) return null;
  const text = reader.text({ from: reader.peek()!.from, to: reader.tokens.at(-1)!.to });
  return { text, symbols: scan.symbols };
}
