import {
  applyFunction,
  divRatios,
  equalRatios,
  generatorsOfRatio,
  isConstantPolynomial,
  mulRatios,
  ratioFromPolynomial,
  signOfPolynomial,
  substituteRatio,
  symbolsOfRatio,
  type Generator,
  type Ratio,
  type SignOf,
} from '../algebra/index.ts';
import { isRefusal } from '../base/index.ts';
import { compileRatios, truth, undecided, type Condition } from '../control/index.ts';
import { conditionAnswer, ratioOfArgument } from './answer.ts';
import { one, type WorksheetFunction } from './spec.ts';

export const same: WorksheetFunction = {
  name: 'same',
  summary: 'Whether two formulas are identically equal, derived parameters opened.',
  source: null,
  example: 'same((s + 1)^2, s^2 + 2 s + 1)',
  parameters: [one('a', 'formula'), one('b', 'formula')],
  unit: 'number',
  availability: 'now',
  evaluate: ([a, b], { open, signOf }) =>
    conditionAnswer(
      sameness(
        rootsOfProducts(open(ratioOfArgument(a)), signOf),
        rootsOfProducts(open(ratioOfArgument(b)), signOf),
        signOf,
      ),
    ),
};

/** Rational forms are canonical; with functions in them, unlike forms may still be equal, and only unlike values refute it. */
function sameness(a: Ratio, b: Ratio, signOf: SignOf): Condition {
  if (equalRatios(a, b)) return truth(true);
  const hasFunctions = [a, b].some((side) =>
    generatorsOfRatio(side).some(({ kind }) => kind === 'function'),
  );
  if (!hasFunctions || !agreeAtPoints(a, b, signOf)) return truth(false);
  return undecided(
    `the two sides agree at ${POINTS} points, but their forms differ, so it is not proved`,
  );
}

/** √(p/q) as √(p q)/q where q is positive: then roots over different denominators can meet. */
function rootsOfProducts(r: Ratio, signOf: SignOf): Ratio {
  const values = new Map<Generator, Ratio>();
  for (const g of generatorsOfRatio(r)) {
    if (g.kind !== 'function' || g.name !== 'sqrt') continue;
    const { num, den } = g.args![0];
    if (isConstantPolynomial(den) || signOfPolynomial(den, signOf) !== 'positive') continue;
    const [above, below] = [ratioFromPolynomial(num), ratioFromPolynomial(den)];
    const root = applyFunction('sqrt', [mulRatios(above, below)]);
    if (!isRefusal(root)) values.set(g, divRatios(root, below));
  }
  const rewritten = substituteRatio(r, values);
  return isRefusal(rewritten) ? r : rewritten;
}

const POINTS = 7;
const AGREEMENT = 1e-9;
/** Steps of an additive sequence that fills the unit interval evenly. */
const GOLDEN = 0.6180339887498949;

/** Whether both sides have one value, or none, at a few fixed points that respect the signs. */
function agreeAtPoints(a: Ratio, b: Ratio, signOf: SignOf): boolean {
  const { tape, inputs, outputs } = compileRatios([a, b], () => 'input');
  const signs = new Map(
    [...symbolsOfRatio(a), ...symbolsOfRatio(b)].map((g) => [g.name, signOf(g)] as const),
  );
  return Array.from({ length: POINTS }).every((_, point) => {
    const values = tape.evaluate(
      inputs.map((name, index) => {
        const size = 0.5 + (((point * inputs.length + index + 1) * GOLDEN) % 1);
        const sign = signs.get(name);
        const isNegative = sign === 'negative' || (sign === 'unknown' && (point + index) % 2 === 1);
        return isNegative ? -size : size;
      }),
    );
    const [left, right] = outputs;
    const part = (place: number | null) => (place === null ? 0 : values[place]);
    return nearlyEqual(part(left.re), part(right.re)) && nearlyEqual(part(left.im), part(right.im));
  });
}

function nearlyEqual(a: number, b: number): boolean {
  if (Number.isNaN(a) && Number.isNaN(b)) return true;
  return Math.abs(a - b) <= AGREEMENT * (Math.abs(a) + Math.abs(b));
}
