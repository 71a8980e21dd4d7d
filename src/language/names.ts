/** Greek letters by the names that may be typed for them, small letters first. */
const SMALL_GREEK: Readonly<Record<string, string>> = {
  alpha: 'α',
  beta: 'β',
  gamma: 'γ',
  delta: 'δ',
  epsilon: 'ε',
  zeta: 'ζ',
  eta: 'η',
  theta: 'θ',
  iota: 'ι',
  kappa: 'κ',
  lambda: 'λ',
  mu: 'μ',
  nu: 'ν',
  xi: 'ξ',
  omicron: 'ο',
  pi: 'π',
  rho: 'ρ',
  sigma: 'σ',
  tau: 'τ',
  upsilon: 'υ',
  phi: 'φ',
  chi: 'χ',
  psi: 'ψ',
  omega: 'ω',
};

function capitalised(word: string): string {
  return word[0]!.toUpperCase() + word.slice(1);
}

/** Greek letters, small and capital, by their spelled-out names. */
export const GREEK_LETTERS: ReadonlyMap<string, string> = new Map(
  Object.entries(SMALL_GREEK).flatMap(([word, letter]) => [
    [word, letter],
    [capitalised(word), letter.toUpperCase()],
  ]),
);

/** Other characters for the same Greek letter: the micro sign and the letter variants of mathematics. */
const LETTER_VARIANTS: Readonly<Record<string, string>> = {
  µ: 'μ',
  ϑ: 'θ',
  ϕ: 'φ',
  ϵ: 'ε',
  ϖ: 'π',
  ϱ: 'ρ',
  ϰ: 'κ',
};

const SPELLED_GREEK = new RegExp(`^(${[...GREEK_LETTERS.keys()].join('|')})(?=$|_|\\d)`);
const VARIANT = /[µϑϕϵϖϱϰ]/g;

/** Words that no worksheet may give to a thing of its own. */
export const KEYWORDS: readonly string[] = (
  'is are has tune from to points loop driven by uses as case of starts at after over for in with require ' +
  'where draw titled explain tabulate and or not unit'
).split(' ');

/** What the symbols with a fixed meaning are. */
export const CONSTANT_MEANINGS: ReadonlyMap<string, string> = new Map([
  ['s', 'the Laplace variable'],
  ['t', 'time'],
  ['j', 'the imaginary unit'],
  ['pi', 'the number π'],
]);

/** The symbols with a fixed meaning. */
export const CONSTANT_NAMES: readonly string[] = [...CONSTANT_MEANINGS.keys()];

/** Every reserved name, in its canonical form. */
export const RESERVED: ReadonlySet<string> = new Set([...CONSTANT_NAMES, ...KEYWORDS]);

/**
 * The one spelling under which a name is known: NFC, with spelled-out Greek (a whole name, or before `_` or digits)
 * as the letter. `theta` is `θ`, `omega_n` is `ω_n`, `µ` is `μ`. The number pi is always `pi`.
 */
export function canonicalName(text: string): string {
  const composed = text.normalize('NFC').replace(VARIANT, (letter) => LETTER_VARIANTS[letter]!);
  const name = composed.replace(SPELLED_GREEK, (word) => GREEK_LETTERS.get(word)!);
  return name === 'π' ? 'pi' : name;
}

/** Whether a name, in any spelling, is reserved by the language. */
export function isReserved(name: string): boolean {
  return RESERVED.has(canonicalName(name));
}

const SPELLINGS: ReadonlyMap<string, string> = new Map(
  [...GREEK_LETTERS].map(([word, letter]) => [letter, word]),
);
const LEADING_GREEK = new RegExp(`^(${[...SPELLINGS.keys()].join('|')})(?=$|_|\\d)`);

/** The name in letters that every keyboard has: `θ_m` as `theta_m`. */
export function spelledName(name: string): string {
  return name.replace(LEADING_GREEK, (letter) => SPELLINGS.get(letter)!);
}
