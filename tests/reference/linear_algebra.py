#!/usr/bin/env python3
"""Hermitian inverse, determinant, eigenvalues, forms and a real system by SciPy, for LinearAlgebra tests.

Run with Debian's python3-scipy: python3 linear_algebra.py > linear_algebra.json
The matrices come from a formula (below and in ScipyReferenceTests), so that only results are stored:
a[i, j] = sin(1 + 3 i + 5 j) + 1j cos(2 + 7 i - 4 j), A = a a^H / n + I / 2; v[q, i] = exp(1j (0.3 + q) i).
"""
import json

import numpy as np
import scipy
from scipy import linalg


def case(n):
    i, j = np.meshgrid(np.arange(n), np.arange(n), indexing="ij")
    a = np.sin(1 + 3 * i + 5 * j) + 1j * np.cos(2 + 7 * i - 4 * j)
    matrix = a @ a.conj().T / n + np.eye(n) / 2
    rows = np.exp(1j * np.outer(0.3 + np.arange(3), np.arange(n)))
    inverse = linalg.inv(matrix)
    real = matrix.real
    return {
        "size": n,
        "logDeterminant": float(np.linalg.slogdet(matrix)[1]),
        "inverseFirstRowRe": inverse[0].real.tolist(),
        "inverseFirstRowIm": inverse[0].imag.tolist(),
        "eigenvalues": linalg.eigvalsh(matrix)[::-1][:3].tolist(),
        "forms": [float((v.conj() @ matrix @ v).real) for v in rows],
        "gram": (abs(rows.conj() @ inverse @ rows.T) ** 2).ravel().tolist(),
        "realSolution": linalg.solve(real, np.cos(np.arange(n)), assume_a="pos").tolist(),
        "realInverseDiagonal": np.diag(linalg.inv(real)).tolist(),
    }


print(json.dumps({"scipy": scipy.__version__, "cases": [case(n) for n in (5, 16, 33, 100)]}, indent=1))
