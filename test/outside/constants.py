"""CODATA 2022 (P. J. Mohr, D. B. Newell, B. N. Taylor, E. Tiesinga, arXiv:2409.03787; values as listed by NIST). Those of the exact SI constants
are computed here; the dalton and the electron mass are transcribed, and compared with SciPy's CODATA 2018 to nine digits."""
import mpmath as mp
import scipy.constants as sc

from reference import number, write

mp.mp.dps = 30
h, e, c, k = mp.mpf("6.62607015e-34"), mp.mpf("1.602176634e-19"), mp.mpf(299792458), mp.mpf("1.380649e-23")
hbarc = h / (2 * mp.pi) * c / e * mp.mpf("1e9")  # MeV fm
values = {
    "hbarc in MeV fm": number(hbarc),
    "kelvin in eV": number(k / e),
    "hertz in eV": number(h / e),
    "dalton in MeV": 931.49410372,
    "electron mass in MeV": 0.51099895069,
    "bohr in angstrom": 0.529177210544,
    "hartree in eV": 27.211386245981,
}
for name, key in (("dalton in MeV", "atomic mass constant energy equivalent in MeV"), ("electron mass in MeV", "electron mass energy equivalent in MeV")):
    assert abs(values[name] / sc.value(key) - 1) < 2e-9
assert abs(values["bohr in angstrom"] / (sc.value("Bohr radius") * 1e10) - 1) < 1e-9
assert abs(values["hartree in eV"] / sc.value("Hartree energy in eV") - 1) < 1e-9
write("constants", "exact SI constants; otherwise CODATA 2022 as listed by NIST", 10, {"source": "CODATA 2022", "values": values})
