import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { refuse } from '../../src/base/index.ts';
import {
  contentHash,
  decodeWorksheet,
  encodeWorksheet,
  WORKSHEET_BYTE_LIMIT,
} from '../../src/server/worksheet-bytes.ts';

describe("a worksheet's bytes", () => {
  it('survive reading and writing whatever the text', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'binary' }), (text) => {
        const bytes = Buffer.from(text, 'utf8');
        expect(encodeWorksheet(decodeWorksheet(bytes) as string)).toEqual(bytes);
      }),
      { seed: 20260612, numRuns: 300 },
    );
  });

  it.each([
    ['a byte order mark', '\uFEFF# Mast\n'],
    ['Windows line endings', '# Mast\r\n\r\nJ is 4 kg m^2\r\n'],
    ['mixed line endings and no last one', 'a\r\nb\nc\rd'],
    ['nothing', ''],
  ])('survive with %s', (_what, text) => {
    const bytes = Buffer.from(text, 'utf8');
    expect(decodeWorksheet(bytes)).toBe(text);
    expect(encodeWorksheet(text)).toEqual(bytes);
  });

  it('that are not UTF-8 are refused with their line', () => {
    const bytes = Buffer.concat([
      Buffer.from('# Füllstand\nok\n'),
      Buffer.from('Fl\xfcche', 'latin1'),
    ]);
    expect(decodeWorksheet(bytes)).toEqual(
      refuse(
        'not-utf8',
        'The file is not UTF-8 text: line 3 holds bytes that are not. Convert it, for example with iconv -t UTF-8.',
      ),
    );
  });

  it('are refused above the limit, reading and writing', () => {
    const reason = 'The worksheet has 6.0 MB; the limit is 5.0 MB.';
    const six = 6 * 1024 * 1024;
    expect(decodeWorksheet(new Uint8Array(six))).toEqual(refuse('too-large', reason));
    expect(encodeWorksheet('x'.repeat(six))).toEqual(refuse('too-large', reason));
    expect(decodeWorksheet(new Uint8Array(WORKSHEET_BYTE_LIMIT))).toHaveLength(
      WORKSHEET_BYTE_LIMIT,
    );
  });

  it('cannot be made of half a character pair', () => {
    expect(encodeWorksheet('a\ud83db')).toEqual(
      refuse('not-text', 'The text holds half of a character pair and has no UTF-8 form.'),
    );
  });

  it('have the hash that FIPS 180-4 gives for "abc" (source: NIST FIPS 180-4 example; from memory)', () => {
    expect(contentHash(Buffer.from('abc'))).toBe(
      'ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad',
    );
  });
});
