# Normal gravity above the WGS84 ellipsoid: the gradient of the normal potential in ellipsoidal coordinates,
# not the series in height. Run: /usr/bin/python3 normal_gravity.py (Python 3.11, mpmath 1.2.1)
from mpmath import mp, mpf, sqrt, atan, sin, cos, pi, diff, nstr

mp.dps = 40
a, f, GM, w = mpf(6378137), 1 / mpf("298.257223563"), mpf("3986004.418e8"), mpf("7292115e-11")
b = a * (1 - f)
E = sqrt(a * a - b * b)
q = lambda u: ((1 + 3 * u * u / E**2) * atan(E / u) - 3 * u / E) / 2


def potential(p, z):  # distance from the axis and above the equator
    r2 = p * p + z * z - E * E
    u2 = (r2 + sqrt(r2 * r2 + 4 * E * E * z * z)) / 2
    u, sin2 = sqrt(u2), z * z / u2
    return GM / E * atan(E / u) + w**2 / 2 * a * a * q(u) / q(b) * (sin2 - mpf(1) / 3) + w**2 / 2 * p * p


for lat, h in ((0, 0), (45, 0), (90, 0), (0, 2000), (45, 2000), (45, 10000), (80, 10000)):
    phi, e2 = lat * pi / 180, f * (2 - f)
    N = a / sqrt(1 - e2 * sin(phi) ** 2)
    p, z = (N + h) * cos(phi) + mpf("1e-25"), (N * (1 - e2) + h) * sin(phi) + mpf("1e-25")
    gp, gz = diff(lambda t: potential(t, z), p), diff(lambda t: potential(p, t), z)
    print(lat, h, nstr(sqrt(gp * gp + gz * gz), 12))
