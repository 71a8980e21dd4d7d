import { errorAt, type Problem } from '../base/index.ts';
import type { Expression } from './ast.ts';
import { readWholeFormula } from './loop-statements.ts';
import { LineReader, WORKSHEET_SCOPE } from './reader.ts';
import { tokenLines } from './tokens.ts';
import { NameContext, type NameKind, type Vocabulary } from './vocabulary.ts';
import { loopParser } from './worksheet-parser.ts';

/** A formula that was read by itself; null where it could not be read, and the problems say why. */
export interface ReadFormula {
  readonly expression: Expression | null;
  readonly problems: readonly Problem[];
}

/**
 * Reads a single formula, as the right side of a definition is read.
 *
 * @param nameKinds what the names of the worksheet are, which decides the meaning of a name before a bracket
 */
export function parseFormula(
  text: string,
  vocabulary: Vocabulary,
  nameKinds: ReadonlyMap<string, NameKind> = new Map(),
): ReadFormula {
  const problems: Problem[] = [];
  const tokens = tokenLines(loopParser.parse(text).topNode, null, text, 0, 0).flatMap(
    (line) => line.tokens,
  );
  if (tokens.length === 0) {
    const span = { from: 0, to: text.length };
    return {
      expression: null,
      problems: [errorAt(span, 'incomplete', 'There is no formula here.')],
    };
  }
  const context = new NameContext(vocabulary, nameKinds);
  const reader = new LineReader(tokens, text, context, WORKSHEET_SCOPE, problems);
  const expression = readWholeFormula(reader);
  return { expression: reader.isSound ? expression : null, problems };
}
