"""Tails and quantiles with 40 working digits: writes tails.csv. Needs Python 3 with mpmath 1.3.

Run it in its own folder.
"""

import mpmath as mp

mp.mp.dps = 40


def student_upper(t, nu):
    t, nu = mp.mpf(t), mp.mpf(nu)
    if nu <= 50:
        return mp.betainc(nu / 2, mp.mpf(1) / 2, 0, nu / (nu + t * t), regularized=True) / 2
    front = mp.exp(mp.loggamma((nu + 1) / 2) - mp.loggamma(nu / 2)) / mp.sqrt(nu * mp.pi)
    density = lambda s: front * (1 + s * s / nu) ** (-(nu + 1) / 2)
    if t < 1:
        return mp.mpf(1) / 2 - mp.quad(density, [0, t])
    return mp.quad(density, [t] + [t + k / t for k in (1, 2, 4, 8, 16, 32, 64)] + [8 * t + 100, mp.inf])


def write(out, what, argument, degrees, value):
    out.write(f"{what},{argument},{degrees},{mp.nstr(value, 17)}\n")


def main():
    with open("tails.csv", "w") as out:
        out.write("# Computed by tails.py (Python 3, mpmath 1.3, 40 digits); 17 digits are written.\n")
        out.write("what,argument,degrees,value\n")
        for z in ["-37", "-30.5", "-29.5", "-12", "-8", "-3", "-1", "-0.1", "0", "0.1", "1", "3", "8"]:
            x = mp.mpf(z)
            lower = mp.erfc(-x / mp.sqrt(2)) / 2
            m = mp.npdf(x) / lower
            write(out, "normal_lower", z, "", lower)
            write(out, "ln_lower", z, "", mp.log(lower))
            write(out, "mills", z, "", m)
            write(out, "bend", z, "", m * (m + x))
        for z in ["-40", "-1000", "-1e8"]:
            x = mp.mpf(z)
            series = sum((-1) ** k * mp.fac2(2 * k - 1) / x ** (2 * k) for k in range(25))
            m = -x / series
            write(out, "ln_lower", z, "", -x * x / 2 - mp.log(2 * mp.pi) / 2 - mp.log(-x) + mp.log(series))
            write(out, "mills", z, "", m)
            write(out, "bend", z, "", m * (m + x))
        for p in ["1e-12", "1e-6", "0.005", "0.025", "0.05", "0.3", "0.499"]:
            write(out, "normal_quantile", p, "", mp.sqrt(2) * mp.erfinv(1 - 2 * mp.mpf(p)))
        for nu in ["1", "1.5", "2.5", "10.5", "38", "200", "1000", "1001", "10000", "1e6", "1e8"]:
            for t in ["0.5", "2", "6", "8"]:
                write(out, "student_upper", t, nu, student_upper(t, nu))
            for p in ["1e-10", "1e-6", "0.005", "0.025", "0.05", "0.1", "0.3", "0.45"]:
                near = mp.sqrt(2) * mp.erfinv(1 - 2 * mp.mpf(p))
                if mp.mpf(nu) < 3:
                    near = mp.mpf(p) ** (-1 / mp.mpf(nu))
                goal = mp.log(mp.mpf(p))
                q = mp.findroot(lambda t: mp.log(student_upper(t, nu)) - goal, (near, near * 1.02), tol=1e-50)
                write(out, "student_quantile", p, nu, abs(q))
        for x, nu in [("0.1", "1"), ("3.841458821", "1"), ("20", "3"), ("80", "11")]:
            write(out, "chi_squared_upper", x, nu, mp.gammainc(mp.mpf(nu) / 2, mp.mpf(x) / 2, regularized=True))
        for f, below in [("0.5", "8"), ("4.0382", "21"), ("31.6176184", "8"), ("900", "30")]:
            x = mp.mpf(below) / (mp.mpf(below) + 2 * mp.mpf(f))
            value = mp.betainc(mp.mpf(below) / 2, 1, 0, x, regularized=True)
            write(out, "fisher_upper_2", f, below, value)


if __name__ == "__main__":
    main()
