import { readFile, stat } from 'node:fs/promises';
import { isRefusal, type Refusal } from '../base/index.ts';
import { createSession } from '../engine/index.ts';
import { decodeWorksheet, fileRefusal, refuseSize } from '../server/index.ts';
import { checkRecord, unreadableRecord, type CheckRecord } from './check-record.ts';
import { checkText } from './check-text.ts';
import { EXIT, exitCode } from './exit-code.ts';

const BYTE_ORDER_MARK = '\uFEFF';

/**
 * Evaluates worksheet files one after the other and prints what became of each.
 *
 * @param files paths, as given
 * @param print takes a piece of the output, line end included
 * @param options.json one JSON object a file, one a line, instead of text
 * @returns the exit code: 0 all requirements met, 1 one not met, 2 an error in a worksheet or a file that cannot be read
 */
export async function check(
  files: readonly string[],
  print: (text: string) => void,
  options: { readonly json: boolean },
): Promise<number> {
  let worst: number = EXIT.allMet;
  for (const file of files) {
    const { record, notes } = await checkFile(file);
    print(options.json ? `${JSON.stringify(record)}\n` : checkText(record, notes));
    worst = Math.max(worst, exitCode(record));
  }
  return worst;
}

interface CheckedFile {
  readonly record: CheckRecord;
  /** For each requirement, what the record has no field for. */
  readonly notes: readonly (readonly string[])[];
}

/** Evaluates one file in a session of its own; a file that cannot be read is a problem like any other. */
async function checkFile(file: string): Promise<CheckedFile> {
  const text = await readWorksheet(file);
  if (isRefusal(text)) return { record: unreadableRecord(file, text.reason), notes: [] };
  const report = createSession().update(text);
  const notes = report.requirements.map(({ content }) => content.notes);
  return { record: checkRecord(file, text, report), notes };
}

/** The text without a byte order mark, which counts neither as a character of the first line nor as part of it. */
async function readWorksheet(file: string): Promise<string | Refusal> {
  try {
    const { size } = await stat(file);
    const bytes = refuseSize(size) ?? (await readFile(file));
    if (isRefusal(bytes)) return bytes;
    const text = decodeWorksheet(bytes);
    if (isRefusal(text)) return text;
    return text.startsWith(BYTE_ORDER_MARK) ? text.slice(1) : text;
  } catch (error) {
    return fileRefusal(error, 'Cannot read the file');
  }
}
