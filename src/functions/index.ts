import { amplitude } from './amplitude.ts';
import { ANNOUNCED } from './announced.ts';
import { characteristic } from './characteristic.ts';
import { coefficient } from './coefficient.ts';
import { delay } from './delay.ts';
import { derivative } from './derivative.ts';
import { ELEMENTARY } from './elementary.ts';
import { errorConstants } from './error-constants.ts';
import { final } from './final.ts';
import { FORMS } from './forms.ts';
import { FREQUENCY } from './frequency.ts';
import { inFull } from './in-full.ts';
import { initial } from './initial.ts';
import { limit } from './limit.ts';
import { match } from './match.ts';
import { MATRICES } from './matrices.ts';
import { NOISE } from './noise.ts';
import { nominal } from './nominal.ts';
import { opened } from './opened.ts';
import { partialFractions } from './partial-fractions.ts';
import { rationalDelay } from './rational-delay.ts';
import { response } from './response.ts';
import { routh } from './routh.ts';
import { same } from './same.ts';
import { SIGNAL_PARTS } from './signal-parts.ts';
import { solve } from './solve.ts';
import type { WorksheetFunction } from './spec.ts';
import { stable } from './stable.ts';
import { systemType } from './system-type.ts';
import { TIME_FIGURES } from './time-figures.ts';
import { TRANSFER_PARTS } from './transfer-parts.ts';

export * from './spec.ts';
export { recordSigns, type UsedSigns } from './used-signs.ts';
export { SOURCES, sourceNamed, type Source, type SourceArgument } from './sources.ts';
export { hiddenNote } from './hidden-modes.ts';

const LIST: readonly WorksheetFunction[] = [
  characteristic,
  opened,
  routh,
  stable,
  final,
  initial,
  response,
  ...SIGNAL_PARTS,
  amplitude,
  ...NOISE,
  ...FREQUENCY,
  ...TIME_FIGURES,
  systemType,
  errorConstants,
  ...TRANSFER_PARTS,
  coefficient,
  limit,
  derivative,
  ...FORMS,
  partialFractions,
  solve,
  match,
  same,
  delay,
  rationalDelay,
  nominal,
  inFull,
  ...ELEMENTARY,
  ...MATRICES,
  ...ANNOUNCED,
];

/** Every worksheet function, by name. */
export const FUNCTIONS: ReadonlyMap<string, WorksheetFunction> = new Map(
  LIST.map((spec) => [spec.name, spec]),
);
