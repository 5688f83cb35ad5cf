"""Areas and outlines of sections along a segment.

Every dimension is linear along the segment, so every area is at most quadratic. It is held by its Bernstein
coefficients, which are products of start and end dimensions and therefore all positive: a convex combination
of them cannot cancel, however thin the taper or the wall. The power basis was rejected for that reason.
"""

from __future__ import annotations

import math
from dataclasses import dataclass
from functools import lru_cache
from typing import TypeAlias

import numpy as np

from solver.arrays import FloatArray
from solver.model import AnySection, AreaSection, RectangleSection, RoundSection, TubeSection, end_of

Coefficients: TypeAlias = tuple[float, float, float]


@dataclass(frozen=True, slots=True)
class Outline:
    """What the drawing shows of a section: distances from the axis in m; `inner` is 0 where it is solid."""

    outer: float
    inner: float


def area_coefficients(section: AnySection) -> Coefficients:
    """The area's Bernstein coefficients in m²: A(s) = a₀(1−s)² + 2a₁s(1−s) + a₂s² for s = 0…1."""
    match section:
        case AreaSection():
            return _linear(section.area, end_of(section.area, section.area_end))
        case RoundSection():
            return _round(section.diameter, end_of(section.diameter, section.diameter_end))
        case TubeSection():
            return _tube(section)
        case RectangleSection():
            return _rectangle(section)


def _linear(start: float, end: float) -> Coefficients:
    return start, 0.5 * start + 0.5 * end, end


def _round(start: float, end: float) -> Coefficients:
    quarter = math.pi / 4
    return quarter * start * start, quarter * start * end, quarter * end * end


def _tube(section: TubeSection) -> Coefficients:
    """π/4 (outer² − inner²) as wall times mean diameter, so that a thin wall keeps its digits."""
    outer, outer_end = section.outer, end_of(section.outer, section.outer_end)
    inner, inner_end = section.inner, end_of(section.inner, section.inner_end)
    wall, wall_end = outer - inner, outer_end - inner_end
    both, both_end = outer + inner, outer_end + inner_end
    quarter = math.pi / 4
    middle = 0.5 * (wall * both_end + wall_end * both)
    return quarter * (wall * both), quarter * middle, quarter * (wall_end * both_end)


def _rectangle(section: RectangleSection) -> Coefficients:
    width, width_end = section.width, end_of(section.width, section.width_end)
    depth, depth_end = section.depth, end_of(section.depth, section.depth_end)
    return width * depth, 0.5 * (width * depth_end + width_end * depth), width_end * depth_end


def area_at(coefficients: FloatArray, s: FloatArray) -> FloatArray:
    """The area in m² at the fraction s = 0…1; coefficients (…, 3) broadcast against s (…)."""
    r = 1.0 - s
    area: FloatArray = (
        coefficients[..., 0] * r * r + 2.0 * coefficients[..., 1] * r * s + coefficients[..., 2] * s * s
    )
    return area


def part_of(coefficients: FloatArray, start: FloatArray, end: FloatArray) -> FloatArray:
    """The coefficients (…, 3) of the same area on the part start…end of its segment (the blossom)."""

    def blossom(s: FloatArray, t: FloatArray) -> FloatArray:
        middle = (1.0 - s) * t + s * (1.0 - t)
        value: FloatArray = (
            coefficients[..., 0] * (1.0 - s) * (1.0 - t)
            + coefficients[..., 1] * middle
            + coefficients[..., 2] * s * t
        )
        return value

    return np.stack([blossom(start, start), blossom(start, end), blossom(end, end)], axis=-1)


@lru_cache(4096)  # a drawing asks for the same ones several times, and again at every edit
def outline(section: AnySection, s: float) -> Outline:
    """The outline at the fraction s = 0…1; a bare area is drawn as the round bar of that area."""
    match section:
        case AreaSection():
            area = _between(section.area, end_of(section.area, section.area_end), s)
            return Outline(math.sqrt(area / math.pi), 0.0)
        case RoundSection():
            return Outline(
                _between(section.diameter, end_of(section.diameter, section.diameter_end), s) / 2, 0.0
            )
        case TubeSection():
            outer = _between(section.outer, end_of(section.outer, section.outer_end), s)
            inner = _between(section.inner, end_of(section.inner, section.inner_end), s)
            return Outline(outer / 2, inner / 2)
        case RectangleSection():
            return Outline(_between(section.depth, end_of(section.depth, section.depth_end), s) / 2, 0.0)


def _between(start: float, end: float, s: float) -> float:
    return (1.0 - s) * start + s * end
