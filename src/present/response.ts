import {
  asRational,
  isZeroRatio,
  mulRatios,
  powRatio,
  ratioOf,
  subRatios,
  symbol,
  type Ratio,
} from '../algebra/index.ts';
import type { Response, ResponseImpulse, ResponseTerm } from '../control/index.ts';
import { formatNumber } from '../units/index.ts';
import { arrangeRatio } from './arrangement.ts';
import { latexOf } from './written-latex.ts';
import { textOf } from './written-text.ts';
import {
  productOf,
  raised,
  signed,
  sumOf,
  timesForms,
  type SignedTerm,
  type Written,
} from './written.ts';
import { layoutOf, timeLast, type Layout, type Writing } from './writing.ts';

const time = ratioOf(symbol('t'));

/** The terms of a response that begin at the same time. */
interface Stage {
  readonly after: Ratio;
  readonly terms: readonly SignedTerm[];
}

/**
 * A response as a function of t: `R/K - R exp(-K t/b)/K`. What begins later stands in square brackets with its time;
 * a response in decimals begins with ≈.
 */
export function responseText(response: Response, writing: Writing): string {
  const layout = layoutOf(timeLast(writing));
  const stages = stagesOf(response, layout).map(({ after, terms }) => {
    const sum = textOf(sumOf(terms));
    return isZeroRatio(after) ? sum : `[${sum} from t = ${textOf(arrangeRatio(after, layout))} on]`;
  });
  const whole = stages.length === 0 ? '0' : stages.join(' + ');
  return response.exact ? whole : `≈ ${whole}`;
}

/** The same response as {@link responseText}, as LaTeX. */
export function responseLatex(response: Response, writing: Writing): string {
  const layout = layoutOf(timeLast(writing));
  const stages = stagesOf(response, layout).map(({ after, terms }) => {
    const sum = latexOf(sumOf(terms));
    if (isZeroRatio(after)) return sum;
    return `\\left[${sum}\\right]_{t\\ge ${latexOf(arrangeRatio(after, layout))}}`;
  });
  const whole = stages.length === 0 ? '0' : stages.join('+');
  return response.exact ? whole : `\\approx ${whole}`;
}

/** Terms and impulses by the time at which they begin, the earliest first where times are numbers. */
function stagesOf(response: Response, layout: Layout): readonly Stage[] {
  const stages = new Map<string, { after: Ratio; terms: SignedTerm[] }>();
  const add = (after: Ratio, term: SignedTerm): void => {
    const key = textOf(arrangeRatio(after, layout));
    const stage = stages.get(key) ?? { after, terms: [] };
    stage.terms.push(term);
    stages.set(key, stage);
  };
  for (const impulse of response.impulses) add(impulse.after, impulseForm(impulse, layout));
  for (const term of response.terms) add(term.after, termForm(term, layout));
  return [...stages.values()].sort((a, b) => startOf(a) - startOf(b));
}

function startOf({ after }: Stage): number {
  const number = asRational(after);
  return number === null ? Number.MAX_VALUE : Number(number.n) / Number(number.d);
}

/** coefficient · t^power · e^(rate t) · wave(frequency t), with t − after for t. */
function termForm(term: ResponseTerm<Ratio> | ResponseTerm<number>, layout: Layout): SignedTerm {
  const since = subRatios(time, term.after);
  const argument = (amount: Ratio | number): Written => amountForm(amount, since, 1, layout);
  const factors: Written[] = [];
  if (!isZero(term.rate)) factors.push(called('exp', argument(term.rate)));
  if (term.wave !== 'none') factors.push(called(term.wave, argument(term.frequency)));
  const coefficient = amountForm(term.coefficient, since, term.power, layout);
  return asTerm(timesForms(coefficient, factors));
}

function isZero(amount: Ratio | number): boolean {
  return typeof amount === 'number' ? amount === 0 : isZeroRatio(amount);
}

function called(name: string, argument: Written): Written {
  return { kind: 'call', name, args: [argument] };
}

/** amount · since^power, exact or with four significant digits. */
function amountForm(amount: Ratio | number, since: Ratio, power: number, layout: Layout): Written {
  if (typeof amount !== 'number') {
    return arrangeRatio(mulRatios(amount, powRatio(since, power)), layout);
  }
  const number: Written = { kind: 'number', text: formatNumber(Math.abs(amount)) };
  const powers = power === 0 ? [] : [raised(arrangeRatio(since, layout), power)];
  return signed(amount < 0, productOf([number, ...powers]));
}

function asTerm(form: Written): SignedTerm {
  return form.kind === 'negative' ? { negative: true, of: form.of } : { negative: false, of: form };
}

/** An impulse: δ(t), or one of its derivatives. */
function impulseForm(impulse: ResponseImpulse, layout: Layout): SignedTerm {
  const since = arrangeRatio(subRatios(time, impulse.after), layout);
  const name = impulse.order === 0 ? 'delta' : `delta${"'".repeat(impulse.order)}`;
  return asTerm(
    timesForms(arrangeRatio(impulse.coefficient, layout), [{ kind: 'call', name, args: [since] }]),
  );
}
