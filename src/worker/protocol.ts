import type { Placed, Report, VocabularyWord } from '../engine/index.ts';

/** Asks for the report of a text. `fresh` forgets the session before it: another worksheet was opened. */
export interface UpdateMessage {
  readonly kind: 'update';
  readonly revision: number;
  readonly text: string;
  readonly fresh: boolean;
}

/** What the evaluator knows by name, sent once when it starts. */
export interface VocabularyMessage {
  readonly kind: 'vocabulary';
  readonly words: readonly VocabularyWord[];
}

/** The report of a revision; rows whose content is that of the report before are sent as their index there. */
export interface ReportMessage {
  readonly kind: 'report';
  readonly revision: number;
  readonly report: SentReport;
}

/** The evaluator failed on a revision: our fault, said as such. */
export interface FailureMessage {
  readonly kind: 'failure';
  readonly revision: number;
  readonly message: string;
}

export type WorkerMessage = VocabularyMessage | ReportMessage | FailureMessage;

/** A row at its place whose content is sent whole, or is the `same` as that of a row of the report before. */
export type SentRow<Content> = Omit<Placed<Content>, 'content'> &
  ({ readonly content: Content } | { readonly same: number });

type RowLists = 'results' | 'requirements' | 'assumptions' | 'loops';

export type SentReport = Omit<Report, RowLists> & {
  readonly [List in RowLists]: readonly SentRow<Report[List][number]['content']>[];
};

/**
 * Packs a report for sending: a content object that the report before holds too is replaced by its index there.
 * `previous` is the report that the other side decoded last, or null.
 */
export function packReport(previous: Report | null, report: Report): SentReport {
  return {
    ...report,
    results: packRows(previous?.results, report.results),
    requirements: packRows(previous?.requirements, report.requirements),
    assumptions: packRows(previous?.assumptions, report.assumptions),
    loops: packRows(previous?.loops, report.loops),
  };
}

/** Restores a packed report; contents that did not change are the same objects as in `previous`. */
export function unpackReport(previous: Report | null, sent: SentReport): Report {
  return {
    ...sent,
    results: unpackRows(previous?.results, sent.results),
    requirements: unpackRows(previous?.requirements, sent.requirements),
    assumptions: unpackRows(previous?.assumptions, sent.assumptions),
    loops: unpackRows(previous?.loops, sent.loops),
  };
}

function packRows<Content>(
  previous: readonly Placed<Content>[] | undefined,
  rows: readonly Placed<Content>[],
): SentRow<Content>[] {
  const known = new Map((previous ?? []).map((row, index) => [row.content, index]));
  return rows.map((row) => {
    const same = known.get(row.content);
    const { from, to, line } = row;
    return same === undefined ? row : { from, to, line, same };
  });
}

function unpackRows<Content>(
  previous: readonly Placed<Content>[] | undefined,
  rows: readonly SentRow<Content>[],
): Placed<Content>[] {
  return rows.map((row) => {
    if ('content' in row) return row;
    const known = previous?.[row.same];
    if (!known) throw new RangeError(`row ${row.same} of the report before is not there`);
    return { from: row.from, to: row.to, line: row.line, content: known.content };
  });
}
