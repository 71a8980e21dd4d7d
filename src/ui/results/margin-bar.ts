import type { RequirementContent } from '../../engine/index.ts';
import { verdictClass } from '../verdicts.ts';
import { element } from './element.ts';

/** Where the marks of a margin bar stand, as fractions of its length. */
export interface MarginBar {
  /** The stretch in which the requirement holds. */
  readonly allowed: readonly [number, number];
  /** From zero to the nominal value. */
  readonly filled: readonly [number, number];
  readonly nominal: number;
  readonly worst: number | null;
  readonly limit: number;
}

/** A value further out than this many limits is drawn at the bar's end. */
const FURTHEST = 2;

/** The geometry of a requirement's bar; null for a condition, or where a number is missing. */
export function marginBar(requirement: RequirementContent): MarginBar | null {
  const { nominal, worst, limit, operator } = requirement;
  if (nominal === null || limit === null || operator === null) return null;
  const values = [nominal, worst ?? nominal, limit].filter(Number.isFinite);
  if (!Number.isFinite(limit)) return null;
  const low = Math.min(0, ...values);
  const natural = Math.max(0, ...values);
  const atMost = operator.startsWith('<');
  const high = limit > 0 && atMost ? Math.min(natural, FURTHEST * limit) : natural;
  const extent = (high - low) * 1.04 || 1;
  const at = (value: number) => Math.min(1, Math.max(0, (value - low) / extent));
  return {
    allowed: atMost ? [0, at(limit)] : [at(limit), 1],
    filled: [Math.min(at(0), at(nominal)), Math.max(at(0), at(nominal))],
    nominal: at(nominal),
    worst: worst === null ? null : at(worst),
    limit: at(limit),
  };
}

/** The bar as an element; decoration beside the words that say the same. */
export function marginBarElement(requirement: RequirementContent): HTMLElement | null {
  const bar = marginBar(requirement);
  if (!bar) return null;
  const made = element('span', `margin-bar verdict-${verdictClass(requirement.verdict)}`);
  made.setAttribute('aria-hidden', 'true');
  made.title = [
    `nominal ${requirement.nominal}`,
    requirement.worst === null ? null : `worst ${requirement.worst}`,
    `limit ${requirement.limit} ${requirement.unit ?? ''}`.trim(),
  ]
    .filter(Boolean)
    .join(', ');
  made.append(
    stretch('margin-allowed', bar.allowed),
    stretch('margin-filled', bar.filled),
    tick('margin-limit', bar.limit),
    ...(bar.worst === null ? [] : [tick('margin-worst', bar.worst)]),
    tick('margin-nominal', bar.nominal),
  );
  return made;
}

function stretch(className: string, [from, to]: readonly [number, number]): HTMLElement {
  const made = element('span', className);
  made.style.insetInlineStart = `${from * 100}%`;
  made.style.inlineSize = `${(to - from) * 100}%`;
  return made;
}

function tick(className: string, at: number): HTMLElement {
  const made = element('span', className);
  made.style.insetInlineStart = `${at * 100}%`;
  return made;
}
