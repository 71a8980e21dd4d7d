/** A complex number. */
export interface Complex {
  readonly re: number;
  readonly im: number;
}

/** The complex number re + j im. */
export function complex(re: number, im = 0): Complex {
  return { re, im };
}

/** a + b. */
export function addComplex(a: Complex, b: Complex): Complex {
  return { re: a.re + b.re, im: a.im + b.im };
}

/** a − b. */
export function subtractComplex(a: Complex, b: Complex): Complex {
  return { re: a.re - b.re, im: a.im - b.im };
}

/** a b. */
export function multiplyComplex(a: Complex, b: Complex): Complex {
  return { re: a.re * b.re - a.im * b.im, im: a.re * b.im + a.im * b.re };
}

/**
 * a / b, without overflow where the quotient itself does not overflow.
 *
 * Source: R. L. Smith, Algorithm 116: Complex division, Communications of the ACM 5 (1962), p. 435.
 */
export function divideComplex(a: Complex, b: Complex): Complex {
  if (Math.abs(b.re) >= Math.abs(b.im)) {
    const ratio = b.im / b.re;
    const scale = b.re + b.im * ratio;
    return { re: (a.re + a.im * ratio) / scale, im: (a.im - a.re * ratio) / scale };
  }
  const ratio = b.re / b.im;
  const scale = b.re * ratio + b.im;
  return { re: (a.re * ratio + a.im) / scale, im: (a.im * ratio - a.re) / scale };
}

/** |z|. */
export function magnitude(z: Complex): number {
  return Math.hypot(z.re, z.im);
}

/** The argument of z in radians, in (−π, π]. */
export function argument(z: Complex): number {
  return Math.atan2(z.im, z.re);
}

/** The square root with a non-negative real part. */
export function complexRoot(z: Complex): Complex {
  if (z.re === 0 && z.im === 0) return { re: 0, im: 0 };
  const root = Math.sqrt((magnitude(z) + Math.abs(z.re)) / 2);
  const other = Math.abs(z.im) / (2 * root);
  const sign = z.im < 0 ? -1 : 1;
  return z.re >= 0 ? { re: root, im: sign * other } : { re: other, im: sign * root };
}

/** exp(z). */
export function complexExponential(z: Complex): Complex {
  const size = Math.exp(z.re);
  return { re: size * Math.cos(z.im), im: size * Math.sin(z.im) };
}

/** The value at z of a polynomial with real coefficients, highest power first, by Horner's rule. */
export function polynomialAt(coefficients: readonly number[], z: Complex): Complex {
  let re = 0;
  let im = 0;
  for (const coefficient of coefficients) {
    const next = re * z.re - im * z.im + coefficient;
    im = re * z.im + im * z.re;
    re = next;
  }
  return { re, im };
}
