"""The drawing's layout without a window: labels apart and whole, to scale, everything within reach."""

from __future__ import annotations

from dataclasses import replace
from itertools import combinations

import pytest
from msgspec import structs

from app.drawing.body import edge_at
from app.drawing.layout import lay_out, sketched
from app.drawing.member import Member
from app.drawing.shapes import Box, Part, Picture, Stroke, Text
from app.drawing.tips import tip
from app.samples import names, read_sample
from app.shown import Shown
from app.units import format_value
from solver.model import Project, RoundSection
from solver.sections import outline
from tests.app.drawing.frames import SIZES, window_frame
from tests.drawn_members import all_members, busy_member, drawn, first_state, stopped_member, uneven_member

MEMBERS = all_members()
EVERY_MEMBER = pytest.mark.parametrize("name", MEMBERS)
BOTH_WAYS = pytest.mark.parametrize("upright", [False, True], ids=["across", "upright"])
BOTH_SIZES = pytest.mark.parametrize("size", SIZES, ids=["small", "large"])


def picture(project: Project, *, upright: bool = False, size: tuple[float, float] = SIZES[0]) -> Picture:
    member = drawn(project)
    return lay_out(member, window_frame(member, size, upright=upright))


def holds(outer: Box, inner: Box) -> bool:
    return outer.contains((inner.left, inner.top)) and outer.contains((inner.right, inner.bottom))


def around(stroke: Stroke) -> Box:
    xs, ys = zip(*stroke.points, strict=True)
    return Box(min(xs), min(ys), max(xs), max(ys))


def overlapping(texts: list[Text]) -> list[tuple[str, str]]:
    """Pairs of texts whose boxes meet."""
    return [(a.text, b.text) for a, b in combinations(texts, 2) if a.box.meets(b.box)]


class TestLabels:
    @EVERY_MEMBER
    @BOTH_WAYS
    @BOTH_SIZES
    def test_none_lies_on_another(self, name, upright, size):
        assert overlapping(picture(MEMBERS[name], upright=upright, size=size).texts) == []

    @EVERY_MEMBER
    @BOTH_WAYS
    @BOTH_SIZES
    def test_none_is_cut_off(self, name, upright, size):
        frame = window_frame(drawn(MEMBERS[name]), size, upright=upright)
        shown = picture(MEMBERS[name], upright=upright, size=size).texts
        assert [t.text for t in shown if not holds(frame.box, t.box)] == []

    @BOTH_WAYS
    def test_a_sample_loses_none_of_its_lengths_sections_and_forces(self, upright):
        project = read_sample("quay_pile")
        shown = picture(project, upright=upright, size=SIZES[1]).texts
        lengths = [t for t in shown if t.part is not None and t.part.kind in ("length", "section")]
        forces = [t for t in shown if t.part is not None and t.part.kind == "force"]
        assert len(lengths) == 2 * len(project.segments)
        assert len(forces) == 3
        marks = {t.text for t in shown if t.part is not None and t.part.kind == "mark"}
        assert marks == {segment.mark for segment in project.segments}

    @BOTH_WAYS
    def test_an_envelope_says_in_the_corner_where_its_loads_are(self, upright):
        for name in names():
            member = Member.of(read_sample(name), Shown("envelope"))
            frame = window_frame(member, SIZES[0], upright=upright)
            shown = lay_out(member, frame)
            (note,) = [t for t in shown.texts if t.text.startswith("loads:")]
            assert (note.box.left, note.box.top) == (frame.box.left + 6, frame.box.top + 4)
            assert note.ink == "quiet"
            assert overlapping(shown.texts) == []
            bodies = [s for s in shown.strokes if s.part is not None and s.part.kind == "segment"]
            assert not any(around(s).meets(note.box) for s in bodies)

    def test_the_stretch_across_is_said(self):
        shown = picture(read_sample("tie_rod"))
        assert any(t.text.startswith("across ×") for t in shown.texts)


class TestScale:
    @BOTH_WAYS
    def test_sections_have_their_depth_times_one_factor(self, upright):
        project = read_sample("tie_rod")
        member = drawn(project)
        frame = window_frame(member, SIZES[1], upright=upright)
        shown = lay_out(member, frame)
        scale = shown.factor * frame.ruler.pixels_per_metre
        for index, segment in enumerate(project.segments):
            body = next(s for s in shown.strokes if s.part == Part("segment", index) and s.closed)
            box = around(body)
            width, height = box.right - box.left, box.bottom - box.top
            along, across = (height, width) if upright else (width, height)
            deepest = max(outline(segment.section, s).outer for s in (0.0, 1.0))
            assert across == pytest.approx(2 * deepest * scale, rel=1e-6)
            assert along == pytest.approx(segment.length * frame.ruler.pixels_per_metre, rel=1e-6)

    def test_upright_the_first_joint_is_at_the_foot(self):
        shown = picture(read_sample("quay_pile"), upright=True)
        first, last = (
            next(s for s in shown.strokes if s.part == Part("segment", i) and s.closed) for i in (0, 4)
        )
        assert around(first).bottom > around(last).bottom


class TestLevels:
    @BOTH_SIZES
    def test_datum_and_top_are_written_however_many_joints_there_are(self, size):
        member = drawn(busy_member(40))
        shown = picture(busy_member(40), upright=True, size=size)
        levels = {t.text for t in shown.texts if t.part is not None and t.part.kind == "joint"}
        assert {"±0", f"+{format_value(member.position[-1], 'length', member.system, strip=True)}"} <= levels

    def test_the_mark_of_a_joint_stands_under_its_level(self):
        project = read_sample("quay_pile")
        member = drawn(project)
        frame = window_frame(member, SIZES[1], upright=True)
        texts = [t for t in lay_out(member, frame).texts if t.part is not None and t.part.kind == "joint"]
        marks = {t.text: t for t in texts if t.text[0] not in "±+"}
        assert set(marks) == {joint.mark for joint in project.joints}
        for text in marks.values():
            line = frame.ruler.pixel(member.position[text.part.index])
            assert line < text.box.top < line + 6.0
        assert max(t.box.right for t in texts) <= frame.box.right

    @BOTH_SIZES
    @pytest.mark.parametrize("count", [12, 40, 200])
    def test_marks_take_no_place_of_a_level(self, size, count):
        shown = picture(busy_member(count), upright=True, size=size)
        texts = [t for t in shown.texts if t.part is not None and t.part.kind == "joint"]
        assert not any(a.box.meets(b.box) for a, b in combinations(texts, 2))

    def test_each_is_on_the_line_of_its_joint(self):
        member = drawn(read_sample("quay_pile"))
        frame = window_frame(member, SIZES[1], upright=True)
        shown = lay_out(member, frame)
        for text in shown.texts:
            if text.part is not None and text.part.kind == "joint" and text.text[0] in "±+":
                assert text.box.bottom == pytest.approx(frame.ruler.pixel(member.position[text.part.index]))


class TestNotToScale:
    @BOTH_WAYS
    def test_is_said_by_the_marks_of_the_segments(self, upright):
        shown = picture(uneven_member(), upright=upright, size=SIZES[1])
        lines = [t for t in shown.texts if t.part == Part("note", -1) and "×" not in t.text]
        note = " ".join(t.text for t in sorted(lines, key=lambda t: t.box.top))
        assert note == "S0, S2, S4, S5 and 3 others: not to scale along"

    @BOTH_WAYS
    def test_is_marked_by_a_break_of_the_dimension_line(self, upright):
        lines = [
            picture(p, upright=upright, size=SIZES[1]).strokes for p in (uneven_member(), busy_member(4))
        ]
        breaks = [max(len(s.points) for s in strokes if s.ink == "quiet") for strokes in lines]
        assert breaks == [2 + 4 * 7, 4]  # else that of a distributed load

    def test_is_not_said_where_there_is_none(self):
        assert not any("to scale" in t.text for t in picture(busy_member(12)).texts)


class TestParts:
    @EVERY_MEMBER
    @BOTH_WAYS
    def test_every_segment_and_joint_can_be_pointed_at(self, name, upright):
        shown = picture(MEMBERS[name], upright=upright)
        hit = {shown.target_at(target.box.centre).part for target in shown.targets}
        segments, joints = MEMBERS[name].segments, MEMBERS[name].joints
        reach = {(part.kind, part.index) for part in hit}
        assert {("segment", i) for i in range(len(segments))} | {
            ("joint", i) for i in range(len(joints))
        } <= reach

    def test_supports_loads_and_dimensions_too(self):
        kinds = {target.part.kind for target in picture(busy_member(12)).targets}
        assert {"support", "force", "distributed", "length"} <= kinds

    def test_stops_show_their_gap(self):
        texts = {text.text for text in picture(stopped_member(), size=SIZES[1]).texts}
        assert {
            "gap 0.2 mm, rigid",
            f"gap 0.5 mm, {format_value(1e8, 'spring', 'mm-N-MPa', with_unit=True)}",
        } <= texts

    def test_a_tooltip_keeps_what_a_label_says(self):
        member = drawn(busy_member(12))
        said = tip(member, Part("segment", 3))
        for words in ("S3", "A 2000→3000", "450 mm", "Steel", "bedding 1 N/mm²", "0.2 mm too long"):
            assert words in said
        assert "fixed" in tip(member, Part("support", 0))
        assert "force" in tip(member, Part("force", 4))

    def test_outside_everything_there_is_nothing(self):
        assert picture(busy_member(1)).target_at((-5.0, -5.0)) is None


class TestLoads:
    def test_are_those_of_the_shown_state_with_its_factors(self):
        project = busy_member(12)
        one = Member.of(project, Shown("combination", "Combination 0"))
        other = Member.of(project, Shown("combination", "Combination 5"))
        assert one.loads is not None
        assert other.loads is not None
        assert other.loads.joint_force == pytest.approx(1.5 * one.loads.joint_force)

    def test_of_an_envelope_there_are_none(self):
        project = busy_member(12)
        member = Member.of(project, Shown("envelope"))
        assert member.loads is None
        shown = lay_out(member, window_frame(member, SIZES[0], upright=False))
        assert "force" not in {t.part.kind for t in shown.targets}

    @pytest.mark.parametrize("force", [1.0, -1.0])
    @BOTH_WAYS
    def test_an_arrow_points_the_way_of_its_force(self, force, upright):
        project = busy_member(4)
        member = drawn(project)
        forces = member.loads.joint_force.copy()
        forces[:] = 0.0
        forces[0, 3] = force
        member = replace(member, loads=replace(member.loads, joint_force=forces))
        frame = window_frame(member, SIZES[1], upright=upright)
        shaft = next(
            s for s in lay_out(member, frame).strokes if s.part == Part("force", 3) and len(s.points) == 2
        )
        moved = shaft.points[1][int(upright)] - shaft.points[0][int(upright)]
        grows = frame.ruler.pixel(1.0) - frame.ruler.pixel(0.0)
        assert moved * grows * force > 0


@BOTH_WAYS
def test_zoomed_in_only_what_is_in_the_window_is_labelled(upright):
    member = drawn(busy_member(25))
    whole = window_frame(member, SIZES[0], upright=upright)
    ruler = whole.ruler.zoomed(6.0, whole.ruler.begin)
    shown = lay_out(member, replace(whole, ruler=ruler))
    marked = {t.part.index for t in shown.texts if t.part is not None and t.part.kind == "mark"}
    inside = {i for i in range(25) if member.position[i] < ruler.last}
    assert marked == inside
    assert overlapping(shown.texts) == []


def test_first_state_of_the_helpers_is_a_state():
    assert first_state(busy_member(2)) == Shown("combination", "Combination 0")


def strokes_of(project: Project, *, zoom: float = 1.0) -> int:
    member = drawn(project)
    frame = window_frame(member, SIZES[0], upright=False)
    middle = 0.5 * (frame.ruler.begin + frame.ruler.end)
    frame = replace(frame, ruler=frame.ruler.zoomed(zoom, middle))
    return sum(len(stroke.points) for stroke in sketched(member, frame).picture.strokes)


def test_a_close_look_at_a_distributed_load_draws_no_arrow_outside_the_window():
    assert strokes_of(busy_member(1), zoom=1e4) < 1000


def test_the_deepest_section_is_drawn_within_its_room():
    project = busy_member(1)
    section = RoundSection(diameter=1e10)
    deep = structs.replace(project, segments=(structs.replace(project.segments[0], section=section),))
    member = drawn(deep)
    sketch = sketched(member, window_frame(member, SIZES[0], upright=False))
    assert edge_at(sketch, 0) <= sketch.rows.half
    assert strokes_of(deep) < 1000
