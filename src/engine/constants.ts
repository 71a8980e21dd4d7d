import { imaginary, laplace, pi, ratioOf, type Ratio } from '../algebra/index.ts';

/** Names that the language itself gives a meaning to, as formulas. */
export function constantOf(name: string): Ratio | null {
  if (name === 's') return ratioOf(laplace);
  if (name === 'j') return ratioOf(imaginary);
  if (name === 'pi' || name === 'π') return ratioOf(pi);
  return null;
}
