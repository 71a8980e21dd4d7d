import { createSession } from '../../src/engine/index.ts';
import type { Problem } from '../../src/base/index.ts';
import type { Report, RequirementContent, ResultContent } from '../../src/engine/report.ts';
import { invariant } from '../../src/base/index.ts';

/** The report on a worksheet of one cell, with its rows found by what was typed. */
export interface CellReport {
  readonly report: Report;
  /** The result of the definition of this name, or of the statement that begins with this text. */
  result(statement: string): ResultContent;
  /** The requirement whose label or whose text begins so. */
  requirement(start: string): RequirementContent;
  /** `error at ‹text›: message`, for every problem. */
  readonly problems: readonly string[];
}

/** Evaluates one cell. */
export function evaluateCell(cell: string): CellReport {
  const text = `\`\`\`loop\n${cell}\n\`\`\`\n`;
  const report = createSession().update(text);
  return {
    report,
    result: (statement) => {
      const row =
        report.results.find(({ content }) => content.name === statement) ??
        report.results.find(({ from }) => text.startsWith(statement, from));
      invariant(row, `the cell has no result ${statement}`);
      return row.content;
    },
    requirement: (start) => {
      const row = report.requirements.find(
        ({ content }) => content.label?.startsWith(start) || content.text.startsWith(start),
      );
      invariant(row, `the cell has no requirement ${start}`);
      return row.content;
    },
    problems: report.problems.map((problem) => problemText(problem, text)),
  };
}

function problemText({ severity, span, message }: Problem, text: string): string {
  return `${severity} at ‹${text.slice(span.from, span.to)}›: ${message}`;
}

/** The cell after the fix of this title, whichever problem offers it. */
export function afterFix(cell: string, title: string): string {
  const text = `\`\`\`loop\n${cell}\n\`\`\`\n`;
  const fixes = createSession()
    .update(text)
    .problems.flatMap((problem) => problem.fixes);
  const fix = fixes.find((candidate) => candidate.title === title);
  invariant(fix, `no problem offers ${title}; there are ${fixes.map((f) => f.title).join(', ')}`);
  const edits = [...fix.edits].sort((a, b) => b.span.from - a.span.from);
  const fixed = edits.reduce(
    (all, { span, insert }) => all.slice(0, span.from) + insert + all.slice(span.to),
    text,
  );
  return fixed.slice('```loop\n'.length, -'\n```\n'.length);
}
