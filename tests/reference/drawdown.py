"""P(largest fall > h) within a year of a Brownian motion with drift, variance 1 a year: by inverting the transform of
the time at which the fall first passes h (Taylor, A stopped Brownian motion formula, Annals of Probability 3, 1975; from
memory), E exp(-l tau) = d exp(-m h) / (d cosh(d h) - m sinh(d h)), d = sqrt(m^2 + 2 l). Another road than the engine's
series. Fixed Talbot contour (Abate and Valko 2004; from memory); needs numpy alone.

    python3 drawdown.py > ../engine/data/drawdown.csv
"""

import numpy as np

TERMS = 28


def talbot(transform, time):
    r = 2 * TERMS / (5 * time)
    theta = np.arange(1, TERMS) * np.pi / TERMS
    cot = 1 / np.tan(theta)
    s = r * theta * (cot + 1j)
    slope = 1 + 1j * (theta + (theta * cot - 1) * cot)
    total = 0.5 * np.exp(r * time) * transform(r + 0j) + np.sum((np.exp(s * time) * transform(s) * slope).real)
    return r / TERMS * total.real


def passing(m, h):
    def transform(l):
        d = np.sqrt(m * m + 2 * l)
        return d * np.exp(-m * h) / (d * np.cosh(d * h) - m * np.sinh(d * h)) / l

    return talbot(transform, 1.0)


print("drift,fall,passing")
for drift in (-2.0, -1.0, -0.3, 0.0, 0.3, 1.0, 2.0, 4.0):
    for fall in (0.3, 0.6, 1.0, 1.7, 2.5, 3.5):
        chance = passing(drift, fall)
        if 1e-6 < chance < 1 - 1e-6:
            print(f"{drift},{fall},{chance:.12f}")
