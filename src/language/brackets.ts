import { canonicalName, CONSTANT_MEANINGS } from './names.ts';
import type { LineReader } from './reader.ts';
import type { Token } from './tokens.ts';

/** What a name means that stands before a bracket. */
export type BracketUse = 'call' | 'evaluate' | 'multiply' | 'no-value';

const NOT_A_FUNCTION_NAME = /^[^\p{Ll}]/u;

/**
 * How the name and the bracket at the reader's place belong together, before the bracket is read: a function or loop is
 * called; a definition or signal directly before a bracket may be evaluated; an assumption may not.
 */
export function bracketUse(reader: LineReader, name: Token): BracketUse {
  const isSpaced = reader.peek()!.spaced;
  const canonical = canonicalName(name.text);
  const kind = reader.kindOf(canonical);
  if (kind === 'loop') return 'call';
  if (kind === null && isFunction(reader, name)) return 'call';
  if (kind === null && contentOf(reader).some((token) => token.text === '->')) return 'call';
  if (isSpaced || kind === 'case') return 'multiply';
  if (kind === 'definition' || kind === 'signal') return 'evaluate';
  if (kind !== null) return 'no-value';
  return CONSTANT_MEANINGS.has(canonical) || NOT_A_FUNCTION_NAME.test(name.text)
    ? 'multiply'
    : 'call';
}

/** Whether a name is a worksheet function, in the spelling typed or in the canonical one. */
export function isFunction(reader: LineReader, name: Token): boolean {
  return reader.context.vocabulary.functions.has(name.text);
}

/** What stands in a bracket directly after a name: a point to evaluate at, a factor, or what may be either. */
export type BracketContent = 'point' | 'factor' | 'unclear';

/**
 * What the bracket at the reader's place holds: `s` itself, a number, a quantity, or a term in `j` is a point; a sum with
 * a term in `j` looks like a point but would read as a factor; anything else is a factor.
 */
export function bracketContent(reader: LineReader): BracketContent {
  const tokens = contentOf(reader);
  const [first, ...others] = tokens;
  if (first && others.length === 0 && first.text === 's') return 'point';
  if (isNumber(tokens)) return 'point';
  if (!tokens.some((token) => token.kind === 'name' && token.text === 'j')) return 'factor';
  return tokens.some((token, k) => k > 0 && isAddition(token, tokens[k - 1]!))
    ? 'unclear'
    : 'point';
}

/** The tokens of the bracket at the reader's place; of brackets in it, only the brackets themselves. */
function contentOf(reader: LineReader): readonly Token[] {
  const content: Token[] = [];
  let depth = 1;
  for (let ahead = 1; depth > 0; ahead++) {
    const token = reader.peek(ahead);
    if (!token) break;
    const isClosing = token.text === ')' || token.text === ']';
    if (isClosing) depth -= 1;
    if (depth === 1) content.push(token);
    if (token.text === '(' || token.text === '[') depth += 1;
  }
  return content;
}

/** A number with its sign, a number over a number, or a quantity. */
function isNumber(tokens: readonly Token[]): boolean {
  const shape = tokens.map((token) => (token.kind === 'number' ? 'n' : token.text)).join('');
  return /^[+-]?n(\/n|\[\]?)?$/.test(shape);
}

/** Whether a `+` or `-` adds, rather than being the sign of a factor or an exponent. */
function isAddition(token: Token, before: Token): boolean {
  const isSign = token.kind === 'symbol' && (token.text === '+' || token.text === '-');
  return isSign && !'^*/·'.includes(before.text);
}
