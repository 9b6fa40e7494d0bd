"""Scattering by potentials, dimension 3, l = 0, from the radial equation u'' = (V - p²) u in units 2 mu = 1: thresholds for the first bound
state, scattering lengths, phase shifts, a bound state of two nucleons. SciPy's DOP853 against closed forms where there are any."""
import mpmath as mp
import numpy as np
from scipy.integrate import solve_ivp
from scipy.optimize import brentq

from reference import number, write

mp.mp.dps = 30


def solve(v, p, reach, start=1e-10):
    """(u, u') at `reach` of the solution regular at 0, parted where the potential jumps."""
    u = [start, 1.0]
    points = [start, *[x for x in (1.0,) if x < reach], reach]
    for a, b in zip(points, points[1:]):
        u = solve_ivp(lambda r, y: [y[1], (v(min(max(r, a + 1e-14), b - 1e-14)) - p * p) * y[0]], (a, b), u, method="DOP853", rtol=2e-13, atol=1e-18).y[:, -1]
    return u


def scattering_length(v, reach):
    u, slope = solve(v, 0.0, reach)
    return reach - u / slope


def phase_shift(v, p, reach):
    u, slope = solve(v, p, reach)
    return (np.arctan(p * u / slope) - p * reach + np.pi / 2) % np.pi - np.pi / 2


SHAPES = {
    "square well": (lambda r: -1.0 if r < 1 else 0.0, 1.5, "closed form; textbooks"),
    "exponential": (lambda r: -np.exp(-r), 45.0, "closed form j_{0,1}^2/4; textbooks"),
    "Gaussian": (lambda r: -np.exp(-r * r), 8.0, "integrated here"),
    "Yukawa": (lambda r: -np.exp(-r) / r, 45.0, "Hulthen and Laurikainen, Rev. Mod. Phys. 23 (1951) 1; integrated here"),
}
closed = {"square well": mp.pi**2 / 4, "exponential": mp.besseljzero(0, 1) ** 2 / 4}
thresholds = {}
for name, (v, reach, source) in SHAPES.items():
    depth = brentq(lambda g: solve(lambda r: g * v(r), 0.0, reach)[1], 1.2, 3.2, xtol=1e-12)
    if name in closed:
        assert abs(depth - closed[name]) < 1e-8, (name, depth)
        depth = number(closed[name])
    thresholds[name] = {"depth": depth, "digits": 12 if name in closed else 9, "source": source}


def exponential_length(g):
    z = 2 * mp.sqrt(g)
    return 2 * (mp.log(z / 2) + mp.euler) - mp.pi * mp.bessely(0, z) / mp.besselj(0, z)


def exponential_phase(g, p):
    """S = [J_n(z) (z/2)^-n / Γ(1-n)] / [J_-n(z) (z/2)^n / Γ(1+n)], n = 2ip, z = 2 sqrt(g)."""
    z, n = 2 * mp.sqrt(g), 2j * mp.mpf(p)
    s = mp.besselj(n, z) * (z / 2) ** -n / mp.gamma(1 - n) / (mp.besselj(-n, z) * (z / 2) ** n / mp.gamma(1 + n))
    return mp.arg(s) / 2


def well_phase(g, p):
    inside = mp.sqrt(g + p * p)
    delta = mp.atan(p / inside * mp.tan(inside)) - p
    return delta - mp.pi * mp.nint(delta / mp.pi)


PS = [0.1, 0.5, 1.0, 2.0]
square, exponential = [], []
for g in [0.5, 2.0, 4.0, -1.5]:
    k = mp.sqrt(mp.mpf(g))
    length = mp.re(1 - mp.tan(k) / k)
    assert abs(length - scattering_length(lambda r: g * SHAPES["square well"][0](r), 1.5)) < 1e-8 * abs(length)
    phases = []
    for p in PS:
        delta = mp.re(well_phase(g, mp.mpf(p)))
        assert abs(np.sin(float(delta) - phase_shift(lambda r: g * SHAPES["square well"][0](r), p, 1.5))) < 1e-8
        phases.append([p, number(delta)])
    square.append({"depth": g, "scatteringLength": number(length), "phaseShifts": phases})
for g in [0.5, 1.2, 3.0]:
    length = exponential_length(mp.mpf(g))
    assert abs(length - scattering_length(lambda r: -g * np.exp(-r), 45.0)) < 1e-7 * abs(length)
    phases = []
    for p in PS:
        delta = exponential_phase(mp.mpf(g), p)
        assert abs(np.sin(float(delta) - phase_shift(lambda r: -g * np.exp(-r), p, 45.0))) < 1e-7
        phases.append([p, number(delta)])
    exponential.append({"depth": g, "scatteringLength": number(length), "phaseShifts": phases})


def nucleons():
    """Malfliet and Tjon's potential III, hbar²/M = 41.47 MeV fm²: the bound state by shooting, and once more as a matrix in momentum space."""
    m = 41.47

    def v(r):
        return (1438.720 * np.exp(-3.11 * r) - 626.885 * np.exp(-1.55 * r)) / r / m

    def mismatch(energy):
        kappa = np.sqrt(-energy / m)
        u, slope = solve_ivp(lambda r, y: [y[1], (v(r) + kappa**2) * y[0]], (1e-8, 25.0), [1e-8, 1.0], method="DOP853", rtol=1e-12, atol=1e-20).y[:, -1]
        return (slope + kappa * u) * np.exp(-25 * kappa)

    shooting = brentq(mismatch, -3.0, -1.5, xtol=1e-11)
    x, w = np.polynomial.legendre.leggauss(160)
    u, du = (x + 1) / 2 * np.log(1 + 1e4), w / 2 * np.log(1 + 1e4)
    k, wk = np.expm1(u), du * np.exp(u)
    p, q = k[:, None], k[None, :]
    potential = sum(s * np.pi / (p * q) * np.log1p(4 * p * q / ((p - q) ** 2 + a * a)) for s, a in ((1438.720, 3.11), (-626.885, 1.55)))
    weight = np.sqrt(wk * k * k / (2 * np.pi**2))
    matrix = np.diag(m * k * k) + weight[:, None] * potential * weight[None, :]
    eigenvalue = np.linalg.eigvalsh(matrix)[0]
    assert abs(eigenvalue - shooting) < 1e-6, (eigenvalue, shooting)
    return shooting


write("potentials", "SciPy DOP853 and mpmath closed forms, compared with each other", 8, {
    "units": "2 mu = 1, range 1; depth g of V = -g * shape; phase shifts in radians modulo pi; p cot(delta) = -1/a + r p^2/2",
    "thresholds": thresholds,
    "squareWell": square,
    "exponential": exponential,
    "malflietTjonIII": {"energy": nucleons(), "unit": "MeV", "digits": 7, "source": "Malfliet and Tjon, Nucl. Phys. A 127 (1969) 161"},
})
