"""Reference values for invented-series.csv, with 40 working digits: writes series-expected.csv.

Every quantity is computed here from its definition, by other ways than the program's: least squares
from normal equations in 40 digits, the censored fit and its profiles by Newton's method on the plain
sums, ends by bracketing, exact Kendall p by counting in whole numbers. Times are days since the
first sample over 365.25. Intervals are two-sided at 0.90; the level is at the last date; the
crossing is of the limit. Needs Python 3 with mpmath 1.3. Run it in its own folder.
"""

import csv
import datetime
from fractions import Fraction

import mpmath as mp

mp.mp.dps = 40
CONFIDENCE = mp.mpf("0.90")


def student_quantile(tail, nu):
    def upper(t):
        return mp.betainc(nu / 2, mp.mpf(1) / 2, 0, nu / (nu + t * t), regularized=True) / 2

    return mp.findroot(lambda t: mp.log(upper(t) / tail), (mp.mpf("0.1"), mp.mpf(100)), solver="anderson")


def student_two_sided(t, nu):
    return mp.betainc(nu / 2, mp.mpf(1) / 2, 0, nu / (nu + t * t), regularized=True)


def upper_tail(z):
    return mp.erfc(z / mp.sqrt(2)) / 2


def ln_lower(z):
    return mp.log(upper_tail(-z))


def mills(z):
    return mp.npdf(z) / upper_tail(-z)


class Problem:
    """z_i = theta p_i - kappa q_i (and a third unknown r_i where three are free)."""

    def __init__(self, columns, marks):
        self.columns, self.marks = columns, marks

    def maximum(self, start):
        x = mp.matrix(start)
        size = len(start)
        for _ in range(400):
            value, grad, bend = self.value(x), mp.matrix(size, 1), mp.matrix(size, size)
            for row, mark in zip(self.columns, self.marks):
                z = sum(row[k] * x[k] for k in range(size))
                if mark == "":
                    g, h = -z, mp.mpf(1)
                elif mark == "<":
                    m = mills(z)
                    g, h = m, m * (m + z)
                else:
                    m = mills(-z)
                    g, h = -m, m * (m - z)
                for k in range(size):
                    grad[k] += g * row[k]
                    for l in range(size):
                        bend[k, l] += h * row[k] * row[l]
            n = sum(1 for mark in self.marks if mark == "")
            grad[0] += n / x[0]
            bend[0, 0] += n / x[0] ** 2
            step = mp.lu_solve(bend, grad)
            decrement = (grad.T * step)[0]
            share = mp.mpf(1)
            while x[0] + share * step[0] <= 0 or self.value(x + share * step) < value - mp.mpf(10) ** -30:
                share /= 2
            x = x + share * step
            if decrement < mp.mpf(10) ** -40:
                return self.value(x), x
        raise ArithmeticError("no maximum")

    def value(self, x):
        total = mp.mpf(0)
        for row, mark in zip(self.columns, self.marks):
            z = sum(row[k] * x[k] for k in range(len(row)))
            if mark == "":
                total += mp.log(x[0]) - z * z / 2 - mp.log(2 * mp.pi) / 2
            else:
                total += ln_lower(z if mark == "<" else -z)
        return total


def root(f, inside, outside):
    return mp.findroot(f, (inside, outside), solver="anderson", tol=mp.mpf(10) ** -24, maxsteps=200)


def outward(f, centre, step):
    reach = step
    while f(centre + reach) < 0:
        reach *= 2
    return root(f, centre, centre + reach)


def fit(t, y, marks, limit):
    full = Problem([(yi, -1, -ti) for ti, yi in zip(t, y)], marks)
    best, x = full.maximum([mp.mpf(2), mp.mpf(4), mp.mpf(0)])
    a, b, scale = x[1] / x[0], x[2] / x[0], 1 / x[0]
    flat, _ = Problem([(yi, -1) for yi in y], marks).maximum([mp.mpf(1), mp.mpf(2)])
    m = mp.mpf(0)
    for ti, yi, mark in zip(t, y, marks):
        z = (yi - a - b * ti) / scale
        if mark == "":
            m += 1
        elif upper_tail(-z if mark == "<" else z) <= mp.mpf("0.99"):
            m += mp.mpf(1) / 2
    q = student_quantile((1 - CONFIDENCE) / 2, m - 2)
    cut = m * mp.log(1 + q * q / (m - 2))
    start = [mp.mpf(1), mp.mpf(0)]

    def fall(columns):
        return 2 * (best - Problem(columns, marks).maximum(start)[0]) - cut

    def by_slope(v):
        return fall([(yi - v * ti, -1) for ti, yi in zip(t, y)])

    last = t[-1]

    def by_level(v):
        return fall([(yi - v, -(ti - last)) for ti, yi in zip(t, y)])

    y0 = mp.log(limit)

    def by_angle(v):
        return fall([(yi - y0, -(ti * mp.cos(v) - mp.sin(v))) for ti, yi in zip(t, y)])

    lr = 2 * (best - flat)
    found = {
        "intercept": a, "slope": b, "ml_scale": scale, "log_likelihood": best, "m": m,
        "r_squared": 1 - mp.exp(-lr / len(t)),
        "slope_p": student_two_sided(mp.sqrt((m - 2) * (mp.exp(lr / m) - 1)), m - 2),
        "slope_low": outward(by_slope, b, -scale / 10), "slope_high": outward(by_slope, b, scale / 10),
        "level_low": outward(by_level, a + b * last, -scale / 10),
        "level_high": outward(by_level, a + b * last, scale / 10),
    }
    if lr > cut:
        middle = mp.atan((y0 - a) / b)
        found["crossing_low"] = mp.tan(root(by_angle, middle, -mp.pi / 2))
        found["crossing_high"] = mp.tan(root(by_angle, middle, mp.pi / 2))
    elif by_angle(mp.atan(last)) > 0:
        found["excluded_until"] = mp.tan(root(by_angle, mp.pi / 2, mp.atan(last)))
    return found


def least_squares(t, y):
    n = mp.mpf(len(t))
    tm, ym = sum(t) / n, sum(y) / n
    sxx = sum((ti - tm) ** 2 for ti in t)
    b = sum((ti - tm) * (yi - ym) for ti, yi in zip(t, y)) / sxx
    e = [yi - ym - b * (ti - tm) for ti, yi in zip(t, y)]
    rss = sum(v * v for v in e)
    s2 = rss / (n - 2)
    found = {"rss": rss, "sd": mp.sqrt(s2), "ols_r_squared": 1 - rss / sum((yi - ym) ** 2 for yi in y)}
    found["durbin_watson"] = sum((p - q) ** 2 for p, q in zip(e[1:], e)) / rss
    found["lag_one"] = sum(p * q for p, q in zip(e[1:], e)) / rss
    largest, cook = mp.mpf(0), mp.mpf(0)
    for ti, ei in zip(t, e):
        h = 1 / n + (ti - tm) ** 2 / sxx
        cook = max(cook, ei**2 * h / (2 * s2 * (1 - h) ** 2))
        r = ei / mp.sqrt((rss - ei**2 / (1 - h)) / (n - 3) * (1 - h))
        largest = r if abs(r) > abs(largest) else largest
    found["cook"], found["studentized"] = cook, largest
    found["bonferroni_p"] = min(mp.mpf(1), n * student_two_sided(largest, n - 3))
    return found


def kendall(y):
    n = len(y)
    s = sum((y[j] > y[i]) - (y[j] < y[i]) for j in range(n) for i in range(j))
    sizes = [y.count(v) for v in set(y)]
    variance = Fraction(n * (n - 1) * (2 * n + 5) - sum(u * (u - 1) * (2 * u + 5) for u in sizes), 18)
    found = {"kendall_s": mp.mpf(s), "kendall_variance": mp.mpf(variance.numerator) / variance.denominator}
    if all(u == 1 for u in sizes) and n <= 40:
        counts = [1]
        for k in range(2, n + 1):
            after = [0] * (len(counts) + k - 1)
            for q, c in enumerate(counts):
                for j in range(k):
                    after[q + j] += c
            counts = after
        pairs = n * (n - 1) // 2
        far = sum(c for q, c in enumerate(counts) if abs(pairs - 2 * q) >= abs(s))
        found["kendall_p"] = mp.mpf(far) / sum(counts)
    elif n > 9:
        z = (s - (s > 0) + (s < 0)) / mp.sqrt(found["kendall_variance"])
        found["kendall_p"] = 2 * upper_tail(abs(z))
    return found


def middle(values):
    v = sorted(values)
    half = len(v) // 2
    return v[half] if len(v) % 2 else (v[half - 1] + v[half]) / 2


def main():
    series = {}
    with open("invented-series.csv") as source:
        for row in csv.DictReader(line for line in source if not line.startswith("#")):
            series.setdefault(row["series"], []).append(row)
    with open("series-expected.csv", "w") as out:
        out.write("# Computed by series.py (Python 3, mpmath 1.3, 40 digits); 17 digits are written.\n")
        out.write("# Agrees with statsmodels, scipy, R lm and survreg 4.2.2 where those give the same figure.\n")
        out.write("series,quantity,value\n")
        for name, rows in series.items():
            first = datetime.date.fromisoformat(rows[0]["date"])
            days = [(datetime.date.fromisoformat(r["date"]) - first).days for r in rows]
            t = [mp.mpf(d) / mp.mpf("365.25") for d in days]
            y = [mp.log(mp.mpf(r["value"])) for r in rows]
            marks = [r["mark"] for r in rows]
            found = fit(t, y, marks, mp.mpf(rows[0]["limit"]))
            if not any(marks):
                found.update(least_squares(t, y))
                found.update(kendall([r["value"] and float(r["value"]) for r in rows]))
                pairs = [(y[j] - y[i]) / (t[j] - t[i]) for j in range(len(t)) for i in range(j)]
                found["sen_slope"] = middle(pairs)
                found["sen_intercept"] = middle(y) - middle(pairs) * middle(t)
            for key, value in found.items():
                out.write(f"{name},{key},{mp.nstr(value, 17)}\n")
            print(name, "done")


if __name__ == "__main__":
    main()
