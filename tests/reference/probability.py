"""The normal law, binomial ranks of order statistics, and tail estimators of a sample, by scipy and numpy.

    python3 probability.py ../engine/data

writes normal.csv, ranks.csv and estimators.csv there.
"""

import math
import pathlib
import sys
from fractions import Fraction

import numpy as np
from scipy.stats import binom, norm

FOLDER = pathlib.Path(sys.argv[1])


def write(name, header, rows):
    lines = [header] + [",".join(str(cell) for cell in row) for row in rows]
    (FOLDER / name).write_text("\n".join(lines) + "\n")


def normal():
    for z in (-37.0, -12.5, -5.0, -2.6, -2.4, -1.0, -0.01, 0.0, 0.3, 1.7, 2.49, 2.51, 4.0, 8.0):
        yield repr(float(z)), repr(float(norm.cdf(z)))


def ranks():
    """Largest low with P(B <= low - 1) <= .025, smallest high with P(B >= high) <= .025; empty where there is none."""
    for n in (20, 100, 250, 1_000, 1_024, 10_000, 100_000, 1_000_000, 10_000_000):
        for p in (0.55, 0.9, 0.95, 0.975, 0.99, 0.999):
            low = int(binom.ppf(0.025, n, p))
            while binom.cdf(low - 1, n, p) > 0.025:
                low -= 1
            while binom.cdf(low, n, p) <= 0.025:
                low += 1
            high = int(binom.ppf(0.975, n, p)) + 1
            while binom.sf(high - 1, n, p) > 0.025:
                high += 1
            while high >= 1 and binom.sf(high - 2, n, p) <= 0.025:
                high -= 1
            yield n, p, low if low >= 1 else "", high if high <= n else ""


def sample():
    """1,000 values of a skewed law: the golden ratio's multiples, cubed."""
    golden = (math.sqrt(5) - 1) / 2
    return np.array([((i * golden) % 1.0) ** 3 * 100 - 20 for i in range(1, 1001)])


def estimators():
    x = sample()
    n = len(x)
    yield "mean", repr(float(x.mean()))
    yield "sd", repr(float(x.std()))
    m = [((x - x.mean()) ** k).mean() for k in (2, 3, 4)]
    yield "sd_error", repr(float(math.sqrt((m[2] - m[0] ** 2) / (4 * m[0] * n))))
    yield "skewness", repr(float(m[1] / m[0] ** 1.5))
    groups = [g for g in np.split(x, 25)]
    skews = [((g - g.mean()) ** 3).mean() / g.std() ** 3 for g in groups]
    yield "skewness_error", repr(float(np.std(skews, ddof=1) / 5))
    for text in ("0.95", "0.9775", "0.99"):
        c = Fraction(text)
        worst = np.sort(x)[::-1]
        q = n * (1 - c)
        whole = math.floor(q)
        var = np.sort(x)[math.ceil(n * c) - 1]
        es = (worst[:whole].sum() + float(q - whole) * worst[whole]) / float(q)
        error = math.sqrt(np.maximum(x - var, 0).var() / n) / float(1 - c)
        yield f"var_{text}", repr(float(var))
        yield f"es_{text}", repr(float(es))
        yield f"es_error_{text}", repr(error)


write("normal.csv", "z,cdf", normal())
write("ranks.csv", "n,p,low,high", ranks())
write("estimators.csv", "figure,value", estimators())
