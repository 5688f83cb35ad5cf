"""The factor at a step from the fit of the chart: its inner checks, values read from it, and its range."""

from __future__ import annotations

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st
from msgspec import UNSET
from msgspec.structs import replace

from solver.model import BondedPart, RectangleSection, Shoulder, TubeSection
from solver.shoulders import LEAST_RATIO, MOST_RATIO, Step, notches
from tests.members import Part, area, member, round_bar

RATIOS = st.floats(LEAST_RATIO, MOST_RATIO)


def step(ratio: float, depth: float) -> Step:
    """A step with this h/r and 2h/D on a bar of 1 m."""
    height = 0.5 * depth
    return Step(1.0, 1.0 - depth, height / ratio)


@given(RATIOS)
def test_where_nothing_of_the_bar_is_left_the_coefficients_sum_to_one(ratio):
    # the chart's own end, 2h/D = 1, where the factor is 1: a slip in a coefficient is seen here
    assert sum(step(ratio, 0.5).coefficients) == pytest.approx(1.0, abs=0.025)


@given(st.floats(0.02, 0.98))
def test_the_two_ranges_of_the_fit_meet(depth):
    below, above = step(2.0, depth).factor, step(2.0 * (1 + 1e-12), depth).factor
    assert above == pytest.approx(below, rel=0.02)


@given(st.floats(1e-6, 0.01), RATIOS)
def test_a_very_low_step_has_the_factor_of_its_radius_alone(depth, ratio):
    root = math.sqrt(ratio)
    alone = 0.926 + 1.157 * root - 0.099 * ratio if ratio <= 2 else 1.2 + 0.86 * root - 0.022 * ratio
    assert step(ratio, depth).factor == pytest.approx(alone, rel=0.05)


@given(st.floats(0.05, 0.9), RATIOS, st.floats(1.1, 3.0))
def test_a_larger_radius_never_makes_it_worse(depth, ratio, times):
    other = ratio / times
    if other >= LEAST_RATIO:
        # where the ranges meet the fit itself steps by up to two per cent
        assert step(other, depth).factor <= step(ratio, depth).factor * 1.02


def test_by_hand():
    # D = 50, d = 40, r = 5: h/r = 1, 2h/D = 0.2
    found = Step(50.0, 40.0, 5.0)
    assert (found.height, found.ratio, found.depth) == (5.0, 1.0, 0.2)
    by_hand = 1.984 + -2.063 * 0.2 + 1.931 * 0.04 + -0.855 * 0.008
    assert found.factor == pytest.approx(by_hand, rel=1e-12)


def with_shoulder(shoulder, *sections, joint=1):
    project = member([Part(1.0, section) for section in sections], {})
    joints = list(project.joints)
    joints[joint] = replace(joints[joint], shoulder=shoulder)
    return replace(project, joints=tuple(joints))


FILLET = Shoulder(fillet_radius=0.002)
FACTOR = Shoulder(factor=2.5)


@pytest.mark.parametrize(
    ("sections", "segment", "at_start", "step"),
    [
        ((round_bar(0.05), round_bar(0.04)), 1, True, Step(0.05, 0.04, 0.002)),
        ((round_bar(0.04), round_bar(0.05)), 0, False, Step(0.05, 0.04, 0.002)),
        # what meets at the joint counts: the end of a taper, the start of the next
        ((round_bar(0.05, 0.03), round_bar(0.04)), 0, False, Step(0.04, 0.03, 0.002)),
        ((round_bar(0.03, 0.05), round_bar(0.045, 0.01)), 1, True, Step(0.05, 0.045, 0.002)),
    ],
)
def test_the_smaller_side_at_the_joint_is_the_one_that_is_notched(sections, segment, at_start, step):
    (notch,) = notches(with_shoulder(FILLET, *sections))
    assert (notch.joint, notch.segment, notch.at_start, notch.step) == (1, segment, at_start, step)
    assert notch.factor == step.factor
    assert notch.reason is None


def test_an_entered_factor_stands_for_any_section():
    tube = TubeSection(outer=0.05, inner=0.045)
    (notch,) = notches(with_shoulder(FACTOR, tube, area(1e-2)))
    assert (notch.factor, notch.segment, notch.step) == (2.5, 0, None)
    both = notches(with_shoulder(FACTOR, area(1e-3), area(1e-3)))
    assert [(n.segment, n.at_start, n.factor) for n in both] == [(0, False, 2.5), (1, True, 2.5)]


@pytest.mark.parametrize(
    ("shoulder", "sections", "joint", "reason"),
    [
        (FILLET, (round_bar(0.05), round_bar(0.05)), 1, "shoulder_no_step"),
        (FILLET, (round_bar(0.05), round_bar(0.04)), 0, "shoulder_at_end"),
        (FACTOR, (round_bar(0.05), round_bar(0.04)), 2, "shoulder_at_end"),
        (FILLET, (round_bar(0.05), area(1e-3)), 1, "shoulder_not_round"),
        (FILLET, (TubeSection(outer=0.05, inner=0.01), round_bar(0.04)), 1, "shoulder_not_round"),
        (FILLET, (RectangleSection(width=0.05, depth=0.01), round_bar(0.04)), 1, "shoulder_not_round"),
        (Shoulder(fillet_radius=0.06), (round_bar(0.05), round_bar(0.04)), 1, "shoulder_out_of_range"),
        (Shoulder(fillet_radius=0.0002), (round_bar(0.05), round_bar(0.04)), 1, "shoulder_out_of_range"),
    ],
)
def test_no_factor_is_made_up(shoulder, sections, joint, reason):
    (notch,) = notches(with_shoulder(shoulder, *sections, joint=joint))
    assert (notch.factor, notch.reason) == (None, reason)
    assert (notch.ratio is not None) == (reason == "shoulder_out_of_range")


@pytest.mark.parametrize("ratio", [LEAST_RATIO, MOST_RATIO])
def test_the_ends_of_the_range_belong_to_it(ratio):
    (notch,) = notches(with_shoulder(Shoulder(fillet_radius=0.005 / ratio), round_bar(0.05), round_bar(0.04)))
    assert notch.factor is not None


@pytest.mark.parametrize("side", [0, 1])
@pytest.mark.parametrize("shoulder", [FILLET, FACTOR])
def test_parts_bonded_together_have_no_known_factor(side, shoulder):
    project = with_shoulder(shoulder, round_bar(0.05), round_bar(0.04))
    segments = list(project.segments)
    part = BondedPart(segments[side].material, area(1e-3))
    segments[side] = replace(segments[side], bonded=(part,))
    (notch,) = notches(replace(project, segments=tuple(segments)))
    assert (notch.factor, notch.reason) == (None, "shoulder_bonded")


def test_a_member_without_shoulders_has_none():
    assert notches(with_shoulder(UNSET, round_bar(0.05), round_bar(0.04))) == ()
