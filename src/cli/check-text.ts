import type { Verdict } from '../engine/index.ts';
import type { CheckRecord, ProblemRecord } from './check-record.ts';

type RequirementRecord = CheckRecord['requirements'][number];

const MARKS: Readonly<Record<Verdict, string>> = {
  met: '●',
  'met at nominal only': '◐',
  'not met': '✕',
  undecided: '◌',
};
const VERDICTS = Object.keys(MARKS) as readonly Verdict[];

/**
 * What `check` prints for a reader: verdicts with values and margins, and under one that is not met what fails;
 * problems with their places; a summary.
 *
 * @param notes sentences for each requirement, in the record's order
 */
export function checkText(record: CheckRecord, notes: readonly (readonly string[])[]): string {
  const rows = record.requirements.map((row) => [verdictWords(row), title(row), margin(row)]);
  const unmetNotes = record.requirements.map(({ verdict }, row) =>
    verdict === 'met' ? [] : notes[row].map((note) => `      ${note}`),
  );
  return [
    record.file,
    ...columns(rows).flatMap((line, row) => [`  ${line}`, ...unmetNotes[row]]),
    ...record.problems.flatMap((problem) => problemLines(record.file, problem)),
    `  ${summary(record)}`,
    '',
  ].join('\n');
}

function title({ label, text }: RequirementRecord): string {
  return label ?? text;
}

/** Sets rows of cells in columns as wide as their widest cell. */
function columns(rows: readonly (readonly string[])[]): string[] {
  const width = (column: number) => Math.max(...rows.map((row) => row[column].length));
  return rows.map((row) =>
    row
      .map((cell, column) => cell.padEnd(width(column)))
      .join('  ')
      .trimEnd(),
  );
}

/** A verdict that rests on samples says so, since samples prove nothing. */
function verdictWords({ verdict, how, n }: RequirementRecord): string {
  const basis = how === 'sampled' && verdict === 'met' ? ` (sampled, n = ${n})` : '';
  return `${MARKS[verdict]} ${verdict}${basis}`;
}

function margin({ text, label, nominal, worst, limit, unit }: RequirementRecord): string {
  if (nominal === null || limit === null) return label === null ? '' : text;
  const shown = (value: number) => String(Number(value.toPrecision(4)));
  const values = worst === null ? shown(nominal) : `${shown(nominal)}, worst ${shown(worst)}`;
  return `${values}, limit ${shown(limit)}${unit === null ? '' : ` ${unit}`}`;
}

function problemLines(file: string, problem: ProblemRecord): string[] {
  const { line, column, severity, message, fixes } = problem;
  return [
    `  ${file}:${line}:${column}: ${severity}: ${message}`,
    ...fixes.map((fix) => `      fix: ${fix.title}`),
  ];
}

function summary({ requirements, problems }: CheckRecord): string {
  const count = (verdict: Verdict) => requirements.filter((row) => row.verdict === verdict).length;
  const errors = problems.filter(({ severity }) => severity === 'error').length;
  const others = VERDICTS.filter((verdict) => verdict !== 'met' && count(verdict) > 0);
  return [
    requirements.length === 0 ? 'no requirements' : `${count('met')} of ${requirements.length} met`,
    ...others.map((verdict) => `${count(verdict)} ${verdict.replace('met at', 'at')}`),
    ...(errors === 0 ? [] : [`${errors} ${errors === 1 ? 'error' : 'errors'}`]),
  ].join(' · ');
}
