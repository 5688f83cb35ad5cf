"""The member as a beam, and its division into elements on which bending stiffness and force are polynomials.

The elements follow those of the axial solution, so that each has one polynomial of N, and the stretches of
the segments, so that each has one of E I.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.polynomial import legendre

from solver.arrays import BoolArray, FloatArray, IntArray
from solver.second_moments import rigidity_at
from solver.solution import Solution


@dataclass(frozen=True, slots=True)
class Column:
    """n segments, n + 1 joints; r stretches of segments with one polynomial of bending stiffness each."""

    length: FloatArray  # (n,) m
    segment: IntArray  # (r,) never decreasing
    start: FloatArray  # (r,) as a fraction 0…1 of the segment
    rigidity: FloatArray  # (r, 5) E I in N m², Bernstein coefficients on the whole segment
    translation: FloatArray  # (n + 1,) N/m, infinite where held, 0 where free
    rotation: FloatArray  # (n + 1,) N m/rad, likewise


@dataclass(frozen=True, slots=True)
class BeamMesh:
    """e elements in chain order: parts of segments, each in one stretch and one element of the solution."""

    segment: IntArray  # (e,)
    start: FloatArray  # (e,) fractions of the segment
    end: FloatArray  # (e,)
    stretch: IntArray  # (e,)
    element: IntArray  # (e,) of the axial solution
    element_start: FloatArray  # (e,) where that starts, as a fraction of the segment
    element_end: FloatArray  # (e,)

    def length(self, column: Column) -> FloatArray:
        """(e,) m."""
        return np.asarray(column.length[self.segment] * (self.end - self.start))

    def joints(self) -> IntArray:
        """(n + 1,) the element ends, counted from 0, at which the joints lie."""
        return np.append(np.flatnonzero(np.diff(self.segment, prepend=-1)), self.segment.size)

    def fractions(self, points: FloatArray) -> FloatArray:
        """(e, g) points on −1…1 of each element as fractions of its segment."""
        middle, half = (self.start + self.end) / 2.0, (self.end - self.start) / 2.0
        return np.asarray(middle[:, None] + half[:, None] * points)

    def rigidity(self, column: Column, points: FloatArray) -> FloatArray:
        """(e, g) E I at the points of each element."""
        return rigidity_at(column.rigidity[self.stretch], self.fractions(points))

    def force(self, coefficients: FloatArray, points: FloatArray) -> FloatArray:
        """(e, g) the axial force of one state, from its Legendre coefficients on the solution's elements."""
        start, end = self.element_start[:, None], self.element_end[:, None]
        t = (2.0 * self.fractions(points) - start - end) / (end - start)
        values = legendre.legvander(t, coefficients.shape[-1] - 1)
        return np.asarray(np.einsum("egq,eq->eg", values, coefficients[self.element]))


def first_mesh(column: Column, solution: Solution) -> BeamMesh:
    """The coarsest division."""
    segment = np.concatenate([solution.segment, column.segment])
    start = np.concatenate([solution.start, column.start])
    places = np.unique(np.stack([segment.astype(np.float64), start], axis=1), axis=0)
    segment, start = places[:, 0].astype(np.intp), places[:, 1]
    is_last = np.append(np.diff(segment) > 0, True)
    end = np.where(is_last, 1.0, np.roll(start, -1))
    middle = segment + (start + end) / 2.0
    element = np.searchsorted(solution.segment + solution.start, middle) - 1
    return BeamMesh(
        segment=segment,
        start=start,
        end=end,
        stretch=np.searchsorted(column.segment + column.start, middle) - 1,
        element=element,
        element_start=solution.start[element],
        element_end=solution.end[element],
    )


def halved(mesh: BeamMesh, marked: BoolArray) -> BeamMesh:
    """With the marked elements (e,) in two halves."""
    copies = np.where(marked, 2, 1)
    of = np.repeat(np.arange(len(marked)), copies)
    start, end = mesh.start[of], mesh.end[of]
    first = np.flatnonzero(marked) + np.arange(np.count_nonzero(marked))
    end[first] = start[first + 1] = ((mesh.start + mesh.end) / 2.0)[marked]
    rest = (mesh.stretch[of], mesh.element[of], mesh.element_start[of], mesh.element_end[of])
    return BeamMesh(mesh.segment[of], start, end, *rest)
