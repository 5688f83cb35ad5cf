"""Second moments of sections along a segment, for bending about the weaker axis.

Every dimension is linear along the segment, so every second moment is a polynomial of degree four at most.
It is held by its Bernstein coefficients, which are products of dimensions and so all positive, as areas are
in `solver.sections`. A rectangle whose width and depth change places along the segment bends about the one
axis before and about the other behind that place: two polynomials, and the smaller counts everywhere, as
though the weak planes of all sections lay in one plane, which is on the safe side.
"""

from __future__ import annotations

import math
from itertools import pairwise
from typing import TypeAlias

import numpy as np
from msgspec import UnsetType

from solver.arrays import FloatArray
from solver.model import AnySection, AreaSection, RectangleSection, RoundSection, TubeSection, end_of

Ends: TypeAlias = tuple[float, float]  # a linear dimension at start and end
DEGREE = 4
_BINOMIALS = np.array([math.comb(DEGREE, i) for i in range(DEGREE + 1)], dtype=np.float64)


def second_moment(section: AnySection, s: float = 0.0) -> FloatArray | None:
    """The five Bernstein coefficients (m⁴) of the second moment that is the smaller one at the fraction s.

    None where only the area is known.
    """
    match section:
        case AreaSection():
            return _of_area(section)
        case RoundSection():
            diameter = section.diameter, end_of(section.diameter, section.diameter_end)
            return _product(math.pi / 64, diameter, diameter, diameter, diameter)
        case TubeSection():
            return _of_tube(section)
        case RectangleSection():
            width, depth = _sides(section)
            if _at(width, s) < _at(depth, s):
                width, depth = depth, width
            return _product(1 / 12, width, depth, depth, depth)


def turning_place(section: AnySection) -> float | None:
    """The fraction of the segment at which the weaker axis of a rectangle becomes the other one."""
    if not isinstance(section, RectangleSection):
        return None
    width, depth = _sides(section)
    start, end = width[0] - depth[0], width[1] - depth[1]
    return start / (start - end) if start * end < 0.0 else None


def rigidity_at(coefficients: FloatArray, s: FloatArray) -> FloatArray:
    """The polynomials (…, 5) at the fractions s (…, g) of their segments."""
    power = np.arange(DEGREE + 1)
    at = s[..., np.newaxis]
    basis = _BINOMIALS * at**power * (1.0 - at) ** (DEGREE - power)
    values: FloatArray = np.einsum("...gk,...k->...g", basis, coefficients)
    return values


def _of_area(section: AreaSection) -> FloatArray | None:
    if isinstance(section.second_moment, UnsetType):
        return None
    start = section.second_moment
    return np.linspace(start, end_of(start, section.second_moment_end), DEGREE + 1)


def _of_tube(section: TubeSection) -> FloatArray:
    """π/64 (outer⁴ − inner⁴) as wall times the rest, so that a thin wall keeps its digits."""
    outer = section.outer, end_of(section.outer, section.outer_end)
    inner = section.inner, end_of(section.inner, section.inner_end)
    wall = outer[0] - inner[0], outer[1] - inner[1]
    both = outer[0] + inner[0], outer[1] + inner[1]
    factor = math.pi / 64
    return _product(factor, wall, both, outer, outer) + _product(factor, wall, both, inner, inner)


def _sides(section: RectangleSection) -> tuple[Ends, Ends]:
    width = section.width, end_of(section.width, section.width_end)
    return width, (section.depth, end_of(section.depth, section.depth_end))


def _at(ends: Ends, s: float) -> float:
    return (1.0 - s) * ends[0] + s * ends[1]


def _product(factor: float, *linear: Ends) -> FloatArray:
    """The Bernstein coefficients of a factor times four linear dimensions."""
    scaled = np.array([factor])
    for ends in linear:
        scaled = np.convolve(scaled, ends)
    return np.asarray(scaled / _BINOMIALS)


def stretches(sections: tuple[AnySection, ...]) -> tuple[tuple[float, float], ...]:
    """The parts of a segment, as fractions, on which all its second moments are polynomials."""
    turns = {place for section in sections if (place := turning_place(section)) is not None}
    return tuple(pairwise(sorted({0.0, 1.0, *turns})))
