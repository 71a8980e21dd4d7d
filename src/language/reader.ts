import { errorAt, type Fix, type Problem, type Span } from '../base/index.ts';
import type { Expression } from './ast.ts';
import { isExplainedStray, strayProblem } from './strays.ts';
import type { Token } from './tokens.ts';
import type { NameContext, NameKind } from './vocabulary.ts';

/** Brackets, signs and exponents deeper than this are refused, so that no text exhausts the stack. */
const MAXIMUM_DEPTH = 120;

/** The part of a worksheet that a line belongs to, and the names that are signals there. */
export interface Scope {
  readonly part: 'worksheet' | 'loop' | 'case';
  readonly signals: ReadonlySet<string>;
}

export const WORKSHEET_SCOPE: Scope = { part: 'worksheet', signals: new Set() };

/**
 * A position in the tokens of one line, and the problems found on the way. After `fail` the reader is at the end, so
 * that everything above returns without further complaints; after `refuse` reading goes on, to find more.
 */
export class LineReader {
  position = 0;
  /** Whether what stands on the right of a relation is a quantity slot, as in `require` and `where`. */
  limitsAreSlots = false;
  /** Whether names that nothing introduces may stand here: the unknowns of `solve` and `match`. */
  namesMayBeUnknown = false;
  private depth = 0;
  private hasFailed = false;
  private hasErrors = false;

  constructor(
    readonly tokens: readonly Token[],
    readonly source: string,
    readonly context: NameContext,
    readonly scope: Scope,
    readonly problems: Problem[],
  ) {}

  /** Whether what was read can be used. */
  get isSound(): boolean {
    return !this.hasErrors;
  }

  get isAtEnd(): boolean {
    return this.position >= this.tokens.length;
  }

  peek(ahead = 0): Token | undefined {
    return this.tokens[this.position + ahead];
  }

  /** The token before the present one; the first token where there is none before. */
  get previous(): Token {
    return this.tokens[Math.max(0, Math.min(this.position, this.tokens.length) - 1)]!;
  }

  /** Where the next token starts; at the end, where the last one ends. */
  get place(): number {
    return this.peek()?.from ?? this.previous.to;
  }

  take(): Token {
    return this.tokens[this.position++]!;
  }

  /** Whether a sign or a keyword comes next. */
  isAt(text: string, ahead = 0): boolean {
    return isSignOrWord(this.peek(ahead), text);
  }

  accept(text: string): Token | null {
    return this.isAt(text) ? this.take() : null;
  }

  /** Takes a sign or keyword; fails, saying what is missing, if something else comes. */
  expect(text: string, purpose: string): Token | null {
    const token = this.accept(text);
    if (!token) this.failUnexpected(`${purpose} needs \`${text}\` here`);
    return token;
  }

  /** What a name is at this place: in the worksheet, or as a signal of the loop. */
  kindOf(name: string): NameKind | null {
    return this.context.kindOf(name) ?? (this.scope.signals.has(name) ? 'signal' : null);
  }

  text(span: Span): string {
    return this.source.slice(span.from, span.to);
  }

  /** The span from one place to the end of what was read. */
  spanFrom(from: number): Span {
    return { from, to: Math.max(from, this.previous.to) };
  }

  refuse(span: Span, code: string, message: string, fixes: readonly Fix[] = []): void {
    if (this.hasFailed) return;
    this.hasErrors = true;
    this.problems.push(errorAt(plain(span), code, message, fixes));
  }

  fail(span: Span, code: string, message: string, fixes: readonly Fix[] = []): Expression {
    this.refuse(span, code, message, fixes);
    this.hasFailed = true;
    this.position = this.tokens.length;
    return { kind: 'number', span: plain(span), text: '0' };
  }

  /** Fails at the next token, or at the end: `purpose` is a clause, "`+` needs a term after it". */
  failUnexpected(purpose: string): Expression {
    const token = this.peek();
    const last = this.previous;
    if (!token) return this.fail(last, 'incomplete', `${purpose}, but the line ends.`);
    if (isExplainedStray(token)) return this.failStray(token);
    return this.fail(token, 'unexpected', `${purpose}, not \`${token.text}\`.`);
  }

  private failStray(token: Token): Expression {
    const { code, message, fixes } = strayProblem(token);
    return this.fail(token, code, message, fixes);
  }

  /** Runs `read` one level deeper; fails where a formula is nested too deeply to be meant. */
  nested(read: () => Expression): Expression {
    if (this.depth >= MAXIMUM_DEPTH)
      return this.fail(
        this.peek() ?? this.previous,
        'too-deep',
        `This formula is nested more than ${MAXIMUM_DEPTH} levels deep; give its parts names of their own.`,
      );
    this.depth += 1;
    const expression = read();
    this.depth -= 1;
    return expression;
  }
}

/** A span alone: tokens are spans with more to them. */
function plain({ from, to }: Span): Span {
  return { from, to };
}

function isSignOrWord(token: Token | undefined, text: string): boolean {
  return (
    token !== undefined &&
    token.text === text &&
    (token.kind === 'symbol' || token.kind === 'keyword')
  );
}
