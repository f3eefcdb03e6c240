# Reference values of distributions. Run: /usr/bin/python3 distributions.py > distributions.json
# (Python 3.11, mpmath 1.2.1 in 40 digits; scipy 1.10.1 for the normal and chi-square quantiles;
# its t quantile of 1e-8 with 0.7 degrees of freedom is off by 2e-9, so those are roots found in 40 digits)
import json
from mpmath import mp, mpf, gammainc, betainc, ncdf, findroot
from scipy import stats

mp.dps = 40
f = float
chi2 = lambda x, k: gammainc(mpf(k) / 2, 0, mpf(x) / 2, regularized=True)
t_cdf = lambda t, k: (lambda tail: tail if t < 0 else 1 - tail)(
    betainc(mpf(k) / 2, mpf(1) / 2, 0, mpf(k) / (k + mpf(t) ** 2), regularized=True) / 2
)
t_root = lambda p, k: f(findroot(lambda t: t_cdf(t, k) / mpf(p) - 1, mpf(stats.t.ppf(p, k))))
out = {
    "normalCdf": [[x, f(ncdf(x))] for x in (-37, -20, -8, -5, -3, -1.5, -0.1, 0, 0.3, 1, 1.96, 4, 7)],
    "normalQuantile": [[p, stats.norm.ppf(p)] for p in (1e-300, 1e-20, 1e-9, 1e-4, 0.025, 0.07, 0.1, 0.4, 0.5, 0.8, 0.95, 0.975, 0.9999)],
    "chiSquareCdf": [[x, k, f(chi2(x, k))] for x, k in ((1e-3, 0.5), (0.5, 1), (3.84, 1), (5.99, 2), (2, 7.3), (9.5, 10), (120, 100), (60, 100), (1100, 1000), (10300, 10000))],
    "chiSquareQuantile": [[p, k, stats.chi2.ppf(p, k)] for p in (1e-6, 0.025, 0.16, 0.5, 0.84, 0.975, 0.999999) for k in (0.3, 1, 2, 4.7, 30, 500, 20000)],
    "studentTCdf": [[t, k, f(t_cdf(t, k))] for t, k in ((-12.7, 1), (-3, 2.5), (-0.01, 3), (0.5, 5), (2.2, 11), (1.96, 1000), (-6, 30), (1e-5, 4))],
    "studentTQuantile": [[p, k, t_root(p, k)] for p in (1e-8, 0.005, 0.2, 0.4999, 0.6, 0.975, 0.9995) for k in (0.7, 1, 2, 3.5, 11, 60, 4000)],
}
print(json.dumps(out, indent=1))
