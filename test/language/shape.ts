import {
  parseFormula,
  parseWorksheet,
  type Expression,
  type NameKind,
  type PlacedStatement,
} from '../../src/language/index.ts';
import type { Problem } from '../../src/base/index.ts';
import { VOCABULARY } from './vocabulary.ts';

/** The tree of a formula as a bracketed text: `(+ a (- b))` for `a - b`. */
export function shapeOf(e: Expression): string {
  switch (e.kind) {
    case 'number':
      return e.text;
    case 'quantity':
      return `[${e.text} ${e.unit}]`;
    case 'name':
      return e.name;
    case 'text':
      return JSON.stringify(e.text);
    case 'member':
      return `${shapeOf(e.of)}.${e.name}`;
    case 'derivative':
      return `(d${e.order} ${shapeOf(e.of)})`;
    case 'call':
      return `(${[`${e.callee}!`, ...e.args.map(shapeOf)].join(' ')})`;
    case 'evaluation':
      return `(${e.name}@ ${shapeOf(e.at)})`;
    case 'arrow':
      return `(-> ${[e.from, ...e.to].map(shapeOf).join(' ')})`;
    case 'sum':
      return `(+ ${e.terms.map((term, k) => (e.signs[k] === 1 ? shapeOf(term) : `(- ${shapeOf(term)})`)).join(' ')})`;
    case 'product':
      return `(* ${e.factors.map((factor, k) => (e.inverted[k] ? '/' : '') + shapeOf(factor)).join(' ')})`;
    case 'negation':
      return `(- ${shapeOf(e.of)})`;
    case 'power':
      return `(^ ${shapeOf(e.base)} ${shapeOf(e.exponent)})`;
    case 'relation':
      return `(${e.operators.join()} ${e.sides.map(shapeOf).join(' ')})`;
    case 'logical':
      return `(${e.operator} ${e.operands.map(shapeOf).join(' ')})`;
    case 'not':
      return `(not ${shapeOf(e.of)})`;
    case 'with':
      return `(with ${shapeOf(e.of)} ${e.replacements.map(({ name, by, value }) => `${name} ${by} ${shapeOf(value)}`).join(', ')})`;
    case 'in-unit':
      return `(in ${shapeOf(e.of)} ${e.unit})`;
    case 'limit':
      return `(limit ${shapeOf(e.of)} ${e.variable} ${shapeOf(e.to)})`;
    case 'rows':
      return `(rows ${e.rows.map((row) => row.map(shapeOf).join(' ')).join(' | ')})`;
  }
}

/** Names that the formulas of the tests use. */
export const NAME_KINDS: ReadonlyMap<string, NameKind> = new Map<string, NameKind>([
  ['Kp', 'assumption'],
  ['m', 'assumption'],
  ['C', 'definition'],
  ['L', 'definition'],
  ['az', 'loop'],
  ['storm', 'case'],
  ['q', 'symbol'],
]);

/** A problem in one line: severity, code, the text it stands at, the message, and the text after each fix. */
export function shownProblem(problem: Problem, text: string): string {
  const { severity, code, span, message, fixes } = problem;
  const after = fixes.map((fix) => `→ ${fixed(text, fix.edits)}`);
  return [`${severity} ${code} at ‹${text.slice(span.from, span.to)}›: ${message}`, ...after].join(
    '\n',
  );
}

function fixed(text: string, edits: Problem['fixes'][number]['edits']): string {
  return [...edits]
    .sort((a, b) => b.span.from - a.span.from)
    .reduce(
      (result, { span, insert }) => result.slice(0, span.from) + insert + result.slice(span.to),
      text,
    );
}

/** Reads a formula: its shape, or its problems. */
export function readShape(text: string): string {
  const { expression, problems } = parseFormula(text, VOCABULARY, NAME_KINDS);
  if (expression && problems.length === 0) return shapeOf(expression);
  return problems.map((problem) => shownProblem(problem, text)).join('\n');
}

/** Reads the statements of one cell. */
export function readCell(lines: string): readonly PlacedStatement[] {
  return parseWorksheet(`\`\`\`loop\n${lines}\n\`\`\`\n`, VOCABULARY).statements;
}

/** The problems of the statements of a cell, each shown in its statement's text. */
export function problemsOf(lines: string): readonly string[] {
  const text = `\`\`\`loop\n${lines}\n\`\`\`\n`;
  return parseWorksheet(text, VOCABULARY).statements.flatMap(({ from, to, problems }) =>
    problems.map((problem) => shownProblem(problem, text.slice(from, to))),
  );
}
