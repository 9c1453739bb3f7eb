"""Mean, sd and skewness of small books by Gauss-Hermite quadrature over their factors: another road than the engine's
closed form. Needs numpy alone.

    python3 moments.py > ../engine/data/moments.csv
"""

import itertools
import sys

import numpy as np

NODES = 60


def move(factor, years):
    """Mean of the modelled variable's move, volatility and speed."""
    kind, level, drift_or_long_run, speed, sigma = factor
    if kind == "geometric":
        return (drift_or_long_run - sigma**2 / 2) * years
    gap = np.log(drift_or_long_run / level) if kind == "log" else drift_or_long_run - level
    return gap * -np.expm1(-speed * years)


def covariance(factors, correlation, years):
    """Integrated covariance of the moves."""
    n = len(factors)
    q = np.empty((n, n))
    for i, j in itertools.product(range(n), range(n)):
        rate = factors[i][3] + factors[j][3]
        integral = years if rate == 0 else -np.expm1(-rate * years) / rate
        q[i, j] = correlation[i][j] * factors[i][4] * factors[j][4] * integral
    return q


def moments(factors, correlation, value, years):
    """Moments of value(list of growth or move per factor)."""
    n = len(factors)
    points, weights = np.polynomial.hermite_e.hermegauss(NODES)
    grid = np.stack([axis.ravel() for axis in np.meshgrid(*[points] * n, indexing="ij")])
    weight = np.prod([axis.ravel() for axis in np.meshgrid(*[weights / weights.sum()] * n, indexing="ij")], axis=0)
    moved = np.linalg.cholesky(covariance(factors, correlation, years)) @ grid
    y = [move(f, years) + x for f, x in zip(factors, moved)]
    y = [np.exp(x) if f[0] != "level" else x for f, x in zip(factors, y)]
    worth = value(y)
    mean = weight @ worth
    m2, m3 = (weight @ (worth - mean) ** k for k in (2, 3))
    return mean, np.sqrt(m2), m3 / m2**1.5


G, L, X = (
    ("geometric", 100.0, 0.05, 0.0, 0.2),
    ("log", 50.0, 60.0, 2.0, 0.3),
    ("level", 3.0, 4.0, 0.5, 0.8),
)
RATE_G, RATE_L, RATE_X = (
    ("geometric", 1.25, 0.01, 0.0, 0.1),
    ("log", 1.25, 1.1, 1.0, 0.12),
    ("level", 1.25, 1.1, 1.5, 0.15),
)
CORRELATION = [[1.0, 0.5, -0.3], [0.5, 1.0, 0.2], [-0.3, 0.2, 1.0]]

# Each book is a constant, weights on the second and third factor in a currency whose rate is the first, all in it, beside
# 500 of the book's own currency: V = 500 + rate (100 + 1000 y_1 - 40 y_2).
BOOKS = {
    "geometric rate, geometric and level": (RATE_G, G, X),
    "geometric rate, reverting log and level": (RATE_G, L, X),
    "reverting log rate, geometric and reverting log": (RATE_L, G, L),
    "level rate, geometric and level": (RATE_X, G, X),
    "level rate, level and reverting log": (RATE_X, X, L),
}


def foreign(rate_is_level):
    def value(y):
        rate = 1.25 + y[0] if rate_is_level else 1.25 * y[0]
        return 500 + rate * (100 + 1000 * y[1] - 40 * y[2])

    return value


def main():
    out = sys.stdout
    out.write("book,day,mean,sd,skewness\n")
    own = lambda y: 300 + 1000 * y[0] - 250 * y[1] + 100 * y[2]
    for day in (1, 10, 252):
        figures = moments((G, L, X), CORRELATION, own, day / 252)
        out.write(f"reference book,{day}," + ",".join(f"{x:.17g}" for x in figures) + "\n")
    for name, factors in BOOKS.items():
        for day in (5, 252):
            value = foreign(factors[0][0] == "level")
            figures = moments(factors, CORRELATION, value, day / 252)
            out.write(f'"{name}",{day},' + ",".join(f"{x:.17g}" for x in figures) + "\n")


main()
