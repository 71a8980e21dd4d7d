import { errorAt, type Problem } from '../base/index.ts';
import { formatExpression, type Expression, type Quantity } from '../language/index.ts';
import { formatNumber } from '../units/index.ts';
import type { Measured } from './frequency-rule.ts';

/**
 * The error of a ratio of densities that is compared with decibels: typed decibels are 20 log10, those of such a ratio
 * 10 log10. The fix writes the ratio itself.
 */
export function decibelsOfDensities(a: Measured, b: Measured): Problem | null {
  for (const [ratio, other] of [
    [a, b.of],
    [b, a.of],
  ] as const) {
    if (ratio.measure.densities && isDecibels(other)) return refusal(ratio.of, other);
  }
  return null;
}

function isDecibels(e: Expression): e is Quantity {
  return e.kind === 'quantity' && e.unit === 'dB';
}

function refusal(ratio: Expression, limit: Quantity): Problem {
  const plain = formatNumber(10 ** (Number(limit.text) / 10), 6);
  return errorAt(
    limit.span,
    'decibels-of-densities',
    `\`${formatExpression(ratio)}\` is a ratio of densities, of which decibels are 10 log10; write the ratio itself, \`${plain}\`.`,
    [{ title: `Write ${plain}`, edits: [{ span: limit.span, insert: plain }] }],
  );
}
