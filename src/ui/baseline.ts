import type { FigureData, RegionFigure, ResponseFigure } from '../figures/index.ts';
import type {
  Placed,
  Report,
  RequirementContent,
  ResultContent,
  Verdict,
} from '../engine/index.ts';

/** The present values, pinned to compare against. Keys are those of {@link keysOf}. */
export interface Baseline {
  readonly results: ReadonlyMap<
    string,
    {
      readonly value: ResultContent['value'];
      readonly shown: string | null;
      readonly formula: string | null;
      readonly figure: FigureData | null;
    }
  >;
  readonly requirements: ReadonlyMap<string, { readonly verdict: Verdict; readonly shown: string }>;
  readonly assumptions: ReadonlyMap<
    string,
    { readonly number: number | null; readonly unit: string | null; readonly valueText: string }
  >;
}

/** What a row was under the baseline, in words: "was 0.31 mrad", and how far it moved: "× 1.07" or "+0.3". */
export interface Movement {
  readonly was: string;
  readonly by: string | null;
}

/**
 * A key for each row that stays the same while its worksheet is edited: its name, or its source text, with a count
 * where the same source stands more than once.
 */
export function keysOf<Content>(
  rows: readonly Placed<Content>[],
  labelOf: (row: Placed<Content>) => string,
): string[] {
  const seen = new Map<string, number>();
  return rows.map((row) => {
    const label = labelOf(row);
    const count = seen.get(label) ?? 0;
    seen.set(label, count + 1);
    return count === 0 ? label : `${label} #${count + 1}`;
  });
}

/** Keys of a report's results: their name, or the source of a bare formula. */
export function resultKeys(report: Report, text: string): string[] {
  return keysOf(
    report.results,
    ({ from, to, content }) => content.name ?? `= ${text.slice(from, to).trim()}`,
  );
}

/** Keys of a report's requirements: their source. */
export function requirementKeys(report: Report): string[] {
  return keysOf(report.requirements, ({ content }) => content.text);
}

/** Pins the values of a report. */
export function pinBaseline(report: Report, text: string): Baseline {
  const results = resultKeys(report, text);
  const requirements = requirementKeys(report);
  return {
    results: new Map(
      report.results.map(({ content: { value, shown, formula, figure } }, index) => [
        results[index] ?? '',
        { value, shown, formula, figure },
      ]),
    ),
    requirements: new Map(
      report.requirements.map(({ content: { verdict, shown } }, index) => [
        requirements[index] ?? '',
        { verdict, shown },
      ]),
    ),
    assumptions: new Map(
      report.assumptions.map(({ content: { name, number, unit, valueText } }) => [
        name,
        { number, unit, valueText },
      ]),
    ),
  };
}

/** What a result was under the baseline; null where it was the same or is new. */
export function resultMovement(
  baseline: Baseline,
  key: string,
  now: ResultContent,
): Movement | null {
  const then = baseline.results.get(key);
  if (!then || (then.shown === now.shown && then.formula === now.formula)) return null;
  if (then.shown === now.shown)
    return { was: `was ${then.formula ?? 'without a formula'}`, by: null };
  return {
    was: `was ${then.shown ?? 'without a value'}`,
    by: distance(then.value, now.value, now.shown),
  };
}

/**
 * A figure with the curves or boundaries that it had under the baseline, to be drawn dashed; the figure itself where they
 * are the same.
 */
export function figureWithBaseline(
  baseline: Baseline | null,
  key: string,
  now: FigureData,
): FigureData {
  const then = baseline?.results.get(key)?.figure;
  if (!then || then === now) return now;
  if (then.kind === 'region') return now.kind === 'region' ? regionWithBaseline(then, now) : now;
  return now.kind === 'response' ? responseWithBaseline(then, now) : now;
}

function regionWithBaseline(then: RegionFigure, now: RegionFigure): RegionFigure {
  const samePlane = then.x.label === now.x.label && then.y.label === now.y.label;
  const pinned = then.boundaries.flatMap(({ lines }) => lines);
  const present = now.boundaries.flatMap(({ lines }) => lines);
  if (!samePlane || JSON.stringify(pinned) === JSON.stringify(present)) return now;
  return { ...now, baseline: pinned };
}

function responseWithBaseline(then: ResponseFigure, now: ResponseFigure): ResponseFigure {
  const panels = new Set(now.curves.map(({ axisLabel }) => axisLabel));
  const pinned = then.curves
    .filter(({ axisLabel }) => panels.has(axisLabel))
    .map((curve) => ({ ...curve, label: `${curve.label}, baseline`, band: null, baseline: true }));
  return { ...now, curves: [...now.curves, ...pinned] };
}

/** What a requirement was under the baseline; null where it was the same or is new. */
export function requirementMovement(
  baseline: Baseline,
  key: string,
  now: RequirementContent,
): Movement | null {
  const then = baseline.requirements.get(key);
  if (!then || (then.verdict === now.verdict && then.shown === now.shown)) return null;
  const verdict = then.verdict === now.verdict ? null : then.verdict;
  return { was: `was ${[verdict, then.shown].filter(Boolean).join(', ')}`, by: null };
}

/** What an assumption was under the baseline, as typed; null where it was the same or is new. */
export function assumptionWas(baseline: Baseline, name: string, valueText: string): string | null {
  const then = baseline.assumptions.get(name);
  return then && then.valueText !== valueText ? `was ${then.valueText}` : null;
}

/**
 * How far a value moved: the ratio where both are of one sign, else the difference in the unit that is shown
 * (`shown` begins with the present value in it).
 */
export function distance(then: unknown, now: unknown, shown: string | null): string | null {
  if (typeof then !== 'number' || typeof now !== 'number' || then === now) return null;
  if (then * now > 0) return `× ${significant(now / then)}`;
  const inUnit = Number.parseFloat((shown ?? '').replace('−', '-'));
  const scale = now === 0 ? NaN : inUnit / now;
  if (!Number.isFinite(scale)) return null;
  const difference = (now - then) * scale;
  return `${difference > 0 ? '+' : '−'}${significant(Math.abs(difference))}`;
}

function significant(value: number): string {
  return String(Number(value.toPrecision(3)));
}
