import { parseArgs } from 'node:util';
import { refuse, type Refusal } from '../base/index.ts';

/** What the command was asked to do. */
export type Order =
  | { readonly verb: 'serve'; readonly folder: string; readonly port: number | null }
  | { readonly verb: 'check'; readonly files: readonly string[]; readonly json: boolean }
  | { readonly verb: 'help' };

/** The help text, and the answer to an order that is not understood. */
export const USAGE = `loopwright serve [FOLDER] [--port N]   the worksheet page on 127.0.0.1, on the worksheets in FOLDER
                                       (FOLDER: worksheets; N: 4600 or the next free port)
loopwright check FILE…                 evaluate; print verdicts; exit 0 all met, 1 a requirement not met,
                                       2 an error in a worksheet
loopwright check --json FILE…          the same for programs: one JSON object a file, one a line
`;

const DEFAULT_FOLDER = 'worksheets';
const LATER_VERBS: readonly string[] = ['memo', 'compare'];

/**
 * Reads the command's arguments.
 *
 * @param words the arguments after the command's own name
 * @returns the order, or the refusal `usage` or `not-available`
 */
export function readOrder(words: readonly string[]): Order | Refusal {
  const [verb, ...rest] = words;
  if (verb === undefined || ['help', '--help', '-h'].includes(verb)) return { verb: 'help' };
  if (verb === 'serve') return readServe(rest);
  if (verb === 'check') return readCheck(rest);
  if (LATER_VERBS.includes(verb)) return refuse('not-available', `${verb} is not available yet.`);
  return refuse('usage', `There is no command ${JSON.stringify(verb)}.`);
}

function readServe(words: readonly string[]): Order | Refusal {
  const read = readWords(words, { port: { type: 'string' } });
  if ('kind' in read) return read;
  const { positionals, values } = read;
  if (positionals.length > 1) return refuse('usage', 'serve takes one folder.');
  const port = typeof values.port === 'string' ? wholeNumber(values.port) : null;
  if (port !== null && !(port <= 65535)) {
    return refuse('usage', '--port takes a whole number from 0 to 65535.');
  }
  return { verb: 'serve', folder: positionals[0] ?? DEFAULT_FOLDER, port };
}

/** NaN for anything that is not written in digits alone. */
function wholeNumber(text: string): number {
  return /^\d+$/.test(text) ? Number(text) : NaN;
}

function readCheck(words: readonly string[]): Order | Refusal {
  const read = readWords(words, { json: { type: 'boolean' } });
  if ('kind' in read) return read;
  const { positionals, values } = read;
  if (positionals.length === 0) return refuse('usage', 'check needs at least one file.');
  return { verb: 'check', files: positionals, json: values.json === true };
}

type Options = Record<string, { type: 'string' | 'boolean' }>;
type Words = Pick<ReturnType<typeof parseArgs>, 'positionals' | 'values'>;

function readWords(words: readonly string[], options: Options): Words | Refusal {
  try {
    return parseArgs({ args: [...words], options, allowPositionals: true });
  } catch (error) {
    if (!(error instanceof TypeError)) throw error;
    return refuse('usage', error.message);
  }
}
