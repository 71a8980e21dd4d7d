import { nameToLatex } from '../language/index.ts';
import { signed, timesForms, type SignedTerm, type Written } from './written.ts';

const LAPLACE: Written = Object.freeze({ kind: 'name', name: 's' });

/** A written formula as LaTeX for KaTeX: fractions, thin spaces between factors, no units. */
export function latexOf(form: Written): string {
  switch (form.kind) {
    case 'number':
      return numberLatex(form.text);
    case 'name':
      return nameToLatex(form.name);
    case 'call':
      return form.name === 'delay'
        ? callLatex('exp', [latexOf(signed(true, timesForms(form.args[0], [LAPLACE])))])
        : callLatex(form.name, form.args.map(latexOf));
    case 'power':
      return `${powerBaseLatex(form.base)}^{${form.exponent}}`;
    case 'product':
      return joinFactors(form.factors.map(factorLatex));
    case 'fraction':
      return `\\frac{${latexOf(form.num)}}{${latexOf(form.den)}}`;
    case 'sum':
      return form.terms.map(termLatex).join('');
    case 'negative':
      return `-${factorLatex(form.of)}`;
  }
}

/** A decimal number: digits in groups of three from five digits on, an exponent as a power of ten. */
export function numberLatex(text: string): string {
  const [mantissa, exponent] = text.split('e');
  const [whole, fraction] = mantissa.split('.');
  const grouped = whole.replace('-', '').length > 4 ? groupDigits(whole) : whole;
  const digits = fraction === undefined ? grouped : `${grouped}.${fraction}`;
  if (exponent === undefined) return digits;
  return `${digits}\\cdot 10^{${Number(exponent)}}`;
}

/** A form between brackets that grow with what they hold. */
export function bracketed(latex: string): string {
  return /\\frac|\\sqrt|\\begin/.test(latex) ? `\\left(${latex}\\right)` : `(${latex})`;
}

function groupDigits(digits: string): string {
  return digits.replace(/\B(?=(\d{3})+$)/g, '\\,');
}

function termLatex(term: SignedTerm, index: number): string {
  const sign = term.negative ? '-' : index === 0 ? '' : '+';
  return sign + factorLatex(term.of);
}

function factorLatex(form: Written): string {
  const loose = form.kind === 'sum' || form.kind === 'negative';
  return loose ? bracketed(latexOf(form)) : latexOf(form);
}

/** Thin spaces between factors, but none next to a bracket, and a dot where a number would run into the next. */
export function joinFactors(factors: readonly string[]): string {
  return factors.reduce((left, right) => {
    if (/^\d/.test(right)) return `${left}\\cdot ${right}`;
    return /\)$/.test(left) || /^(\\left)?\(/.test(right)
      ? `${left}${right}`
      : `${left}\\,${right}`;
  });
}

function powerBaseLatex(form: Written): string {
  const simple = form.kind === 'name' || (form.kind === 'number' && /^\d+$/.test(form.text));
  return simple ? latexOf(form) : bracketed(latexOf(form));
}

const OPERATORS: Readonly<Record<string, string>> = {
  sin: '\\sin',
  cos: '\\cos',
  tan: '\\tan',
  atan: '\\arctan',
  log: '\\ln',
  min: '\\min',
  max: '\\max',
  delta: '\\delta',
};

/** A call with its arguments as LaTeX: roots, powers of e and bars as mathematics sets them, other names in words. */
export function callLatex(name: string, args: readonly string[]): string {
  const inner = args.join(',\\,');
  if (name === 'sqrt') return `\\sqrt{${inner}}`;
  if (name === 'exp') return `\\mathrm{e}^{${inner}}`;
  if (name === 'abs') return `\\left|${inner}\\right|`;
  if (name.startsWith("delta'")) return `\\delta^{(${name.length - 5})}${bracketed(inner)}`;
  return `${OPERATORS[name] ?? `\\text{${name.replaceAll('_', ' ')}}`}${bracketed(inner)}`;
}
