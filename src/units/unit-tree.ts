import { refuse } from '../base/index.ts';
import type { Refusal } from '../base/index.ts';
import { isRefusal } from '../base/index.ts';
import { superscript } from './dimension-text.ts';

/** A unit expression as a tree; symbols are not looked up yet. */
export type UnitTree =
  | { readonly kind: 'one' }
  | { readonly kind: 'symbol'; readonly text: string }
  | { readonly kind: 'product'; readonly factors: readonly UnitTree[] }
  | { readonly kind: 'quotient'; readonly above: UnitTree; readonly below: UnitTree }
  | { readonly kind: 'power'; readonly base: UnitTree; readonly exponent: number }
  | { readonly kind: 'root'; readonly of: UnitTree };

/** A piece of a unit expression with its place in the text. */
interface Token {
  readonly kind: 'symbol' | 'one' | 'power' | 'open' | 'close' | 'over' | 'root' | 'times' | 'end';
  readonly text: string;
  readonly from: number;
}

const TOKEN =
  /\s*(?:(?<symbol>[\p{L}°%‰′″][\p{L}0-9_]*)|(?<power>\^\s*[+\-−]?\d+|\^\s*\(\s*[+\-−]?\d+\s*\)|[⁺⁻]?[⁰¹²³⁴⁵⁶⁷⁸⁹]+)|(?<one>1(?!\d))|(?<open>\()|(?<close>\))|(?<over>\/)|(?<root>√)|(?<times>[·⋅]))/uy;

const LARGEST_POWER = 24;

/**
 * Reads a unit expression: a space or `·` multiplies, `/` divides once, `^2` and `²` are powers, `√` is the root of
 * the symbol or bracket after it, 1 may be a numerator.
 *
 * Refuses what does not read so, and more than one factor after a solidus (ISO 80000-1, 7.2: the solidus is not
 * followed by a multiplication or division on the same line without parentheses), with the possible readings.
 */
export function readUnitTree(text: string): UnitTree | Refusal {
  const tokens = tokensOf(text);
  if (isRefusal(tokens)) return tokens;
  return new TreeReader(text, tokens).read();
}

function tokensOf(text: string): Token[] | Refusal {
  const tokens: Token[] = [];
  const end = text.trimEnd().length;
  TOKEN.lastIndex = 0;
  while (TOKEN.lastIndex < end) {
    const start = TOKEN.lastIndex;
    const match = TOKEN.exec(text);
    if (!match) return strayCharacter(text, text.slice(start).trimStart()[0]!);
    const [kind, piece] = Object.entries(match.groups!).find(([, found]) => found !== undefined)!;
    tokens.push({ kind: kind as Token['kind'], text: piece, from: TOKEN.lastIndex - piece.length });
  }
  return [...tokens, { kind: 'end', text: '', from: end }];
}

function strayCharacter(text: string, character: string): Refusal {
  const advice = character === '*' ? '; a space multiplies' : '';
  return refuse('unit-syntax', `'${character}' cannot stand in the unit '${text.trim()}'${advice}`);
}

/** Recursive descent over the tokens; a refusal travels up as it is. */
class TreeReader {
  private at = 0;

  constructor(
    private readonly text: string,
    private readonly tokens: readonly Token[],
  ) {}

  read(): UnitTree | Refusal {
    if (this.isAt('end')) return { kind: 'one' };
    const tree = this.quotient();
    if (isRefusal(tree) || this.isAt('end')) return tree;
    return this.syntax(`has a '${this.next.text}' too many`);
  }

  private get next(): Token {
    return this.tokens[this.at]!;
  }

  private isAt(...kinds: Token['kind'][]): boolean {
    return kinds.includes(this.next.kind);
  }

  private take(kind: Token['kind']): Token | null {
    return this.isAt(kind) ? this.tokens[this.at++]! : null;
  }

  private quotient(): UnitTree | Refusal {
    const from = this.next.from;
    const above: UnitTree | Refusal = this.take('one') ? { kind: 'one' } : this.product();
    if (isRefusal(above) || !this.take('over')) return above;
    const belowFrom = this.next.from;
    const below = this.factor();
    if (isRefusal(below)) return below;
    if (this.isAt('end', 'close')) return { kind: 'quotient', above, below };
    return this.refuseSolidus(from, belowFrom);
  }

  private product(): UnitTree | Refusal {
    const factors: UnitTree[] = [];
    do {
      const factor = this.factor();
      if (isRefusal(factor)) return factor;
      factors.push(factor);
    } while (this.take('times') || this.isAt('symbol', 'open', 'root'));
    return factors.length === 1 ? factors[0]! : { kind: 'product', factors };
  }

  private factor(): UnitTree | Refusal {
    const root = this.take('root');
    const base = this.atom();
    if (isRefusal(base)) return base;
    const power = this.take('power');
    if (root) {
      if (power)
        return this.syntax('has a power after a root; put what stands under √ in brackets');
      return { kind: 'root', of: base };
    }
    return power ? this.powerOf(base, power.text) : base;
  }

  private powerOf(base: UnitTree, text: string): UnitTree | Refusal {
    const exponent = exponentOf(text);
    if (Math.abs(exponent) > LARGEST_POWER) {
      return this.syntax(`has a power beyond ${LARGEST_POWER}`);
    }
    return { kind: 'power', base, exponent };
  }

  private atom(): UnitTree | Refusal {
    const symbol = this.take('symbol');
    if (symbol) return { kind: 'symbol', text: symbol.text };
    if (!this.take('open')) {
      const found = this.isAt('end') ? 'its end' : `'${this.next.text}'`;
      return this.syntax(`lacks a symbol before ${found}`);
    }
    const inner = this.quotient();
    if (isRefusal(inner)) return inner;
    return this.take('close') ? inner : this.syntax('has a bracket that is not closed');
  }

  private syntax(what: string): Refusal {
    return refuse('unit-syntax', `the unit '${this.text.trim()}' ${what}`);
  }

  /** `a/b c`: both readings, spelled out around the rest of the text. */
  private refuseSolidus(from: number, belowFrom: number): Refusal {
    const readings = solidusReadings(this.text, from, belowFrom, this.next.from, this.tailEnd());
    return refuse(
      'unit-solidus',
      `the unit '${this.text.trim()}' goes on after its solidus; write ${readings.join(' or ')}`,
    );
  }

  /** Where the run that goes on after a solidus ends: its closing bracket or the end of the text. */
  private tailEnd(): number {
    let depth = 0;
    for (const token of this.tokens.slice(this.at)) {
      if (token.kind === 'open') depth++;
      if (token.kind === 'end' || (token.kind === 'close' && depth-- === 0)) return token.from;
    }
    return this.text.length;
  }
}

/** `a/(b c)` and `(a/b) c`, in the text around them. */
function solidusReadings(
  text: string,
  from: number,
  belowFrom: number,
  tailFrom: number,
  tailEnd: number,
): string[] {
  const before = text.slice(0, from);
  const quotient = text.slice(from, tailFrom).trim();
  const above = text.slice(from, belowFrom).trim();
  const below = text.slice(belowFrom, tailFrom).trim();
  const tail = text.slice(tailFrom, tailEnd).trim();
  const after = text.slice(tailEnd);
  const chained = /^\/\s*/.exec(tail)?.[0];
  const inBrackets = chained ? `${below} ${tail.slice(chained.length)}` : `${below} ${tail}`;
  const readings = [`${above}(${inBrackets})`, `(${quotient})${chained ? '' : ' '}${tail}`];
  return readings.map((reading) => (before + reading + after).trim());
}

function exponentOf(text: string): number {
  const plain = [...text].map((c) => {
    const digit = '⁰¹²³⁴⁵⁶⁷⁸⁹'.indexOf(c);
    if (digit >= 0) return String(digit);
    return c === '⁻' || c === '−' ? '-' : c;
  });
  return Number(plain.join('').replace(/[^\d-]/g, ''));
}

/** The text of a unit tree, in the form that results use: `kN m²/(rad √Hz)`. */
export function unitTreeText(tree: UnitTree): string {
  switch (tree.kind) {
    case 'one':
      return '1';
    case 'symbol':
      return tree.text;
    case 'product':
      return tree.factors.map((factor) => bracketed(factor, ['quotient'])).join(' ');
    case 'quotient':
      return `${bracketed(tree.above, ['quotient'])}/${bracketed(tree.below, ['product', 'quotient'])}`;
    case 'power':
      return (
        bracketed(tree.base, ['product', 'quotient', 'power', 'root']) + superscript(tree.exponent)
      );
    case 'root':
      return `√${bracketed(tree.of, ['product', 'quotient', 'power', 'root'])}`;
  }
}

function bracketed(tree: UnitTree, kinds: readonly UnitTree['kind'][]): string {
  const text = unitTreeText(tree);
  return kinds.includes(tree.kind) ? `(${text})` : text;
}
