import {
  addRatios,
  divideExactly,
  gcdPolynomials,
  isConstantPolynomial,
  isZeroPolynomial,
  isZeroRatio,
  mulRatios,
  negPolynomial,
  negRatio,
  oneRatio,
  productOfPolynomials,
  ratio,
  solveLinear,
  subFractions,
  negFraction,
  fractionOfRatio,
  zeroPolynomial,
  zeroRatio,
} from '../algebra/index.ts';
import type { Fraction, Polynomial, Ratio } from '../algebra/index.ts';
import { invariant, isRefusal, refuse } from '../base/index.ts';
import type { Budget, Refusal } from '../base/index.ts';
import { certify, certifyOpening } from './certificate.ts';
import { blockIndex, closeLoop, upstreamBlocks } from './loops.ts';
import type { ClosedLoop, LoopBlock } from './loops.ts';
import { degreeInS, primitiveInS } from './s-polynomial.ts';
import type { LoopRow } from './values.ts';

/** A transfer function in lowest terms, with the modes that it does not show. */
export interface Transfer {
  readonly ratio: Ratio;
  /** Factor in s of the whole characteristic polynomial that is not in the reduced denominator; null if none. */
  readonly hidden: Polynomial | null;
  /** The part of it in blocks on the way from the input to the signal: modes that really cancelled. */
  readonly cancelled: Polynomial | null;
}

type Solutions = ReadonlyMap<string, Ratio>;

/** What feeds a block from outside: signals of other blocks and the input, each with its transfer from the input. */
function outside(
  loop: ClosedLoop,
  block: LoopBlock,
  known: Solutions,
): readonly { readonly name: string; readonly value: Ratio }[] {
  const names = new Set(block.equations.flatMap((e) => [...loop.cleared[e].coefficients.keys()]));
  return [...names]
    .filter((name) => !block.signals.includes(name))
    .map((name) => ({ name, value: known.get(name) ?? zeroRatio }))
    .filter(({ value }) => !isZeroRatio(value));
}

function solveBlock(
  loop: ClosedLoop,
  block: LoopBlock,
  known: Map<string, Ratio>,
  budget?: Budget,
): Refusal | null {
  const feeds = outside(loop, block, known);
  if (feeds.length === 0) return null;
  const rows = block.equations.map((e) => loop.cleared[e].coefficients);
  const entry = (row: ReadonlyMap<string, Polynomial>, name: string): Polynomial =>
    row.get(name) ?? zeroPolynomial;
  const matrix = rows.map((row) => block.signals.map((x) => entry(row, x)));
  const right = rows.map((row) => feeds.map(({ name }) => negPolynomial(entry(row, name))));
  const solved = solveLinear(matrix, right, budget);
  if (isRefusal(solved)) return solved;
  block.signals.forEach((signal, i) => {
    const shares = feeds.map(({ value }, k) =>
      mulRatios(ratio(solved.numerators[i][k], solved.determinant, budget), value),
    );
    known.set(
      signal,
      shares.reduce((sum, share) => addRatios(sum, share), zeroRatio),
    );
  });
  for (const e of block.equations) certify(loop.rows[e], known);
  return null;
}

const solutionsOf = new WeakMap<ClosedLoop, Map<string, Map<string, Ratio>>>();

/** The transfer functions found so far from an input, kept with the loop. */
function knownFrom(loop: ClosedLoop, input: string): Map<string, Ratio> {
  const byInput = solutionsOf.get(loop) ?? new Map<string, Map<string, Ratio>>();
  solutionsOf.set(loop, byInput);
  const known = byInput.get(input) ?? new Map([[input, oneRatio]]);
  byInput.set(input, known);
  return known;
}

/** Factor in s of a product of blocks that a reduced denominator does not hold; null if there is none. */
export function modesMissing(
  blocks: readonly Polynomial[],
  denominator: Polynomial,
  budget?: Budget,
): Polynomial | null {
  const all = productOfPolynomials(blocks, budget);
  const seen = gcdPolynomials(all, denominator, budget);
  const rest = divideExactly(all, seen, budget);
  invariant(rest, 'a gcd does not divide');
  const missing = primitiveInS(rest, budget);
  return isConstantPolynomial(missing) ? null : missing;
}

/** The blocks on the way from an input to a signal. */
function pathBlocks(loop: ClosedLoop, input: string, signal: string): readonly LoopBlock[] {
  const fed = new Set<number>();
  return upstreamBlocks(loop, signal)
    .filter((i) => {
      const { equations, dependsOn } = loop.blocks[i];
      const reached =
        equations.some((e) => loop.cleared[e].coefficients.has(input)) ||
        dependsOn.some((k) => fed.has(k));
      if (reached) fed.add(i);
      return reached;
    })
    .map((i) => loop.blocks[i]);
}

/**
 * The transfer function from an input to a signal, in lowest terms, with the modes hidden in it.
 *
 * Solved block by block, fraction-free within a block. The answer for a signal that the input does not reach is 0.
 * Refuses names that the loop does not have.
 */
export function transferFunction(
  loop: ClosedLoop,
  input: string,
  signal: string,
  budget?: Budget,
): Transfer | Refusal {
  if (!loop.inputs.includes(input))
    return refuse('unknown-input', `${input} is not an input of the loop`);
  const known = knownFrom(loop, input);
  if (blockIndex(loop, signal) < 0 && !loop.inputs.includes(signal)) {
    return refuse('unknown-signal', `${signal} is not a signal of the loop`);
  }
  for (const i of upstreamBlocks(loop, signal)) {
    const block = loop.blocks[i];
    if (known.has(block.signals[0])) continue;
    const refusal = solveBlock(loop, block, known, budget);
    if (refusal) return refusal;
  }
  const value = known.get(signal) ?? zeroRatio;
  const polynomials = (blocks: readonly LoopBlock[]): Polynomial[] =>
    blocks.map((b) => b.polynomial);
  return Object.freeze({
    ratio: value,
    hidden: modesMissing(polynomials(loop.blocks), value.den, budget),
    cancelled: modesMissing(polynomials(pathBlocks(loop, input, signal)), value.den, budget),
  });
}

/** The name that stands for a broken signal on the side that is fed; no worksheet can use it. */
const FED = 'the signal behind the break';

const one = fractionOfRatio(oneRatio);
const isFractionOne = (f: Fraction): boolean => isZeroPolynomial(subFractions(f, one).num);

/** The row that defines a signal, turned so that the signal's own coefficient is 1 where it was −1. */
function uprightRow(row: LoopRow, signal: string): LoopRow {
  const own = row.coefficients.get(signal);
  invariant(own, `the row that should define ${signal} does not hold it`);
  if (!isFractionOne(negFraction(own))) return row;
  const turned = [...row.coefficients].map(([name, c]): [string, Fraction] => [
    name,
    negFraction(c),
  ]);
  return { coefficients: new Map(turned) };
}

/** The row with coefficient 1 for the signal as its left side; what else it holds of the signal is fed. */
function definingRow({ coefficients }: LoopRow, signal: string): LoopRow {
  const own = coefficients.get(signal) as Fraction;
  const split = new Map(coefficients);
  if (!isFractionOne(own)) split.set(FED, subFractions(own, one));
  return { coefficients: split.set(signal, one) };
}

function fedRow(row: LoopRow, signal: string): LoopRow {
  const renamed = [...row.coefficients].map(([name, c]): [string, Fraction] => [
    name === signal ? FED : name,
    c,
  ]);
  return { coefficients: new Map(renamed) };
}

/**
 * The loop gain L with the loop broken at a signal, so that the characteristic equation is 1 + L = 0.
 *
 * `definedBy`: the index of the row that was written `signal = …` (as left − right = 0). Everything else that uses
 * the signal is fed from behind the break; L is minus the transfer across it. Refuses where the broken loop does not
 * determine the signal.
 */
export function openedAt(
  loop: ClosedLoop,
  signal: string,
  definedBy: number,
  budget?: Budget,
): Transfer | Refusal {
  const closed = loop.rows.map((row, i) => (i === definedBy ? uprightRow(row, signal) : row));
  const rows = closed.map((row, i) =>
    i === definedBy ? definingRow(row, signal) : fedRow(row, signal),
  );
  const opened = closeLoop(rows, loop.unknowns, [...loop.inputs, FED], budget);
  if (isRefusal(opened)) {
    return refuse(
      'singular-loop',
      `broken at ${signal}, the loop is not determined: ${opened.reason}`,
    );
  }
  const across = transferFunction(opened, FED, signal, budget);
  if (isRefusal(across)) return across;
  const ratio = negRatio(across.ratio);
  certifyOpening(closed, rows, loop.unknowns, ratio);
  return Object.freeze({ ...across, ratio });
}

/**
 * How a transfer function behaves at high frequency: `improper` if its gain grows without bound (it differentiates),
 * `proper` if it has a direct path, else `strictly proper`. Dead time counts as bounded.
 */
export function propernessOf(h: Ratio): 'strictly proper' | 'proper' | 'improper' {
  const excess = degreeInS(h.num) - degreeInS(h.den);
  if (isZeroRatio(h) || excess < 0) return 'strictly proper';
  return excess === 0 ? 'proper' : 'improper';
}
