import { errorAt, type Problem } from '../base/index.ts';
import { replacement } from './fixes.ts';
import type { Token } from './tokens.ts';

/** Characters that are pasted in from typeset text, and what the language writes instead. */
const WRITTEN_INSTEAD: Readonly<Record<string, string>> = {
  '²': '^2',
  '³': '^3',
  '¹': '^1',
  '×': '*',
  '÷': '/',
  '∕': '/',
  '“': '"',
  '”': '"',
  '„': '"',
  '–': '-',
  '→': '->',
  '≠': 'not (… = …)',
  '∞': '',
  '{': '(',
  '}': ')',
};

/** Whether a token is wrong wherever it stands, and {@link strayProblem} can say why. */
export function isExplainedStray(token: Token): boolean {
  return token.kind === 'stray' || token.kind === 'open-text' || token.kind === 'unit-sign';
}

/** What is wrong with a token that no formula takes: a stray character, a text without its end, a loose unit sign. */
export function strayProblem(token: Token): Problem {
  if (token.kind === 'open-text')
    return errorAt(token, 'unclosed-text', `The text ${token.text} has no closing quote.`, [
      {
        title: 'close the quote',
        edits: [{ span: { from: token.to, to: token.to }, insert: '"' }],
      },
    ]);
  if (token.kind === 'unit-sign')
    return errorAt(
      token,
      'loose-unit',
      `\`${token.text}\` is a unit; in a formula a unit stands in square brackets after its number, as in \`3 [${token.text === '√' ? 'µrad/√Hz' : token.text}]\`.`,
    );
  return strayCharacter(token);
}

function strayCharacter(token: Token): Problem {
  const instead = WRITTEN_INSTEAD[token.text];
  const said = `The character \`${token.text}\` has no meaning here`;
  if (!instead) return errorAt(token, 'stray-character', `${said}.`);
  const fixes = instead.includes('…') ? [] : [replacement(token, instead)];
  return errorAt(token, 'stray-character', `${said}; write \`${instead}\`.`, fixes);
}
