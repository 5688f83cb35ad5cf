"""Numbers in the hand, without a window: steps, bounds, the two ways of a joint, tapers, loads."""

from __future__ import annotations

from fractions import Fraction
from math import pi

import pytest
from hypothesis import given
from hypothesis import strategies as st
from msgspec import UNSET
from msgspec.structs import replace

from app import edits
from app.drawing.ruler import Ruler
from app.hand.grip import Grip, Refusal
from app.hand.lengths import joint_grip
from app.hand.loads import FULL, Aim, aim_at, distributed_grip, force_grip
from app.hand.sections import dimension_of, edge_grip
from app.hand.steps import fine_step, next_step, round_step, snapped
from app.shown import Shown
from app.units import SYSTEM_NAMES, unit
from solver.model import (
    AreaSection,
    Combination,
    FixedSupport,
    JointLoad,
    Project,
    RectangleSection,
    RoundSection,
    SegmentLoad,
    TubeSection,
)
from tests.members import Part, case, member

MM = "mm-N-MPa"


def bar(*sections, lengths=(0.4, 0.3, 0.5), cases=(), combinations=()) -> Project:
    """Three segments A, B and C, held at the start."""
    shapes = sections or (RoundSection(diameter=0.04),) * 3
    parts = [Part(length, shape) for length, shape in zip(lengths, shapes, strict=False)]
    return member(parts, {0: FixedSupport()}, cases, combinations)


def ruler_of(project: Project, *, upright=False, window=None) -> Ruler:
    """A metre on 1000 pixels, or a part of the member on them."""
    total = sum(segment.length for segment in project.segments)
    pixels = (1000.0 * total, 0.0) if upright else (0.0, 1000.0 * total)
    whole = Ruler.whole(total, *pixels)
    return whole if window is None else whole.zoomed(window, 0.5 * pixels[0])


def put(grip: Grip, value: float) -> Project:
    """The project with a value, which is not refused."""
    outcome = grip.outcome(value)
    assert outcome.project is not None, outcome.reason
    return outcome.project


def lengths(project: Project) -> list[float]:
    return [segment.length for segment in project.segments]


class TestSteps:
    @pytest.mark.parametrize(
        ("millimetres_a_pixel", "step"), [(0.25, 1), (0.3, 2), (0.5, 2), (1.0, 5), (1.26, 10), (0.02, 0.1)]
    )
    def test_a_step_is_one_two_or_five_and_a_few_pixels(self, millimetres_a_pixel, step):
        assert round_step(millimetres_a_pixel / 1000, "length", MM) == Fraction(str(step)) / 1000

    @given(st.floats(1e-9, 1e9), st.sampled_from(SYSTEM_NAMES))
    def test_steps_are_round_in_every_system(self, rate, system):
        coarse, fine = (make(rate, "force", system) for make in (round_step, fine_step))
        factor = unit("force", system).factor
        for step in (coarse, fine):
            digits = f"{float(step / factor):.6e}".partition("e")[0]
            assert float(digits) in (1, 2, 5)
        assert float(fine) <= rate * (1 + 1e-8) < 2.6 * float(fine)
        assert 4 * rate * (1 - 1e-8) <= float(coarse) < 4 * 2.6 * rate

    @given(st.integers(-10_000, 10_000), st.sampled_from(SYSTEM_NAMES))
    def test_a_snapped_value_is_the_one_that_typing_gives(self, count, system):
        factor = unit("length", system).factor
        typed = float(count * factor / 2)
        assert snapped(typed * (1 + 1e-12), factor / 2) == typed

    def test_the_next_step_goes_to_the_grid_first(self):
        step = Fraction(1, 100)
        assert next_step(0.423, step, 1) == 0.43
        assert next_step(0.423, step, -1) == 0.42
        assert next_step(0.42, step, -1) == 0.41


class TestJoints:
    def test_what_lies_beyond_moves_along(self):
        grip = joint_grip(bar(), 1, ruler_of(bar()))
        value = grip.pulled(51.0)
        assert lengths(put(grip, value)) == [0.45, 0.3, 0.5]
        assert grip.tell(value) == "A 450 mm, what lies beyond moves along"
        assert grip.was(value) == "was 400 mm (+50)"

    def test_the_total_stays(self):
        grip = joint_grip(bar(), 1, ruler_of(bar()), total_stays=True)
        value = grip.pulled(-81.0)
        assert lengths(put(grip, value)) == [0.32, 0.38, 0.5]
        assert grip.tell(value) == "A 320 and B 380 mm, the total stays"

    def test_the_last_joint_has_one_way(self):
        grip = joint_grip(bar(), 3, ruler_of(bar()), total_stays=True)
        assert lengths(put(grip, grip.pulled(101.0))) == [0.4, 0.3, 0.6]
        assert "ends there" in grip.tell(0.6)

    def test_a_joint_follows_upwards_where_the_member_stands(self):
        grip = joint_grip(bar(), 2, ruler_of(bar(), upright=True))
        assert grip.pulled(50.0) == 0.35

    def test_a_joint_goes_on_beyond_the_end_of_the_ruler(self):
        grip = joint_grip(bar(), 3, ruler_of(bar()))
        assert grip.pulled(700.0) == pytest.approx(1.2)

    @pytest.mark.parametrize("total_stays", [False, True])
    @given(pixels=st.floats(-5000.0, 5000.0), free=st.booleans())
    def test_a_pull_never_makes_an_invalid_member(self, total_stays, pixels, free):
        project = bar()
        grip = joint_grip(project, 2, ruler_of(project), total_stays=total_stays)
        found = lengths(put(grip, grip.pulled(pixels, free=free)))
        assert all(length > 0 for length in found)
        if total_stays:
            assert found[1] + found[2] == pytest.approx(0.8, rel=1e-15)

    def test_back_where_it_was_is_exactly_what_it_was(self):
        project = bar(lengths=(0.4231, 0.3, 0.5))
        grip = joint_grip(project, 1, ruler_of(project))
        assert grip.pulled(0.5) == 0.4231
        assert grip.pulled(7.0) == 0.43

    def test_free_is_finer(self):
        grip = joint_grip(bar(), 1, ruler_of(bar()))
        assert grip.pulled(53.0) == 0.455
        assert grip.pulled(53.0, free=True) == 0.453

    def test_a_nudge_is_a_step_and_a_coarse_one_ten(self):
        grip = joint_grip(bar(), 1, ruler_of(bar()))
        assert grip.nudged(0.4, 1) == 0.405
        assert grip.nudged(0.4, -1, coarse=True) == 0.35
        assert grip.nudged(0.01, -1, coarse=True) > 0


class TestEdges:
    PIXEL = 0.0005  # m

    @pytest.mark.parametrize(
        ("where", "expected"),
        [("start", (0.06, 0.04)), ("end", (0.04, 0.06)), ("both", (0.06, 0.06))],
    )
    def test_an_end_makes_a_taper_and_the_middle_changes_both(self, where, expected):
        grip = edge_grip(bar(), 1, where, self.PIXEL)
        section = put(grip, grip.pulled(20.0)).segments[1].section
        assert dimension_of(section).ends == expected
        assert (section.diameter_end is UNSET) == (where == "both")

    def test_ends_that_come_together_are_plain_again(self):
        grip = edge_grip(bar(RoundSection(diameter=0.04, diameter_end=0.06)), 0, "end", self.PIXEL)
        assert put(grip, 0.04).segments[0].section == RoundSection(diameter=0.04)

    def test_the_middle_of_a_taper_keeps_it(self):
        grip = edge_grip(bar(RoundSection(diameter=0.04, diameter_end=0.06)), 0, "both", self.PIXEL)
        assert put(grip, 0.05).segments[0].section == RoundSection(diameter=0.05, diameter_end=0.07)
        assert grip.tell(0.05) == "A, diameter: 50 at its start, 70 mm at its end"

    @pytest.mark.parametrize(
        ("section", "inner", "pixels", "size"),
        [
            (TubeSection(outer=0.06, inner=0.04), False, -30.0, 0.045),
            (TubeSection(outer=0.06, inner=0.04), True, 30.0, 0.055),
            (TubeSection(outer=0.06, inner=0.04), True, -90.0, 0.0),
            (RectangleSection(width=0.02, depth=0.04), False, 10.0, 0.05),
            (RoundSection(diameter=0.04), False, -90.0, 0.005),
        ],
    )
    def test_a_dimension_stops_short_of_the_other_one_and_of_nothing(self, section, inner, pixels, size):
        grip = edge_grip(bar(section), 0, "both", self.PIXEL, inner=inner)
        found = put(grip, grip.pulled(pixels)).segments[0].section
        assert dimension_of(found, inner=inner).ends == (size, size)

    @given(pixels=st.floats(-2000.0, 2000.0), free=st.booleans(), inner=st.booleans())
    @pytest.mark.parametrize("where", ["start", "end", "both"])
    def test_a_tube_stays_a_tube(self, where, pixels, free, inner):
        project = bar(TubeSection(outer=0.06, outer_end=0.08, inner=0.05, inner_end=0.04))
        grip = edge_grip(project, 0, where, self.PIXEL, inner=inner)
        put(grip, grip.pulled(pixels, free=free))

    def test_the_area_is_pulled_by_the_radius_that_is_drawn(self):
        grip = edge_grip(bar(AreaSection(area=pi * 0.02**2, second_moment=3e-7)), 0, "both", self.PIXEL)
        section = put(grip, grip.pulled(20.0, free=True)).segments[0].section
        assert section.area == pytest.approx(pi * 0.03**2, rel=0.02)
        assert section.second_moment == 3e-7

    def test_what_an_edit_refuses_is_said(self):
        outcome = edge_grip(bar(TubeSection(outer=0.06, inner=0.04)), 0, "both", self.PIXEL).outcome(0.03)
        assert outcome.project is None
        assert "inside" in outcome.reason


def loaded(**more) -> Project:
    """Two cases that act at joint 3 and on B, in a combination of 1.5 and −0.5."""
    cases = [
        case("Dead", on_segments=[SegmentLoad("B", 1000.0, 2000.0)], on_joints=[JointLoad("3", 8000.0)]),
        case("Live", on_segments=[SegmentLoad("B", 500.0)], on_joints=[JointLoad("3", 2000.0)]),
    ]
    both = Combination("Both", {"Dead": 1.5, "Live": -0.5})
    return bar(cases=cases, combinations=[both, Combination("Dead alone", {"Dead": 1.0})], **more)


WAYS = ("start", "end", "both")
BOTH, DEAD = Shown("combination", "Both"), Shown("case", "Dead")


def aimed(project: Project, shown: Shown, name: str) -> Aim:
    aim = aim_at(project, shown, name)
    assert isinstance(aim, Aim)
    return aim


class TestLoads:
    def test_a_case_alone_is_changed_as_shown(self):
        project = loaded()
        grip = force_grip(project, 3, aimed(project, DEAD, "Dead"), 8000.0)
        assert grip.pulled(FULL) == 16000.0
        assert grip.tell(9000.0) == "Force at 3: 9000 N, Dead"

    def test_a_step_is_called_as_that_of_typing_into_the_table(self):
        project = loaded()
        grip = force_grip(project, 3, aimed(project, DEAD, "Dead"), 8000.0)
        assert grip.name == "Force along +x of 3, Dead"
        ends = {
            w: distributed_grip(project, 0, w, aimed(project, DEAD, "Dead"), (1.0, 1.0)).name for w in WAYS
        }
        mark = project.segments[0].mark
        assert ends["start"] == f"Load at start of {mark}, Dead"
        assert ends["end"] == f"Load at end of {mark}, Dead"

    @pytest.mark.parametrize(("name", "factor"), [("Dead", 1.5), ("Live", -0.5)])
    def test_under_a_factor_what_is_shown_follows_the_hand(self, name, factor):
        project = loaded()
        shown = 1.5 * 8000.0 - 0.5 * 2000.0
        grip = force_grip(project, 3, aimed(project, BOTH, name), shown)
        change = grip.at(FULL / 2) - grip.value
        assert change * factor == pytest.approx(shown / 2)
        assert f"×{factor:g}".replace("-", "−") in grip.tell(grip.value)

    def test_through_zero_the_direction_turns(self):
        project = loaded()
        grip = force_grip(project, 3, aimed(project, DEAD, "Dead"), 8000.0)
        assert put(grip, grip.pulled(-2 * FULL)).load_cases[0].joint_loads[0].force == -8000.0

    def test_a_force_of_nothing_is_no_record(self):
        project = loaded()
        grip = force_grip(project, 3, aimed(project, DEAD, "Dead"), 8000.0)
        assert put(grip, grip.pulled(-FULL)).load_cases[0].joint_loads == ()

    @pytest.mark.parametrize(
        ("where", "expected"),
        [("start", (3000.0, 2000.0)), ("end", (1000.0, 3000.0)), ("both", (3000.0, 4000.0))],
    )
    def test_a_distributed_load_by_its_ends(self, where, expected):
        project = loaded()
        aim = aimed(project, DEAD, "Dead")
        load = put(distributed_grip(project, 1, where, aim, (1000.0, 2000.0)), 3000.0)
        found = load.load_cases[0].segment_loads[0]
        assert (found.load_start, found.load_end) == expected

    def test_outward_is_more_of_its_direction(self):
        project = edits.set_value(loaded(), ("load_cases", 1, "segment_loads", 0, "load_start"), -500.0)
        aim = aimed(project, Shown("case", "Live"), "Live")
        grip = distributed_grip(project, 1, "both", aim, (-500.0, -500.0))
        assert grip.pulled(FULL) == -1000.0
        assert put(grip, 0.0).load_cases[1].segment_loads == ()

    @pytest.mark.parametrize("shown", [Shown("case", "Dead"), Shown("combination", "Dead alone")])
    def test_a_case_that_takes_no_part_is_refused_with_a_remedy(self, shown):
        refusal = aim_at(loaded(), shown, "Live")
        assert isinstance(refusal, Refusal)
        assert "Live" in refusal.reason
        assert shown.name in refusal.reason

    def test_without_a_case_nothing_can_be_edited(self):
        assert isinstance(aim_at(bar(), BOTH, None), Refusal)

    def test_several_records_are_left_to_the_table(self):
        project = loaded()
        twice = replace(project.load_cases[0], joint_loads=(JointLoad("3", 1.0), JointLoad("3", 2.0)))
        project = replace(project, load_cases=(twice, project.load_cases[1]))
        outcome = force_grip(project, 3, aimed(project, DEAD, "Dead"), 3.0).outcome(5.0)
        assert outcome.project is None
        assert "Loads table" in outcome.reason


def test_a_force_that_others_cancel_to_the_last_digit_can_still_be_pulled():
    cases = [case(name, on_joints=[JointLoad("1", force)]) for name, force in (("A", 1e9), ("B", -1e9))]
    project = bar(cases=cases, combinations=[Combination("Both", {"A": 1.0, "B": 1.0})])
    aim = aim_at(project, Shown("combination", "Both"), "A")
    assert isinstance(aim, Aim)
    grip = force_grip(project, 1, aim, 1e-8)
    assert grip.pulled(FULL) > grip.value
