"""What stability comes to: who is checked, what keeps from it, what is waived; second moments and modes."""

from __future__ import annotations

import math

import numpy as np
import pytest
from msgspec import UNSET, structs
from numpy.testing import assert_allclose

from solver.model import (
    AreaSection,
    BondedPart,
    Combination,
    FixedSupport,
    JointLoad,
    Lateral,
    Limits,
    LoadCase,
    RectangleSection,
    RoundSection,
    SegmentLoad,
    TubeSection,
    Waiver,
)
from solver.second_moments import rigidity_at, second_moment, stretches, turning_place
from solver.solve import solve
from tests.members import STEEL, Part, area, case, member, round_bar, waived
from tests.sleeves import draw_bolt

PINNED = Lateral(translation="fixed")
TURNING = Lateral(rotation="fixed")
PUSH = case("Push", on_joints=[JointLoad("2", force=-10e3)])
PULL = case("Pull", on_joints=[JointLoad("2", force=10e3)])


def column(laterals, cases=(PUSH,), section=None, factor=2.0, combinations=()):
    parts = [Part(1.0, section or round_bar(0.04), allowable_tension=1e9, allowable_compression=1e9)] * 2
    project = member(parts, {0: FixedSupport()}, list(cases), list(combinations))
    joints = tuple(structs.replace(j, lateral=laterals.get(i, UNSET)) for i, j in enumerate(project.joints))
    return structs.replace(project, joints=joints, limits=Limits(stability_factor=factor))


def stability_check(project):
    return [check for check in solve(project).checks if check.check == "stability"]


@pytest.mark.parametrize(
    ("laterals", "reason"),
    [
        ({}, "no_lateral"),
        ({1: Lateral(translation="free", rotation="free")}, "no_lateral"),
        ({1: PINNED}, "lateral_insufficient"),
        ({0: TURNING, 2: TURNING}, "lateral_insufficient"),
        ({0: PINNED, 1: Lateral(rotation=1e3)}, None),
        ({0: PINNED, 2: Lateral(translation=1e2)}, None),
    ],
)
def test_a_rigid_member_must_be_held_in_two_ways(laterals, reason):
    results = solve(column(laterals))
    assert results.stability[0].reason == reason
    (check,) = [check for check in results.checks if check.check == "stability"]
    assert (check.status == "not_made") == (reason is not None)
    assert (results.verdict == "incomplete") == (reason is not None)


def test_what_is_pulled_needs_nothing():
    results = solve(column({}, [PULL], factor=UNSET))
    assert results.stability[0].status == "no_compression"
    assert results.verdict == "pass"


def test_without_a_required_factor_the_factor_is_told_all_the_same():
    ends = {0: PINNED, 2: PINNED}
    (missing,) = stability_check(column(ends, factor=UNSET))
    (made,) = stability_check(column(ends))
    assert (missing.status, missing.reason) == ("not_made", "no_stability_factor")
    assert missing.value == made.value
    assert missing.utilisation is None


@pytest.mark.parametrize(("required", "status"), [(10.0, "pass"), (10.2, "fail")])
def test_the_utilisation_is_required_over_critical(required, status):
    euler = math.pi**2 * STEEL * math.pi * 0.04**4 / 64 / 2.0**2
    at = case("Push", on_joints=[JointLoad("2", force=-euler / 10.1)])
    (check,) = stability_check(column({0: PINNED, 2: PINNED}, [at], factor=required))
    assert check.status == status
    assert_allclose((check.value, check.utilisation), (10.1, required / 10.1), rtol=1e-6)
    assert_allclose(check.position, 1.0, rtol=1e-6)


def test_the_allowable_factor_has_no_part_in_it():
    ends = {0: PINNED, 2: PINNED}
    once, more = (Combination(name, {"Push": 1.0}, f) for name, f in (("Once", 1.0), ("More", 2.0)))
    first, second = stability_check(column(ends, combinations=[once, more]))
    assert first.utilisation == second.utilisation


def test_loads_are_scaled_together():
    ends = {0: PINNED, 2: PINNED}
    once, twice = (Combination(name, {"Push": f}) for name, f in (("Once", 1.0), ("Twice", 2.0)))
    first, second = stability_check(column(ends, combinations=[once, twice]))
    assert_allclose(first.value, 2.0 * second.value, rtol=1e-9)


class TestWaiver:
    def test_it_keeps_a_check_that_cannot_be_made_from_being_missing(self):
        results = solve(waived(column({}), "guided"))
        (check,) = [check for check in results.checks if check.check == "stability"]
        assert (check.status, check.waiver, check.reason) == ("waived", "guided", "no_lateral")
        assert results.verdict == "pass"

    def test_it_hides_no_check_that_fails(self):
        project = column({0: PINNED, 2: PINNED}, factor=1e6)
        assert solve(waived(project)).verdict == "fail"

    @pytest.mark.parametrize(("critical", "status"), [(0.99, "fail"), (1.01, "waived")])
    def test_it_covers_no_member_that_its_own_loads_buckle(self, critical, status):
        """Also where no factor is required: the one that is known is below 1."""
        euler = math.pi**2 * STEEL * math.pi * 0.04**4 / 64 / 2.0**2
        at = case("Push", on_joints=[JointLoad("2", force=-euler / critical)])
        project = waived(column({0: PINNED, 2: PINNED}, [at], factor=UNSET))
        (check,) = stability_check(project)
        assert check.status == status
        assert_allclose(check.value, critical, rtol=1e-6)
        assert (solve(project).verdict == "fail") == (status == "fail")

    def test_alone_it_is_no_check(self):
        bare = structs.replace(
            column({}),
            materials=tuple(
                structs.replace(m, allowable_tension=UNSET, allowable_compression=UNSET)
                for m in column({}).materials
            ),
        )
        checks = [check.status for check in solve(waived(bare)).checks]
        assert sorted(set(checks)) == ["not_made", "waived"]
        assert solve(waived(bare)).verdict == "incomplete"


def test_a_bare_area_needs_its_second_moment():
    ends = {0: PINNED, 2: PINNED}
    unknown = solve(column(ends, section=area(1.3e-3))).stability[0]
    assert (unknown.reason, unknown.segments) == ("no_second_moment", (0, 1))
    known = AreaSection(area=math.pi * 0.04**2 / 4, second_moment=math.pi * 0.04**4 / 64)
    (given,), (computed,) = (stability_check(column(ends, section=s)) for s in (known, round_bar(0.04)))
    assert_allclose(given.value, computed.value, rtol=1e-12)


def test_bonded_parts_bend_together():
    ends = {0: PINNED, 2: PINNED}
    whole = column(ends)
    shell = BondedPart("of A", TubeSection(outer=0.04, inner=0.03))
    segments = tuple(
        structs.replace(s, section=RoundSection(diameter=0.03), bonded=(shell,)) for s in whole.segments
    )
    (apart,), (together,) = stability_check(structs.replace(whole, segments=segments)), stability_check(whole)
    assert_allclose(apart.value, together.value, rtol=1e-9)


def test_a_heated_column_held_at_both_ends_buckles_by_its_heat():
    ends = {0: PINNED, 2: PINNED}
    warm = case("Warm", on_segments=[SegmentLoad(m, temperature_start=40.0) for m in "AB"])
    project = column(ends, [warm])
    held = structs.replace(project.joints[2], support=FixedSupport())
    materials = tuple(structs.replace(m, expansion=1.2e-5) for m in project.materials)
    project = structs.replace(project, joints=(*project.joints[:2], held), materials=materials)
    (check,) = stability_check(project)
    # N = −E A α ΔT, so that the factor is π² I / (A L² α ΔT)
    assert_allclose(check.value, math.pi**2 * 0.04**2 / 16 / 2.0**2 / (1.2e-5 * 40.0), rtol=1e-6)


def test_the_mode_is_largest_with_1_and_lies_still_where_it_is_held():
    mode = solve(column({0: PINNED, 2: PINNED})).stability[0].mode
    segment, fraction = np.repeat([0, 1], 101), np.tile(np.linspace(0.0, 1.0, 101), 2)
    shape = mode.at(segment, fraction)
    assert_allclose(shape, np.sin(math.pi * (segment + fraction) / 2), atol=1e-6)
    assert shape.max() <= 1.0 + 1e-12


@pytest.mark.parametrize(
    ("section", "exact"),
    [
        (RoundSection(diameter=0.04, diameter_end=0.06), lambda s: math.pi / 64 * (0.04 + 0.02 * s) ** 4),
        (
            TubeSection(outer=0.06, outer_end=0.05, inner=0.05, inner_end=0.02),
            lambda s: math.pi / 64 * ((0.06 - 0.01 * s) ** 4 - (0.05 - 0.03 * s) ** 4),
        ),
        (RectangleSection(width=0.04, depth=0.02), lambda s: 0.04 * 0.02**3 / 12 + 0 * s),
        (
            RectangleSection(width=0.02, width_end=0.06, depth=0.04),
            lambda s: np.minimum(0.04 * (0.02 + 0.04 * s) ** 3, (0.02 + 0.04 * s) * 0.04**3) / 12,
        ),
        (AreaSection(area=1.0, second_moment=2.0, second_moment_end=3.0), lambda s: 2.0 + s),
    ],
)
def test_second_moments_along_a_segment(section, exact):
    for start, end in stretches((section,)):
        s = np.linspace(start, end, 9)
        found = rigidity_at(second_moment(section, (start + end) / 2), s)
        assert_allclose(found, exact(s), rtol=1e-13)


def test_the_weaker_axis_changes_where_the_sides_are_equal():
    assert turning_place(RectangleSection(width=0.02, width_end=0.06, depth=0.03)) == 0.25
    assert turning_place(RectangleSection(width=0.02, width_end=0.03, depth=0.04)) is None


def test_stiffnesses_far_apart_settle_or_say_so():
    ends = {0: Lateral(translation=1e-3), 1: Lateral(translation=1e18, rotation=1e15), 2: PINNED}
    found = solve(column(ends)).stability[0]
    assert found.status == "checked" or found.reason == "not_settled"


def clamped_column(required):
    """A slender bolt pushed in by more than its compressed sleeve takes; the check is waived."""
    bolt = draw_bolt()
    push = LoadCase("Push", joint_loads=(JointLoad("3", force=-60e3),))
    held = tuple(structs.replace(j, lateral=PINNED) if i in (0, 3) else j for i, j in enumerate(bolt.joints))
    return structs.replace(
        bolt,
        joints=held,
        load_cases=(push,),
        combinations=(),
        limits=Limits(stability_factor=required, waived=(Waiver("stability", "sleeves guide it"),)),
    )


def test_a_waiver_hides_no_member_that_fails_beside_a_compressed_companion():
    factor = solve(clamped_column(UNSET)).stability[0].critical_factor
    below, above = (solve(clamped_column(factor * share)) for share in (1.01, 0.99))
    assert [(r.stability[0].status, r.stability[0].reason) for r in (below, above)] == [
        ("checked", None),
        ("not_checked", "companion_compressed"),
    ]
    statuses = [[c.status for c in r.checks if c.check == "stability"] for r in (below, above)]
    assert statuses == [["fail"], ["waived"]]
    assert below.verdict == "fail"
