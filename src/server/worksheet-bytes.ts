import { createHash } from 'node:crypto';
import { refuse, type Refusal } from '../base/index.ts';

/** The largest worksheet that is read or written, in bytes. */
export const WORKSHEET_BYTE_LIMIT = 5 * 1024 * 1024;

/** The content hash by which two versions of a file are told apart: SHA-256, in hexadecimal. */
export function contentHash(bytes: Uint8Array): string {
  return createHash('sha256').update(bytes).digest('hex');
}

/** Refuses (`too-large`) a size above the limit. */
export function refuseSize(byteCount: number): Refusal | null {
  if (byteCount <= WORKSHEET_BYTE_LIMIT) return null;
  const megabytes = (size: number) => (size / 1024 / 1024).toFixed(1);
  return refuse(
    'too-large',
    `The worksheet has ${megabytes(byteCount)} MB; the limit is ${megabytes(WORKSHEET_BYTE_LIMIT)} MB.`,
  );
}

/**
 * Reads bytes as UTF-8 so that {@link encodeWorksheet} gives back the same bytes: a byte order mark and all line
 * endings stay in the text.
 *
 * @returns the text, or the refusal `not-utf8` or `too-large`
 */
export function decodeWorksheet(bytes: Uint8Array): string | Refusal {
  const tooLarge = refuseSize(bytes.byteLength);
  if (tooLarge !== null) return tooLarge;
  try {
    return new TextDecoder('utf-8', { fatal: true, ignoreBOM: true }).decode(bytes);
  } catch {
    return refuse('not-utf8', notUtf8(bytes));
  }
}

function notUtf8(bytes: Uint8Array): string {
  const line = firstBadLine(bytes);
  return `The file is not UTF-8 text: line ${line} holds bytes that are not. Convert it, for example with iconv -t UTF-8.`;
}

/** The 1-based line of the first byte that is not UTF-8: a line end never lies inside a character, so lines decode alone. */
function firstBadLine(bytes: Uint8Array): number {
  const decoder = new TextDecoder('utf-8', { fatal: true });
  let line = 1;
  for (let from = 0; from < bytes.length; line++) {
    const end = bytes.indexOf(10, from);
    const to = end < 0 ? bytes.length : end + 1;
    try {
      decoder.decode(bytes.subarray(from, to));
    } catch {
      return line;
    }
    from = to;
  }
  return line;
}

/**
 * Writes text as UTF-8 bytes.
 *
 * @returns the bytes, or the refusal `not-text` (half of a surrogate pair has no UTF-8 form) or `too-large`
 */
export function encodeWorksheet(text: string): Uint8Array | Refusal {
  if (/\p{Surrogate}/u.test(text)) {
    return refuse('not-text', 'The text holds half of a character pair and has no UTF-8 form.');
  }
  const bytes = Buffer.from(text, 'utf8');
  return refuseSize(bytes.byteLength) ?? bytes;
}
