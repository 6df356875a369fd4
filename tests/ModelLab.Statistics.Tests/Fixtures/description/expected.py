"""Writes numbers.csv and correlations.csv: figures of penguins and longley_full to 25 digits.

Run with Debian's packages python3-mpmath, python3-numpy and python3-scipy:

    /usr/bin/python3 expected.py

Every figure is formed by mpmath in 60 digits from the decimals as written and compared with numpy and scipy to 1e-10.
"""
import csv
import os

import numpy as np
import scipy.stats
from mpmath import atanh, betainc, erfinv, floor, mp, mpf, nstr, sqrt, tanh

mp.dps = 60
HERE = os.path.dirname(os.path.abspath(__file__))


def column(table, name):
    with open(os.path.join(HERE, "..", "worked", table)) as file:
        return [mpf(row[name]) if row[name] else None for row in csv.DictReader(file)]


def same(value, check):
    assert abs(value - mpf(float(check))) <= abs(value) * mpf("1e-10") + mpf("1e-14"), (value, check)
    return value


def quantile(values, p):
    place = (len(values) - 1) * mpf(p)
    at = int(floor(place))
    top = values[min(at + 1, len(values) - 1)]
    return same(values[at] + (place - at) * (top - values[at]), np.quantile([float(v) for v in values], float(p)))


def describe(values):
    x = sorted(v for v in values if v is not None)
    doubles = [float(v) for v in x]
    n = len(x)
    mean = sum(x) / n
    m2, m3, m4 = (sum((v - mean) ** k for v in x) / n for k in (2, 3, 4))
    sd = sqrt(m2 * n / (n - 1))
    g1 = sqrt(mpf(n) * (n - 1)) / (n - 2) * m3 / m2 ** mpf("1.5")
    g2 = mpf(n - 1) / ((n - 2) * (n - 3)) * ((n + 1) * (m4 / m2**2 - 3) + 6)
    return [
        n, len(values) - n, len(set(x)), same(mean, np.mean(doubles)), same(sd, np.std(doubles, ddof=1)), x[0],
        quantile(x, "0.25"), quantile(x, "0.5"), quantile(x, "0.75"), x[-1],
        same(g1, scipy.stats.skew(doubles, bias=False)), same(g2, scipy.stats.kurtosis(doubles, bias=False)),
    ]


def mean_ranks(values):
    return [mpf(sum(w < v for w in values)) + mpf(sum(w == v for w in values) + 1) / 2 for v in values]


def correlate(a, b, ranks):
    pairs = [(u, v) for u, v in zip(a, b) if u is not None and v is not None]
    x, y = [u for u, _ in pairs], [v for _, v in pairs]
    plain_x, plain_y = [float(v) for v in x], [float(v) for v in y]
    if ranks:
        x, y = mean_ranks(x), mean_ranks(y)
    n = len(x)
    mx, my = sum(x) / n, sum(y) / n
    sxy = sum((u - mx) * (v - my) for u, v in zip(x, y))
    r = sxy / sqrt(sum((u - mx) ** 2 for u in x) * sum((v - my) ** 2 for v in y))
    library = (scipy.stats.spearmanr if ranks else scipy.stats.pearsonr)(plain_x, plain_y)
    same(r, library[0])
    if 1 - r * r < mpf(10) ** -40:
        return [n, r, None, None, None]
    p = betainc(mpf(n - 2) / 2, mpf(1) / 2, 0, 1 - r * r, regularized=True)
    if p > mpf("1e-150"):
        # scipy's p loses digits far out
        assert abs(p / mpf(float(library[1])) - 1) < mpf("1e-6"), (p, library)
    width = sqrt(2) * erfinv(mpf("0.95")) * sqrt((1 + r * r / 2 if ranks else mpf(1)) / (n - 3))
    lower, upper = tanh(atanh(r) - width), tanh(atanh(r) + width)
    if not ranks:
        interval = library.confidence_interval(0.95)
        same(lower, interval.low)
        same(upper, interval.high)
    return [n, r, lower, upper, p]


def text(value):
    if value is None:
        return ""
    return str(value) if isinstance(value, int) else nstr(value, 25)


TABLES = {
    "penguins.csv": ["beak_length_mm", "beak_depth_mm", "flipper_length_mm", "body_mass_g"],
    "longley_full.csv": ["TOTEMP", "GNPDEFL", "GNP", "UNEMP", "ARMED", "POP", "YEAR"],
}
with open(os.path.join(HERE, "numbers.csv"), "w") as out:
    print("table,variable,n,missing,distinct,mean,standardDeviation,minimum,lowerQuartile,median,upperQuartile,maximum,skewness,excessKurtosis", file=out)
    for table, names in TABLES.items():
        for name in names:
            print(",".join([table, name] + [text(v) for v in describe(column(table, name))]), file=out)
with open(os.path.join(HERE, "correlations.csv"), "w") as out:
    print("kind,table,first,second,n,r,lower,upper,p", file=out)
    for kind in ["pearson", "spearman"]:
        for table, names in TABLES.items():
            for i, first in enumerate(names):
                for second in names[i + 1 :]:
                    figures = correlate(column(table, first), column(table, second), kind == "spearman")
                    print(",".join([kind, table, first, second] + [text(v) for v in figures]), file=out)
