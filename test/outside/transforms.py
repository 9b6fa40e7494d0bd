"""Potentials in momentum space, found in position space, so by another road than the project's (which projects V(q)):
dimension 3  V_l(p,k) = 4π∫r² j_l(pr) V(r) j_l(kr) dr,  dimension 2  V_m = 2π∫r J_m(pr) V(r) J_m(kr) dr,
dimension 1  V_+ = 2∫cos(px) V(x) cos(kx) dx, V_- with sines (x > 0), full ∫V(x) exp(-i(p-k)x) dx. mpmath at 25 digits."""
import mpmath as mp

from reference import number, pair, write

mp.mp.dps = 25


def sphericalj(l, x):
    if l == 0:
        return mp.sinc(x)
    if x < 1e-6:
        return x**l / mp.fac2(2 * l + 1)
    return mp.sqrt(mp.pi / (2 * x)) * mp.besselj(l + mp.mpf(1) / 2, x)


def half_line(f, reach, edges=()):
    """∫_0^reach f, in pieces of length 1/2 that also part at the edges; singular powers at 0 by smaller pieces."""
    points = sorted({mp.mpf(0), *[mp.mpf(10) ** -n for n in (1, 3, 6, 10)], *[mp.mpf(n) / 2 for n in range(1, 2 * reach + 1)], *map(mp.mpf, edges)})
    return mp.quad(f, points)


# Names are those of the test's table of expressions; reach: V is below 1e-22 of itself beyond.
RADIAL = {
    "exp(-r)/r": (lambda r: mp.exp(-r) / r, 60, ()),
    "exp(-r)": (lambda r: mp.exp(-r), 60, ()),
    "r*exp(-r)": (lambda r: r * mp.exp(-r), 60, ()),
    "r^2*exp(-2*r)": (lambda r: r**2 * mp.exp(-2 * r), 32, ()),
    "exp(-r^2)": (lambda r: mp.exp(-r * r), 8, ()),
    "r^2*exp(-r^2/2)": (lambda r: r * r * mp.exp(-r * r / 2), 11, ()),
    "step(1.5 - r)": (lambda r: mp.mpf(r < 1.5), 2, (1.5,)),
    "r*exp(-r^2)": (lambda r: r * mp.exp(-r * r), 8, ()),
    "1/(1 + exp((r - 2)/0.3))": (lambda r: 1 / (1 + mp.exp((r - 2) / mp.mpf("0.3"))), 19, ()),
    "1/cosh(r)^2": (lambda r: mp.sech(r) ** 2, 28, ()),
    "exp(-r)/sqrt(r)": (lambda r: mp.exp(-r) / mp.sqrt(r), 56, ()),
    "step(1.5 - r)*r*exp(-r)": (lambda r: (r < 1.5) * r * mp.exp(-r), 2, (1.5,)),
}
MOMENTA = [(0.01, 0.02), (0.3, 0.7), (1.0, 1.0), (2.0, 0.001), (3.0, 3.1), (6.0, 1.5)]

radial = {}
for name, (v, reach, edges) in RADIAL.items():
    for dimension in (2, 3):
        for l in (0, 1, 2):
            if dimension == 2 and (l == 2 or name == "exp(-r)/sqrt(r)"):
                continue
            rows = []
            for p, k in MOMENTA:
                if dimension == 3:
                    value = 4 * mp.pi * half_line(lambda r: r * r * sphericalj(l, p * r) * v(r) * sphericalj(l, k * r) if r else 0, reach, edges)
                else:
                    value = 2 * mp.pi * half_line(lambda r: r * mp.besselj(l, p * r) * v(r) * mp.besselj(l, k * r) if r else 0, reach, edges)
                rows.append([p, k, number(value)])
            radial.setdefault(name, {})[f"{dimension} {l}"] = rows

LINE = {
    "exp(-x^2)": (lambda x: mp.exp(-x * x), 8, ()),
    "exp(-abs(x))": (lambda x: mp.exp(-abs(x)), 56, ()),
    "abs(x)*exp(-2*abs(x))": (lambda x: abs(x) * mp.exp(-2 * abs(x)), 30, ()),
    "x^2*exp(-x^2/2)": (lambda x: x * x * mp.exp(-x * x / 2), 12, ()),
    "step(1.5 - abs(x))": (lambda x: mp.mpf(abs(x) < 1.5), 2, (1.5,)),
    "1/cosh(x)^2": (lambda x: mp.sech(x) ** 2, 28, ()),
    "x*exp(-x^2)": (lambda x: x * mp.exp(-x * x), 8, ()),
    "exp(-(x - 0.7)^2)": (lambda x: mp.exp(-((x - mp.mpf("0.7")) ** 2)), 9, ()),
    "x*exp(-abs(x - 0.5))": (lambda x: x * mp.exp(-abs(x - mp.mpf("0.5"))), 60, (0.5,)),
    "step(x + 0.5)*step(2 - x)": (lambda x: mp.mpf(-0.5 < x < 2), 3, (0.5, 2)),
    "tanh(x)/cosh(x)": (lambda x: mp.tanh(x) * mp.sech(x), 56, ()),
}
EVEN = {"exp(-x^2)", "exp(-abs(x))", "abs(x)*exp(-2*abs(x))", "x^2*exp(-x^2/2)", "step(1.5 - abs(x))", "1/cosh(x)^2"}
SIGNED = [(0.01, 0.02), (0.3, -0.7), (1.0, 1.0), (2.0, 0.001), (3.0, 3.1), (-6.0, 1.5)]
line = {}
for name, (v, reach, edges) in LINE.items():
    rows = []
    for p, k in SIGNED:
        q = mp.mpf(p) - mp.mpf(k)
        rows.append([p, k, pair(half_line(lambda x: v(x) * mp.expj(-q * x) + v(-x) * mp.expj(q * x), reach, edges))])
    line[name] = {"full": rows}
    if name in EVEN:
        for wave, f in (("even", mp.cos), ("odd", mp.sin)):
            line[name][wave] = [[p, k, number(2 * half_line(lambda x: f(p * x) * v(x) * f(k * x), reach, edges))] for p, k in MOMENTA]

write("transforms", "position-space integrals, mpmath at 25 digits", 14, {"radial": radial, "line": line})
