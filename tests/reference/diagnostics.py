"""Reference values for residuals of invented-series.csv, with 40 working digits: writes
invented-diagnostics.csv.

Everything is computed here from its definition, by other ways than the program's: the quadratic from
normal equations, the continuous autoregression from the whole matrix of correlations (Cholesky in 40
digits) with the maximum over the rate of fading found by a grid and by Newton steps on differences,
Shapiro and Wilk's W from its coefficients (Royston 1995, AS R94). Series with non-detects are left
out. Times are days since the first sample over 365.25, y = ln(value). Needs Python 3 with mpmath 1.3.
Run it in its own folder.
"""

import csv
import datetime

import mpmath as mp

mp.mp.dps = 40


def upper_tail(z):
    return mp.erfc(z / mp.sqrt(2)) / 2


def student_two_sided(t, nu):
    return mp.betainc(nu / 2, mp.mpf(1) / 2, 0, nu / (nu + t * t), regularized=True)


def polynomial(coefficients, x):
    return sum(mp.mpf(c) * x**power for power, c in enumerate(coefficients))


def shapiro_wilk(values):
    x = sorted(values)
    n = len(x)
    if n == 3:
        raise ValueError("no series of three")
    m = [-mp.sqrt(2) * mp.erfinv(1 - 2 * (i - mp.mpf(3) / 8) / (n + mp.mpf(1) / 4)) for i in range(1, n + 1)]
    ssm = sum(v * v for v in m)
    u = 1 / mp.sqrt(n)
    a = [mp.mpf(0)] * n
    a[-1] = polynomial(["0", "0.221157", "-0.147981", "-2.07119", "4.434685", "-2.706056"], u) + m[-1] / mp.sqrt(ssm)
    fixed = 1
    if n > 5:
        a[-2] = polynomial(["0", "0.042981", "-0.293762", "-1.752461", "5.682633", "-3.582633"], u) + m[-2] / mp.sqrt(ssm)
        fixed = 2
    outer_m = 2 * sum(m[-k - 1] ** 2 for k in range(fixed))
    outer_a = 2 * sum(a[-k - 1] ** 2 for k in range(fixed))
    phi = (ssm - outer_m) / (1 - outer_a)
    for i in range(fixed, n - fixed):
        a[i] = m[i] / mp.sqrt(phi)
    for k in range(fixed):
        a[k] = -a[-k - 1]
    mean = sum(x) / n
    w = sum(p * q for p, q in zip(a, x)) ** 2 / sum((v - mean) ** 2 for v in x)
    if n <= 11:
        gamma = polynomial(["-2.273", "0.459"], n)
        y = -mp.log(gamma - mp.log(1 - w))
        mu = polynomial(["0.5440", "-0.39978", "0.025054", "-0.0006714"], n)
        sigma = mp.exp(polynomial(["1.3822", "-0.77857", "0.062767", "-0.0020322"], n))
    else:
        y, ln = mp.log(1 - w), mp.log(n)
        mu = polynomial(["-1.5861", "-0.31082", "-0.083751", "0.0038915"], ln)
        sigma = mp.exp(polynomial(["-0.4803", "-0.082676", "0.0030302"], ln))
    return w, upper_tail((y - mu) / sigma)


def least_squares(columns, y):
    size = len(columns)
    gram = mp.matrix(size, size)
    right = mp.matrix(size, 1)
    for i in range(size):
        right[i] = sum(p * q for p, q in zip(columns[i], y))
        for j in range(size):
            gram[i, j] = sum(p * q for p, q in zip(columns[i], columns[j]))
    inverse = gram**-1
    beta = inverse * right
    residual = [v - sum(beta[k] * columns[k][i] for k in range(size)) for i, v in enumerate(y)]
    return beta, inverse, residual


class Faded:
    """The line with correlations exp(-rate |t_i - t_j|)."""

    def __init__(self, t, y, rate):
        n = len(t)
        covariance = mp.matrix(n, n)
        for i in range(n):
            for j in range(n):
                covariance[i, j] = mp.exp(-rate * abs(t[i] - t[j]))
        root = mp.cholesky(covariance)

        def white(column):
            out = []
            for i in range(n):
                out.append((column[i] - sum(root[i, k] * out[k] for k in range(i))) / root[i, i])
            return out

        columns = [white([mp.mpf(1)] * n), white(t)]
        beta, inverse, residual = least_squares(columns, white(y))
        rss = sum(e * e for e in residual)
        ln_root = sum(mp.log(root[i, i]) for i in range(n))
        self.log_likelihood = -mp.mpf(n) / 2 * (mp.log(2 * mp.pi * rss / n) + 1) - ln_root
        self.slope = beta[1]
        self.slope_error = mp.sqrt(rss / (n - 2) * inverse[1, 1])
        mean = sum(t) / n
        d = [v - mean for v in t]
        double = sum(d[i] * covariance[i, j] * d[j] for i in range(n) for j in range(n))
        self.inflation = double / sum(v * v for v in d)


def car1(t, y):
    span, shortest = t[-1] - t[0], min(b - a for a, b in zip(t, t[1:]))
    flat = Faded(t, y, mp.mpf(10) ** 6)
    low, high = mp.log(1 / (100 * span)), mp.log(7 / shortest)
    steps = 60
    grid = [low + (high - low) * k / steps for k in range(steps + 1)]
    mp.mp.dps = 20
    values = [Faded(t, y, mp.exp(x)).log_likelihood for x in grid]
    mp.mp.dps = 40
    best = max(range(steps + 1), key=lambda k: values[k])
    if best == steps or values[best] <= flat.log_likelihood:
        return None
    x, h = grid[best], mp.mpf(10) ** -8
    for _ in range(12):
        centre = Faded(t, y, mp.exp(x)).log_likelihood
        left, right = (Faded(t, y, mp.exp(x + s * h)).log_likelihood for s in (-1, 1))
        slope, bend = (right - left) / (2 * h), (right - 2 * centre + left) / h**2
        step = -slope / bend if bend < 0 else (high - low) / steps * mp.sign(slope)
        limit = (high - low) / steps
        step = max(-limit, min(limit, step))
        x += step
        if abs(step) < mp.mpf(10) ** -14:
            break
    found = Faded(t, y, mp.exp(x))
    return mp.exp(-mp.exp(x)), found


def main():
    series = {}
    with open("invented-series.csv", encoding="utf-8") as lines:
        for row in csv.DictReader(line for line in lines if not line.startswith("#")):
            series.setdefault(row["series"], []).append(row)
    with open("invented-diagnostics.csv", "w", encoding="utf-8") as out:
        out.write("# Computed by diagnostics.py (Python 3, mpmath 1.3, 40 digits); 17 digits are written.\n")
        out.write("# shapiro and bend agree with shapiro.test and lm of R 4.2.2 to 11 digits or more. car1 is per year and left\n")
        out.write("# out where no autoregression does better than none.\n")
        out.write("series,quantity,value\n")
        for name, rows in series.items():
            if any(row["mark"] for row in rows):
                continue
            days = [datetime.date.fromisoformat(row["date"]).toordinal() for row in rows]
            t = [mp.mpf(day - days[0]) / mp.mpf("365.25") for day in days]
            y = [mp.log(mp.mpf(row["value"])) for row in rows]
            n = len(t)
            ones = [mp.mpf(1)] * n
            _, _, residual = least_squares([ones, t], y)
            beta, inverse, bent = least_squares([ones, t, [v * v for v in t]], y)
            error = mp.sqrt(sum(e * e for e in bent) / (n - 3) * inverse[2, 2])
            w, p = shapiro_wilk(residual)
            found = [
                ("shapiro_w", w),
                ("shapiro_p", p),
                ("bend", beta[2]),
                ("bend_error", error),
                ("bend_t", beta[2] / error),
                ("bend_p", student_two_sided(beta[2] / error, n - 3)),
            ]
            together = car1(t, y)
            if together:
                phi, line = together
                found += [
                    ("car1_phi", phi),
                    ("car1_log_likelihood", line.log_likelihood),
                    ("car1_slope", line.slope),
                    ("car1_slope_error", line.slope_error),
                    ("car1_inflation", line.inflation),
                ]
            for what, value in found:
                out.write(f"{name},{what},{mp.nstr(value, 17)}\n")


main()
