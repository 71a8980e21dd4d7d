import { coverSpans, type Span } from '../base/index.ts';
import type { Expression, Name } from './ast.ts';
import type { BracketUse } from './brackets.ts';
import { insertion, replacement } from './fixes.ts';
import { CONSTANT_MEANINGS } from './names.ts';
import type { LineReader } from './reader.ts';
import type { Token } from './tokens.ts';

/** Chains of `.`, `with` or `in` longer than this are refused, since each link nests the one before. */
const LONGEST_CHAIN = 20;

/** Whether a chain may go on; it fails where the chain has become too long. */
export function isShortChain(reader: LineReader, length: number): boolean {
  if (length < LONGEST_CHAIN) return true;
  const what = `This chain has more than ${LONGEST_CHAIN} links`;
  reader.fail(reader.previous, 'too-deep', `${what}; give its parts names of their own.`);
  return false;
}

/** Takes the bracket that closes another one; fails where there is none. */
export function closeBracket(reader: LineReader, open: Token): void {
  if (reader.accept(')')) return;
  if (!reader.isAtEnd) {
    reader.failUnexpected('This bracket needs `)` here');
    return;
  }
  const end = reader.previous.to;
  reader.fail(open, 'unclosed-bracket', 'This bracket is not closed.', [
    { title: 'close the bracket', edits: [insertion(end, ')')] },
  ]);
}

/** Fails at a `±` in a formula. */
export function refusePlusMinus(reader: LineReader): void {
  const token = reader.peek();
  if (token?.kind !== 'symbol' || token.text !== '±') return;
  reader.fail(
    token,
    'unexpected',
    'A tolerance, `±`, belongs to an assumption, as in `J is 480 kg m^2 ± 8 %`.',
  );
}

/** Fails at a square bracket that follows no number. */
export function refuseLooseBracket(reader: LineReader): void {
  const open = reader.peek();
  if (!open || !reader.isAt('[')) return;
  reader.fail(
    open,
    'loose-unit',
    'Square brackets hold the unit of the number before them, as in `3 [rad/s]`.',
  );
}

/** Fails at `.5`. */
export function failBareFraction(reader: LineReader): Expression {
  const [dot, number] = [reader.peek()!, reader.peek(1)!];
  const span = coverSpans(dot, number);
  const whole = `0.${number.text}`;
  return reader.fail(span, 'bare-fraction', `A number starts with a digit: write \`${whole}\`.`, [
    replacement(span, whole),
  ]);
}

/** A signal is not called: `storm.e(0)` could be meant as a product or as a value. */
export function refuseBracketAfter(reader: LineReader, member: Expression): void {
  const bracket = reader.peek();
  if (bracket && reader.isAt('(') && !bracket.spaced)
    reader.refuse(
      coverSpans(member.span, bracket),
      'member-before-bracket',
      `\`${reader.text(member.span)}\` is not a function: to multiply write a space before the bracket, to evaluate write \`with s = …\` or \`with t = …\`.`,
      [{ title: 'multiply', edits: [insertion(bracket.from, ' ')] }],
    );
}

/** `az(w -> e)(0)` could be meant as a product or as a value at a point. */
export function refuseBracketAfterCall(reader: LineReader, call: Expression): void {
  const bracket = reader.peek();
  if (!bracket || !reader.isAt('(') || bracket.spaced) return;
  const shown = reader.text(call.span);
  reader.refuse(
    coverSpans(call.span, bracket),
    'call-before-bracket',
    `\`${shown}(…)\` can be a product or a value at a point: to multiply write a space before the bracket, to evaluate write \`${shown} with s = …\`.`,
    [{ title: 'multiply', edits: [insertion(bracket.from, ' ')] }],
  );
}

/**
 * Why a formula has no derivative written with `'`, or null. What a definition stands for, and what takes the name of a
 * signal in a loop, the engine knows.
 */
export function whyNoDerivative(
  reader: LineReader,
  of: Expression,
  isBracket: boolean,
): string | null {
  const shown = reader.text(of.span);
  if (isBracket)
    return reader.scope.part === 'worksheet'
      ? `A bracket has a derivative only in the equations of a loop; write \`'\` after the signal itself.`
      : null;
  if (of.kind === 'member' || of.kind === 'evaluation') return null;
  if (of.kind !== 'name')
    return `\`'\` is the time derivative of a signal, and \`${shown}\` is not one.`;
  const kind = reader.kindOf(of.name);
  const isConstant = CONSTANT_MEANINGS.has(of.name);
  const mayBeSignal =
    reader.scope.part === 'loop' || kind === null || kind === 'signal' || kind === 'definition';
  if (!isConstant && mayBeSignal) return null;
  const what = isConstant
    ? 'a constant of the language'
    : kind === 'assumption'
      ? 'an assumption'
      : `a ${kind}`;
  return `\`'\` is the time derivative of a signal, and \`${shown}\` is ${what}.`;
}

/** Refuses `Kp(1)`, and `L(1 + j w)`, which could be meant in two ways. */
export function refuseEvaluation(
  reader: LineReader,
  name: Name,
  bracket: { span: Span; open: Token; at: Expression },
  use: BracketUse,
): void {
  const [shown, point] = [reader.text(name.span), reader.text(bracket.at.span)];
  const multiply = {
    title: `multiply: \`${shown} (${point})\``,
    edits: [insertion(bracket.open.from, ' ')],
  };
  const other =
    use === 'no-value'
      ? replacement(bracket.span, shown, `the assumption itself: \`${shown}\``)
      : replacement(
          bracket.span,
          `(${shown} with s = ${point})`,
          `evaluate: \`${shown} with s = ${point}\``,
        );
  const message =
    use === 'no-value'
      ? `\`${shown}\` is ${reader.kindOf(name.name) === 'assumption' ? 'an assumption' : 'a symbol'}, not a function of anything, so \`${reader.text(bracket.span)}\` has no meaning.`
      : `\`${reader.text(bracket.span)}\` can be a product or the value of \`${shown}\` at a point.`;
  reader.refuse(bracket.span, 'name-before-bracket', message, [multiply, other]);
}
