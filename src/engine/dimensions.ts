import { errorAt, type Problem, type Span } from '../base/index.ts';
import type { UnitRule, WorksheetFunction } from '../functions/index.ts';
import { sourceNamed, type SourceArgument } from '../functions/index.ts';
import {
  formatExpression,
  nameToText,
  type Call,
  type CaseStatement,
  type Expression,
  type LoopStatement,
  type Product,
  type Quantity,
  type RequireStatement,
  type SourceTerm,
  type Statement,
  type Sum,
} from '../language/index.ts';
import { isRefusal } from '../base/index.ts';
import { parseUnit, type CustomUnits } from '../units/index.ts';
import {
  ANGULAR,
  ANGULAR_FREQUENCY,
  angleOf,
  angleToCycles,
  cyclesOf,
  cyclesToAngle,
  DERIVATIVE,
  divMeasures,
  fitsAnywhere,
  FREE,
  FREQUENCY,
  Inference,
  LAPLACE,
  measureOfUnit,
  measureText,
  mulMeasures,
  NUMBER,
  powMeasure,
  quotientOf,
  PURE,
  saidAngle,
  TIME,
  withoutPerAngle,
  unknownMeasure,
  type Measure,
} from './measures.ts';
import { bareLimit } from './bare-limits.ts';
import { culpritOf } from './culprit.ts';
import { decibelsOfDensities } from './decibels.ts';
import { frequencyWarning, type FixPlace, type Measured } from './frequency-rule.ts';
import { memberPath } from './paths.ts';
import {
  celsiusOfDifference,
  comparedTemperatures,
  temperatureSource,
  type TemperatureSource,
} from './temperatures.ts';

/** What the check of dimensions reads of a worksheet. None of it is a number. */
export interface DimensionSource {
  readonly statements: readonly Statement[];
  entry(name: string): Statement | null;
  /** Names to be measured before a name with many behind it, so that a long chain is no deep recursion. */
  longChainBehind(name: string): readonly string[];
  /** The typed unit of an assumption, '' for none; or of a `has unit` statement; null for a symbol without either. */
  unitText(name: string): string | null;
  signalsOf(loop: LoopStatement): ReadonlySet<string>;
  functionNamed(name: string): WorksheetFunction | undefined;
  readonly customUnits: CustomUnits;
}

/** What came out of the check. */
export interface DimensionReport {
  readonly problems: ReadonlyMap<Statement, readonly Problem[]>;
  /** The measure of a formula, or null where nothing gives one. */
  measureOf(expression: Expression): Measure | null;
  /** The measure of a name, also of one that was inferred. */
  measureOfName(name: string): Measure | null;
}

/**
 * Checks the dimensions of every formula and equation, and infers those of signals and of symbols without a value.
 * A bare number, or a name without a unit, fits wherever it stands.
 */
export function checkDimensions(source: DimensionSource): DimensionReport {
  const check = new DimensionCheck(source);
  check.run();
  return check.report();
}

/** The loop whose signals are names in the expression, with the prefix that its signals have in the whole. */
interface Surroundings {
  readonly loop: LoopStatement;
  readonly owner: string;
  readonly prefix: string;
}

type Equation = LoopStatement['equations'][number];

/** Something that a loop or one of its load cases says of the units of signals. */
interface Constraint {
  readonly statement: Statement;
  check(): void;
  /** Says what is wrong with it, after all others were taken for true. */
  explain(): void;
}

/** A term of an equation, by its side. */
interface Term {
  readonly of: Expression;
  readonly sign: 1 | -1;
  readonly side: 'left' | 'right';
}

function termsOf(side: Expression, name: Term['side']): Term[] {
  if (side.kind !== 'sum') return [{ of: side, sign: 1, side: name }];
  return side.terms.map((of, index) => ({ of, sign: side.signs[index], side: name }));
}

class DimensionCheck {
  private inference = new Inference();
  private readonly measures = new Map<Expression, Measure>();
  private names = new Map<string, Measure>();
  private problems = new Map<Statement, readonly Problem[]>();
  private started = new Set<string>();
  private statement: Statement | null = null;

  constructor(private readonly source: DimensionSource) {}

  private readonly temperatures: TemperatureSource = {
    unitText: (name) => this.source.unitText(name),
    formulaOf: (name) => {
      const entry = this.source.entry(name);
      return entry?.kind === 'definition' ? entry.formula : null;
    },
    isOfSignal: (expression) => this.isOfSignal(expression),
  };

  /** Whether a formula is a signal of a case, or a function of one that has its unit. */
  private isOfSignal(e: Expression): boolean {
    if (e.kind === 'call') {
      const isValue = this.source.functionNamed(e.callee)?.unit === 'signal';
      return isValue && e.args.length > 0 && this.isOfSignal(e.args[0]);
    }
    if (e.kind === 'derivative' || e.kind === 'with') return this.isOfSignal(e.of);
    if (e.kind !== 'member') return false;
    let root: Expression = e.of;
    while (root.kind === 'member' || root.kind === 'with') root = root.of;
    return root.kind === 'name' && this.source.entry(root.name)?.kind === 'case';
  }

  run(): void {
    const order: Statement['kind'][] = [
      'loop',
      'definition',
      'formula',
      'require',
      'draw',
      'explain',
    ];
    for (const kind of order) {
      for (const statement of this.source.statements) {
        if (statement.kind === kind) this.within(statement, () => this.checkStatement(statement));
      }
    }
  }

  report(): DimensionReport {
    const settled = (measure: Measure | undefined): Measure | null => {
      if (!measure) return null;
      const known = this.inference.settle(measure);
      return known.unknowns.size === 0 && !fitsAnywhere(known) ? known : null;
    };
    return {
      problems: this.problems,
      measureOf: (expression) => settled(this.measures.get(expression)),
      measureOfName: (name) => settled(this.names.get(name)),
    };
  }

  private within(statement: Statement, check: () => void): void {
    const outer = this.statement;
    this.statement = statement;
    check();
    this.statement = outer;
  }

  private complain(problem: Problem): void {
    const list = this.problems.get(this.statement!) ?? [];
    this.problems.set(this.statement!, [...list, problem]);
  }

  private checkStatement(statement: Statement): void {
    switch (statement.kind) {
      case 'loop':
        return this.checkLoop(statement);
      case 'definition':
        this.measureOfName(statement.name);
        return;
      case 'formula':
      case 'explain':
        this.measure(statement.formula, null);
        return;
      case 'require':
        return this.checkRequirement(statement);
      case 'draw':
        for (const part of [...statement.of, ...statement.where]) this.measure(part, null);
        if (statement.over) this.expect(statement.over, TIME, 'a time');
        return;
    }
  }

  /**
   * Checks the equations of a loop and its load cases together, since each says something of the signals' units. Where they
   * contradict each other, the one that the others do without is told what they say.
   */
  private checkLoop(loop: LoopStatement): void {
    const constraints = [
      ...this.equationsOf(loop, { loop, owner: loop.name, prefix: '' }),
      ...this.source.statements.flatMap((statement) =>
        statement.kind === 'case' && statement.loop.name === loop.name
          ? this.caseConstraints(statement, loop)
          : [],
      ),
    ];
    const start = this.state();
    const errorsWithout = (left: Constraint | null): number => {
      this.restore(start);
      const kept = constraints.filter((constraint) => constraint !== left);
      for (const { statement, check } of kept) this.within(statement, check);
      return this.errorCount - start.errors;
    };
    if (errorsWithout(null) === 0) return;
    const culprit = culpritOf(constraints, errorsWithout);
    errorsWithout(culprit);
    if (culprit) this.within(culprit.statement, culprit.explain);
  }

  /** All that is known so far. */
  private state() {
    return {
      inference: this.inference.copy(),
      names: new Map(this.names),
      started: new Set(this.started),
      problems: new Map(this.problems),
      errors: this.errorCount,
    };
  }

  private restore(state: ReturnType<DimensionCheck['state']>): void {
    this.inference = state.inference.copy();
    this.names = new Map(state.names);
    this.started = new Set(state.started);
    this.problems = new Map(state.problems);
  }

  private get errorCount(): number {
    return [...this.problems.values()].flat().filter(({ severity }) => severity === 'error').length;
  }

  private equationsOf(loop: LoopStatement, surroundings: Surroundings): Constraint[] {
    const used = loop.uses.flatMap((use) => {
      const inner = this.source.entry(use.loop.name);
      if (inner?.kind !== 'loop' || inner === loop) return [];
      const prefix = use.prefix ? `${surroundings.prefix}${use.prefix.name}.` : surroundings.prefix;
      return this.equationsOf(inner, { loop: inner, owner: surroundings.owner, prefix });
    });
    const own = loop.equations.map((equation) => ({
      statement: this.statement!,
      check: () => this.checkEquation(equation, surroundings),
      explain: () => this.explainEquation(equation, surroundings),
    }));
    return [...used, ...own];
  }

  private checkEquation({ left, right, span }: Equation, surroundings: Surroundings): void {
    const [a, b] = [left, right].map((side) => this.measure(side, surroundings));
    this.agree(left, a, right, b, span, 'equation');
  }

  /** Says which term of an equation the others do without. */
  private explainEquation(equation: Equation, surroundings: Surroundings): void {
    const start = this.state();
    const terms = [...termsOf(equation.left, 'left'), ...termsOf(equation.right, 'right')].map(
      (term) => ({ ...term, measure: this.measure(term.of, surroundings) }),
    );
    const disagreements = (left: (typeof terms)[number] | null): number => {
      this.restore(start);
      const [first, ...others] = terms.filter((term) => term !== left);
      return others.filter(({ measure }) => !this.inference.unify(first.measure, measure)).length;
    };
    const odd =
      terms.length > 2 && this.errorCount === start.errors ? culpritOf(terms, disagreements) : null;
    disagreements(odd);
    const beside = odd && terms.find((term) => term !== odd && term.side === odd.side);
    if (!odd || !beside) return this.checkEquation(equation, surroundings);
    const [first, second] =
      terms.indexOf(beside) < terms.indexOf(odd) ? [beside, odd] : [odd, beside];
    const where = second.sign < 0 ? 'difference' : 'sum';
    this.agree(first.of, first.measure, second.of, second.measure, equation.span, where);
  }

  private signal(owner: string, path: string): Measure {
    return unknownMeasure(`signal ${owner}.${path}`);
  }

  private caseConstraints(statement: CaseStatement, loop: LoopStatement): Constraint[] {
    const sources = statement.inputs.flatMap((line) =>
      line.sources.map((term) => () => this.checkSource(line, term, loop)),
    );
    const starts = statement.starts.map((start) => () => this.checkStart(start, loop));
    return [...sources, ...starts].map((check) => ({ statement, check, explain: check }));
  }

  private checkSource(
    line: CaseStatement['inputs'][number],
    term: SourceTerm,
    loop: LoopStatement,
  ): void {
    const signal = this.signal(loop.name, line.input.name);
    const wanted = mulMeasures(signal, powMeasure(DERIVATIVE, line.order));
    const measure = this.sourceMeasure(term.source);
    if (measure && !this.inference.unify(wanted, measure))
      this.sourceConflict(term.source, line.input.name, measure, wanted);
    if (term.after) this.expect(term.after, TIME, 'a time');
  }

  private checkStart(start: CaseStatement['starts'][number], loop: LoopStatement): void {
    const path = memberPath(start.signal.kind === 'derivative' ? start.signal.of : start.signal);
    if (path === null) return;
    const wanted = mulMeasures(this.signal(loop.name, path), powMeasure(DERIVATIVE, start.order));
    const measure = this.measure(start.value, null);
    this.agree(start.signal, wanted, start.value, measure, start.span, 'value');
  }

  /** A source's size has the unit of its input, times s for each integration. */
  private sourceMeasure(source: Expression): Measure | null {
    if (source.kind === 'product') {
      const call = source.factors.at(-1)!;
      const inner = this.sourceMeasure(call);
      const scale = source.factors.slice(0, -1).map((factor) => this.measure(factor, null));
      return inner && scale.reduce(mulMeasures, inner);
    }
    if (source.kind !== 'call' || source.args.length === 0) return null;
    const spec = sourceNamed(source.callee);
    const warning = temperatureSource(source.args[0], this.temperatures);
    if (warning) this.complain(warning);
    if (!spec || spec.availability === 'later') return null;
    return spec.parameters
      .map(({ takes }, index) => this.argumentMeasure(takes, source.args[index]))
      .reduce(mulMeasures, powMeasure(DERIVATIVE, 1 - spec.power));
  }

  /** What an argument of a source adds to the unit of its size. */
  private argumentMeasure(takes: SourceArgument['takes'], arg: Expression | undefined): Measure {
    if (!arg) return FREE;
    if (takes === 'frequency') {
      this.expect(arg, ANGULAR_FREQUENCY, 'a frequency');
      return PURE;
    }
    const measure = this.measure(arg, null);
    return takes === 'density' ? sizeOfNoise(measure) : measure;
  }

  private sourceConflict(
    source: Expression,
    input: string,
    measure: Measure,
    wanted: Measure,
  ): void {
    const [have, need] = [this.inference.settle(measure), this.inference.settle(wanted)];
    this.complain(
      errorAt(
        source.span,
        'dimension',
        `The input ${nameToText(input)} is in ${measureText(need)}, and \`${formatExpression(source)}\` gives ${measureText(have)}.`,
      ),
    );
  }

  private expect(expression: Expression, wanted: Measure, words: string): void {
    const measure = this.measure(expression, null);
    if (this.inference.unify(measure, wanted)) return;
    const text = `\`${formatExpression(expression)}\` is in ${measureText(this.inference.settle(measure))}, and ${words} is needed here.`;
    this.complain(errorAt(expression.span, 'dimension', text));
  }

  private checkRequirement(statement: RequireStatement): void {
    this.measure(statement.condition, null);
    for (const relation of relationsIn(statement.condition)) {
      relation.sides
        .slice(1)
        .forEach((right, index) => this.checkLimits(relation.sides[index], right));
    }
  }

  private checkLimits(left: Expression, right: Expression): void {
    const [a, b] = [left, right].map((of) => this.measured(of));
    const problem = (a && bareLimit(a, right, 'right')) ?? (b && bareLimit(b, left, 'left'));
    if (problem) this.complain(problem);
  }

  /** A formula with what is known of its measure by now. */
  private measured(of: Expression): Measured | null {
    const measure = this.measures.get(of);
    return measure ? { of, measure: this.inference.settle(measure) } : null;
  }

  private measureOfName(name: string): Measure {
    const known = this.names.get(name);
    if (known) return known;
    if (this.started.has(name)) return FREE;
    for (const earlier of this.source.longChainBehind(name)) this.measureNew(earlier);
    return this.measureNew(name);
  }

  private measureNew(name: string): Measure {
    const known = this.names.get(name);
    if (known) return known;
    this.started.add(name);
    const measure = this.introducedMeasure(name);
    this.names.set(name, measure);
    return measure;
  }

  private introducedMeasure(name: string): Measure {
    const entry = this.source.entry(name);
    if (entry?.kind === 'definition') {
      let measure = FREE;
      this.within(entry, () => {
        measure = this.measure(entry.formula, null);
      });
      return measure;
    }
    const unit = this.source.unitText(name);
    if (unit === null) return entry ? unknownMeasure(`symbol ${name}`) : FREE;
    return unit === '' ? FREE : this.unitMeasure(unit);
  }

  private unitMeasure(text: string): Measure {
    const unit = parseUnit(text, this.source.customUnits);
    return isRefusal(unit) ? FREE : measureOfUnit(unit);
  }

  private measure(expression: Expression, around: Surroundings | null): Measure {
    const measure = this.compute(expression, around);
    if (around === null || around.prefix === '') this.measures.set(expression, measure);
    return measure;
  }

  private compute(expression: Expression, around: Surroundings | null): Measure {
    const inner = (part: Expression) => this.measure(part, around);
    switch (expression.kind) {
      case 'number':
        return Number(expression.text) === 0 ? FREE : NUMBER;
      case 'quantity':
        return this.quantityMeasure(expression);
      case 'name':
        return this.nameMeasure(expression.name, around);
      case 'member':
        return this.memberMeasure(expression, around);
      case 'derivative':
        return mulMeasures(inner(expression.of), powMeasure(DERIVATIVE, expression.order));
      case 'evaluation':
        inner(expression.at);
        return this.nameMeasure(expression.name, around);
      case 'call':
        return this.callMeasure(expression, around);
      case 'sum':
        return this.sumMeasure(expression, inner);
      case 'product':
        return productMeasure(expression, inner);
      case 'negation':
        return inner(expression.of);
      case 'power':
        return this.powerMeasure(expression.base, expression.exponent, inner);
      case 'relation':
        expression.sides.forEach(inner);
        expression.sides.slice(1).forEach((side, index) => {
          const left = expression.sides[index];
          this.agree(left, inner(left), side, inner(side), expression.span, 'relation');
        });
        return PURE;
      case 'logical':
        expression.operands.forEach(inner);
        return PURE;
      case 'not':
        inner(expression.of);
        return PURE;
      case 'with':
        return this.withMeasure(expression, inner);
      case 'in-unit':
        return this.shownIn(expression, inner(expression.of));
      case 'limit':
        return inner(expression.of);
      case 'rows':
        expression.rows.flat().forEach(inner);
        return FREE;
      case 'arrow':
      case 'text':
        return FREE;
    }
  }

  private quantityMeasure(quantity: Quantity): Measure {
    return quantity.unit === '' ? NUMBER : this.unitMeasure(quantity.unit);
  }

  private nameMeasure(name: string, around: Surroundings | null): Measure {
    if (around && this.source.signalsOf(around.loop).has(name))
      return this.signal(around.owner, around.prefix + name);
    if (this.source.entry(name) === null && this.source.unitText(name) === null)
      return constantMeasure(name);
    return this.measureOfName(name);
  }

  private memberMeasure(
    member: Extract<Expression, { kind: 'member' }>,
    around: Surroundings | null,
  ): Measure {
    const path = memberPath(member);
    if (around && path !== null) return this.signal(around.owner, around.prefix + path);
    const names = [member.name];
    let root: Expression = member.of;
    while (root.kind === 'member' || root.kind === 'with') {
      if (root.kind === 'member') names.unshift(root.name);
      else this.checkReplacements(root);
      root = root.of;
    }
    if (root.kind !== 'name') return FREE;
    const entry = this.source.entry(root.name);
    return entry?.kind === 'case' ? this.signal(entry.loop.name, names.join('.')) : FREE;
  }

  private callMeasure(call: Call, around: Surroundings | null): Measure {
    const loop = this.source.entry(call.callee);
    if (loop?.kind === 'loop') return this.transferMeasure(call, loop.name);
    const args = call.args.map((arg) => this.measure(arg, around));
    const spec = this.source.functionNamed(call.callee);
    return spec ? this.ruleMeasure(spec, spec.unit, call, args) : FREE;
  }

  private transferMeasure(call: Call, loop: string): Measure {
    const [arrow] = call.args;
    if (arrow?.kind !== 'arrow' || arrow.to.length !== 1) return FREE;
    const end = (expression: Expression): Measure => {
      if (expression.kind === 'derivative')
        return mulMeasures(end(expression.of), powMeasure(DERIVATIVE, expression.order));
      const path = memberPath(expression);
      return path === null ? FREE : this.signal(loop, path);
    };
    return divMeasures(end(arrow.to[0]), end(arrow.from));
  }

  private ruleMeasure(
    spec: WorksheetFunction,
    rule: UnitRule,
    call: Call,
    args: readonly Measure[],
  ): Measure {
    const [first = FREE, second = FREE] = args;
    switch (rule) {
      case 'first':
        return first;
      case 'common':
        call.args
          .slice(1)
          .forEach((arg, index) =>
            this.agree(call.args[0], first, arg, args[index + 1], call.span, 'relation'),
          );
        return args.find((arg) => !fitsAnywhere(arg)) ?? first;
      case 'signal':
        return isTransform(call.args[0]) ? mulMeasures(first, DERIVATIVE) : first;
      case 'root':
        return powMeasure(first, 1 / 2);
      case 'square':
        return powMeasure(first, 2);
      case 'density':
        return divMeasures(powMeasure(first, 2), FREQUENCY);
      case 'bandwidth':
        return mulMeasures(powMeasure(first, 2), FREQUENCY);
      case 'number':
        return PURE;
      case 'pure':
        this.expectPure(spec.name, call.args[0], first);
        return spec.name === 'atan' ? ANGULAR : PURE;
      case 'angle':
        return ANGULAR;
      case 'time':
        return TIME;
      case 'angular frequency':
        return ANGULAR_FREQUENCY;
      case 'quotient':
        return divMeasures(first, second);
      case 'second':
        return second;
      case 'unchecked':
        return FREE;
    }
  }

  private expectPure(name: string, arg: Expression, measure: Measure): void {
    if (this.inference.unify(measure, PURE)) return;
    const text = measureText(this.inference.settle(measure));
    this.complain(
      errorAt(
        arg.span,
        'dimension',
        `${name} takes a pure number or an angle, and \`${formatExpression(arg)}\` is in ${text}.`,
      ),
    );
  }

  /** Terms agree with the first; one that counts an angle stands for the sum, so that `rad` is kept, at best one without s. */
  private sumMeasure(sum: Sum, inner: (part: Expression) => Measure): Measure {
    const terms = sum.terms.map((term) => ({ term, measure: inner(term) }));
    const carrying = terms.filter(({ measure }) => !fitsAnywhere(measure));
    if (carrying.length === 0) return terms.some(({ measure }) => measure.free) ? FREE : NUMBER;
    const [first, ...others] = carrying;
    for (const other of others) {
      const where = sum.signs[sum.terms.indexOf(other.term)] < 0 ? 'difference' : 'sum';
      this.agree(first.term, first.measure, other.term, other.measure, sum.span, where);
    }
    const counting = carrying.filter(({ measure }) => angleOf(measure) !== 0);
    const lead = counting.find(({ measure }) => !measure.laplace) ?? counting[0] ?? first;
    return carrying.length < terms.length ? withoutPerAngle(lead.measure) : lead.measure;
  }

  private powerMeasure(
    base: Expression,
    exponent: Expression,
    inner: (part: Expression) => Measure,
  ): Measure {
    const measure = inner(base);
    inner(exponent);
    const value = exponentValue(exponent);
    if (value !== null) return powMeasure(measure, value);
    return fitsAnywhere(measure) ? measure : FREE;
  }

  private withMeasure(
    expression: Extract<Expression, { kind: 'with' }>,
    inner: (part: Expression) => Measure,
  ): Measure {
    this.checkReplacements(expression);
    return inner(expression.of);
  }

  private checkReplacements(expression: Extract<Expression, { kind: 'with' }>): void {
    for (const { name, nameSpan, by, value, span } of expression.replacements) {
      const wanted = this.replacedMeasure(name);
      const replaced: Expression = { kind: 'name', name, span: nameSpan };
      // After `is` a unit alone can stand, so that a fix with 2π makes a formula of the replacement.
      const given = by === 'is' ? { span, prefix: `${nameToText(name)} = ` } : undefined;
      const measure = this.measure(value, null);
      this.agree(replaced, wanted, value, measure, span, 'replacement', given);
    }
  }

  private replacedMeasure(name: string): Measure {
    if (name === 's') return LAPLACE;
    if (name === 't') return TIME;
    const entry = this.source.entry(name);
    return entry?.kind === 'loop' || entry?.kind === 'case' ? FREE : this.measureOfName(name);
  }

  private shownIn(expression: Extract<Expression, { kind: 'in-unit' }>, of: Measure): Measure {
    const unit = this.unitMeasure(expression.unit);
    const difference = celsiusOfDifference(expression, this.temperatures);
    if (difference) this.complain(difference);
    if (this.inference.unify(of, unit))
      return fitsAnywhere(of) ? unit : saidAngle(this.inference.settle(of), unit);
    this.complain(
      errorAt(
        expression.unitSpan,
        'dimension',
        `\`${formatExpression(expression.of)}\` is in ${measureText(this.inference.settle(of))}, so it cannot be shown in ${expression.unit}.`,
      ),
    );
    return of;
  }

  private agree(
    left: Expression,
    leftMeasure: Measure,
    right: Expression,
    rightMeasure: Measure,
    span: Span,
    where: 'sum' | 'difference' | 'relation' | 'equation' | 'value' | 'replacement',
    fixAt?: FixPlace,
  ): void {
    if (!this.inference.unify(leftMeasure, rightMeasure)) {
      const [a, b] = [leftMeasure, rightMeasure].map((measure) =>
        measureText(this.inference.settle(measure)),
      );
      this.complain(errorAt(span, 'dimension', conflictText(where, left, a, right, b)));
      return;
    }
    const [a, b] = [leftMeasure, rightMeasure].map((measure) => this.inference.settle(measure));
    const sides = [
      { of: left, measure: a },
      { of: right, measure: b },
    ] as const;
    const problem =
      frequencyWarning(...sides, fixAt) ??
      decibelsOfDensities(...sides) ??
      (where === 'relation' ? comparedTemperatures(left, right, this.temperatures) : null);
    if (problem) this.complain(problem);
  }
}

function conflictText(
  where: string,
  left: Expression,
  a: string,
  right: Expression,
  b: string,
): string {
  const [l, r] = [formatExpression(left), formatExpression(right)];
  switch (where) {
    case 'sum':
      return `\`${l} + ${r}\` adds ${a} to ${b}.`;
    case 'difference':
      return `\`${l} - ${r}\` subtracts ${b} from ${a}.`;
    case 'equation':
      return `The two sides do not fit: \`${l}\` is in ${a}, and \`${r}\` is in ${b}.`;
    case 'value':
      return `\`${l}\` is in ${a}, and \`${r}\` is in ${b}.`;
    case 'replacement':
      return `${l} is in ${a}, and its replacement is in ${b}.`;
    default:
      return `\`${l}\` is in ${a} and cannot be compared with \`${r}\`, which is in ${b}.`;
  }
}

/** The unit of the noise that a density is of: the root of the density times Hz, or an amplitude density times √Hz. */
function sizeOfNoise(density: Measure): Measure {
  const isAmplitude = cyclesOf(density) === -1 / 2;
  const rate = powMeasure(FREQUENCY, isAmplitude ? 1 / 2 : 1);
  const power = mulMeasures(density, rate);
  return isAmplitude ? power : powMeasure(power, 1 / 2);
}

function constantMeasure(name: string): Measure {
  if (name === 's') return LAPLACE;
  if (name === 'j') return NUMBER;
  return name === 'pi' || name === 'π' ? PURE : FREE;
}

/** `2 pi f1` and `omega/(2 pi)`: π turns cycles into an angle, and dividing by it an angular frequency into a frequency. */
function productMeasure(product: Product, inner: (part: Expression) => Measure): Measure {
  const factors = product.factors.map(inner);
  const [above, below] = [false, true].map((inverted) =>
    factors.filter((_, index) => product.inverted[index] === inverted),
  );
  const numerator = above.reduce(mulMeasures);
  const measure = below.length === 0 ? numerator : quotientOf(numerator, below.reduce(mulMeasures));
  const power = piPower(product);
  if (power !== 0 && isNumeral(product)) return { ...measure, bare: true, rigid: false };
  if (power > 0) return cyclesToAngle(measure);
  return power === -1 ? angleToCycles(measure) : measure;
}

function isPi(e: Expression): boolean {
  return e.kind === 'name' && /^(pi|π)$/.test(e.name);
}

/** How often π is a factor of a product; negative where it divides. */
function piPower(e: Expression): number {
  if (isPi(e)) return 1;
  if (e.kind !== 'product') return 0;
  return e.factors.reduce(
    (sum, factor, index) => sum + (e.inverted[index] ? -1 : 1) * piPower(factor),
    0,
  );
}

/** Whether it is made of numbers and π alone. */
function isNumeral(e: Expression): boolean {
  return isPi(e) || e.kind === 'number' || (e.kind === 'product' && e.factors.every(isNumeral));
}

function exponentValue(exponent: Expression): number | null {
  if (exponent.kind === 'number') return Number(exponent.text);
  if (exponent.kind === 'negation') {
    const inner = exponentValue(exponent.of);
    return inner === null ? null : -inner;
  }
  if (exponent.kind === 'product' && exponent.factors.length === 2 && exponent.inverted[1]) {
    const [top, bottom] = exponent.factors.map(exponentValue);
    return top !== null && bottom !== null && bottom !== 0 ? top / bottom : null;
  }
  return null;
}

function relationsIn(condition: Expression): Extract<Expression, { kind: 'relation' }>[] {
  if (condition.kind === 'relation') return [condition];
  if (condition.kind === 'with') return relationsIn(condition.of);
  if (condition.kind === 'logical') return condition.operands.flatMap(relationsIn);
  if (condition.kind === 'not') return relationsIn(condition.of);
  return [];
}

/** Whether a signal argument is a formula in s taken as a transform, rather than a signal of a case. */
function isTransform(expression: Expression): boolean {
  switch (expression.kind) {
    case 'member':
      return false;
    case 'derivative':
    case 'negation':
    case 'with':
    case 'in-unit':
      return isTransform(expression.of);
    case 'sum':
      return expression.terms.every(isTransform);
    case 'product':
      return expression.factors.every(isTransform);
    case 'call':
      return expression.args.length === 0 || isTransform(expression.args[0]);
    default:
      return true;
  }
}
