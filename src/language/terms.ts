import { coverSpans } from '../base/index.ts';
import type { Expression } from './ast.ts';
import { replacement } from './fixes.ts';
import { canonicalName } from './names.ts';
import type { LineReader } from './reader.ts';
import { solidusFixes, solidusMessage } from './solidus.ts';
import type { Token } from './tokens.ts';

/** A product and quotient that is being read: runs of juxtaposed factors, with the operators between them. */
export interface Chain {
  readonly runs: Expression[][];
  readonly operators: ('*' | '/')[];
}

/**
 * A number over a number at the start of a term, before a name, call or bracket, is a coefficient: `1/2 s`. Gives the
 * two numbers, or null.
 */
export function readCoefficient(reader: LineReader): Expression[] | null {
  const hasSign = reader.isAt('-');
  const at = hasSign ? 1 : 0;
  const [numerator, divisor, next] = [reader.peek(at), reader.peek(at + 2), reader.peek(at + 3)];
  if (numerator?.kind !== 'number' || !reader.isAt('/', at + 1) || divisor?.kind !== 'number')
    return null;
  const isFactor = next?.kind === 'name' ? canonicalName(next.text) !== 'pi' : next?.text === '(';
  if (!isFactor) return null;
  const sign = hasSign ? reader.take() : null;
  reader.position += 3;
  const over = numberOf(numerator);
  const signed: Expression = sign
    ? { kind: 'negation', span: coverSpans(sign, numerator), of: over }
    : over;
  return [signed, numberOf(divisor)];
}

/** The number literal that a token is. */
export function numberOf(token: Token): Expression {
  return { kind: 'number', span: { from: token.from, to: token.to }, text: token.text };
}

/** Whether a number was read last that is a factor by itself, not an exponent and not a divisor. */
export function isOwnNumber(reader: LineReader, factors: readonly Expression[]): boolean {
  const last = factors.at(-1);
  const number = last?.kind === 'negation' ? last.of : last;
  return number?.kind === 'number' && reader.tokens[reader.position - 2]?.text !== '/';
}

/** Whether a token starts a factor, so that it multiplies what stands before it. */
export function startsFactor(token: Token | undefined): boolean {
  if (!token) return false;
  if (token.kind === 'name' || token.kind === 'number') return true;
  return token.kind === 'symbol' && token.text === '(';
}

/** `12 000` is not read as 12 times 0. */
export function refuseNumberAfterNumber(reader: LineReader): void {
  const [before, next] = [reader.previous, reader.peek()!];
  if (before.kind !== 'number' || next.kind !== 'number') return;
  const span = { from: before.from, to: next.to };
  reader.fail(
    span,
    'split-number',
    `\`${reader.text(span)}\` is two numbers side by side: write one number without spaces, or \`*\` between them.`,
    [replacement(span, before.text + next.text), replacement(span, `${before.text}*${next.text}`)],
  );
}

/** ISO 80000-2 has no multiplication or division after a solidus without brackets. */
export function refuseUnclearSolidus(reader: LineReader, { runs, operators }: Chain): void {
  const at = operators.findIndex(
    (operator, k) => operator === '/' && (runs[k + 1]!.length > 1 || k + 1 < operators.length),
  );
  if (at < 0) return;
  const [run, numeratorEnd] = [runs[at + 1]!, runs[at]!.at(-1)!.span];
  const rest = run.length > 1 ? run : [...run, ...runs[at + 2]!];
  const readings = {
    numerator: coverSpans(runs[0]![0]!.span, numeratorEnd),
    divisor: run[0]!.span,
    rest: coverSpans(rest[0]!.span, rest.at(-1)!.span),
  };
  const span = coverSpans(readings.numerator, readings.rest);
  const { source } = reader;
  reader.refuse(span, 'solidus', solidusMessage(readings, source), solidusFixes(readings, source));
}

/** The product that a chain is; with a coefficient its second factor divides. */
export function productOf({ runs, operators }: Chain, hasCoefficient: boolean): Expression {
  const factors = runs.flat();
  if (factors.length === 1) return factors[0]!;
  const inverted = runs.flatMap((run, k) => run.map(() => k > 0 && operators[k - 1] === '/'));
  if (hasCoefficient) inverted[1] = true;
  const span = coverSpans(factors[0]!.span, factors.at(-1)!.span);
  return { kind: 'product', span, factors, inverted };
}
