import { isZeroPolynomial } from '../algebra/index.ts';
import { isRefusal, refuse, type Refusal } from '../base/index.ts';
import { stable as allStable, type StabilityBlock } from '../control/index.ts';
import { conditionAnswer, loopOf, nameOf, polynomialOf, ratioOfArgument } from './answer.ts';
import { one, optional, type Argument, type LoopMeaning, type WorksheetFunction } from './spec.ts';

export const stable: WorksheetFunction = {
  name: 'stable',
  summary:
    'Whether all roots of a loop, uncancelled and block by block, lie in the open left half plane; with a signal, only the blocks that it depends on.',
  source:
    'A. Liénard, M. H. Chipart (1914), in F. R. Gantmacher, The Theory of Matrices, vol. 2, Chelsea, 1959, ch. XV, § 13.',
  example: "K is 2 1/s\nloop a driven by r\n  y' = K (r - y)\nstable(a)",
  parameters: [one('loop', 'loop or polynomial'), optional('signal', 'signal name')],
  unit: 'number',
  availability: 'now',
  evaluate: ([subject, signal]) => {
    const blocks = blocksOf(subject, signal);
    return isRefusal(blocks) ? blocks : conditionAnswer(allStable(blocks));
  },
};

function blocksOf(
  subject: Argument,
  signal: Argument | undefined,
): readonly StabilityBlock[] | Refusal {
  if (subject.kind === 'loop') {
    const loop = loopOf(subject);
    return signal ? blocksOfSignal(loop, nameOf(signal).name) : loop.blocks(null);
  }
  if (signal) return refuse('no-loop', 'a signal is named only together with its loop');
  const polynomial = polynomialOf(ratioOfArgument(subject), 'stable');
  if (isRefusal(polynomial)) return polynomial;
  if (isZeroPolynomial(polynomial))
    return refuse('zero-polynomial', 'the polynomial is zero: every s is a root');
  return [{ signals: [], polynomial }];
}

function blocksOfSignal(loop: LoopMeaning, signal: string): readonly StabilityBlock[] | Refusal {
  const known = [...loop.closed.inputs, ...loop.closed.unknowns];
  if (known.includes(signal)) return loop.blocks(signal);
  return refuse(
    'unknown-signal',
    `${signal} is not a signal of ${loop.name}; its signals are ${known.join(', ')}`,
  );
}
