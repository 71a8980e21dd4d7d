import { canonicalName, GREEK_LETTERS } from './names.ts';

/** A name as it is set: a base with subscripts, `Kp_max` as K with the subscripts p and max. */
export interface TypesetName {
  readonly base: string;
  readonly subscripts: readonly string[];
}

/** A capital with up to three lower-case letters or digits, or a letter with digits only. */
const LETTER_WITH_SUBSCRIPT = /^(?:(\p{Lu}\p{M}*)([\p{Ll}\p{M}\d]{1,3})|(\p{L}\p{M}*)(\d+))$/u;

const LATEX_OF_GREEK: ReadonlyMap<string, string> = new Map(
  [...GREEK_LETTERS].map(([word, letter]) => [letter, latexOfGreek(word, letter)]),
);

/** LaTeX has no command for Greek letters that look like Latin ones. */
function latexOfGreek(word: string, letter: string): string {
  const latinLookalikes: Readonly<Record<string, string>> = {
    Α: 'A',
    Β: 'B',
    Ε: 'E',
    Ζ: 'Z',
    Η: 'H',
    Ι: 'I',
    Κ: 'K',
    Μ: 'M',
    Ν: 'N',
    Ο: 'O',
    Ρ: 'P',
    Τ: 'T',
    Χ: 'X',
    ο: 'o',
  };
  const lookalike = latinLookalikes[letter];
  return lookalike ? `\\mathrm{${lookalike}}` : `\\${word}`;
}

/**
 * Splits a name into what is set on the line and what is set below it: `K_p`, `Kp` and `phi2` have a subscript,
 * `storm` has none.
 */
export function typesetName(name: string): TypesetName {
  const [stem = '', ...subscripts] = canonicalName(name).split('_').filter(Boolean);
  const match = LETTER_WITH_SUBSCRIPT.exec(stem);
  if (!match) return { base: stem, subscripts };
  return { base: (match[1] ?? match[3])!, subscripts: [(match[2] ?? match[4])!, ...subscripts] };
}

/** Upright letters: a word, not a product of its letters. */
function uprightLatex(word: string): string {
  const greek = LATEX_OF_GREEK.get(GREEK_LETTERS.get(word) ?? word);
  if (greek) return greek;
  if (/^\d+$/.test(word)) return word;
  return /^[A-Za-z\d]+$/.test(word) ? `\\mathrm{${word}}` : `\\text{${word}}`;
}

function baseLatex(base: string): string {
  if (/^[A-Za-z]$/.test(base)) return base;
  return uprightLatex(base);
}

/** LaTeX of a name by the typesetting rule: `Kp` is `K_{\mathrm{p}}`, `omega_n` is `\omega_{\mathrm{n}}`, `storm` upright. */
export function nameToLatex(name: string): string {
  const canonical = canonicalName(name);
  if (canonical === 'j') return '\\mathrm{j}';
  if (canonical === 'pi') return '\\pi';
  const { base, subscripts } = typesetName(canonical);
  if (subscripts.length === 0) return baseLatex(base);
  return `${baseLatex(base)}_{${subscripts.map(uprightLatex).join(',')}}`;
}

/** Plain text of a name, which reads as the same name again: its canonical spelling. */
export function nameToText(name: string): string {
  return canonicalName(name);
}

/** Whether two different names look the same when set, as `Kp` and `K_p` do. */
export function sameTypesetting(a: string, b: string): boolean {
  return canonicalName(a) !== canonicalName(b) && nameToLatex(a) === nameToLatex(b);
}
