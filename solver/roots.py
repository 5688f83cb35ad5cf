"""All roots of many polynomials at once, by the signs of their Bernstein coefficients.

Rows are polynomials of one degree d on 0…1 in Bernstein form. A polynomial has no more roots inside than its
coefficients have changes of sign (Descartes' rule in this basis), so most rows are done at a glance. The
others are halved until each piece has one change of sign, thus exactly one root, which is then found by
Newton's method kept inside its bracket. Eigenvalues of companion matrices were rejected: they cost a hundred
times more where nothing is to be found, and they break down when the leading coefficient is only rounding.
"""

from __future__ import annotations

from dataclasses import dataclass
from fractions import Fraction
from functools import lru_cache
from math import comb

import numpy as np

from solver.arrays import BoolArray, FloatArray, IntArray, frozen

_HALVINGS = 40  # pieces of 1e-12 of the element: below that a place no longer matters
_STEPS = 60  # bisection alone would be through by then


@dataclass(frozen=True, slots=True)
class Roots:
    """The row of each root and its place 0…1, both (k,), in no order."""

    row: IntArray
    place: FloatArray


def roots_inside(coefficients: FloatArray, noise: FloatArray) -> Roots:
    """The roots inside 0…1 of the rows (r, d + 1); coefficients up to `noise` (r,) in size count as 0.

    A root of even order, where nothing changes sign, may come out as two next to each other or not at all.
    """
    coefficients = np.where(np.abs(coefficients) > noise[:, np.newaxis], coefficients, 0.0)
    rows = np.flatnonzero((coefficients.max(axis=-1) > 0.0) & (coefficients.min(axis=-1) < 0.0))
    pieces = _Pieces(rows, np.zeros(len(rows)), np.ones(len(rows)), coefficients[rows])
    found = [Roots(rows[:0], np.zeros(0))]
    for _ in range(_HALVINGS):
        if len(pieces.row) == 0:
            break
        changes = _sign_changes(pieces.coefficients)
        found.append(_single_roots(pieces.only(np.equal(changes, 1))))
        pieces = _halved(pieces.only(np.greater(changes, 1)), noise)
        found.append(_roots_on_cuts(pieces))
    else:
        found.append(Roots(pieces.row, pieces.start + 0.5 * pieces.width))
    return Roots(np.concatenate([f.row for f in found]), np.concatenate([f.place for f in found]))


@dataclass(frozen=True, slots=True)
class _Pieces:
    """Parts of rows: which row, where on it, and the coefficients on the part."""

    row: IntArray
    start: FloatArray
    width: FloatArray
    coefficients: FloatArray

    def only(self, chosen: BoolArray) -> _Pieces:
        return _Pieces(self.row[chosen], self.start[chosen], self.width[chosen], self.coefficients[chosen])


def _sign_changes(coefficients: FloatArray) -> IntArray:
    """Changes of sign along each row, zeros passed over."""
    signs = np.sign(coefficients)
    last = signs[:, 0]
    changes = np.zeros(len(signs), dtype=np.intp)
    for sign in signs.T[1:]:
        changes += sign * last < 0.0
        last = np.where(sign == 0.0, last, sign)
    return changes


def _roots_on_cuts(halves: _Pieces) -> Roots:
    """Where a polynomial was halved right at a root: neither half has a change of sign there."""
    left = len(halves.row) // 2
    cut = halves.only(np.append(halves.coefficients[:left, -1] == 0.0, np.zeros(left, dtype=np.bool_)))
    return Roots(cut.row, cut.start + cut.width)


def _halved(pieces: _Pieces, noise: FloatArray) -> _Pieces:
    left, right = _halving(pieces.coefficients.shape[1] - 1)
    halves = np.concatenate([pieces.coefficients @ left, pieces.coefficients @ right])
    row, width = np.tile(pieces.row, 2), np.tile(0.5 * pieces.width, 2)
    start = np.concatenate([pieces.start, pieces.start + 0.5 * pieces.width])
    halves[np.abs(halves) <= noise[row, np.newaxis]] = 0.0
    return _Pieces(row, start, width, halves)


def _single_roots(pieces: _Pieces) -> Roots:
    """The one root of each piece: Newton's step where it stays inside the bracket, else the middle."""
    b = pieces.coefficients
    slopes = np.diff(b, axis=-1) * (b.shape[1] - 1)
    rising = _first_sign(b) < 0.0
    low, high = np.zeros(len(b)), np.ones(len(b))
    place = np.full(len(b), 0.5)
    for _ in range(_STEPS if len(b) else 0):
        value = bernstein_values(b, place)
        before = (value < 0.0) == rising
        low, high = np.where(before, place, low), np.where(before, high, place)
        new = _next_place(place, value, bernstein_values(slopes, place), low, high)
        moved = float(np.max(np.abs(new - place)))
        place = new
        if moved < 1e-14:
            break
    return Roots(pieces.row, pieces.start + place * pieces.width)


def _next_place(
    place: FloatArray, value: FloatArray, slope: FloatArray, low: FloatArray, high: FloatArray
) -> FloatArray:
    step = np.divide(value, slope, out=np.full_like(value, np.inf), where=slope != 0.0)
    newton = np.where(value == 0.0, place, place - step)
    return np.where((newton >= low) & (newton <= high), newton, 0.5 * (low + high))


def _first_sign(coefficients: FloatArray) -> FloatArray:
    first = np.argmax(coefficients != 0.0, axis=-1)
    sign: FloatArray = np.sign(coefficients[np.arange(len(coefficients)), first])
    return sign


def bernstein_values(coefficients: FloatArray, place: FloatArray) -> FloatArray:
    """Each row (r, d + 1) at its own place 0…1 (r,)."""
    degree = coefficients.shape[1] - 1
    power = np.arange(degree + 1)
    s = place[:, np.newaxis]
    basis = _binomials(degree) * s**power * (1.0 - s) ** (degree - power)
    values: FloatArray = np.sum(basis * coefficients, axis=-1)
    return values


@lru_cache
def _binomials(degree: int) -> FloatArray:
    return frozen(np.array([comb(degree, i) for i in range(degree + 1)], dtype=np.float64))


@lru_cache
def _halving(degree: int) -> tuple[FloatArray, FloatArray]:
    """Matrices from the coefficients on 0…1 to those on each half (de Casteljau at the middle)."""
    left = np.array([[comb(j, i) / 2**j for j in range(degree + 1)] for i in range(degree + 1)])
    return frozen(left), frozen(np.ascontiguousarray(left[::-1, ::-1]))


@lru_cache
def bernstein_of_legendre(degree: int) -> FloatArray:
    """(d + 1, d + 1): row k holds the Bernstein coefficients of degree d of the Legendre polynomial k."""
    return _as_floats([_legendre(k, degree) for k in range(degree + 1)])


@lru_cache
def slope_of_legendre(degree: int) -> FloatArray:
    """(d + 1, d): row k holds the coefficients, of degree d − 1, of d/ds of the Legendre polynomial k."""
    rows = [[Fraction(0)] * degree]
    for k in range(1, degree + 1):
        terms = [[2 * (2 * j + 1) * b for b in _legendre(j, degree - 1)] for j in range(k - 1, -1, -2)]
        rows.append([sum(column, Fraction(0)) for column in zip(*terms, strict=True)])
    return _as_floats(rows)


@lru_cache
def product_with(degree: int, other: int) -> FloatArray:
    """(d + 1, o + 1, d + o + 1): the coefficients of each product of two Bernstein polynomials."""
    product = np.zeros((degree + 1, other + 1, degree + other + 1))
    for i in range(degree + 1):
        for j in range(other + 1):
            product[i, j, i + j] = comb(degree, i) * comb(other, j) / comb(degree + other, i + j)
    return frozen(product)


def _legendre(k: int, degree: int) -> list[Fraction]:
    """P_k = Σ (−1)^(k+i) C(k, i) B_i of degree k (s = 0…1), raised to the wanted degree."""
    own = [(-1) ** (k + i) * comb(k, i) for i in range(k + 1)]
    return [
        Fraction(sum(own[i] * comb(k, i) * _choose(degree - k, j - i) for i in range(k + 1)), comb(degree, j))
        for j in range(degree + 1)
    ]


def _choose(n: int, k: int) -> int:
    return comb(n, k) if 0 <= k <= n else 0


def _as_floats(rows: list[list[Fraction]]) -> FloatArray:
    return frozen(np.array([[float(value) for value in row] for row in rows]))
