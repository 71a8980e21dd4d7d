import type { Placed, RequirementContent, Verdict } from '../engine/index.ts';
import { worstVerdict } from './verdicts.ts';

/** A heading of the worksheet as the editor finds it. */
export interface Heading {
  readonly from: number;
  readonly level: number;
  readonly text: string;
}

/** A heading with the worst verdict of its section, subsections included; null where nothing is required. */
export interface OutlineEntry extends Heading {
  readonly verdict: Verdict | null;
  /** Errors in the section. */
  readonly errors: number;
}

/** The outline: headings in the order of the text, each with what its section comes to. Linear in the rows a section. */
export function outlineOf(
  headings: readonly Heading[],
  requirements: readonly Placed<RequirementContent>[],
  errorPlaces: readonly number[],
): OutlineEntry[] {
  return headings.map((heading, index) => {
    const next = headings.slice(index + 1).find(({ level }) => level <= heading.level);
    const end = next?.from ?? Infinity;
    const inside = (place: number) => place >= heading.from && place < end;
    const verdicts = requirements.filter(({ from }) => inside(from));
    return {
      ...heading,
      verdict: worstVerdict(verdicts.map(({ content }) => content.verdict)),
      errors: errorPlaces.filter(inside).length,
    };
  });
}
