#!/usr/bin/env python3
"""Reference values for the tests of acoustics and statistics, from SciPy, each by another method than the one tested.

    /usr/bin/python3 tests/reference/physics.py > tests/reference/physics.csv

One line a value: function, arguments separated by blanks, value.
SciPy 1.10, NumPy 1.24.
"""
import numpy as np
from scipy import special, stats, integrate, linalg


def emit(name, args, value):
    print(f"{name},{' '.join(repr(float(a)) for a in args)},{float(value)!r}")


def tails():
    for z in (-6.0, -1.0, 0.0, 0.5, 2.0, 5.0, 7.9, 8.1, 12.0, 25.0, 40.0):
        emit("normal_log_upper", (z,), special.log_ndtr(-z))
    for dof in (1, 2, 3.5, 16, 100, 2000):
        for ratio in (0.3, 0.9, 1.0, 1.2, 1.6):
            x = dof * ratio
            if stats.chi2.sf(x, dof) < 0.5:
                emit("chi_square_log_upper", (x, dof), stats.chi2.logsf(x, dof))
            else:
                emit("chi_square_log_upper", (x, dof), np.log1p(-stats.chi2.cdf(x, dof)))
    for a, b in ((1, 15), (3, 29), (7, 57), (0.5, 0.5), (20, 300), (2.5, 1000)):
        for x in (0.01, 0.1, 0.3, 0.5, 0.9):
            emit("beta_lower", (x, a, b), special.betainc(a, b, x))


def painleve():
    """F2 from the Hastings-McLeod solution of Painleve II, q'' = s q + 2 q^3."""
    def slope(s, y):
        q, dq, inner, outer = y
        return [dq, s * q + 2 * q ** 3, -q * q, -inner]
    start = 6.0
    ai, dai, _, _ = special.airy(start)
    inner = dai ** 2 - start * ai ** 2                      # integral of Ai^2 from start
    outer = (2 * start ** 2 * ai ** 2 - 2 * start * dai ** 2 - ai * dai) / 3
    points = [4.0, 2.0, 1.0, 0.0, -1.0, -2.0, -3.0]
    run = integrate.solve_ivp(slope, (start, -3.0), [ai, dai, inner, outer], method="DOP853",
                              t_eval=points, rtol=3e-14, atol=1e-22)
    for s, value in zip(run.t, run.y[3]):
        emit("tracy_widom_cdf", (s,), np.exp(-value))


def coherence():
    for n in (4, 16, 32):
        for c in (0.1, 0.5, 0.9):
            def density(x):
                return (n - 1) * (1 - c) ** n * (1 - x) ** (n - 2) * special.hyp2f1(n, n, 1, c * x)
            for x in (0.1, 0.3, 0.6, 0.92):
                emit("coherence_cdf", (x, c, n), integrate.quad(density, 0, x, epsabs=1e-13, epsrel=1e-13)[0])


def cusum():
    """Brook and Evans (1972) chains of 100 and 200 states, extrapolated (the error falls as 1/states^2)."""
    def chain(k, h, mean, states):
        w = 2 * h / (2 * states - 1)
        i = np.arange(states)
        upper = (i[None, :] - i[:, None]) * w + w / 2 + k - mean
        lower = upper - w
        p = stats.norm.cdf(upper) - stats.norm.cdf(lower)
        p[:, 0] = stats.norm.cdf(upper[:, 0])
        return np.linalg.solve(np.eye(states) - p, np.ones(states))[0]
    for k, h in ((0.5, 3.0), (0.5, 5.0), (0.25, 8.0), (1.0, 2.5)):
        for mean in (0.0, 0.5, 1.0, 2.0):
            a, b = chain(k, h, mean, 200), chain(k, h, mean, 400)
            emit("cusum_arl", (mean, k, h), (4 * b - a) / 3)


def surface():
    """Cron-Sherman field at general orientation by brute two-dimensional quadrature over direction."""
    u, w = np.polynomial.legendre.leggauss(80)
    u, w = (u + 1) / 2, w / 2
    az = 2 * np.pi * np.arange(160) / 160
    for vertical, horizontal in ((1.0, 2.0), (-3.0, 1.5), (6.0, 9.0)):
        for m in (1, 2):
            phase = vertical * u[:, None] + horizontal * np.sqrt(1 - u[:, None] ** 2) * np.cos(az)[None, :]
            value = 2 * m * np.sum(w[:, None] * u[:, None] ** (2 * m - 1) * np.exp(1j * phase)) / az.size
            emit("surface_re", (vertical, horizontal, m), value.real)
            emit("surface_im", (vertical, horizontal, m), value.imag)


def calibration_bound():
    """Slepian-Bangs trace formula with explicit derivatives, then the inverse within the gauge."""
    n, nu = 6, 300.0
    x = np.array([0.0, 1.0, 2.1, 2.9, 4.2, 5.0])
    d = x[:, None] - x[None, :]
    r = np.sinc(1.3 * d / np.pi) + 0.5 * np.exp(1j * 1.3 * 0.4 * d) + 0.05 * np.eye(n)
    inverse = np.linalg.inv(r)

    derivatives = []
    for direction in (1j, 1.0):
        for a in range(n):
            e = np.zeros((n, n), complex)
            e[a, a] = direction
            derivatives.append(e @ r + r @ e.conj().T)
    f = np.array([[nu * np.trace(inverse @ a @ inverse @ b).real for b in derivatives] for a in derivatives])
    zero, one = np.zeros(n), np.ones(n)
    gauges = {
        "constant": [np.r_[one, zero], np.r_[zero, one]],
        "linear": [np.r_[one, zero], np.r_[zero, one], np.r_[x, zero]],
        "level": [np.r_[one, zero]],
    }
    for name, gauge in gauges.items():
        basis = linalg.null_space(np.array(gauge))
        cov = basis @ np.linalg.inv(basis.T @ f @ basis) @ basis.T
        for i in range(n):
            emit(f"crb_{name}", (i,), np.sqrt(cov[i, i]))
            emit(f"crb_{name}", (n + i,), np.sqrt(cov[n + i, n + i]))


tails()
painleve()
coherence()
cusum()
surface()
calibration_bound()
