"""The peers of the benchmarks: what a good numpy programmer, a careful statsmodels user and a pandas user would write.

Started with the folder of the data. Prints the names of what it can do on this machine, then answers each name that
comes in with the CPU time of one run in milliseconds.
"""

import sys
import time

import numpy as np

try:
    from scipy.special import stdtr
except ImportError:
    stdtr = None
try:
    import statsmodels.api as sm
except ImportError:
    sm = None
try:
    import pandas as pd
except ImportError:
    pd = None

FOLDER = sys.argv[1]
ALPHA = 0.05


def load(name, rows, predictors):
    raw = np.fromfile(f"{FOLDER}/{name}.bin").reshape(predictors + 1, rows)
    return np.column_stack([np.ones(rows), raw[1:].T]), raw[0].copy()


def figures(cross, moments, total, rows):
    """Coefficients, standard errors, t, two-sided p and R squared from cross-products."""
    inverse = np.linalg.inv(cross)
    estimates = inverse @ moments
    left = rows - len(moments)
    residual = total[0] - moments @ estimates
    errors = np.sqrt(np.diag(inverse) * residual / left)
    t = estimates / errors
    p = 2 * stdtr(left, -np.abs(t)) if stdtr else None
    return estimates, errors, t, p, 1 - residual / total[1]


def products(x, y):
    return x.T @ x, x.T @ y, (y @ y, ((y - y.mean()) ** 2).sum())


def fit_numpy(x, y):
    cross, moments, total = products(x, y)
    return figures(cross, moments, total, len(y))


def fit_statsmodels(x, y):
    fit = sm.OLS(y, x).fit()
    return fit.params, fit.bse, fit.tvalues, fit.pvalues, fit.conf_int(), fit.rsquared, fit.aic


def eliminate_numpy(x, y):
    """Cross-products once; each step drops the column of the smallest |t| while its p lies above the threshold."""
    cross, moments, total = products(x, y)
    kept = np.arange(x.shape[1])
    while True:
        part = np.ix_(kept, kept)
        _, _, t, p, _ = figures(cross[part], moments[kept], total, len(y))
        weakest = 1 + np.argmin(np.abs(t[1:]))
        if (p[weakest] if p is not None else 2 * (np.abs(t[weakest]) < 1.96)) <= ALPHA:
            return kept
        kept = np.delete(kept, weakest)


def eliminate_statsmodels(x, y):
    kept = np.arange(x.shape[1])
    while True:
        p = sm.OLS(y, x[:, kept]).fit().pvalues
        weakest = 1 + np.argmax(p[1:])
        if p[weakest] <= ALPHA:
            return kept
        kept = np.delete(kept, weakest)


def timed(run, least=0.06):
    """CPU time of one run in milliseconds, over as many runs as make the clock's grain small."""
    runs = 0
    begin = time.process_time()
    while True:
        run()
        runs += 1
        spent = time.process_time() - begin
        if spent >= least:
            return 1000 * spent / runs


def main():
    peers = {}
    for name, rows, predictors in (("500x20", 500, 20), ("1000x30", 1000, 30)):
        x, y = load(f"fit-{name}", rows, predictors)
        peers[f"fit-{name}-numpy"] = lambda x=x, y=y: fit_numpy(x, y)
        peers[f"eliminate-{name}-numpy"] = lambda x=x, y=y: eliminate_numpy(x, y)
        if sm:
            peers[f"fit-{name}-statsmodels"] = lambda x=x, y=y: fit_statsmodels(x, y)
            peers[f"eliminate-{name}-statsmodels"] = lambda x=x, y=y: eliminate_statsmodels(x, y)
    if pd:
        peers["read-large-pandas"] = lambda: pd.read_csv(f"{FOLDER}/large.csv")
    print(" ".join(peers), flush=True)
    for line in sys.stdin:
        print(repr(timed(peers[line.strip()])), flush=True)


main()
