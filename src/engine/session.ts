import { errorAt, type Problem } from '../base/index.ts';
import { FUNCTIONS, SOURCES, sourceNamed, type Source } from '../functions/index.ts';
import {
  lineStarts,
  parseWorksheet,
  placeProblem,
  positionAt,
  type Vocabulary,
  type WorksheetDocument,
} from '../language/index.ts';
import { isUnitSymbol } from '../units/index.ts';
import { assumptionRows } from './assumption-rows.ts';
import { makeCatalogue, type Catalogue } from './catalogue.ts';
import { Derivations } from './derivations.ts';
import { loopRows } from './loop-rows.ts';
import { Numbers } from './numbers.ts';
import { Queries } from './queries.ts';
import { referenceProblems, referenceRows } from './reference-rows.ts';
import type { Placed, Report, RequirementContent, ResultContent } from './report.ts';
import { Respelling, typedSpellings } from './typed-names.ts';
import { Statements } from './statements.ts';
import { unitProblems } from './unit-statements.ts';

/** A worksheet that is being worked on: text in, report out, incrementally. */
export interface Session {
  /** The report on a text; only what changed since the last text is derived and computed anew. */
  update(text: string): Report;
  /** How many query functions have run so far, for tests and benchmarks. */
  readonly evaluationCount: number;
}

/** A worksheet longer than this is not evaluated, so that nothing can hang. */
const LONGEST_TEXT = 5_000_000;

/** Starts a session on an empty worksheet. */
export function createSession(): Session {
  return new WorksheetSession();
}

const VOCABULARY: Vocabulary = {
  isUnit: (text) => isUnitSymbol(text),
  functions: new Set([...FUNCTIONS.keys(), ...SOURCES.map((source) => source.name)]),
  slotArguments: (callee, index) => {
    const source = sourceNamed(callee);
    if (source) return isSourceSlot(source, index);
    const parameters = FUNCTIONS.get(callee)?.parameters ?? [];
    return parameters[Math.min(index, parameters.length - 1)]?.slot ?? false;
  },
};

/** Every argument of a source is a slot, except the transfer function of `shaped` and files. */
function isSourceSlot({ parameters }: Source, index: number): boolean {
  const takes = parameters[Math.min(index, parameters.length - 1)]?.takes;
  return takes !== 'transfer' && takes !== 'file';
}

class WorksheetSession implements Session {
  private readonly queries = new Queries();
  private readonly derivations = new Derivations(this.queries);
  private readonly numbers = new Numbers(this.queries, this.derivations);
  private readonly statements = new Statements(this.queries, this.derivations, this.numbers);
  private readonly respelling = new Respelling();
  private document: WorksheetDocument | undefined;

  get evaluationCount(): number {
    return this.queries.evaluationCount;
  }

  update(text: string): Report {
    if (text.length > LONGEST_TEXT) return tooLong(text);
    this.document = parseWorksheet(text, VOCABULARY, this.document);
    const starts = lineStarts(text);
    const lineOf = (offset: number) => positionAt(starts, offset).line;
    const catalogue = makeCatalogue(this.document.statements, lineOf);
    this.queries.advance(
      new Map<string, unknown>([
        ['catalogue', catalogue],
        ['statements', this.document.statements.map((placed) => placed.node)],
      ]),
    );
    this.respelling.use(typedSpellings(this.document));
    return this.respelling.of(this.report(this.document, catalogue, lineOf));
  }

  private report(
    document: WorksheetDocument,
    catalogue: Catalogue,
    lineOf: (offset: number) => number,
  ): Report {
    this.derivations.prepare();
    const results: Placed<ResultContent>[] = [];
    const requirements: Placed<RequirementContent>[] = [];
    const problems: Problem[] = [
      ...document.problems,
      ...catalogue.problems,
      ...unitProblems(catalogue, this.derivations.customUnits(), lineOf),
    ];
    for (const placed of document.statements) {
      this.statements.remember(placed.node, document.text.slice(placed.from, placed.to));
      const reported = this.statements.reportOn(placed.node, lineOfName(catalogue, lineOf));
      problems.push(...placed.problems.map((problem) => placeProblem(problem, placed.from)));
      problems.push(...reported.problems.map((problem) => placeProblem(problem, placed.from)));
      const place = { from: placed.from, to: placed.to, line: lineOf(placed.from) };
      if (reported.result) results.push({ ...place, content: reported.result });
      if (reported.requirement) requirements.push({ ...place, content: reported.requirement });
    }
    const assumptions = assumptionRows(
      document.statements,
      catalogue,
      this.queries,
      this.derivations,
      this.numbers,
      lineOf,
    );
    return {
      results,
      requirements,
      assumptions: assumptions.rows,
      problems: sortedProblems([
        ...problems,
        ...assumptions.problems,
        ...referenceProblems(document.references, this.derivations),
      ]),
      references: referenceRows(document.references, results, this.statements),
      loops: loopRows(document.statements, this.queries, this.derivations, lineOf),
    };
  }
}

function lineOfName(
  catalogue: Catalogue,
  lineOf: (offset: number) => number,
): (name: string) => number {
  return (name) => lineOf(catalogue.entries.get(name)?.placed.from ?? 0);
}

function sortedProblems(problems: readonly Problem[]): Problem[] {
  const distinct = new Map(
    problems.map((problem) => [
      `${problem.span.from} ${problem.span.to} ${problem.message}`,
      problem,
    ]),
  );
  return [...distinct.values()].sort((a, b) => a.span.from - b.span.from || a.span.to - b.span.to);
}

function tooLong(text: string): Report {
  const message = `This worksheet has ${text.length} characters; above ${LONGEST_TEXT} it is not evaluated. Split it.`;
  return {
    results: [],
    requirements: [],
    assumptions: [],
    problems: [errorAt({ from: 0, to: 0 }, 'too-long', message)],
    references: [],
    loops: [],
  };
}
