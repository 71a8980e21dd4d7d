import type { Problem, Span } from '../base/index.ts';
import type {
  CaseStatement,
  Expression,
  LoopStatement,
  Name,
  PointsStatement,
  SourceTerm,
} from './ast.ts';
import { readTolerance } from './assumptions.ts';
import { readFormula, readSlot, readSum, readTerm } from './expressions.ts';
import { replacement } from './fixes.ts';
import { readName, readNewName } from './name-reading.ts';
import { canonicalName, CONSTANT_NAMES } from './names.ts';
import { readQuantity } from './quantities.ts';
import { LineReader, type Scope } from './reader.ts';
import type { StatementSource } from './statement-source.ts';
import { isExplainedStray } from './strays.ts';
import type { Token, TokenLine } from './tokens.ts';
import type { NameContext } from './vocabulary.ts';

type Equation = LoopStatement['equations'][number];
type Use = LoopStatement['uses'][number];
type CaseInput = CaseStatement['inputs'][number];
type Start = CaseStatement['starts'][number];
type PointAssumption = PointsStatement['assumptions'][number];

/** A block statement that is being read: one reader a line, all writing to one list of problems. */
export interface BlockReading {
  readonly source: StatementSource;
  readonly context: NameContext;
  readonly problems: Problem[];
}

/** Reads the lines of a block; a line that cannot be read is left out, and its problem is kept. */
function readLines<Item>(
  block: BlockReading,
  scope: Scope,
  readLine: (reader: LineReader, line: TokenLine) => Item | null,
): readonly Item[] {
  const items: Item[] = [];
  for (const line of block.source.lines.slice(1)) {
    const reader = new LineReader(
      line.tokens,
      block.source.text,
      block.context,
      scope,
      block.problems,
    );
    const item = readLine(reader, line);
    expectLineEnd(reader);
    if (item && reader.isSound) items.push(item);
  }
  return items;
}

/** Complains about what is left of a line after it has been read. */
export function expectLineEnd(reader: LineReader): void {
  const token = reader.peek();
  if (!token) return;
  if (isExplainedStray(token)) reader.failUnexpected('The line ends here');
  else if (token.text === ')' || token.text === ']')
    reader.fail(
      token,
      'unopened-bracket',
      `\`${token.text}\` closes a bracket that was not opened.`,
      [replacement(token, '', `remove \`${token.text}\``)],
    );
  else refuseLeftover(reader, token);
}

/** Says why a line does not go on with a token, and that an indented line continues the one above. */
export function refuseLeftover(reader: LineReader, token: Token): void {
  refuseDecimalComma(reader, token);
  reader.fail(token, 'unexpected', `${leftoverReason(token)}${continuationHint(reader, token)}.`);
}

/** `x = 1,5`: a number with a decimal comma. */
function refuseDecimalComma(reader: LineReader, token: Token): void {
  const at = reader.tokens.indexOf(token);
  const [before, after] = [reader.tokens[at - 1], reader.tokens[at + 1]];
  const isNumber = before?.kind === 'number' && after?.kind === 'number';
  if (token.text !== ',' || !isNumber || token.spaced || after.spaced) return;
  const span = { from: before.from, to: after.to };
  const point = `${before.text}.${after.text}`;
  const message = `\`${reader.text(span)}\` is not one number: the decimal sign is a point.`;
  reader.fail(span, 'split-number', message, [replacement(span, point)]);
}

function leftoverReason({ text, kind }: Token): string {
  if (text === ',') return 'A comma stands only between arguments or in a list';
  if (text === '->')
    return '`->` stands only in the bracket after the name of a loop, as in `az(w -> e)`';
  if (text === '=') return 'An equation or definition has one `=`; a condition goes in brackets';
  if (kind === 'keyword') return `The word \`${text}\` is not expected here`;
  return `\`${text}\` is not expected here`;
}

/** A line that was meant as a statement, but is indented, is read on with the line above. */
function continuationHint(reader: LineReader, token: Token): string {
  const first = reader.tokens[0]!;
  const isBelow = reader.text({ from: first.from, to: token.from }).includes('\n');
  return isBelow ? ' (a line that is indented deeper continues the line above it)' : '';
}

function lineSpan(line: TokenLine): Span {
  return { from: line.tokens[0]!.from, to: line.tokens.at(-1)!.to };
}

/** Reads names separated by commas. */
export function readNames(
  reader: LineReader,
  purpose: string,
  readOne: typeof readName = readName,
): readonly Name[] {
  const names = [readOne(reader, purpose)];
  while (reader.accept(',')) names.push(readOne(reader, purpose));
  return names;
}

/** The part of a loop statement that its own line gives. */
export type LoopHeader = Pick<LoopStatement, 'name' | 'nameSpan' | 'inputs'>;

/** Reads `loop az driven by r, w`. */
export function readLoopHeader(reader: LineReader): LoopHeader {
  reader.take();
  const { name, span } = readNewName(reader, '`loop` needs a name');
  const inputs = reader.accept('driven') ? readInputs(reader) : [];
  return { name, nameSpan: span, inputs: inputs.filter((input) => input.name !== '') };
}

function readInputs(reader: LineReader): readonly Name[] {
  reader.expect('by', '`driven`');
  return readNames(reader, '`driven by` needs the names of the inputs', readNewName);
}

/** Reads the equations and `uses` lines of a loop. */
export function readLoopBlock(
  block: BlockReading,
  header: LoopHeader,
): Pick<LoopStatement, 'uses' | 'equations'> {
  const scope: Scope = { part: 'loop', signals: signalsOf(block, header) };
  const uses: Use[] = [];
  const equations = readLines(block, scope, (reader, line) => {
    if (!reader.isAt('uses')) return readEquation(reader, line);
    const use = readUse(reader, line);
    if (reader.isSound) uses.push(use);
    return null;
  });
  return { uses, equations };
}

/** Inputs, and the names that stand in an equation otherwise than directly before a bracket or about a `.`. */
function signalsOf(block: BlockReading, header: LoopHeader): ReadonlySet<string> {
  const signals = new Set(header.inputs.map((input) => input.name));
  for (const { tokens } of block.source.lines.slice(1)) {
    if (tokens[0]!.text === 'uses') continue;
    for (const [k, token] of tokens.entries())
      if (isSignalMention(block, token, tokens[k - 1], tokens[k + 1]))
        signals.add(canonicalName(token.text));
  }
  for (const constant of CONSTANT_NAMES) signals.delete(constant);
  return signals;
}

function isSignalMention(
  { context }: BlockReading,
  token: Token,
  before: Token | undefined,
  next: Token | undefined,
): boolean {
  if (token.kind !== 'name' || before?.text === '.' || next?.text === '.') return false;
  if (next?.text !== '(') return true;
  return next.spaced && !context.vocabulary.functions.has(token.text);
}

function readUse(reader: LineReader, line: TokenLine): Use {
  reader.take();
  const loop = readName(reader, '`uses` needs the name of a loop');
  const prefix = reader.accept('as')
    ? readNewName(reader, '`as` needs a name for its signals')
    : null;
  return { span: lineSpan(line), loop, prefix };
}

function readEquation(reader: LineReader, line: TokenLine): Equation {
  const left = readSum(reader, false);
  if (reader.isAt('is') || reader.isAt('starts')) failMisplaced(reader);
  reader.expect('=', 'An equation of a loop, `left = right`,');
  const right = readSum(reader, false);
  return { span: lineSpan(line), left, right };
}

function failMisplaced(reader: LineReader): void {
  const token = reader.peek()!;
  const home =
    token.text === 'is'
      ? 'an assumption stands at the margin of the cell'
      : 'an initial condition stands in a case';
  reader.fail(token, 'misplaced-line', `A loop holds equations, \`left = right\`; ${home}.`);
}

/** The part of a case statement that its own line gives. */
export type CaseHeader = Pick<CaseStatement, 'name' | 'nameSpan' | 'loop'>;

/** Reads `case storm of az`. */
export function readCaseHeader(reader: LineReader): CaseHeader {
  reader.take();
  const { name, span } = readNewName(reader, '`case` needs a name');
  reader.expect('of', 'A case, `case storm of az`,');
  const loop = readName(reader, '`of` needs the name of a loop');
  return { name, nameSpan: span, loop };
}

/** Reads the inputs and initial conditions of a case. */
export function readCaseBlock(block: BlockReading): Pick<CaseStatement, 'inputs' | 'starts'> {
  const starts: Start[] = [];
  const scope: Scope = { part: 'case', signals: new Set() };
  const inputs = readLines(block, scope, (reader, line) => {
    const signal = readSignal(reader);
    if (!reader.accept('starts')) return readCaseInput(reader, line, signal);
    const start = readStart(reader, line, signal);
    if (reader.isSound) starts.push(start);
    return null;
  });
  return { inputs, starts };
}

interface SignalOfCase {
  readonly signal: Expression;
  readonly order: number;
}

/** Reads `xb''` or `stage.theta'` on the left of a case's line. */
function readSignal(reader: LineReader): SignalOfCase {
  let signal: Expression = readName(
    reader,
    'A line of a case, `w = step(Tw)` or `x starts at 1`, needs a signal',
  );
  if (reader.accept('.')) {
    const { name, span: nameSpan } = readName(reader, '`.` needs the name of a signal');
    signal = {
      kind: 'member',
      span: reader.spanFrom(signal.span.from),
      of: signal,
      name,
      nameSpan,
    };
  }
  let order = 0;
  while (reader.accept("'")) order += 1;
  return { signal, order };
}

function readCaseInput(
  reader: LineReader,
  line: TokenLine,
  { signal, order }: SignalOfCase,
): CaseInput | null {
  reader.expect('=', 'A line of a case, `w = step(Tw)` or `x starts at 1`,');
  const sources = readSources(reader);
  if (signal.kind === 'name') return { span: lineSpan(line), input: signal, order, sources };
  reader.fail(
    signal.span,
    'not-an-input',
    `\`${reader.text(signal.span)}\` is not an input: a case drives the inputs that its loop names after \`driven by\`.`,
  );
  return null;
}

function readSources(reader: LineReader): readonly SourceTerm[] {
  const sources = [readSource(reader)];
  while (reader.isAt('+') || reader.isAt('-')) sources.push(readSource(reader));
  return sources;
}

/** Reads `- step(Tw) after 5 s`. */
function readSource(reader: LineReader): SourceTerm {
  const from = reader.place;
  const sign = reader.accept('-') ? -1 : 1;
  if (sign === 1) reader.accept('+');
  const source = readTerm(reader, false);
  const after = reader.accept('after') ? reader.nested(() => readTerm(reader, true)) : null;
  return { span: reader.spanFrom(from), sign, source, after };
}

function readStart(reader: LineReader, line: TokenLine, { signal, order }: SignalOfCase): Start {
  reader.expect('at', '`starts`');
  const value = readSlot(reader);
  return { span: lineSpan(line), signal, order, value };
}

/** Reads `points empty, half, full`. */
export function readPointsHeader(reader: LineReader): Pick<PointsStatement, 'points'> {
  reader.take();
  return {
    points: readNames(reader, '`points` needs the names of the operating points', readNewName),
  };
}

/** Reads the assumptions of operating points, which have one value for each. */
export function readPointsBlock(
  block: BlockReading,
  points: number,
): Pick<PointsStatement, 'assumptions'> {
  const scope: Scope = { part: 'worksheet', signals: new Set() };
  return {
    assumptions: readLines(block, scope, (reader, line) => readPoint(reader, line, points)),
  };
}

function readPoint(reader: LineReader, line: TokenLine, points: number): PointAssumption {
  const { name, span } = readNewName(
    reader,
    'A line of `points`, `m is 12, 30, 48 kg`, needs a name',
  );
  reader.expect('is', 'A line of `points`, `m is 12, 30, 48 kg`,');
  const values = [readQuantity(reader, `\`${name} is\``)];
  while (reader.accept(',')) values.push(readQuantity(reader, 'A value after `,`'));
  const tolerance = readTolerance(reader);
  if (values.length !== points)
    reader.refuse(
      lineSpan(line),
      'points-mismatch',
      `\`${name}\` has ${values.length} ${values.length === 1 ? 'value' : 'values'} for ${points} operating points.`,
    );
  return { span: lineSpan(line), name, nameSpan: span, values, tolerance, comment: line.comment };
}

/** Reads a formula that fills the rest of the line. */
export function readWholeFormula(reader: LineReader): Expression {
  const formula = readFormula(reader);
  expectLineEnd(reader);
  return formula;
}
