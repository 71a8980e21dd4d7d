import { describe, expect, test } from 'vitest';
import { problemsOf } from './shape.ts';

/** Lines of a cell, and for each problem: what is said where, and the statement after each fix. */
const CASES: readonly (readonly [string, readonly (readonly string[])[]])[] = [
  ['x is', [['error incomplete at ‹is›: `x is` needs a number, but the line ends.']]],
  [
    'x is y',
    [
      [
        'error formula-after-is at ‹y›: `is` gives `x` a number with a unit; for a formula write `x = y`.',
        'x = y',
      ],
    ],
  ],
  [
    'x is (2 m)',
    [
      [
        'error formula-after-is at ‹(2 m)›: `is` gives `x` a number with a unit; for a formula write `x = (2 m)`.',
        'x = (2 m)',
      ],
    ],
  ],
  [
    'x is 2 m + 3',
    [
      [
        'error formula-after-is at ‹2 m + 3›: `is` gives `x` a number with a unit; for a formula write `x = 2 m + 3`.',
        'x = 2 m + 3',
      ],
    ],
  ],
  [
    'x is 12 000 N',
    [
      [
        'error split-number at ‹12 000›: `12 000` is not one number: a number has no spaces in it.',
        'x is 12000 N',
      ],
    ],
  ],
  [
    'x is 0,2 N',
    [
      [
        'error split-number at ‹0,2›: `0,2` is not one number: the decimal sign is a point.',
        'x is 0.2 N',
      ],
    ],
  ],
  [
    'x is 5 kg*m',
    [['error unit-form at ‹*›: In a unit a space or `·` multiplies, not `*`.', 'x is 5 kg m']],
  ],
  [
    'x is 5 /s',
    [['error unit-form at ‹/›: A unit that only divides has 1 before its solidus.', 'x is 5 1/s']],
  ],
  [
    'x is 5 N/m/s',
    [
      [
        'error solidus at ‹N/m/s›: `N/m/s` can be read in two ways: what follows a solidus needs brackets (ISO 80000-2).',
        'x is 5 (N/m)/s',
        'x is 5 N/(m/s)',
      ],
    ],
  ],
  [
    'x is 5 N/m s',
    [
      [
        'error solidus at ‹N/m s›: `N/m s` can be read in two ways: what follows a solidus needs brackets (ISO 80000-2).',
        'x is 5 (N/m) s',
        'x is 5 N/(m s)',
      ],
    ],
  ],
  [
    'x is 5 kN m/rad s',
    [
      [
        'error solidus at ‹kN m/rad s›: `kN m/rad s` can be read in two ways: what follows a solidus needs brackets (ISO 80000-2).',
        'x is 5 (kN m/rad) s',
        'x is 5 kN m/(rad s)',
      ],
    ],
  ],
  [
    'x is 5 kg m²',
    [
      [
        'error stray-character at ‹²›: The character `²` has no meaning here; write `^2`.',
        'x is 5 kg m^2',
      ],
    ],
  ],
  ['x is 5 m ±', [['error incomplete at ‹±›: `±` needs a number, but the line ends.']]],
  [
    'x is 5 m ± 8 % at 3',
    [
      [
        'error unexpected at ‹3›: `at` needs the number of standard deviations, `at 3 sigma`, not `3`.',
      ],
    ],
  ],
  [
    'x is 5 m from 1',
    [['error incomplete at ‹1›: A range, `from 1 to 20`, needs `to` here, but the line ends.']],
  ],
  ['x is 5 m from 1 to 2 ± 3', [['error unexpected at ‹±›: `±` is not expected here.']]],
  [
    'x is 5 m, 6 m',
    [['error unexpected at ‹,›: A comma stands only between arguments or in a list.']],
  ],
  [
    'Kp is 3 m\nx is 2 Kp',
    [
      [
        'error formula-after-is at ‹2 Kp›: `is` gives `x` a number with a unit; for a formula write `x = 2 Kp`.',
        'x = 2 Kp',
      ],
    ],
  ],
  [
    'm is 3 kg\nx is 5 m ± 0.1 m\nrequire x <= 2 m\ndraw response of x over 2 m\nrequire x <= 2 kN m and x = 2 mm',
    [
      [
        'error ambiguous-unit at ‹2 m›: `2 m` can be a quantity or a product, because `m` is also given in this worksheet.',
        'require x <= 2 [m]',
        'require x <= (2 m)',
      ],
      [
        'error ambiguous-unit at ‹2 m›: `2 m` can be a quantity or a product, because `m` is also given in this worksheet.',
        'draw response of x over 2 [m]',
        'draw response of x over (2 m)',
      ],
    ],
  ],
  [
    'J, b are large',
    [
      [
        'error unexpected at ‹large›: `are` after a list needs `positive`, `negative`, `nonnegative` or `real`, not `large`.',
      ],
    ],
  ],
  [
    'J, b is 3',
    [
      [
        'error unexpected at ‹3›: `is` after a list needs `positive`, `negative`, `nonnegative` or `real`, not `3`.',
      ],
    ],
  ],
  [
    'J are 3',
    [
      [
        'error unexpected at ‹3›: `are` after a list needs `positive`, `negative`, `nonnegative` or `real`, not `3`.',
      ],
    ],
  ],
  ['q has N', [['error unexpected at ‹N›: `has` needs `unit` here, not `N`.']]],
  ['q has unit', [['error incomplete at ‹unit›: `has unit` needs a unit, but the line ends.']]],
  [
    'tune Kp from 1',
    [['error incomplete at ‹1›: A range, `from 1 to 20`, needs `to` here, but the line ends.']],
  ],
  [
    'tune Kp',
    [
      [
        'error incomplete at ‹Kp›: A gain to be tuned, `tune Kp from 1 to 20`, needs `from` here, but the line ends.',
      ],
    ],
  ],
  [
    'tune s from 1 to 2',
    [['error reserved-name at ‹s›: `s` is the Laplace variable; choose another name.']],
  ],
  [
    'points a, b, c\n  m is 12, 30, 48 kg ± 2 % # mass\n  n is 1, 2\n  k = 3',
    [
      ['error points-mismatch at ‹n is 1, 2›: `n` has 2 values for 3 operating points.'],
      [
        'error unexpected at ‹=›: A line of `points`, `m is 12, 30, 48 kg`, needs `is` here, not `=`.',
      ],
    ],
  ],
  [
    'points',
    [
      [
        'error incomplete at ‹points›: `points` needs the names of the operating points, but the line ends.',
      ],
    ],
  ],
  [
    'x = 3 mrad',
    [
      [
        'error unit-in-formula at ‹3 mrad›: In a formula `mrad` is a name, not a unit; for the quantity write `x is 3 mrad`.',
        'x is 3 mrad',
      ],
    ],
  ],
  [
    'Td = 2 s',
    [
      [
        'warning unit-in-formula at ‹2 s›: `2 s` is twice the Laplace variable; for seconds write `Td is 2 s`.',
        'Td is 2 s',
      ],
    ],
  ],
  [
    'm = 2 t',
    [
      [
        'warning unit-in-formula at ‹2 t›: In a formula `t` is a name, not a unit; for the quantity write `m is 2 t`.',
        'm is 2 t',
      ],
    ],
  ],
  [
    'x = 45°',
    [
      [
        'error unit-in-formula at ‹45°›: A formula takes no bare unit; for the quantity write `x is 45°`.',
        'x is 45°',
      ],
    ],
  ],
  [
    'x = 9 kN m/(rad s)',
    [
      [
        'error unit-in-formula at ‹9 kN m/(rad s)›: In a formula `kN` is a name, not a unit; for the quantity write `x is 9 kN m/(rad s)`.',
        'x is 9 kN m/(rad s)',
      ],
    ],
  ],
  ['s = 3', [['error reserved-name at ‹s›: `s` is the Laplace variable; choose another name.']]],
  [
    'in = 3',
    [['error reserved-name at ‹in›: `in` is a word of the language; choose another name.']],
  ],
  [
    'is is 3',
    [['error reserved-name at ‹is›: `is` is a word of the language; choose another name.']],
  ],
  ['pi = 3', [['error reserved-name at ‹pi›: `pi` is the number π; choose another name.']]],
  ['x =', [['error incomplete at ‹=›: `=` needs a formula after it, but the line ends.']]],
  [
    'x = a = b',
    [
      [
        'error unexpected at ‹=›: An equation or definition has one `=`; a condition goes in brackets.',
      ],
    ],
  ],
  [
    'x = 3\n  y = 4',
    [
      [
        'error unexpected at ‹=›: An equation or definition has one `=`; a condition goes in brackets (a line that is indented deeper continues the line above it).',
      ],
    ],
  ],
  [
    'x is 3 kg\n  y is 4 kg',
    [
      [
        'error unexpected at ‹is›: The word `is` is not expected here (a line that is indented deeper continues the line above it).',
      ],
    ],
  ],
  [
    'C(s) = Kp + Ki/s',
    [
      [
        'error definition-with-argument at ‹(s)›: A definition has a name alone, without a bracket: write `C = …`.',
        'C = Kp + Ki/s',
      ],
    ],
  ],
  [
    'f(x, y) = x y',
    [
      [
        'error definition-with-argument at ‹(x, y)›: A definition has a name alone, without a bracket: write `f = …`.',
        'f = x y',
      ],
    ],
  ],
  ['from 3', [['error unexpected at ‹from›: A statement cannot start with `from`.']]],
  [
    "loop az driven by r, w\n  J theta'' = T(s) + w\n  T = C (r - theta) +\n  e = r - theta",
    [['error incomplete at ‹+›: `+` needs a formula after it, but the line ends.']],
  ],
  ['loop', [['error incomplete at ‹loop›: `loop` needs a name, but the line ends.']]],
  [
    'loop az driven\n  a = b',
    [['error incomplete at ‹driven›: `driven` needs `by` here, but the line ends.']],
  ],
  [
    'loop az driven by\n  a = b',
    [['error incomplete at ‹by›: `driven by` needs the names of the inputs, but the line ends.']],
  ],
  [
    'loop s driven by r',
    [['error reserved-name at ‹s›: `s` is the Laplace variable; choose another name.']],
  ],
  ['loop az driven by r w\n  a = b', [['error unexpected at ‹w›: `w` is not expected here.']]],
  [
    'loop az driven by r\n  J is 3\n  x starts at 3\n  a b\n  a = b = c\n  uses stage\n  uses stage as x\n  uses\n  a = 3 m + b',
    [
      [
        'error misplaced-line at ‹is›: A loop holds equations, `left = right`; an assumption stands at the margin of the cell.',
      ],
      [
        'error misplaced-line at ‹starts›: A loop holds equations, `left = right`; an initial condition stands in a case.',
      ],
      [
        'error incomplete at ‹b›: An equation of a loop, `left = right`, needs `=` here, but the line ends.',
      ],
      [
        'error unexpected at ‹=›: An equation or definition has one `=`; a condition goes in brackets.',
      ],
      ['error incomplete at ‹uses›: `uses` needs the name of a loop, but the line ends.'],
    ],
  ],
  [
    'case storm of\n  w = 3',
    [['error incomplete at ‹of›: `of` needs the name of a loop, but the line ends.']],
  ],
  [
    'case storm',
    [
      [
        'error incomplete at ‹storm›: A case, `case storm of az`, needs `of` here, but the line ends.',
      ],
    ],
  ],
  [
    'case storm of az\n  w\n  x.w = step(2)\n  w = \n  w = step(1) after\n  y is 3',
    [
      [
        'error incomplete at ‹w›: A line of a case, `w = step(Tw)` or `x starts at 1`, needs `=` here, but the line ends.',
      ],
      [
        'error not-an-input at ‹x.w›: `x.w` is not an input: a case drives the inputs that its loop names after `driven by`.',
      ],
      ['error incomplete at ‹=›: `=` needs a formula after it, but the line ends.'],
      ['error incomplete at ‹after›: `after` needs a formula after it, but the line ends.'],
      [
        'error unexpected at ‹is›: A line of a case, `w = step(Tw)` or `x starts at 1`, needs `=` here, not `is`.',
      ],
    ],
  ],
  [
    'require',
    [['error incomplete at ‹require›: `require` needs a formula after it, but the line ends.']],
  ],
  [
    'draw',
    [['error incomplete at ‹draw›: `draw` needs a figure, such as `response`, but the line ends.']],
  ],
  [
    'draw respons of x',
    [
      [
        'error unknown-figure at ‹respons›: There is no figure `respons`; the figures are region, response, frequency, nyquist, roots, spectrum, diagram, budget and simulation.',
        'draw response of x',
      ],
    ],
  ],
  ['draw response x', [['error unexpected at ‹x›: `draw response` needs `of` here, not `x`.']]],
  [
    'draw response of x over 2 s over 3 s',
    [['error repeated-clause at ‹over›: A figure has `over` only once.']],
  ],
  [
    'draw response of x titled x',
    [['error unexpected at ‹x›: `titled` needs a text in quotes, not `x`.']],
  ],
  [
    'explain',
    [['error incomplete at ‹explain›: `explain` needs a formula after it, but the line ends.']],
  ],
  [
    'tabulate x for Kp from 1 to 2, many',
    [
      [
        'error unexpected at ‹many›: A range of a table needs its number of steps, `12 steps`, not `many`.',
      ],
    ],
  ],
  [
    'tabulate x',
    [
      [
        'error incomplete at ‹x›: A table, `tabulate x for Kp is 8, 9`, needs `for` here, but the line ends.',
      ],
    ],
  ],
  ['(1 + \nx = 2', [['error incomplete at ‹+›: `+` needs a formula after it, but the line ends.']]],
  [
    'x = rows(1, 2 |\n  3, 4\n)',
    [
      ['error unclosed-bracket at ‹(›: This bracket is not closed.', 'x = rows(1, 2 |\n  3, 4)'],
      [
        'error unopened-bracket at ‹)›: `)` closes no bracket of this statement: lines that continue a statement are indented deeper.',
      ],
    ],
  ],
  ['"abc', [['error unclosed-text at ‹"abc›: The text "abc has no closing quote.', '"abc"']]],
  [
    ')',
    [
      [
        'error unopened-bracket at ‹)›: `)` closes no bracket of this statement: lines that continue a statement are indented deeper.',
      ],
    ],
  ],
];

describe('a statement that cannot be read', () => {
  test.each(CASES)('says what is wrong: %s', (lines, problems) => {
    expect(problemsOf(lines).map((problem) => problem.split('\n→ '))).toEqual(problems);
  });
});
