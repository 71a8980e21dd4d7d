import { canonicalName, type WorksheetDocument } from '../language/index.ts';

const NAME = /\p{L}[\p{L}\p{N}_]*/gu;

/**
 * How the worksheet spells the names that have more than one spelling: `θ` is `theta` where that was typed first.
 * Inside the program names are canonical; what a reader or another program sees is as typed.
 */
export function typedSpellings(document: WorksheetDocument): ReadonlyMap<string, string> {
  const spellings = new Map<string, string>();
  for (const { contentFrom, contentTo } of document.cells) {
    for (const [typed] of document.text.slice(contentFrom, contentTo).matchAll(NAME)) {
      const canonical = canonicalName(typed);
      if (!spellings.has(canonical)) spellings.set(canonical, typed);
    }
  }
  for (const [canonical, typed] of spellings) if (canonical === typed) spellings.delete(canonical);
  return spellings;
}

/** Writes plain data as the worksheet spells it; data without a respelt name is the same object. */
export class Respelling {
  private spellings: ReadonlyMap<string, string> = new Map();
  private known = new WeakMap<object, object>();

  /** Takes the spellings of a revision; what was written with other ones is forgotten. */
  use(spellings: ReadonlyMap<string, string>): void {
    const same =
      spellings.size === this.spellings.size &&
      [...spellings].every(([canonical, typed]) => this.spellings.get(canonical) === typed);
    if (same) return;
    this.spellings = spellings;
    this.known = new WeakMap();
  }

  /** The data with every text respelt; typeset texts and rows of numbers hold no names. */
  of<T>(data: T): T {
    if (this.spellings.size === 0) return data;
    return this.respelt(data) as T;
  }

  private respelt(data: unknown): unknown {
    if (typeof data === 'string') return this.text(data);
    if (typeof data !== 'object' || data === null || isNumeric(data)) return data;
    const known = this.known.get(data);
    if (known) return known;
    const written = Array.isArray(data) ? this.list(data) : this.record(data);
    this.known.set(data, written);
    return written;
  }

  private text(text: string): string {
    return text.replace(NAME, (name) => this.spellings.get(name) ?? name);
  }

  private list(list: readonly unknown[]): readonly unknown[] {
    const written = list.map((item) => this.respelt(item));
    return written.every((item, index) => item === list[index]) ? list : written;
  }

  private record(record: object): object {
    const written = Object.entries(record).map(([key, value]) => [
      this.text(key),
      /latex$/i.test(key) ? value : this.respelt(value),
    ]);
    const same = Object.entries(record).every(
      ([key, value], index) => written[index][0] === key && written[index][1] === value,
    );
    return same ? record : Object.fromEntries(written);
  }
}

/** Points, rings and samples: nothing to look for in them. */
function isNumeric(data: object): boolean {
  if (ArrayBuffer.isView(data)) return true;
  return Array.isArray(data) && data.length > 0 && isNumericItem(data[0]);
}

function isNumericItem(item: unknown): boolean {
  return (
    typeof item === 'number' || (Array.isArray(item) && item.length > 0 && isNumericItem(item[0]))
  );
}
