"""Extremes of displacement, axial force and stress in every segment, and where they are: exact, not sampled.

On an element u and y are polynomials and the stress is σ = y / A. They are largest or smallest at the
element's ends or where u' = 0, y' = 0 and y' A − y A' = 0. These three polynomials are written in Bernstein
form and solved for their roots (`solver.roots`), all states and segments at once. The stress of a bonded part
is such a ratio as well (`solver.bonded`): y + C ΔT over its transformed area.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.polynomial import legendre

from solver.arrays import BoolArray, FloatArray, IntArray, frozen
from solver.bonded import Bonded, constraint
from solver.chain import Chain, Loads
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

    def __init__(
        self, chain: Chain, solution: Solution, loads: Loads, begins: FloatArray, ends: FloatArray
    ) -> None:
        """`begins` and `ends` (n,) are the positions x of the segments."""
        self._chain, self._solution, self._loads, self._begins, self._ends = (
            chain,
            solution,
            loads,
            begins,
            ends,
        )
        places = (solution.start, solution.end, begins, ends, chain.length)
        self._segments = _owners(solution.segment, *places)

    def displacement(self) -> Extremes:
        """Of u."""
        return self._segments.extremes(_polynomial(self._solution.displacement))

    def force(self) -> Extremes:
        """Of the axial force."""
        return self._segments.extremes(_polynomial(self._solution.force))

    def stress(self) -> Extremes:
        """Of the stress; where parts are bonded, of all parts (m, s) in the order of `Bonded`."""
        solution, bonded = self._solution, self._chain.bonded
        if bonded is None:
            area = part_of(self._chain.area[solution.segment], solution.start, solution.end)
            return self._segments.extremes(_ratio(solution.force, area, _size(solution.force)))
        return self._stress_of_parts(bonded)

    def _stress_of_parts(self, bonded: Bonded) -> Extremes:
        solution, of = self._solution, bonded.segment
        first = np.searchsorted(solution.segment, of, side="left")
        counts = np.searchsorted(solution.segment, of, side="right") - first
        part = np.repeat(np.arange(of.size), counts)
        element = np.arange(part.size) - np.repeat(np.cumsum(counts) - counts, counts) + first[part]
        start, end = solution.start[element], solution.end[element]
        begins, ends = self._begins[of], self._ends[of]
        owners = _owners(part, start, end, begins, ends, self._chain.length[of])
        force = solution.force[:, element]
        held = constraint(bonded, part, self._loads.temperature, start, end)
        size = _size(force) + _size(held)
        area = part_of(bonded.transformed[part], start, end)
        return owners.extremes(_ratio(_sum(force, held), area, size))


def _sum(one: FloatArray, other: FloatArray) -> FloatArray:
    """The sum of two series of coefficients (…, p), the shorter padded."""
    long, short = (one, other) if one.shape[-1] >= other.shape[-1] else (other, one)
    total = long.copy()
    total[..., : short.shape[-1]] += short
    return total


def _ratio(y: FloatArray, area: FloatArray, size: FloatArray) -> _Candidates:
    """Of y / A, y (m, e, q + 1) in Legendre form, A (e, 3); `size` (m, e) is that of what y is the sum of."""
    roots = roots_inside(*_flat(_stress_slopes(y, area), size * area.max(axis=-1)))
    forces = _candidates(y, roots)
    return _Candidates(
        forces.start / area[:, 0],
        forces.end / area[:, 2],
        forces.state,
        forces.element,
        forces.place,
        forces.value / area_at(area[forces.element], forces.place),
    )


def _polynomial(coefficients: FloatArray) -> _Candidates:
    slopes = coefficients @ slope_of_legendre(coefficients.shape[-1] - 1)
    return _candidates(coefficients, roots_inside(*_flat(slopes, _size(coefficients))))


def _candidates(coefficients: FloatArray, roots: Roots) -> _Candidates:
    state, element = np.divmod(roots.row, coefficients.shape[1])
    start, end = end_values(coefficients)
    basis = legendre.legvander(2.0 * roots.place - 1.0, coefficients.shape[-1] - 1)
    value = np.sum(coefficients[state, element] * basis, axis=-1)
    return _Candidates(start, end, state, element, roots.place, value)


@dataclass(frozen=True, slots=True)
class _Owners:
    """What extremes are sought of, segments or their parts (n,), and the elements (e,) of each in order."""

    owner: IntArray  # (e,)
    first: IntArray  # (n,) the first element of each
    start: FloatArray  # (e,) fractions of the segment
    end: FloatArray  # (e,)
    begins: FloatArray  # (n,) x
    ends: FloatArray  # (n,) x
    length: FloatArray  # (n,)

    def extremes(self, found: _Candidates) -> Extremes:
        """Largest and smallest of the candidates by owner, with their places."""
        largest, smallest = self._largest(found, 1.0), -self._largest(found, -1.0)
        whole = np.max(np.maximum(np.abs(largest), np.abs(smallest)), axis=1, keepdims=True)
        first, last = self.first, np.append(self.first[1:], len(self.owner)) - 1
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
        largest = np.maximum.reduceat(ends, self.first, axis=1)
        np.maximum.at(largest, (found.state, self.owner[found.element]), sign * found.value)
        return largest

    def _place(self, found: _Candidates, sign: float, largest: FloatArray, whole: FloatArray) -> FloatArray:
        """The smallest x whose value is the same as the largest, (m, n); next to nothing is nothing."""
        enough = largest - SAME * np.maximum(np.abs(largest), SAME * whole)
        by_element = enough[:, self.owner]
        s = self._earliest(sign * found.start >= by_element, sign * found.end >= by_element)
        hit = sign * found.value >= by_element[found.state, found.element]
        state, element = found.state[hit], found.element[hit]
        fraction = self._fraction(element, found.place[hit])
        np.minimum.at(s, (state, self.owner[element]), fraction)
        return self._x(s)

    def _earliest(self, at_start: BoolArray, at_end: BoolArray) -> FloatArray:
        s = np.where(at_start, self.start, np.where(at_end, self.end, np.inf))
        return np.minimum.reduceat(s, self.first, axis=1)

    def _fraction(self, element: IntArray, place: FloatArray) -> FloatArray:
        start, end = self.start[element], self.end[element]
        return start + place * (end - start)

    def _x(self, s: FloatArray) -> FloatArray:
        inside = self.begins + s * self.length
        return np.where(s >= 1.0, self.ends, np.minimum(inside, self.ends))


def _owners(
    owner: IntArray,
    start: FloatArray,
    end: FloatArray,
    begins: FloatArray,
    ends: FloatArray,
    length: FloatArray,
) -> _Owners:
    first = np.searchsorted(owner, np.arange(len(length)))
    return _Owners(owner, first, start, end, begins, ends, length)


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
