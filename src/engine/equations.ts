import {
  addFractions,
  divFractions,
  fractionOfRatio,
  generatorsOf,
  isZeroPolynomial,
  laplace,
  mulFractions,
  negFraction,
  oneRatio,
  powFraction,
  ratioOf,
  zeroRatio,
  type Fraction,
} from '../algebra/index.ts';
import type { Span } from '../base/index.ts';
import {
  formatExpression,
  type Derivative,
  type Expression,
  type Power,
  type Product,
  type Sum,
} from '../language/index.ts';
import type { Meanings } from './meanings.ts';
import type { Scope } from './scope.ts';
import { memberPath } from './paths.ts';
import { stopAt } from './stop.ts';

/**
 * A formula of a loop equation as a linear form: Σ coefficient · signal + Σ coefficient · initial value + constant.
 * Coefficients are uncancelled fractions in s; initial values are named `θ(0)`, `θ'(0)`.
 */
export interface LinearForm {
  readonly signals: ReadonlyMap<string, Fraction>;
  readonly initials: ReadonlyMap<string, Fraction>;
  readonly constant: Fraction;
}

/** Which names of an equation are signals, and what they are called in the loop that is being put together. */
export interface SignalNames {
  signalOf(name: string): string | null;
}

const ZERO = fractionOfRatio(zeroRatio);
const S = fractionOfRatio(ratioOf(laplace));
const NONE: ReadonlyMap<string, Fraction> = new Map();

/** Reads a formula of an equation; stops at products of signals, functions of signals and other non-linear parts. */
export function linearForm(
  expression: Expression,
  names: SignalNames,
  scope: Scope,
  meanings: Meanings,
): LinearForm {
  const inner = (part: Expression) => linearForm(part, names, scope, meanings);
  const signal = signalNamed(expression, names);
  if (signal !== null) return single(signal);
  if (!hasSignal(expression, names)) {
    return {
      signals: NONE,
      initials: NONE,
      constant: meanings.evaluateFraction(expression, scope),
    };
  }
  switch (expression.kind) {
    case 'sum':
      return sumForm(expression, inner);
    case 'product':
      return productForm(expression, inner);
    case 'negation':
      return mapForm(inner(expression.of), negFraction);
    case 'derivative':
      return derivativeForm(expression, inner(expression.of));
    case 'power':
      return powerForm(expression, inner);
  }
  stopAt(
    expression.span,
    'not-linear',
    `\`${formatExpression(expression)}\` is not linear in the signals; ` +
      'a loop takes sums of signals times formulas in s. Linearise it about the working point.',
  );
}

/** The name of the signal that an expression is, or null. */
export function signalNamed(expression: Expression, names: SignalNames): string | null {
  if (expression.kind === 'name') return names.signalOf(expression.name);
  if (expression.kind === 'member') {
    const path = memberPath(expression);
    return path === null ? null : names.signalOf(path);
  }
  if (expression.kind === 'evaluation' && isTransformVariable(expression.at))
    return names.signalOf(expression.name);
  return null;
}

/** In a loop `e(s)` is e itself. */
function isTransformVariable(at: Expression): boolean {
  return at.kind === 'name' && at.name === 's';
}

function hasSignal(expression: Expression, names: SignalNames): boolean {
  if (signalNamed(expression, names) !== null) return true;
  switch (expression.kind) {
    case 'sum':
      return expression.terms.some((part) => hasSignal(part, names));
    case 'product':
      return expression.factors.some((part) => hasSignal(part, names));
    case 'negation':
    case 'derivative':
    case 'not':
    case 'in-unit':
    case 'with':
      return hasSignal(expression.of, names);
    case 'power':
      return hasSignal(expression.base, names) || hasSignal(expression.exponent, names);
    case 'relation':
      return expression.sides.some((part) => hasSignal(part, names));
    case 'logical':
      return expression.operands.some((part) => hasSignal(part, names));
    case 'call':
      return expression.args.some((part) => part.kind !== 'arrow' && hasSignal(part, names));
    case 'evaluation':
      return hasSignal(expression.at, names);
    default:
      return false;
  }
}

function single(signal: string): LinearForm {
  return {
    signals: new Map([[signal, fractionOfRatio(oneRatio)]]),
    initials: NONE,
    constant: ZERO,
  };
}

function mapForm(form: LinearForm, change: (coefficient: Fraction) => Fraction): LinearForm {
  const mapped = (terms: ReadonlyMap<string, Fraction>) =>
    new Map([...terms].map(([name, coefficient]) => [name, change(coefficient)] as const));
  return {
    signals: mapped(form.signals),
    initials: mapped(form.initials),
    constant: change(form.constant),
  };
}

function addTerms(
  a: ReadonlyMap<string, Fraction>,
  b: ReadonlyMap<string, Fraction>,
): Map<string, Fraction> {
  const sum = new Map(a);
  for (const [name, coefficient] of b) {
    const present = sum.get(name);
    const total = present ? addFractions(present, coefficient) : coefficient;
    if (isZeroPolynomial(total.num)) sum.delete(name);
    else sum.set(name, total);
  }
  return sum;
}

/** a + b. */
export function addForms(a: LinearForm, b: LinearForm): LinearForm {
  return {
    signals: addTerms(a.signals, b.signals),
    initials: addTerms(a.initials, b.initials),
    constant: addFractions(a.constant, b.constant),
  };
}

/** −a. */
export function negateForm(form: LinearForm): LinearForm {
  return mapForm(form, negFraction);
}

function sumForm(sum: Sum, inner: (part: Expression) => LinearForm): LinearForm {
  return sum.terms
    .map((term, index) => (sum.signs[index] < 0 ? negateForm(inner(term)) : inner(term)))
    .reduce(addForms);
}

function productForm(product: Product, inner: (part: Expression) => LinearForm): LinearForm {
  let total: LinearForm | null = null;
  product.factors.forEach((factor, index) => {
    const form = inner(factor);
    if (product.inverted[index]) total = divideForm(total!, form, factor);
    else total = total ? multiplyForms(total, form, product) : form;
  });
  return total!;
}

function divideForm(total: LinearForm, by: LinearForm, factor: Expression): LinearForm {
  if (by.signals.size > 0) {
    stopAt(
      factor.span,
      'not-linear',
      `Dividing by \`${formatExpression(factor)}\`, which holds a signal, is not linear.`,
    );
  }
  if (isZeroPolynomial(by.constant.num)) {
    stopAt(factor.span, 'division-by-zero', 'This divides by an expression that is identically 0.');
  }
  return mapForm(total, (coefficient) => divFractions(coefficient, by.constant));
}

function multiplyForms(a: LinearForm, b: LinearForm, product: Product): LinearForm {
  if (a.signals.size > 0 && b.signals.size > 0) {
    stopAt(
      product.span,
      'not-linear',
      `\`${formatExpression(product)}\` multiplies signals (${[...a.signals.keys()][0]} and ` +
        `${[...b.signals.keys()][0]}); a loop must be linear in its signals. Linearise it about the working point.`,
    );
  }
  const [form, factor] =
    a.signals.size > 0 || a.initials.size > 0 ? [a, b.constant] : [b, a.constant];
  return mapForm(form, (coefficient) => mulFractions(coefficient, factor));
}

function powerForm(power: Power, inner: (part: Expression) => LinearForm): LinearForm {
  if (power.exponent.kind === 'number' && power.exponent.text === '1') return inner(power.base);
  stopAt(
    power.span,
    'not-linear',
    `\`${formatExpression(power)}\` is a power of a signal; a loop must be linear in its signals. ` +
      'Linearise it about the working point.',
  );
}

/**
 * L{x⁽ⁿ⁾} = sⁿ X − sⁿ⁻¹ x(0) − … − x⁽ⁿ⁻¹⁾(0). Initial values are kept where the bracket's coefficients are free of s;
 * a filtered signal starts at rest.
 */
function derivativeForm(derivative: Derivative, of: LinearForm): LinearForm {
  const n = derivative.order;
  const raised = mapForm(of, (coefficient) => mulFractions(coefficient, power(n)));
  const initials = new Map(raised.initials);
  for (const [signal, coefficient] of of.signals) {
    if ([...generatorsOf(coefficient.num), ...generatorsOf(coefficient.den)].includes(laplace))
      continue;
    for (let k = 0; k < n; k++) {
      const share = negFraction(mulFractions(coefficient, power(n - 1 - k)));
      const name = initialValueName(signal, k);
      const present = initials.get(name);
      initials.set(name, present ? addFractions(present, share) : share);
    }
  }
  return { ...raised, initials };
}

function power(k: number): Fraction {
  return k === 0 ? fractionOfRatio(oneRatio) : powFraction(S, k);
}

/** What the initial value of a signal's k-th derivative is called among a loop's inputs. */
export function initialValueName(signal: string, order: number): string {
  return `${signal}${"'".repeat(order)}(0)`;
}

/** Stops at an equation that has a term without a signal. */
export function refuseConstant(form: LinearForm, span: Span): void {
  if (isZeroPolynomial(form.constant.num)) return;
  stopAt(
    span,
    'constant-term',
    'This equation has a term without a signal; make it an input of the loop and give it a value in a load case.',
  );
}
