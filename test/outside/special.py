"""Special functions: mpmath at 40 digits, each compared here with SciPy and, where it has them, with GSL."""
import ctypes
import ctypes.util

import mpmath as mp
import scipy.special as sp

from reference import number, write

mp.mp.dps = 40
gsl = ctypes.CDLL(ctypes.util.find_library("gsl"))


def gsl_function(name, *arguments):
    function = getattr(gsl, "gsl_sf_" + name)
    function.restype = ctypes.c_double
    function.argtypes = [ctypes.c_int if isinstance(a, int) else ctypes.c_double for a in arguments]
    return function(*arguments)


def agree(value, other, tolerance=1e-11):
    assert abs(float(value) - other) <= tolerance * max(abs(float(value)), 1e-12), (float(value), other)
    return number(value)


def sphericalj(l, x):
    x = mp.mpf(x)
    return mp.sqrt(mp.pi / (2 * x)) * mp.besselj(l + mp.mpf(1) / 2, x) if x else mp.mpf(l == 0)


def legendre_q(l, x):
    """Neumann's integral for x > 1, the closed form with the principal value inside (-1, 1)."""
    x = mp.mpf(x)
    if abs(x) > 1:
        return (-1) ** (l + 1) * legendre_q(l, -x) if x < 0 else mp.quad(lambda t: mp.legendre(l, t) / (x - t), [-1, 0, 1 - (x - 1 if x < 1.5 else 0.5), 1]) / 2
    q = [mp.atanh(x), x * mp.atanh(x) - 1]
    for n in range(1, l):
        q.append(((2 * n + 1) * x * q[n] - n * q[n - 1]) / (n + 1))
    return q[l]


def scaled_i(l, z):
    z = mp.mpf(z)
    return mp.sqrt(mp.pi / (2 * z)) * mp.besseli(l + mp.mpf(1) / 2, z) * mp.exp(-z)


ENDS = [(1, 1), (1, 0.999), (2, 1.3), (3, 0.2), (50, 1e-3), (1, 1e-9)]

values = {
    "erf": [[x, agree(mp.erf(x), sp.erf(x))] for x in [-5.5, -1, 1e-9, 0.1, 0.5, 1.5, 2.9, 3.1, 4.5, 7]],
    "gamma": [[x, agree(mp.gamma(x), sp.gamma(x))] for x in [-3.7, -0.5, 1e-5, 0.3, 0.5, 1.5, 2.2, 5, 17.5, 30, 100.25, 170.2]],
    "digamma": [[x, agree(mp.digamma(x), sp.digamma(x))] for x in [-2.5, -0.3, 1e-3, 0.5, 1, 1.4, 3, 9.9, 25, 1e4]],
    "besselj": [
        [n, x, agree(mp.besselj(n, x), gsl_function("bessel_Jn", n, float(x)), 1e-9)]
        for n in [0, 1, 2, 5, 20]
        for x in [1e-3, 0.5, 2, 7.3, 19, 24.9, 25.1, 60, 213.7, 1000.5]
    ],
    "sphericalj": [
        [l, x, agree(sphericalj(l, x), gsl_function("bessel_jl", l, float(x)), 1e-9)]
        for l in [0, 1, 2, 3, 6, 15]
        for x in [1e-3, 0.1, 0.9, 2, 5.5, 14, 16, 40, 123.4, 1000.5]
    ],
    "legendrep": [[l, x, agree(mp.legendre(l, x), sp.eval_legendre(l, x))] for l in [0, 1, 2, 5, 12] for x in [-0.9, -0.2, 0.3, 0.77, 1, 1.5, 4]],
    "legendreq": [
        [l, x, agree(legendre_q(l, x), gsl_function("legendre_Ql", l, float(x)), 1e-9)]
        for l in [0, 1, 2, 4, 7]
        for x in [-0.6, 0.1, 0.95, 1.00001, 1.01, 1.2, 2, 10, 1000]
    ],
    "scaledModifiedSphericalBessel": [
        [l, z, agree(scaled_i(l, z), gsl_function("bessel_il_scaled", l, float(z)), 1e-9)] for l in [0, 1, 2, 4, 8] for z in [1e-3, 0.4, 3, 20, 29, 31, 200, 5000]
    ],
    "scaledModifiedBessel": [
        [n, z, agree(mp.besseli(n, z) * mp.exp(-z), gsl_function("bessel_In_scaled", n, float(z)), 1e-9)]
        for n in [0, 1, 2, 5]
        for z in [1e-3, 0.4, 3, 20, 29.9, 30.1, 56, 200, 5000]
    ],
    # K(k)/a and a E(k), k² = 1 - b²/a².
    "ellipticFirst": [[a, b, agree(mp.ellipk(1 - mp.mpf(b) ** 2 / mp.mpf(a) ** 2) / a, sp.ellipkm1(b * b / a / a) / a)] for a, b in ENDS],
    "ellipticSecond": [[a, b, agree(a * mp.ellipe(1 - mp.mpf(b) ** 2 / mp.mpf(a) ** 2), a * sp.ellipe(1 - b * b / a / a))] for a, b in ENDS],
}
gsl_version = ctypes.c_char_p.in_dll(gsl, "gsl_version").value.decode()
write("special", "mpmath at 40 digits; compared with SciPy and GSL to 1e-9 or better", 16, {"values": values}, gsl=gsl_version)
