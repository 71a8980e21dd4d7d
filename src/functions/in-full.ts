import { onFormula } from './answer.ts';
import { one, type WorksheetFunction } from './spec.ts';

export const inFull: WorksheetFunction = {
  name: 'in_full',
  summary: 'A formula with its derived parameters opened down to assumptions.',
  source: null,
  example: 'k is 4 N/m\nm is 1 kg\nw0 = sqrt(k/m)\nin_full(2 w0)',
  parameters: [one('x', 'formula')],
  unit: 'first',
  availability: 'now',
  evaluate: ([x], { open }) => onFormula(x, open),
};
