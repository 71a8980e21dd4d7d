/** Functions of one argument that a tape can call. */
export type TapeFunction = 'neg' | 'sqrt' | 'exp' | 'log' | 'sin' | 'cos' | 'tan' | 'atan' | 'abs';

/** Operations of two arguments. */
export type TapeBinary = 'add' | 'sub' | 'mul' | 'div' | 'min' | 'max';

/** An operation on numbers: its name, and the slots of its arguments (the second is −1 for a function of one). */
export interface TapeOperation {
  readonly name: TapeFunction | TapeBinary;
  readonly a: number;
  readonly b: number;
}

const FUNCTIONS: Readonly<Record<TapeFunction, (a: number) => number>> = {
  neg: (a) => -a,
  sqrt: Math.sqrt,
  exp: Math.exp,
  log: Math.log,
  sin: Math.sin,
  cos: Math.cos,
  tan: Math.tan,
  atan: Math.atan,
  abs: Math.abs,
};

/** The value of an operation on numbers. */
export function operate(name: TapeOperation['name'], a: number, b: number): number {
  switch (name) {
    case 'add':
      return a + b;
    case 'sub':
      return a - b;
    case 'mul':
      return a * b;
    case 'div':
      return a / b;
    case 'min':
      return Math.min(a, b);
    case 'max':
      return Math.max(a, b);
    default:
      return FUNCTIONS[name](a);
  }
}

/** The same on the first `count` elements of arrays; `target` may be one of the arguments. */
export function operateArrays(
  name: TapeOperation['name'],
  a: Float64Array,
  b: Float64Array,
  target: Float64Array,
  count: number,
): void {
  switch (name) {
    // The four that matter for speed have loops of their own, which the compiler turns into plain machine loops.
    case 'add':
      for (let i = 0; i < count; i++) target[i] = a[i]! + b[i]!;
      break;
    case 'sub':
      for (let i = 0; i < count; i++) target[i] = a[i]! - b[i]!;
      break;
    case 'mul':
      for (let i = 0; i < count; i++) target[i] = a[i]! * b[i]!;
      break;
    case 'div':
      for (let i = 0; i < count; i++) target[i] = a[i]! / b[i]!;
      break;
    default:
      for (let i = 0; i < count; i++) target[i] = operate(name, a[i]!, b[i]!);
  }
}
