import type { Expression, Product, Replacement, Sum } from './ast.ts';

/** How tightly each kind of formula binds; a part that binds less tightly than its place needs brackets. */
const LEVELS = {
  in: 0,
  with: 1,
  or: 2,
  and: 3,
  not: 4,
  relation: 5,
  sum: 6,
  product: 7,
  sign: 8,
  power: 9,
  postfix: 10,
} as const;

type Level = (typeof LEVELS)[keyof typeof LEVELS];

function levelOf(e: Expression): Level {
  switch (e.kind) {
    case 'in-unit':
      return LEVELS.in;
    case 'with':
      return LEVELS.with;
    case 'logical':
      return LEVELS[e.operator];
    case 'not':
      return LEVELS.not;
    case 'relation':
      return LEVELS.relation;
    case 'sum':
      return e.terms.length === 1 ? levelOf(e.terms[0]!) : LEVELS.sum;
    case 'product':
      return LEVELS.product;
    case 'negation':
      return isSignedProduct(e.of) ? LEVELS.product : LEVELS.sign;
    case 'power':
      return LEVELS.power;
    case 'quantity':
    case 'number':
      return e.text.startsWith('-') ? LEVELS.sign : LEVELS.postfix;
    default:
      return LEVELS.postfix;
  }
}

function at(level: Level, e: Expression): string {
  const text = formatExpression(e);
  return levelOf(e) >= level ? text : `(${text})`;
}

function list(items: readonly Expression[]): string {
  return items.map(formatExpression).join(', ');
}

/** The text of a formula, which this language reads as the same formula again. */
export function formatExpression(e: Expression): string {
  switch (e.kind) {
    case 'number':
      return e.text;
    case 'quantity':
      return e.unit === '' ? e.text : `${e.text} [${e.unit}]`;
    case 'name':
      return e.name;
    case 'text':
      return `"${e.text}"`;
    case 'member':
      return `${at(LEVELS.postfix, e.of)}.${e.name}`;
    case 'derivative':
      return at(LEVELS.postfix, e.of) + "'".repeat(e.order);
    case 'call':
      return `${e.callee}(${list(e.args)})`;
    case 'evaluation':
      return `${e.name}(${formatExpression(e.at)})`;
    case 'arrow':
      return `${formatExpression(e.from)} -> ${list(e.to)}`;
    case 'limit':
      return `${formatExpression(e.of)} as ${e.variable} to ${at(LEVELS.sum, e.to)}`;
    case 'rows':
      return e.rows.map(list).join(' | ');
    default:
      return formatOperation(e);
  }
}

type Operation = Extract<
  Expression,
  {
    kind:
      | 'sum'
      | 'product'
      | 'negation'
      | 'power'
      | 'relation'
      | 'logical'
      | 'not'
      | 'with'
      | 'in-unit';
  }
>;

function formatOperation(e: Operation): string {
  switch (e.kind) {
    case 'sum':
      return formatSum(e);
    case 'product':
      return formatProduct(e);
    case 'negation':
      return `-${negated(e.of)}`;
    case 'power':
      return `${at(LEVELS.postfix, e.base)}^${at(LEVELS.sign, e.exponent)}`;
    case 'relation':
      return e.sides
        .map((side, k) => (k > 0 ? ` ${e.operators[k - 1]} ` : '') + at(LEVELS.sum, side))
        .join('');
    case 'logical':
      return e.operands
        .map((operand) => at(e.operator === 'or' ? LEVELS.and : LEVELS.not, operand))
        .join(` ${e.operator} `);
    case 'not':
      return `not ${at(LEVELS.not, e.of)}`;
    case 'with':
      return `${at(LEVELS.with, e.of)} with ${formatReplacements(e.replacements)}`;
    case 'in-unit':
      return `${at(LEVELS.in, e.of)} in ${e.unit}`;
  }
}

/** What a sign is put before. The sign of a product's first factor is the product's, so a product needs no brackets. */
function negated(e: Expression): string {
  return isSignedProduct(e) ? formatProduct(e, 'signed') : at(LEVELS.power, e);
}

function isSignedProduct(e: Expression): e is Product {
  return e.kind === 'product' && !e.inverted[0];
}

function formatReplacements(replacements: readonly Replacement[]): string {
  const texts = replacements.map(
    ({ name, by, value }) => `${name} ${by} ${formatReplaced(by, value)}`,
  );
  return texts.length === 1 ? texts[0]! : `(${texts.join(', ')})`;
}

function formatReplaced(by: Replacement['by'], value: Expression): string {
  const isPlain = by === 'is' && value.kind === 'quantity' && value.unit !== '';
  return isPlain ? `${value.text} ${value.unit}` : at(LEVELS.sum, value);
}

function formatSum({ terms, signs }: Sum): string {
  return terms
    .map((term, k) => {
      const text = at(LEVELS.product, term);
      if (k === 0) return signs[0] === -1 ? `-${negated(term)}` : text;
      return ` ${signs[k] === -1 ? '-' : '+'} ${text.startsWith('-') ? `(${text})` : text}`;
    })
    .join('');
}

/** Where a product stands: at the start of a term, after the sign of one, or after other factors. */
type Place = 'start' | 'signed' | 'later';

/** A product as `a b/(c d)`; one whose divisors come before further factors is grouped from the left. */
function formatProduct({ factors, inverted, span }: Product, place: Place = 'start'): string {
  const firstDivisor = inverted.indexOf(true);
  const above = firstDivisor < 0 ? factors : factors.slice(0, firstDivisor);
  const numerator = above.length === 0 ? '1' : juxtaposed(above, place);
  if (firstDivisor < 0) return numerator;
  const later = inverted.indexOf(false, firstDivisor);
  const below = factors.slice(firstDivisor, later < 0 ? undefined : later);
  const quotient = `${numerator}/${divisor(below)}`;
  if (later < 0) return quotient;
  const [factorsLeft, invertedLeft] = [factors.slice(later), inverted.slice(later)];
  const rest: Product = { kind: 'product', span, factors: factorsLeft, inverted: invertedLeft };
  return afterQuotient(quotient, formatProduct(rest, 'later'), place);
}

/** Goes on after a quotient, which needs brackets unless it is a leading coefficient, `1/2 s`. */
function afterQuotient(quotient: string, rest: string, place: Place): string {
  if (/^\d/.test(rest)) return `(${quotient})*${rest}`;
  const isCoefficient = place !== 'later' && /^-?[\d.]+\/[\d.]+$/.test(quotient);
  return isCoefficient && !/^pi\b/.test(rest) ? `${quotient} ${rest}` : `(${quotient}) ${rest}`;
}

function divisor(factors: readonly Expression[]): string {
  const [only, ...others] = factors;
  if (only && others.length === 0) return at(LEVELS.sign, only);
  return `(${juxtaposed(factors, 'start')})`;
}

/** Factors side by side; `*` where a number follows a number, which would otherwise read as one. */
function juxtaposed(factors: readonly Expression[], place: Place): string {
  let text = '';
  for (const [k, factor] of factors.entries()) {
    const part = k === 0 && place === 'start' ? firstFactor(factor) : at(LEVELS.power, factor);
    const isAfterNumber = /(^|[^\p{L}\d_])[\d.]+(e-?\d+)?$/iu.test(text) && /^\d/.test(part);
    text += k === 0 ? part : (isAfterNumber ? '*' : ' ') + part;
  }
  return text;
}

/** A first factor may have its sign; a product with a sign keeps brackets of its own. */
function firstFactor(factor: Expression): string {
  const isSigned = factor.kind === 'negation' && factor.of.kind === 'product';
  return isSigned ? `-(${formatProduct(factor.of)})` : at(LEVELS.sign, factor);
}
