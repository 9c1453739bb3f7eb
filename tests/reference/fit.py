"""Fits of the open data sets by other roads than the engine's: the joint log-likelihood of the exact transition, its
derivatives by complex steps, roots by scipy; Dickey-Fuller by statsmodels; Ledoit and Wolf by scikit-learn; and plain numpy
transcriptions of published formulas. Nothing is drawn at random. Needs numpy, scipy, pandas, statsmodels and scikit-learn.

    python3 fit.py > ../engine/data/fit.json
"""

import json
import os
import re
from importlib.metadata import version

import numpy as np
import pandas as pd
from scipy.optimize import brentq
from scipy.stats import chi2
from sklearn.covariance import ledoit_wolf
from statsmodels.tsa.adfvalues import mackinnoncrit
from statsmodels.tsa.stattools import adfuller

OPEN = os.path.join(os.path.dirname(os.path.abspath(__file__)), "..", "engine", "data", "open")
DAILY, QUARTERLY = 1 / 252, 63 / 252
HALF_WIDTH = chi2.ppf(0.95, 1) / 2
TINY = 1e-30
# Rows of the quarterly set that the irregular fits leave out, counted from 0.
LEFT_OUT = [1, 2, 9, 17, 18, 19, 40, 55, 77, 78, 101, 130, 131, 132, 133, 160, 188, 199]


def values(name, column):
    return pd.read_csv(os.path.join(OPEN, name), index_col="date", parse_dates=True)[column].dropna()


def slope(function, at):
    """Derivative by a complex step: no digits are lost."""
    return function(at + 1j * TINY).imag / TINY


def gradient(function, at):
    steps = np.eye(len(at)) * 1j * TINY
    return np.array([function(at + step).imag / TINY for step in steps])


def log_likelihood(parameters, x, dt):
    """Of x[1:] given x[0] under dX = k (theta - X) dt + sigma dW, exact for any dt."""
    k, theta, sigma = parameters
    variance = sigma**2 * -np.expm1(-2 * k * dt) / (2 * k)
    residual = x[1:] - theta + (theta - x[:-1]) * np.exp(-k * dt)
    return -0.5 * np.sum(np.log(2 * np.pi * variance) + residual**2 / variance)


def best_given_speed(k, x, dt):
    """Long run and volatility at which the log-likelihood is greatest for a speed: generalised least squares."""
    decay, pull = np.exp(-k * dt), -np.expm1(-k * dt)
    weight = 2 * k / -np.expm1(-2 * k * dt)
    theta = np.sum(weight * pull * (x[1:] - decay * x[:-1])) / np.sum(weight * pull**2)
    residual = x[1:] - decay * x[:-1] - theta * pull
    return k, theta, np.sqrt(np.mean(weight * residual**2))


def profile(k, x, dt):
    return log_likelihood(best_given_speed(k, x, dt), x, dt)


def standard_errors(parameters, x, dt):
    """From the observed information: central differences of the complex-step gradient."""
    function = lambda at: log_likelihood(at, x, dt)
    columns = []
    for step in np.diag(np.abs(parameters) * 1e-6):
        difference = gradient(function, parameters + step) - gradient(function, parameters - step)
        columns.append(difference / (2 * step.sum()))
    information = -np.array(columns)
    return np.sqrt(np.diag(np.linalg.inv((information + information.T) / 2)))


def reverting(series, dt, take_log=False):
    x = np.log(series.to_numpy()) if take_log else series.to_numpy()
    dt = np.broadcast_to(dt, len(x) - 1)
    span = dt.sum()
    steepness = lambda log_k: slope(lambda k: profile(k, x, dt), np.exp(log_k))
    k = np.exp(brentq(steepness, np.log(0.1 / span), np.log(10 / dt.max()), xtol=1e-15, rtol=1e-14))
    best = np.array(best_given_speed(k, x, dt))
    # The derivative of the joint log-likelihood is nought there in all three directions.
    assert np.all(np.abs(gradient(lambda at: log_likelihood(at, x, dt), best) * best) < 1e-6)
    errors = standard_errors(best, x, dt)
    top = log_likelihood(best, x, dt)
    below = lambda log_k: profile(np.exp(log_k), x, dt) - top + HALF_WIDTH
    end = lambda log_far: np.exp(brentq(below, log_far, np.log(k), xtol=1e-14)) if below(log_far) < 0 else None
    return {
        "returns": len(dt),
        "years": span,
        "speed": {
            "value": k,
            "error": errors[0],
            "low": end(np.log(1e-6 / span)),
            "high": end(np.log(30 / dt.min())),
        },
        "long_run": {"value": best[1], "error": errors[1]},
        "volatility": {"value": best[2], "error": errors[2]},
        "log_likelihood": top,
        "dickey_fuller_t": adfuller(x, maxlag=0, autolag=None, regression="c", result_object=False)[0],
    }


def geometric(series, dt):
    """Of the log: drift dS/S = mu dt, volatility with divisor n - 1, log-likelihood with divisor n."""
    x = np.log(series.to_numpy())
    dt = np.broadcast_to(dt, len(x) - 1)
    n, mean = len(dt), (x[-1] - x[0]) / dt.sum()
    squares = np.sum((np.diff(x) - mean * dt) ** 2 / dt)
    volatility = np.sqrt(squares / (n - 1))
    return {
        "returns": n,
        "drift": {"value": mean + volatility**2 / 2, "error": volatility / np.sqrt(dt.sum())},
        "volatility": {"value": volatility},
        "log_likelihood": -0.5 * np.sum(np.log(2 * np.pi * squares / n * dt)) - n / 2,
    }


def calendar_years(series):
    return np.diff(series.index.to_numpy()) / np.timedelta64(1, "D") / 365.25


def rows_between(series, all_dates):
    return np.diff(all_dates.get_indexer(series.index)) * DAILY


def variance_ratio(y, q):
    """Lo and MacKinlay (1988), overlapping: ratio, z under equal variances, z robust to unequal ones."""
    t = len(y) - 1
    mean = (y[-1] - y[0]) / t
    e = np.diff(y) - mean
    long = y[q:] - y[:-q] - q * mean
    ratio = (long @ long / (q * (t - q + 1) * (1 - q / t))) / (e @ e / (t - 1))
    plain = np.sqrt(t) * (ratio - 1) / np.sqrt(2 * (2 * q - 1) * (q - 1) / (3 * q))
    delta = [t * np.sum(e[j:] ** 2 * e[:-j] ** 2) / (e @ e) ** 2 for j in range(1, q)]
    theta = sum((2 * (q - j) / q) ** 2 * d for j, d in zip(range(1, q), delta))
    return {"span": q, "ratio": ratio, "z": plain, "z_robust": np.sqrt(t) * (ratio - 1) / np.sqrt(theta)}


def correlation_of(covariance):
    sd = np.sqrt(np.diag(covariance))
    return covariance / np.outer(sd, sd)


def shrunk_to_constant_correlation(returns):
    """Ledoit and Wolf (2004), J. Portfolio Management; divisor n."""
    y = returns - returns.mean(axis=0)
    t, d = y.shape
    s = y.T @ y / t
    sd = np.sqrt(np.diag(s))
    mean_correlation = (correlation_of(s).sum() - d) / (d * (d - 1))
    target = mean_correlation * np.outer(sd, sd)
    np.fill_diagonal(target, np.diag(s))
    pi = (y**2).T @ y**2 / t - s**2
    # theta[i, j] = asymptotic covariance of s_ii and s_ij.
    theta = (y**3).T @ y / t - np.diag(s)[:, None] * s
    cross = theta * np.outer(1 / sd, sd)
    rho = np.trace(pi) + mean_correlation * (cross.sum() - np.trace(cross))
    intensity = np.clip((pi.sum() - rho) / np.sum((target - s) ** 2) / t, 0, 1)
    return intensity, intensity * target + (1 - intensity) * s


def shrunk(returns):
    to_identity, intensity = ledoit_wolf(returns - returns.mean(axis=0), assume_centered=True)
    constant_intensity, to_constant = shrunk_to_constant_correlation(returns)
    return {
        "identity": {"intensity": intensity, "correlation": correlation_of(to_identity)},
        "constant": {"intensity": constant_intensity, "correlation": correlation_of(to_constant)},
    }


def weighted(returns, half_life_days):
    """Exponentially weighted, the last return heaviest, no mean removed."""
    weight = 0.5 ** (np.arange(len(returns))[::-1] / half_life_days)
    return correlation_of((returns * weight[:, None]).T @ returns)


def correlations(stocks):
    logs = np.log(stocks.to_numpy())
    returns = np.diff(logs, axis=0)
    standardised = (returns - returns.mean(axis=0)) / returns.std(axis=0)
    return {
        "columns": list(stocks.columns),
        "sample": np.corrcoef(returns.T),
        "weighted, half-life 60 days": weighted(returns, 60),
        "overlapping changes over 5 days": np.corrcoef((logs[5:] - logs[:-5]).T),
        "shrunk": shrunk(returns),
        "shrunk, every return by its standard deviation (divisor n)": shrunk(standardised),
    }


def readable(thing):
    """Twelve digits; arrays as lists."""
    if isinstance(thing, dict):
        return {key: readable(value) for key, value in thing.items()}
    if isinstance(thing, (list, tuple, np.ndarray)):
        return [readable(value) for value in thing]
    return float(f"{thing:.12g}") if isinstance(thing, float) else thing


def main():
    bill = values("macro_quarterly.csv", "TBILL")
    fewer = bill.drop(bill.index[LEFT_OUT])
    rate = values("macro_quarterly.csv", "UNEMP").loc[fewer.index]
    wti = values("wti_daily.csv", "WTI")
    stocks = pd.read_csv(os.path.join(OPEN, "stocks_daily.csv"), index_col="date", parse_dates=True)
    apple = stocks["AAPL"]
    apple_with_gaps = apple[np.arange(len(apple)) % 7 != 3]
    wave = np.arange(65)
    libraries = ["numpy", "scipy", "pandas", "statsmodels", "scikit-learn"]
    figures = {
        "made_by": "tests/reference/fit.py with " + ", ".join(f"{name} {version(name)}" for name in libraries),
        "left_out_rows": LEFT_OUT,
        "reverting": {
            "TBILL, 63 days a row": reverting(bill, QUARTERLY),
            "UNEMP, 63 days a row": reverting(values("macro_quarterly.csv", "UNEMP"), QUARTERLY),
            "INFL, 63 days a row": reverting(values("macro_quarterly.csv", "INFL"), QUARTERLY),
            "TBILL, calendar": reverting(bill, calendar_years(bill)),
            "TBILL with rows left out, calendar": reverting(fewer, calendar_years(fewer)),
            "log of UNEMP with rows left out, calendar": reverting(rate, calendar_years(rate), take_log=True),
            "WTI, daily": reverting(wti, DAILY),
            "log of WTI, daily": reverting(wti, DAILY, take_log=True),
        },
        "geometric": {
            **{f"{name}, daily": geometric(stocks[name], DAILY) for name in stocks},
            "AAPL, every row 3 of 7 blank": geometric(apple_with_gaps, rows_between(apple_with_gaps, apple.index)),
            "WTI, daily": geometric(wti, DAILY),
            "TBILL with rows left out, calendar": geometric(fewer, calendar_years(fewer)),
        },
        "mackinnon": [
            {"returns": n, "critical_1_5_10": mackinnoncrit(N=1, regression="c", nobs=n)}
            for n in (20, 50, 100, 202, 250, 1000, 8320)
        ],
        "variance_ratios": {
            "log of WTI": [variance_ratio(np.log(wti.to_numpy()), q) for q in (2, 5, 10, 21)],
            "sin(0.7 i) + 0.5 cos(1.9 i) + 0.05 i, i from 0 to 64": [
                variance_ratio(np.sin(0.7 * wave) + 0.5 * np.cos(1.9 * wave) + 0.05 * wave, q) for q in (2, 8)
            ],
        },
        "correlation_of_stocks": correlations(stocks),
    }
    # What holds nothing but plain entries stands on one line.
    text = json.dumps(readable(figures), indent=1)
    print(re.sub(r"[\[{]\s[^\[\]{}]*[\]}]", lambda found: re.sub(r"\s*\n\s*", " ", found[0]), text))


main()
