"""Checks, verdict and governing check: what is compared, in which order, and what is never called passed."""

from __future__ import annotations

import math

import numpy as np
import pytest
from hypothesis import given
from msgspec.structs import replace
from numpy.testing import assert_allclose

from solver.checking import governing_of, verdict_of
from solver.checks import PASS_MARGIN, Check
from solver.model import (
    Combination,
    DisplacementLimit,
    FixedSupport,
    JointLoad,
    Limits,
    ReactionLimit,
    RelativeLimit,
    SegmentLoad,
    SpringSupport,
)
from solver.solve import solve
from tests.members import Part, area, case, member, round_bar
from tests.strategies import projects

HELD = {0: FixedSupport()}
BOTH_ENDS = {0: FixedSupport(), 2: FixedSupport()}
PULL = case("Pull", on_joints=[JointLoad("1", force=30e3)])


def parts(**allowables):
    return [Part(1.0, area(1e-3), **allowables), Part(2.0, area(1e-3), **allowables)]


def made(project):
    """All checks but those of stability, which have tests of their own."""
    return [check for check in solve(project).checks if check.check != "stability"]


def test_a_bar_pulled_in_the_middle_is_checked_on_both_sides():
    # P b / L pulls the first part, P a / L pushes the second: 20 and 10 MPa
    checks = made(member(parts(allowable_tension=40e6, allowable_compression=8e6), BOTH_ENDS, [PULL]))
    assert [(c.check, c.segment, c.status) for c in checks] == [
        ("tension", "A", "pass"),
        ("compression", "B", "fail"),
    ]
    assert_allclose([c.value for c in checks], [20e6, -10e6], rtol=1e-12)
    assert_allclose([c.utilisation for c in checks], [0.5, 1.25], rtol=1e-12)
    assert [c.limit for c in checks] == [40e6, 8e6]
    assert [c.position for c in checks] == [0.0, 1.0]


@pytest.mark.parametrize(
    ("supports", "loads"),
    [
        (HELD, case("Warm", on_segments=[SegmentLoad("A", temperature_start=40.0, temperature_end=10.0)])),
        ({1: SpringSupport(stiffness=1e7)}, case("Moved", on_joints=[JointLoad("1", movement=1e-3)])),
    ],
)
def test_what_is_rounding_alone_is_no_stress(supports, loads):
    # exactly nothing stresses them: a free heated taper, and a bar that its spring takes along
    tapers = [
        Part(0.3, round_bar(0.04, 0.03), expansion=1.2e-5, allowable_tension=160e6),
        Part(0.7, round_bar(0.05), expansion=1.2e-5, allowable_tension=160e6),
        Part(0.2, round_bar(0.03, 0.06), expansion=1.2e-5, allowable_tension=160e6),
    ]
    results = solve(member(tapers, supports, [loads]))
    assert np.abs(results.segments.force_max).max() < 1e-6
    assert (results.checks, results.verdict) == ((), "incomplete")
    for scale in (1e-100, 1.0):  # but however small, a force that is there is checked
        pulled = case("Pulled", on_joints=[JointLoad("3", force=scale)])
        assert solve(member(tapers, HELD, [pulled])).verdict == "pass"


def test_the_order_is_combination_then_chain_then_limits():
    limits = Limits(
        displacement=(DisplacementLimit("1", 1e-3),),
        relative=(RelativeLimit("2", "1", 1e-3),),
        reaction=(ReactionLimit("0", 1e6),),
    )
    swaying = case("Sway", on_segments=[SegmentLoad("A", load_start=-50e3, load_end=50e3)])
    together = [Combination("One", {"Sway": 1.0}), Combination("Two", {"Sway": -1.0})]
    held = {0: FixedSupport(), 1: SpringSupport(stiffness=1e8), 2: FixedSupport()}
    project = member(parts(allowable_tension=1e8, allowable_compression=1e8), held, [swaying], together)
    checks = made(replace(project, limits=limits))
    assert [c.combination for c in checks] == ["One"] * (len(checks) // 2) + ["Two"] * (len(checks) // 2)
    of_one = [(c.check, c.segment or c.joint or (c.start, c.end)) for c in checks if c.combination == "One"]
    assert of_one[:2] == [("tension", "A"), ("compression", "A")]
    assert of_one[-3:] == [("displacement", "1"), ("relative", ("2", "1")), ("reaction", "0")]


def test_a_missing_allowable_is_a_check_not_made_and_the_verdict_is_incomplete():
    results = solve(member(parts(allowable_tension=40e6), BOTH_ENDS, [PULL]))
    missing = results.checks[1]
    assert (missing.check, missing.segment, missing.status) == ("compression", "B", "not_made")
    assert missing.reason == "no_allowable_compression"
    assert (missing.value, missing.limit, missing.utilisation) == (None, None, None)
    assert results.verdict == "incomplete"
    assert results.governing == results.checks[0]
    assert math.isnan(results.segments.utilisation[0, 1])
    assert math.isnan(results.segments.utilisation_at[0, 1])


def test_a_missing_allowable_nobody_needs_is_no_finding():
    results = solve(member(parts(allowable_tension=40e6), HELD, [PULL]))
    # the second part is free of stress: no sign, no check
    assert [(c.check, c.segment) for c in results.checks] == [("tension", "A")]
    assert results.verdict == "pass"


def test_a_failure_outweighs_what_was_not_made():
    results = solve(member(parts(allowable_compression=5e6), BOTH_ENDS, [PULL]))
    assert [c.status for c in results.checks] == ["not_made", "fail", "not_made"]
    assert results.verdict == "fail"


def test_nothing_to_check_is_incomplete_and_never_passes():
    results = solve(member(parts(allowable_tension=1e8, allowable_compression=1e8), HELD))
    assert (results.checks, results.verdict, results.governing) == ((), "incomplete", None)
    assert np.all(np.isnan(results.segments.utilisation))


def test_the_factor_scales_allowable_stresses_and_no_limit():
    limits = Limits(displacement=(DisplacementLimit("1", 1e-4),), reaction=(ReactionLimit("0", 1e4),))
    rare = Combination("Rare", {"Pull": 1.0}, 1.25)
    project = member(parts(allowable_tension=40e6, allowable_compression=8e6), BOTH_ENDS, [PULL], [rare])
    checks = made(replace(project, limits=limits))
    assert_allclose([c.limit for c in checks], [50e6, 10e6, 1e-4, 1e4], rtol=1e-15)
    assert_allclose(checks[1].utilisation, 1.0, rtol=1e-12)
    assert checks[1].status == "pass"  # 1 up to rounding passes


@pytest.mark.parametrize(("excess", "status"), [(0.0, "pass"), (5e-10, "pass"), (2e-9, "fail")])
def test_the_margin_is_for_rounding_only(excess, status):
    limit = 30e6 / (1.0 + excess)
    checks = made(member(parts(allowable_tension=limit), HELD, [PULL]))
    assert checks[0].status == status
    assert pytest.approx(1e-9) == PASS_MARGIN


def test_limits_of_displacement_and_reaction_keep_the_sign_of_their_value():
    limits = Limits(
        displacement=(DisplacementLimit("2", 1e-4),),
        relative=(RelativeLimit("2", "0", 1e-3),),
        reaction=(ReactionLimit("0", 20e3),),
    )
    project = member(parts(), HELD, [case(on_joints=[JointLoad("2", force=-21e3)])])
    displacement, relative, reaction = made(replace(project, limits=limits))[-3:]
    shortening = 21e3 * 3.0 / (2.1e11 * 1e-3)
    assert_allclose(displacement.value, -shortening, rtol=1e-12)
    assert (displacement.position, displacement.status) == (3.0, "fail")
    assert_allclose(relative.value, shortening, rtol=1e-12)
    assert (relative.position, relative.start, relative.end, relative.status) == (None, "2", "0", "pass")
    assert_allclose(reaction.value, 21e3, rtol=1e-12)
    assert (reaction.position, reaction.status) == (0.0, "fail")


def test_a_reaction_limit_without_support_is_not_made():
    project = member(parts(allowable_tension=1e8), HELD, [PULL])
    results = solve(replace(project, limits=Limits(reaction=(ReactionLimit("2", 1e3),))))
    last = results.checks[-1]
    assert (last.check, last.joint, last.status, last.reason) == ("reaction", "2", "not_made", "no_support")
    assert results.verdict == "incomplete"


def test_a_stress_of_rounding_has_no_sign():
    # the free second part carries nothing; a billionth of the largest stress is still nothing
    whisper = case(on_joints=[JointLoad("1", force=30e3), JointLoad("2", force=30e3 * 0.9e-9)])
    assert [c.segment for c in made(member(parts(allowable_tension=1e8), HELD, [whisper]))] == ["A"]
    audible = case(on_joints=[JointLoad("1", force=30e3), JointLoad("2", force=30e3 * 1.1e-9)])
    assert [c.segment for c in made(member(parts(allowable_tension=1e8), HELD, [audible]))] == ["A", "B"]


def test_equal_tension_and_compression_count_at_the_smaller_x():
    # an even load on a bar held at both ends: q L / 2 pulled at the start, as much pushed at the end
    held = {0: FixedSupport(), 1: FixedSupport()}
    loaded = case(on_segments=[SegmentLoad("A", load_start=1e4)])
    results = solve(member(parts(allowable_tension=1e8, allowable_compression=1e8)[:1], held, [loaded]))
    assert_allclose([c.utilisation for c in results.checks[:2]], 0.05, rtol=1e-12)
    assert results.segments.utilisation_at[0, 0] == 0.0


def test_the_first_of_equals_governs():
    def check(name, utilisation, status="pass"):
        return Check("tension", name, status, segment="A", utilisation=utilisation)

    checks = (check("x", 0.4), check("y", 0.7), check("z", 0.7), Check("tension", "n", "not_made"))
    assert governing_of(checks).combination == "y"
    assert governing_of(checks[3:]) is None
    assert verdict_of(checks[:3]) == "pass"
    assert verdict_of(checks) == "incomplete"
    assert verdict_of((*checks, check("f", 1.1, "fail"))) == "fail"


@given(projects())
def test_cases_are_not_checked_where_there_are_combinations(project):
    results = solve(project)
    checked = {state.name for state in results.states if state.checked}
    assert {check.combination for check in results.checks} <= checked
    if project.combinations:
        assert checked == {combination.name for combination in project.combinations}
        alone = solve(project, cases=False)
        assert len(alone.checks) == len(results.checks)
        assert alone.verdict == results.verdict


@given(projects())
def test_segment_utilisation_is_the_largest_of_its_checks(project):
    results = solve(project)
    for index, state in enumerate(results.states):
        if not state.checked:
            continue
        for place, segment in enumerate(project.segments):
            own = [c for c in results.checks if (c.combination, c.segment) == (state.name, segment.mark)]
            values = [c.utilisation for c in own if c.utilisation is not None]
            if not values:
                assert math.isnan(results.segments.utilisation[index, place])
                continue
            assert results.segments.utilisation[index, place] == max(values)
            places = [c.position for c in own if (c.utilisation or 0.0) >= max(values) * (1 - 1e-9)]
            assert results.segments.utilisation_at[index, place] == min(places)


@given(projects())
def test_a_check_says_all_of_what_was_compared_or_none(project):
    for check in solve(project).checks:
        numbers = (check.value, check.limit, check.utilisation)
        if check.status == "not_made":
            assert numbers == (None, None, None)
            assert check.reason is not None
        else:
            assert check.reason is None
            assert check.utilisation == abs(check.value) / check.limit
            assert (check.status == "pass") == (check.utilisation <= 1 + 1e-9)
