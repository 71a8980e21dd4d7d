import type { Span } from '../base/index.ts';
import type { Quantity, ToleranceClause } from './ast.ts';
import { replacement } from './fixes.ts';
import { canonicalName } from './names.ts';
import { readQuantity } from './quantities.ts';
import type { LineReader } from './reader.ts';

/** Reads the value after `is`; where a formula was written instead, the fix is to define the name. */
export function readNominal(reader: LineReader, is: Span, name: string): Quantity {
  const start = reader.position;
  if (startsFormula(reader)) refuseFormula(reader, is, name, start);
  const value = readQuantity(reader, `\`${name} is\``);
  if (goesOn(reader) || holdsWorksheetName(reader, start)) refuseFormula(reader, is, name, start);
  return value;
}

/** Whether a formula stands where a number with a unit should: it begins with a name or a bracket. */
function startsFormula(reader: LineReader): boolean {
  const sign = reader.isAt('-') || reader.isAt('+') ? 1 : 0;
  const token = reader.peek(sign);
  return token?.kind === 'name' || reader.isAt('(', sign);
}

/** Whether an operator follows the quantity, so that it is part of a formula. */
function goesOn(reader: LineReader): boolean {
  return ['+', '-', '*', '/', '^', '(', '['].some((sign) => reader.isAt(sign));
}

/** Whether what was read as a unit has a symbol that is no unit but a name of the worksheet. */
function holdsWorksheetName(reader: LineReader, start: number): boolean {
  return reader.tokens
    .slice(start, reader.position)
    .some(
      (token) =>
        token.kind === 'name' &&
        !reader.context.isUnit(token.text) &&
        reader.context.kindOf(canonicalName(token.text)) !== null,
    );
}

function refuseFormula(reader: LineReader, is: Span, name: string, start: number): void {
  const from = reader.tokens[start]!.from;
  const span = { from, to: reader.tokens.at(-1)!.to };
  reader.fail(
    span,
    'formula-after-is',
    `\`is\` gives \`${name}\` a number with a unit; for a formula write \`${name} = ${reader.text(span)}\`.`,
    [replacement(is, '=', `define it: \`${name} = ${reader.text(span)}\``)],
  );
}

/** Reads the tolerance that may follow a nominal value: `± 8 %`, `± 8 % at 3 sigma`, `from 0 to 400 N m`. */
export function readTolerance(reader: LineReader): ToleranceClause | null {
  const from = reader.place;
  if (reader.accept('±')) return readHalfWidth(reader, from);
  return reader.accept('from') ? readRange(reader, from) : null;
}

function readHalfWidth(reader: LineReader, from: number): ToleranceClause {
  const half = readQuantity(reader, '`±`');
  const sigmas = reader.accept('at') ? readSigmas(reader) : null;
  return { kind: 'half-width', span: reader.spanFrom(from), half, sigmas };
}

function readSigmas(reader: LineReader): string {
  const number = reader.peek();
  const word = reader.peek(1);
  const isComplete = number?.kind === 'number' && word && canonicalName(word.text) === 'σ';
  if (isComplete) reader.position += 2;
  else reader.failUnexpected('`at` needs the number of standard deviations, `at 3 sigma`');
  return isComplete ? number.text : '0';
}

function readRange(reader: LineReader, from: number): ToleranceClause {
  const bounds = readBounds(reader);
  return { kind: 'range', span: reader.spanFrom(from), ...bounds };
}

/** Reads `1 to 20 kN m/rad`, after `from`. */
export function readBounds(reader: LineReader): { from: Quantity; to: Quantity } {
  const from = readQuantity(reader, '`from`');
  reader.expect('to', 'A range, `from 1 to 20`,');
  const to = readQuantity(reader, '`to`');
  return { from, to };
}
