import { isRefusal } from '../base/index.ts';
import { symbolSpelling } from './unit-symbols.ts';
import type { Unit } from './unit.ts';
import type { UnitTree } from './unit-tree.ts';
import { readUnitTree, unitTreeText } from './unit-tree.ts';

/** A unit as results print it, with superscripts and µ however it was typed: `kg m²`, `µrad/√Hz`. */
export function unitText(unit: Unit | string): string {
  const text = typeof unit === 'string' ? unit : unit.text;
  const tree = readUnitTree(text);
  if (isRefusal(tree)) return text;
  return tree.kind === 'one' ? '' : unitTreeText(respelt(tree));
}

/** A printed unit as a worksheet takes it: `kg m²` as `kg m^2`. */
export function unitAsTyped(printed: string): string {
  return printed.replace(/[⁺⁻]?[⁰¹²³⁴⁵⁶⁷⁸⁹]+/gu, (power) => {
    const digits = [...power].map((c) => (c === '⁻' ? '-' : String('⁰¹²³⁴⁵⁶⁷⁸⁹'.indexOf(c))));
    return `^${digits.join('')}`;
  });
}

function respelt(tree: UnitTree): UnitTree {
  switch (tree.kind) {
    case 'one':
      return tree;
    case 'symbol':
      return { kind: 'symbol', text: symbolSpelling(tree.text) };
    case 'product':
      return { ...tree, factors: tree.factors.map(respelt) };
    case 'quotient':
      return { ...tree, above: respelt(tree.above), below: respelt(tree.below) };
    case 'power':
      return { ...tree, base: respelt(tree.base) };
    case 'root':
      return { kind: 'root', of: respelt(tree.of) };
  }
}

/**
 * A unit in LaTeX: upright symbols, thin spaces, `\mathrm{kN}\,\mathrm{m}/\mathrm{rad}`; empty for one. A text
 * that is no unit expression is set upright as it stands.
 */
export function unitToLatex(unit: Unit | string): string {
  const text = typeof unit === 'string' ? unit : unit.text;
  const tree = readUnitTree(text);
  if (isRefusal(tree)) return `\\mathrm{${text.replace(/[\\{}$&#^_~%]/g, ' ')}}`;
  return tree.kind === 'one' ? '' : treeLatex(tree);
}

function treeLatex(tree: UnitTree): string {
  switch (tree.kind) {
    case 'one':
      return '1';
    case 'symbol':
      return symbolLatex(symbolSpelling(tree.text));
    case 'product':
      return tree.factors.map((factor) => latexBracketed(factor, ['quotient'])).join('\\,');
    case 'quotient':
      return `${latexBracketed(tree.above, ['quotient'])}/${latexBracketed(tree.below, ['product', 'quotient'])}`;
    case 'power': {
      const base = latexBracketed(tree.base, ['product', 'quotient', 'power', 'root']);
      // The degree sign is a superscript itself; a second one needs a group.
      return `${base.startsWith('{}^') ? `{${base}}` : base}^{${tree.exponent}}`;
    }
    case 'root':
      return `\\sqrt{${treeLatex(tree.of)}}`;
  }
}

function latexBracketed(tree: UnitTree, kinds: readonly UnitTree['kind'][]): string {
  const latex = treeLatex(tree);
  return kinds.includes(tree.kind) ? `(${latex})` : latex;
}

/** Symbols that are signs rather than letters. */
const SIGNS: ReadonlyMap<string, string> = new Map([
  ['°', '{}^{\\circ}'],
  ['′', "{}'"],
  ['″', "{}''"],
  ['%', '\\%'],
  ['‰', '\\text{‰}'],
]);

function symbolLatex(symbol: string): string {
  const sign = SIGNS.get(symbol);
  if (sign) return sign;
  if (symbol.startsWith('°')) return `{}^{\\circ}\\mathrm{${symbol.slice(1)}}`;
  const [, micro, letters = ''] = /^(µ?)(.*)$/.exec(symbol) ?? [];
  const plain = letters.replaceAll('Ω', '\\Omega ').replaceAll('_', '\\_').trim();
  // Neither KaTeX nor plain LaTeX has an upright mu without a package.
  return (micro ? '\\mu' : '') + (plain === '' ? '' : `\\mathrm{${plain}}`);
}
