import type { Expression, Replacement } from '../language/index.ts';
import { nameToLatex } from '../language/index.ts';
import { parseUnit, unitToLatex } from '../units/index.ts';
import { isRefusal } from '../base/index.ts';
import { wordsLatex } from './words.ts';
import { bracketed, callLatex, joinFactors, numberLatex } from './written-latex.ts';

type Kind<K extends Expression['kind']> = Extract<Expression, { kind: K }>;

/** A formula as it was typed, as LaTeX: nothing is reordered or worked out. For equations and requirements. */
export function expressionLatex(e: Expression): string {
  switch (e.kind) {
    case 'number':
      return numberLatex(e.text);
    case 'quantity':
      return quantityLatex(e);
    case 'name':
      return nameToLatex(e.name);
    case 'text':
      return wordsLatex(e.text);
    case 'member':
      return `${expressionLatex(e.of)}.${nameToLatex(e.name)}`;
    case 'derivative':
      return derivativeLatex(e);
    case 'call':
      return callLatex(e.callee, e.args.map(expressionLatex));
    case 'evaluation':
      return `${nameToLatex(e.name)}${bracketed(expressionLatex(e.at))}`;
    case 'arrow':
      return `${expressionLatex(e.from)}\\to ${e.to.map(expressionLatex).join(',\\,')}`;
    case 'rows':
      return matrixOf(e);
    default:
      return operationLatex(e);
  }
}

type Operation = Exclude<
  Expression,
  Kind<
    | 'number'
    | 'quantity'
    | 'name'
    | 'text'
    | 'member'
    | 'derivative'
    | 'call'
    | 'evaluation'
    | 'arrow'
    | 'rows'
  >
>;

function operationLatex(e: Operation): string {
  switch (e.kind) {
    case 'sum':
      return e.terms.map((term, i) => signedTerm(term, e.signs[i], i)).join('');
    case 'product':
      return productLatex(e);
    case 'negation':
      return `-${tightLatex(e.of)}`;
    case 'power':
      return `${powerBase(e.base)}^{${expressionLatex(e.exponent)}}`;
    case 'relation':
      return relationLatex(e);
    case 'logical':
      return e.operands.map(expressionLatex).join(`\\ \\text{${e.operator}}\\ `);
    case 'not':
      return `\\text{not }${bracketed(expressionLatex(e.of))}`;
    case 'with':
      return `${expressionLatex(e.of)}\\ \\text{with}\\ ${e.replacements.map(replacementLatex).join(',\\ ')}`;
    case 'in-unit':
      return `${expressionLatex(e.of)}\\ \\text{in}\\ ${unitLatex(e.unit)}`;
    case 'limit':
      return `${expressionLatex(e.of)}\\ \\text{as}\\ ${nameToLatex(e.variable)}\\to ${expressionLatex(e.to)}`;
  }
}

function signedTerm(term: Expression, sign: 1 | -1, index: number): string {
  const written =
    term.kind === 'sum' || term.kind === 'negation' ? tightLatex(term) : expressionLatex(term);
  if (sign < 0) return `-${written}`;
  return index === 0 ? written : `+${written}`;
}

/** Between brackets where it would come apart beside another factor or a sign. */
function tightLatex(e: Expression): string {
  const loose: readonly Expression['kind'][] = [
    'sum',
    'negation',
    'relation',
    'logical',
    'with',
    'in-unit',
  ];
  return loose.includes(e.kind) ? bracketed(expressionLatex(e)) : expressionLatex(e);
}

function powerBase(e: Expression): string {
  const simple = e.kind === 'name' || e.kind === 'number';
  return simple ? expressionLatex(e) : bracketed(expressionLatex(e));
}

/** What is divided by stands below one fraction line; a number over a number in front stays a coefficient. */
function productLatex(e: Kind<'product'>): string {
  const isCoefficient =
    e.factors.length > 2 &&
    e.inverted[1] &&
    e.factors[0].kind === 'number' &&
    e.factors[1].kind === 'number';
  if (!isCoefficient) return quotientLatex(e.factors, e.inverted);
  const coefficient = quotientLatex(e.factors.slice(0, 2), e.inverted.slice(0, 2));
  return `${coefficient}\\,${quotientLatex(e.factors.slice(2), e.inverted.slice(2))}`;
}

function quotientLatex(factors: readonly Expression[], inverted: readonly boolean[]): string {
  const above = factors.filter((_, i) => !inverted[i]);
  const below = factors.filter((_, i) => inverted[i]);
  if (below.length === 0) return sideLatex(above);
  return `\\frac{${above.length === 0 ? '1' : sideLatex(above)}}{${sideLatex(below)}}`;
}

/** A sign on the first factor may stand in front of the whole side. */
function sideLatex(factors: readonly Expression[]): string {
  const [first, ...rest] = factors;
  const head = first.kind === 'negation' || rest.length === 0 ? expressionLatex : tightLatex;
  return joinFactors([head(first), ...rest.map(tightLatex)]);
}

const RELATIONS = { '<': '<', '<=': '\\le ', '=': '=', '>=': '\\ge ', '>': '>' } as const;

function relationLatex(e: Kind<'relation'>): string {
  return e.sides
    .map((side, i) => (i === 0 ? '' : RELATIONS[e.operators[i - 1]]) + expressionLatex(side))
    .join('');
}

/** Dots over a name's letter, its subscript beside them; a derivative operator before anything else. */
function derivativeLatex({ of, order }: Kind<'derivative'>): string {
  if (of.kind === 'name' && order <= 3) {
    const [base, subscript] = splitSubscript(nameToLatex(of.name));
    return `\\${'d'.repeat(order)}ot{${base}}${subscript}`;
  }
  const power = order === 1 ? '' : `^{${order}}`;
  const operator = `\\frac{\\mathrm{d}${power}}{\\mathrm{d}t${power}}`;
  return `${operator}${of.kind === 'name' ? expressionLatex(of) : bracketed(expressionLatex(of))}`;
}

function splitSubscript(latex: string): [string, string] {
  const at = latex.indexOf('_');
  return at < 0 ? [latex, ''] : [latex.slice(0, at), latex.slice(at)];
}

function quantityLatex(e: Kind<'quantity'>): string {
  return e.unit === '' ? numberLatex(e.text) : `${numberLatex(e.text)}\\,${unitLatex(e.unit)}`;
}

/** A unit that only this worksheet knows is set as it was typed. */
function unitLatex(text: string): string {
  const unit = parseUnit(text);
  return isRefusal(unit) ? wordsLatex(text) : unitToLatex(unit);
}

function replacementLatex(r: Replacement): string {
  return `${nameToLatex(r.name)}=${expressionLatex(r.value)}`;
}

function matrixOf(e: Kind<'rows'>): string {
  const rows = e.rows.map((row) => row.map(expressionLatex).join(' & '));
  return `\\begin{bmatrix} ${rows.join(' \\\\ ')} \\end{bmatrix}`;
}
