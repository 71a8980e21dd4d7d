import type { Name } from './ast.ts';
import { canonicalName, CONSTANT_MEANINGS } from './names.ts';
import type { LineReader } from './reader.ts';
import type { Token } from './tokens.ts';

/** Reads a name that is being mentioned rather than used. */
export function readName(reader: LineReader, purpose: string): Name {
  const token = reader.peek();
  if (token?.kind === 'name') {
    reader.take();
    return nameOf(token);
  }
  const { span } = reader.failUnexpected(purpose);
  return { kind: 'name', span, name: '' };
}

/** Reads a name that a statement introduces, which must not be one of the language's own. */
export function readNewName(reader: LineReader, purpose: string): Name {
  const token = reader.peek();
  const meaning = token?.kind === 'name' ? CONSTANT_MEANINGS.get(canonicalName(token.text)) : null;
  if (token && meaning)
    reader.fail(token, 'reserved-name', `\`${token.text}\` is ${meaning}; choose another name.`);
  return readName(reader, purpose);
}

/** The name that a token is, in its canonical spelling. */
export function nameOf(token: Token): Name {
  return {
    kind: 'name',
    span: { from: token.from, to: token.to },
    name: canonicalName(token.text),
  };
}
