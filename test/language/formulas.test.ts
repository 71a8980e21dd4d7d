import { describe, expect, test } from 'vitest';
import { readShape } from './shape.ts';

describe('a formula', () => {
  test.each([
    ['a b c', '(* a b c)'],
    ['2 zeta omega_n s', '(* 2 ζ ω_n s)'],
    ['a*b c/d', '(* a b c /d)'],
    ['a/b + c', '(+ (* a /b) c)'],
    ['a b/c', '(* a b /c)'],
    ['-a^2', '(- (^ a 2))'],
    ['-a b', '(* (- a) b)'],
    ['a^-b', '(^ a (- b))'],
    ['a^b^c', '(^ a (^ b c))'],
    ['a^-1 b', '(* (^ a (- 1)) b)'],
    ['a - -b', '(+ a (- (- b)))'],
    ['1/2 s', '(* 1 /2 s)'],
    ['-1/2 s', '(* (- 1) /2 s)'],
    ['a + 1/2 (b + c)', '(+ a (* 1 /2 (+ b c)))'],
    ['1/2 s/3', '(* 1 /2 s /3)'],
    ['1/2 [s]', '(* 1 /[2 s])'],
    ['1/2 sin(x)', '(* 1 /2 (sin! x))'],
    ["theta''", '(d2 θ)'],
    ["storm.e'", '(d1 storm.e)'],
    ['(storm with Ki is 0 N m/(rad s)).e', '(with storm Ki is [0 N m/(rad s)]).e'],
    ['C(s)', '(C@ s)'],
    ['C(s) L(0)', '(* (C@ s) (L@ 0))'],
    ['L(j w)', '(L@ (* j w))'],
    ['L(-2 j)', '(L@ (* (- 2) j))'],
    ['L(2 [rad/s])', '(L@ [2 rad/s])'],
    ['L(-1/2)', '(L@ (* (- 1) /2))'],
    ['C(r - theta)', '(* C (+ r (- θ)))'],
    ['C (s)', '(* C s)'],
    ['Kp (1)', '(* Kp 1)'],
    ['Kp(r - 1)', '(* Kp (+ r (- 1)))'],
    ['az (w -> e)', '(az! (-> w e))'],
    ['az(w -> theta, T)', '(az! (-> w θ T))'],
    ["az(w -> e')", '(az! (-> w (d1 e)))'],
    ['sin (x)', '(sin! x)'],
    ['sn(x)', '(sn! x)'],
    ['Sn(x)', '(* Sn x)'],
    ['Sn(w -> e)', '(Sn! (-> w e))'],
    ['s(a + b)', '(* s (+ a b))'],
    ['step(2 N)', '(step! [2 N])'],
    ['step(Kp 2)', '(step! (* Kp 2))'],
    ['step(2 Kp)', '(step! (* 2 Kp))'],
    ['sine(2 N, 3 Hz)', '(sine! [2 N] [3 Hz])'],
    ['gain(L, 2 rad/s)', '(gain! L [2 rad/s])'],
    ['gain(L, 2 pi f1)', '(gain! L (* 2 pi f1))'],
    ['settling_time(x, 2 %)', '(settling_time! x [2 %])'],
    ['limit(x as s to 0)', '(limit! (limit x s 0))'],
    ['rows(a, b | c, d)', '(rows! (rows a b | c d))'],
    ['x with Kp is 2 kN m/rad', '(with x Kp is [2 kN m/rad])'],
    ['x with C = C2', '(with x C = C2)'],
    ['x with (Kp is 2 kN m/rad, Ki is 0)', '(with x Kp is [2 kN m/rad], Ki is 0)'],
    ['x with Kp is -2 in mrad', '(in (with x Kp is (- 2)) mrad)'],
    ['x with s = 3 [rad/s]', '(with x s = [3 rad/s])'],
    ['a < b <= c', '(<,<= a b c)'],
    ['a = b and not c > d or e', '(or (and (= a b) (not (> c d))) e)'],
    ['not not a', '(not (not a))'],
    ['x in mrad', '(in x mrad)'],
    ['x in 1/s', '(in x 1/s)'],
    ['3 [kN m/(rad s)] y', '(* [3 kN m/(rad s)] y)'],
    ['3/2 mm', '(* 3 /2 mm)'],
    ['x^2 mm', '(* (^ x 2) mm)'],
    ['"file.csv"', '"file.csv"'],
    ['solve(2 mm = 3, mm)', '(solve! (= (* 2 mm) 3) mm)'],
    ['a · b', '(* a b)'],
    ['a − b', '(+ a (- b))'],
    ['a ≤ b', '(<= a b)'],
    ['mask("a.csv")', '(mask! "a.csv")'],
    ['1e3x', '(* 1e3 x)'],
    ['θ_m + theta_m + µ + Ω', '(+ θ_m θ_m μ Ω)'],
    ['e1/phi2 + exp(1)', '(+ (* e1 /φ2) (exp! 1))'],
  ])('%s is read as %s', (text, shape) => {
    expect(readShape(text)).toBe(shape);
  });

  test.each([
    [
      '1/2 pi',
      [
        'error solidus at ‹1/2 pi›: `1/2 pi` can be read in two ways: what follows a solidus needs brackets (ISO 80000-2).',
        '→ (1/2) pi',
        '→ 1/(2 pi)',
      ],
    ],
    [
      'a 1/2 s',
      [
        'error solidus at ‹a 1/2 s›: `a 1/2 s` can be read in two ways: what follows a solidus needs brackets (ISO 80000-2).',
        '→ (a 1/2) s',
        '→ a 1/(2 s)',
      ],
    ],
    [
      'a/b c',
      [
        'error solidus at ‹a/b c›: `a/b c` can be read in two ways: what follows a solidus needs brackets (ISO 80000-2).',
        '→ (a/b) c',
        '→ a/(b c)',
      ],
    ],
    [
      'a/b*c',
      [
        'error solidus at ‹a/b*c›: `a/b*c` can be read in two ways: what follows a solidus needs brackets (ISO 80000-2).',
        '→ (a/b)*c',
        '→ a/(b*c)',
      ],
    ],
    [
      'a/b/c',
      [
        'error solidus at ‹a/b/c›: `a/b/c` can be read in two ways: what follows a solidus needs brackets (ISO 80000-2).',
        '→ (a/b)/c',
        '→ a/(b/c)',
      ],
    ],
    [
      '(a + b)/c d',
      [
        'error solidus at ‹(a + b)/c d›: `(a + b)/c d` can be read in two ways: what follows a solidus needs brackets (ISO 80000-2).',
        '→ ((a + b)/c) d',
        '→ (a + b)/(c d)',
      ],
    ],
    [
      'k a/(b) c d + e',
      [
        'error solidus at ‹k a/(b) c d›: `k a/(b) c d` can be read in two ways: what follows a solidus needs brackets (ISO 80000-2).',
        '→ (k a/(b)) c d + e',
        '→ k a/((b) c d) + e',
      ],
    ],
    [
      "(x - xb)'",
      [
        "error not-a-signal at ‹(x - xb)'›: A bracket has a derivative only in the equations of a loop; write `'` after the signal itself.",
      ],
    ],
    [
      "Kp'",
      [
        "error not-a-signal at ‹Kp'›: `'` is the time derivative of a signal, and `Kp` is an assumption.",
      ],
    ],
    [
      'L(1 + j w)',
      [
        'error name-before-bracket at ‹L(1 + j w)›: `L(1 + j w)` can be a product or the value of `L` at a point.',
        '→ L (1 + j w)',
        '→ (L with s = 1 + j w)',
      ],
    ],
    [
      "C (r - theta)'",
      [
        "error not-a-signal at ‹(r - theta)'›: A bracket has a derivative only in the equations of a loop; write `'` after the signal itself.",
      ],
    ],
    [
      'Kp(s)',
      [
        'error name-before-bracket at ‹Kp(s)›: `Kp` is an assumption, not a function of anything, so `Kp(s)` has no meaning.',
        '→ Kp (s)',
        '→ Kp',
      ],
    ],
    [
      'Kp(1)',
      [
        'error name-before-bracket at ‹Kp(1)›: `Kp` is an assumption, not a function of anything, so `Kp(1)` has no meaning.',
        '→ Kp (1)',
        '→ Kp',
      ],
    ],
    [
      'q(s)',
      [
        'error name-before-bracket at ‹q(s)›: `q` is a symbol, not a function of anything, so `q(s)` has no meaning.',
        '→ q (s)',
        '→ q',
      ],
    ],
    [
      'storm.e(0)',
      [
        'error member-before-bracket at ‹storm.e(›: `storm.e` is not a function: to multiply write a space before the bracket, to evaluate write `with s = …` or `with t = …`.',
        '→ storm.e (0)',
      ],
    ],
    [
      'step(2 m)',
      [
        'error ambiguous-unit at ‹2 m›: `2 m` can be a quantity or a product, because `m` is also given in this worksheet.',
        '→ step(2 [m])',
        '→ step((2 m))',
      ],
    ],
    [
      '2 3',
      [
        'error split-number at ‹2 3›: `2 3` is two numbers side by side: write one number without spaces, or `*` between them.',
        '→ 23',
        '→ 2*3',
      ],
    ],
    [
      '12 000',
      [
        'error split-number at ‹12 000›: `12 000` is two numbers side by side: write one number without spaces, or `*` between them.',
        '→ 12000',
        '→ 12*000',
      ],
    ],
    [
      '2 mrad',
      [
        'error unit-in-formula at ‹mrad›: In a formula a unit stands in square brackets after its number: `2 [mrad]`.',
        '→ 2 [mrad]',
      ],
    ],
    [
      'x + 3 mm + y',
      [
        'error unit-in-formula at ‹mm›: In a formula a unit stands in square brackets after its number: `3 [mm]`.',
        '→ x + 3 [mm] + y',
      ],
    ],
    [
      '45°',
      [
        'error unit-in-formula at ‹°›: In a formula a unit stands in square brackets after its number: `45 [°]`.',
        '→ 45[°]',
      ],
    ],
    ['a +', ['error incomplete at ‹+›: `+` needs a formula after it, but the line ends.']],
    ['a + * b', ['error unexpected at ‹*›: `+` needs a formula after it, not `*`.']],
    ['(a + b', ['error unclosed-bracket at ‹(›: This bracket is not closed.', '→ (a + b)']],
    [
      'a + b)',
      ['error unopened-bracket at ‹)›: `)` closes a bracket that was not opened.', '→ a + b'],
    ],
    ['a , b', ['error unexpected at ‹,›: A comma stands only between arguments or in a list.']],
    [
      '(a, b)',
      [
        'error unexpected at ‹,›: This bracket follows no function, so it holds one formula, not a list.',
      ],
    ],
    ['()', ['error unexpected at ‹)›: `(` needs a formula after it, not `)`.']],
    ['sin(', ['error incomplete at ‹(›: `(` needs a formula after it, but the line ends.']],
    ['sin(a b', ['error unclosed-bracket at ‹(›: This bracket is not closed.', '→ sin(a b)']],
    [
      'a [m]',
      [
        'error loose-unit at ‹[›: Square brackets hold the unit of the number before them, as in `3 [rad/s]`.',
      ],
    ],
    ['"open', ['error unclosed-text at ‹"open›: The text "open has no closing quote.', '→ "open"']],
    [
      'x²',
      ['error stray-character at ‹²›: The character `²` has no meaning here; write `^2`.', '→ x^2'],
    ],
    [
      'a × b',
      [
        'error stray-character at ‹×›: The character `×` has no meaning here; write `*`.',
        '→ a * b',
      ],
    ],
    [
      'x ± 2',
      [
        'error unexpected at ‹±›: A tolerance, `±`, belongs to an assumption, as in `J is 480 kg m^2 ± 8 %`.',
      ],
    ],
    ['.5', ['error bare-fraction at ‹.5›: A number starts with a digit: write `0.5`.', '→ 0.5']],
    ['a is b', ['error unexpected at ‹is›: The word `is` is not expected here.']],
    ['in', ['error unexpected at ‹in›: A formula is needed here, not `in`.']],
    ['x in', ['error incomplete at ‹in›: `in` needs a unit, but the line ends.']],
    ['x in 3', ['error unexpected at ‹3›: `in` needs a unit, not `3`.']],
    [
      'x with',
      ['error incomplete at ‹with›: `with` needs the name that is replaced, but the line ends.'],
    ],
    [
      'x with Kp',
      [
        'error incomplete at ‹Kp›: A replacement, `Kp is 2` or `C = C2`, needs `=` here, but the line ends.',
      ],
    ],
    ['x with Kp = ', ['error incomplete at ‹=›: `=` needs a formula after it, but the line ends.']],
    [
      'x with (Kp is 2, Ki is 3',
      ['error unclosed-bracket at ‹(›: This bracket is not closed.', '→ x with (Kp is 2, Ki is 3)'],
    ],
    [
      'a -> b',
      [
        'error unexpected at ‹->›: `->` stands only in the bracket after the name of a loop, as in `az(w -> e)`.',
      ],
    ],
    ['2 [m', ['error unclosed-bracket at ‹[›: This bracket is not closed.']],
    ['2 []', ['error unexpected at ‹]›: A square bracket after a number needs a unit, not `]`.']],
    ['a != b', ['error stray-character at ‹!›: The character `!` has no meaning here.']],
    [
      'N/m s',
      [
        'error solidus at ‹N/m s›: `N/m s` can be read in two ways: what follows a solidus needs brackets (ISO 80000-2).',
        '→ (N/m) s',
        '→ N/(m s)',
      ],
    ],
  ])('%s is refused, with its place and its fixes', (text, lines) => {
    expect(readShape(text).split('\n')).toEqual(lines);
  });
});
