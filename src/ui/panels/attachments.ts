import type { Attachment } from 'svelte/attachments';
import type { RequirementContent } from '../../engine/index.ts';
import { marginBarElement } from '../results/margin-bar.ts';
import { typeset } from '../results/mathematics.ts';

/** Fills an element with a typeset formula. */
export function formula(latex: string): Attachment<HTMLElement> {
  return (holder) => holder.replaceChildren(typeset(latex, 'text'));
}

/** Fills an element with a requirement's margin bar, or nothing where it has none. */
export function margin(requirement: RequirementContent): Attachment<HTMLElement> {
  return (holder) => {
    const bar = marginBarElement(requirement);
    holder.replaceChildren(...(bar ? [bar] : []));
  };
}
