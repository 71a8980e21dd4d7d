import {
  asRational,
  compareRational,
  divRatios,
  generatorsOfRatio,
  generatorsWithin,
  rational,
  ratioOf,
} from '../algebra/index.ts';
import type { Generator, Ratio } from '../algebra/index.ts';
import { TapeBuilder } from '../numeric/index.ts';
import { RatioCompiler, type Resolve } from './compile.ts';
import { notFound, type Finding } from './finding.ts';
import { FOUND_NUMBERS } from './found-numbers.ts';

/** A function of a formula whose value is found from numbers, such as `phase_margin`, compiled by itself. */
export interface CompiledFinding {
  readonly name: string;
  readonly inputs: readonly string[];
  /** The value with its reason, notes and crossings; inputs in the order of `inputs`. */
  find(values: ArrayLike<number>): Finding;
}

/** The functions in a formula whose values are found from numbers, inner ones first. */
export function compileFindings(r: Ratio, resolve: Resolve): readonly CompiledFinding[] {
  return generatorsWithin(generatorsOfRatio(r))
    .filter((g) => FOUND_NUMBERS.has(g.name) && g.args !== undefined)
    .map((g) => compileFinding(g, resolve));
}

function compileFinding(g: Generator, resolve: Resolve): CompiledFinding {
  const builder = new TapeBuilder();
  const layout = new RatioCompiler(builder, resolve).transfers(g.args ?? []);
  const tape = builder.build(layout?.slots ?? []);
  const { find } = FOUND_NUMBERS.get(g.name)!;
  return {
    name: g.name,
    inputs: tape.inputs,
    find: (values) =>
      layout
        ? find(...layout.read(tape.evaluate(values)))
        : notFound('its argument holds a function of s that is no dead time, or is not real'),
  };
}

/** The function whose value is found from numbers, where a formula is a positive number times one; else null. */
export function foundMultiple(r: Ratio): Generator | null {
  const [g] = generatorsOfRatio(r);
  if (!g?.args || !FOUND_NUMBERS.has(g.name)) return null;
  const factor = asRational(divRatios(r, ratioOf(g)));
  return factor && compareRational(factor, rational(0)) > 0 ? g : null;
}
