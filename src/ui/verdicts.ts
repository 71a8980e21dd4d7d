import type { RequirementContent, Verdict } from '../engine/index.ts';

const SEVERITY: Readonly<Record<Verdict, number>> = {
  met: 0,
  undecided: 1,
  'met at nominal only': 2,
  'not met': 3,
};

/** The word of a requirement's verdict; one found by sampling says so and with how many samples. */
export function verdictWord(requirement: RequirementContent): string {
  const { verdict, how, n } = requirement;
  return verdict === 'met' && how === 'sampled' ? `met (sampled, n = ${n ?? '?'})` : verdict;
}

/** A verdict as the end of a CSS class: `met-at-nominal-only`. */
export function verdictClass(verdict: Verdict): string {
  return verdict.replaceAll(' ', '-');
}

/** The worst of some verdicts, or null of none. */
export function worstVerdict(verdicts: readonly Verdict[]): Verdict | null {
  return verdicts.reduce<Verdict | null>(
    (worst, verdict) => (worst === null || SEVERITY[verdict] > SEVERITY[worst] ? verdict : worst),
    null,
  );
}

/**
 * The line of the title bar: "6 of 8 met · 1 at nominal only · 1 not met · 2 errors"; null without requirements and
 * errors.
 */
export function verdictSummary(
  requirements: readonly RequirementContent[],
  errors: number,
): string | null {
  const faults = errors === 0 ? null : `${errors} ${errors === 1 ? 'error' : 'errors'}`;
  if (requirements.length === 0) return faults;
  const count = (verdict: Verdict) =>
    requirements.filter((requirement) => requirement.verdict === verdict).length;
  const rest: [number, string][] = [
    [count('met at nominal only'), 'at nominal only'],
    [count('not met'), 'not met'],
    [count('undecided'), 'undecided'],
  ];
  return [
    `${count('met')} of ${requirements.length} met`,
    ...rest.filter(([number]) => number > 0).map(([number, words]) => `${number} ${words}`),
    ...(faults === null ? [] : [faults]),
  ].join(' · ');
}

/**
 * The shape of a verdict as an SVG, drawn in the current colour: a disc, a half-filled ring, a cross, a dashed ring.
 * It is decoration: the word stands beside it.
 */
export function verdictShape(verdict: Verdict): string {
  const shapes: Record<Verdict, string> = {
    met: '<circle cx="8" cy="8" r="5.5" fill="currentColor"/>',
    'met at nominal only':
      '<circle cx="8" cy="8" r="5.25" fill="none" stroke="currentColor" stroke-width="1.5"/>' +
      '<path d="M8 2.75a5.25 5.25 0 0 0 0 10.5z" fill="currentColor"/>',
    'not met':
      '<path d="M3.5 3.5l9 9m0-9l-9 9" fill="none" stroke="currentColor" stroke-width="2.25" stroke-linecap="round"/>',
    undecided:
      '<circle cx="8" cy="8" r="5.25" fill="none" stroke="currentColor" stroke-width="1.5" stroke-dasharray="2.4 1.7"/>',
  };
  return `<svg class="verdict-shape" viewBox="0 0 16 16" aria-hidden="true" focusable="false">${shapes[verdict]}</svg>`;
}
