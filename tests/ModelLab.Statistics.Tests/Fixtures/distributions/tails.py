"""Writes tails.csv: upper tail probabilities at given doubles, to 25 digits.

Run with Debian's packages python3-mpmath, python3-numpy and python3-scipy:

    /usr/bin/python3 tails.py > tails.csv

Every probability comes from power series with positive terms, summed by mpmath in 420 digits, so that even a tail of
1e-300 formed as 1 - CDF keeps more than 100 digits. Where the two series (of the tail and of its complement) are both
short, they are compared; mpmath's own betainc, gammainc and erfc are compared on the points that they manage. scipy only
proposes places near round probabilities; the values belong to the doubles printed, whatever scipy's accuracy.
"""
import sys
import warnings

import numpy as np
import scipy.special
import scipy.stats
from mpmath import mp, mpf, mpmathify, gamma, loggamma, exp, log, nstr

warnings.filterwarnings("ignore")
mp.dps = 420
TINY = mpf(10) ** -400


def series(first, ratio):
    total = term = first
    n = 0
    while term > total * TINY:
        term *= ratio(n)
        total += term
        n += 1
    return total


def beta_lower(x, y, a, b):
    """I_x(a, b) = x^a y^b / (a B(a, b)) * 2F1(a + b, 1; a + 1; x)."""
    front = exp(a * log(x) + b * log(y) + loggamma(a + b) - loggamma(a) - loggamma(b)) / a
    return front * series(mpf(1), lambda n: (a + b + n) * x / (a + 1 + n))


def beta_terms(x, a, b):
    """Rough number of terms of that series."""
    return float(900 / (1 - x)) if x < 1 else float("inf")


def beta_tail(x, y, a, b):
    """I_x(a, b) by its own series, or as 1 - I_y(b, a), whichever is shorter; both where both are short."""
    direct, other = beta_terms(x, a, b), beta_terms(y, b, a)
    values = []
    if direct <= other or direct < 20000:
        values.append(beta_lower(x, y, a, b))
    if other < direct or other < 20000:
        values.append(1 - beta_lower(y, x, b, a))
    if len(values) == 2 and values[0] > mpf(10) ** -330:
        assert abs(values[0] - values[1]) < values[0] * mpf(10) ** -60, (x, a, b)
    return values[0]


def f_tail(f, d1, d2):
    f, d1, d2 = mpf(f), mpf(d1), mpf(d2)
    x = d2 / (d2 + d1 * f)
    return beta_tail(x, d1 * f / (d2 + d1 * f), d2 / 2, d1 / 2)


def t_tail(t, df):
    return f_tail(mpf(t) ** 2, 1, df)


def chi_tail(x, df):
    a, x = mpf(df) / 2, mpf(x) / 2
    front = exp(a * log(x) - x - loggamma(a + 1))
    return 1 - front * series(mpf(1), lambda n: x / (a + 1 + n))


def normal_tail(z):
    return chi_tail(mpf(z) ** 2, 1) / 2


def row(name, argument, df1, df2, value):
    if value < mpf(10) ** -306 or value >= 1:
        return
    print(",".join([name, repr(float(argument)), df1, df2, nstr(value, 25, min_fixed=-3, max_fixed=3)]))
    sys.stdout.flush()


def f_place(p, d1, d2):
    """A place whose tail is about p: far out, where scipy's quantile gives up, from the leading term of the tail."""
    if p > 1e-20:
        return float(scipy.stats.f.isf(p, d1, d2))
    low, high = -700.0, 700.0
    for _ in range(60):
        odds = (low + high) / 2
        log_x, log_y = -np.logaddexp(0, odds), -np.logaddexp(0, -odds)
        leading = d2 / 2 * log_x + d1 / 2 * log_y - scipy.special.betaln(d2 / 2, d1 / 2)
        beyond = odds < np.log(d1 / d2) or leading > np.log(p)
        low, high = (odds, high) if beyond else (low, odds)
    return float(np.exp((low + high) / 2) * d2 / d1)


TARGETS = [0.999, 0.7, 0.5, 0.2, 0.05, 0.001, 1e-8, 1e-20, 1e-60, 1e-150, 1e-300]

print("distribution,argument,df1,df2,tail")
for z in [0.001, 0.1, 0.5, 1.0, 1.2, 1.224744871391589, 1.3, 1.959963984540054, 2.5, 3.0, 4.5, 6.0, 8.0, 10.0, 13.0, 17.5, 22.0, 27.3, 31.0, 35.5, 37.4]:
    row("normal", z, "", "", normal_tail(z))
    assert abs(mp.erfc(mpf(z) / mp.sqrt(2)) / 2 / normal_tail(z) - 1) < mpf(10) ** -60

for df in [0.05, 0.5, 1.0, 1.5, 2.0, 3.0, 4.0, 7.25, 10.0, 29.0, 100.0, 1000.0, 12345.678, 1e5, 1e7]:
    for p in TARGETS:
        t = float(scipy.stats.t.isf(p / 2, df))
        if 0 < t < 1e307:
            row("t", t, repr(df), "", t_tail(t, df))

for df in [0.05, 0.5, 1.0, 2.0, 3.0, 7.25, 10.0, 60.0, 500.0, 12345.678, 1e6, 1e7]:
    for p in TARGETS:
        x = float(scipy.stats.chi2.isf(p, df))
        if 1e-300 < x < 1e307:
            row("chi2", x, repr(df), "", chi_tail(x, df))

for d1 in [0.3, 1.0, 2.0, 5.0, 36.5, 1000.0, 1e5]:
    for d2 in [0.7, 1.0, 4.0, 17.0, 333.0, 1e4, 2e5]:
        for p in TARGETS[int(d2) % 2 :: 2] if d1 < 1e3 else TARGETS[2::4]:
            f = f_place(p, d1, d2)
            if 1e-290 < f < 1e290:
                row("f", f, repr(d1), repr(d2), f_tail(f, d1, d2))

# the overall F of NIST's Filip and Longley, of the penguins' full model and of other sharp fits, and wide degrees of freedom
for f, d1, d2 in [(2162.4395462126, 10.0, 71.0), (284.07932797328787, 8.0, 324.0), (330.2853392346, 6.0, 9.0), (1e6, 1.0, 38.0), (5436385.540796, 2.0, 37.0), (1.0000000001, 3e6, 1e7), (1.01, 1e7, 1e7), (0.999, 1e7, 3e6)]:
    row("f", f, repr(d1), repr(d2), f_tail(f, d1, d2))
