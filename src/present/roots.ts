import type { Complex } from '../numeric/index.ts';
import { formatNumber } from '../units/index.ts';
import { numberLatex } from './written-latex.ts';

/** Parts below this, relative to the size of the root, are not shown. */
const NEGLIGIBLE = 1e-9;

/** Roots in s as numbers, a conjugate pair as one: `s ≈ -2 ± 3 j, -5`. No roots is `none`. */
export function rootsText(roots: readonly Complex[]): string {
  if (roots.length === 0) return 'none';
  return `s ≈ ${shownRoots(roots).map(rootText).join(', ')}`;
}

/** The same roots as {@link rootsText}, as LaTeX. */
export function rootsLatex(roots: readonly Complex[]): string {
  if (roots.length === 0) return '\\text{none}';
  return `s\\approx ${shownRoots(roots).map(rootLatex).join(',\\; ')}`;
}

/** One number, complex or real: `-2 + 3 j`. */
export function complexText(z: Complex): string {
  const root = shownRoot(z);
  return root.re === null ? `${root.sign}${imaginaryText(root)}` : rootText(root);
}

/** A root as it is shown; `re` or `im` is null where it is negligible, `im` is positive. */
interface ShownRoot {
  readonly re: string | null;
  readonly sign: '' | '-' | '+' | '±';
  readonly im: string | null;
}

function shownRoots(roots: readonly Complex[]): readonly ShownRoot[] {
  const used = new Set<number>();
  return roots.flatMap((root, i) => {
    if (used.has(i)) return [];
    const shown = shownRoot(root);
    const partner = roots.findIndex(
      (other, k) => k > i && !used.has(k) && isConjugate(root, other),
    );
    if (shown.im === null || partner < 0) return [shown];
    used.add(partner);
    return [{ ...shown, sign: '±' as const }];
  });
}

function isConjugate(a: Complex, b: Complex): boolean {
  const size = NEGLIGIBLE * Math.hypot(a.re, a.im);
  return Math.abs(a.re - b.re) <= size && Math.abs(a.im + b.im) <= size;
}

function shownRoot(z: Complex): ShownRoot {
  const size = NEGLIGIBLE * Math.hypot(z.re, z.im);
  const real = Math.abs(z.im) <= size;
  if (real) return { re: formatNumber(z.re), sign: '', im: null };
  const re = Math.abs(z.re) <= size ? null : formatNumber(z.re);
  const sign = z.im < 0 ? '-' : re === null ? '' : '+';
  return { re, sign, im: formatNumber(Math.abs(z.im)) };
}

function rootText(root: ShownRoot): string {
  if (root.im === null) return root.re ?? '0';
  if (root.re === null) return `${root.sign}${imaginaryText(root)}`;
  return `${root.re} ${root.sign} ${imaginaryText(root)}`;
}

function imaginaryText(root: ShownRoot): string {
  return root.im === '1' ? 'j' : `${root.im} j`;
}

function rootLatex(root: ShownRoot): string {
  const re = root.re === null ? '' : numberLatex(root.re);
  if (root.im === null) return re;
  const im = root.im === '1' ? '' : `${numberLatex(root.im)}\\,`;
  return `${re}${root.sign === '±' ? '\\pm ' : root.sign}${im}\\mathrm{j}`;
}
