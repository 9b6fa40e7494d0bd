"""The benchmark's reference: perturbation series of two interactions in the l = 0 wave of three dimensions, the way a competent NumPy user would
write it. Yukawa exchange and contact, all 14 monomials to order 4 by the chain R_nu = V_nu + sum_i V_i G R_(nu - e_i), 16 on-shell momenta
times 24 sharp cutoffs on a 64-point Gauss-Legendre grid with the pole subtracted, and the full solution by LU at each.
One thread. Prints the seconds and some amplitudes as JSON."""
import os

for name in ("OMP_NUM_THREADS", "OPENBLAS_NUM_THREADS", "MKL_NUM_THREADS"):
    os.environ[name] = "1"

import json
import time

import numpy as np

MU = 0.5  # 2 mu = 1
YUKAWA, CONTACT, MASS = -1.2, 0.3, 1.0
ORDER, POINTS = 4, 64
MOMENTA = np.linspace(0.1, 1.6, 16)
CUTOFFS = np.geomspace(10.0, 1000.0, 24)
RULE = np.polynomial.legendre.leggauss(POINTS)
MONOMIALS = [(a, n - a) for n in range(1, ORDER + 1) for a in range(n, -1, -1)]


def yukawa(p, k):
    """l = 0 projection of YUKAWA exp(-MASS r)/r."""
    return YUKAWA * np.pi / (p * k) * np.log1p(4 * p * k / ((p - k) ** 2 + MASS**2))


def contact(p, k):
    return CONTACT * np.ones(np.broadcast(p, k).shape)


def grid(cutoff):
    """Gauss-Legendre points in u, k = exp(u) - 1: dense where the potential varies, and exact enough up to the highest cutoff."""
    x, w = RULE
    reach = np.log1p(cutoff)
    u = reach * (1 + x) / 2
    return np.expm1(u), w * reach / 2 * np.exp(u)


def amplitudes(p0, cutoff):
    """On-shell amplitude of every monomial and of the full solution. The last point of the grid is p0 itself."""
    k, w = grid(cutoff)
    nodes = np.append(k, p0)
    measure = w * k**2 / (2 * np.pi**2) * 2 * MU / (p0**2 - k**2)
    # int_0^L dk k^2/(2 pi^2) f(k) 2mu/(p0^2 - k^2 + i0): subtract f(p0) p0^2/(p0^2 - k^2) and add its integral.
    subtraction = np.sum(w / (p0**2 - k**2))
    exact = np.log((cutoff + p0) / (cutoff - p0)) / (2 * p0) - 1j * np.pi / (2 * p0)
    at_pole = MU / np.pi**2 * p0**2 * (exact - subtraction)
    propagator = np.append(measure, at_pole)
    kernels = [v(nodes[:, None], nodes[None, :]).astype(complex) for v in (yukawa, contact)]
    dressed = [v * propagator for v in kernels]
    columns = {}
    for nu in MONOMIALS:
        column = kernels[nu.index(1)][:, -1].copy() if sum(nu) == 1 else np.zeros(POINTS + 1, complex)
        for i, lower in enumerate(((nu[0] - 1, nu[1]), (nu[0], nu[1] - 1))):
            if lower in columns:
                column += dressed[i] @ columns[lower]
        columns[nu] = column
    total = kernels[0] + kernels[1]
    full = np.linalg.solve(np.eye(POINTS + 1) - total * propagator, total[:, -1])
    return np.array([columns[nu][-1] for nu in MONOMIALS] + [full[-1]])


def main():
    times = []
    for _ in range(9):
        start = time.perf_counter()
        table = np.array([[amplitudes(p0, cutoff) for cutoff in CUTOFFS] for p0 in MOMENTA])
        times.append(time.perf_counter() - start)
    seconds = float(np.median(times[2:]))
    last = table[0, -1]
    print(json.dumps({
        "seconds": seconds,
        "numpy": np.__version__,
        "checksum": {"re": float(table.real.sum()), "im": float(table.imag.sum())},
        "first momentum, highest cutoff": {
            **{f"yukawa^{a}*contact^{b}": {"re": last[n].real, "im": last[n].imag} for n, (a, b) in enumerate(MONOMIALS)},
            "full": {"re": last[-1].real, "im": last[-1].imag},
        },
    }, indent=1))


if __name__ == "__main__":
    main()
