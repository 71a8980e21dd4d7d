import { nameToText } from '../language/index.ts';
import type { SignedTerm, Written } from './written.ts';

/**
 * A written formula as text that the worksheet language reads back (language.md, section 3): a space multiplies, a
 * denominator of more than one factor stands in brackets, and nothing multiplies or divides after a solidus.
 */
export function textOf(form: Written): string {
  switch (form.kind) {
    case 'number':
      return form.text;
    case 'name':
      return nameToText(form.name);
    case 'call':
      return `${form.name}(${form.args.map(textOf).join(', ')})`;
    case 'power':
      return `${atomText(form.base)}^${form.exponent}`;
    case 'product':
      return form.factors.map(factorText).join(' ');
    case 'fraction':
      return `${factorText(form.num)}/${denominatorText(form.den)}`;
    case 'sum':
      return form.terms.map(termText).join('');
    case 'negative':
      return `-${factorText(form.of)}`;
  }
}

function termText(term: SignedTerm, index: number): string {
  const body = factorText(term.of);
  if (index === 0) return term.negative ? `-${body}` : body;
  return term.negative ? ` - ${body}` : ` + ${body}`;
}

function factorText(form: Written): string {
  const loose = form.kind === 'sum' || form.kind === 'negative';
  return loose ? `(${textOf(form)})` : textOf(form);
}

function denominatorText(form: Written): string {
  const tight = form.kind !== 'product' && form.kind !== 'fraction';
  return tight ? factorText(form) : `(${textOf(form)})`;
}

function atomText(form: Written): string {
  const atom = form.kind === 'name' || form.kind === 'call' || isDigits(form);
  return atom ? textOf(form) : `(${textOf(form)})`;
}

function isDigits(form: Written): boolean {
  return form.kind === 'number' && /^\d+$/.test(form.text);
}
