import type { Fix, Problem } from '../base/index.ts';
import type { Report, RequirementContent, ResultContent } from '../engine/index.ts';
import { lineMap, type LineMap } from './line-map.ts';

/** A problem as `check` prints it: 1-based line and columns, `endColumn` just after the last character. */
export interface ProblemRecord {
  readonly line: number;
  readonly column: number;
  readonly endColumn: number;
  readonly severity: 'error' | 'warning';
  readonly message: string;
  readonly fixes: readonly FixRecord[];
}

/** A way out, as replacements of the text between two places by `insert`. */
export interface FixRecord {
  readonly title: string;
  readonly edits: readonly {
    readonly line: number;
    readonly column: number;
    readonly endLine: number;
    readonly endColumn: number;
    readonly insert: string;
  }[];
}

/** What `check` says of one file: section 9 of the language contract. */
export interface CheckRecord {
  readonly file: string;
  readonly results: readonly ReturnType<typeof resultRecord>[];
  readonly requirements: readonly ReturnType<typeof requirementRecord>[];
  readonly problems: readonly ProblemRecord[];
}

/**
 * Arranges the report on a text for `check`.
 *
 * @param file the file's name as it was given
 * @param text the text that the report's offsets refer to
 */
export function checkRecord(file: string, text: string, report: Report): CheckRecord {
  const lines = lineMap(text);
  return {
    file,
    results: report.results.map(({ line, content }) => resultRecord(line, content)),
    requirements: report.requirements.map(({ line, content }) => requirementRecord(line, content)),
    problems: report.problems.map((problem) => problemRecord(problem, lines)),
  };
}

/** What `check` says of a file that could not be read. */
export function unreadableRecord(file: string, message: string): CheckRecord {
  const problem = { line: 1, column: 1, endColumn: 1, severity: 'error', message } as const;
  return { file, results: [], requirements: [], problems: [{ ...problem, fixes: [] }] };
}

function resultRecord(line: number, content: ResultContent) {
  const { name, kind, formula, latex, value, unit, shown, span, notes, parts, figure } = content;
  return {
    line,
    name,
    kind,
    formula,
    latex,
    value,
    unit,
    shown,
    span: span && { low: span.low, high: span.high, how: span.how, n: span.n },
    notes,
    parts: parts ?? figure,
  };
}

function requirementRecord(line: number, content: RequirementContent) {
  const { label, text, verdict, nominal, worst, limit, unit, how, n, at } = content;
  return { line, label, text, verdict, nominal, worst, limit, unit, how, n, at };
}

function problemRecord({ span, severity, message, fixes }: Problem, lines: LineMap): ProblemRecord {
  const { line, column } = lines.position(span.from);
  // A problem that covers several lines is shown on its first.
  const to = Math.min(span.to, lines.lineEnd(line));
  const endColumn = Math.max(column, column + to - span.from);
  return {
    line,
    column,
    endColumn,
    severity,
    message,
    fixes: fixes.map((fix) => fixRecord(fix, lines)),
  };
}

function fixRecord({ title, edits }: Fix, lines: LineMap): FixRecord {
  return {
    title,
    edits: edits.map(({ span, insert }) => {
      const end = lines.position(span.to);
      return { ...lines.position(span.from), endLine: end.line, endColumn: end.column, insert };
    }),
  };
}
