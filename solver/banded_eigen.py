"""The largest eigenvalue of a banded pencil G φ = μ K φ with K positive definite.

Small matrices are solved densely, in a millisecond. For large ones Lanczos' method works on L⁻¹ G L⁻ᵀ with
K = L Lᵀ, at three banded products a step, so that the cost stays near linear in the length of the chain.
"""

from __future__ import annotations

from typing import Any

import numpy as np
from scipy.linalg import LinAlgError, cholesky_banded, eigh
from scipy.linalg.blas import dsbmv
from scipy.linalg.lapack import dtbtrs
from scipy.sparse.linalg import ArpackError, LinearOperator, eigsh

from solver.arrays import FloatArray

SMALL = 130  # unknowns up to which the dense solution is the faster one
_SEARCHED = 60  # Lanczos vectors at most


class NoFactor(Exception):  # noqa: N818 - the caller asks whether there is one
    """Numbers are out of range, K has lost all digits, or the iteration does not end."""


def largest(stiffness: FloatArray, load: FloatArray) -> tuple[float, FloatArray]:
    """The largest μ and its vector (N,), from lower bands (b, N) of K and G; NoFactor where there is none."""
    if not (np.isfinite(stiffness).all() and np.isfinite(load).all()):
        raise NoFactor
    try:
        if stiffness.shape[1] <= SMALL:
            return _dense(stiffness, load)
        return _by_lanczos(stiffness, load)
    except (LinAlgError, ArpackError) as lost:
        raise NoFactor from lost


def _dense(stiffness: FloatArray, load: FloatArray) -> tuple[float, FloatArray]:
    last = stiffness.shape[1] - 1
    value, vector = eigh(
        full(load),
        full(stiffness),
        lower=True,
        subset_by_index=[last, last],
        overwrite_a=True,
        overwrite_b=True,
    )
    return float(value[0]), vector[:, 0]


def full(band: FloatArray) -> FloatArray:
    """The lower triangle (N, N) of a lower band (b, N)."""
    size = band.shape[1]
    matrix = np.zeros((size, size), order="F")
    flat = matrix.T.reshape(-1)  # column by column, a view
    for below, row in enumerate(band):
        flat[below :: size + 1][: size - below] = row[: size - below]
    return matrix


def _by_lanczos(stiffness: FloatArray, load: FloatArray) -> tuple[float, FloatArray]:
    factor = np.asfortranarray(cholesky_banded(stiffness, lower=True, check_finite=False))
    size, below = stiffness.shape[1], len(stiffness) - 1
    band = np.asfortranarray(load)

    def back(vector: FloatArray) -> FloatArray:
        return np.asarray(dtbtrs(factor, vector, uplo="L", trans="T")[0]).reshape(size)

    def times(vector: FloatArray) -> FloatArray:
        bent = dsbmv(below, 1.0, band, back(vector), lower=1)
        return np.asarray(dtbtrs(factor, bent, uplo="L", trans="N")[0]).reshape(size)

    start: FloatArray = np.random.default_rng(0).standard_normal(
        (size,)
    )  # the same again for the same member
    operator: LinearOperator[Any] = LinearOperator((size, size), matvec=times, dtype=np.float64)
    value, vector = eigsh(operator, k=1, which="LA", v0=start, ncv=min(_SEARCHED, size - 1), tol=1e-12)
    return float(value[0]), back(vector[:, 0])
