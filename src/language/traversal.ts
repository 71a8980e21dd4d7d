import type { Expression } from './ast.ts';

/** The formulas directly inside a formula, in the order of the text. */
export function childrenOf(e: Expression): readonly Expression[] {
  switch (e.kind) {
    case 'number':
    case 'quantity':
    case 'name':
    case 'text':
      return [];
    case 'member':
    case 'derivative':
    case 'negation':
    case 'not':
    case 'in-unit':
      return [e.of];
    case 'call':
      return e.args;
    case 'evaluation':
      return [e.at];
    case 'arrow':
      return [e.from, ...e.to];
    case 'sum':
      return e.terms;
    case 'product':
      return e.factors;
    case 'power':
      return [e.base, e.exponent];
    case 'relation':
      return e.sides;
    case 'logical':
      return e.operands;
    case 'with':
      return [e.of, ...e.replacements.map((replacement) => replacement.value)];
    case 'limit':
      return [e.of, e.to];
    case 'rows':
      return e.rows.flat();
  }
}

/** Visits a formula and everything in it, outermost first. */
export function walk(e: Expression, visit: (part: Expression) => void): void {
  visit(e);
  for (const child of childrenOf(e)) walk(child, visit);
}

/**
 * The canonical names that a formula refers to, each once, in order: names, called functions and loops, evaluated
 * definitions. Signals in `->`, members and the names that a `with` replaces are not among them.
 */
export function namesIn(e: Expression): readonly string[] {
  const names = new Set<string>();
  collectNames(e, names);
  return [...names];
}

function collectNames(e: Expression, names: Set<string>): void {
  if (e.kind === 'arrow') return;
  if (e.kind === 'name' || e.kind === 'evaluation') names.add(e.name);
  if (e.kind === 'call') names.add(e.callee);
  for (const child of childrenOf(e)) collectNames(child, names);
}
