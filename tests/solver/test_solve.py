"""The door: results come out in one piece, refusals name what they concern, and nothing can be written to."""

from __future__ import annotations

import math

import numpy as np
import pytest
from hypothesis import given
from msgspec import UNSET
from msgspec.structs import replace
from numpy.testing import assert_allclose

from solver.errors import Cancelled, InputError, NotSolvable, OutOfRange
from solver.model import Combination, FixedSupport, Joint, JointLoad, SegmentLoad, StopSupport
from solver.solve import solve
from tests.members import Part, area, case, member, round_bar
from tests.strategies import projects

PARTS = [Part(1.0, round_bar(0.04, 0.02), density=7850.0), Part(2.0, area(1e-3), density=2700.0)]
HELD = {0: FixedSupport()}
PULL = case("Pull", on_joints=[JointLoad("2", force=1e3)])


def test_results_carry_the_project_and_its_positions_and_mass():
    project = member(PARTS, HELD, [PULL])
    results = solve(project)
    assert results.project is project
    assert_allclose(results.position, [0.0, 1.0, 3.0])
    frustum = math.pi / 12 * (0.04**2 + 0.04 * 0.02 + 0.02**2)
    assert_allclose(results.mass, 7850.0 * frustum + 2700.0 * 2e-3, rtol=1e-14)


def test_a_state_is_found_by_name_and_kind():
    project = member(PARTS, HELD, [PULL], [Combination("Pull", {"Pull": 2.0})])
    results = solve(project)
    assert (results.state_index("Pull"), results.state_index("Pull", "case")) == (0, 1)
    assert_allclose(results.segments.force_max[:, 1], [2e3, 1e3], rtol=1e-12)
    with pytest.raises(KeyError):
        results.state_index("Push")


def test_nothing_holds_the_member_in_any_state():
    project = member(PARTS, {}, [PULL], [Combination("One", {"Pull": 1.0}), Combination("Two", {})])
    with pytest.raises(NotSolvable) as refused:
        solve(project)
    assert refused.value.combinations == ("One", "Two")
    assert {fault.rule for fault in refused.value.faults} == {"not_held"}


def test_a_movement_without_support_concerns_the_states_that_use_its_case():
    moved = case("Moved", on_joints=[JointLoad("1", movement=1e-3)])
    together = [Combination("One", {"Pull": 1.0}), Combination("Two", {"Moved": 1.0})]
    with pytest.raises(NotSolvable) as refused:
        solve(member(PARTS, HELD, [PULL, moved], together))
    assert refused.value.combinations == ("Two",)
    with pytest.raises(NotSolvable) as refused:
        solve(member(PARTS, HELD, [PULL, moved], together[:1]))
    assert refused.value.combinations == ("Moved",)


def test_stops_that_the_loads_do_not_press_are_refused_with_the_combination():
    away = Combination("Away", {"Pull": -1.0})
    project = member(
        PARTS, {2: StopSupport(side="plus", clearance=1e-3)}, [PULL], [Combination("On", {"Pull": 1.0}), away]
    )
    with pytest.raises(NotSolvable) as refused:
        solve(project, cases=False)
    assert {fault.rule for fault in refused.value.faults} == {"not_pressed"}
    assert refused.value.combinations == ("Away",)


def test_a_case_alone_that_does_not_press_the_stops_is_left_out_beside_the_checks():
    cold = case("Cold", on_segments=[SegmentLoad("A", lack_of_fit=-1e-4)])
    both = Combination("Both", {"Pull": 1.0, "Cold": 1.0})
    stop = {2: StopSupport(side="plus", clearance=1e-3)}
    results = solve(member(PARTS, stop, [PULL, cold], [both]))
    assert [state.name for state in results.states] == ["Both", "Pull"]
    assert results.loads.gravity.shape == (2,)
    with pytest.raises(NotSolvable) as refused:
        solve(member(PARTS, stop, [PULL, cold]))
    assert refused.value.combinations == ("Cold",)


@pytest.mark.parametrize("size", [1e-170, 1e160])
def test_an_area_beyond_floating_point_is_refused(size):
    with pytest.raises(OutOfRange):
        solve(member([Part(1.0, round_bar(size))], HELD))


@pytest.mark.parametrize("bedding", [1e25, 1e60, 1e300])
def test_an_absurd_bedding_is_refused_rather_than_halved_for_ever(bedding):
    with pytest.raises(InputError):
        solve(
            member(
                [Part(1.0, area(1e-3), bedding=bedding)], HELD, [case(on_joints=[JointLoad("1", force=1e3)])]
            )
        )


def test_loads_beyond_floating_point_are_refused():
    huge = case("Huge", on_joints=[JointLoad("2", force=1.5e308), JointLoad("2", force=1.5e308)])
    with pytest.raises(OutOfRange):
        solve(member(PARTS, HELD, [huge]))


def test_an_allowable_beyond_floating_point_is_refused():
    weak = [Part(1.0, area(1e-3), allowable_tension=1e-200)]
    pulled = case("Pull", on_joints=[JointLoad("1", force=1e3)])
    with pytest.raises(OutOfRange) as refused:
        solve(member(weak, HELD, [pulled], [Combination("Faint", {"Pull": 1.0}, 1e-200)]))
    assert (refused.value.combination, refused.value.what) == ("Faint", "allowable")


def test_cancelling_is_heard_at_every_stage():
    project = member(PARTS, HELD, [PULL])
    asked = 0

    def count():
        nonlocal asked
        asked += 1
        return False

    solve(project, cancelled=count)
    assert asked >= 1
    for stage in range(asked):
        answers = iter([False] * stage + [True])
        with pytest.raises(Cancelled):
            solve(project, cancelled=lambda answers=answers: next(answers))


def test_the_unloaded_member_has_a_result_of_zeros():
    results = solve(member(PARTS, HELD))
    assert [state.name for state in results.states] == ["Unloaded"]
    assert results.solution.error_bound[0] == 0.0
    for name in (
        "force_max",
        "force_min",
        "stress_max",
        "stress_min",
        "displacement_max",
        "displacement_min",
    ):
        assert not getattr(results.segments, name).any()


@given(projects())
def test_results_cannot_be_written_to(project):
    results = solve(project)
    for record in (results.segments, results.solution, results.allowables):
        arrays = [getattr(record, name) for name in record.__slots__]
        assert not any(array.flags.writeable for array in arrays if isinstance(array, np.ndarray))
    assert not results.position.flags.writeable


@given(projects())
def test_the_same_project_gives_the_same_results(project):
    first, second = solve(project), solve(project)
    assert (first.checks, first.verdict, first.governing) == (second.checks, second.verdict, second.governing)
    assert np.array_equal(first.segments.stress_max, second.segments.stress_max)


@given(projects())
def test_stress_is_force_over_area_and_between_its_extremes(project):
    segments = solve(project).segments
    assert np.all(segments.stress_max >= segments.stress_min)
    assert np.all(segments.force_max >= np.maximum(segments.force_start, segments.force_end))
    assert np.all(segments.force_min <= np.minimum(segments.force_start, segments.force_end))


def test_a_support_added_makes_an_unfinished_member_solvable():
    project = member(PARTS, {}, [PULL])
    held = replace(project, joints=(Joint("0", FixedSupport()), *project.joints[1:]))
    assert project.joints[0].support is UNSET
    assert solve(held).verdict == "incomplete"  # no allowables yet
