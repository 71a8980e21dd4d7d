import { factorPolynomial } from '../algebra/index.ts';
import type { Polynomial } from '../algebra/index.ts';
import { polynomialRoots } from '../numeric/index.ts';
import type { ClosedLoop } from './loops.ts';
import { integersInS, placeText, scaledDescending } from './pole-place.ts';
import { degreeInS, functionsOfS, isFreeOfS } from './s-polynomial.ts';
import { modesMissing } from './transfer.ts';
import type { Transfer } from './transfer.ts';

/** The blocks whose polynomials share a factor, named by their signals. */
function signalsOf(loop: ClosedLoop, factor: Polynomial): string {
  const blocks = loop.blocks.filter((b) => {
    const rest = modesMissing([b.polynomial], factor);
    return degreeInS(b.polynomial) > (rest ? degreeInS(rest) : 0);
  });
  return blocks.flatMap((b) => b.signals).join(', ');
}

function placesOf(loop: ClosedLoop, factor: Polynomial): string {
  const integers = integersInS(factor);
  if (!integers || functionsOfS(factor).length > 0) {
    const degree = degreeInS(factor);
    return `${degree === 1 ? 'a mode' : `${degree} modes`} of the equations of ${signalsOf(loop, factor)}`;
  }
  const roots = polynomialRoots(scaledDescending(integers)).filter((root) => root.im >= 0);
  return roots.map((root) => `a mode at ${placeText(root)}`).join(', ');
}

/**
 * The note that a transfer function hides modes: `hides a mode at s = 1`; null if none cancelled on the way from its
 * input to its signal. Modes with symbols are named by the signals whose equations they belong to.
 */
export function hiddenModesNote(loop: ClosedLoop, transfer: Transfer): string | null {
  if (!transfer.cancelled) return null;
  const { factors } = factorPolynomial(transfer.cancelled);
  const places = factors
    .filter(({ factor }) => !isFreeOfS(factor))
    .map(({ factor }) => placesOf(loop, factor));
  return `hides ${places.join(', ')}`;
}
