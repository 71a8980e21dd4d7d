import { errorAt, warningAt, type Problem } from '../base/index.ts';
import {
  isReserved,
  nameToLatex,
  nameToText,
  namesIn,
  offsetSpan,
  type CaseStatement,
  type DefinitionStatement,
  type AssumptionStatement,
  type LoopStatement,
  type PlacedStatement,
  type Sign,
  type Statement,
  type TuneStatement,
  type UnitStatement,
} from '../language/index.ts';
import type { Span } from '../base/index.ts';
import { FUNCTIONS, sourceNamed } from '../functions/index.ts';
import { dependenciesOf, type Dependencies } from './dependency-order.ts';
import { takenSignals } from './taken-signals.ts';

/** What introduces a name. */
export type Entry =
  | {
      readonly kind: 'assumption';
      readonly node: AssumptionStatement;
      readonly placed: PlacedStatement;
    }
  | {
      readonly kind: 'definition';
      readonly node: DefinitionStatement;
      readonly placed: PlacedStatement;
    }
  | { readonly kind: 'loop'; readonly node: LoopStatement; readonly placed: PlacedStatement }
  | { readonly kind: 'case'; readonly node: CaseStatement; readonly placed: PlacedStatement }
  | { readonly kind: 'symbol'; readonly node: Statement; readonly placed: PlacedStatement }
  | { readonly kind: 'unavailable'; readonly node: Statement; readonly placed: PlacedStatement };

/** All names of a worksheet, with what each is; made anew from the statements of every revision. */
export interface Catalogue {
  readonly entries: ReadonlyMap<string, Entry>;
  readonly signs: ReadonlyMap<
    string,
    { readonly sign: Sign; readonly placed: PlacedStatement; readonly span: Span }
  >;
  readonly units: ReadonlyMap<
    string,
    { readonly unit: string; readonly placed: PlacedStatement; readonly span: Span }
  >;
  readonly tunes: ReadonlyMap<
    string,
    { readonly node: TuneStatement; readonly placed: PlacedStatement }
  >;
  readonly customUnits: readonly {
    readonly node: UnitStatement;
    readonly placed: PlacedStatement;
  }[];
  /** Order in which names are introduced. */
  readonly order: ReadonlyMap<string, number>;
  /** Every name after those that it depends on, so that nothing is evaluated deep in something else. */
  readonly evaluationOrder: readonly string[];
  /** Names that stand for nothing: in a circle of definitions, defined twice, loops with a signal that is none. */
  readonly faulty: ReadonlySet<string>;
  readonly problems: readonly Problem[];
}

interface Introduction {
  readonly name: string;
  readonly span: Span;
  readonly entry: Entry;
}

/** Collects what the statements introduce, and the problems of names: twice defined, reserved, alike, circular. */
export function makeCatalogue(
  statements: readonly PlacedStatement[],
  lineOf: (offset: number) => number,
): Catalogue {
  const builder = new CatalogueBuilder(lineOf);
  for (const placed of statements) builder.read(placed);
  return builder.finish();
}

/** A loop or a case of which a line could not be read says less than was written: nothing may be derived from it. */
function isWhole({ problems }: PlacedStatement): boolean {
  return problems.every(({ severity }) => severity !== 'error');
}

class CatalogueBuilder {
  private readonly entries = new Map<string, Entry>();
  private readonly places = new Map<string, Introduction[]>();
  private readonly signs = new Map<string, { sign: Sign; placed: PlacedStatement; span: Span }>();
  private readonly units = new Map<string, { unit: string; placed: PlacedStatement; span: Span }>();
  private readonly tunes = new Map<string, { node: TuneStatement; placed: PlacedStatement }>();
  private readonly customUnits: { node: UnitStatement; placed: PlacedStatement }[] = [];
  private readonly symbols: Introduction[] = [];
  private readonly order = new Map<string, number>();
  private readonly problems: Problem[] = [];

  constructor(private readonly lineOf: (offset: number) => number) {}

  read(placed: PlacedStatement): void {
    const node = placed.node;
    switch (node.kind) {
      case 'assumption':
      case 'definition':
        this.introduce(node.name, node.nameSpan, { kind: node.kind, node, placed } as Entry);
        break;
      case 'loop':
      case 'case': {
        const kind = isWhole(placed) ? node.kind : 'unavailable';
        this.introduce(node.name, node.nameSpan, { kind, node, placed } as Entry);
        break;
      }
      case 'sign':
        for (const name of node.names) this.readSign(name.name, name.span, node.sign, placed);
        break;
      case 'has-unit':
        for (const name of node.names) this.readUnit(name.name, name.span, node.unit, placed);
        break;
      case 'tune':
        this.readTune(node, placed);
        break;
      case 'unit':
        this.customUnits.push({ node, placed });
        break;
      case 'points':
        for (const part of node.assumptions) {
          this.introduce(part.name, part.nameSpan, { kind: 'unavailable', node, placed });
        }
        break;
      case 'broken':
        if (node.name) this.introduce(node.name, node.span, { kind: 'unavailable', node, placed });
        break;
    }
  }

  finish(): Catalogue {
    for (const symbol of this.symbols) {
      if (!this.entries.has(symbol.name)) this.entries.set(symbol.name, symbol.entry);
    }
    this.checkDuplicates();
    this.checkTypesetting();
    this.checkTunes();
    this.checkUnits();
    this.checkHiding();
    const { circles, order: evaluationOrder } = dependenciesOf(this.entries.keys(), (name) =>
      referencesOf(this.entries.get(name)!, this.entries),
    );
    this.checkCircles(circles);
    const faulty = new Set([...circles.flat(), ...this.ambiguous, ...this.checkSignals()]);
    const { entries, signs, units, tunes, customUnits, order, problems } = this;
    return { entries, signs, units, tunes, customUnits, order, evaluationOrder, faulty, problems };
  }

  private introduce(name: string, span: Span, entry: Entry): void {
    if (isReserved(name)) return;
    this.note(name);
    const place = { name, span, entry };
    this.places.set(name, [...(this.places.get(name) ?? []), place]);
    if (!this.entries.has(name)) this.entries.set(name, entry);
  }

  private readSign(name: string, span: Span, sign: Sign, placed: PlacedStatement): void {
    this.note(name);
    this.signs.set(name, { sign, placed, span });
    this.symbols.push({ name, span, entry: { kind: 'symbol', node: placed.node, placed } });
  }

  private readUnit(name: string, span: Span, unit: string, placed: PlacedStatement): void {
    this.note(name);
    const earlier = this.units.get(name);
    if (earlier) this.refuseAgain(`${nameToText(name)} has a unit`, span, placed, earlier.placed);
    else this.units.set(name, { unit, placed, span });
    this.symbols.push({ name, span, entry: { kind: 'symbol', node: placed.node, placed } });
  }

  private readTune(node: TuneStatement, placed: PlacedStatement): void {
    const earlier = this.tunes.get(node.name);
    if (earlier) {
      const what = `${nameToText(node.name)} is tuned`;
      this.refuseAgain(what, node.nameSpan, placed, earlier.placed);
    } else this.tunes.set(node.name, { node, placed });
  }

  private refuseAgain(
    what: string,
    span: Span,
    placed: PlacedStatement,
    earlier: PlacedStatement,
  ): void {
    const message = `${what} in line ${this.lineOf(earlier.from)} already; keep one.`;
    this.problems.push(errorAt(offsetSpan(span, placed.from), 'given-again', message));
  }

  private note(name: string): void {
    if (!this.order.has(name)) this.order.set(name, this.order.size);
  }

  private checkDuplicates(): void {
    for (const [name, places] of this.places) {
      if (places.length < 2) continue;
      const lines = places.map((place) => this.lineOf(place.entry.placed.from));
      for (const place of places) {
        this.problems.push(
          errorAt(
            offsetSpan(place.span, place.entry.placed.from),
            'defined-twice',
            `${nameToText(name)} is defined ${places.length === 2 ? 'twice' : `${places.length} times`}, ` +
              `in lines ${listOf(lines)}; keep one, or rename the other.`,
          ),
        );
      }
    }
  }

  /** Names defined more than once have no value. */
  private get ambiguous(): Set<string> {
    return new Set(
      [...this.places].filter(([, places]) => places.length > 1).map(([name]) => name),
    );
  }

  /** Where each name is first introduced. */
  private get introductions(): Introduction[] {
    const first = new Map([...this.places].map(([name, places]) => [name, places[0]] as const));
    for (const symbol of this.symbols) {
      if (!first.has(symbol.name)) first.set(symbol.name, symbol);
    }
    return [...first.values()];
  }

  private checkTypesetting(): void {
    const first = new Map<string, Introduction>();
    for (const later of this.introductions) {
      const set = nameToLatex(later.name);
      const earlier = first.get(set);
      if (!earlier) first.set(set, later);
      else this.problems.push(this.alike(later, earlier));
    }
  }

  private alike(later: Introduction, earlier: Introduction): Problem {
    return errorAt(
      offsetSpan(later.span, later.entry.placed.from),
      'typeset-alike',
      `${later.name} and ${earlier.name} (line ${this.lineOf(earlier.entry.placed.from)}) are typeset alike; ` +
        'use one spelling, or rename one.',
    );
  }

  private checkTunes(): void {
    for (const [name, { node, placed }] of this.tunes) {
      const entry = this.entries.get(name);
      if (entry?.kind === 'assumption') continue;
      this.problems.push(
        errorAt(
          offsetSpan(node.nameSpan, placed.from),
          'tune-without-value',
          entry
            ? `${name} is not an assumption, so it cannot be tuned; give it a value with \`${name} is …\`.`
            : `${name} has no value to tune; add \`${name} is …\`.`,
        ),
      );
    }
  }

  /** `has unit` is for a symbol without a value: a value brings its own unit. */
  private checkUnits(): void {
    for (const [name, { placed, span }] of this.units) {
      const entry = this.entries.get(name);
      if (!entry || entry.kind === 'symbol') continue;
      const message = `${nameToText(name)} is given in line ${this.lineOf(entry.placed.from)}, which gives its unit too; take this line away.`;
      this.problems.push(errorAt(offsetSpan(span, placed.from), 'unit-of-value', message));
    }
  }

  /** A worksheet name that hides a function of that name is noted. */
  private checkHiding(): void {
    for (const { name, span, entry } of this.introductions) {
      if (!FUNCTIONS.has(name) && !sourceNamed(name)) continue;
      const message = `${name} hides the function of that name in this worksheet.`;
      this.problems.push(warningAt(offsetSpan(span, entry.placed.from), 'hides-function', message));
    }
  }

  /** The loops that use as a signal what has a value outside; they say nothing. */
  private checkSignals(): string[] {
    const givenAt = (name: string): number | null => {
      const entry = this.entries.get(name);
      return entry ? this.lineOf(entry.placed.from) : null;
    };
    const taken = [...this.entries.values()].flatMap((entry) =>
      entry.kind === 'loop' ? takenSignals(entry.node, entry.placed, givenAt, this.lineOf) : [],
    );
    this.problems.push(...taken.map(({ problem }) => problem));
    return taken.map(({ loop }) => loop);
  }

  private checkCircles(circles: Dependencies['circles']): void {
    for (const circle of circles) {
      const lines = circle.map((name) => this.lineOf(this.entries.get(name)!.placed.from));
      for (const name of circle) {
        const entry = this.entries.get(name)!;
        const span = 'nameSpan' in entry.node ? entry.node.nameSpan : entry.node.span;
        this.problems.push(
          errorAt(
            offsetSpan(span, entry.placed.from),
            'circle',
            circle.length === 1
              ? `${name} is defined by itself.`
              : `${circle.join(', ')} are defined in a circle, in lines ${listOf(lines)}; break it at one of them.`,
          ),
        );
      }
    }
  }
}

function listOf(lines: readonly number[]): string {
  const sorted = [...lines].sort((a, b) => a - b);
  return `${sorted.slice(0, -1).join(', ')} and ${sorted.at(-1)}`;
}

/** Names that an entry's statement refers to and that the worksheet introduces. */
export function referencesOf(entry: Entry, entries: ReadonlyMap<string, Entry>): string[] {
  const node = entry.node;
  const known = (names: Iterable<string>) =>
    [...new Set(names)].filter((name) => entries.has(name));
  switch (node.kind) {
    case 'definition':
      return known(namesIn(node.formula));
    case 'loop':
      return known([
        ...node.equations.flatMap((equation) => [
          ...namesIn(equation.left),
          ...namesIn(equation.right),
        ]),
        ...node.uses.map((use) => use.loop.name),
      ]).filter((name) => !node.inputs.some((input) => input.name === name));
    case 'case':
      return known([
        node.loop.name,
        ...node.inputs.flatMap((input) =>
          input.sources.flatMap((term) => [
            ...namesIn(term.source),
            ...(term.after ? namesIn(term.after) : []),
          ]),
        ),
        ...node.starts.flatMap((start) => namesIn(start.value)),
      ]);
    default:
      return [];
  }
}
