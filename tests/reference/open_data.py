"""Figures of the open data sets in tests/engine/data/open: returns, volatilities, VaR, correlation, drawdown, backtests and
first-order autoregressions. Needs numpy, scipy, pandas and statsmodels.

    python3 open_data.py            # reads manifest.json, writes reference.json
    python3 open_data.py --check    # computes again and compares with reference.json (relative 1e-9)

CONVENTIONS (P = periods per year, dt = 1/P; all figures in the units of the file)
 r_t      = ln(S_t/S_{t-1})  log return over one row;  R_t = S_t/S_{t-1}-1 simple return
 mean     = sum(r)/n          sd = sqrt(sum((r-mean)^2)/(n-1))  (ddof=1)   sd0: ddof=0
 ann_vol  = sd*sqrt(P)        ann_log_drift = mean*P = ln(S_last/S_first)*P/n
 gbm_mu   = ann_log_drift + ann_vol^2/2      (drift of dS/S)
 se_mean_ann = ann_vol/sqrt(n/P)             se_vol = ann_vol/sqrt(2*(n-1))  (normal theory)
 skew     = m3/m2^1.5, exkurt = m4/m2^2-3    (population moments, ddof=0)
 acf1     = sum((r_t-m)(r_{t-1}-m))/sum((r_t-m)^2)   (full-sample mean, divisor over all n)
 q(p)     = numpy.quantile(r,p,method='linear')  (R type 7);  q_inv = method 'inverted_cdf' (R type 1)
 hist VaR = -q(1-level);  hist ES = -mean(r_t such that r_t <= q(1-level))    (both on log and on simple returns)
 max drawdown = max_t (1 - S_t/max_{s<=t}S_s); peak date = first date at which that running maximum was reached;
            trough = first date at which the maximum drawdown is reached; recovery = first later date with S >= peak value
 OU       : OLS x_{t+1} = a + b x_t + e over the N = n-1 pairs; s2u = SSR/(N-2), s2ml = SSR/N
            kappa = -ln(b)/dt, theta = a/(1-b), sigma = sqrt(s2*2*kappa/(1-b^2)), half life = ln2/kappa (years)
            stat_sd = sigma/sqrt(2 kappa) = sqrt(s2/(1-b^2));  Euler: kappa_e=(1-b)/dt, sigma_e=sqrt(s2/dt)
            se(kappa) = se(b)/(b dt) (delta method);  df_t = (b-1)/se(b) (Dickey-Fuller t, constant, no lags)
            exact ML = stationary Gaussian AR(1), statsmodels ARIMA(1,0,0) trend 'c'
            forecast from last x: theta+(x-theta)e^{-kappa h dt}, sd = sigma sqrt((1-e^{-2 kappa h dt})/(2 kappa))  (unbiased-s2 sigma)
 correlation = Pearson, of log returns (prices) or of the OLS AR(1) residuals (OU), common rows
 backtest : window W=250 rows of log returns before t; VaR_t = -quantile (linear), or -(m - z s) with ddof=1;
            hit if r_t < -VaR_t (strict).  Kupiec LR_pof on all hits; Christoffersen LR_ind on the T-1 transitions;
            LR_cc = LR_pof + LR_ind.  0*ln 0 = 0.
 ewma     : v_1 = r_1^2; v_t = 0.94 v_{t-1} + 0.06 r_t^2; ewma_vol = sqrt(v_n P) (no mean removed)
"""

import json, os, sys, warnings

warnings.filterwarnings("ignore", category=FutureWarning)
import numpy as np, pandas as pd
from scipy import stats
import statsmodels.api as sm
from statsmodels.tsa.arima.model import ARIMA

HERE = os.path.join(os.path.dirname(os.path.abspath(__file__)), "..", "engine", "data", "open")


def maxdd(s):
    v = s.to_numpy(float)
    run = np.maximum.accumulate(v)
    dd = 1 - v / run
    i = int(np.argmax(dd))
    p = int(np.argmax(v[: i + 1])) if i else 0
    rec = np.nonzero(v[i:] >= run[i])[0]
    uw = 0
    cur = 0
    for k in range(len(v)):
        cur = 0 if v[k] >= run[k] else cur + 1
        uw = max(uw, cur)
    return dict(
        max_drawdown=float(dd[i]),
        peak=str(s.index[p]),
        peak_value=float(v[p]),
        trough=str(s.index[i]),
        trough_value=float(v[i]),
        recovery=(str(s.index[i + int(rec[0])]) if len(rec) else None),
        longest_underwater_rows=int(uw),
        mean_drawdown=float(dd.mean()),
    )


def xlogy(a, b):
    return 0.0 if a == 0 else a * np.log(b)


def kupiec(n, x, p):
    ll0 = xlogy(n - x, 1 - p) + xlogy(x, p)
    ph = x / n
    ll1 = xlogy(n - x, 1 - ph) + xlogy(x, ph)
    lr = max(0.0, -2 * (ll0 - ll1))
    return lr, float(stats.chi2.sf(lr, 1))


def christoffersen(h):
    h = np.asarray(h, int)
    a, b = h[:-1], h[1:]
    n00 = int(((a == 0) & (b == 0)).sum())
    n01 = int(((a == 0) & (b == 1)).sum())
    n10 = int(((a == 1) & (b == 0)).sum())
    n11 = int(((a == 1) & (b == 1)).sum())
    p01 = n01 / (n00 + n01) if n00 + n01 else 0.0
    p11 = n11 / (n10 + n11) if n10 + n11 else 0.0
    p2 = (n01 + n11) / (n00 + n01 + n10 + n11)
    l0 = xlogy(n00 + n10, 1 - p2) + xlogy(n01 + n11, p2)
    l1 = xlogy(n00, 1 - p01) + xlogy(n01, p01) + xlogy(n10, 1 - p11) + xlogy(n11, p11)
    lr = max(0.0, -2 * (l0 - l1))
    return lr, float(stats.chi2.sf(lr, 1)), [n00, n01, n10, n11]


def backtest(r, W, level, kind):
    r = np.asarray(r, float)
    n = len(r)
    hits = []
    for t in range(W, n):
        w = r[t - W : t]
        v = -np.quantile(w, 1 - level) if kind == "hist" else -(w.mean() - stats.norm.ppf(level) * w.std(ddof=1))
        hits.append(int(r[t] < -v))
    T, x = len(hits), int(sum(hits))
    p = 1 - level
    lr, pv = kupiec(T, x, p)
    li, pi, tr = christoffersen(hits)
    return dict(
        window=W,
        level=level,
        method=kind,
        T=T,
        hits=x,
        expected=T * p,
        LR_pof=lr,
        p_pof=pv,
        transitions_n00_n01_n10_n11=tr,
        LR_ind=li,
        p_ind=pi,
        LR_cc=lr + li,
        p_cc=float(stats.chi2.sf(lr + li, 2)),
    )


def gbm_stats(s, P, bt):
    s = s.dropna()
    r = np.log(s).diff().dropna()
    R = s.pct_change().dropna()
    n = len(r)
    m, sd = r.mean(), r.std(ddof=1)
    o = dict(
        rows=len(s),
        first=str(s.index[0]),
        last=str(s.index[-1]),
        first_value=float(s.iloc[0]),
        last_value=float(s.iloc[-1]),
        n_returns=n,
        zero_returns=int((r == 0).sum()),
        mean=m,
        sd=sd,
        sd0=r.std(ddof=0),
        ann_log_drift=m * P,
        ann_vol=sd * P**0.5,
        gbm_mu=m * P + sd * sd * P / 2,
        se_mean_ann=sd * P**0.5 / np.sqrt(n / P),
        se_vol=sd * P**0.5 / np.sqrt(2 * (n - 1)),
        skew=float(stats.skew(r)),
        exkurt=float(stats.kurtosis(r)),
        acf1=float(((r - m).values[1:] * (r - m).values[:-1]).sum() / ((r - m) ** 2).sum()),
        acf1_squared=float(np.corrcoef(r.values[1:] ** 2, r.values[:-1] ** 2)[0, 1]),
        min=float(r.min()),
        min_date=str(r.idxmin()),
        max=float(r.max()),
        max_date=str(r.idxmax()),
        simple_mean=float(R.mean()),
        simple_sd=float(R.std(ddof=1)),
    )
    for lev in (0.95, 0.975, 0.99):
        k = str(lev)
        for nm, x in (("log", r), ("simple", R)):
            q = np.quantile(x, 1 - lev)
            o[f"hist_VaR_{k}_{nm}"] = -q
            o[f"hist_VaR_invcdf_{k}_{nm}"] = -np.quantile(x, 1 - lev, method="inverted_cdf")
            o[f"hist_ES_{k}_{nm}"] = -float(x[x <= q].mean())
        o[f"normal_VaR_{k}_log"] = stats.norm.ppf(lev) * sd - m
    v = r.values[0] ** 2
    for x in r.values[1:]:
        v = 0.94 * v + 0.06 * x * x
    o["ewma_vol"] = np.sqrt(v * P)
    for h in (1, 10, 21, 63, 252):
        t = h / P
        for lev in (0.95, 0.99):
            z = stats.norm.ppf(lev)
            o[f"gbm_VaR_{lev}_{h}rows_per_unit"] = 1 - np.exp(
                (o["gbm_mu"] - o["ann_vol"] ** 2 / 2) * t - z * o["ann_vol"] * np.sqrt(t)
            )
    k = n // 10
    s10 = r.values[: k * 10].reshape(k, 10).sum(1)
    o["sd_10row_nonoverlap"] = float(s10.std(ddof=1))
    o["vr10_nonoverlap"] = float(s10.var(ddof=1) / (10 * sd * sd))
    o.update(maxdd(s))
    if bt:
        o["backtests"] = [backtest(r, 250, lv, kd) for kd in ("hist", "normal") for lv in (0.95, 0.99)]
    return o


def ou_stats(s, P):
    s = s.dropna()
    x = s.to_numpy(float)
    dt = 1 / P
    f = sm.OLS(x[1:], sm.add_constant(x[:-1])).fit()
    a, b = f.params
    N = len(x) - 1
    ssr = f.ssr
    o = dict(
        rows=len(x),
        pairs=N,
        first=str(s.index[0]),
        last=str(s.index[-1]),
        level_mean=x.mean(),
        level_sd=x.std(ddof=1),
        level_min=x.min(),
        level_max=x.max(),
        x_last=x[-1],
        a=a,
        b=b,
        se_a=f.bse[0],
        se_b=f.bse[1],
        r2=f.rsquared,
        resid_sd_unbiased=np.sqrt(ssr / (N - 2)),
        resid_sd_ml=np.sqrt(ssr / N),
        resid_acf1=float(np.sum(f.resid[1:] * f.resid[:-1]) / np.sum(f.resid**2)),
        df_t=(b - 1) / f.bse[1],
        diff_sd=float(np.diff(x).std(ddof=1)),
        diff_mean=float(np.diff(x).mean()),
    )
    from statsmodels.tsa.stattools import adfuller

    af = adfuller(x, maxlag=0, autolag=None, regression="c")
    o["df_p_mackinnon"] = float(af[1])
    assert abs(af[0] - o["df_t"]) < 1e-6 * abs(af[0]) + 1e-9
    if 0 < b < 1:
        kp = -np.log(b) / dt
        o.update(
            kappa=kp,
            theta=a / (1 - b),
            half_life_years=np.log(2) / kp,
            se_kappa=f.bse[1] / (b * dt),
            kappa_euler=(1 - b) / dt,
        )
        for nm, s2 in (("unbiased", ssr / (N - 2)), ("ml", ssr / N)):
            o[f"sigma_{nm}"] = np.sqrt(s2 * 2 * kp / (1 - b * b))
            o[f"stat_sd_{nm}"] = np.sqrt(s2 / (1 - b * b))
            o[f"sigma_euler_{nm}"] = np.sqrt(s2 / dt)
        for h in (1, 10, 21, 63, 252):
            e = np.exp(-kp * h * dt)
            o[f"forecast_{h}rows"] = [
                o["theta"] + (x[-1] - o["theta"]) * e,
                o["sigma_unbiased"] * np.sqrt((1 - e * e) / (2 * kp)),
            ]
    m = ARIMA(x, order=(1, 0, 0), trend="c").fit()
    o["exact_ml"] = dict(
        mean=float(m.params[0]), phi=float(m.params[1]), sigma2=float(m.params[2]), loglik=float(m.llf)
    )
    return o, pd.Series(f.resid, index=s.index[1:])


def one(cfg):
    df = pd.read_csv(os.path.join(HERE, cfg["file"]), index_col=0)
    P = cfg["periods_per_year"]
    out = dict(file=cfg["file"], rows=len(df), periods_per_year=P, blanks={c: int(df[c].isna().sum()) for c in df})
    g = cfg.get("price_columns", [])
    u = cfg.get("ou_columns", [])
    if g:
        out["gbm"] = {c: gbm_stats(df[c], P, cfg.get("backtest", False)) for c in g}
        lr = np.log(df[g]).diff().dropna(how="any") if cfg.get("common_rows", True) else None
        if len(g) > 1 and lr is not None:
            out["common_returns"] = len(lr)
            out["columns"] = g
            out["log_return_correlation"] = lr.corr().values.tolist()
            out["log_return_cov_ann_ddof1"] = (lr.cov() * P).values.tolist()
            out["correlation_eigenvalues"] = np.linalg.eigvalsh(lr.corr().values).tolist()
            out["spearman"] = lr.corr(method="spearman").values.tolist()
            R = np.expm1(lr)
            p = R.mean(axis=1)  # equal weights, rebalanced every row, simple returns
            w = np.ones(len(g)) / len(g)
            C = R.cov().values
            sdp = np.sqrt(w @ C @ w)
            e = dict(weights=w.tolist(), mean=float(p.mean()), sd_ddof1=float(p.std(ddof=1)), sd_from_cov=float(sdp))
            for lev in (0.95, 0.975, 0.99):
                q = np.quantile(p, 1 - lev)
                e[f"hist_VaR_{lev}"] = -q
                e[f"hist_ES_{lev}"] = -float(p[p <= q].mean())
                z = stats.norm.ppf(lev)
                e[f"normal_VaR_{lev}"] = z * sdp - float(p.mean())
                e[f"normal_VaR_zero_mean_{lev}"] = z * sdp
                e[f"component_VaR_zero_mean_{lev}"] = (z * w * (C @ w) / sdp).tolist()
            wealth = pd.concat(
                [pd.Series([1.0], index=[df.index[0] if len(df) == len(lr) + 1 else "start"]), (1 + p).cumprod()]
            )
            e["wealth_last"] = float(wealth.iloc[-1])
            e.update(maxdd(wealth))
            if cfg.get("backtest"):
                e["backtests_log"] = [
                    backtest(np.log1p(p), 250, lv, kd) for kd in ("hist", "normal") for lv in (0.95, 0.99)
                ]
            out["equal_weight_book"] = e
    if u:
        res = {}
        out["ou"] = {}
        for c in u:
            out["ou"][c], res[c] = ou_stats(df[c], P)
        if len(u) > 1:
            rr = pd.DataFrame(res).dropna()
            out["ou_columns"] = u
            out["ou_residual_correlation"] = rr.corr().values.tolist()
    return out


def clean(x):
    if isinstance(x, dict):
        return {k: clean(v) for k, v in x.items()}
    if isinstance(x, (list, tuple)):
        return [clean(v) for v in x]
    if isinstance(x, (np.integer,)):
        return int(x)
    if isinstance(x, (np.floating,)):
        return float(x)
    return x


def cmp(a, b, path=""):
    bad = []
    if isinstance(a, dict):
        for k in a:
            bad += cmp(a[k], b[k], path + "/" + k)
    elif isinstance(a, list):
        for i, (x, y) in enumerate(zip(a, b)):
            bad += cmp(x, y, f"{path}[{i}]")
    elif isinstance(a, float):
        tol = 1e-4 if "exact_ml" in path else 1e-9
        if not np.isclose(a, b, rtol=tol, atol=1e-12):
            bad.append((path, a, b))
    elif a != b:
        bad.append((path, a, b))
    return bad


if __name__ == "__main__":
    man = json.load(open(os.path.join(HERE, "manifest.json")))
    res = {}
    for cfg in man:
        res[cfg["file"]] = clean(one(cfg))
    p = os.path.join(HERE, "reference.json")
    if "--check" in sys.argv:
        bad = cmp(json.load(open(p)), res)
        print("checked", len(res), "files;", len(bad), "differences")
        [print(*x) for x in bad[:20]]
        sys.exit(bool(bad))
    json.dump(res, open(p, "w"), indent=1)
    print("wrote", p)
