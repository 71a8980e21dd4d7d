import {
  dependsOn,
  equalPolynomials,
  equalRatios,
  fractionOfRatio,
  generatorsOfRatio,
  imaginary,
  laplace,
  ratioOf,
  signOfRatio,
  substituteRatio,
  symbol,
  symbolsOfRatio,
  type Fraction,
  type Generator,
  type Ratio,
  type Sign,
} from '../algebra/index.ts';
import { Budget, DEFAULT_BUDGET, isRefusal, type Refusal, type Span } from '../base/index.ts';
import {
  ALWAYS,
  conditionKey,
  expandStable,
  FOUND_NUMBERS,
  readable,
  type Condition,
  type SignalValue,
  type Value,
} from '../control/index.ts';
import { FUNCTIONS, type FunctionContext, type WorksheetFunction } from '../functions/index.ts';
import {
  namesIn,
  nearestName,
  type CaseStatement,
  type DefinitionStatement,
  type Expression,
  type LoopStatement,
  type Statement,
} from '../language/index.ts';
import { conditionText, formulaText, valueText, type Writing } from '../present/index.ts';
import type { CustomUnits, Unit } from '../units/index.ts';
import { formulaValue } from './arithmetic.ts';
import { typedNominal } from './assumptions.ts';
import { readCase, signalIn, type CaseRecord } from './cases.ts';
import { referencesOf, type Catalogue, type Entry } from './catalogue.ts';
import { constantOf } from './constants.ts';
import { evaluate } from './evaluate.ts';
import { evaluateFraction } from './fractions.ts';
import { signalsInText } from './loop-signals.ts';
import { readLoop } from './loops.ts';
import type { LoopRecord, Meanings } from './meanings.ts';
import type { Queries } from './queries.ts';
import { BASE_SCOPE, relevantScope, type Scope } from './scope.ts';
import { outcomeOf, Stop, stopAt, waitFor, type Outcome } from './stop.ts';
import { readOwnUnits } from './unit-statements.ts';
import { stopAtUnknownName } from './unknown-name.ts';

/** From so many names behind a name on, they are gone through in order. */
const LONG_CHAIN = 50;

/**
 * The symbolic stage: what every name stands for in symbols, derived on demand and kept until something that it was
 * derived from changes. The numbers of assumptions are not among that.
 */
export class Derivations implements Meanings {
  constructor(private readonly queries: Queries) {}

  private get catalogue(): Catalogue {
    return this.queries.input<Catalogue>('catalogue');
  }

  evaluate(expression: Expression, scope: Scope): Value {
    return evaluate(expression, scope, this);
  }

  evaluateFraction(expression: Expression, scope: Scope): Fraction {
    return evaluateFraction(expression, scope, this);
  }

  kindOf(name: string): Entry['kind'] | null {
    return this.queries.get(`kind:${name}`, () => {
      const { entries, faulty } = this.catalogue;
      return faulty.has(name) ? 'unavailable' : (entries.get(name)?.kind ?? null);
    });
  }

  /** The statement that introduces a definition, a loop or a case. */
  private node<T extends Statement>(name: string): T {
    return this.queries.get(`node:${name}`, () => this.catalogue.entries.get(name)!.node as T);
  }

  /** All names that a name is derived from, itself included. */
  reachOf(name: string): ReadonlySet<string> {
    return this.queries.get(`reach:${name}`, () => this.collectReach(name), sameSet);
  }

  private collectReach(name: string): ReadonlySet<string> {
    const reach = new Set([name]);
    const { entries, faulty } = this.catalogue;
    // A set is gone through with what is added on the way.
    for (const next of reach) {
      const entry = entries.get(next);
      if (!entry || faulty.has(next)) continue;
      for (const reference of referencesOf(entry, entries)) reach.add(reference);
    }
    return reach;
  }

  valueOf(name: string, span: Span, scope: Scope): Value {
    const replaced = scope.replacements.get(name);
    if (replaced) return replaced.value;
    const kind = this.kindOf(name);
    const constant = kind === null ? constantOf(name) : null;
    if (constant) return formulaValue(constant);
    switch (kind) {
      case 'assumption':
      case 'symbol':
        return formulaValue(ratioOf(symbol(name)));
      case 'definition':
        return this.definitionValue(name, span, scope);
      case 'unavailable':
        return waitFor(name);
      case 'loop':
        return stopAt(
          span,
          'loop-as-value',
          `${name} is a loop; ask for a transfer function with \`${name}(input -> signal)\`.`,
        );
      case 'case':
        return stopAt(
          span,
          'case-as-value',
          `${name} is a load case; name one of its signals, \`${name}.signal\`.`,
        );
      case null:
        return stopAtUnknownName(name, span, this);
    }
  }

  private definitionValue(name: string, span: Span, scope: Scope): Value {
    const relevant = relevantScope(scope, this.reachOf(name));
    const value = this.settle(name, span, relevant, this.definition(name, relevant));
    if (relevant === BASE_SCOPE && this.isDerivedParameter(name))
      return formulaValue(ratioOf(symbol(name)));
    return value;
  }

  /** The value, or a stop: waiting where the name itself is in error, a problem here where only `with` brought it up. */
  private settle<T>(name: string, span: Span, scope: Scope, outcome: Outcome<T>): T {
    if (outcome.ok) return outcome.value;
    if (scope === BASE_SCOPE) return waitFor(name);
    if (outcome.waitsFor) return waitFor(outcome.waitsFor);
    throw new Stop(
      {
        ...outcome.problem!,
        span,
        message: `In ${name}, derived anew: ${outcome.problem!.message}`,
        fixes: [],
      },
      null,
    );
  }

  /** Derives the definitions one after the other, each after what it depends on: a long chain is no deep recursion. */
  prepare(): void {
    for (const name of this.catalogue.evaluationOrder) {
      if (this.kindOf(name) !== 'definition') continue;
      this.definition(name, BASE_SCOPE);
      if (this.isDerivedParameter(name)) this.signOf(symbol(name));
    }
  }

  /** The definitions behind a name, each after what it depends on; empty where they are few. */
  longChainBehind(name: string): readonly string[] {
    const reach = this.kindOf(name) === 'definition' ? this.reachOf(name) : null;
    if (!reach || reach.size < LONG_CHAIN) return [];
    return this.catalogue.evaluationOrder.filter(
      (next) => next !== name && reach.has(next) && this.kindOf(next) === 'definition',
    );
  }

  /** A definition as derived in a scope, parameters of its own kept as symbols. */
  definition(name: string, scope: Scope): Outcome<Value> {
    return this.queries.get(
      `definition:${name}@${scope.key}`,
      () => {
        const { formula, span } = this.node<DefinitionStatement>(name);
        return outcomeOf(span, () => evaluate(formula, scope, this));
      },
      sameOutcome,
    );
  }

  /** A definition without s and signals: it stays a symbol in derivations. */
  isDerivedParameter(name: string): boolean {
    return this.queries.get(
      `parameter:${name}`,
      () => this.kindOf(name) === 'definition' && this.derivedRatio(name) !== null,
    );
  }

  /** Whether a loop or a load case stands behind a name. */
  private standsOnLoop(name: string): boolean {
    return this.queries.get(`stands on loop:${name}`, () => {
      const kind = this.kindOf(name);
      if (kind !== 'definition') return kind === 'loop' || kind === 'case';
      return namesIn(this.node<DefinitionStatement>(name).formula).some((next) =>
        this.standsOnLoop(next),
      );
    });
  }

  /** What a derived parameter stands for, in assumptions and other derived parameters; null if it is not one. */
  private derivedRatio(name: string): Ratio | null {
    if (this.standsOnLoop(name)) return null;
    const outcome = this.definition(name, BASE_SCOPE);
    if (!outcome.ok || outcome.value.kind !== 'formula' || outcome.value.when !== ALWAYS)
      return null;
    const { ratio } = outcome.value;
    return dependsOn(ratio, laplace) || dependsOn(ratio, imaginary) ? null : ratio;
  }

  /** The ratio that a symbol abbreviates, or null for assumptions and free symbols. */
  abbreviated(name: string): Ratio | null {
    return this.kindOf(name) === 'definition' && this.isDerivedParameter(name)
      ? this.derivedRatio(name)
      : null;
  }

  /** The formula with derived parameters replaced by what they stand for, down to assumptions. */
  open(ratio: Ratio): Ratio {
    return this.openWhere(ratio, () => true);
  }

  /** The same, but opening only the parameters that a symbol stands behind other than through `nominal`. */
  private openFor(ratio: Ratio, behind: Generator): Ratio {
    return this.openWhere(
      ratio,
      (g, meaning) => g !== behind && standsIn(behind, this.open(meaning)),
    );
  }

  private openWhere(ratio: Ratio, isOpened: (g: Generator, meaning: Ratio) => boolean): Ratio {
    let opened = ratio;
    for (;;) {
      const map = new Map<Generator, Ratio>();
      for (const g of symbolsOfRatio(opened)) {
        const meaning = this.abbreviated(g.name);
        if (meaning && isOpened(g, meaning)) map.set(g, meaning);
      }
      if (map.size === 0) return opened;
      const next = substituteRatio(opened, map);
      if (isRefusal(next)) return opened;
      opened = next;
    }
  }

  fractionOf(name: string, span: Span, scope: Scope): Fraction {
    const replaced = scope.replacements.get(name);
    if (replaced?.fraction) return replaced.fraction;
    const value = this.valueOf(name, span, scope);
    if (value.kind !== 'formula') {
      const why = value.kind === 'none' ? `: ${valueText(value, this.writing())}` : '.';
      stopAt(
        span,
        'not-a-coefficient',
        `${name} ${value.kind === 'none' ? 'has no value' : 'is not a formula'}, so it cannot be a coefficient of a loop${why}`,
      );
    }
    if (this.kindOf(name) !== 'definition' || replaced) return fractionOfRatio(value.ratio);
    const relevant = relevantScope(scope, this.reachOf(name));
    if (relevant === BASE_SCOPE && this.isDerivedParameter(name))
      return fractionOfRatio(value.ratio);
    return this.queries.get(`fraction:${name}@${relevant.key}`, () =>
      evaluateFraction(this.node<DefinitionStatement>(name).formula, relevant, this),
    );
  }

  loopOf(name: string, span: Span, scope: Scope): LoopRecord {
    const kind = this.kindOf(name);
    if (kind === 'unavailable') waitFor(name);
    if (kind !== 'loop') this.notALoop(name, span);
    const relevant = relevantScope(scope, this.reachOf(name));
    return this.settle(name, span, relevant, this.loop(name, relevant));
  }

  private notALoop(name: string, span: Span): never {
    const near = nearestName(
      name,
      this.knownNames().filter((known) => this.kindOf(known) === 'loop'),
    );
    stopAt(
      span,
      'not-a-loop',
      `${name} is not a loop of this worksheet.${near ? ` Is ${near} meant?` : ''}`,
      near ? [{ title: `Write ${near}`, edits: [{ span, insert: near }] }] : [],
    );
  }

  /** A loop as read and closed in a scope. */
  loop(name: string, scope: Scope): Outcome<LoopRecord> {
    return this.queries.get(`loop:${name}@${scope.key}`, () => {
      const statement = this.node<LoopStatement>(name);
      const source = {
        loopStatement: (used: string, span: Span) => this.usedLoop(used, span, scope),
        isCoefficient: (candidate: string) =>
          this.kindOf(candidate) !== null || constantOf(candidate) !== null,
      };
      return outcomeOf(statement.span, () =>
        readLoop(statement, scope, this, source, new Budget(DEFAULT_BUDGET)),
      );
    });
  }

  private usedLoop(name: string, span: Span, scope: Scope): LoopStatement {
    this.loopOf(name, span, scope);
    return this.node<LoopStatement>(name);
  }

  caseOf(name: string, span: Span, scope: Scope): CaseRecord {
    const relevant = relevantScope(scope, this.reachOf(name));
    return this.settle(name, span, relevant, this.loadCase(name, relevant));
  }

  /** A load case as read in a scope. */
  loadCase(name: string, scope: Scope): Outcome<CaseRecord> {
    return this.queries.get(`case:${name}@${scope.key}`, () => {
      const statement = this.node<CaseStatement>(name);
      return outcomeOf(statement.span, () => readCase(statement, scope, this));
    });
  }

  signalOf(caseName: string, path: string, span: Span, scope: Scope): SignalValue {
    const record = this.caseOf(caseName, span, scope);
    const names = [...record.loop.inputs, ...record.loop.unknowns];
    if (!names.includes(path)) {
      const near = nearestName(path, names);
      stopAt(
        span,
        'unknown-signal',
        `${path} is not a signal of ${record.loop.name}; its signals are ${names.join(', ')}.${near ? ` Is ${near} meant?` : ''}`,
        near
          ? [
              {
                title: `Write ${caseName}.${near}`,
                edits: [{ span, insert: `${caseName}.${near}` }],
              },
            ]
          : [],
      );
    }
    const relevant = relevantScope(scope, this.reachOf(caseName));
    return this.queries.get(`signal:${caseName}.${path}@${relevant.key}`, () =>
      signalIn(this.caseOf(caseName, span, scope), path, new Budget(DEFAULT_BUDGET), span),
    );
  }

  requireReplaceable(name: string, span: Span): void {
    const kind = this.kindOf(name);
    if (kind === 'assumption' || kind === 'definition' || kind === 'symbol') return;
    if (kind === 'unavailable') waitFor(name);
    if (kind === null) stopAtUnknownName(name, span, this);
    stopAt(
      span,
      'not-replaceable',
      `${name} is a ${kind}; \`with\` replaces assumptions and definitions.`,
    );
  }

  substitute(ratio: Ratio, by: ReadonlyMap<Generator, Ratio>): Ratio | Refusal {
    return substituteRatio(ratio, by, new Budget(DEFAULT_BUDGET));
  }

  functionNamed(name: string): WorksheetFunction | undefined {
    return FUNCTIONS.get(name);
  }

  functionNames(): readonly string[] {
    return [...FUNCTIONS.keys()];
  }

  functionContext(scope: Scope): FunctionContext {
    const writing = this.writing();
    return {
      signOf: (g) => (scope.replacements.has(g.name) ? 'unknown' : this.signOf(g)),
      budget: new Budget(DEFAULT_BUDGET),
      open: (ratio) => this.open(ratio),
      openFor: (ratio, behind) => this.openFor(ratio, behind),
      tuned: writing.tuned,
      readable: (condition) => readable(condition, writing.signOf, writing.tuned),
      write: (ratio) => formulaText(ratio, writing),
      writing,
    };
  }

  /** The sign of a generator that the worksheet's sign statements give. */
  readonly signOf = (g: Generator): Sign => {
    if (g.kind !== 'symbol') return signOfFunction(g, this.signOf);
    return this.queries.get(`sign:${g.name}`, () => {
      const meaning = this.declaredSign(g.name) ?? null;
      if (meaning) return meaning;
      const ratio = this.abbreviated(g.name);
      return ratio ? signOfRatio(ratio, this.signOf) : 'unknown';
    });
  };

  private declaredSign(name: string): Sign | null {
    const sign = this.catalogue.signs.get(name)?.sign;
    return sign === undefined || sign === 'real' ? null : sign;
  }

  /** How formulas of this worksheet are written. */
  writing(): Writing {
    return this.queries.get('writing', () => {
      const { order, tunes } = this.queries.get(
        'introductions',
        () => introductions(this.catalogue),
        sameIntroductions,
      );
      const place = new Map(order.map((name, index) => [name, index] as const));
      return {
        order: (g) => place.get(g.name) ?? Infinity,
        tuned: tunes.map(symbol),
        signOf: this.signOf,
      };
    });
  }

  /** Stability conditions written out as inequalities. */
  expandStability(condition: Condition): Condition {
    return expandStable(condition, this.signOf, new Budget(DEFAULT_BUDGET));
  }

  /** A condition as an engineer reads it, reduced by the signs that the worksheet states. */
  reduced(condition: Condition): Condition {
    return this.functionContext(BASE_SCOPE).readable(this.expandStability(condition));
  }

  /** What a value takes for granted, in a sentence on the symbols; empty where it stands without conditions. */
  provisions({ when }: Value): readonly string[] {
    if (when === ALWAYS) return [];
    return this.queries.get(
      `provisions:${conditionKey(when)}`,
      () => {
        const text = conditionText(when, this.writing());
        if (text === conditionText(ALWAYS, this.writing())) return [];
        return [`Provided that ${text.length > LONGEST_PROVISION ? inWords(when) : text}.`];
      },
      sameList,
    );
  }

  customUnits(): CustomUnits {
    return this.queries.get('custom-units', () => readOwnUnits(this.catalogue), sameUnits);
  }

  unitTextOf(name: string): string | null {
    return this.queries.get(`unit of:${name}`, () => {
      const entry = this.catalogue.entries.get(name);
      if (entry?.kind === 'assumption' && entry.node.kind === 'assumption')
        return typedNominal(entry.node).unit;
      return this.catalogue.units.get(name)?.unit ?? null;
    });
  }

  formulaOf(name: string): Expression | null {
    return this.kindOf(name) === 'definition' ? this.node<DefinitionStatement>(name).formula : null;
  }

  knownNames(): readonly string[] {
    return this.queries.get('names', () => [...this.catalogue.entries.keys()], sameList);
  }

  casesOf(loop: string): readonly string[] {
    return [...this.catalogue.entries]
      .filter(([, entry]) => entry.kind === 'case' && entry.node.loop.name === loop)
      .map(([name]) => name);
  }

  loopsWithSignal(name: string): readonly string[] {
    const { entries } = this.catalogue;
    return [...entries.values()].flatMap((entry) =>
      entry.kind === 'loop' && signalsInText(entry.node, entries).has(name)
        ? [entry.node.name]
        : [],
    );
  }
}

/** Characters that a condition beside a value may take; a longer one is named instead. */
const LONGEST_PROVISION = 150;

function inWords(condition: Condition): string {
  if (condition.kind !== 'stable') return 'conditions hold that are too long to stand here';
  const signals = condition.blocks.flatMap((block) => block.signals);
  return `the part of the loop with ${signals.join(', ')} is stable`;
}

function signOfFunction(g: Generator, signOf: (g: Generator) => Sign): Sign {
  if (g.kind === 'constant') return 'positive';
  if (g.kind !== 'function') return 'unknown';
  if (g.name === 'exp') return dependsOnS(g) ? 'unknown' : 'positive';
  if (g.name === 'sqrt')
    return signOfRatio(g.args![0], signOf) === 'positive' ? 'positive' : 'nonnegative';
  if (g.name === 'abs') return signOfRatio(g.args![0], signOf) === 'zero' ? 'zero' : 'nonnegative';
  if (g.name === 'nominal') return signOfRatio(g.args![0], signOf);
  if (FOUND_NUMBERS.get(g.name)?.isMagnitude) return 'nonnegative';
  return 'unknown';
}

/** Whether a symbol stands in a formula, `nominal(…)` counting as a symbol of its own. */
function standsIn(symbolOf: Generator, ratio: Ratio): boolean {
  return generatorsOfRatio(ratio).some(
    (g) =>
      g === symbolOf ||
      (g.name !== 'nominal' && (g.args ?? []).some((arg) => standsIn(symbolOf, arg))),
  );
}

function dependsOnS(g: Generator): boolean {
  return (
    g.kind === 'function' &&
    g.args!.some((arg) => dependsOn(arg, laplace) || dependsOn(arg, imaginary))
  );
}

interface Introductions {
  readonly order: readonly string[];
  readonly tunes: readonly string[];
}

function introductions(catalogue: Catalogue): Introductions {
  return { order: [...catalogue.order.keys()], tunes: [...catalogue.tunes.keys()] };
}

function sameIntroductions(a: Introductions, b: Introductions): boolean {
  return sameList(a.order, b.order) && sameList(a.tunes, b.tunes);
}

function sameUnits(a: CustomUnits, b: CustomUnits): boolean {
  const same = (x: Unit, y: Unit | undefined) => y?.number === x.number && y.text === x.text;
  return a.size === b.size && [...a].every(([name, unit]) => same(unit, b.get(name)));
}

function sameList(a: readonly string[], b: readonly string[]): boolean {
  return a.length === b.length && a.every((item, index) => item === b[index]);
}

function sameSet(a: ReadonlySet<string>, b: ReadonlySet<string>): boolean {
  return a.size === b.size && [...a].every((item) => b.has(item));
}

/** Whether two outcomes are the same for everything that reads them. */
export function sameOutcome(a: Outcome<Value>, b: Outcome<Value>): boolean {
  return a.ok && b.ok && sameValue(a.value, b.value);
}

function sameValue(a: Value, b: Value): boolean {
  if (a.kind !== 'formula' || b.kind !== 'formula') return a === b;
  const hidden =
    a.hidden === b.hidden ||
    (a.hidden !== null && b.hidden !== null && equalPolynomials(a.hidden, b.hidden));
  return (
    hidden &&
    equalRatios(a.ratio, b.ratio) &&
    a.origin === b.origin &&
    a.form === b.form &&
    conditionKey(a.when) === conditionKey(b.when) &&
    sameList(a.notes, b.notes)
  );
}
