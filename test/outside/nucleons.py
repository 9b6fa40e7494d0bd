"""Neutron and proton at low energies: a separable interaction c/2mu/((p² + b²)(k² + b²)) (Yamaguchi, Phys. Rev. 95 (1954) 1628) with b and c from a
scattering length and an effective range, its phase shifts at laboratory energies, its bound state, and what was measured."""
import mpmath as mp

from reference import number, write

mp.mp.dps = 30
HBARC, PROTON, NEUTRON = mp.mpf("197.3269804"), mp.mpf("938.27208943"), mp.mpf("939.56542194")
MU = PROTON * NEUTRON / (PROTON + NEUTRON)


def p_cot(c, b, p):
    """T = c g²/(1 - c J), J = -1/(8π b (b - ip)²), p cot δ - ip = -4π/T in units 2 mu = 1."""
    return mp.re(-4 * mp.pi * (b * b + p * p) ** 2 / c - (b - mp.mpc(0, p)) ** -2 * (b * b + p * p) ** 2 / (2 * b))


def strength(a, r):
    """With g² and J written out, p cot δ = -(4πb⁴/c + b/2) + (1/2b - 8πb²/c) p² - 4πp⁴/c."""
    def conditions(c, b):
        return [4 * mp.pi * b**4 / c + b / 2 - 1 / a, 1 / b - 16 * mp.pi * b * b / c - r]

    c, b = mp.findroot(conditions, (-90, mp.mpf("1.4")) if a > 0 else (-35, mp.mpf("1.1")))
    p = mp.mpf("0.37")
    assert abs(p_cot(c, b, p) - (-1 / a + r * p * p / 2 - 4 * mp.pi * p**4 / c)) < 1e-20
    return c, b


def relative(lab):
    return mp.sqrt(PROTON**2 * lab * (lab + 2 * NEUTRON) / ((PROTON + NEUTRON) ** 2 + 2 * PROTON * lab)) / HBARC


def channel(a, r, measured):
    c, b = strength(mp.mpf(a), mp.mpf(r))
    rows = []
    for lab, phase in measured.items():
        p = relative(lab)
        delta = mp.acot(p_cot(c, b, p) / p) * 180 / mp.pi
        rows.append({"lab": lab, "p": number(p), "model": number(delta % 180), "measured": phase})
    kappa = mp.sqrt(-c / (8 * mp.pi * b)) - b
    binding = {"binding": number((kappa * HBARC) ** 2 / (2 * MU))} if kappa > 0 else {}
    return {"a": number(mp.mpf(a)), "r": number(mp.mpf(r)), "c": number(c), "b": number(b), **binding, "phaseShifts": rows}


write("nucleons", "closed forms with mpmath", 12, {
    "source": "phase shifts (degrees): Stoks et al., Phys. Rev. C 48 (1993) 792; scattering lengths and effective ranges: Machleidt, Phys. Rev. C 63 (2001) 024001; masses: CODATA 2022",
    "units": "fm, MeV; laboratory energies of a neutron that hits a proton at rest",
    "masses": {"proton": number(PROTON), "neutron": number(NEUTRON)},
    "singlet": channel("-23.74", "2.77", {1: 62.07, 5: 63.63, 10: 59.96, 25: 50.90, 50: 40.54}),
    "triplet": channel("5.419", "1.753", {1: 147.75, 5: 118.18, 10: 102.61, 25: 80.63, 50: 62.77}),
    "deuteron": {"binding": 2.224575, "source": "measured"},
})
