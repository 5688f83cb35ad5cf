"""Results on the drawing: graded as the solver has them, the displaced shape clear and harmless."""

from __future__ import annotations

from dataclasses import replace
from itertools import groupby, pairwise

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from app.drawing.frame import Detail, Frame
from app.drawing.layout import lay_out
from app.drawing.member import Member
from app.drawing.overlay import (
    LARGEST_SHIFT,
    LEAST_LEFT,
    STEPS,
    Graded,
    displaced_factor,
    displacements,
    graded,
    shades,
)
from app.drawing.ruler import Ruler
from app.drawing.tinting import displaced_outline, legend_size, tinted
from app.looks import Looks
from app.samples import read_sample
from app.shown import Shown
from solver.model import FixedSupport, JointLoad, Project, RoundSection, SegmentLoad
from solver.solve import solve
from tests.app.drawing.frames import SIZES, window_frame
from tests.drawn_members import busy_member, drawn, uneven_member
from tests.members import Part, case, member

ROD = solve(read_sample("tie_rod"))
STORM = next(i for i, state in enumerate(ROD.states) if state.name == "Storm surge")
BUSY = solve(uneven_member())
BOTH_WAYS = pytest.mark.parametrize("upright", [False, True], ids=["across", "upright"])


def coloured(project: Project, results, state: int | None, *, upright: bool):
    member = Member.of(project, Shown("envelope")) if state is None else drawn(project)
    frame = window_frame(member, SIZES[1], upright=upright)
    shown = graded(results, state, "stress")
    detail = Detail(hollow=True, legend=legend_size(member, frame, shown))
    frame = replace(frame, detail=detail)
    picture = lay_out(member, frame)
    return frame, picture, tinted(member, frame, picture, shown)


def balanced():
    """Four segments held at the start; what acts is in balance on the third, so that only it has a force."""
    parts = [Part(0.3, RoundSection(diameter=0.05)) for _ in range(4)]
    load, force = SegmentLoad("C", 1e4 / 3.0, 2e4 / 3.0), JointLoad("3", -1.5 * 1e4 / 3.0 * 0.3)
    return member(parts, {0: FixedSupport()}, [case("Pull", on_segments=[load], on_joints=[force])], [])


class TestRounding:
    """Where nothing acts the solver leaves the rounding of its sums, which has no sign to be shown."""

    @pytest.mark.parametrize("colour", ["force", "stress"])
    @pytest.mark.parametrize("state", [0, None])
    def test_what_is_only_rounding_has_neither_colour_nor_sign(self, state, colour):
        results = solve(balanced())
        assert np.abs(results.segments.force_max[0]).all(), "no rounding to be shown"
        shown = graded(results, state, colour)
        ruler = Ruler.fitting(results.position.tolist(), 0.0, 800.0)
        assert {shade.sign for shade in shades(shown, ruler) if shade.segment != 2} == {0}
        assert {shade.sign for shade in shades(shown, ruler) if shade.segment == 2} == {-1}


class TestShades:
    def test_cover_the_member_once_and_in_order(self):
        ruler = Ruler.fitting(ROD.position.tolist(), 0.0, 800.0)
        found = shades(graded(ROD, STORM, "stress"), ruler)
        assert [found[0].first, found[-1].last] == pytest.approx([0.0, ROD.position[-1]])
        assert all(a.last == pytest.approx(b.first) for a, b in pairwise(found))

    def test_the_darkest_is_where_the_largest_is_and_hatched_where_it_does_not_pass(self):
        ruler = Ruler.fitting(ROD.position.tolist(), 0.0, 800.0)
        found = shades(graded(ROD, STORM, "stress"), ruler)
        assert {s.segment for s in found if s.step == STEPS} == {3, 5}
        assert {s.segment for s in found if s.over} == {3, 5}
        assert {s.sign for s in found} == {1}

    def test_of_an_envelope_the_governing_value_is_shown(self):
        whole = graded(BUSY, None, "force")
        singles = [graded(BUSY, i, "force") for i, s in enumerate(BUSY.states) if s.checked]
        assert whole.governing
        assert whole.largest == pytest.approx(max(one.largest for one in singles))

    def test_a_peak_that_is_narrower_than_a_slice_is_over(self):
        x = np.array([0.0, 0.5, 0.999, 1.0])
        shown = by_hand(x, utilisation=np.array([0.5, 0.5, 0.9, 1.2]))
        found = shades(shown, Ruler.fitting((0.0, 1.0), 0.0, 800.0))
        assert [shade.over for shade in found] == [False, True]
        assert found[-1].last == 1.0

    @pytest.mark.parametrize("count", [700, 3000])
    def test_of_many_short_segments_the_worst_of_a_pixel_is_shown(self, count):
        joints = np.linspace(0.0, 1.0, count + 1)
        segment = np.repeat(np.arange(count), 2)
        x = np.stack([joints[:-1], joints[1:]], axis=1).ravel()
        value, utilisation = np.ones(2 * count), np.full(2 * count, 0.5)
        value[600:602], utilisation[600:602] = 10.0, 1.2
        shown = replace(by_hand(x, value, utilisation), position=joints, segment=segment)
        shown = replace(shown, unchecked=np.arange(count) == 400)
        found = shades(shown, Ruler.fitting(tuple(joints.tolist()), 0.0, 800.0))
        assert len(found) <= 801
        (over,) = (shade for shade in found if shade.over)
        assert over.first <= joints[300]
        assert over.last >= joints[301]
        assert over.step == STEPS
        (missing,) = (shade for shade in found if shade.unchecked)
        assert missing.segment - count / 800.0 <= 400 <= missing.until + count / 800.0
        assert all(a.last == pytest.approx(b.first) for a, b in pairwise(found))

    def test_only_what_the_window_shows_is_made(self):
        results = solve(busy_member(100))
        whole = Ruler.fitting(results.position.tolist(), 0.0, 800.0)
        closer = whole.showing(*results.position[[40, 42]].tolist())
        found = shades(graded(results, 0, "stress"), closer)
        assert {40, 41} <= {s.segment for s in found} <= {39, 40, 41, 42}

    @pytest.mark.parametrize("state", [0, None], ids=["state", "envelope"])
    def test_a_segment_without_an_allowable_is_marked_as_not_checked(self, state):
        found = graded(solve(without_allowables(read_sample("tie_rod"), "C")), state, "stress")
        ruler = Ruler.fitting(ROD.position.tolist(), 0.0, 800.0)
        assert {shade.segment for shade in shades(found, ruler) if shade.unchecked} == {2}

    def test_nothing_is_coloured_where_nothing_acts(self):
        project = busy_member(2)
        idle = replace_loads(project)
        assert graded(solve(idle), 0, "stress") is None
        assert graded(ROD, STORM, "none") is None


def by_hand(x, value=None, utilisation=None):
    return Graded(
        quantity="stress",
        position=x[[0, -1]],
        x=x,
        segment=np.zeros(len(x), dtype=int),
        value=np.ones(len(x)) if value is None else value,
        utilisation=utilisation,
        unchecked=np.zeros(1, dtype=bool),
        governing=False,
        checked=True,
    )


def without_allowables(project: Project, mark: str) -> Project:
    """The project with a segment whose material has no allowable stress."""
    from msgspec import UNSET
    from msgspec.structs import replace as changed

    index = next(i for i, s in enumerate(project.segments) if s.mark == mark)
    segment = project.segments[index]
    kind = next(m for m in project.materials if m.name == segment.material)
    bare = changed(kind, name="bare", allowable_tension=UNSET, allowable_compression=UNSET)
    segments = list(project.segments)
    segments[index] = changed(segment, material="bare")
    return changed(project, materials=(*project.materials, bare), segments=tuple(segments))


def replace_loads(project: Project) -> Project:
    from msgspec.structs import replace as changed

    cases = tuple(changed(c, gravity=0.0, segment_loads=(), joint_loads=()) for c in project.load_cases)
    return changed(project, load_cases=cases)


def runs(found, ruler, sign):
    """The pixels of the runs of shades of one sign."""
    for own, run in groupby(found, key=lambda shade: shade.sign):
        stretch = list(run)
        if own == sign:
            yield tuple(sorted((ruler.pixel(stretch[0].first), ruler.pixel(stretch[-1].last))))


class TestTinting:
    @BOTH_WAYS
    def test_every_segment_is_tinted_inside_its_outline(self, upright):
        project = read_sample("tie_rod")
        frame, picture, found = coloured(project, ROD, STORM, upright=upright)
        way = 1 if upright else 0
        along = [p[way] for tint in found.tints for p in tint.points]
        assert [min(along), max(along)] == pytest.approx(sorted((frame.ruler.begin, frame.ruler.end)))
        bodies = [s for s in picture.strokes if s.part is not None and s.part.kind == "segment" and s.closed]
        deepest = max(p[1 - way] for s in bodies for p in s.points)
        assert max(p[1 - way] for t in found.tints for p in t.points) == pytest.approx(deepest)
        assert not any(s.fill for s in bodies)

    @BOTH_WAYS
    @pytest.mark.parametrize("state", [0, None], ids=["state", "envelope"])
    def test_the_scale_meets_no_other_text(self, upright, state):
        project = uneven_member()
        _frame, picture, found = coloured(project, BUSY, state, upright=upright)
        assert len(found.texts) == 3
        assert not any(a.box.meets(b.box) for a in found.texts for b in picture.texts)
        assert ("largest of all" in found.texts[0].text) is (state is None)

    @BOTH_WAYS
    def test_what_was_not_checked_is_hatched_another_way(self, upright):
        project = without_allowables(read_sample("tie_rod"), "C")
        _frame, _picture, found = coloured(project, solve(project), STORM, upright=upright)
        assert 0 < sum(tint.unchecked for tint in found.tints) < len(found.tints)
        assert not any(tint.unchecked and tint.over for tint in found.tints)

    def test_a_state_that_is_not_checked_says_so_with_its_scale(self):
        results = solve(uneven_member())
        state = next((i for i, s in enumerate(results.states) if not s.checked), None)
        assert state is not None
        _frame, _picture, found = coloured(uneven_member(), results, state, upright=False)
        assert "not checked" in found.texts[0].text

    @BOTH_WAYS
    @pytest.mark.parametrize("count", [12, 60, 200])
    def test_short_segments_carry_a_sign_for_each_run(self, upright, count):
        project = busy_member(count)
        results = solve(project)
        frame, picture, found = coloured(project, results, 0, upright=upright)
        way = 1 if upright else 0
        for sign in (-1, 1):
            wide = [
                span
                for span in runs(shades(graded(results, 0, "stress"), frame.ruler), frame.ruler, sign)
                if span[1] - span[0] > 15.0
            ]
            places = [mark.centre[way] for mark in found.marks if mark.sign == sign]
            assert all(any(low <= at <= high for at in places) for low, high in wide)
        axis = picture.axis
        for mark in found.marks:
            if mark.centre[1 - way] == axis:
                assert all(abs(mark.centre[way] - c.centre[way]) > c.radius for c in picture.circles)

    @pytest.mark.parametrize("size", SIZES)
    @pytest.mark.parametrize("state", [STORM, None], ids=["state", "envelope"])
    def test_upright_the_scale_keeps_off_sections_at_the_top(self, size, state):
        project = read_sample("tie_rod")
        member = Member.of(project, Shown("envelope")) if state is None else drawn(project)
        frame = window_frame(member, size, upright=True)
        shown = graded(ROD, state, "stress")
        frame = replace(frame, detail=Detail(hollow=True, legend=legend_size(member, frame, shown)))
        made = lay_out(member, frame)
        assert made.legend is not None
        assert not any(made.legend.meets(text.box) for text in made.texts)

    def test_signs_keep_off_the_marks(self):
        _frame, picture, found = coloured(read_sample("tie_rod"), ROD, STORM, upright=False)
        assert {mark.sign for mark in found.marks} == {1}
        gaps = [abs(m.centre[0] - c.centre[0]) - c.radius for m in found.marks for c in picture.circles]
        assert min(gaps) > 6.5


class TestDisplaced:
    @given(
        st.lists(st.floats(0.01, 10.0), min_size=1, max_size=20),
        st.lists(st.floats(-0.1, 0.1), min_size=21, max_size=21),
    )
    def test_is_clear_and_no_segment_overlaps_another(self, lengths, moves):
        joints = tuple(np.concatenate([[0.0], np.cumsum(lengths)]).tolist())
        member = Member(busy_member(1), joints, None)
        ruler = Ruler.fitting(joints, 0.0, 800.0)
        moved = np.array(moves[: len(joints)])
        factor = displaced_factor(member, ruler, moved)
        pixels = np.asarray(ruler.pixel(np.array(joints))) + moved * factor * ruler.pixels_per_metre
        widths = np.diff(ruler.pixel(np.array(joints)))
        assert (np.diff(pixels) >= LEAST_LEFT * widths * (1 - 1e-6)).all()
        assert np.abs(moved * factor * ruler.pixels_per_metre).max() <= LARGEST_SHIFT * 800.0 * (1 + 1e-6)

    def test_the_factor_is_round_and_stays_while_zooming(self):
        member = drawn(read_sample("tie_rod"))
        ruler = Ruler.fitting(member.position, 0.0, 800.0)
        moved = displacements(ROD, STORM)
        assert displaced_factor(member, ruler, moved) == 20.0
        assert displaced_factor(member, ruler.zoomed(5.0, 100.0), moved) == 20.0

    def test_the_least_of_movements_is_no_overflow(self):
        member = drawn(read_sample("tie_rod"))
        ruler = Ruler.fitting(member.position, 0.0, 800.0)
        assert displaced_factor(member, ruler, np.array([5e-324, *[0.0] * 7, 0.1])) > 0.0

    def test_of_what_does_not_move_there_is_none(self):
        member = drawn(read_sample("tie_rod"))
        ruler = Ruler.fitting(member.position, 0.0, 800.0)
        assert displaced_factor(member, ruler, np.zeros(9)) == 0.0

    def test_rounding_is_no_displacement(self):
        member = drawn(read_sample("tie_rod"))
        ruler = Ruler.fitting(member.position, 0.0, 800.0)
        assert displaced_factor(member, ruler, np.full(9, 1e-19)) == 0.0

    @BOTH_WAYS
    def test_joints_lie_where_they_have_moved_to(self, upright):
        member = drawn(read_sample("tie_rod"))
        frame: Frame = window_frame(member, SIZES[1], upright=upright)
        moved = displacements(ROD, STORM)
        strokes = displaced_outline(member, frame, lay_out(member, frame), moved, 20.0)
        place = strokes[3].points[0][1 if upright else 0]
        still = frame.ruler.pixel(member.position[3])
        assert place == pytest.approx(still + moved[3] * 20.0 * frame.ruler.scale)


@pytest.mark.parametrize("looks", [Looks(), Looks("stress", displaced=True), Looks("force", true=True)])
def test_looks_are_remembered_as_text(looks):
    assert Looks.of_text(looks.text) == looks
    assert Looks.of_text("nonsense") == Looks()


def test_what_is_said_stands_under_the_drawing():
    member = Member.of(read_sample("tie_rod"), Shown("envelope"))
    frame = replace(window_frame(member, SIZES[0], upright=False), detail=Detail(words="displaced ×50"))
    assert "displaced ×50" in {text.text for text in lay_out(member, frame).texts}
