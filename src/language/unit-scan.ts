import type { Span } from '../base/index.ts';
import type { SolidusReadings } from './solidus.ts';
import type { Token } from './tokens.ts';

/** A run of tokens that has the form of a unit; `end` is the index past its last token. */
export interface UnitScan {
  readonly end: number;
  /** Tokens of the unit symbols in it, `kN` and `m` and `rad` of `kN m/rad`. */
  readonly symbols: readonly Token[];
  /** Where the solidus rule is broken: more than one factor, or another solidus, after a solidus. */
  readonly unclear: SolidusReadings | null;
}

/** Brackets in a unit deeper than this are not a unit. */
const MAXIMUM_DEPTH = 20;

interface Scan {
  index: number;
  depth: number;
  readonly tokens: readonly Token[];
  readonly symbols: Token[];
  unclear: SolidusReadings | null;
}

/**
 * Finds the longest run of tokens, from index `start`, that has the form of a unit: symbols and bracketed units,
 * multiplied by a space or `·`, with integer powers, √, and one solidus (`1` may stand before it). Which symbols are
 * units is not asked.
 */
export function scanUnit(tokens: readonly Token[], start: number): UnitScan | null {
  const scan: Scan = { index: start, depth: 0, tokens, symbols: [], unclear: null };
  if (!scanQuotient(scan)) return null;
  return { end: scan.index, symbols: scan.symbols, unclear: scan.unclear };
}

function textAt(scan: Scan, ahead = 0): string {
  return scan.tokens[scan.index + ahead]?.text ?? '';
}

function spanOf(scan: Scan, start: number): Span {
  return { from: scan.tokens[start]!.from, to: scan.tokens[scan.index - 1]!.to };
}

function scanQuotient(scan: Scan): boolean {
  const start = scan.index;
  if (textAt(scan) === '1' && textAt(scan, 1) === '/') scan.index += 1;
  else if (!scanProduct(scan)) return false;
  const numerator = spanOf(scan, start);
  return textAt(scan) !== '/' || scanDivisor(scan, numerator);
}

/** The solidus and what follows it. */
function scanDivisor(scan: Scan, numerator: Span): boolean {
  scan.index += 1;
  const start = scan.index;
  if (!scanPower(scan)) return false;
  const divisor = spanOf(scan, start);
  let isUnclear = scanMoreFactors(scan);
  while (textAt(scan) === '/') {
    scan.index += 1;
    if (!scanProduct(scan)) return false;
    isUnclear = true;
  }
  if (isUnclear) scan.unclear ??= { numerator, divisor, rest: spanOf(scan, start) };
  return true;
}

function scanProduct(scan: Scan): boolean {
  if (!scanPower(scan)) return false;
  scanMoreFactors(scan);
  return true;
}

/** Further factors after a first one; whether there were any. */
function scanMoreFactors(scan: Scan): boolean {
  const start = scan.index;
  for (;;) {
    const before = scan.index;
    if (textAt(scan) === '·') scan.index += 1;
    if (scanPower(scan)) continue;
    scan.index = before;
    return scan.index > start;
  }
}

function scanPower(scan: Scan): boolean {
  const before = scan.index;
  const known = scan.symbols.length;
  if (!scanBase(scan)) {
    scan.index = before;
    scan.symbols.length = known;
    return false;
  }
  if (textAt(scan) !== '^') return true;
  const signLength = textAt(scan, 1) === '-' ? 1 : 0;
  if (!/^\d+$/.test(textAt(scan, 1 + signLength))) return true;
  scan.index += 2 + signLength;
  return true;
}

function scanBase(scan: Scan): boolean {
  while (textAt(scan) === '√') scan.index += 1;
  const token = scan.tokens[scan.index];
  if (!token) return false;
  scan.index += 1;
  if (token.text === '(') return scanBracket(scan);
  if (token.kind !== 'name' && token.kind !== 'unit-sign') return false;
  scan.symbols.push(token);
  return true;
}

function scanBracket(scan: Scan): boolean {
  if (scan.depth >= MAXIMUM_DEPTH) return false;
  scan.depth += 1;
  const isUnit = scanQuotient(scan) && textAt(scan) === ')';
  scan.depth -= 1;
  if (!isUnit) return false;
  scan.index += 1;
  return true;
}
