"""Areas and outlines against the plain formula of each shape at every place along the segment."""

from __future__ import annotations

import math

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st
from numpy.testing import assert_allclose

from solver.model import AreaSection, RectangleSection, RoundSection, TubeSection, end_of
from solver.sections import area_at, area_coefficients, outline, part_of
from tests.strategies import sections

FRACTIONS = np.linspace(0.0, 1.0, 11)


def between(start, end, s):
    return start + (end_of(start, end) - start) * s


def plain_area(section, s):
    """The shape's own formula, with the dimensions at s."""
    match section:
        case AreaSection():
            return between(section.area, section.area_end, s)
        case RoundSection():
            return math.pi / 4 * between(section.diameter, section.diameter_end, s) ** 2
        case TubeSection():
            outer = between(section.outer, section.outer_end, s)
            inner = between(section.inner, section.inner_end, s)
            return math.pi / 4 * (outer**2 - inner**2)
        case RectangleSection():
            return between(section.width, section.width_end, s) * between(section.depth, section.depth_end, s)


@given(sections())
def test_area_follows_the_shapes_formula(section):
    coefficients = np.array(area_coefficients(section))
    # the plain tube formula itself loses a digit where the wall is thin (at least a tenth of the radius here)
    assert_allclose(area_at(coefficients, FRACTIONS), plain_area(section, FRACTIONS), rtol=1e-13)


@given(sections())
def test_coefficients_are_positive_so_that_nothing_cancels(section):
    assert min(area_coefficients(section)) > 0.0


@given(sections(), st.floats(0.0, 0.9), st.floats(0.01, 0.1))
def test_part_of_a_segment_has_the_same_area_there(section, start, width):
    coefficients = np.array([area_coefficients(section)])
    part = part_of(coefficients, np.array([start]), np.array([start + width]))
    assert_allclose(area_at(part, FRACTIONS), area_at(coefficients, start + width * FRACTIONS), rtol=1e-13)


@pytest.mark.parametrize("wall", [1e-6, 1e-9, 1e-12])
def test_thin_wall_keeps_its_digits(wall):
    inner = 0.1
    outer = inner + wall
    coefficients = area_coefficients(TubeSection(outer=outer, inner=inner))
    # π times wall thickness times mean diameter, with the wall as floating point holds it
    thickness = (outer - inner) / 2
    assert_allclose(coefficients, math.pi * thickness * (inner + thickness), rtol=1e-14)


@given(sections())
def test_prismatic_section_has_exactly_equal_coefficients(section):
    straight = type(section)(
        **{name: getattr(section, name) for name in section.__struct_fields__ if "_end" not in name}
    )
    assert len(set(area_coefficients(straight))) == 1


def test_outlines():
    assert outline(RoundSection(diameter=0.04, diameter_end=0.02), 0.5).outer == pytest.approx(0.015)
    tube = outline(TubeSection(outer=0.1, inner=0.08, inner_end=0.06), 1.0)
    assert (tube.outer, tube.inner) == pytest.approx((0.05, 0.03))
    rectangle = outline(RectangleSection(width=0.1, depth=0.2, depth_end=0.3), 1.0)
    assert (rectangle.outer, rectangle.inner) == pytest.approx((0.15, 0.0))
    bare = outline(AreaSection(area=math.pi), 0.3)
    assert (bare.outer, bare.inner) == pytest.approx((1.0, 0.0))
