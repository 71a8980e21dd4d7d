import { NodeProp, TreeFragment, type SyntaxNode, type Tree } from '@lezer/common';
import type { Problem, Span } from '../base/index.ts';
import type { PlacedStatement } from './ast.ts';
import { firstToken } from './first-token.ts';
import { offsetSpan } from './placing.ts';
import { worksheetParts, type Cell, type ProseBlock, type Reference } from './prose.ts';
import { introductionsOf, type Introduction, type StatementSource } from './statement-source.ts';
import { readStatement } from './statements.ts';
import { tokenLines } from './tokens.ts';
import { NameContext, type NameKind, type Vocabulary } from './vocabulary.ts';
import { worksheetParser } from './worksheet-parser.ts';

/** A worksheet as read: its cells, statements and prose, with their places in the text. */
export interface WorksheetDocument {
  readonly text: string;
  readonly cells: readonly Cell[];
  /** In the order of the text. */
  readonly statements: readonly PlacedStatement[];
  /** The blocks of prose between the cells. */
  readonly prose: readonly ProseBlock[];
  readonly references: readonly Reference[];
  /** Problems of the worksheet's form, such as a cell that is not closed; those of statements stay with them. */
  readonly problems: readonly Problem[];
  readonly tree: Tree;
}

/** A statement's place, and what distinguishes its text from that of others. */
interface StatementPlace extends Span {
  readonly node: SyntaxNode;
  readonly treeStart: number;
  readonly comment: Span | null;
  readonly key: string;
}

/** A statement that was read before, with the context that it was read in. */
interface Remembered {
  readonly source: StatementSource;
  readonly introductions: readonly Introduction[];
  readonly context: NameContext;
  readonly placed: PlacedStatement;
}

type Memory = ReadonlyMap<string, readonly Remembered[]>;

/** What each document remembers of its statements; it goes when the document goes. */
const memories = new WeakMap<WorksheetDocument, Memory>();

/**
 * Reads a worksheet. With the document of an earlier text, only what changed is read anew, and a statement whose text and
 * whose names' kinds are the same is the identical node.
 *
 * @param text the whole file
 * @param vocabulary unit symbols, functions and their quantity slots; the same object as for `previous`
 */
export function parseWorksheet(
  text: string,
  vocabulary: Vocabulary,
  previous?: WorksheetDocument,
): WorksheetDocument {
  // A byte order mark hides the sign of a heading or a fence from the reader of Markdown; a space does not.
  const marked = text.replace(/^\uFEFF/, ' ');
  const tree = worksheetParser.parse(marked, previous ? unchangedFragments(previous, text) : []);
  const { fences, ...parts } = worksheetParts(tree, text);
  const places = fences.flatMap((fence) => statementPlaces(fence, text));
  const memory = previous ? (memories.get(previous) ?? new Map()) : new Map();
  const read = readPlaces(places, text, vocabulary, memory);
  const document: WorksheetDocument = {
    text,
    ...parts,
    statements: read.map(({ placed }) => placed),
    tree,
  };
  memories.set(document, remember(places, read));
  return document;
}

/** The parts of the earlier tree outside of the one stretch of text that changed. */
function unchangedFragments(previous: WorksheetDocument, text: string): readonly TreeFragment[] {
  const old = previous.text;
  const fragments = TreeFragment.addTree(previous.tree);
  if (old === text) return fragments;
  const limit = Math.min(old.length, text.length);
  let start = 0;
  while (start < limit && old.charCodeAt(start) === text.charCodeAt(start)) start += 1;
  let end = 0;
  while (
    end < limit - start &&
    old.charCodeAt(old.length - 1 - end) === text.charCodeAt(text.length - 1 - end)
  )
    end += 1;
  const change = { fromA: start, toA: old.length - end, fromB: start, toB: text.length - end };
  return TreeFragment.applyChanges(fragments, [change]);
}

/** The cell's own tree, which hangs on its fence, and the stretches of text that it was made from. */
interface CellTree {
  readonly tree: Tree;
  readonly stretches: readonly Span[];
}

function cellTree(fence: SyntaxNode): CellTree | null {
  const mounted = fence.tree?.prop(NodeProp.mounted);
  if (!mounted?.overlay?.length) return null;
  const stretches = mounted.overlay.map((stretch) => offsetSpan(stretch, fence.from));
  return { tree: mounted.tree, stretches };
}

function statementPlaces(fence: SyntaxNode, text: string): readonly StatementPlace[] {
  const cell = cellTree(fence);
  if (!cell) return [];
  const places: StatementPlace[] = [];
  const top = cell.tree.topNode;
  for (let node = top.firstChild; node; node = node.nextSibling) {
    if (node.name !== 'Statement' && node.name !== 'BlockStatement') continue;
    places.push(statementPlace(node, cell, text));
  }
  return places;
}

function statementPlace(node: SyntaxNode, cell: CellTree, text: string): StatementPlace {
  const treeStart = cell.stretches[0]!.from;
  const from = firstToken(node).from + treeStart;
  const comment = trailingComment(node, treeStart, text);
  const to = comment?.to ?? node.to + treeStart;
  const key = text.slice(from, to) + gapsBetween(cell.stretches, from, to);
  return { node, treeStart, from, to, comment, key };
}

/** The marks of a quote or list that interrupt a statement's text: equal text reads equally only with equal gaps. */
function gapsBetween(stretches: readonly Span[], from: number, to: number): string {
  if (stretches.length === 1) return '';
  return stretches
    .filter((stretch) => stretch.from > from && stretch.from < to)
    .map((stretch) => `\0${stretch.from - from}`)
    .join('');
}

/** The comment that follows a statement on its last line. */
function trailingComment(node: SyntaxNode, treeStart: number, text: string): Span | null {
  const next = node.nextSibling;
  if (next?.name !== 'Comment') return null;
  const [from, to] = [next.from + treeStart, next.to + treeStart];
  return text.slice(node.to + treeStart, from).includes('\n') ? null : { from, to };
}

/** What has been seen of a place before its names are known. */
interface Seen {
  readonly place: StatementPlace;
  readonly source: StatementSource;
  readonly introductions: readonly Introduction[];
  readonly before: Remembered | null;
}

function readPlaces(
  places: readonly StatementPlace[],
  text: string,
  vocabulary: Vocabulary,
  memory: Memory,
): readonly Remembered[] {
  const taken = new Map<string, number>();
  const seen = places.map((place) => {
    const nth = taken.get(place.key) ?? 0;
    taken.set(place.key, nth + 1);
    return see(place, text, memory.get(place.key)?.[nth] ?? null);
  });
  const introductions = seen.flatMap((statement) => statement.introductions);
  const [kinds, ownUnits] = [kindsOf(introductions), ownUnitsOf(introductions)];
  return seen.map((statement) => read(statement, new NameContext(vocabulary, kinds, ownUnits)));
}

function see(place: StatementPlace, text: string, before: Remembered | null): Seen {
  if (before) return { place, source: before.source, introductions: before.introductions, before };
  const lines = tokenLines(place.node, place.comment, text, place.treeStart, place.from);
  const source = { text: text.slice(place.from, place.to), lines };
  return { place, source, introductions: introductionsOf(source), before: null };
}

function read({ place, source, introductions, before }: Seen, context: NameContext): Remembered {
  const { from, to } = place;
  if (before?.context.agreesWith(context)) {
    const { placed } = before;
    if (placed.from === from) return before;
    return { ...before, placed: Object.freeze({ ...placed, from, to }) };
  }
  const { node, problems } = readStatement(source, context);
  return { source, introductions, context, placed: Object.freeze({ node, from, to, problems }) };
}

/** What each name is; the first statement that gives it more than a sign or a unit decides. */
function kindsOf(introductions: readonly Introduction[]): ReadonlyMap<string, NameKind> {
  const kinds = new Map<string, NameKind>();
  for (const { name, kind } of introductions) {
    if (kind === 'unit') continue;
    const known = kinds.get(name);
    if (!known || (known === 'symbol' && kind !== 'symbol')) kinds.set(name, kind);
  }
  return kinds;
}

function ownUnitsOf(introductions: readonly Introduction[]): ReadonlySet<string> {
  return new Set(introductions.filter(({ kind }) => kind === 'unit').map(({ name }) => name));
}

function remember(places: readonly StatementPlace[], statements: readonly Remembered[]): Memory {
  const memory = new Map<string, Remembered[]>();
  for (const [k, place] of places.entries()) {
    const same = memory.get(place.key);
    if (same) same.push(statements[k]!);
    else memory.set(place.key, [statements[k]!]);
  }
  return memory;
}
