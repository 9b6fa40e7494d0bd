"""Amplitudes in closed form from the literature, each checked here against an independent evaluation with mpmath. hbar = 1."""
import mpmath as mp

from reference import number, pair, write

mp.mp.dps = 30
i = mp.mpc(0, 1)


def loop(f, p, cutoff):
    """∫_0^Λ dk k²/(2π²) f(k)/(p² - k² + i0) in units 2 mu = 1, the pole subtracted."""
    points = [0, p / 2, p, 2 * p, *[x for x in (1, 3, 10, 30, 100, 1000) if 2 * p < x < cutoff], cutoff]
    regular = mp.quad(lambda k: (k * k * f(k) - p * p * f(p)) / (p * p - k * k) if k != p else 0, points)
    edge = mp.mpf(0) if cutoff == mp.inf else mp.log((cutoff + p) / (cutoff - p)) / (2 * p)
    return (regular + p * p * f(p) * (edge - i * mp.pi / (2 * p))) / (2 * mp.pi**2)


def yukawa(p, k, m=1):
    """exp(-m r)/r, l = 0."""
    return mp.pi / (p * k) * mp.log(((p + k) ** 2 + m * m) / ((p - k) ** 2 + m * m))


def dalitz(p, m=1):
    """Second Born term of V = exp(-m r)/r, 2 mu = 1, projected on l = 0. With s = sin(θ/2), A² = m⁴ + 4m²p² + 4p⁴s²:
    ∫d³k [(k²-p²-i0)((k-p)²+m²)((k-p')²+m²)]^-1 = π²/(p s A) {atan(m p s/A) + (i/2) ln[(A + 2p²s)/(A - 2p²s)]}."""
    def angular(x):
        s = mp.sqrt((1 - x) / 2)
        a = mp.sqrt(m**4 + 4 * m * m * p * p + 4 * p**4 * s * s)
        return mp.pi**2 / (p * s * a) * (mp.atan(m * p * s / a) + i / 2 * mp.log((a + 2 * p * p * s) / (a - 2 * p * p * s)))

    return -((4 * mp.pi) ** 2) / (2 * mp.pi) ** 3 * mp.quad(lambda x: angular(x), [-1, 0, 0.9, 0.99, 1]) / 2


born = []
for p in [mp.mpf("0.1"), mp.mpf("0.5"), mp.mpf(1), mp.mpf(3)]:
    value = dalitz(p)
    again = loop(lambda k: yukawa(p, k) ** 2 if k else (4 * mp.pi / (p * p + 1)) ** 2, p, mp.inf)
    assert abs(value - again) < 1e-10 * abs(value), (p, value, again)
    born.append([number(p), pair(value)])

contact = []
for p, cutoff in [(mp.mpf("0.3"), 5), (mp.mpf(1), 40), (mp.mpf("0.05"), 1000)]:
    value = -(mp.mpf(1) / (2 * mp.pi**2)) * (cutoff - p / 2 * mp.log((cutoff + p) / (cutoff - p)) + i * mp.pi * p / 2)
    assert abs(value - loop(lambda k: mp.mpf(1), p, cutoff)) < 1e-10 * abs(value)
    contact.append([number(p), cutoff, pair(value)])

plane = []
for p, cutoff in [(mp.mpf("0.3"), 5), (mp.mpf(1), 40)]:
    # -c² (mu/2π)[ln(Λ²/p² - 1) + iπ] with 2 mu = 1.
    value = -(mp.log(mp.mpf(cutoff) ** 2 / p**2 - 1) + i * mp.pi) / (4 * mp.pi)
    # k/(p² - k² + i0) = ½[1/(p - k + i0) - 1/(p + k)].
    regular = mp.quad(lambda k: 1 / (p + k), [0, cutoff])
    again = (mp.log(p / (cutoff - p)) - i * mp.pi - regular) / (4 * mp.pi)
    assert abs(value - again) < 1e-12
    plane.append([number(p), cutoff, pair(value)])


def phillips(m, cutoff, c0, c2, p):
    m, cutoff, c0, c2, p = map(mp.mpf, (m, cutoff, c0, c2, p))
    moment = lambda n: -m * cutoff**n / (2 * mp.pi**2 * n)
    bubble = m / (2 * mp.pi**2) * (-cutoff + p / 2 * mp.log((cutoff + p) / (cutoff - p)) - i * mp.pi * p / 2)
    value = 1 / ((c2 * moment(3) - 1) ** 2 / (c0 + c2**2 * moment(5) + p * p * c2 * (2 - c2 * moment(3))) - bubble)
    # Independently: V = Σ u_a(p) λ_ab u_b(k) with u = (1, k²), so T = u (λ^-1 - J)^-1 u with J_ab = ∫G u_a u_b.
    strength = mp.matrix([[c0, c2], [c2, 0]])
    integrals = mp.matrix(2, 2)
    for a in range(2):
        for b in range(2):
            integrals[a, b] = m * loop(lambda k: k ** (2 * (a + b)), p, cutoff)
    t = strength * mp.inverse(mp.eye(2) - integrals * strength)
    u = mp.matrix([1, p * p])
    again = (u.T * t * u)[0]
    assert abs(value - again) < 1e-10 * abs(value), (value, again)
    return value


SETS = [(1, 5, -1, "0.05", "0.3"), (1, 10, "0.7", "-0.01", "1.5"), (2, 4, -3, "0.1", "0.8")]
phillips_values = [{"M": float(m), "cutoff": float(l), "C0": float(c0), "C2": float(c2), "p": float(p), "T": pair(phillips(m, l, c0, c2, p))} for m, l, c0, c2, p in SETS]

yamaguchi = []
for c, b, p in [(-60, mp.mpf("1.4"), mp.mpf("0.4")), (10, mp.mpf(1), mp.mpf("0.2")), (-200, mp.mpf(2), mp.mpf(3))]:
    form = 1 / (p * p + b * b)
    bubble = -1 / (8 * mp.pi * b * (b - i * p) ** 2)
    assert abs(bubble - loop(lambda k: 1 / (k * k + b * b) ** 2, p, mp.inf)) < 1e-10 * abs(bubble)
    orders = [c**n * form**2 * bubble ** (n - 1) for n in range(1, 5)]
    yamaguchi.append({"c": c, "b": number(b), "p": number(p), "T": pair(form**2 / (1 / mp.mpf(c) - bubble)), "orders": [pair(x) for x in orders]})


def deltas(c1, a, mu, p):
    """Strengths -c1/a at +a/2 and +c1/a at -a/2: 1/t = 1 + β²(1 - exp(2ipa)); independently from T = v (1 - G v)^-1 between the two points."""
    c1, a, mu, p = map(mp.mpf, (c1, a, mu, p))
    beta = mu * c1 / (a * p)
    t = 1 / (1 + beta**2 * (1 - mp.exp(2 * i * p * a)))
    places, strengths = [a / 2, -a / 2], [-c1 / a, c1 / a]
    g = mp.matrix(2, 2)
    v = mp.diag(strengths)
    for row in range(2):
        for column in range(2):
            g[row, column] = -i * mu / p * mp.exp(i * p * abs(places[row] - places[column]))
    inner = v * mp.inverse(mp.eye(2) - g * v)
    wave = mp.matrix([mp.exp(i * p * x) for x in places])
    back = mp.matrix([mp.exp(-i * p * x) for x in places])
    forward = (back.T * inner * wave)[0]
    backward = (wave.T * inner * wave)[0]
    assert abs(t - (1 - i * mu / p * forward)) < 1e-20
    assert abs(abs(t) ** 2 + abs(i * mu / p * backward) ** 2 - 1) < 1e-20
    orders, term = [], v
    for _ in range(3):
        orders.append(pair((back.T * term * wave)[0]))
        term = v * g * term
    return {"c1": number(c1), "a": number(a), "mu": number(mu), "p": number(p), "t": pair(t), "forward": pair(forward), "backward": pair(backward), "orders": orders}


opposite = [deltas(*x) for x in [("0.3", "0.5", 1, "0.4"), ("0.35", "0.01", 1, "0.05"), ("1.2", 2, "0.5", 3)]]

write("amplitudes", "closed forms with mpmath, each compared with an independent evaluation", 14, {
    "secondBornYukawa": {"source": "Dalitz, Proc. R. Soc. A 206 (1951) 509, projected", "units": "V = exp(-r)/r, 2 mu = 1, l = 0", "values": born},
    "contactSecondOrder": {"source": "common practice", "units": "c = 1, 2 mu = 1, dimension 3: [p, cutoff, T]", "values": contact},
    "planeContactSecondOrder": {"source": "common practice", "units": "c = 1, 2 mu = 1, dimension 2: [p, cutoff, T]", "values": plane},
    "contactWithRange": {"source": "Phillips, Beane, Cohen, Ann. Phys. 263 (1998) 255", "units": "M = 2 mu, V = C0 + C2 (p^2 + k^2), sharp", "values": phillips_values},
    "separable": {"source": "Yamaguchi, Phys. Rev. 95 (1954) 1628", "units": "V = c g(p) g(k), g = 1/(k^2 + b^2), 2 mu = 1, no cutoff", "values": yamaguchi},
    "oppositeDeltas": {"source": "elementary matching at two points", "units": "strength -c1/a at +a/2, c1/a at -a/2; orders: forward amplitude", "values": opposite},
})
