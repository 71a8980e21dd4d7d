import { namesIn, type Statement } from '../language/index.ts';

/** Names that a statement which introduces nothing refers to: formulas, requirements, figures. */
export function freeReferences(node: Statement): readonly string[] {
  switch (node.kind) {
    case 'formula':
    case 'explain':
      return namesIn(node.formula);
    case 'require':
      return namesIn(node.condition);
    case 'draw':
      return [...node.of, ...node.where, ...(node.over ? [node.over] : [])].flatMap((part) => [
        ...namesIn(part),
      ]);
    case 'tabulate':
      return node.columns.flatMap((column) => [...namesIn(column)]);
    default:
      return [];
  }
}
