"""Makes test/data/sympy-problems.json: 500 seeded problems of exact algebra with the answers of sympy.

Run with Debian's python3-sympy 1.11 (apt-get install python3-sympy):

    /usr/bin/python3 test/control/sympy-problems.py > test/data/sympy-problems.json

The random numbers are those of Python's random.Random(20260101).
"""

import json
import random
import sympy
from sympy import Matrix, Poly, Rational, apart, cancel, diff, discriminant, expand, factor_list, gcd, limit, solve, symbols, together
from sympy.polys.subresultants_qq_zz import sylvester

R = random.Random(20260101)
s = symbols('s')
NAMES = symbols('a b c d k m')


def number():
    kind = R.random()
    if kind < 0.7:
        return sympy.Integer(R.randint(-9, 9))
    if kind < 0.85:
        return Rational(R.randint(-9, 9), R.randint(1, 12))
    return sympy.Integer(R.randint(-9, 9)) * 10 ** R.randint(6, 15)


def polynomial(degree, names, terms=2):
    result = 0
    for k in range(degree + 1):
        part = number()
        for _ in range(R.randint(0, terms)):
            part += R.choice(names) * R.choice([1, 2, -3, R.choice(names)])
        result += part * s**k
    return expand(result)


def ratio(names):
    bottom = polynomial(R.randint(0, 2), names)
    while bottom == 0:
        bottom = polynomial(R.randint(0, 2), names)
    return polynomial(R.randint(0, 2), names) / bottom


def text(x):
    return str(x)


def cancelled():
    names = NAMES[: R.randint(1, 4)]
    x = ratio(names) * R.choice([1, -1]) + ratio(names)
    return {'kind': 'cancel', 'given': [text(x)], 'answer': text(cancel(together(x)))}


def divisor():
    names = NAMES[: R.randint(1, 3)]
    f, g, h = (polynomial(R.randint(1, 2), names, 1) for _ in range(3))
    f, g, h = (sympy.Poly(sympy.fraction(together(x))[0], s, *names).as_expr() for x in (f, g, h))
    p, q = expand(f * h), expand(g * h)
    return {'kind': 'gcd', 'given': [text(p), text(q)], 'answer': text(gcd(p, q))}


def factored():
    names = NAMES[: R.randint(1, 3)]
    p = 1
    for _ in range(R.randint(1, 3)):
        p *= polynomial(R.randint(1, 2), names, 1) ** R.choice([1, 1, 2])
    p = expand(sympy.fraction(together(p))[0])
    unit, factors = factor_list(p)
    return {'kind': 'factor', 'given': [text(p)], 'answer': [text(unit), [[text(f), int(n)] for f, n in factors]]}


def eliminated(kind, f):
    names = NAMES[: R.randint(1, 3)]
    p, q = (polynomial(R.randint(1, 3), names, 1) for _ in range(2))
    p, q = (expand(sympy.fraction(together(x))[0]) for x in (p, q))
    given = [p, q] if kind == 'resultant' else [p]
    if any(Poly(x, s).degree() < 1 for x in given):
        return eliminated(kind, f)
    return {'kind': kind, 'given': [text(x) for x in given], 'answer': text(expand(f(*given, s)))}


def by_sylvester(p, q, x):
    """The resultant as the determinant that defines it: sympy 1.11 turns its sign where both degrees are odd and the first is less."""
    return sylvester(Poly(p, x), Poly(q, x), x).det(method='berkowitz')


def determinant():
    n = R.randint(2, 4)
    names = NAMES[: R.randint(1, 3)]
    rows = [[polynomial(R.randint(0, 1), names, 1) if R.random() < 0.8 else sympy.Integer(0) for _ in range(n)] for _ in range(n)]
    return {'kind': 'determinant', 'given': [[text(x) for x in row] for row in rows], 'answer': text(expand(Matrix(rows).det(method='berkowitz')))}


def derived():
    names = NAMES[: R.randint(1, 3)]
    x, by = ratio(names) * ratio(names), R.choice([s, *names])
    return {'kind': 'derivative', 'given': [text(x), text(by)], 'answer': text(cancel(together(diff(x, by))))}


def parted():
    roots = [R.randint(-6, 6) for _ in range(R.randint(1, 3))]
    bottom = sympy.Integer(1)
    for root in roots:
        bottom *= s - root
    if R.random() < 0.5:
        bottom *= s**2 + R.randint(1, 5) * s + 9
    top = sum(R.randint(-9, 9) * s**k for k in range(R.randint(1, 4)))
    return {'kind': 'partial fractions', 'given': [text(top / expand(bottom))], 'answer': text(apart(top / bottom, s))}


def loop():
    n = R.randint(2, 4)
    names = NAMES[: R.randint(2, 5)]
    signals = symbols(f'x1:{n + 1}')
    u = symbols('u')
    rows = []
    for i in range(n):
        row = {signals[i]: sympy.Integer(1)}
        for k in range(n):
            if k != i and R.random() < 0.6:
                row[signals[k]] = R.choice([R.choice(names), number(), R.choice(names) / (s + R.randint(1, 4)), R.choice(names) * s + 1])
        if i == 0 or R.random() < 0.3:
            row[u] = R.choice([R.choice(names), sympy.Integer(R.randint(1, 5)), 1 / (s + R.choice(names))])
        rows.append(row)
    equations = [sum(c * x for x, c in row.items()) for row in rows]
    solved = solve(equations, signals, dict=True)
    if not solved:
        return loop()
    answer = {text(x): text(cancel(together(solved[0][x] / u))) for x in signals}
    return {'kind': 'loop', 'given': [{text(x): text(c) for x, c in row.items()} for row in rows], 'answer': answer}


def settled():
    names = NAMES[: R.randint(1, 3)]
    order = R.randint(0, 2)
    top = polynomial(1, names, 1)
    bottom = polynomial(2, names, 1) + s**3
    if bottom.subs(s, 0) == 0:
        return settled()
    x = s**order * top / bottom
    return {'kind': 'value at 0', 'given': [text(cancel(x))], 'answer': text(cancel(limit(x, s, 0)))}


KINDS = [
    (100, cancelled),
    (60, divisor),
    (60, factored),
    (40, lambda: eliminated('resultant', by_sylvester)),
    (40, lambda: eliminated('discriminant', discriminant)),
    (40, determinant),
    (40, derived),
    (40, parted),
    (50, loop),
    (30, settled),
]

problems = [make() for count, make in KINDS for _ in range(count)]
print(json.dumps({
    'source': f'sympy {sympy.__version__}, A. Meurer et al., SymPy: symbolic computing in Python, PeerJ Computer Science 3 (2017), e103',
    'how': 'made by test/control/sympy-problems.py from the seed 20260101',
    'problems': problems,
}, indent=0))
