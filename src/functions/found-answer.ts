import { functionOf, laplace, ratioOf, type Ratio } from '../algebra/index.ts';
import type { FormulaValue } from '../control/index.ts';
import { formulaAnswer } from './answer.ts';

/** The formula that stands for a number found from its arguments, in which s is bound. */
export function foundAnswer(
  name: string,
  args: readonly Ratio[],
  more: Partial<FormulaValue> = {},
): FormulaValue {
  return formulaAnswer(ratioOf(functionOf(name, args, laplace)), more);
}
