"""The tasks of algebra-tasks.ts in sympy's fraction fields, medians in milliseconds, as one JSON object on stdout."""

import json
import random
import time
from statistics import median

from sympy import ZZ, apart, symbols
from sympy.polys.matrices import DomainMatrix
from sympy.polys.rings import ring

RUNS = 15
SECONDS = 2


def timed(run):
    times = []
    while len(times) < RUNS and sum(times) < 1000 * SECONDS:
        start = time.perf_counter()
        run()
        times.append(1000 * (time.perf_counter() - start))
    return median(times)


def fields(names):
    field = ZZ.frac_field(*symbols(names))
    return dict(zip(names.split(), field.gens))


def controller(g):
    s = g["s"]
    return g["Kp"] + g["Ki"] / s + g["Kd"] * s / (g["Tf"] * s + 1)


def rigid():
    g = fields("s J Kp Ki Kd Tf Ta Ts")
    s = g["s"]
    plant = 1 / (g["J"] * s**2)
    sensor = 1 / (g["Ts"] * s + 1)
    return -plant * sensor / (1 + plant * sensor * controller(g) / (g["Ta"] * s + 1))


def flexible():
    g = fields("s J1 J2 c k Kp Ki Kd Tf Ta Ts")
    s = g["s"]
    link = g["c"] * s + g["k"]
    far = g["J2"] * s**2 + link
    plant = far / ((g["J1"] * s**2 + link) * far - link**2)
    sensor = 1 / (g["Ts"] * s + 1)
    return -plant * sensor / (1 + plant * sensor * controller(g) / (g["Ta"] * s + 1))


def motors():
    g = fields("s L R Ke Kt J b Kc Kci Kv Kvi Kx")
    s = g["s"]
    current = g["Kc"] + g["Kci"] / s
    speed = g["Kv"] + g["Kvi"] / s
    electric = g["L"] * s + g["R"] + current
    # i = (current · speed · (w − v) − Ke v) / electric, (J s + b) v = Kt i + d, w = Kx (r − x), s x = v
    forward = g["Kt"] * current * speed / electric
    load = (g["J"] * s + g["b"]) * s + g["Kt"] * g["Ke"] * s / electric + forward * (s + g["Kx"])
    return forward * g["Kx"] / load, 1 / load


def hurwitz_minors(a):
    degree = len(a) - 1
    rows = [a[0::2], a[1::2]]
    divisors = [a[0].ring.one, a[0].ring.one]
    for k in range(2, degree + 1):
        above, row = rows[-2], rows[-1]
        lead = a[0] if k == 2 else divisors[-1]
        at = lambda i: row[i] if i < len(row) else a[0].ring.zero
        entries = [
            (above[i + 1] * row[0] - lead * at(i + 1)).exquo(divisors[-2])
            for i in range(len(above) - 1)
        ]
        divisors.append(row[0])
        rows.append(entries)
    return [row[0].cancel(divisor) for row, divisor in zip(rows, divisors)]


def routh(degree):
    _, *a = ring([f"a{k}" for k in range(degree + 1)], ZZ)
    return lambda: hurwitz_minors(a)


def fifth_degree():
    r, s, J, Ta, Tf, Kp, Ki, Kd = ring("s J Ta Tf Kp Ki Kd", ZZ)
    return J * s**3 * (Ta * s + 1) * (Tf * s + 1) + (Kp * s + Ki) * (Tf * s + 1) + Kd * s**2


def variance(degree):
    names = [f"a{k}" for k in range(degree + 1)] + [f"b{k}" for k in range(degree)]
    r, *g = ring(names, ZZ)
    a, b = g[: degree + 1], g[degree + 1 :]

    def run():
        at = lambda k: a[k] if 0 <= k <= degree else r.zero
        matrix = [
            [at(2 * k + 1 - i) * (-1) ** (2 * k + 1 - i) for i in range(degree)]
            for k in range(degree)
        ]
        right = [
            sum((b[i] * b[2 * k - i] * (-1) ** (i + 1) for i in range(degree) if 0 <= 2 * k - i < degree), r.zero)
            for k in range(degree)
        ]
        domain = r.to_domain()
        whole = DomainMatrix(matrix, (degree, degree), domain).charpoly()[-1]
        replaced = [[x] + row[1:] for x, row in zip(right, matrix)]
        part = DomainMatrix(replaced, (degree, degree), domain).charpoly()[-1]
        return part.cancel(2 * a[0] * whole)

    return run


def dense_gcd():
    r, *g = ring("s a b c", ZZ)
    source = random.Random(1)
    monomials = [
        (i, j, k, l)
        for i in range(5)
        for j in range(5)
        for k in range(5)
        for l in range(5)
        if i + j + k + l <= 4
    ]
    f, h, common = (
        r.from_dict({m: c for m in monomials if (c := source.randint(-9, 9))}) for _ in range(3)
    )
    x, y = f * common, h * common
    return lambda: x.gcd(y)


def partial_fractions():
    s = symbols("s")
    ratio = (3 * s + 7) / ((s + 4) * (2 * s + 3) * (s**2 + 2 * s + 5))
    return lambda: apart(ratio, s)


def main():
    p = fifth_degree()
    tasks = {
        "a": rigid,
        "b": flexible,
        "c": motors,
        **{f"d{n}": routh(n) for n in (5, 6, 7, 8)},
        "e": lambda: p.discriminant(),
        **{f"f{n}": variance(n) for n in (3, 4, 5)},
        "g": dense_gcd(),
        "h": partial_fractions(),
    }
    print(json.dumps({key: timed(run) for key, run in tasks.items()}))


if __name__ == "__main__":
    main()
