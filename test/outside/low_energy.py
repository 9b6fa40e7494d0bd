"""Scattering lengths, effective ranges, binding energies and transmission in closed form, each held against SciPy's DOP853. hbar = 1, 2 mu = 1.
Wells are -depth inside 1, exp(-r) and sech^2 have range 1; definitions of the low-energy constants as in docs/numbers.md."""
import mpmath as mp
import numpy as np
from scipy.integrate import solve_ivp
from scipy.optimize import brentq

from reference import number, write

mp.mp.dps = 30
i = mp.mpc(0, 1)


def integrate(v, energy, start, reach, dimension=1, parts=()):
    """(psi, psi') at `reach` of psi'' + (D - 1)/r psi' = (V - E) psi."""
    at, points = list(start[1]), [start[0], *[x for x in parts if x < reach], reach]
    for a, b in zip(points, points[1:]):
        inside = lambda r: v(min(max(r, a + 1e-13), b - 1e-13))
        step = lambda r, y: [y[1], (inside(r) - energy) * y[0] - (dimension - 1) / r * y[1]] if dimension > 1 else [y[1], (inside(r) - energy) * y[0]]
        at = solve_ivp(step, (a, b), at, method="DOP853", rtol=1e-12, atol=1e-20).y[:, -1]
    return at


def sech(strength):
    return lambda x: -strength / np.cosh(x) ** 2


def well(depth):
    return lambda x: -depth if abs(x) < 1 else 0.0


# -n(n+1) sech² with n not whole. u odd: y (1-y²)^(-ip/2) F((1-n-ip)/2, (n+2-ip)/2; 3/2; y²), y = tanh; Landau, Lifshitz, Quantum Mechanics, §25.
def sech_length(n):
    return mp.log(2) + mp.euler + (mp.digamma((1 - n) / 2) + mp.digamma((n + 2) / 2)) / 2


def sech_phase(n, p):
    a, b = (1 - n - i * p) / 2, (n + 2 - i * p) / 2
    ratio = 4 ** (-i * p) * mp.gamma(i * p) * mp.gamma(a) * mp.gamma(b) / (mp.gamma(-i * p) * mp.gamma(mp.mpf(3) / 2 - a) * mp.gamma(mp.mpf(3) / 2 - b))
    return mp.arg(-ratio) / 2


def range_of(phase, length):
    """2 d(p cot δ)/d(p²) at 0, by Richardson's extrapolation."""
    step = lambda p: 2 * (p * mp.cot(phase(p)) + 1 / length) / p**2
    rows = [step(mp.mpf("0.02") / 2**j) for j in range(7)]
    for level in range(1, 7):
        rows = [(4**level * rows[j + 1] - rows[j]) / (4**level - 1) for j in range(len(rows) - 1)]
    return mp.re(rows[0])


sech_rows = []
for n in [mp.mpf("0.3"), mp.mpf("0.8"), mp.mpf("1.4"), mp.mpf("2.6")]:
    length = sech_length(n)
    psi, slope = integrate(sech(float(n * (n + 1))), 0.0, (1e-12, [1e-12, 1.0]), 22.0)
    assert abs(length - (22 - psi / slope)) < 1e-8 * max(1, abs(length)), (n, length)
    p = 0.7
    psi, slope = integrate(sech(float(n * (n + 1))), p * p, (1e-12, [1e-12, 1.0]), 22.0)
    assert abs(np.sin(np.arctan(p * psi / slope) - p * 22 - float(sech_phase(n, mp.mpf(p))))) < 1e-8
    sech_rows.append({"strength": number(n * (n + 1)), "scatteringLength": number(length), "effectiveRange": number(range_of(lambda p: sech_phase(n, p), length))})


def exponential_length(g):
    z = 2 * mp.sqrt(g)
    return 2 * (mp.log(z / 2) + mp.euler) - mp.pi * mp.bessely(0, z) / mp.besselj(0, z)


def exponential_phase(g, p):
    z, n = 2 * mp.sqrt(g), 2 * i * p
    s = mp.besselj(n, z) * (z / 2) ** -n / mp.gamma(1 - n) / (mp.besselj(-n, z) * (z / 2) ** n / mp.gamma(1 + n))
    return mp.arg(s) / 2


exponential_rows = []
for g in [mp.mpf("0.5"), mp.mpf("1.2"), mp.mpf(3)]:
    length = exponential_length(g)
    exponential_rows.append({"depth": number(g), "scatteringLength": number(length), "effectiveRange": number(range_of(lambda p: exponential_phase(g, p), length))})

# Square well: r = 1 - 1/(3a²) - 1/(depth a), by expanding tan(K)/K.
well_rows = []
for depth in [mp.mpf("0.5"), mp.mpf(2), mp.mpf(4)]:
    k = mp.sqrt(depth)
    length = 1 - mp.tan(k) / k
    effective = 1 - 1 / (3 * length**2) - 1 / (depth * length)
    phase = lambda p: mp.atan(p / mp.sqrt(depth + p * p) * mp.tan(mp.sqrt(depth + p * p))) - p
    assert abs(effective - range_of(phase, length)) < 1e-12, depth
    well_rows.append({"depth": number(depth), "scatteringLength": number(length), "effectiveRange": number(effective)})

# On a line: even 1 - x/a and odd x - a outside; in the plane ln(r/a).
line_rows, plane_rows = [], []
for depth in [mp.mpf("0.5"), mp.mpf(2), mp.mpf(4)]:
    k = mp.sqrt(depth)
    even, odd = 1 + 1 / (k * mp.tan(k)), 1 - mp.tan(k) / k
    for start, wanted in (([1.0, 0.0], even), ([0.0, 1.0], odd)):
        psi, slope = integrate(well(float(depth)), 0.0, (0.0, start), 1.5, parts=(1.0,))
        assert abs(1.5 - psi / slope - wanted) < 1e-9 * max(1, abs(wanted))
    line_rows.append({"depth": number(depth), "even": number(even), "odd": number(odd)})
    plane = mp.exp(mp.besselj(0, k) / (k * mp.besselj(1, k)))
    psi, slope = integrate(well(float(depth)), 0.0, (1e-9, [1.0, -float(depth) * 1e-9 / 2]), 1.5, dimension=2, parts=(1.0,))
    assert abs(1.5 * np.exp(-psi / (1.5 * slope)) / plane - 1) < 1e-7
    plane_rows.append({"depth": number(depth), "scatteringLength": number(plane)})

# Binding energies κ². sech²: (n - j)² (Landau, Lifshitz, Quantum Mechanics, §23), odd j in space; exponential: J_2κ(2 sqrt g) = 0.
def roots(f, low, high, count=400):
    xs = [mp.mpf(low) + (mp.mpf(high) - mp.mpf(low)) * j / count for j in range(count + 1)]
    return [mp.findroot(f, (a, b), solver="anderson") for a, b in zip(xs, xs[1:]) if mp.sign(f(a)) != mp.sign(f(b))]


def shooting(v, kappa, start, reach):
    psi, slope = integrate(v, -kappa * kappa, start, reach)
    return slope + kappa * psi


def confirmed(v, kappas, start, reach):
    for kappa in map(float, kappas):
        found = brentq(lambda x: shooting(v, x, start, reach), kappa - 1e-3, kappa + 1e-3, xtol=1e-13)
        assert abs(found - kappa) < 1e-8, (kappa, found)
    return sorted((number(kappa**2) for kappa in kappas), reverse=True)


n = mp.mpf("3.4")
strength = number(n * (n + 1))
binding = {
    "exponential": {"depth": 20, "energies": confirmed(lambda r: -20 * np.exp(-r), roots(lambda x: mp.besselj(2 * x, 2 * mp.sqrt(20)), "0.05", 4.4), (0.0, [0.0, 1.0]), 30.0)},
    "sech^2 in space": {"strength": strength, "energies": confirmed(sech(strength), [n - 1, n - 3], (0.0, [0.0, 1.0]), 12.0)},
    "sech^2, even": {"strength": strength, "energies": confirmed(sech(strength), [n, n - 2], (0.0, [1.0, 0.0]), 9.0)},
    "sech^2, odd": {"strength": strength, "energies": confirmed(sech(strength), [n - 1, n - 3], (0.0, [0.0, 1.0]), 12.0)},
}

# Landau, Lifshitz, Quantum Mechanics, §25: 1/(1 + cos²(π sqrt(1 + 4 strength)/2)/sinh²(πp)); none comes back where that root is odd and whole.
transmission = []
for strength in [mp.mpf("0.7"), mp.mpf(2), mp.mpf("-1.3"), mp.mpf(6)]:
    for p in [mp.mpf("0.2"), mp.mpf("0.9")]:
        root = mp.sqrt(1 + 4 * strength) if strength > -0.25 else i * mp.sqrt(-1 - 4 * strength)
        closed = 1 / (1 + mp.re(mp.cos(mp.pi / 2 * root) ** 2) / mp.sinh(mp.pi * p) ** 2)
        phases = []
        for start in ([1.0, 0.0], [0.0, 1.0]):
            psi, slope = integrate(sech(float(strength)), float(p * p), (0.0, start), 20.0)
            phases.append(np.arctan(-slope / (psi * float(p))) if start[0] else np.arctan(psi * float(p) / slope))
        # |t|² = cos²(δ₊ - δ₋).
        assert abs(np.cos(phases[0] - phases[1]) ** 2 - closed) < 1e-8, (strength, p)
        transmission.append({"strength": number(strength), "p": number(p), "transmission": number(closed)})

write("low-energy", "closed forms with mpmath, each compared with SciPy's DOP853", 12, {
    "units": "2 mu = 1; wells are -depth inside 1; sech^2 stands for -strength/cosh(x)^2",
    "sech2": sech_rows,
    "exponential": exponential_rows,
    "squareWell": well_rows,
    "lineWell": line_rows,
    "planeWell": plane_rows,
    "binding": binding,
    "transmission": {"source": "Landau, Lifshitz, Quantum Mechanics, §25", "values": transmission},
})
