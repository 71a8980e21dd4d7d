/**
 * The colours of figures: custom properties that a page sets for its light and dark looks, each with a fallback that
 * makes a figure stand alone on paper. No colour carries a meaning of its own: areas differ in depth, curves in dash
 * pattern. Only what can be dragged has the page's accent.
 */
const FALLBACKS = {
  ink: '#1f1d1a',
  quiet: '#6b665e',
  faint: '#b5afa4',
  area: '#ece7dc',
  'deep-area': '#d3ccbd',
  band: '#dcd6c9',
  paper: '#fffdf8',
  accent: '#1f5fa8',
} as const;

export type Ink = keyof typeof FALLBACKS;

/** The colour as a value of a presentation attribute. */
export function ink(name: Ink): string {
  return `var(--figure-${name}, ${FALLBACKS[name]})`;
}

/** A figure with its colours written out, for programs that know no custom properties. */
export function standaloneSvg(svg: string): string {
  return svg.replace(/var\(--figure-[a-z-]+, ([^()]*)\)/g, '$1');
}

/** Dash patterns by which curves are told apart, in order; the first is solid. */
export const DASHES: readonly (string | null)[] = [
  null,
  '8 3',
  '2 3',
  '10 3 2 3',
  '14 4',
  '5 2 1 2 1 2',
];

/** What was pinned earlier, to compare against. */
export const BASELINE_DASH = '5 4';

export const FONT = "var(--figure-font, 'Source Sans 3', 'Helvetica Neue', Arial, sans-serif)";
