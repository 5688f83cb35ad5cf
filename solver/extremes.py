"""Extremes of displacement, axial force and stress in every segment, and where they are: exact, not sampled.

On an element u and y are polynomials and the stress is σ = y / A. They are largest or smallest at the
element's ends or where u' = 0, y' = 0 and y' A − y A' = 0. These three polynomials are written in Bernstein
form and solved for their roots (`solver.roots`), all states and segments at once.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.polynomial import legendre

from solver.arrays import BoolArray, FloatArray, IntArray, frozen
from solver.chain import Chain
from solver.roots import Roots, bernstein_of_legendre, product_with, roots_inside, slope_of_legendre
from solver.sections import area_at, part_of
from solver.solution import Solution

SAME = 1e-9  # places whose value is within this part of the extreme count as equal: the smallest x is taken
_NOISE = 1e-13  # a slope up to this part of the element's largest value is rounding

_NEXT_TO_NOTHING = 1e-290  # here products of small numbers have lost their digits


@dataclass(frozen=True, slots=True)
class Extremes:
    """Largest and smallest value in each segment with its place, all (m, n); `start`, `end` are the ends'."""

    start: FloatArray
    end: FloatArray
    largest: FloatArray
    largest_at: FloatArray
    smallest: FloatArray
    smallest_at: FloatArray


@dataclass(frozen=True, slots=True)
class _Candidates:
    """Values where an extreme may be: at the elements' ends (m, e), and at k further places inside."""

    start: FloatArray  # (m, e)
    end: FloatArray  # (m, e)
    state: IntArray  # (k,)
    element: IntArray  # (k,)
    place: FloatArray  # (k,) fraction 0…1 of the element
    value: FloatArray  # (k,)


class ExtremeFinder:
    """Finds the extremes on one solution; holds what all three quantities need."""

    def __init__(self, chain: Chain, solution: Solution, position: FloatArray) -> None:
        self._solution = solution
        self._position = position
        self._length = chain.length
        self._first = np.searchsorted(solution.segment, np.arange(len(chain.length)))
        self._area = part_of(chain.area[solution.segment], solution.start, solution.end)

    def displacement(self) -> Extremes:
        """Of u."""
        return self._extremes(self._polynomial(self._solution.displacement))

    def force(self) -> Extremes:
        """Of the axial force."""
        return self._extremes(self._polynomial(self._solution.force))

    def stress(self) -> Extremes:
        """Of the stress."""
        y = self._solution.force
        roots = roots_inside(*_flat(_stress_slopes(y, self._area), _size(y) * self._area.max(axis=-1)))
        forces = self._candidates(y, roots)
        area = self._area
        return self._extremes(
            _Candidates(
                forces.start / area[:, 0],
                forces.end / area[:, 2],
                forces.state,
                forces.element,
                forces.place,
                forces.value / area_at(area[forces.element], forces.place),
            )
        )

    def _polynomial(self, coefficients: FloatArray) -> _Candidates:
        slopes = coefficients @ slope_of_legendre(coefficients.shape[-1] - 1)
        return self._candidates(coefficients, roots_inside(*_flat(slopes, _size(coefficients))))

    def _candidates(self, coefficients: FloatArray, roots: Roots) -> _Candidates:
        state, element = np.divmod(roots.row, coefficients.shape[1])
        start, end = end_values(coefficients)
        basis = legendre.legvander(2.0 * roots.place - 1.0, coefficients.shape[-1] - 1)
        value = np.sum(coefficients[state, element] * basis, axis=-1)
        return _Candidates(start, end, state, element, roots.place, value)

    def _extremes(self, found: _Candidates) -> Extremes:
        largest, smallest = self._largest(found, 1.0), -self._largest(found, -1.0)
        whole = np.max(np.maximum(np.abs(largest), np.abs(smallest)), axis=1, keepdims=True)
        first, last = self._first, np.append(self._first[1:], len(self._solution.segment)) - 1
        arrays = (
            found.start[:, first],
            found.end[:, last],
            largest,
            self._place(found, 1.0, largest, whole),
            smallest,
            self._place(found, -1.0, -smallest, whole),
        )
        return Extremes(*map(frozen, arrays))

    def _largest(self, found: _Candidates, sign: float) -> FloatArray:
        """The largest of sign times the values, (m, n)."""
        ends = np.maximum(sign * found.start, sign * found.end)
        largest = np.maximum.reduceat(ends, self._first, axis=1)
        np.maximum.at(largest, (found.state, self._solution.segment[found.element]), sign * found.value)
        return largest

    def _place(self, found: _Candidates, sign: float, largest: FloatArray, whole: FloatArray) -> FloatArray:
        """The smallest x whose value is the same as the largest, (m, n); next to nothing is nothing."""
        enough = largest - SAME * np.maximum(np.abs(largest), SAME * whole)
        by_element = enough[:, self._solution.segment]
        s = self._earliest(sign * found.start >= by_element, sign * found.end >= by_element)
        hit = sign * found.value >= by_element[found.state, found.element]
        state, element = found.state[hit], found.element[hit]
        fraction = self._fraction(element, found.place[hit])
        np.minimum.at(s, (state, self._solution.segment[element]), fraction)
        return self._x(s)

    def _earliest(self, at_start: BoolArray, at_end: BoolArray) -> FloatArray:
        solution = self._solution
        s = np.where(at_start, solution.start, np.where(at_end, solution.end, np.inf))
        return np.minimum.reduceat(s, self._first, axis=1)

    def _fraction(self, element: IntArray, place: FloatArray) -> FloatArray:
        start, end = self._solution.start[element], self._solution.end[element]
        return start + place * (end - start)

    def _x(self, s: FloatArray) -> FloatArray:
        inside = self._position[:-1] + s * self._length
        return np.where(s >= 1.0, self._position[1:], np.minimum(inside, self._position[1:]))


def end_values(coefficients: FloatArray) -> tuple[FloatArray, FloatArray]:
    """Legendre sums (…, q + 1) at the start and at the end of their elements."""
    even = np.sum(coefficients[..., 0::2], axis=-1)
    odd = np.sum(coefficients[..., 1::2], axis=-1)
    return even - odd, even + odd


def _size(coefficients: FloatArray) -> FloatArray:
    size: FloatArray = np.sum(np.abs(coefficients), axis=-1)
    return size


def _flat(slopes: FloatArray, size: FloatArray) -> tuple[FloatArray, FloatArray]:
    return slopes.reshape(-1, slopes.shape[-1]), _NOISE * size.reshape(-1) + _NEXT_TO_NOTHING


def _stress_slopes(y: FloatArray, area: FloatArray) -> FloatArray:
    """y' A − y A' in Bernstein form, (m, e, q + 2), y of degree q in Legendre form, A in Bernstein form."""
    q = y.shape[-1] - 1
    steps = 2.0 * np.diff(area, axis=-1)
    rising = np.einsum("kb,ea,bac->ekc", slope_of_legendre(q), area, product_with(q - 1, 2), optimize=True)
    thinning = np.einsum("kb,ea,bac->ekc", bernstein_of_legendre(q), steps, product_with(q, 1), optimize=True)
    slopes: FloatArray = np.einsum("mek,ekc->mec", y, rising - thinning, optimize=True)
    return slopes
