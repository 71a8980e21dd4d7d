import { warningAt, type Problem, type Span } from '../base/index.ts';
import type { Expression, Sign, Statement } from './ast.ts';
import { readBounds, readNominal, readTolerance } from './assumptions.ts';
import { readFormula } from './expressions.ts';
import { readFigure, readRequirement, readTable } from './figures.ts';
import { replacement } from './fixes.ts';
import {
  expectLineEnd,
  refuseLeftover,
  readCaseBlock,
  readCaseHeader,
  readLoopBlock,
  readLoopHeader,
  readNames,
  readPointsBlock,
  readPointsHeader,
  readWholeFormula,
  type BlockReading,
} from './loop-statements.ts';
import { readName, readNewName } from './name-reading.ts';
import { canonicalName, CONSTANT_MEANINGS, isReserved } from './names.ts';
import { quantityInFormula, readQuantity, readUnit } from './quantities.ts';
import { LineReader, WORKSHEET_SCOPE } from './reader.ts';
import {
  argumentList,
  introductionsOf,
  listedNames,
  SIGNS,
  type StatementSource,
} from './statement-source.ts';
import type { NameContext } from './vocabulary.ts';

/** A statement as read, with what was wrong; every span is relative to the statement's first character. */
export interface ReadStatement {
  readonly node: Statement;
  readonly problems: readonly Problem[];
}

/** What all statements have: their span and their comment. */
interface Base {
  readonly span: Span;
  readonly comment: string | null;
}

type Readers = Readonly<
  Record<string, (reader: LineReader, base: Base, block: BlockReading) => Statement>
>;

/**
 * Reads one statement. A statement that cannot be read becomes a `broken` one with its problems; a block keeps the
 * lines that can be read.
 */
export function readStatement(source: StatementSource, context: NameContext): ReadStatement {
  const problems: Problem[] = [];
  const block: BlockReading = { source, context, problems };
  const head = source.lines[0]!;
  const last = source.lines.at(-1)!.tokens.at(-1)!;
  const base: Base = { span: { from: 0, to: last.to }, comment: head.comment };
  const reader = new LineReader(head.tokens, source.text, context, WORKSHEET_SCOPE, problems);
  const node = readByFirstWord(reader, base, block);
  if (reader.isSound || keepsItsBlock(node)) return frozen({ node, problems });
  const name = introductionsOf(source)[0]?.name ?? null;
  const meant = node.kind === 'broken' ? null : node.kind;
  return frozen({ node: { kind: 'broken', ...base, name, meant }, problems });
}

/** Freezes a value of plain objects and arrays, all the way down. */
function frozen<Value>(value: Value): Value {
  if (typeof value === 'object' && value !== null && !Object.isFrozen(value)) {
    Object.freeze(value);
    for (const part of Object.values(value)) frozen(part);
  }
  return value;
}

/** A block whose own line is broken still gives its name and its readable lines. */
function keepsItsBlock(node: Statement): boolean {
  return node.kind === 'loop' && node.name !== '';
}

function readByFirstWord(reader: LineReader, base: Base, block: BlockReading): Statement {
  const first = reader.peek()!;
  const isNamed = first.kind === 'keyword' && Object.hasOwn(STATEMENTS, first.text);
  const isDefinition = reader.isAt('=', 1) || (reader.isAt('is', 1) && first.kind === 'keyword');
  if (first.kind === 'keyword' && isDefinition) return failReserved(reader, base);
  const node = isNamed ? STATEMENTS[first.text]!(reader, base, block) : readUnnamed(reader, base);
  expectLineEnd(reader);
  return node;
}

function broken(base: Base): Statement {
  return { kind: 'broken', ...base, name: null, meant: null };
}

function failReserved(reader: LineReader, base: Base): Statement {
  const token = reader.peek()!;
  const what = CONSTANT_MEANINGS.get(canonicalName(token.text)) ?? 'a word of the language';
  reader.fail(token, 'reserved-name', `\`${token.text}\` is ${what}; choose another name.`);
  return broken(base);
}

/** Reads a statement that begins with no word of the language. */
function readUnnamed(reader: LineReader, base: Base): Statement {
  const first = reader.peek()!;
  if (first.kind === 'keyword') {
    reader.fail(first, 'unexpected', `A statement cannot start with \`${first.text}\`.`);
    return broken(base);
  }
  if (first.text === ')' || first.text === ']') {
    reader.fail(
      first,
      'unopened-bracket',
      `\`${first.text}\` closes no bracket of this statement: lines that continue a statement are indented deeper.`,
    );
    return broken(base);
  }
  const names = listedNames(reader.tokens);
  const verb = reader.tokens[2 * names.length - 1];
  const isIntroduction = verb?.kind === 'keyword' && ['is', 'are', 'has'].includes(verb.text);
  const isDefinition = first.kind === 'name' && reader.isAt('=', 1);
  const reserved =
    isIntroduction || isDefinition ? names.findIndex((token) => isReserved(token.text)) : -1;
  if (reserved >= 0) {
    reader.position = 2 * reserved;
    return failReserved(reader, base);
  }
  if (isIntroduction) return readIntroduction(reader, base);
  return isDefinition ? readDefinition(reader, base) : readFormulaStatement(reader, base);
}

function readDefinition(reader: LineReader, base: Base): Statement {
  const { name, span } = readName(reader, 'A definition needs a name');
  const equals = reader.take();
  warnOfUnit(reader, equals);
  const formula = readWholeFormula(reader);
  refuseSecondEquals(reader, formula);
  return { kind: 'definition', ...base, name, nameSpan: span, formula };
}

/** `x = a = b` is a slip, or two statements of which the second is indented; `x = (a = b)` is a condition. */
function refuseSecondEquals(reader: LineReader, formula: Expression): void {
  if (formula.kind !== 'relation' || !formula.operators.includes('=')) return;
  const isBracketed = formula.span.from < formula.sides[0]!.span.from;
  const second = reader.tokens.filter((token) => token.text === '=')[1];
  if (!isBracketed && second) refuseLeftover(reader, second);
}

/** `Td = 2 s` is twice the Laplace variable, which is hardly ever meant. */
function warnOfUnit(reader: LineReader, equals: Span): void {
  const quantity = quantityInFormula(reader);
  if (!quantity) return;
  const { text, symbols } = quantity;
  // Where any of the symbols is a name of the worksheet, a formula is meant: `2 C s`.
  const [stray] = symbols;
  if (!stray || symbols.some((token) => reader.kindOf(canonicalName(token.text)))) return;
  const given = `${reader.tokens[0]!.text} is ${text}`;
  const span = { from: reader.peek()!.from, to: reader.tokens.at(-1)!.to };
  const fixes = [replacement(equals, 'is', `write \`${given}\``)];
  const message = unitInFormulaMessage(text, stray.text, given);
  const isFormula = symbols.every((token) => CONSTANT_MEANINGS.has(token.text));
  if (isFormula) reader.problems.push(warningAt(span, 'unit-in-formula', message, fixes));
  else reader.fail(span, 'unit-in-formula', message, fixes);
}

function unitInFormulaMessage(text: string, unit: string, given: string): string {
  if (text === `${parseFloat(text)} s`) {
    const multiple = text === '2 s' ? 'twice' : `${parseFloat(text)} times`;
    return `\`${text}\` is ${multiple} the Laplace variable; for seconds write \`${given}\`.`;
  }
  if (!/\p{L}/u.test(unit))
    return `A formula takes no bare unit; for the quantity write \`${given}\`.`;
  return `In a formula \`${unit}\` is a name, not a unit; for the quantity write \`${given}\`.`;
}

function readFormulaStatement(reader: LineReader, base: Base): Statement {
  const list = argumentList(reader.tokens);
  const name = reader.peek()!.text;
  if (list)
    reader.fail(
      list,
      'definition-with-argument',
      `A definition has a name alone, without a bracket: write \`${name} = …\`.`,
      [replacement(list, '', `write \`${name} = …\``)],
    );
  return { kind: 'formula', ...base, formula: readWholeFormula(reader) };
}

/** Reads `J is 480 kg m^2`, `J, b are positive` and `q has unit N/m`. */
function readIntroduction(reader: LineReader, base: Base): Statement {
  const names = readNames(reader, 'A list of names goes on after `,`');
  const verb = reader.take();
  if (verb.text === 'has') return readHasUnit(reader, base, names);
  const sign = SIGNS.find((word) => word === reader.peek()?.text) as Sign | undefined;
  if (sign) {
    reader.take();
    return { kind: 'sign', ...base, names, sign };
  }
  const [{ name, span }, ...others] = names as [(typeof names)[number], ...typeof names];
  if (verb.text === 'are' || others.length > 0)
    reader.failUnexpected(
      `\`${verb.text}\` after a list needs \`positive\`, \`negative\`, \`nonnegative\` or \`real\``,
    );
  const value = readNominal(reader, verb, reader.text(span));
  const tolerance = readTolerance(reader);
  return { kind: 'assumption', ...base, name, nameSpan: span, value, tolerance };
}

function readHasUnit(
  reader: LineReader,
  base: Base,
  names: ReturnType<typeof readNames>,
): Statement {
  reader.expect('unit', '`has`');
  return { kind: 'has-unit', ...base, names, ...readUnit(reader, '`has unit` needs a unit') };
}

const STATEMENTS: Readers = {
  unit: (reader, base) => {
    reader.take();
    const token = reader.peek();
    const { span } = readNewName(reader, '`unit` needs a name');
    reader.expect('is', 'A unit, `unit count is 1.2 µrad`,');
    const value = readQuantity(reader, 'A unit');
    return { kind: 'unit', ...base, name: token?.text ?? '', nameSpan: span, value };
  },
  tune: (reader, base) => {
    reader.take();
    const { name, span } = readNewName(reader, '`tune` needs the name of a gain');
    reader.expect('from', 'A gain to be tuned, `tune Kp from 1 to 20`,');
    return { kind: 'tune', ...base, name, nameSpan: span, ...readBounds(reader) };
  },
  require: (reader, base) => {
    reader.take();
    return { kind: 'require', ...base, ...readRequirement(reader) };
  },
  draw: (reader, base) => {
    reader.take();
    return { kind: 'draw', ...base, ...readFigure(reader) };
  },
  explain: (reader, base) => {
    reader.take();
    return { kind: 'explain', ...base, formula: readFormula(reader) };
  },
  tabulate: (reader, base) => {
    reader.take();
    return { kind: 'tabulate', ...base, ...readTable(reader) };
  },
  not: (reader, base) => ({ kind: 'formula', ...base, formula: readFormula(reader) }),
  loop: (reader, base, block) => {
    const header = readLoopHeader(reader);
    expectLineEnd(reader);
    return { kind: 'loop', ...base, ...header, ...readLoopBlock(block, header) };
  },
  case: (reader, base, block) => {
    const header = readCaseHeader(reader);
    expectLineEnd(reader);
    return { kind: 'case', ...base, ...header, ...readCaseBlock(block) };
  },
  points: (reader, base, block) => {
    const header = readPointsHeader(reader);
    expectLineEnd(reader);
    return { kind: 'points', ...base, ...header, ...readPointsBlock(block, header.points.length) };
  },
};
