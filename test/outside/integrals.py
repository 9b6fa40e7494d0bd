"""Quadrature: rules from SciPy and mpmath, integrals from mpmath and in closed form."""
import mpmath as mp
import numpy as np
import scipy.special as sp

from reference import number, write

mp.mp.dps = 40


def gauss_legendre(n):
    """Roots of P_n at 40 digits, started at SciPy's."""
    nodes, weights = [], []
    for start, weight in zip(*sp.roots_legendre(n)):
        x = mp.mpf(float(start))
        for _ in range(4):
            p, before = mp.legendre(n, x), mp.legendre(n - 1, x)
            slope = n * (before - x * p) / (1 - x * x)
            x -= p / slope
        w = 2 / ((1 - x * x) * (n * mp.legendre(n - 1, x) / (1 - x * x)) ** 2)
        assert abs(w - weight) < 1e-12
        nodes.append(number(x))
        weights.append(number(w))
    return {"nodes": nodes, "weights": weights}


rules = {str(n): gauss_legendre(n) for n in [1, 2, 5, 16, 41]}
finite = {
    "exp(x) on [0, 1]": number(mp.e - 1),
    "cos(50 x) / (1 + x^2) on [0, 3]": number(mp.quad(lambda x: mp.cos(50 * x) / (1 + x * x), mp.linspace(0, 3, 31))),
    "sqrt(x) on [0, 1]": number(mp.mpf(2) / 3),
    "ln(x) on [0, 1]": -1.0,
    "1 / ((x - 0.3)^2 + 1e-6) on [0, 1]": number((mp.atan(mp.mpf(700)) + mp.atan(mp.mpf(300))) * 1000),
}
half_line = {
    "exp(-x) / sqrt(x) from 0": number(mp.sqrt(mp.pi)),
    "1 / (1 + x^2) from 0": number(mp.pi / 2),
    "x^2 exp(-x^2) from 0": number(mp.sqrt(mp.pi) / 4),
    "exp(-x) / (1 + x) from 1": number(mp.quad(lambda x: mp.exp(-x) / (1 + x), [1, 5, 20, mp.inf])),
}
write("quadrature", "mpmath at 40 digits; Gauss-Legendre roots started from SciPy's", 16, {"rules": rules, "finite": finite, "halfLine": half_line})
