import { readFileSync } from 'node:fs';

/** A published check value with its source. */
export interface PublishedCase {
  readonly id: string;
  readonly topic: string;
  readonly kind: string;
  readonly given: Readonly<Record<string, never>>;
  readonly expect: Readonly<Record<string, never>>;
  readonly tolerance: { readonly rel: number };
  readonly source: string;
  readonly how: string;
}

const CASES: readonly PublishedCase[] = ['control', 'noise'].flatMap((name) =>
  JSON.parse(readFileSync(new URL(`../data/${name}-cases.json`, import.meta.url), 'utf8')),
);

/** Cases of a topic and kind as rows for `test.each`: the title shows the source and how it was checked. */
export function published(
  select: (c: PublishedCase) => boolean,
): readonly (readonly [string, PublishedCase])[] {
  return CASES.filter(select).map((c) => [`${c.id} (${c.source}; ${c.how})`, c]);
}
