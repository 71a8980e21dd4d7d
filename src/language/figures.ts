import { coverSpans } from '../base/index.ts';
import type {
  DrawStatement,
  Expression,
  Name,
  RequireStatement,
  TabulateStatement,
} from './ast.ts';
import { readAssumedValue, readCondition, readFormula, readSlot } from './expressions.ts';
import { replacement } from './fixes.ts';
import { readName } from './name-reading.ts';
import type { LineReader } from './reader.ts';
import type { Token } from './tokens.ts';
import { nearestName } from './spelling.ts';

type Figure = DrawStatement['figure'];
type Study = TabulateStatement['for'][number];

/** The words after `draw`. */
export const FIGURES: readonly Figure[] = [
  'region',
  'response',
  'frequency',
  'nyquist',
  'roots',
  'spectrum',
  'diagram',
  'budget',
  'simulation',
];

function readList(
  reader: LineReader,
  readItem: (reader: LineReader) => Expression,
): readonly Expression[] {
  const items = [readItem(reader)];
  while (reader.accept(',')) items.push(readItem(reader));
  return items;
}

/** Reads what follows `require`. */
export function readRequirement(reader: LineReader): Pick<RequireStatement, 'condition' | 'band'> {
  const condition = readCondition(reader);
  const band = reader.accept('for') ? readBand(reader, 'f') : null;
  return { condition, band };
}

/** Reads `f from 5 Hz to 200 Hz`, after `for`. */
function readBand(
  reader: LineReader,
  example: string,
): { variable: Name; from: Expression; to: Expression } {
  const variable = readName(reader, `\`for\` needs a name, as in \`for ${example} from 1 to 2\``);
  reader.expect('from', `\`for ${variable.name || example}\``);
  const from = readSlot(reader);
  reader.expect('to', 'A range, `from 1 to 20`,');
  return { variable, from, to: readSlot(reader) };
}

/** What a figure's clauses give; each stands once. */
type Clauses = {
  -readonly [Key in 'where' | 'over' | 'from' | 'to' | 'for' | 'title']: DrawStatement[Key];
};

/** Reads what follows `draw`. */
export function readFigure(reader: LineReader): Omit<DrawStatement, 'kind' | 'span' | 'comment'> {
  const { figure, figureSpan } = readFigureName(reader);
  reader.expect('of', `\`draw ${figure}\``);
  const of = readList(reader, readFormula);
  const clauses: Clauses = { where: [], over: null, from: null, to: null, for: null, title: null };
  const seen = new Set<string>();
  while (!reader.isAtEnd) readClause(reader, clauses, seen);
  return { figure, figureSpan, of, ...clauses };
}

function readFigureName(reader: LineReader): { figure: Figure; figureSpan: Name['span'] } {
  const token = reader.peek();
  const figure = FIGURES.find((name) => name === token?.text);
  if (token && figure) {
    reader.take();
    return { figure, figureSpan: { from: token.from, to: token.to } };
  }
  const failure = token
    ? failFigure(reader, token)
    : reader.failUnexpected('`draw` needs a figure, such as `response`');
  return { figure: 'response', figureSpan: failure.span };
}

function failFigure(reader: LineReader, token: Token): Expression {
  const typed = token.text;
  const nearest = nearestName(typed, FIGURES);
  const list = `${FIGURES.slice(0, -1).join(', ')} and ${FIGURES.at(-1)}`;
  return reader.fail(
    token,
    'unknown-figure',
    `There is no figure \`${typed}\`; the figures are ${list}.`,
    nearest ? [replacement(token, nearest)] : [],
  );
}

function readClause(reader: LineReader, clauses: Clauses, seen: Set<string>): void {
  const token = reader.peek()!;
  const read = CLAUSES[token.text];
  if (token.kind !== 'keyword' || !read) {
    reader.failUnexpected(
      'The figure could end here, or go on with `where`, `over`, `from`, `for` or `titled`',
    );
    return;
  }
  if (seen.has(token.text))
    reader.fail(token, 'repeated-clause', `A figure has \`${token.text}\` only once.`);
  seen.add(token.text);
  reader.accept(token.text);
  read(reader, clauses);
}

const CLAUSES: Readonly<Record<string, (reader: LineReader, clauses: Clauses) => void>> = {
  where: (reader, clauses) => {
    clauses.where = readList(reader, readCondition);
  },
  over: (reader, clauses) => {
    clauses.over = readSlot(reader);
  },
  from: (reader, clauses) => {
    clauses.from = readSlot(reader);
    reader.expect('to', 'A range, `from 1 to 20`,');
    clauses.to = readSlot(reader);
  },
  for: (reader, clauses) => {
    const band = readBand(reader, 'Kp');
    Object.assign(clauses, { for: band.variable, from: band.from, to: band.to });
  },
  titled: (reader, clauses) => {
    const token = reader.peek();
    if (token?.kind === 'text') clauses.title = reader.take().text.slice(1, -1);
    else reader.failUnexpected('`titled` needs a text in quotes');
  },
};

/** Reads what follows `tabulate`. */
export function readTable(reader: LineReader): Pick<TabulateStatement, 'columns' | 'for'> {
  const columns = readList(reader, readFormula);
  const studies: Study[] = [];
  reader.expect('for', 'A table, `tabulate x for Kp is 8, 9`,');
  do studies.push(readStudy(reader));
  while (reader.accept('for'));
  return { columns, for: studies };
}

function readStudy(reader: LineReader): Study {
  const name = readName(reader, '`for` needs the name that is varied');
  if (reader.accept('is'))
    return { by: 'is', name, values: readList(reader, readAssumedValue), steps: null };
  if (reader.accept('='))
    return { by: '=', name, values: readList(reader, (inner) => readFormula(inner)), steps: null };
  reader.expect('from', 'A study, `for Kp is 8, 9` or `for Kp from 1 to 2, 12 steps`,');
  const from = readSlot(reader);
  reader.expect('to', 'A range, `from 1 to 20`,');
  const values = [from, readSlot(reader)];
  return { by: 'range', name, values, steps: reader.accept(',') ? readSteps(reader) : null };
}

function readSteps(reader: LineReader): string {
  const [number, word] = [reader.peek(), reader.peek(1)];
  const isWhole = number?.kind === 'number' && /^[1-9]\d{0,5}$/.test(number.text);
  if (!isWhole || word?.text !== 'steps') {
    reader.failUnexpected('A range of a table needs its number of steps, `12 steps`');
    return '1';
  }
  reader.position += 2;
  return reader.text(coverSpans(number, number));
}
