import { invariant } from '../base/index.ts';
import { operate } from './tape-operations.ts';
import type { TapeBinary, TapeFunction, TapeOperation } from './tape-operations.ts';
import { Tape } from './tape.ts';
import { argumentsOf, movedStep } from './tape-step.ts';
import type { ExternalFunction, TapeStep } from './tape-step.ts';

/** The place of a value in a tape under construction. */
export type Slot = number;

/**
 * Builds a {@link Tape} from operations. Equal operations on equal arguments share one slot, operations on constants
 * are carried out at once, and what no output needs is left out.
 *
 * @example
 * const builder = new TapeBuilder();
 * const x = builder.input('x');
 * const tape = builder.build([builder.add(builder.mul(x, x), builder.constant(1))]);
 * tape.evaluate([3]) // Float64Array [10]
 */
export class TapeBuilder {
  private readonly steps: TapeStep[] = [];
  private readonly slotOf = new Map<string, Slot>();
  private readonly inputs: string[] = [];

  /** The slot of a named input; inputs are passed to the tape in the order of their first mention. */
  input(name: string): Slot {
    return this.shared(`input ${name}`, () => {
      this.inputs.push(name);
      return { kind: 'input', index: this.inputs.length - 1 };
    });
  }

  /** The slot of a number. */
  constant(value: number): Slot {
    const key = Object.is(value, -0) ? '-0' : String(value);
    return this.shared(`constant ${key}`, () => ({ kind: 'constant', value }));
  }

  add(a: Slot, b: Slot): Slot {
    if (this.constantAt(a) === 0) return b;
    if (this.constantAt(b) === 0) return a;
    return this.operation('add', Math.min(a, b), Math.max(a, b));
  }

  sub(a: Slot, b: Slot): Slot {
    return this.constantAt(b) === 0 ? a : this.operation('sub', a, b);
  }

  mul(a: Slot, b: Slot): Slot {
    if (this.constantAt(a) === 1) return b;
    if (this.constantAt(b) === 1) return a;
    return this.operation('mul', Math.min(a, b), Math.max(a, b));
  }

  div(a: Slot, b: Slot): Slot {
    return this.constantAt(b) === 1 ? a : this.operation('div', a, b);
  }

  min(a: Slot, b: Slot): Slot {
    return this.operation('min', Math.min(a, b), Math.max(a, b));
  }

  max(a: Slot, b: Slot): Slot {
    return this.operation('max', Math.min(a, b), Math.max(a, b));
  }

  neg(a: Slot): Slot {
    return this.operation('neg', a, -1);
  }

  /** A function of one argument. */
  call(name: TapeFunction, a: Slot): Slot {
    return this.operation(name, a, -1);
  }

  /**
   * A number that a function of others finds, such as a root: called at every point with the values of `slots`.
   * Equal keys mean equal functions.
   */
  external(key: string, find: ExternalFunction, slots: readonly Slot[]): Slot {
    const known = slots.map((slot) => this.constantAt(slot));
    if (known.every((value) => value !== undefined)) {
      return this.constant(find(Float64Array.from(known)));
    }
    const step = { kind: 'external' as const, find, slots };
    return this.shared(`external ${key} ${slots.join(' ')}`, () => step);
  }

  /** The integer power a^exponent, by repeated squaring. */
  powInt(a: Slot, exponent: number): Slot {
    invariant(Number.isInteger(exponent), `the power ${exponent} of a tape is not an integer`);
    if (exponent < 0) return this.div(this.constant(1), this.powInt(a, -exponent));
    if (exponent === 0) return this.constant(1);
    if (exponent === 1) return a;
    const half = this.powInt(a, Math.floor(exponent / 2));
    const square = this.mul(half, half);
    return exponent % 2 === 0 ? square : this.mul(square, a);
  }

  /** The tape that computes these slots, in this order. */
  build(outputs: readonly Slot[]): Tape {
    const isNeeded = this.steps.map(() => false);
    const need = [...outputs];
    for (let slot = need.pop(); slot !== undefined; slot = need.pop()) {
      if (isNeeded[slot]) continue;
      isNeeded[slot] = true;
      need.push(...argumentsOf(this.steps[slot]!));
    }
    return new Tape(this.inputs.slice(), ...this.renumbered(isNeeded, outputs));
  }

  private renumbered(
    isNeeded: readonly boolean[],
    outputs: readonly Slot[],
  ): [TapeStep[], number[]] {
    const place = new Map<Slot, number>();
    const steps: TapeStep[] = [];
    this.steps.forEach((step, slot) => {
      if (!isNeeded[slot]) return;
      place.set(slot, steps.length);
      steps.push(movedStep(step, (argument) => place.get(argument)!));
    });
    return [steps, outputs.map((slot) => place.get(slot)!)];
  }

  private operation(name: TapeFunction | TapeBinary, a: Slot, b: Slot): Slot {
    const [left, right] = [this.constantAt(a), b < 0 ? 0 : this.constantAt(b)];
    if (left !== undefined && right !== undefined) return this.constant(operate(name, left, right));
    const operation: TapeOperation = { name, a, b };
    return this.shared(`${name} ${a} ${b}`, () => ({ kind: 'operation', ...operation }));
  }

  private constantAt(slot: Slot): number | undefined {
    const step = this.steps[slot];
    return step?.kind === 'constant' ? step.value : undefined;
  }

  private shared(key: string, make: () => TapeStep): Slot {
    const known = this.slotOf.get(key);
    if (known !== undefined) return known;
    this.steps.push(make());
    this.slotOf.set(key, this.steps.length - 1);
    return this.steps.length - 1;
  }
}
