import type { TapeOperation } from './tape-operations.ts';

/** Finds a number from others; NaN where there is none. It must not keep the array, which is used again. */
export type ExternalFunction = (values: Float64Array) => number;

/** One step of a tape; arguments refer to earlier steps. */
export type TapeStep =
  | { readonly kind: 'input'; readonly index: number }
  | { readonly kind: 'constant'; readonly value: number }
  | ({ readonly kind: 'operation' } & TapeOperation)
  | {
      readonly kind: 'external';
      readonly find: ExternalFunction;
      readonly slots: readonly number[];
    };

/** The earlier steps that a step takes its arguments from. */
export function argumentsOf(step: TapeStep): readonly number[] {
  if (step.kind === 'external') return step.slots;
  if (step.kind !== 'operation') return [];
  return step.b < 0 ? [step.a] : [step.a, step.b];
}

/** The step with its arguments at other places. */
export function movedStep(step: TapeStep, placeOf: (slot: number) => number): TapeStep {
  if (step.kind === 'external') return { ...step, slots: step.slots.map(placeOf) };
  if (step.kind !== 'operation') return step;
  return { ...step, a: placeOf(step.a), b: step.b < 0 ? -1 : placeOf(step.b) };
}
