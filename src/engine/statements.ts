import { errorAt, type Problem } from '../base/index.ts';
import { FUNCTIONS } from '../functions/index.ts';
import {
  namesIn,
  type BrokenStatement,
  type DefinitionStatement,
  type DrawStatement,
  type Expression,
  type RequireStatement,
  type Statement,
} from '../language/index.ts';
import { formatValue, parseUnit, type Unit } from '../units/index.ts';
import { isRefusal } from '../base/index.ts';
import type { Catalogue } from './catalogue.ts';
import type { Derivations } from './derivations.ts';
import { checkDimensions, type DimensionReport } from './dimensions.ts';
import { displayOf } from './display.ts';
import { figureContent } from './figures.ts';
import type { Numbers, Subject } from './numbers.ts';
import type { Queries } from './queries.ts';
import type { RequirementContent, ResultContent, ResultKind } from './report.ts';
import { freeReferences } from './references.ts';
import {
  relationOf,
  requirementContent,
  stoppedRequirement,
  unreadRequirement,
} from './requirements.ts';
import { absentPlace, erroneousContent, resultContent, type ResultRequest } from './results.ts';
import { BASE_SCOPE } from './scope.ts';
import { signConflict } from './sign-conflicts.ts';
import { outcomeOf, type Outcome } from './stop.ts';

/** What one statement comes to; spans of problems are relative to it. */
export interface StatementReport {
  readonly result: ResultContent | null;
  readonly requirement: RequirementContent | null;
  readonly problems: readonly Problem[];
}

/** The kinds of rows by the statements that have one. */
const ROW_KINDS: Partial<Record<Statement['kind'], ResultKind>> = {
  definition: 'value',
  formula: 'value',
  draw: 'figure',
  explain: 'text',
  tabulate: 'table',
};

const NOTHING: StatementReport = Object.freeze({ result: null, requirement: null, problems: [] });

type LineOf = (name: string) => number;

/** The reports on single statements, kept as long as nothing that they were made from has changed. */
export class Statements {
  private readonly keys = new WeakMap<Statement, string>();
  private readonly sources = new WeakMap<Statement, string>();
  private count = 0;

  constructor(
    private readonly queries: Queries,
    private readonly derivations: Derivations,
    private readonly numbers: Numbers,
  ) {}

  /** The report on a statement; `lineOf` tells the line of a name that it waits for. */
  reportOn(node: Statement, lineOf: LineOf): StatementReport {
    const report = this.queries.get(`statement:${this.keyOf(node)}`, () => this.guarded(node));
    return placeWaiting(report, this.waitingFor(node), lineOf);
  }

  /** Keeps a statement's source text, by which requirements are quoted. */
  remember(node: Statement, source: string): void {
    this.sources.set(node, source);
  }

  private keyOf(node: Statement): string {
    const known = this.keys.get(node) ?? String(++this.count);
    this.keys.set(node, known);
    return known;
  }

  /** Whatever goes wrong in one statement is kept in it: the others have their reports. */
  private guarded(node: Statement): StatementReport {
    const outcome = outcomeOf(node.span, () => this.makeReport(node));
    return outcome.ok ? outcome.value : failedReport(node, problemsOf(outcome));
  }

  private makeReport(node: Statement): StatementReport {
    switch (node.kind) {
      case 'definition':
        return this.definitionReport(node);
      case 'formula':
        return this.withProblems(node, this.resultReport(node, null, node.formula));
      case 'require':
        return this.quoted(node, this.withProblems(node, this.requirementReport(node)));
      case 'draw':
        return this.withProblems(node, this.drawReport(node));
      case 'loop':
        return this.withProblems(node, {
          ...NOTHING,
          problems: problemsOf(this.loopOutcome(node.name)),
        });
      case 'case':
        return this.withProblems(node, {
          ...NOTHING,
          problems: problemsOf(this.caseOutcome(node.name)),
        });
      case 'explain':
        return unavailable(node, 'The working (`explain`) is not available yet.', 'text');
      case 'tabulate':
        return unavailable(node, 'Tables (`tabulate`) are not available yet.', 'table');
      case 'points':
        return unavailable(node, 'Operating points (`points`) are not available yet.', null);
      case 'broken':
        return this.brokenReport(node);
      default:
        return NOTHING;
    }
  }

  /** What cannot be read has its row all the same; the problem is that of reading it. */
  private brokenReport(node: BrokenStatement): StatementReport {
    const kind = (node.meant && ROW_KINDS[node.meant]) ?? null;
    if (kind) return { ...NOTHING, result: erroneousContent(node.name, kind) };
    if (node.meant !== 'require') return NOTHING;
    const source = this.sources.get(node)?.slice(node.span.from, node.span.to) ?? '';
    const text = source.replace(/^require\s*/, '');
    return { ...NOTHING, requirement: unreadRequirement(node.comment, text) };
  }

  private loopOutcome(name: string): Outcome<unknown> | null {
    return this.derivations.kindOf(name) === 'loop'
      ? this.derivations.loop(name, BASE_SCOPE)
      : null;
  }

  private caseOutcome(name: string): Outcome<unknown> | null {
    return this.derivations.kindOf(name) === 'case'
      ? this.derivations.loadCase(name, BASE_SCOPE)
      : null;
  }

  private withProblems(node: Statement, report: StatementReport): StatementReport {
    const dimensional = this.dimensions().problems.get(node) ?? [];
    if (dimensional.length > 0) return stopForDimensions(node, report, dimensional);
    return this.faultyName(node) === null ? report : withoutValue(node, report);
  }

  /** A name behind a statement whose dimensions disagree, or null: what leans on it has no value either. */
  private faultyName(node: Statement): string | null {
    for (const name of this.reachOfStatement(node)) {
      const entry = this.entryStatement(name);
      if (entry && entry !== node && hasError(this.dimensions().problems.get(entry))) return name;
      if (!('name' in node && node.name === name) && this.isContradicted(name)) return name;
    }
    return null;
  }

  /** Whether the value of a name contradicts the sign that is stated of it; what was derived with that sign is wrong. */
  private isContradicted(name: string): boolean {
    return this.queries.get(`contradicted:${name}`, () => {
      const sign = this.catalogue.signs.get(name)?.sign;
      return sign !== undefined && signConflict(name, sign, this.numbers) !== null;
    });
  }

  private reachOfStatement(node: Statement): ReadonlySet<string> {
    const names =
      'name' in node && node.name !== null && this.derivations.kindOf(node.name) !== null
        ? [node.name]
        : freeReferences(node);
    return this.reachOfNames(names);
  }

  private definitionReport(node: DefinitionStatement): StatementReport {
    const report =
      this.derivations.kindOf(node.name) === 'definition'
        ? this.resultReport(node, node.name, node.formula)
        : { ...NOTHING, result: erroneousContent(node.name, 'value') };
    return this.withProblems(node, report);
  }

  private resultReport(node: Statement, name: string | null, formula: Expression): StatementReport {
    const subject = this.subjectOf(node, formula, name);
    const outcome = subject.derive(BASE_SCOPE);
    if (!outcome.ok)
      return { ...NOTHING, result: erroneousContent(name, 'value'), problems: problemsOf(outcome) };
    const request: ResultRequest = {
      name,
      expression: formula,
      subject,
      display: displayOf(
        formula,
        this.dimensions().measureOf(formula),
        this.derivations.customUnits(),
      ),
      hints: this.unitHints(),
      notes: this.movingGains(subject),
    };
    const content = resultContent(outcome.value, request, this.derivations, this.numbers);
    return { ...NOTHING, result: this.withAbsentPlace(content, request) };
  }

  /** Where a value that exists at the nominal does not exist everywhere in the tolerances, the place is given. */
  private withAbsentPlace(content: ResultContent, request: ResultRequest): ResultContent {
    if (typeof content.value !== 'number' || content.span) return content;
    const place = absentPlace(request, this.numbers);
    if (!place) return content;
    const words = Object.entries(place).map(
      ([name, value]) => `${name} = ${Number(value.toPrecision(4))}`,
    );
    return {
      ...content,
      notes: [
        ...content.notes,
        `No span: the value does not exist at ${words.join(', ')} (SI units).`,
      ],
    };
  }

  /** Derived gains of a loop that follow the true plant through a tolerance make a verdict falsely robust. */
  private movingGains(subject: Subject): string[] {
    const loops = [...subject.reach].filter((name) => this.derivations.kindOf(name) === 'loop');
    if (loops.length === 0) return [];
    const inLoops = new Set(loops.flatMap((loop) => [...this.derivations.reachOf(loop)]));
    const gains = [...inLoops].filter(
      (name) =>
        this.derivations.abbreviated(name) !== null && this.numbers.movesWithTolerance(name),
    );
    return gains.map(
      (name) =>
        `${name} is computed from names with a tolerance and moves with them; a gain that is computed once is written with \`nominal(…)\`.`,
    );
  }

  private requirementReport(node: RequireStatement): StatementReport {
    if (node.band) {
      const problem = errorAt(
        node.span,
        'not-available-yet',
        'Requirements over a band of frequencies are not available yet.',
      );
      return { ...NOTHING, requirement: stoppedRequirement(node), problems: [problem] };
    }
    const subject = this.subjectOf(node, node.condition, null);
    const outcome = subject.derive(BASE_SCOPE);
    if (!outcome.ok)
      return { ...NOTHING, requirement: stoppedRequirement(node), problems: problemsOf(outcome) };
    if (outcome.value.kind !== 'condition' && outcome.value.kind !== 'none') {
      const problem = errorAt(
        node.condition.span,
        'not-a-condition',
        'A requirement is a condition, such as `x <= 2 mrad` or `stable(az)`.',
      );
      return { ...NOTHING, requirement: stoppedRequirement(node), problems: [problem] };
    }
    const request = {
      statement: node,
      subject,
      display: this.limitDisplay(node),
      hints: this.unitHints(),
    };
    return { ...NOTHING, requirement: requirementContent(request, this.derivations, this.numbers) };
  }

  /** A requirement's numbers are shown in the unit of its limit as typed, else of the quantity. */
  private limitDisplay(node: RequireStatement) {
    const relation = relationOf(node.condition);
    const units = this.derivations.customUnits();
    if (!relation) return displayOf(node.condition, null, units);
    const [left, limit] = relation.sides;
    const measure = this.dimensions().measureOf(left) ?? this.dimensions().measureOf(limit);
    const shown = displayOf(left, measure, units);
    const unit =
      limit.kind === 'quantity' && limit.unit !== '' ? parseUnit(limit.unit, units) : null;
    return unit && !isRefusal(unit) ? { ...shown, fixed: unit, factor: 1 } : shown;
  }

  /** A requirement is quoted as typed. */
  private quoted(node: RequireStatement, report: StatementReport): StatementReport {
    const { from, to } = node.condition.span;
    const text = this.sources.get(node)?.slice(from, to);
    return text && report.requirement
      ? { ...report, requirement: { ...report.requirement, text } }
      : report;
  }

  private drawReport(node: DrawStatement): StatementReport {
    const outcome = outcomeOf(node.span, () =>
      figureContent(node, {
        derivations: this.derivations,
        numbers: this.numbers,
        queries: this.queries,
        key: this.keyOf(node),
        dimensions: this.dimensions(),
        hints: this.unitHints(),
        subjectOf: (formula) => this.subjectOf(node, formula, null),
      }),
    );
    if (!outcome.ok)
      return {
        ...NOTHING,
        result: erroneousContent(null, 'figure'),
        problems: problemsOf(outcome),
      };
    const content = {
      ...erroneousContent(null, 'figure'),
      ...outcome.value,
      state: 'ready' as const,
    };
    return { ...NOTHING, result: content };
  }

  /** A formula of a statement, as something that has a value. */
  subjectOf(node: Statement, formula: Expression, name: string | null): Subject {
    return name === null ? this.formulaSubject(node, formula) : this.definitionSubject(name);
  }

  private definitionSubject(name: string): Subject {
    const { derivations } = this;
    return {
      key: `definition ${name}`,
      // Asked for anew each time, so that every reader records what the names are derived from.
      get reach() {
        return derivations.reachOf(name);
      },
      derive: (scope) => derivations.definition(name, scope),
    };
  }

  private formulaSubject(node: Statement, formula: Expression): Subject {
    const key = `${this.keyOf(node)}:${formula.span.from}`;
    const reach = () => this.reachOfFormula(formula);
    return {
      key,
      get reach() {
        return reach();
      },
      derive: (scope) =>
        this.queries.get(`derived:${key}@${scope.key}`, () =>
          outcomeOf(formula.span, () => this.derivations.evaluate(formula, scope)),
        ),
    };
  }

  private reachOfFormula(formula: Expression): ReadonlySet<string> {
    return this.reachOfNames(namesIn(formula));
  }

  private reachOfNames(names: readonly string[]): ReadonlySet<string> {
    const reach = new Set<string>();
    for (const name of names) {
      if (this.derivations.kindOf(name) === null) continue;
      for (const reached of this.derivations.reachOf(name)) reach.add(reached);
    }
    return reach;
  }

  /** The name that a statement's evaluation stops at, or null. */
  private waitingFor(node: Statement): string | null {
    const outcome = this.outcomeOfStatement(node);
    if (outcome && !outcome.ok) return outcome.waitsFor;
    return outcome ? this.faultyName(node) : null;
  }

  private outcomeOfStatement(node: Statement): Outcome<unknown> | null {
    switch (node.kind) {
      case 'definition':
        return this.derivations.kindOf(node.name) === 'definition'
          ? this.derivations.definition(node.name, BASE_SCOPE)
          : null;
      case 'formula':
        return this.subjectOf(node, node.formula, null).derive(BASE_SCOPE);
      case 'require':
        return node.band ? null : this.subjectOf(node, node.condition, null).derive(BASE_SCOPE);
      case 'draw':
        return firstStopped(
          [...node.of, ...node.where].map((part) =>
            this.subjectOf(node, part, null).derive(BASE_SCOPE),
          ),
        );
      default:
        return null;
    }
  }

  /** The check of dimensions over the whole worksheet; it reads no numbers. */
  dimensions(): DimensionReport {
    return this.queries.get('dimensions', () => {
      const statements = this.queries.get('structure', () => this.structure(), sameStatements);
      return checkDimensions({
        statements,
        longChainBehind: (name) => this.derivations.longChainBehind(name),
        entry: (name) => this.entryStatement(name),
        unitText: (name) => this.derivations.unitTextOf(name),
        signalsOf: (loop) => {
          const record = this.derivations.loop(loop.name, BASE_SCOPE);
          return new Set(
            record.ok
              ? [...record.value.inputs, ...record.value.unknowns]
              : loop.inputs.map((input) => input.name),
          );
        },
        functionNamed: (name) => FUNCTIONS.get(name),
        customUnits: this.derivations.customUnits(),
      });
    });
  }

  /** The statements that the check of dimensions reads; assumptions are read by their unit alone. */
  private structure(): readonly Statement[] {
    const { faulty } = this.catalogue;
    return this.queries
      .input<readonly Statement[]>('statements')
      .filter((node) => node.kind !== 'assumption' && node.kind !== 'broken')
      .filter((node) => node.kind !== 'loop' || !faulty.has(node.name));
  }

  private entryStatement(name: string): Statement | null {
    return this.queries.get(`structure of:${name}`, () => {
      const entry = this.catalogue.entries.get(name);
      return entry && entry.kind !== 'assumption' && entry.kind !== 'unavailable'
        ? entry.node
        : null;
    });
  }

  private get catalogue(): Catalogue {
    return this.queries.input<Catalogue>('catalogue');
  }

  /** The units typed in the worksheet, each once, in order. */
  private unitHints(): readonly Unit[] {
    return this.queries.get(
      'unit-hints',
      () => {
        const texts = new Set<string>();
        for (const name of this.catalogue.entries.keys())
          texts.add(this.derivations.unitTextOf(name) ?? '');
        return [...texts]
          .map((text) => parseUnit(text, this.derivations.customUnits()))
          .filter((unit) => !isRefusal(unit)) as Unit[];
      },
      (a, b) => a.length === b.length && a.every((unit, index) => unit.text === b[index].text),
    );
  }

  /** An assumption's value as shown in prose, or null. */
  shownAssumption(name: string): string | null {
    const reading = this.numbers.reading(name);
    return reading?.ok ? formatValue(reading.value.value.value, reading.value.unit) : null;
  }
}

function sameStatements(a: readonly Statement[], b: readonly Statement[]): boolean {
  return a.length === b.length && a.every((node, index) => node === b[index]);
}

function firstStopped(outcomes: readonly Outcome<unknown>[]): Outcome<unknown> | null {
  return outcomes.find((outcome) => !outcome.ok) ?? null;
}

function problemsOf(outcome: Outcome<unknown> | null): readonly Problem[] {
  return outcome && !outcome.ok && outcome.problem ? [outcome.problem] : [];
}

function failedReport(node: Statement, problems: readonly Problem[]): StatementReport {
  const name = node.kind === 'definition' ? node.name : null;
  const hasResult = node.kind === 'definition' || node.kind === 'formula' || node.kind === 'draw';
  return {
    result: hasResult ? erroneousContent(name, node.kind === 'draw' ? 'figure' : 'value') : null,
    requirement: node.kind === 'require' ? stoppedRequirement(node) : null,
    problems,
  };
}

function unavailable(
  node: Statement,
  message: string,
  kind: ResultContent['kind'] | null,
): StatementReport {
  const result = kind && erroneousContent(null, kind);
  return { ...NOTHING, result, problems: [errorAt(node.span, 'not-available-yet', message)] };
}

function hasError(problems: readonly Problem[] | undefined): boolean {
  return problems?.some((problem) => problem.severity === 'error') ?? false;
}

/** A formula whose dimensions disagree has no value; a warning leaves it alone. */
function stopForDimensions(
  node: Statement,
  report: StatementReport,
  problems: readonly Problem[],
): StatementReport {
  const all = { ...report, problems: [...report.problems, ...problems] };
  return hasError(problems) ? withoutValue(node, all) : all;
}

/** The report with its value taken back: what it leans on is in error. */
function withoutValue(node: Statement, report: StatementReport): StatementReport {
  return {
    result: report.result && erroneousContent(report.result.name, report.result.kind),
    requirement: node.kind === 'require' ? stoppedRequirement(node) : null,
    problems: report.problems,
  };
}

function placeWaiting(
  report: StatementReport,
  waitsFor: string | null,
  lineOf: LineOf,
): StatementReport {
  if (waitsFor === null) return report;
  const waiting = { name: waitsFor, line: lineOf(waitsFor) };
  return {
    ...report,
    result: report.result && { ...report.result, waitsFor: waiting },
    requirement: report.requirement && { ...report.requirement, waitsFor: waiting },
  };
}
