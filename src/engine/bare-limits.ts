import { errorAt, type Problem } from '../base/index.ts';
import { formatExpression, type Expression } from '../language/index.ts';
import { unitAsTyped } from '../units/index.ts';
import type { Measured } from './frequency-rule.ts';
import { fitsAnywhere, isPure, measureText } from './measures.ts';

/**
 * The error of a bare number that limits a quantity with a unit in a requirement, with the fix; null where the limit is
 * none such. 0 fits any unit. On the right a limit is a quantity slot, on the left the unit needs square brackets.
 */
export function bareLimit(
  quantity: Measured,
  limit: Expression,
  side: 'left' | 'right',
): Problem | null {
  const { measure } = quantity;
  if (!isBareNumber(limit) || fitsAnywhere(measure)) return null;
  if (measure.unknowns.size > 0 || isPure(measure)) return null;
  const unit = measureText(measure);
  const typed = unitAsTyped(unit);
  const fixed = `${formatExpression(limit)} ${side === 'right' ? typed : `[${typed}]`}`;
  return errorAt(
    limit.span,
    'bare-limit',
    `\`${formatExpression(quantity.of)}\` is in ${unit}, and the limit ${formatExpression(limit)} has no unit; write \`${fixed}\`.`,
    [{ title: `Write ${fixed}`, edits: [{ span: limit.span, insert: fixed }] }],
  );
}

function isBareNumber(limit: Expression): boolean {
  const number = limit.kind === 'negation' ? limit.of : limit;
  return number.kind === 'number' && Number(number.text) !== 0;
}
