import { applyFunction, negRatio, signOfRatio, type SignOf } from '../algebra/index.ts';
import { formulaAnswer, ratioOfArgument } from './answer.ts';
import { one, rest, type Argument, type UnitRule, type WorksheetFunction } from './spec.ts';

/** A function of one parameter that every handbook has, exact where its value is rational. */
function elementary(
  name: string,
  summary: string,
  unit: UnitRule,
  example: string,
): WorksheetFunction {
  return {
    name,
    summary,
    source: null,
    example,
    parameters: [one('x', 'parameter')],
    unit,
    availability: 'now',
    evaluate: ([x]) => answer(name, [x]),
  };
}

/** The least or the largest of several parameters of one unit. */
function extreme(name: 'min' | 'max', summary: string): WorksheetFunction {
  return {
    name,
    summary,
    source: null,
    example: `a is 2 N m\nb is 3 N m\n${name}(a, b)`,
    parameters: [one('a', 'parameter'), rest('b', 'parameter')],
    unit: 'common',
    availability: 'now',
    evaluate: (args) => answer(name, args),
  };
}

function answer(
  name: string,
  args: Parameters<WorksheetFunction['evaluate']>[0],
): ReturnType<WorksheetFunction['evaluate']> {
  const value = applyFunction(name, args.map(ratioOfArgument));
  return value.kind === 'refusal' ? value : formulaAnswer(value);
}

/** Without the bars where the signs settle it. */
function magnitude(x: Argument, signOf: SignOf): ReturnType<WorksheetFunction['evaluate']> {
  const ratio = ratioOfArgument(x);
  switch (signOfRatio(ratio, signOf)) {
    case 'positive':
    case 'nonnegative':
    case 'zero':
      return formulaAnswer(ratio);
    case 'negative':
    case 'nonpositive':
      return formulaAnswer(negRatio(ratio));
    default:
      return answer('abs', [x]);
  }
}

/** Functions of parameters. */
export const ELEMENTARY: readonly WorksheetFunction[] = [
  elementary('sqrt', 'The square root of a parameter.', 'root', 'k is 4 N/m\nm is 1 kg\nsqrt(k/m)'),
  {
    ...elementary('abs', 'The magnitude of a parameter.', 'first', 'a is -2 N m\nabs(a)'),
    evaluate: ([x], { signOf }) => magnitude(x, signOf),
  },
  elementary('exp', 'The exponential function of a pure number.', 'pure', 'x is 1\nexp(x)'),
  elementary('log', 'The natural logarithm of a pure number.', 'pure', 'x is 2\nlog(x)'),
  elementary('sin', 'The sine of an angle.', 'pure', 'a is 30°\nsin(a)'),
  elementary('cos', 'The cosine of an angle.', 'pure', 'a is 60°\ncos(a)'),
  elementary('tan', 'The tangent of an angle.', 'pure', 'a is 45°\ntan(a)'),
  elementary(
    'atan',
    'The angle between -90° and 90° whose tangent is given.',
    'pure',
    'x is 1\natan(x)',
  ),
  extreme('min', 'The least of several parameters.'),
  extreme('max', 'The largest of several parameters.'),
];
