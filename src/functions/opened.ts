import { isRefusal, refuse } from '../base/index.ts';
import { openedAt } from '../control/index.ts';
import { formulaAnswer, loopOf, nameOf } from './answer.ts';
import { hiddenNote } from './hidden-modes.ts';
import { one, type WorksheetFunction } from './spec.ts';

export const opened: WorksheetFunction = {
  name: 'opened',
  summary:
    'The loop gain L(s) with the loop broken at a signal; the characteristic equation is 1 + L = 0.',
  source: null,
  example: "K is 2 1/s\nloop a driven by r\n  u = K (r - y)\n  y' = u\nopened(a, u)",
  parameters: [one('loop', 'loop'), one('signal', 'signal name')],
  unit: 'number',
  availability: 'now',
  evaluate: ([subject, at], context) => {
    const loop = loopOf(subject);
    const { name } = nameOf(at);
    const row = loop.definedBy.get(name);
    if (row === undefined) {
      const places = [...loop.definedBy.keys()].join(', ') || 'none of its signals';
      return refuse(
        'not-a-breaking-point',
        `${loop.name} can be broken at a signal that is the whole left side of one equation (${places}), and ${name} is not`,
      );
    }
    const transfer = openedAt(loop.closed, name, row, context.budget);
    if (isRefusal(transfer)) return transfer;
    const note = hiddenNote(transfer.hidden, context.write);
    return formulaAnswer(transfer.ratio, {
      hidden: transfer.cancelled,
      origin: 'transfer',
      notes: note ? [note] : [],
    });
  },
};
