"""Curves, envelope and single positions: exact at joints and extremes, within budget, equal everywhere."""

from __future__ import annotations

import math

import numpy as np
import pytest
from hypothesis import given
from msgspec import structs
from numpy.testing import assert_allclose, assert_array_equal

from solver.fields import at, checked_states, curves, envelope, envelope_at
from solver.model import Combination, FixedSupport, JointLoad, Project, SegmentLoad
from solver.sampling import FINENESS
from solver.solve import solve
from tests.drawn_members import busy_member
from tests.members import Part, area, case, member, round_bar, segment_mark
from tests.strategies import projects

SMALL = area(1e-3)
LARGE = area(2e-3)
NAMES = ("displacement", "force", "stress")


def stepped(**allowables):
    return [Part(1.0, LARGE, **allowables), Part(2.0, SMALL, **allowables)]


PULL = case("Pull", on_joints=[JointLoad("2", force=40e3)])
PUSH = case("Push", on_joints=[JointLoad("2", force=-30e3)])
HELD = {0: FixedSupport()}


def test_both_sides_of_a_shoulder():
    results = solve(member(stepped(), HELD, [PULL]))
    readout = at(results, 0, 1.0)
    assert (readout.left.segment, readout.right.segment) == (0, 1)
    assert_allclose([readout.left.stress, readout.right.stress], [20e6, 40e6], rtol=1e-12)
    assert_allclose(readout.left.displacement, readout.right.displacement, rtol=1e-12)
    assert_allclose(readout.left.displacement, 40e3 / (2.1e11 * 2e-3), rtol=1e-12)


def test_inside_a_segment_both_sides_are_equal_and_beyond_the_ends_there_is_nothing():
    results = solve(member(stepped(), HELD, [PULL]))
    inside = at(results, 0, 0.7)
    assert inside.left == inside.right
    assert (at(results, 0, 0.0).left, at(results, 0, 3.0).right) == (None, None)
    assert at(results, 0, 0.0).right.segment == 0
    assert at(results, 0, 3.0).left.segment == 1
    for beyond in (-0.1, 3.1):
        assert (at(results, 0, beyond).left, at(results, 0, beyond).right) == (None, None)


# Curves go through the place of an extreme, the smallest x whose value is within 1e-9 of it.
SAME_PLACE = 1.001e-9


@given(projects())
def test_curves_pass_through_ends_and_extremes(project):
    results = solve(project)
    segments = results.segments
    for state in range(len(results.states)):
        found = curves(results, state)
        for name in NAMES:
            values = getattr(found, name)
            scale = np.max(np.abs(values))
            for index in range(len(project.segments)):
                own = values[found.segment == index]
                near = SAME_PLACE * scale
                assert_allclose(own.max(), getattr(segments, f"{name}_max")[state, index], rtol=0, atol=near)
                assert_allclose(own.min(), getattr(segments, f"{name}_min")[state, index], rtol=0, atol=near)
        first = np.searchsorted(found.segment, np.arange(len(project.segments)))
        last = np.searchsorted(found.segment, np.arange(len(project.segments)), side="right") - 1
        assert_array_equal(found.x[first], results.position[:-1])
        assert_array_equal(found.x[last], results.position[1:])
        tiny = 1e-14 * np.max(np.abs(found.force))  # sums in another order
        assert_allclose(found.force[first], segments.force_start[state], rtol=1e-14, atol=tiny)
        assert_allclose(found.force[last], segments.force_end[state], rtol=1e-14, atol=tiny)


@given(projects())
def test_a_curve_is_ordered_and_keeps_its_budget(project):
    results = solve(project)
    found = curves(results, 0, points=100)
    assert len(found.x) <= 100
    assert len(found.x) > 60
    assert np.all(np.diff(found.x) >= 0)
    assert np.all(np.diff(found.segment) >= 0)


@given(projects())
def test_a_curve_and_a_single_position_agree(project):
    results = solve(project)
    found = curves(results, 0, points=40)
    for k in range(len(found.x)):
        readout = at(results, 0, float(found.x[k]))
        sides = [side for side in (readout.left, readout.right) if side is not None]
        side = next(side for side in sides if side.segment == found.segment[k])
        for name in NAMES:
            scale = np.max(np.abs(getattr(found, name)))
            assert_allclose(getattr(side, name), getattr(found, name)[k], rtol=0, atol=1e-11 * scale)


@given(projects())
def test_the_envelope_is_the_largest_and_smallest_of_the_states(project):
    results = solve(project)
    states = checked_states(results)
    found = envelope(results, points=60)
    sides = []
    for k, x in enumerate(found.x):
        readouts = [at(results, state, float(x)) for state in states]
        first = readouts[0].left is not None and readouts[0].left.segment == found.segment[k]
        sides.append([readout.left if first else readout.right for readout in readouts])
    for name in NAMES:
        values = np.array([[getattr(side, name) for side in row] for row in sides])
        largest, smallest = getattr(found, f"{name}_max"), getattr(found, f"{name}_min")
        near = 1e-11 * np.max(np.abs([largest, smallest]))  # x found again as a fraction loses digits
        assert_allclose(largest, values.max(axis=1), rtol=1e-9, atol=near)
        assert_allclose(smallest, values.min(axis=1), rtol=1e-9, atol=near)
        assert np.isin(getattr(found, f"{name}_max_state"), states).all()


@given(projects())
def test_the_envelope_passes_through_the_extremes_of_all_checked_states(project):
    results = solve(project)
    states = checked_states(results)
    found = envelope(results)
    for name in NAMES:
        largest = getattr(results.segments, f"{name}_max")[states].max(axis=0)
        smallest = getattr(results.segments, f"{name}_min")[states].min(axis=0)
        near = SAME_PLACE * np.max(np.abs([largest, smallest]))
        for index in range(len(project.segments)):
            own = found.segment == index
            assert_allclose(getattr(found, f"{name}_max")[own].max(), largest[index], rtol=0, atol=near)
            assert_allclose(getattr(found, f"{name}_min")[own].min(), smallest[index], rtol=0, atol=near)


def test_the_envelope_names_the_state_that_governs():
    both = [Combination("Pulled", {"Pull": 1.0}), Combination("Pushed", {"Push": 1.0})]
    results = solve(
        member(stepped(allowable_tension=1e8, allowable_compression=5e7), HELD, [PULL, PUSH], both)
    )
    found = envelope(results)
    assert set(found.stress_max_state) == {0}
    assert set(found.stress_min_state) == {1}
    # 40 of 100 MPa pulled against 30 of 50 MPa pushed
    assert set(found.utilisation_state[found.segment == 1]) == {1}
    assert_allclose(found.utilisation[found.segment == 1], 0.6, rtol=1e-12)
    here = envelope_at(results, 1.0)
    assert here.left.utilisation == pytest.approx(0.3)
    assert here.right.utilisation == pytest.approx(0.6)
    assert (here.right.utilisation_state, here.right.stress_max_state) == (1, 0)


def test_cases_alone_are_not_in_the_envelope_where_there_are_combinations():
    results = solve(member(stepped(), HELD, [PULL, PUSH], [Combination("Little", {"Pull": 0.01})]))
    assert_allclose(envelope(results).force_max.max(), 400.0, rtol=1e-12)
    assert envelope(results).force_min.min() > 0


def test_utilisation_is_missing_where_the_allowable_is():
    results = solve(member(stepped(allowable_tension=1e8), HELD, [PULL, PUSH]))
    assert_allclose(curves(results, 0).utilisation[-1], 0.4, rtol=1e-12)
    assert np.all(np.isnan(curves(results, 1).utilisation))
    found = envelope(results)
    assert_allclose(found.utilisation[-1], 0.4, rtol=1e-12)
    only_pushed = solve(member(stepped(allowable_tension=1e8), HELD, [PUSH]))
    assert set(envelope(only_pushed).utilisation_state) == {-1}
    assert np.all(np.isnan(envelope(only_pushed).utilisation))


def test_no_stress_is_no_utilisation_rather_than_none():
    results = solve(member(stepped(allowable_tension=1e8), HELD))
    assert_array_equal(curves(results, 0).utilisation, 0.0)


def test_factor_scales_the_allowable_of_the_curve():
    results = solve(
        member(stepped(allowable_tension=1e8), HELD, [PULL], [Combination("Rare", {"Pull": 1.0}, 1.25)])
    )
    assert_allclose(curves(results, 0).utilisation[-1], 0.32, rtol=1e-12)


@pytest.mark.parametrize("count", [40, 500])
def test_many_segments_keep_both_ends_of_each(count):
    parts = [Part(0.5, round_bar(0.04, 0.05), density=7850.0) for _ in range(count)]
    loads = [
        SegmentLoad(segment_mark(i), load_start=math.sin(i) * 1e4, load_end=math.cos(i) * 1e4)
        for i in range(count)
    ]
    results = solve(
        member(parts, {0: FixedSupport(), count: FixedSupport()}, [case(gravity=9.81, on_segments=loads)])
    )
    found = curves(results, 0)
    assert np.all(np.bincount(found.segment, minlength=count) >= 2)
    assert len(found.x) <= max(600, 2 * count + 6 * min(count, FINENESS * 600))
    for name in NAMES:  # the extremes of the whole member are on it at any budget
        assert_allclose(
            getattr(found, name).max(), getattr(results.segments, f"{name}_max").max(), rtol=1e-11
        )


def test_curves_cannot_be_written_to():
    found = curves(solve(member(stepped(), HELD, [PULL])), 0)
    with pytest.raises(ValueError, match="read-only"):
        found.stress[0] = 0.0


CLOSE = 1e-3  # of the member that a close look shows


@pytest.mark.parametrize("where", [0.0, 0.31, 0.62, 1.0 - CLOSE])
@pytest.mark.parametrize("count", [3, 9000])
def test_a_window_that_is_looked_at_closely_has_points_of_its_own(where, count):
    results = solve(close_member(count))
    total = float(results.position[-1])
    near = where * total, (where + CLOSE) * total
    shown, plain = curves(results, 0, near=near), curves(results, 0)
    inside = (shown.x >= near[0]) & (shown.x <= near[1])
    assert inside.sum() >= 500
    assert len(shown.x) <= len(plain.x) + 2000
    middle = 0.5 * (shown.x[inside][1:] + shown.x[inside][:-1])[::40]
    for x in middle:
        left = at(results, 0, float(x)).left
        low, high = plain.force.min(), plain.force.max()
        drawn = np.interp(x, shown.x, shown.force)
        assert drawn == pytest.approx(left.force, abs=1e-4 * (high - low))


@pytest.mark.parametrize("count", [3, 9000])
def test_points_of_a_window_go_nowhere_beyond_the_extremes(count):
    results = solve(close_member(count))
    total = float(results.position[-1])
    for near in ((0.2 * total, 0.4 * total), (2.0 * total, 3.0 * total)):
        shown, plain = envelope(results, near=near), envelope(results)
        assert np.all(np.diff(shown.x) >= 0.0)
        assert set(plain.x.tolist()) <= set(shown.x.tolist())
        for name in ("displacement_max", "force_max", "stress_max"):
            assert getattr(shown, name).max() == pytest.approx(getattr(plain, name).max(), rel=1e-12)


def close_member(count: int) -> Project:
    """Bedded so hard that forces fade within a small part of the member, with a load on every segment."""
    project = busy_member(count)
    cases = tuple(structs.replace(case, joint_loads=case.joint_loads[:200]) for case in project.load_cases)
    segments = tuple(structs.replace(s, length=300.0 / count, bedding=1e8) for s in project.segments)
    both = (Combination("both", {case.name: 1.0 for case in cases[:2]}),)
    return structs.replace(project, segments=segments, load_cases=cases[:2], combinations=both)
