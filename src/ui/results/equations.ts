import type { LoopContent } from '../../engine/index.ts';
import { element } from './element.ts';
import { scrollable } from './scrollable.ts';
import { typeset } from './mathematics.ts';

/** The equations of a loop, typeset as they were read, one a line. */
export function equationsElement({ name, equationsLatex }: LoopContent): HTMLElement {
  const made = element('div', 'result equations');
  made.setAttribute('role', 'group');
  made.setAttribute('aria-label', `Equations of ${name}`);
  made.append(
    ...equationsLatex.map((latex) =>
      scrollable(element('div', 'equation', typeset(latex, 'result')), 'Equation'),
    ),
  );
  return made;
}
