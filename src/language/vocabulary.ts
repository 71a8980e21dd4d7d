/** Which texts are unit symbols; the table of units lives in another layer. */
export interface UnitVocabulary {
  /** Whether the text is one known unit symbol, with or without a prefix: `kN`, `mrad`, `µs`, `%`, `°`. */
  isUnit(text: string): boolean;
}

/** What reading a worksheet takes from the layers above. */
export interface Vocabulary extends UnitVocabulary {
  /** The names of all worksheet functions and sources. */
  readonly functions: ReadonlySet<string>;
  /** Whether an argument (counted from 0) of a function or source is a quantity slot. */
  slotArguments(callee: string, index: number): boolean;
}

/** What a worksheet name is. A symbol has a sign or a unit but no value; a signal is known inside its loop only. */
export type NameKind = 'assumption' | 'definition' | 'loop' | 'case' | 'symbol' | 'signal';

/**
 * The names and units that one statement is read with. It keeps what was asked of the worksheet, so that a statement
 * needs to be read again only if one of the answers has changed.
 */
export class NameContext {
  private readonly askedNames = new Map<string, NameKind | null>();
  private readonly askedUnits = new Map<string, boolean>();

  constructor(
    readonly vocabulary: Vocabulary,
    private readonly kinds: ReadonlyMap<string, NameKind>,
    private readonly ownUnits: ReadonlySet<string> = new Set(),
  ) {}

  /** What a canonical name is in the worksheet, or null if the worksheet does not introduce it. */
  kindOf(name: string): NameKind | null {
    const kind = this.kinds.get(name) ?? null;
    this.askedNames.set(name, kind);
    return kind;
  }

  /** Whether the text is a unit symbol, of the table or of the worksheet. */
  isUnit(text: string): boolean {
    const isOwn = this.ownUnits.has(text);
    this.askedUnits.set(text, isOwn);
    return isOwn || this.vocabulary.isUnit(text);
  }

  /** Whether another context would have answered every question so far in the same way. */
  agreesWith(other: NameContext): boolean {
    if (this.vocabulary !== other.vocabulary) return false;
    for (const [name, kind] of this.askedNames)
      if ((other.kinds.get(name) ?? null) !== kind) return false;
    for (const [unit, isOwn] of this.askedUnits)
      if (other.ownUnits.has(unit) !== isOwn) return false;
    return true;
  }
}
