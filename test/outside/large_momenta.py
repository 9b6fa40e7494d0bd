"""Projections at large and very unequal momenta: the angular integral ½∫P_l(x) V(|p-k|) dx in closed form or by mpmath at 60 digits,
where position space would oscillate too fast."""
import mpmath as mp

from reference import number, write

mp.mp.dps = 60
PAIRS = [("1e5", "1e5"), ("1e5", "100000.3"), ("1e5", "0.01"), ("1e4", "5e3"), ("1e-6", "2e-6"), ("1e-6", "3"), ("40", "40.5"), ("1e5", "2e5")]


def angular(v, l, p, k, scale):
    """In t = 1 - x, graded towards t = 0 with the width of V's peak."""
    width = ((p - k) ** 2 + scale**2) / (2 * p * k)
    points = [mp.mpf(0)] + [x for x in (width * mp.mpf(2) ** n for n in range(-4, 80)) if x < 2] + [mp.mpf(2)]
    return mp.quad(lambda t: mp.legendre(l, 1 - t) * v((p - k) ** 2 + 2 * p * k * t), points) / 2


TRANSFERS = {
    "exp(-r)/r": lambda s: 4 * mp.pi / (s + 1),
    "exp(-r)": lambda s: 8 * mp.pi / (s + 1) ** 2,
    "exp(-r^2)": lambda s: mp.pi ** mp.mpf("1.5") * mp.exp(-s / 4),
    "r*exp(-r)": lambda s: 8 * mp.pi * (3 - s) / (s + 1) ** 3,
    "exp(-r)/sqrt(r)": lambda s: 4 * mp.pi * mp.gamma(mp.mpf("1.5")) * mp.im((1 - 1j * mp.sqrt(s)) ** -mp.mpf("1.5")) / mp.sqrt(s),
}
values = {
    name: {str(l): [[float(p), float(k), number(angular(v, l, mp.mpf(float(p)), mp.mpf(float(k)), 1))] for p, k in PAIRS] for l in (0, 1, 2)}
    for name, v in TRANSFERS.items()
}
write("large-momenta", "angular integrals at 60 digits", 15, {"values": values})
