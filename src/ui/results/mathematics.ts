import katex from 'katex';

const MOST_KEPT = 2000;

/** Characters of LaTeX above which a formula fills screens and takes seconds to set. */
const LONGEST = 20_000;

/** Macros that the user's LaTeX may open, loops among them; a result may open as many as it has characters. */
const MOST_OPENED = 2000;
const kept = new Map<string, HTMLElement>();

/**
 * Typesets LaTeX; the same formula is typeset once and copied afterwards. What KaTeX cannot read is shown as it was
 * typed, marked. `display` stands on a line of its own; otherwise fractions keep their full size and long formulas may
 * break at operators.
 */
export function typeset(latex: string, style: 'text' | 'result' | 'display'): HTMLElement {
  const key = `${style} ${latex}`;
  let made = kept.get(key);
  if (!made) {
    made = render(latex, style);
    if (kept.size >= MOST_KEPT) kept.clear();
    kept.set(key, made);
  }
  return made.cloneNode(true) as HTMLElement;
}

function render(latex: string, style: 'text' | 'result' | 'display'): HTMLElement {
  const holder = document.createElement('span');
  holder.className = `mathematics mathematics-${style}`;
  if (latex.length > LONGEST) {
    holder.textContent = 'This formula is too long to be set.';
    return holder;
  }
  katex.render(style === 'result' ? `\\displaystyle ${latex}` : latex, holder, {
    displayMode: style === 'display',
    throwOnError: false,
    errorColor: 'var(--ink-soft)',
    strict: 'ignore',
    trust: false,
    maxExpand: style === 'result' ? LONGEST : MOST_OPENED,
  });
  return holder;
}
