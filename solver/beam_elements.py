"""Beam elements in bending: cubic Hermite functions, and beyond them bubbles that vanish at both ends.

On t = −1…1 the deflection w of an element is known from its strains: half the difference of its ends' w, and
the Legendre coefficients of d²w/dt². The first two of these come from the deflections and rotations of the
ends (the cubic), each further one is a bubble of its own. Everything is computed from the strains: they are
differences, in which a long chain of short elements keeps the digits that the sums of its matrix lose.

The unknowns are ordered along the axis: w and slope of an end, then the element's bubbles, then the next end,
so that an element's unknowns stand together and all matrices are banded.
"""

from __future__ import annotations

from dataclasses import dataclass
from functools import cache

import numpy as np
from numpy.polynomial import legendre

from solver.arrays import FloatArray, IntArray, frozen

OF_END = 2  # unknowns at an end: deflection and slope


@dataclass(frozen=True, slots=True)
class Reference:
    """Arrays of degree p ≥ 3; g points. The p strains: half the difference of w, then p − 1 of curvature."""

    points: FloatArray  # (g,) on −1…1
    weights: FloatArray  # (g,)
    curvature: FloatArray  # (p, g) d²w/dt² of each strain
    slope: FloatArray  # (p, g) dw/dt of each strain


def bubbles(degree: int) -> int:
    """How many unknowns an element has inside."""
    return degree - 3


def step(degree: int) -> int:
    """From an end's first unknown to the next end's."""
    return OF_END + bubbles(degree)


@cache
def reference(degree: int, force_degree: int) -> Reference:
    """The arrays for deflections of one degree and axial forces up to another; integrals are exact."""
    count = degree + 1 + max(0, force_degree - 1) // 2
    points, weights = legendre.leggauss(count)
    slopes = slope_coefficients(degree)
    curvatures = np.array([legendre.legder(row) for row in slopes])
    return Reference(
        points=frozen(points),
        weights=frozen(weights),
        curvature=frozen(curvatures @ legendre.legvander(points, degree - 2).T),
        slope=frozen(slopes @ legendre.legvander(points, degree - 1).T),
    )


@cache
def slope_coefficients(degree: int) -> FloatArray:
    """(p, p): the Legendre coefficients of dw/dt of each strain."""
    slopes = np.zeros((degree, degree))
    slopes[0, 0] = 1.0
    for n in range(degree - 1):
        slopes[n + 1, n + 1] = 1.0 / (2 * n + 1)
        if n > 1:
            slopes[n + 1, n - 1] = -1.0 / (2 * n + 1)
    return frozen(slopes)


def strains_of(unknowns: FloatArray, length: FloatArray, degree: int) -> FloatArray:
    """(e, p) the strains of each element, from all unknowns (N,) in their order."""
    width = step(degree)
    ends = np.stack([unknowns[0::width], unknowns[1::width]])
    deflection, slope = ends[0], ends[1]
    turn = length / 2.0
    difference = 0.5 * np.diff(deflection)
    strains = np.empty((len(length), degree))
    strains[:, 0] = difference
    strains[:, 1] = 0.5 * turn * np.diff(slope)
    strains[:, 2] = 1.5 * (turn * (slope[1:] + slope[:-1]) - 2.0 * difference)
    for k in range(bubbles(degree)):
        strains[:, 3 + k] = unknowns[2 + k :: width][: len(length)]
    return strains


def raised(unknowns: FloatArray, degree: int, higher: int) -> FloatArray:
    """The same deflection in a higher degree: what is new is zero."""
    count = (len(unknowns) - OF_END) // step(degree)
    fresh = np.zeros((count + 1, step(higher)))
    fresh[:count, : step(degree)] = unknowns[:-OF_END].reshape(count, -1)
    fresh[count, :OF_END] = unknowns[-OF_END:]
    return np.ascontiguousarray(fresh.ravel()[: count * step(higher) + OF_END])


def strain_matrix(length: FloatArray, degree: int) -> FloatArray:
    """(e, p, p + 1): the strains of each element from its own unknowns."""
    turn = length / 2.0
    matrix = np.zeros((len(length), degree, degree + 1))
    end = degree - 1  # the first unknown of the far end
    matrix[:, 0, 0], matrix[:, 0, end] = -0.5, 0.5
    matrix[:, 1, 1], matrix[:, 1, end + 1] = -0.5 * turn, 0.5 * turn
    matrix[:, 2, 0], matrix[:, 2, end] = 1.5, -1.5
    matrix[:, 2, 1] = matrix[:, 2, end + 1] = 1.5 * turn
    for k in range(bubbles(degree)):
        matrix[:, 3 + k, 2 + k] = 1.0
    return matrix


def banded(elements: FloatArray, degree: int) -> FloatArray:
    """The matrices (…, e, p + 1, p + 1) of elements summed into one, its lower band (…, p + 1, N)."""
    size, width = degree + 1, step(degree)
    count = elements.shape[-3]
    band = np.zeros((*elements.shape[:-3], size, count * width + OF_END))
    first: IntArray = width * np.arange(count)
    for column in range(size):
        below = np.moveaxis(elements[..., column:, column], -2, -1)
        band[..., : size - column, first + column] += below
    return band
