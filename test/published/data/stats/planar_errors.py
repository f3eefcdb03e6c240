# Radii of plane Gaussian errors. Run: /usr/bin/python3 planar_errors.py > planar_errors.json
# (Python 3.11, scipy 1.10.1). Biased circular errors: noncentral chi-square. Unequal axes: the density
# integrated in polar coordinates, the radius by bisection to 1e-12.
import json
import numpy as np
from scipy import integrate, optimize, stats

P = (0.1, 0.5, 0.9, 0.95, 0.99)


def inside(r, s):
    f = lambda a: (lambda k: (1 - np.exp(-k * r * r / 2)) / (k * 2 * np.pi * s))(np.cos(a) ** 2 + (np.sin(a) / s) ** 2)
    return 4 * integrate.quad(f, 0, np.pi / 2, epsabs=1e-13, epsrel=1e-13, limit=400)[0]


out = {
    "biased": [[p, b, float(np.sqrt(stats.ncx2.ppf(p, 2, b * b)))] for b in (0.5, 1, 2, 3, 10) for p in P],
    "unequal": [[p, s, optimize.brentq(lambda r: inside(r, s) - p, 1e-6, 10, xtol=1e-13)] for s in (1, 0.8, 0.5, 0.2, 0.02) for p in P],
}
print(json.dumps(out))
