import { refuse } from '../base/index.ts';
import type { SignalValue, SourceKind } from '../control/index.ts';
import { nameOf, signalOf } from './answer.ts';
import { one, type WorksheetFunction } from './spec.ts';

/** A signal with only the sources of one kind acting. */
function partOfKind(name: string, kind: SourceKind, words: string): WorksheetFunction {
  return {
    name,
    summary: `A signal with only its ${words} sources acting.`,
    source: null,
    example: `K is 2 1/s\nloop a driven by r\n  y' = K (r - y)\ncase one of a\n  r = step(1)\nfinal(${name}(one.y))`,
    parameters: [one('x', 'signal')],
    unit: 'first',
    availability: 'now',
    evaluate: ([x]) => keep(signalOf(x), name, (source) => source === kind),
  };
}

function keep(
  signal: SignalValue,
  name: string,
  wanted: (source: SourceKind, input: string) => boolean,
): SignalValue {
  const terms = signal.terms.filter((term) => wanted(term.source, term.input));
  return { ...signal, name: `${name}(${signal.name})`, terms };
}

const due: WorksheetFunction = {
  name: 'due',
  summary: 'A signal with only one input acting.',
  source: null,
  example:
    "K is 2 1/s\nloop a driven by r, w\n  y' = K (r - y) + w\ncase one of a\n  w = step(1 1/s)\nfinal(due(one.y, w))",
  parameters: [one('x', 'signal'), one('input', 'signal name')],
  unit: 'first',
  availability: 'now',
  evaluate: ([x, input]) => {
    const signal = signalOf(x);
    const { name } = nameOf(input);
    if (signal.inputs.includes(name)) return keep(signal, 'due', (_, own) => own === name);
    const inputs = signal.inputs.join(', ') || 'none';
    return refuse(
      'unknown-input',
      `${name} is not an input that acts on ${signal.name} (${inputs})`,
    );
  },
};

/** What acts on a signal, taken apart. */
export const SIGNAL_PARTS: readonly WorksheetFunction[] = [
  partOfKind('constant', 'constant', 'constant'),
  partOfKind('drifting', 'drifting', 'growing'),
  partOfKind('periodic', 'periodic', 'periodic'),
  partOfKind('random', 'random', 'random'),
  due,
];
