import { errorAt, type Problem } from '../base/index.ts';
import {
  nameToLatex,
  nameToText,
  placeProblem,
  type AssumptionStatement,
  type PlacedStatement,
  type Statement,
} from '../language/index.ts';
import { formatNumber, unitText, unitToLatex, valueIn } from '../units/index.ts';
import { readBounds } from './assumptions.ts';
import { referencesOf, type Catalogue } from './catalogue.ts';
import { freeReferences } from './references.ts';
import type { Derivations } from './derivations.ts';
import type { Numbers } from './numbers.ts';
import type { Queries } from './queries.ts';
import type { AssumptionContent, Placed } from './report.ts';
import { signConflict } from './sign-conflicts.ts';
import { outcomeOf } from './stop.ts';

export interface AssumptionRows {
  readonly rows: readonly Placed<AssumptionContent>[];
  /** Absolute spans. */
  readonly problems: readonly Problem[];
}

/** The list of assumptions, and what is wrong with their numbers, units, tolerances and signs. */
export function assumptionRows(
  statements: readonly PlacedStatement[],
  catalogue: Catalogue,
  queries: Queries,
  derivations: Derivations,
  numbers: Numbers,
  lineOf: (offset: number) => number,
): AssumptionRows {
  const used = usedNames(statements, catalogue);
  const rows: Placed<AssumptionContent>[] = [];
  const problems: Problem[] = [];
  for (const placed of statements) {
    const place = { from: placed.from, to: placed.to, line: lineOf(placed.from) };
    const { node } = placed;
    problems.push(...signProblems(node, placed, catalogue, numbers, lineOf));
    if (node.kind === 'assumption' && catalogue.entries.get(node.name)?.node === node) {
      problems.push(...assumptionProblems(node, placed, catalogue, derivations, numbers));
      rows.push({
        ...place,
        content: assumptionContent(
          node,
          placed,
          used.has(node.name),
          catalogue,
          derivations,
          numbers,
        ),
      });
    }
    for (const name of symbolNames(node)) {
      const entry = catalogue.entries.get(name);
      if (entry?.kind === 'symbol' && entry.placed === placed)
        rows.push({ ...place, content: symbolContent(name, catalogue, used.has(name)) });
    }
  }
  return { rows: rows.map((row) => keepSame(row, queries)), problems };
}

function symbolNames(node: Statement): readonly string[] {
  return node.kind === 'sign' || node.kind === 'has-unit'
    ? node.names.map((name) => name.name)
    : [];
}

/** Names that some statement refers to. */
function usedNames(
  statements: readonly PlacedStatement[],
  catalogue: Catalogue,
): ReadonlySet<string> {
  const used = new Set<string>();
  for (const entry of catalogue.entries.values()) {
    for (const name of referencesOf(entry, catalogue.entries)) used.add(name);
  }
  for (const { node } of statements) for (const name of freeReferences(node)) used.add(name);
  return used;
}

/** The error of a value or a tolerance that contradicts a sign statement. */
function signProblems(
  node: Statement,
  placed: PlacedStatement,
  catalogue: Catalogue,
  numbers: Numbers,
  lineOf: (offset: number) => number,
): Problem[] {
  if (node.kind !== 'assumption' && node.kind !== 'definition') return [];
  const stated = catalogue.signs.get(node.name);
  if (!stated || catalogue.entries.get(node.name)?.node !== node) return [];
  const conflict = signConflict(node.name, stated.sign, numbers);
  if (!conflict) return [];
  const reading = numbers.reading(node.name);
  const unit = reading?.ok ? reading.value.unit : null;
  const [low, high] = [conflict.low, conflict.high].map((si) =>
    formatNumber(unit ? valueIn(si, unit) : si),
  );
  const ends = low === high ? `is ${low}` : `can be from ${low} to ${high}`;
  const what = `${nameToText(node.name)} ${ends} ${unit ? unit.text : ''}`.trim();
  const message = `${what}, which contradicts that it is ${stated.sign} (line ${lineOf(stated.placed.from)}).`;
  return [placeProblem(errorAt(node.nameSpan, 'sign-contradicted', message), placed.from)];
}

function assumptionProblems(
  node: AssumptionStatement,
  placed: PlacedStatement,
  catalogue: Catalogue,
  derivations: Derivations,
  numbers: Numbers,
): Problem[] {
  const reading = numbers.reading(node.name);
  if (!reading) return [];
  if (!reading.ok) return reading.problem ? [placeProblem(reading.problem, placed.from)] : [];
  const tune = catalogue.tunes.get(node.name);
  const tuned =
    tune &&
    outcomeOf(tune.node.span, () =>
      readBounds(
        tune.node.from,
        tune.node.to,
        reading.value.unit,
        node.name,
        derivations.customUnits(),
      ),
    );
  return [
    ...(tune && tuned && !tuned.ok && tuned.problem
      ? [placeProblem(tuned.problem, tune.placed.from)]
      : []),
  ];
}

function assumptionContent(
  node: AssumptionStatement,
  placed: PlacedStatement,
  used: boolean,
  catalogue: Catalogue,
  derivations: Derivations,
  numbers: Numbers,
): AssumptionContent {
  const reading = numbers.reading(node.name);
  const unit = reading?.ok ? reading.value.unit : null;
  const typed = Number(node.value.text);
  const numberFrom = placed.from + node.value.span.from;
  return {
    name: node.name,
    nameLatex: nameToLatex(node.name),
    description: node.comment,
    valueText: unit ? `${node.value.text} ${unitText(unit)}`.trim() : node.value.text,
    toleranceText: toleranceText(node),
    sign: catalogue.signs.get(node.name)?.sign ?? null,
    number: Number.isFinite(typed) ? typed : null,
    unit: unit && unitText(unit) !== '' ? unitText(unit) : null,
    unitLatex: unit && unitText(unit) !== '' ? unitToLatex(unit) : null,
    numberSpan: { from: numberFrom, to: numberFrom + node.value.text.length },
    slider: sliderOf(node, catalogue, derivations, numbers),
    used,
  };
}

function toleranceText(node: AssumptionStatement): string | null {
  const { tolerance } = node;
  if (!tolerance) return null;
  const write = (quantity: { text: string; unit: string }) =>
    `${quantity.text} ${unitText(quantity.unit)}`.trim();
  if (tolerance.kind === 'range') return `${tolerance.from.text} to ${write(tolerance.to)}`;
  return `± ${write(tolerance.half)}${tolerance.sigmas ? ` at ${tolerance.sigmas} sigma` : ''}`;
}

function sliderOf(
  node: AssumptionStatement,
  catalogue: Catalogue,
  derivations: Derivations,
  numbers: Numbers,
): AssumptionContent['slider'] {
  const reading = numbers.reading(node.name);
  if (!reading?.ok) return null;
  const { unit, tolerance } = reading.value;
  const typed = ([low, high]: readonly number[], why: 'tune' | 'tolerance') => {
    const [from, to] = [low, high].map((si) => Number(formatNumber(valueIn(si, unit), 6)));
    return from < to ? { low: from, high: to, why } : null;
  };
  const tune = catalogue.tunes.get(node.name);
  if (tune) {
    const bounds = outcomeOf(tune.node.span, () =>
      readBounds(tune.node.from, tune.node.to, unit, node.name, derivations.customUnits()),
    );
    return bounds.ok ? typed(bounds.value, 'tune') : null;
  }
  return tolerance && typed([tolerance.low, tolerance.high], 'tolerance');
}

function symbolContent(name: string, catalogue: Catalogue, used: boolean): AssumptionContent {
  const unit = catalogue.units.get(name)?.unit ?? null;
  return {
    name,
    nameLatex: nameToLatex(name),
    description: null,
    valueText: 'no value',
    toleranceText: null,
    sign: catalogue.signs.get(name)?.sign ?? null,
    number: null,
    unit: unit && unitText(unit),
    unitLatex: unit && unitToLatex(unit),
    numberSpan: null,
    slider: null,
    used,
  };
}

/** An unchanged row keeps its content object. */
function keepSame(row: Placed<AssumptionContent>, queries: Queries): Placed<AssumptionContent> {
  const content = queries.get(
    `assumption-row:${row.content.name}`,
    () => {
      queries.input('statements');
      return row.content;
    },
    (a, b) => JSON.stringify(a) === JSON.stringify(b),
  );
  return { ...row, content };
}
