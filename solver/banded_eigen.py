"""The largest eigenvalue of a banded pencil G φ = μ K φ with K positive definite.

Small matrices are solved densely, in a millisecond. For large ones Lanczos' method works on L⁻¹ G L⁻ᵀ with
K = L Lᵀ, at three banded products a step, so that the cost stays near linear in the length of the chain.
"""

from __future__ import annotations

from typing import Any

import numpy as np
from scipy.linalg import LinAlgError, cholesky_banded, eigh
from scipy.linalg.blas import dsbmv
from scipy.linalg.lapack import dpbtrf, dpbtrs, dtbtrs
from scipy.sparse.linalg import ArpackError, LinearOperator, eigsh

from solver.arrays import FloatArray

SMALL = 64  # unknowns up to which the dense solution is the faster one, and runs in one thread
_SEARCHED = 60  # Lanczos vectors at most
_BELOW = 0.98  # of the factor that is known, for the shift of inverse iteration
_SURE = 2e-8  # no other factor may lie further below than this part
_STEPS = 12


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


def near(
    stiffness: FloatArray, load: FloatArray, factor: float, guess: FloatArray
) -> tuple[float, FloatArray] | None:
    """The largest μ, knowing about where 1/μ lies and a vector like the one wanted; None where in doubt.

    Inverse iteration below the factor. That no smaller factor was passed over is proved by K − λ G being
    positive definite just below the one found.
    """
    shifted = _factored(stiffness, load, _BELOW * factor)
    if shifted is None:
        return None
    vector, value, below = guess, factor, len(stiffness) - 1
    bands = np.asfortranarray(stiffness), np.asfortranarray(load)
    for _ in range(_STEPS):
        vector = np.asarray(dpbtrs(shifted, dsbmv(below, 1.0, bands[0], vector, lower=1), lower=1)[0])
        vector = vector.reshape(-1) / np.abs(vector).max()
        stored, work = (float(vector @ dsbmv(below, 1.0, band, vector, lower=1)) for band in bands)
        if not work > 0.0:
            return None
        value, before = stored / work, value
        if abs(value - before) <= 1e-13 * value:
            break
    sure = _factored(stiffness, load, (1.0 - _SURE) * value) is not None
    return (1.0 / value, vector) if sure else None


def _factored(stiffness: FloatArray, load: FloatArray, factor: float) -> FloatArray | None:
    """Cholesky's factor of K − factor G; None where that is not positive definite."""
    lower, failed = dpbtrf(np.asfortranarray(stiffness - factor * load), lower=1)
    return None if failed else np.asarray(lower)


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
