declare module '*.grammar' {
  import type { LRParser } from '@lezer/lr';
  export const parser: LRParser;
}

declare module '*/loop.grammar.terms' {
  export const lineStart: number;
  export const statementBreak: number;
  export const blockStart: number;
  export const lineBreak: number;
  export const softBreak: number;
  export const Name: number;
  export const Stray: number;
}
