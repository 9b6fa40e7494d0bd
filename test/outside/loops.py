"""Loops between two contacts at a finite cutoff: I_n(E) = N ∫|k|^(D-1) dk k^n f(k/L)²/(E - kinetic(k)), N and D as in docs/numbers.md (dimension 1
on its even wave). Principal value above threshold. mpmath's quadrature, held against closed forms where there are any. hbar = 1."""
import mpmath as mp

from reference import number, pair, write

mp.mp.dps = 30
NORM = {1: 1 / mp.pi, 2: 1 / (2 * mp.pi), 3: 1 / (2 * mp.pi**2)}
SHAPES = {
    "sharp": lambda t: mp.mpf(1),
    "gaussian 1": lambda t: mp.exp(-2 * t**2),
    "gaussian 2": lambda t: mp.exp(-2 * t**4),
    "pole 4": lambda t: (1 + t * t) ** -8,
}


def reach(shape, cutoff):
    return {"sharp": cutoff, "gaussian 1": 8 * cutoff, "gaussian 2": 3 * cutoff, "pole 4": mp.inf}[shape]


def points(shape, cutoff, others=()):
    inner = [cutoff * mp.mpf(2) ** j for j in range(-9, 3)]
    end = reach(shape, cutoff)
    return [0, *sorted([x for x in [*inner, *others] if x < end]), end]


def below(dimension, n, shape, cutoff, kinetic, energy):
    f = SHAPES[shape]
    return NORM[dimension] * mp.quad(lambda k: k ** (n + dimension - 1) * f(k / cutoff) / (energy - kinetic(k)), points(shape, cutoff))


def above(dimension, n, shape, cutoff, mu, p):
    """1/(E - k²/2mu) = 2 mu/((p - k)(p + k)); what the pole takes with it is integrated in closed form over (0, 2p)."""
    f = SHAPES[shape]
    regular = lambda k: 2 * mu * k ** (n + dimension - 1) * f(k / cutoff) / (p + k)
    slope = mp.diff(regular, p)
    inner = mp.quad(lambda k: (regular(k) - regular(p)) / (p - k) if k != p else -slope, [0, p, 2 * p])
    outer = mp.quad(lambda k: regular(k) / (p - k), [x for x in points(shape, cutoff, (2 * p,)) if x >= 2 * p])
    return NORM[dimension] * (inner + outer)


def closed_sharp(dimension, n, cutoff, mu, energy):
    """∫_0^L k^(N-1)/(E - k²/2mu) dk by Gauss' function."""
    top = n + dimension
    return NORM[dimension] * cutoff**top / (top * energy) * mp.hyp2f1(1, mp.mpf(top) / 2, mp.mpf(top) / 2 + 1, cutoff**2 / (2 * mu * energy))


def closed_gaussian(dimension, n, cutoff, mu, energy):
    """∫_0^∞ k^(N-1) e^(-a k²)/(k² + q²) dk = q^(N-2) Γ(N/2) e^(a q²) Γ(1 - N/2, a q²)/2."""
    half, q2, a = mp.mpf(n + dimension) / 2, -2 * mu * energy, 2 / cutoff**2
    return -NORM[dimension] * 2 * mu * q2 ** (half - 1) * mp.gamma(half) * mp.exp(a * q2) * mp.gammainc(1 - half, a * q2) / 2


MU, CUTOFF = mp.mpf("0.8"), mp.mpf(40)
quadratic = lambda k: k * k / (2 * MU)
rows = []
for dimension in (1, 2, 3):
    for n in (0, 1, 2, 4):
        for shape in SHAPES:
            energy = mp.mpf("-0.7")
            value = below(dimension, n, shape, CUTOFF, quadratic, energy)
            closed = {"sharp": closed_sharp, "gaussian 1": closed_gaussian}.get(shape)
            if closed:
                assert abs(value - closed(dimension, n, CUTOFF, MU, energy)) < 1e-18 * abs(value), (dimension, n, shape)
            p = mp.mpf("0.9")
            principal = above(dimension, n, shape, CUTOFF, MU, p)
            if shape == "sharp":
                upper = closed_sharp(dimension, n, CUTOFF, MU, p * p / (2 * MU) + mp.mpc(0, "1e-25"))
                assert abs(principal - mp.re(upper)) < 1e-16 * abs(principal), (dimension, n)
            rows.append({"dimension": dimension, "n": n, "shape": shape, "below": number(value), "above": number(principal)})

KINETIC = {"k": lambda k: k, "k^4": lambda k: k**4, "sqrt(k^2 + 1)": lambda k: mp.sqrt(k * k + 1), "k^2 + k^4/9": lambda k: k * k + k**4 / 9}
others = []
for text, kinetic in KINETIC.items():
    for dimension in (2, 3):
        for n in (0, 2):
            for energy in (mp.mpf("-0.6"), mp.mpc("0.4", "0.8")):
                value = below(dimension, n, "sharp", CUTOFF, kinetic, energy)
                others.append({"kinetic": text, "dimension": dimension, "n": n, "E": pair(energy), "value": pair(value)})

write("loops", "mpmath's quadrature at 30 digits, held against hypergeometric and incomplete gamma functions", 15, {
    "units": "mu = 0.8, cutoff 40; below: E = -0.7; above: E = p^2/2mu, p = 0.9, principal value",
    "quadratic": rows,
    "otherEnergies": others,
})
