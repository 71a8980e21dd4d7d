import type { Report } from '../engine/index.ts';

/** The names that the statement at a place of the text was computed from; none where there is no result. */
export function dependedAt(report: Report, place: number | null): readonly string[] {
  if (place === null) return [];
  const rows = [...report.results, ...report.requirements];
  const row = rows.find(({ from, to }) => from <= place && place <= to);
  return row?.content.dependsOn ?? [];
}
