import { errorAt, warningAt, type Problem } from '../base/index.ts';
import { formatExpression, type Expression, type InUnit } from '../language/index.ts';

/** What the rules on °C read of a worksheet. */
export interface TemperatureSource {
  /** The typed unit of a name, or null. */
  unitText(name: string): string | null;
  /** The formula of a definition, or null. */
  formulaOf(name: string): Expression | null;
  /** Whether a formula gives a signal, or a number that is read from one. */
  isOfSignal(expression: Expression): boolean;
}

/**
 * How often a formula counts the zero point of temperatures: 1 for a temperature, 0 for a difference of two, null where it
 * cannot be told, as for a name in K. Signals are 0 before t = 0, so that they are differences.
 */
function zeroPoints(e: Expression, source: TemperatureSource, depth = 0): number | null {
  const inner = (part: Expression) => zeroPoints(part, source, depth + 1);
  if (depth > DEEPEST) return null;
  if (source.isOfSignal(e)) return 0;
  switch (e.kind) {
    case 'quantity':
      return isCelsius(e.unit) ? 1 : null;
    case 'name': {
      const formula = source.formulaOf(e.name);
      if (formula) return inner(formula);
      return isCelsius(source.unitText(e.name)) ? 1 : null;
    }
    case 'negation':
      return scaled(-1, inner(e.of));
    case 'sum':
      return e.terms
        .map((term, index) => scaled(e.signs[index], inner(term)))
        .reduce((sum, term) => (sum === null || term === null ? null : sum + term));
    case 'call':
      return e.callee === 'abs' && e.args.length === 1 && inner(e.args[0]) === 0 ? 0 : null;
    case 'with':
    case 'in-unit':
      return inner(e.of);
    default:
      return null;
  }
}

/** Definitions are followed no deeper. */
const DEEPEST = 50;

function isCelsius(unit: string | null): boolean {
  return unit === '°C' || unit === 'degC';
}

function scaled(factor: number, weight: number | null): number | null {
  return weight === null ? null : factor * weight;
}

/** The error of a difference of temperatures that is to be shown in °C, whose zero point it does not have. */
export function celsiusOfDifference(e: InUnit, source: TemperatureSource): Problem | null {
  if (!isCelsius(e.unit) || zeroPoints(e.of, source) !== 0) return null;
  return errorAt(
    e.unitSpan,
    'temperature-difference',
    `\`${formatExpression(e.of)}\` is a difference of temperatures, and °C has a zero point; show it in K.`,
    [{ title: 'Write K', edits: [{ span: e.unitSpan, insert: 'K' }] }],
  );
}

/** The error of a difference of temperatures that is compared with a temperature. */
export function comparedTemperatures(
  left: Expression,
  right: Expression,
  source: TemperatureSource,
): Problem | null {
  const [a, b] = [left, right].map((side) => zeroPoints(side, source));
  if (a === null || b === null || a === b) return null;
  const [difference, temperature] = a === 0 ? [left, right] : [right, left];
  const fixes =
    temperature.kind === 'quantity'
      ? [{ title: 'Write K', edits: [{ span: temperature.unitSpan, insert: 'K' }] }]
      : [];
  return errorAt(
    temperature.span,
    'temperature-difference',
    `\`${formatExpression(difference)}\` is a difference of temperatures, and \`${formatExpression(temperature)}\` is a temperature; a difference is given in K.`,
    fixes,
  );
}

/** The warning for a source whose size is a temperature: signals begin at 0, which is absolute zero then. */
export function temperatureSource(size: Expression, source: TemperatureSource): Problem | null {
  if (zeroPoints(size, source) !== 1) return null;
  return warningAt(
    size.span,
    'temperature-source',
    `\`${formatExpression(size)}\` is a temperature, and signals begin at 0, which is absolute zero; give the rise in K.`,
  );
}
