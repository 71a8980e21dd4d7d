import type { Span } from '../base/index.ts';
import { canonicalName } from './names.ts';
import type { Token, TokenLine } from './tokens.ts';
import type { NameKind } from './vocabulary.ts';

/** The words after `is` or `are` that make a sign assumption. */
export const SIGNS: readonly string[] = ['positive', 'negative', 'nonnegative', 'real'];

/** A statement before it is read: its tokens, line by line, and the text that their places refer to. */
export interface StatementSource {
  /** From its first character to the end of its last line, comments included. */
  readonly text: string;
  /** The statement's own line, then those of its block. */
  readonly lines: readonly TokenLine[];
}

/** What a statement introduces, seen from its first words alone, so that it holds for half-typed statements too. */
export interface Introduction {
  readonly name: string;
  readonly kind: NameKind | 'unit';
}

const NOTHING: readonly Introduction[] = [];

/** The names that a statement introduces. */
export function introductionsOf({ lines }: StatementSource): readonly Introduction[] {
  const { tokens } = lines[0]!;
  const [first, second, third] = tokens;
  if (!first || !second) return NOTHING;
  if (first.kind === 'name') return introducedByName(tokens);
  if (isWord(first, 'points'))
    return lines.slice(1).flatMap((line) => introducedByPoint(line.tokens));
  if (second.kind !== 'name') return NOTHING;
  if (isWord(first, 'unit'))
    return isWord(third, 'is') ? [{ name: second.text, kind: 'unit' }] : NOTHING;
  if (isWord(first, 'loop') || isWord(first, 'case'))
    return [{ name: canonicalName(second.text), kind: first.text === 'loop' ? 'loop' : 'case' }];
  return NOTHING;
}

function isWord(token: Token | undefined, word: string): boolean {
  return token?.kind === 'keyword' && token.text === word;
}

function introducedByPoint([name, is]: readonly Token[]): readonly Introduction[] {
  const isAssumption = name?.kind === 'name' && isWord(is, 'is');
  return isAssumption ? [{ name: canonicalName(name.text), kind: 'assumption' }] : NOTHING;
}

function introducedByName(tokens: readonly Token[]): readonly Introduction[] {
  const name = canonicalName(tokens[0]!.text);
  if (tokens[1]!.text === '=' || argumentList(tokens)) return [{ name, kind: 'definition' }];
  const names = listedNames(tokens);
  const verb = tokens[2 * names.length - 1];
  const isSign = SIGNS.includes(tokens[2 * names.length]?.text ?? '');
  if (isWord(verb, 'has') || ((isWord(verb, 'is') || isWord(verb, 'are')) && isSign))
    return names.map((token) => ({ name: canonicalName(token.text), kind: 'symbol' }));
  return isWord(verb, 'is') && names.length === 1 ? [{ name, kind: 'assumption' }] : NOTHING;
}

/** The names of a list `J, b, Kp` that the tokens begin with. */
export function listedNames(tokens: readonly Token[]): readonly Token[] {
  const names: Token[] = [];
  for (let k = 0; tokens[k]?.kind === 'name'; k += 2) {
    names.push(tokens[k]!);
    if (tokens[k + 1]?.text !== ',') break;
  }
  return names;
}

/** The bracket of `C(s) = …`, by which other notations define functions; null if the tokens do not begin so. */
export function argumentList(tokens: readonly Token[]): Span | null {
  const open = tokens[1];
  if (tokens[0]?.kind !== 'name' || open?.text !== '(' || open.spaced) return null;
  const close = tokens.findIndex((token) => token.text === ')');
  if (close < 0 || tokens[close + 1]?.text !== '=') return null;
  const isList = tokens
    .slice(2, close)
    .every((token) => token.kind === 'name' || token.text === ',');
  return isList ? { from: open.from, to: tokens[close]!.to } : null;
}
