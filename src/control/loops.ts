import {
  determinant,
  divideExactly,
  gcdPolynomials,
  isConstantPolynomial,
  isZeroPolynomial,
  isZeroRatio,
  lcmPolynomials,
  mulPolynomials,
  normalPart,
  onePolynomial,
  productOfPolynomials,
  ratioFromPolynomial,
  zeroPolynomial,
  quotientOf,
} from '../algebra/index.ts';
import type { Polynomial } from '../algebra/index.ts';
import { refuse } from '../base/index.ts';
import type { Budget, Refusal } from '../base/index.ts';
import { certifyCharacteristic } from './certificate.ts';
import {
  blocksOfStructure,
  matchEquations,
  overdetermined,
  underdetermined,
} from './loop-structure.ts';
import type { Fault, Incidence, Matching } from './loop-structure.ts';
import { contentFreeOfS } from './s-polynomial.ts';
import type { LoopRow, StabilityBlock } from './values.ts';

/** A block of signals that feed each other. */
export interface LoopBlock extends StabilityBlock {
  /** The equations that determine its signals, as indices of rows. */
  readonly equations: readonly number[];
  /** The blocks whose signals occur in its equations; all of them have smaller indices. */
  readonly dependsOn: readonly number[];
}

/** A row cleared of denominators: Σ coefficient · signal = 0 with polynomials. */
export interface ClearedRow {
  readonly coefficients: ReadonlyMap<string, Polynomial>;
  /** What the row was multiplied by. */
  readonly multiplier: Polynomial;
}

export interface ClosedLoop {
  readonly unknowns: readonly string[];
  readonly inputs: readonly string[];
  readonly rows: readonly LoopRow[];
  readonly cleared: readonly ClearedRow[];
  /** In block triangular order: a block comes after those it depends on. */
  readonly blocks: readonly LoopBlock[];
  /** Product of the blocks' polynomials: the determinant of the equations, before any cancellation. */
  readonly characteristic: Polynomial;
}

function clearRow(row: LoopRow, budget?: Budget): ClearedRow {
  const present = [...row.coefficients].filter(([, c]) => !isZeroPolynomial(c.num));
  const multiplier = present.reduce(
    (lcm, [, c]) => lcmPolynomials(lcm, c.den, budget),
    onePolynomial,
  );
  const coefficients = present.map(([name, c]): [string, Polynomial] => [
    name,
    mulPolynomials(c.num, quotientOf(multiplier, c.den, budget), budget),
  ]);
  return Object.freeze({ coefficients: new Map(coefficients), multiplier });
}

function incidenceOf(rows: readonly ClearedRow[], unknowns: readonly string[]): Incidence {
  return rows.map((row) => [...unknowns.keys()].filter((i) => row.coefficients.has(unknowns[i])));
}

const listed = (items: readonly string[]): string =>
  items.length < 2
    ? items.join('')
    : `${items.slice(0, -1).join(', ')} and ${items[items.length - 1]}`;

const equationList = (fault: Fault): string =>
  `${fault.equations.length === 1 ? 'equation' : 'equations'} ${listed(fault.equations.map((e) => String(e + 1)))}`;

const verb = (equations: readonly number[]): string => (equations.length === 1 ? 'holds' : 'hold');

function structuralFault(
  incidence: Incidence,
  matching: Matching,
  unknowns: readonly string[],
): Refusal | null {
  const few = underdetermined(incidence, matching);
  const many = overdetermined(incidence, matching);
  const named = (fault: Fault): string => listed(fault.unknowns.map((u) => unknowns[u]));
  const reasons: string[] = [];
  if (few.unknowns.length > 0) {
    reasons.push(
      few.equations.length === 0
        ? `no equation determines ${named(few)}`
        : `${named(few)} need ${few.unknowns.length} equations, but only ${equationList(few)} ${verb(few.equations)} them`,
    );
  }
  if (many.equations.length > 0) {
    reasons.push(
      many.unknowns.length === 0
        ? `${equationList(many)} ${verb(many.equations)} no unknown`
        : `${equationList(many)} are too many for ${named(many)} alone`,
    );
  }
  return reasons.length === 0 ? null : refuse('structurally-singular', reasons.join('; '));
}

/** The s-free factor that every term of a block's determinant has only because rows were cleared of denominators. */
function withoutClearing(
  determinantOfBlock: Polynomial,
  rows: readonly ClearedRow[],
  budget?: Budget,
): Polynomial {
  const cleared = productOfPolynomials(
    rows.map((row) => contentFreeOfS(row.multiplier, budget)),
    budget,
  );
  if (isConstantPolynomial(cleared)) return normalPart(determinantOfBlock);
  const common = gcdPolynomials(contentFreeOfS(determinantOfBlock, budget), cleared, budget);
  return normalPart(divideExactly(determinantOfBlock, common, budget) ?? determinantOfBlock);
}

function blockOf(
  loop: Pick<ClosedLoop, 'rows' | 'cleared' | 'unknowns'>,
  members: { readonly unknowns: readonly number[]; readonly equations: readonly number[] },
  budget?: Budget,
): (StabilityBlock & { readonly equations: readonly number[] }) | Refusal {
  const signals = members.unknowns.map((u) => loop.unknowns[u]);
  const rows = members.equations.map((e) => loop.cleared[e]);
  const matrix = rows.map((row) => signals.map((x) => row.coefficients.get(x) ?? zeroPolynomial));
  const value = determinant(matrix, budget);
  if (isZeroRatio(ratioFromPolynomial(value))) {
    const equations = equationList({ equations: members.equations, unknowns: [] });
    return refuse(
      'singular-loop',
      `${equations} do not determine ${listed(signals)}: their determinant is zero for every s`,
    );
  }
  const polynomial = withoutClearing(value, rows, budget);
  const written = members.equations.map((e) => loop.rows[e]);
  const multipliers = rows.map((row) => row.multiplier);
  certifyCharacteristic(written, signals, polynomial, multipliers);
  return { signals, equations: members.equations, polynomial };
}

function dependencies(
  structure: { readonly incidence: Incidence; readonly groups: readonly number[][] },
  equations: readonly number[],
  self: number,
): readonly number[] {
  const touched = new Set(equations.flatMap((e) => [...structure.incidence[e]]));
  return [...structure.groups.keys()].filter(
    (i) => i !== self && structure.groups[i].some((u) => touched.has(u)),
  );
}

/**
 * Closes a loop: sorts its equations into blocks of signals that feed each other and takes the characteristic
 * polynomial of every block from the equations as they stand, before any cancellation.
 *
 * Rows are cleared by the least common multiple of their denominators. The polynomials have integer content 1 and a
 * positive leading coefficient in canonical form; no factor in s is ever dropped, factors free of s only where they
 * came from clearing denominators. Refuses with `structurally-singular` (naming the signals and the equations) or
 * `singular-loop`. Cost: one fraction-free determinant for each block.
 */
export function closeLoop(
  rows: readonly LoopRow[],
  unknowns: readonly string[],
  inputs: readonly string[],
  budget?: Budget,
): ClosedLoop | Refusal {
  const cleared = rows.map((row) => clearRow(row, budget));
  const incidence = incidenceOf(cleared, unknowns);
  const matching = matchEquations(incidence, unknowns.length);
  const fault = structuralFault(incidence, matching, unknowns);
  if (fault) return fault;
  const groups = blocksOfStructure(incidence, matching);
  const blocks: LoopBlock[] = [];
  for (const [self, group] of groups.entries()) {
    const equations = group.map((u) => matching.equationOf[u]).sort((a, b) => a - b);
    const block = blockOf({ rows, cleared, unknowns }, { unknowns: group, equations }, budget);
    if ('kind' in block) return block;
    const dependsOn = dependencies({ incidence, groups }, equations, self);
    blocks.push(Object.freeze({ ...block, dependsOn }));
  }
  const characteristic = productOfPolynomials(
    blocks.map((b) => b.polynomial),
    budget,
  );
  return Object.freeze({ unknowns, inputs, rows, cleared, blocks, characteristic });
}

/** The index of the block that holds a signal; −1 for an input. */
export function blockIndex(loop: ClosedLoop, signal: string): number {
  return loop.blocks.findIndex((block) => block.signals.includes(signal));
}

/** The indices of the blocks that a signal depends on, its own and all upstream, ascending; none for an input. */
export function upstreamBlocks(loop: ClosedLoop, signal: string): readonly number[] {
  const found = new Set<number>([blockIndex(loop, signal)].filter((i) => i >= 0));
  for (const i of found) loop.blocks[i].dependsOn.forEach((k) => found.add(k));
  return [...found].sort((a, b) => a - b);
}

/** The blocks that a signal depends on: the one that holds it and all upstream of it. */
export function blocksOf(loop: ClosedLoop, signal: string): readonly StabilityBlock[] {
  return upstreamBlocks(loop, signal).map((i) => loop.blocks[i]);
}
