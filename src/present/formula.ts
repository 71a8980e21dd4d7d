import { laplace, type Generator, type Polynomial, type Ratio } from '../algebra/index.ts';
import { arrangePolynomial, arrangeRatio } from './arrangement.ts';
import { arrangeNormalForm } from './normal-form.ts';
import { latexOf } from './written-latex.ts';
import { textOf } from './written-text.ts';
import type { Written } from './written.ts';
import { layoutOf, type Shape, type Writing } from './writing.ts';

/**
 * A rational function as text that the worksheet language reads back to an equal one: `-Tw/Kp`,
 * `1/(J s^2 + (b + Kd) s + Kp)`.
 *
 * @param shape how much is factored, `readable` unless given
 * @param main the variable by whose descending powers sums are collected, s unless given
 */
export function formulaText(
  r: Ratio,
  writing: Writing,
  shape: Shape = 'readable',
  main: Generator = laplace,
): string {
  return textOf(arranged(r, writing, shape, main));
}

function arranged(r: Ratio, writing: Writing, shape: Shape, main: Generator): Written {
  if (shape === 'time constants' || shape === 'poles and zeros')
    return arrangeNormalForm(r, shape, layoutOf(writing));
  return arrangeRatio(r, layoutOf(writing, shape, main));
}

/** The same formula as {@link formulaText}, as LaTeX without units. */
export function formulaLatex(
  r: Ratio,
  writing: Writing,
  shape: Shape = 'readable',
  main: Generator = laplace,
): string {
  return latexOf(arranged(r, writing, shape, main));
}

/** A polynomial as re-readable text, in descending powers of s. */
export function polynomialText(p: Polynomial, writing: Writing): string {
  return textOf(arrangePolynomial(p, layoutOf(writing)));
}

/** The same polynomial as {@link polynomialText}, as LaTeX. */
export function polynomialLatex(p: Polynomial, writing: Writing): string {
  return latexOf(arrangePolynomial(p, layoutOf(writing)));
}
