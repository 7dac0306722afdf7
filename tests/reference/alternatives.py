"""Plateau and two rates on invented series, with 40 working digits: writes alternatives.csv.

Other ways than the program's: the plateau by Newton's method on the plain gradient with numerical
second derivatives in 40 digits, from a start close by; two rates by golden sections over the break,
the lines from normal equations or, with bounds, from series.py's maximum. "S05<9" is S05 with every
result under 9 a non-detect at 9; "S05<9>150" has besides every result over 150 above range at 150.
Needs Python 3 with mpmath 1.3. Run it in its own folder.
"""

import csv
import datetime

import mpmath as mp

from series import Problem, mills, upper_tail

mp.mp.dps = 40


def read(name):
    with open("invented-series.csv") as source:
        rows = [r for r in csv.DictReader(x for x in source if not x.startswith("#")) if r["series"] == name]
    first = datetime.date.fromisoformat(rows[0]["date"])
    t = [mp.mpf((datetime.date.fromisoformat(r["date"]) - first).days) / mp.mpf("365.25") for r in rows]
    return t, [mp.mpf(r["value"]) for r in rows], [r["mark"] for r in rows]


def bounded(values, marks, low=None, high=None):
    values, marks = list(values), list(marks)
    for i, value in enumerate(values):
        if low is not None and value < low:
            values[i], marks[i] = mp.mpf(low), "<"
        if high is not None and value > high:
            values[i], marks[i] = mp.mpf(high), ">"
    return values, marks


def plateau(t, y, marks, start):
    """ln P, ln A, ln k (and ln of the scatter with bounds), the misfit and the standard errors."""
    any_bound = any(marks)

    def parts(x, i):
        whole = mp.exp(x[0]) + mp.exp(x[1] - mp.exp(x[2]) * t[i])
        s = mp.exp(x[1] - mp.exp(x[2]) * t[i]) / whole
        return mp.log(whole), (1 - s, s, -s * mp.exp(x[2]) * t[i])

    def gradient(*x):
        sums = [mp.mpf(0)] * len(x)
        for i in range(len(t)):
            f, by = parts(x, i)
            if not any_bound:
                pull = y[i] - f
            else:
                scale = mp.exp(x[3])
                z = (y[i] - f) / scale
                if marks[i] == "":
                    pull, last = z / scale, z * z - 1
                elif marks[i] == "<":
                    pull, last = -mills(z) / scale, -mills(z) * z
                else:
                    pull, last = mills(-z) / scale, mills(-z) * z
                sums[3] += last
            for k in range(3):
                sums[k] += pull * by[k]
        return sums

    x = list(mp.findroot(gradient, start, tol=mp.mpf(10) ** -60, maxsteps=200))
    if any_bound:
        misfit = mp.mpf(0)
        for i in range(len(t)):
            z = (y[i] - parts(x, i)[0]) / mp.exp(x[3])
            if marks[i] == "":
                misfit += -mp.log(2 * mp.pi) / 2 - x[3] - z * z / 2
            else:
                misfit += mp.log(upper_tail(-z if marks[i] == "<" else z))
        return x[:3], misfit, bounded_errors(parts, x, y, marks)
    misfit = sum((y[i] - parts(x, i)[0]) ** 2 for i in range(len(t)))
    products = mp.matrix(3, 3)
    for i in range(len(t)):
        by = parts(x, i)[1]
        for k in range(3):
            for l in range(3):
                products[k, l] += by[k] * by[l]
    inverse = products**-1
    errors = [mp.sqrt(misfit / (len(t) - 3) * inverse[k, k]) for k in range(3)]
    return x, misfit, errors


def bounded_errors(parts, x, y, marks):
    """From minus the second derivatives by height and scatter, those of the curve left out."""
    bend = mp.matrix(4, 4)
    for i, mark in enumerate(marks):
        height, by = parts(x, i)

        def one(f, scatter):
            z = (y[i] - f) / mp.exp(scatter)
            return -scatter - z * z / 2 if mark == "" else mp.log(upper_tail(-z if mark == "<" else z))

        second = {d: -mp.diff(one, (height, x[3]), d) for d in ((2, 0), (1, 1), (0, 2))}
        for k in range(3):
            for l in range(3):
                bend[k, l] += second[2, 0] * by[k] * by[l]
            bend[k, 3] += second[1, 1] * by[k]
            bend[3, k] += second[1, 1] * by[k]
        bend[3, 3] += second[0, 2]
    inverse = bend**-1
    return [mp.sqrt(inverse[k, k]) for k in range(3)]


def broken(t, y, marks, psi):
    rows = [(mp.mpf(1), min(ti - psi, mp.mpf(0)), max(ti - psi, mp.mpf(0))) for ti in t]
    if any(marks):
        problem = Problem([(yi, -r[0], -r[1], -r[2]) for yi, r in zip(y, rows)], marks)
        value, x = problem.maximum([mp.mpf(1), mp.mpf(2), mp.mpf(0), mp.mpf(0)])
        return value, [x[k] / x[0] for k in (1, 2, 3)]
    products, right = mp.matrix(3, 3), mp.matrix(3, 1)
    for yi, r in zip(y, rows):
        for k in range(3):
            right[k] += r[k] * yi
            for l in range(3):
                products[k, l] += r[k] * r[l]
    x = mp.lu_solve(products, right)
    return -sum((yi - sum(r[k] * x[k] for k in range(3))) ** 2 for yi, r in zip(y, rows)), list(x)


def two_rates(t, y, marks, low, high):
    golden = (mp.sqrt(5) - 1) / 2
    low, high = mp.mpf(low), mp.mpf(high)
    left, right = high - golden * (high - low), low + golden * (high - low)
    at_left, at_right = broken(t, y, marks, left)[0], broken(t, y, marks, right)[0]
    for _ in range(75):
        if at_left > at_right:
            high, right, at_right = right, left, at_left
            left = high - golden * (high - low)
            at_left = broken(t, y, marks, left)[0]
        else:
            low, left, at_left = left, right, at_right
            right = low + golden * (high - low)
            at_right = broken(t, y, marks, right)[0]
    psi = (low + high) / 2
    value, (level, before, after) = broken(t, y, marks, psi)
    return psi, level, before, after, (value if any(marks) else -value)


def main():
    t, values, marks = read("S05_tailing")
    cases = {
        "S05": (values, marks),
        "S05<9": bounded(values, marks, low=9),
        "S05<9>150": bounded(values, marks, low=9, high=150),
    }
    with open("alternatives.csv", "w") as out:
        out.write("# Computed by alternatives.py (Python 3, mpmath 1.3, 40 digits); 15 digits are written, of\n")
        out.write("# two rates 12. The misfit is the residual sum of squares, with bounds the log-likelihood.\n")
        out.write("# R 4.2.2 nls on S05: P 8.93163922496493 (0.302343280866562), A 284.976247625962\n")
        out.write("# (18.8614850093862), k 0.820608841047116 (0.0311318753079227), RSS 0.223223422828739; R\n")
        out.write("# segmented: break 4.81365831593659, slopes -0.647773632830296 and -0.0437277844775625, RSS\n")
        out.write("# 0.302534170230843.\n")
        out.write("case,quantity,value\n")

        def write(case, what, value, digits=15):
            out.write(f"{case},{what},{mp.nstr(value, digits)}\n")

        for case, (c, m) in cases.items():
            y = [mp.log(v) for v in c]
            start = [mp.log(mp.mpf("8.9")), mp.log(285), mp.log(mp.mpf("0.82"))]
            start += [mp.log(mp.mpf("0.1"))] if any(m) else []
            x, misfit, errors = plateau(t, y, m, start)
            for what, value in zip(("ln_plateau", "ln_height", "ln_rate"), x):
                write(case, what, value)
            write(case, "plateau_misfit", misfit)
            for what, value in zip(("plateau_error", "height_error", "rate_error"), errors):
                write(case, what, value)
            if any(m):
                value, x = Problem([(yi, -1) for yi in y], m).maximum([mp.mpf(1), mp.mpf(2)])
                level = x[1] / x[0]
            else:
                level = sum(y) / len(y)
                value = sum((yi - level) ** 2 for yi in y)
            write(case, "constant_level", level)
            write(case, "constant_misfit", value)
            # The top lies between two neighbouring dates, found by a look at every stretch.
            inside = [(a, b) for a, b in zip(t[4:-5], t[5:-4])]
            found = max((two_rates_value(t, y, m, a, b), a, b) for a, b in inside)
            psi, level, before, after, misfit = two_rates(t, y, m, found[1], found[2])
            for what, value in zip(("break_at", "level", "before", "after", "broken_misfit"),
                                   (psi, level, before, after, misfit)):
                write(case, what, value, 12)
            print(case, "done")


def two_rates_value(t, y, marks, low, high):
    return max(broken(t, y, marks, low + (high - low) * mp.mpf(k) / 8)[0] for k in range(9))


if __name__ == "__main__":
    main()
