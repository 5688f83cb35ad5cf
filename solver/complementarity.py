"""The linear complementarity problem: w = M z + q with w ≥ 0, z ≥ 0 and wᵀz = 0, solved exactly.

M is positive semidefinite (not necessarily symmetric), as contacts make it: z are contact forces, w the gaps
that remain. Which of each pair is zero is a finite question, and it is answered by pivoting. First by blocks:
all pairs of wrong sign change sides at once, which most often settles within a few rounds but may run in a
circle. Where it does, Lemke's method with lexicographic ratios does not, and for such a matrix its ending on
a ray proves that there is no solution (Cottle, Pang and Stone, The Linear Complementarity Problem, 1992,
sections 4.4 and 4.9; from memory).
"""

from __future__ import annotations

import numpy as np

from solver.arrays import BoolArray, FloatArray, IntArray

ROUNDS = 12  # of changing sides by blocks
NOTHING = 1e-13  # of the largest: rounding, in numbers that are scaled to 1
SOLVED = 1e-9  # w where it should be 0; more, and the block was singular
SINGULAR = 1e12  # so large comes z out of a block that rounding alone keeps from being singular
LEAST_PIVOT = 1e-11
NEXT_TO_NOTHING = 1e-8  # of the artificial variable: what is left is for the caller's own digits to settle
PIVOTS = 20  # times the size, plus some: more is a circle, which only rounding can close


def complementary(
    matrix: FloatArray, constant: FloatArray, scale: FloatArray | None = None
) -> FloatArray | None:
    """A solution z (s,) for the matrix (s, s) and the constant q (s,); None where there is none.

    `scale` are positive factors for rows and columns alike that bring the matrix to the size of 1; where it
    is not given, the diagonal gives them.
    """
    scale = _scale(matrix) if scale is None else scale
    scaled = scale[:, None] * matrix * scale
    gaps = scale * constant
    size = float(np.abs(gaps).max(initial=0.0))
    if (constant >= 0.0).all():
        return np.zeros_like(constant)
    found = _by_blocks(scaled, gaps / size)
    if found is None:
        found = _lemke(scaled, gaps / size)
    return None if found is None else size * scale * found


def _scale(matrix: FloatArray) -> FloatArray:
    """(s,) factors of rows and columns alike that bring the diagonal to 1, or to at most 1 beside a 0."""
    diagonal = np.diagonal(matrix)
    positive = diagonal > 0.0
    if not positive.any():
        return np.ones_like(diagonal)
    scale = np.full_like(diagonal, np.sqrt(diagonal.max()))
    scale[positive] = 1.0 / np.sqrt(diagonal[positive])
    return scale


def _by_blocks(matrix: FloatArray, constant: FloatArray) -> FloatArray | None:
    basic = constant < 0.0
    for _ in range(ROUNDS):
        z = _basic_solution(matrix, constant, np.flatnonzero(basic))
        if z is None:
            return None
        w = matrix @ z + constant
        wrong = np.where(basic, z < -NOTHING * np.abs(z).max(initial=1.0), w < -NOTHING)
        if not wrong.any():
            singular = np.abs(w[basic]).max(initial=0.0) > SOLVED
            return None if singular else np.maximum(z, 0.0)
        basic ^= wrong
    return None


def _basic_solution(matrix: FloatArray, constant: FloatArray, basic: IntArray) -> FloatArray | None:
    """z with w = 0 at `basic` and z = 0 elsewhere; None where the block is singular."""
    z = np.zeros_like(constant)
    try:
        z[basic] = np.linalg.solve(matrix[np.ix_(basic, basic)], -constant[basic])
    except np.linalg.LinAlgError:
        return None
    return z if np.abs(z).max(initial=0.0) < SINGULAR else None


def _lemke(matrix: FloatArray, constant: FloatArray) -> FloatArray | None:
    """The columns are w, z, the artificial variable and q."""
    size = constant.size
    table = np.hstack([np.eye(size), -matrix, -np.ones((size, 1)), constant[:, None]])
    basis, artificial = np.arange(size), 2 * size
    rows, entering = basis, artificial
    for _ in range(PIVOTS * (size + 10)):
        row = _first_of(table, rows, np.abs(table[rows, entering]), basis[rows] == artificial)
        _pivot(table, row, entering)
        leaving, basis[row] = int(basis[row]), entering
        if leaving == artificial or table[basis == artificial, -1] <= NEXT_TO_NOTHING:
            return _values(table, basis, size)
        entering = leaving + size if leaving < size else leaving - size
        rows = np.flatnonzero(table[:, entering] > LEAST_PIVOT)
        if not rows.size:
            return None  # the ray
    return None


def _pivot(table: FloatArray, row: int, entering: int) -> None:
    table[row] /= table[row, entering]
    column = table[:, entering].copy()
    column[row] = 0.0
    table -= np.outer(column, table[row])


def _first_of(table: FloatArray, rows: IntArray, divisor: FloatArray, preferred: BoolArray) -> int:
    """The row of lexicographically least ratio; among equal first entries a preferred one, if any."""
    for column in (-1, *range(table.shape[0])):
        ratio = table[rows, column] / divisor
        least = ratio <= ratio.min() + NOTHING
        rows, divisor, preferred = rows[least], divisor[least], preferred[least]
        if preferred.any():
            return int(rows[np.argmax(preferred)])
        if rows.size == 1:
            break
    return int(rows[0])


def _values(table: FloatArray, basis: IntArray, size: int) -> FloatArray:
    z = np.zeros(2 * size + 1)
    z[basis] = np.maximum(table[:, -1], 0.0)
    return z[size:-1]
