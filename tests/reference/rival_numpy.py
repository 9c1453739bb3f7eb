"""The bench's job in numpy, vectorised with care, to stand beside the engine's own time in one run.

50 factors (38 geometric, 12 reverting on the log), 21 daily steps, 100,000 paths: exact joint transition, book value,
local variance |C' delta|^2 at every step, highest and lowest value of each step by a Brownian bridge, largest fall,
survival of a loss limit; then VaR, ES, drawdown quantiles and moments on every day. One process a core, one BLAS thread
each; the chunk of paths is the fastest of several sizes. Needs numpy alone.

    python3 rival_numpy.py [processes]
"""

import os

for name in ("OPENBLAS_NUM_THREADS", "OMP_NUM_THREADS", "MKL_NUM_THREADS"):
    os.environ[name] = "1"
for name in ("OPENBLAS_CORETYPE", "OPENBLAS_L2_SIZE"):  # let the library pick its own kernels
    os.environ.pop(name, None)

import multiprocessing
import sys
import time

import numpy as np

FACTORS, REVERTING, DAYS, PATHS = 50, 12, 21, 100_000
WEIGHT, LIMIT = 1e6, 5e6
CHUNKS = (256, 512, 1024, 2048, 4096)


def transition():
    """Decay, shift and Cholesky factor of one day."""
    dt = 1 / 252
    reverting = np.arange(FACTORS) >= FACTORS - REVERTING
    sigma = np.where(reverting, 0.4, 0.2)
    kappa = np.where(reverting, np.log(2) / 40 * 252, 0.0)
    rho = np.full((FACTORS, FACTORS), 0.3) + 0.7 * np.eye(FACTORS)
    total = kappa[:, None] + kappa[None, :]
    phi = np.where(total > 0, -np.expm1(-total * dt) / np.where(total > 0, total, 1), dt)
    lower = np.linalg.cholesky(rho * np.outer(sigma, sigma) * phi)
    gap = np.where(reverting, np.log(1.1), 0.0)
    shift = np.where(reverting, gap * -np.expm1(-kappa * dt), -sigma**2 / 2 * dt)
    return np.exp(-kappa * dt)[:, None], shift[:, None], lower


def work(task):
    """Values, falls and survivals of some paths: days x paths each."""
    seed, paths, chunk = task
    rng = np.random.Generator(np.random.SFC64(seed))
    decay, shift, lower = transition()
    upper = np.ascontiguousarray(lower.T)
    weights = np.full(FACTORS, WEIGHT)
    today = weights.sum()
    values, falls, survivals = (np.empty((DAYS, paths)) for _ in range(3))
    for first in range(0, paths, chunk):
        n = min(chunk, paths - first)
        x = np.zeros((FACTORS, n))
        z, e, delta = np.empty((FACTORS, n)), np.empty((FACTORS, n)), np.empty((FACTORS, n))
        a, peak, fall, alive = np.full(n, today), np.full(n, today), np.zeros(n), np.ones(n)
        v_before = np.full(n, np.square(upper @ weights).sum())
        for day in range(DAYS):
            rng.standard_normal(out=z)
            np.matmul(lower, z, out=e)
            x *= decay
            x += shift
            x += e
            np.exp(x, out=delta)
            delta *= WEIGHT
            b = delta.sum(axis=0)
            np.matmul(upper, delta, out=e)
            v_after = np.einsum("ij,ij->j", e, e)
            v = 0.5 * (v_before + v_after)
            square, middle = np.square(b - a), a + b
            logs = np.log(rng.random((2, n)))
            top = 0.5 * (middle + np.sqrt(square - 2 * v * logs[0]))
            bottom = 0.5 * (middle - np.sqrt(square - 2 * v * logs[1]))
            np.maximum(fall, peak - bottom, out=fall)
            np.maximum(peak, top, out=peak)
            np.maximum(fall, peak - b, out=fall)
            above, below = a - (today - LIMIT), b - (today - LIMIT)
            alive *= np.where((above > 0) & (below > 0), -np.expm1(-2 * above * below / v), 0.0)
            values[day, first : first + n], falls[day, first : first + n] = b, fall
            survivals[day, first : first + n] = alive
            a, v_before = b, v_after
    return values, falls, survivals


def measure(values, falls, survivals):
    """VaR and ES, drawdown quantiles and means beyond, moments, on every day."""
    out = []
    for value, fall, alive in zip(values, falls, survivals):
        n = len(value)
        ranks = [n - 1 - int(np.ceil(0.95 * n) - 1), n - 1 - int(np.ceil(0.99 * n) - 1)]
        loss = -np.partition(value, ranks)
        deep = -np.partition(-fall, ranks)
        tails = [(loss[rank], loss[: rank + 1].mean(), deep[rank], deep[: rank + 1].mean()) for rank in ranks]
        out.append((tails, value.mean(), value.std(), fall.mean(), 1 - alive.mean()))
    return out


def once(pool, processes, chunk):
    """Seconds for the whole job."""
    start = time.perf_counter()
    shares = [(seed, PATHS // processes, chunk) for seed in range(processes)]
    parts = pool.map(work, shares) if pool else [work(shares[0])]
    measure(*(np.concatenate(part, axis=1) for part in zip(*parts)))
    return time.perf_counter() - start


def main():
    processes = int(sys.argv[1]) if len(sys.argv) > 1 else os.cpu_count()
    pool = multiprocessing.Pool(processes) if processes > 1 else None
    times = {chunk: min(once(pool, processes, chunk) for _ in range(3)) for chunk in CHUNKS}
    for chunk, seconds in times.items():
        print(f"chunks of {chunk:5d} paths: {seconds:.3f} s")
    print(f"numpy {np.__version__}, {processes} processes: {min(times.values()):.3f} s")


if __name__ == "__main__":
    main()
