"""Potentials in momentum space, found in position space, so by another road than the project's (which projects V(q)):
dimension 3  V_l(p,k) = 4π∫r² j_l(pr) V(r) j_l(kr) dr,  dimension 2  V_m = 2π∫r J_m(pr) V(r) J_m(kr) dr,
dimension 1  V_+ = 2∫cos(px) V(x) cos(kx) dx, V_- with sines (x > 0), full ∫V(x) exp(-i(p-k)x) dx.
Bessel functions from SciPy; a 40-point rule on pieces of length 1/4, dyadic ones towards r = 0 and parted at edges; one value of
each potential is compared with mpmath at 25 digits."""
import math

import mpmath as mp
import numpy as np
import scipy.special as sp

from reference import number, write

mp.mp.dps = 25
X, W = np.polynomial.legendre.leggauss(40)


def pieces(reach, edges):
    small = [0.0, *[0.25 * 2.0**-n for n in range(80, 0, -1)]]
    return sorted({*small, *[n / 4 for n in range(1, 4 * reach + 1)], *edges})


def half_line(f, reach, edges):
    total = []
    points = pieces(reach, edges)
    for a, b in zip(points, points[1:]):
        r = (a + b) / 2 + (b - a) / 2 * X
        total.extend((b - a) / 2 * W * f(r))
    return math.fsum(total)


def step(x):
    return np.heaviside(x, 0.5)


# Names are expressions as the tests read them; V is below 1e-17 of itself beyond `reach`.
RADIAL = {
    "exp(-r)/r": (lambda r: np.exp(-r) / r, 45, ()),
    "exp(-r)": (lambda r: np.exp(-r), 45, ()),
    "r*exp(-r)": (lambda r: r * np.exp(-r), 50, ()),
    "r^2*exp(-2*r)": (lambda r: r**2 * np.exp(-2 * r), 28, ()),
    "exp(-r^2)": (lambda r: np.exp(-r * r), 7, ()),
    "r^2*exp(-r^2/2)": (lambda r: r * r * np.exp(-r * r / 2), 10, ()),
    "step(1.5 - r)": (lambda r: step(1.5 - r), 2, (1.5,)),
    "r*exp(-r^2)": (lambda r: r * np.exp(-r * r), 7, ()),
    "1/(1 + exp((r - 2)/0.3))": (lambda r: 1 / (1 + np.exp((r - 2) / 0.3)), 16, ()),
    "1/cosh(r)^2": (lambda r: 1 / np.cosh(r) ** 2, 24, ()),
    "exp(-r)/sqrt(r)": (lambda r: np.exp(-r) / np.sqrt(r), 45, ()),
    "step(1.5 - r)*r*exp(-r)": (lambda r: step(1.5 - r) * r * np.exp(-r), 2, (1.5,)),
    "exp(-r)*erf(r)/r": (lambda r: np.exp(-r) * sp.erf(r) / r, 45, ()),
    "exp(-2*r)*besselj(1, r)": (lambda r: np.exp(-2 * r) * sp.jv(1, r), 26, ()),
    "atan(r)*exp(-r)/r": (lambda r: np.arctan(r) * np.exp(-r) / r, 45, ()),
    "step(1.5 - r)*exp(-r^2)": (lambda r: step(1.5 - r) * np.exp(-r * r), 2, (1.5,)),
    "step(r - 0.5)*exp(-2*r)/r": (lambda r: step(r - 0.5) * np.exp(-2 * r) / r, 24, (0.5,)),
    "exp(-r)*log(r)": (lambda r: np.exp(-r) * np.log(r), 45, ()),
}
MOMENTA = [(0.01, 0.02), (0.3, 0.7), (1.0, 1.0), (2.0, 0.001), (3.0, 3.1), (6.0, 1.5), (20.0, 21.0)]


def on_wave(v, reach, edges, dimension, l, p, k):
    if dimension == 3:
        return 4 * np.pi * half_line(lambda r: r * r * sp.spherical_jn(l, p * r) * v(r) * sp.spherical_jn(l, k * r), reach, edges)
    return 2 * np.pi * half_line(lambda r: r * sp.jv(l, p * r) * v(r) * sp.jv(l, k * r), reach, edges)


radial = {
    name: {f"{dimension} {l}": [[p, k, on_wave(*potential, dimension, l, p, k)] for p, k in MOMENTA] for dimension, waves in ((2, 2), (3, 3)) for l in range(waves)}
    for name, potential in RADIAL.items()
}
exact = 4 * mp.pi * mp.quad(lambda r: mp.sin(0.3 * r) * mp.sin(0.7 * r) / mp.mpf(0.3) / mp.mpf(0.7) * mp.exp(-r) / mp.sqrt(r), [0, 1e-6, 1e-3, 0.1, 1, 3, 6, 10, 20, 60])
assert abs(radial["exp(-r)/sqrt(r)"]["3 0"][1][2] - exact) < 1e-13 * exact

LINE = {
    "exp(-x^2)": (lambda x: np.exp(-x * x), 7, ()),
    "exp(-abs(x))": (lambda x: np.exp(-abs(x)), 45, ()),
    "abs(x)*exp(-2*abs(x))": (lambda x: abs(x) * np.exp(-2 * abs(x)), 26, ()),
    "x^2*exp(-x^2/2)": (lambda x: x * x * np.exp(-x * x / 2), 10, ()),
    "step(1.5 - abs(x))": (lambda x: step(1.5 - abs(x)), 2, (1.5,)),
    "1/cosh(x)^2": (lambda x: 1 / np.cosh(x) ** 2, 24, ()),
    "x*exp(-x^2)": (lambda x: x * np.exp(-x * x), 7, ()),
    "exp(-(x - 0.7)^2)": (lambda x: np.exp(-((x - 0.7) ** 2)), 8, ()),
    "x*exp(-abs(x - 0.5))": (lambda x: x * np.exp(-abs(x - 0.5)), 48, (0.5,)),
    "step(x + 0.5)*step(2 - x)": (lambda x: step(x + 0.5) * step(2 - x), 3, (0.5, 2)),
    "tanh(x)/cosh(x)": (lambda x: np.tanh(x) / np.cosh(x), 45, ()),
    "cos(3*x)*exp(-x^2/4)": (lambda x: np.cos(3 * x) * np.exp(-x * x / 4), 14, ()),
}
EVEN = {"exp(-x^2)", "exp(-abs(x))", "abs(x)*exp(-2*abs(x))", "x^2*exp(-x^2/2)", "step(1.5 - abs(x))", "1/cosh(x)^2", "cos(3*x)*exp(-x^2/4)"}
SIGNED = [(0.01, 0.02), (0.3, -0.7), (1.0, 1.0), (2.0, 0.001), (3.0, 3.1), (-6.0, 1.5), (20.0, -3.0)]
line = {}
for name, (v, reach, edges) in LINE.items():
    rows = []
    for p, k in SIGNED:
        q = p - k
        re = half_line(lambda x: (v(x) + v(-x)) * np.cos(q * x), reach, edges)
        im = half_line(lambda x: (v(-x) - v(x)) * np.sin(q * x), reach, edges)
        rows.append([p, k, re, im])
    line[name] = {"full": rows}
    if name in EVEN:
        for wave, f in (("even", np.cos), ("odd", np.sin)):
            line[name][wave] = [[p, k, 2 * half_line(lambda x: f(p * x) * v(x) * f(k * x), reach, edges)] for p, k in MOMENTA]
assert abs(line["exp(-x^2)"]["full"][1][2] - number(mp.sqrt(mp.pi) * mp.exp(-mp.mpf(1) / 4))) < 1e-15

write("transforms", "position-space integrals with SciPy's Bessel functions, 40-point rules", 13, {"radial": radial, "line": line})
