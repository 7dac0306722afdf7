"""Coefficients of the Mills ratio used in src/numerics/normal.rs, and their error.

(x + 5) R(x), R(x) = (1 - Phi(x))/phi(x), is expanded on 0 <= x < infinity in Chebyshev
polynomials of s = (x - 5)/(x + 5) and rewritten in powers of s. The mapping is that of Shepherd &
Laframboise (1981), Math. Comp. 36:249-253 [from memory]; the coefficients are computed here with
40 working digits. Needs Python 3 with mpmath 1.3.
"""

import mpmath as mp

mp.mp.dps = 40
SHIFT, TERMS, NODES = mp.mpf(5), 26, 80


def mills(x):
    x = mp.mpf(x)
    if x > 10**6:
        return (1 - 1 / x**2 + 3 / x**4) / x
    return mp.sqrt(mp.pi / 2) * mp.exp(x * x / 2) * mp.erfc(x / mp.sqrt(2))


def chebyshev():
    angles = [mp.pi * (j + mp.mpf(1) / 2) / NODES for j in range(NODES)]
    values = []
    for angle in angles:
        x = SHIFT * (1 + mp.cos(angle)) / (1 - mp.cos(angle))
        values.append((x + SHIFT) * mills(x))
    return [
        (2 if n else 1) * sum(v * mp.cos(n * a) for v, a in zip(values, angles)) / NODES
        for n in range(TERMS)
    ]


def powers(series):
    before, here = [mp.mpf(1)], [mp.mpf(0), mp.mpf(1)]
    total = [mp.mpf(0)] * len(series)
    for n, weight in enumerate(series):
        polynomial = before if n == 0 else here
        if n >= 2:
            following = [mp.mpf(0)] + [2 * c for c in here]
            for i, c in enumerate(before):
                following[i] -= c
            before, here = here, following
            polynomial = here
        for i, c in enumerate(polynomial):
            total[i] += weight * c
    return total


if __name__ == "__main__":
    coefficients = [float(c) for c in powers(chebyshev())]
    for c in coefficients:
        print(f"    {c!r},")
    worst = 0
    for i in range(4001):
        x = mp.mpf(10) ** (mp.mpf(i) / 1000 - 2)
        s = float((x - SHIFT) / (x + SHIFT))
        total = 0.0
        for c in reversed(coefficients):
            total = total * s + c
        worst = max(worst, abs(mp.mpf(total) / (x + SHIFT) / mills(x) - 1))
    print("# largest relative error, double arithmetic, x in 0.01 ... 100:", mp.nstr(worst, 3))
