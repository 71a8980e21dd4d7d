import {
  addMatrices,
  addRatios,
  dependsOn,
  divRatios,
  functionOf,
  inverseMatrix,
  isZeroRatio,
  laplace,
  mulRatios,
  multiplyMatrices,
  negRatio,
  oneRatio,
  powRatio,
  asRational,
  ratioOf,
  sqrtOf,
  type Ratio,
} from '../algebra/index.ts';
import {
  ALWAYS,
  allOf,
  type FormulaValue,
  type MatrixValue,
  type SignalValue,
  type Value,
} from '../control/index.ts';
import type { Span } from '../base/index.ts';
import { demand, stopAt } from './stop.ts';

/** A formula value without conditions. */
export function formulaValue(ratio: Ratio, from: Partial<FormulaValue> = {}): FormulaValue {
  return {
    kind: 'formula',
    ratio,
    hidden: null,
    origin: 'formula',
    when: ALWAYS,
    notes: [],
    ...from,
  };
}

/** What two operands hand on to their result: both conditions, all notes. */
export function inherited(a: Value, b: Value): { when: Value['when']; notes: readonly string[] } {
  return { when: allOf([a.when, b.when]), notes: [...new Set([...a.notes, ...b.notes])] };
}

/** Names a value's kind in a message. */
export function kindInWords(value: Value): string {
  switch (value.kind) {
    case 'formula':
      return 'a formula';
    case 'none':
      return 'a result without a value';
    case 'condition':
      return 'a condition';
    case 'signal':
      return `the signal ${value.name}`;
    case 'matrix':
      return `a ${value.rows.length}×${value.rows[0]?.length ?? 0} matrix`;
    case 'array':
      return 'a Routh array';
    case 'roots':
      return `a list of ${value.of}`;
    case 'parts':
      return 'a list of results';
    case 'text':
      return 'a closed form in t';
  }
}

/** a + b, for formulas, matrices of one size, and signals. */
export function addValues(a: Value, b: Value, span: Span): Value {
  if (a.kind === 'none') return { ...a, ...inherited(a, b) };
  if (b.kind === 'none') return { ...b, ...inherited(a, b) };
  if (a.kind === 'formula' && b.kind === 'formula') {
    return formulaValue(addRatios(a.ratio, b.ratio), inherited(a, b));
  }
  if (a.kind === 'matrix' && b.kind === 'matrix') {
    return { ...a, ...inherited(a, b), rows: demand(addMatrices(a.rows, b.rows), span) };
  }
  if (a.kind === 'signal' && b.kind === 'signal') return addSignals(a, b);
  stopAt(span, 'cannot-add', `${kindInWords(a)} and ${kindInWords(b)} cannot be added.`);
}

function addSignals(a: SignalValue, b: SignalValue): SignalValue {
  const blocks = [...a.blocks, ...b.blocks.filter((block) => !a.blocks.includes(block))];
  return {
    ...a,
    ...inherited(a, b),
    name: `${a.name} + ${b.name}`,
    terms: [...a.terms, ...b.terms],
    blocks,
  };
}

/** −a. */
export function negateValue(a: Value, span: Span): Value {
  return mulValues(formulaValue(negRatio(oneRatio)), a, span);
}

/** a · b; matrices in order. */
export function mulValues(a: Value, b: Value, span: Span): Value {
  if (a.kind === 'none') return { ...a, ...inherited(a, b) };
  if (b.kind === 'none') return { ...b, ...inherited(a, b) };
  if (a.kind === 'formula' && b.kind === 'formula') {
    return formulaValue(mulRatios(a.ratio, b.ratio), inherited(a, b));
  }
  if (a.kind === 'formula') return scaleValue(b, a, span);
  if (b.kind === 'formula') return scaleValue(a, b, span);
  if (a.kind === 'matrix' && b.kind === 'matrix') {
    refuseUnfitting(a, b, span);
    return unwrapSingle({
      ...a,
      ...inherited(a, b),
      rows: demand(multiplyMatrices(a.rows, b.rows), span),
    });
  }
  stopAt(span, 'cannot-multiply', `${kindInWords(a)} and ${kindInWords(b)} cannot be multiplied.`);
}

function refuseUnfitting(a: MatrixValue, b: MatrixValue, span: Span): void {
  if (a.rows[0].length === b.rows.length) return;
  const [left, right] = [a, b].map((matrix) => kindInWords(matrix));
  const message = `${left} cannot be multiplied by ${right}: a row of the first needs as many entries as a column of the second.`;
  stopAt(span, 'matrices-do-not-fit', message);
}

/** A 1×1 matrix is a number. */
export function unwrapSingle(matrix: MatrixValue): Value {
  const single = matrix.rows.length === 1 && matrix.rows[0].length === 1;
  return single
    ? formulaValue(matrix.rows[0][0], { when: matrix.when, notes: matrix.notes })
    : matrix;
}

function scaleValue(value: Value, factor: FormulaValue, span: Span): Value {
  const handed = inherited(value, factor);
  if (value.kind === 'matrix') {
    return {
      ...value,
      ...handed,
      rows: value.rows.map((row) => row.map((entry) => mulRatios(entry, factor.ratio))),
    };
  }
  if (value.kind === 'signal') {
    const terms = value.terms.map((term) => ({
      ...term,
      transform: mulRatios(term.transform, factor.ratio),
    }));
    return { ...value, ...handed, name: `(${value.name})`, terms };
  }
  stopAt(span, 'cannot-multiply', `${kindInWords(value)} cannot be multiplied by a formula.`);
}

/** a / b. */
export function divValues(a: Value, b: Value, span: Span): Value {
  if (b.kind === 'none') return { ...b, ...inherited(a, b) };
  if (b.kind === 'formula') {
    if (isZeroRatio(b.ratio))
      stopAt(span, 'division-by-zero', 'This divides by an expression that is identically 0.');
    return mulValues(a, { ...b, ratio: divRatios(oneRatio, b.ratio) }, span);
  }
  stopAt(span, 'cannot-divide', `Nothing can be divided by ${kindInWords(b)}.`);
}

/** a ^ b: integer powers of formulas and square matrices, half-integer powers of parameters as roots. */
export function powValues(a: Value, b: Value, span: Span): Value {
  if (a.kind === 'none') return a;
  if (b.kind !== 'formula')
    stopAt(span, 'bad-exponent', `An exponent is a number, not ${kindInWords(b)}.`);
  const exponent = asRational(b.ratio);
  if (!exponent) return powerOfSymbol(a, b, span);
  if (exponent.d === 1n) return integerPower(a, Number(exponent.n), span);
  if (exponent.d === 2n && a.kind === 'formula') {
    if (dependsOn(a.ratio, laplace))
      stopAt(span, 'bad-exponent', 'A root acts on parameters, and this depends on s.');
    return formulaValue(powRatio(sqrtOf(a.ratio), Number(exponent.n)), inherited(a, b));
  }
  stopAt(
    span,
    'bad-exponent',
    'An exponent is an integer or a half; write other powers with exp and log.',
  );
}

function powerOfSymbol(a: Value, b: FormulaValue, span: Span): Value {
  if (a.kind === 'formula' && asRational(a.ratio)) {
    return formulaValue(
      functionRatio('exp', mulRatios(b.ratio, functionRatio('log', a.ratio))),
      inherited(a, b),
    );
  }
  stopAt(span, 'bad-exponent', 'An exponent is a number; write other powers with exp and log.');
}

function functionRatio(name: string, argument: Ratio): Ratio {
  return ratioOf(functionOf(name, [argument]));
}

const LARGEST_EXPONENT = 500;

function integerPower(a: Value, exponent: number, span: Span): Value {
  if (Math.abs(exponent) > LARGEST_EXPONENT) {
    stopAt(span, 'exponent-too-large', `The exponent ${exponent} is beyond ${LARGEST_EXPONENT}.`);
  }
  if (a.kind === 'formula') {
    if (exponent < 0 && isZeroRatio(a.ratio))
      stopAt(span, 'division-by-zero', 'This is a negative power of 0.');
    return formulaValue(powRatio(a.ratio, exponent), { when: a.when, notes: a.notes });
  }
  if (a.kind === 'matrix') return matrixPower(a, exponent, span);
  stopAt(span, 'cannot-raise', `${kindInWords(a)} has no powers.`);
}

function matrixPower(a: MatrixValue, exponent: number, span: Span): Value {
  if (exponent === -1) return { ...a, rows: demand(inverseMatrix(a.rows), span) };
  if (exponent < 1) stopAt(span, 'cannot-raise', 'A matrix has the powers -1, 1, 2, 3, …');
  let power: Value = a;
  for (let k = 1; k < exponent; k++) power = mulValues(power, a, span);
  return power;
}
