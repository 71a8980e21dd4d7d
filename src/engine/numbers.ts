import {
  asRational,
  derivativeRatio,
  dependsOn,
  fractionOfRatio,
  laplace,
  rationalToNumber,
  ratioOf,
  zeroRatio,
  divRatios,
  generatorsOfRatio,
  polynomialKey,
  ratioKey,
  type Polynomial,
  type Generator,
  type Ratio,
} from '../algebra/index.ts';
import { Budget, BudgetExceeded, isRefusal } from '../base/index.ts';
import {
  compileConditions,
  compileFindings,
  foundMultiple,
  compileRatios,
  stabilityConditions,
  YES,
  type CompiledConditions,
  type CompiledRatios,
  type Condition,
  type Finding,
  type Value,
} from '../control/index.ts';
import type { AssumptionStatement } from '../language/index.ts';
import { latinHypercube, seededRandom, type BatchInput } from '../numeric/index.ts';
import { formulaValue } from './arithmetic.ts';
import { readAssumption, type AssumptionReading } from './assumptions.ts';
import type { Catalogue } from './catalogue.ts';
import type { Derivations } from './derivations.ts';
import { exactRatio } from './quantities.ts';
import type { Queries } from './queries.ts';
import { BASE_SCOPE, narrowScope, type Scope } from './scope.ts';
import type { Outcome } from './stop.ts';

/** Something of the worksheet that has a value: a definition, a formula, a requirement's condition. */
export interface Subject {
  /** Equal keys mean the same formula. */
  readonly key: string;
  /** All names that it is derived from. */
  readonly reach: ReadonlySet<string>;
  derive(scope: Scope): Outcome<Value>;
}

/** Points at which a subject is evaluated: columns of SI values for the names that are not at their nominal. */
export interface Points {
  readonly count: number;
  readonly columns: ReadonlyMap<string, Float64Array>;
}

/** A subject's formula, its condition of existence and, for a relation, both sides, as compiled tapes. */
export interface Compiled {
  readonly value: Value;
  readonly ratios: CompiledRatios | null;
  readonly conditions: CompiledConditions;
  readonly inputs: readonly string[];
  /** Whether an infinite value can be judged, as in `gain_margin(L) >= 6 dB`. */
  readonly mayBeInfinite: boolean;
}

/** Values at points. `exists` says where the value exists; a condition's verdict is in `verdicts`. */
export interface Evaluated {
  readonly columns: readonly Float64Array[];
  readonly verdicts: Uint8Array;
  readonly exists: Uint8Array;
}

const CUBE_SEED = 20260101;
/** Work that may be spent on the conditions of one block. */
const CONDITIONS_BUDGET = 2_000_000;
/** Work that may be spent on one derivative. */
const DERIVATIVE_BUDGET = 400_000;

/**
 * The numeric stage: numbers of assumptions put into what was derived. A changed number runs nothing but this.
 *
 * Where a number is exactly 0 the subject is derived anew without that name, because a derivation in symbols may have
 * divided by it (a steady error with `Ki is 0` is the two-term controller's, not 0).
 */
export class Numbers {
  constructor(
    private readonly queries: Queries,
    private readonly derivations: Derivations,
  ) {}

  /** An assumption as read, or null where the name is none. */
  reading(name: string): Outcome<AssumptionReading> | null {
    return this.queries.get(`reading:${name}`, () => {
      const entry = this.queries.input<Catalogue>('catalogue').entries.get(name);
      if (entry?.kind !== 'assumption') return null;
      return readAssumption(entry.node as AssumptionStatement, this.derivations.customUnits());
    });
  }

  /** The nominal in SI units; null for a symbol without a value, or one in error. */
  nominal(name: string): number | null {
    return this.queries.get(`nominal:${name}`, () => {
      const reading = this.reading(name);
      return reading?.ok ? reading.value.value.value : null;
    });
  }

  /** Hard bounds of a toleranced assumption in SI units, or null. */
  bounds(name: string): readonly [number, number] | null {
    return this.queries.get(
      `bounds:${name}`,
      () => {
        const reading = this.reading(name);
        const tolerance = reading?.ok ? reading.value.tolerance : null;
        return tolerance && tolerance.low < tolerance.high
          ? ([tolerance.low, tolerance.high] as const)
          : null;
      },
      (a, b) => a === b || (a !== null && b !== null && a[0] === b[0] && a[1] === b[1]),
    );
  }

  /** The nominal exactly. */
  private exactNominal(name: string): Ratio | null {
    const reading = this.reading(name);
    return reading?.ok && reading.value.value.exact ? exactRatio(reading.value.value) : null;
  }

  /** The conditions under which a block is stable, which no number changes; null where they are too large to find. */
  stabilityConditions(polynomial: Polynomial): readonly Condition[] | null {
    return this.queries.get(`stability-conditions:${polynomialKey(polynomial)}`, () => {
      try {
        const budget = new Budget(CONDITIONS_BUDGET);
        return stabilityConditions(polynomial, this.derivations.signOf, budget);
      } catch (error) {
        if (error instanceof BudgetExceeded) return null;
        throw error;
      }
    });
  }

  /** A formula with derived parameters opened, kept over changes of numbers. */
  opened(ratio: Ratio): Ratio {
    return this.queries.get(`opened:${ratioKey(ratio)}`, () => this.derivations.open(ratio));
  }

  /** The derivative of a formula, kept over changes of numbers; null where it has none or is too large to find. */
  derivative(ratio: Ratio, g: Generator): Ratio | null {
    return this.queries.get(`derivative:${g.key}:${ratioKey(ratio)}`, () => {
      try {
        const derivative = derivativeRatio(ratio, g, new Budget(DERIVATIVE_BUDGET));
        return isRefusal(derivative) ? null : derivative;
      } catch (error) {
        if (error instanceof BudgetExceeded) return null;
        throw error;
      }
    });
  }

  /** The seeded points in the unit cube at which every box of so many names is looked at. */
  cube(dimensions: number, points: number): readonly Float64Array[] {
    return this.queries.get(`cube:${dimensions} ${points}`, () =>
      latinHypercube(seededRandom(CUBE_SEED), dimensions, points),
    );
  }

  /** What a symbol stands for in numbers. */
  readonly resolve = (g: Generator): Ratio | 'input' =>
    g.kind === 'symbol' ? (this.derivations.abbreviated(g.name) ?? 'input') : 'input';

  /** The subject derived in a scope and compiled; null where it cannot be derived. */
  compiled(subject: Subject, scope: Scope): Compiled | null {
    return this.queries.get(`compiled:${subject.key}@${scope.key}`, () => {
      const outcome = subject.derive(scope);
      return outcome.ok ? this.compile(outcome.value) : null;
    });
  }

  private compile(value: Value): Compiled {
    const list = ratiosIn(value);
    const ratios = list.length > 0 ? compileRatios(list, this.resolve) : null;
    const own: Condition =
      value.kind === 'condition' ? value.condition : { kind: 'truth', value: true };
    const exists: Condition = value.kind === 'none' ? { kind: 'truth', value: false } : value.when;
    const conditions = compileConditions([own, exists], this.resolve);
    const inputs = [...new Set([...(ratios?.inputs ?? []), ...conditions.inputs])];
    const mayBeInfinite =
      value.kind === 'condition' && list.some((side) => foundMultiple(side) !== null);
    return { value, ratios, conditions, inputs, mayBeInfinite };
  }

  /** What is made of a subject as it is derived, in symbols; kept while its derivation stands. Null where it has none. */
  derivedForm<Form>(subject: Subject, what: string, make: (value: Value) => Form): Form | null {
    return this.queries.get(`${what}:${subject.key}`, () => {
      const outcome = subject.derive(BASE_SCOPE);
      return outcome.ok ? make(outcome.value) : null;
    });
  }

  /** Names whose nominal is exactly 0 among those that a subject is derived from, derived parameters included. */
  zeros(subject: Subject): readonly string[] {
    return this.queries.get(
      `zeros:${subject.key}`,
      () => [...subject.reach].filter((name) => this.valueOfName(name) === 0),
      (a, b) => a.join() === b.join(),
    );
  }

  /** The nominal of an assumption or of a derived parameter. */
  valueOfName(name: string): number | null {
    return this.queries.get(`value of:${name}`, () => {
      const meaning = this.derivations.abbreviated(name);
      if (!meaning) return this.nominal(name);
      // By the values of the names in it, so that a long chain of parameters is gone through once.
      const { tape, inputs, outputs } = compileRatios([meaning], () => 'input');
      const values = inputs.map((input) => this.valueOfName(plainName(input)));
      return values.includes(null) ? null : tape.evaluate(values as number[])[outputs[0].re];
    });
  }

  /** What a derived parameter stands for; null for any other name. */
  meaning(name: string): Ratio | null {
    return this.derivations.abbreviated(name);
  }

  /** Whether a derived parameter depends on a toleranced name other than through `nominal`. */
  movesWithTolerance(name: string): boolean {
    return this.inputsOf(name).some((input) => this.bounds(input) !== null);
  }

  private dependsOnAny(name: string, names: ReadonlyMap<string, unknown>): boolean {
    return this.inputsOf(name).some((input) => names.has(input));
  }

  /** The assumptions behind a derived parameter, those held by `nominal` left out. */
  inputsOf(name: string): readonly string[] {
    return this.queries.get(`parameter-inputs:${name}`, () => {
      const meaning = this.derivations.abbreviated(name);
      if (!meaning) return [];
      return compileRatios([meaning], this.resolve).inputs.filter(
        (input) => plainName(input) === input,
      );
    });
  }

  /** The values of a derived parameter at points. */
  valuesOf(name: string, points: Points): Float64Array {
    const meaning = this.derivations.abbreviated(name)!;
    const { tape, inputs, outputs } = compileRatios([meaning], this.resolve);
    return tape.evaluateBatch(this.inputs(inputs, points), points.count)[outputs[0].re];
  }

  /** The number of a formula without s at nominal values; null where a symbol in it has none. */
  valueOfRatio(ratio: Ratio): number | null {
    const { tape, inputs, outputs } = compileRatios([ratio], this.resolve);
    const values = inputs.map((input) => this.nominal(plainName(input)));
    if (values.includes(null)) return null;
    return tape.evaluate(values as number[])[outputs[0].re];
  }

  /** The scope in which the named values are exactly 0. */
  zeroScope(names: readonly string[]): Scope {
    if (names.length === 0) return BASE_SCOPE;
    const zero = { value: formulaValue(zeroRatio), fraction: fractionOfRatio(zeroRatio), key: '0' };
    return narrowScope(BASE_SCOPE, new Map(names.map((name) => [name, zero])));
  }

  /** The scope in which every assumption that a subject reaches is its exact nominal: the last resort at a singular place. */
  exactScope(subject: Subject): Scope | null {
    const replacements = new Map();
    for (const name of subject.reach) {
      if (this.derivations.kindOf(name) !== 'assumption') continue;
      const exact = this.exactNominal(name);
      if (!exact) return null;
      replacements.set(name, {
        value: formulaValue(exact),
        fraction: fractionOfRatio(exact),
        key: String(this.nominal(name)),
      });
    }
    return narrowScope(BASE_SCOPE, replacements);
  }

  /** Inputs of a compiled subject that have no number. */
  missing(compiled: Compiled): readonly string[] {
    return [...new Set(compiled.inputs.map(plainName))].filter(
      (name) => this.nominal(name) === null,
    );
  }

  /** Evaluates a compiled subject at points; names without a column are at their nominal. */
  evaluate(compiled: Compiled, points: Points): Evaluated {
    const { ratios, conditions } = compiled;
    const columns = ratios
      ? ratios.tape.evaluateBatch(this.inputs(ratios.inputs, points), points.count)
      : [];
    const [own, when] = conditions.evaluate(this.inputs(conditions.inputs, points), points.count);
    const exists = when.map((verdict) => (verdict === YES ? 1 : 0));
    for (const column of columns) {
      for (let i = 0; i < points.count; i++) {
        const isJudged = compiled.mayBeInfinite && column[i] === Infinity;
        if (!Number.isFinite(column[i]) && !isJudged) exists[i] = 0;
      }
    }
    return { columns, verdicts: own, exists };
  }

  /** What is found for the functions in a value whose numbers come from a search, at one point. */
  findings(value: Value, at: Points): readonly Finding[] {
    return ratiosIn(value).flatMap((ratio) =>
      compileFindings(this.opened(ratio), this.resolve).map(({ inputs, find }) =>
        find(
          this.inputs(inputs, at).map((input) => (typeof input === 'number' ? input : input[0])),
        ),
      ),
    );
  }

  /** Inputs of a tape at points. */
  inputs(names: readonly string[], points: Points): BatchInput[] {
    return names.map((name) => points.columns.get(name) ?? this.nominal(plainName(name)) ?? NaN);
  }

  /**
   * Evaluates a subject at points, each with the derivation that holds there: points at which some names are exactly 0
   * use what is derived without these names. Null where nothing can be derived.
   */
  evaluateSubject(subject: Subject, points: Points): Evaluated | null {
    const groups = this.groupByZeros(subject, points);
    const parts: { indices: readonly number[]; evaluated: Evaluated }[] = [];
    for (const { zeros, indices } of groups) {
      const compiled = this.compiled(subject, this.zeroScope(zeros));
      if (!compiled) return null;
      const whole = indices.length === points.count;
      parts.push({
        indices,
        evaluated: this.evaluate(compiled, whole ? points : pick(points, indices)),
      });
      if (whole) return parts[0].evaluated;
    }
    return scatter(parts, points.count);
  }

  /** The subject as it is derived at one of several points; null where it cannot be derived. */
  compiledAt(subject: Subject, points: Points, index: number): Compiled | null {
    const [group] = this.groupByZeros(subject, pick(points, [index]));
    return this.compiled(subject, this.zeroScope(group.zeros));
  }

  private groupByZeros(subject: Subject, points: Points): { zeros: string[]; indices: number[] }[] {
    const zero = this.zeros(subject).filter((name) => !points.columns.has(name));
    const moving = zero.filter((name) => this.dependsOnAny(name, points.columns));
    const fixed = zero.filter((name) => !moving.includes(name));
    const varying = [
      ...[...points.columns].filter(([name]) => subject.reach.has(name)),
      ...moving.map((name) => [name, this.valuesOf(name, points)] as const),
    ];
    const groups = new Map<string, { zeros: string[]; indices: number[] }>();
    for (let i = 0; i < points.count; i++) {
      const zeros = [
        ...fixed,
        ...varying.filter(([, column]) => column[i] === 0).map(([name]) => name),
      ];
      const key = zeros.join(' ');
      const group = groups.get(key) ?? { zeros, indices: [] };
      group.indices.push(i);
      groups.set(key, group);
    }
    return [...groups.values()];
  }
}

/** `nominal(J)` reads the nominal of J. */
export function plainName(input: string): string {
  return input.startsWith('nominal(') ? input.slice('nominal('.length, -1) : input;
}

/** The formulas of a value that have a number: itself, both sides of a relation, the parts of a list. */
function ratiosIn(value: Value): readonly Ratio[] {
  if (value.kind === 'formula') return dependsOn(value.ratio, laplace) ? [] : [value.ratio];
  if (value.kind === 'condition' && value.condition.kind === 'compare') {
    return [value.condition.left, value.condition.right];
  }
  if (value.kind === 'matrix') {
    const entries = value.rows.flat();
    return entries.some((entry) => dependsOn(entry, laplace)) ? [] : entries;
  }
  return [];
}

function pick(points: Points, indices: readonly number[]): Points {
  const columns = new Map(
    [...points.columns].map(
      ([name, column]) => [name, Float64Array.from(indices, (index) => column[index])] as const,
    ),
  );
  return { count: indices.length, columns };
}

function scatter(
  parts: readonly { indices: readonly number[]; evaluated: Evaluated }[],
  count: number,
): Evaluated {
  const width = Math.max(...parts.map((part) => part.evaluated.columns.length));
  const columns = Array.from({ length: width }, () => new Float64Array(count).fill(NaN));
  const verdicts = new Uint8Array(count);
  const exists = new Uint8Array(count);
  for (const { indices, evaluated } of parts) {
    indices.forEach((index, at) => {
      evaluated.columns.forEach((column, k) => (columns[k][index] = column[at]));
      verdicts[index] = evaluated.verdicts[at];
      exists[index] = evaluated.exists[at] && evaluated.columns.length === width ? 1 : 0;
    });
  }
  return { columns, verdicts, exists };
}

/** A formula that is a number times one magnitude, `3 abs(x)`: the number and x. */
export function asMagnitude(ratio: Ratio): { factor: number; inner: Ratio } | null {
  for (const g of generatorsOfRatio(ratio)) {
    if (g.kind !== 'function' || g.name !== 'abs') continue;
    const factor = asRational(divRatios(ratio, ratioOf(g)));
    return factor ? { factor: rationalToNumber(factor), inner: g.args![0] } : null;
  }
  return null;
}
