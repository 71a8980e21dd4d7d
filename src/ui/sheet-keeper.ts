import type { Report } from '../engine/index.ts';
import { pinBaseline, requirementKeys, resultKeys, type Baseline } from './baseline.ts';
import { EMPTY_SHEET, type Sheet } from './editor/sheet-field.ts';

/**
 * The sheet that follows a sheet when a report arrives: what moved is what is shown otherwise than before. Nothing
 * counts as moved in the first report.
 */
export function nextSheet(before: Sheet, report: Report, text: string): Sheet {
  const results = resultKeys(report, text);
  const requirements = requirementKeys(report);
  return {
    report,
    resultKeys: results,
    requirementKeys: requirements,
    baseline: before.baseline,
    moved: before.report ? movedKeys(before, report, results, requirements) : new Set(),
  };
}

/** Pins the present values, or lets them go. */
export function withBaseline(sheet: Sheet, text: string, pinned: boolean): Sheet {
  const baseline: Baseline | null = pinned && sheet.report ? pinBaseline(sheet.report, text) : null;
  return { ...sheet, baseline, moved: new Set() };
}

/** The sheet of a worksheet that was just opened. */
export function freshSheet(): Sheet {
  return EMPTY_SHEET;
}

function movedKeys(
  before: Sheet,
  report: Report,
  results: readonly string[],
  requirements: readonly string[],
): Set<string> {
  const was = new Map<string, string | null>();
  before.report?.results.forEach(({ content }, index) =>
    was.set(before.resultKeys[index] ?? '', content.shown),
  );
  before.report?.requirements.forEach(({ content }, index) =>
    was.set(before.requirementKeys[index] ?? '', seen(content)),
  );
  const now: [string, string | null][] = [
    ...report.results.map(({ content }, i): [string, string | null] => [
      results[i] ?? '',
      content.shown,
    ]),
    ...report.requirements.map(({ content }, i): [string, string | null] => [
      requirements[i] ?? '',
      seen(content),
    ]),
  ];
  return new Set(
    now.filter(([key, shown]) => was.has(key) && was.get(key) !== shown).map(([key]) => key),
  );
}

function seen({ verdict, shown }: { readonly verdict: string; readonly shown: string }): string {
  return `${verdict} ${shown}`;
}
