import { FUNCTIONS, SOURCES } from '../functions/index.ts';

/** A function or a source by name, for completion and hover help. */
export interface VocabularyWord {
  readonly name: string;
  /** `(H, w)`. */
  readonly signature: string;
  readonly help: string;
}

/** Everything that can be called in a worksheet and works today. */
export function vocabulary(): readonly VocabularyWord[] {
  const functions = [...FUNCTIONS.values()].filter((spec) => spec.availability === 'now');
  const sources = SOURCES.filter((source) => source.availability === 'now');
  return [
    ...functions.map((spec) => ({
      name: spec.name,
      signature: `(${spec.parameters.map((parameter) => parameter.name).join(', ')})`,
      help: spec.summary,
    })),
    ...sources.map((source) => ({
      name: source.name,
      signature: `(${source.parameters.map((parameter) => parameter.name).join(', ')})`,
      help: source.summary,
    })),
  ];
}
