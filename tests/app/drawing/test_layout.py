"""The drawing's layout without a window: labels apart and whole, to scale, everything within reach."""

from __future__ import annotations

from dataclasses import replace
from itertools import combinations

import pytest
from hypothesis import example, given
from hypothesis import strategies as st
from msgspec import structs
from PySide6.QtCore import QPointF, QRectF
from PySide6.QtGui import QFont, QPolygonF

from app.drawing.layout import lay_out
from app.drawing.member import Member
from app.drawing.placing import CLEAR, Wish, fits, place
from app.drawing.ruler import Ruler
from app.drawing.shapes import Part, Picture, Text
from app.drawing.tips import tip
from app.gui.fonts import Fonts
from app.gui.sheet_layout import Place, sheet_layout
from app.gui.view import Shown
from app.samples import names, read_sample
from app.units import SYSTEM_NAMES
from solver.model import Project
from solver.sections import outline
from tests.gui.sheets import (
    SIZES,
    all_members,
    busy_member,
    drawing_place,
    drawn,
    first_state,
    stopped_member,
)

MEMBERS = all_members()
EVERY_MEMBER = pytest.mark.parametrize("name", MEMBERS)
BOTH_WAYS = pytest.mark.parametrize("upright", [False, True], ids=["across", "upright"])
BOTH_SIZES = pytest.mark.parametrize("size", SIZES, ids=["small", "large"])


def picture(project: Project, *, upright: bool = False, size: tuple[int, int] = SIZES[0]) -> Picture:
    member = drawn(project)
    return lay_out(member, drawing_place(member, size, upright=upright))


def overlapping(texts: list[Text]) -> list[tuple[str, str]]:
    """Pairs of texts whose boxes share more than a hair."""
    tight = [(text, text.rect.adjusted(0.5, 0.5, -0.5, -0.5)) for text in texts]
    return [(a.text, b.text) for (a, x), (b, y) in combinations(tight, 2) if x.intersects(y)]


@pytest.mark.usefixtures("qapp")
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
        place_ = drawing_place(drawn(MEMBERS[name]), size, upright=upright)
        cut = [
            t.text
            for t in picture(MEMBERS[name], upright=upright, size=size).texts
            if not place_.rect.contains(t.rect)
        ]
        assert cut == []

    @BOTH_WAYS
    def test_a_sample_loses_none_of_its_lengths_sections_and_forces(self, upright):
        project = read_sample("quay_pile")
        shown = picture(project, upright=upright, size=SIZES[1]).texts
        lengths = [t for t in shown if t.part is not None and t.part.kind == "length"]
        forces = [t for t in shown if t.part is not None and t.part.kind == "force"]
        assert len(lengths) == 2 * len(project.segments)
        assert len(forces) == 3
        marks = {t.text for t in shown if t.part is not None and t.part.kind == "segment"}
        assert marks == {segment.mark for segment in project.segments}

    @pytest.mark.parametrize("units", SYSTEM_NAMES)
    @pytest.mark.parametrize("name", names())
    def test_no_text_touches_a_hatch_nor_the_edge(self, name, units):
        project = read_sample(name)
        project = structs.replace(project, display=structs.replace(project.display, units=units))
        for upright in (False, True):
            shown = picture(project, upright=upright)
            hatches = [QPolygonF(stroke.points).boundingRect() for stroke in shown.strokes if stroke.pairs]
            for text in shown.texts:
                assert text.rect.left() >= 4.0
                near = text.rect.adjusted(-2, 0, 2, 0)
                assert not any(near.intersects(hatch) for hatch in hatches), text.text

    @BOTH_WAYS
    def test_an_envelope_says_in_the_corner_where_its_loads_are(self, upright):
        for name in names():
            member = Member.of(read_sample(name), Shown("envelope"))
            place_ = drawing_place(member, SIZES[0], upright=upright)
            shown = lay_out(member, place_)
            (note,) = [t for t in shown.texts if t.text.startswith("loads:")]
            assert (note.rect.left(), note.rect.top()) == (place_.rect.left() + 6, place_.rect.top() + 4)
            assert note.ink == "quiet"
            assert overlapping(shown.texts) == []
            bodies = [s for s in shown.strokes if s.part is not None and s.part.kind == "segment"]
            assert not any(QPolygonF(s.points).boundingRect().intersects(note.rect) for s in bodies)

    @pytest.mark.parametrize("size", [1.0, 1.5])
    def test_forces_keep_their_values_upright_at_large_fonts(self, size):
        font = QFont()
        font.setPointSizeF(size * font.pointSizeF())
        project = read_sample("quay_pile")
        project = structs.replace(project, display=structs.replace(project.display, units="in-lbf-psi"))
        member = drawn(project)
        layout = sheet_layout(900, 473, True, Fonts(font).text_height)
        ruler = Ruler.whole(member.position[-1], layout.begin, layout.end)
        shown = lay_out(member, Place(layout.drawing, ruler, layout.axes, Fonts(font)))
        assert len([t for t in shown.texts if t.part is not None and t.part.kind == "force"]) == 3
        assert overlapping(shown.texts) == []

    def test_the_stretch_across_is_said(self):
        shown = picture(read_sample("tie_rod"))
        assert any(t.text.startswith("across ×") for t in shown.texts)


@pytest.mark.usefixtures("qapp")
class TestScale:
    @BOTH_WAYS
    def test_sections_have_their_depth_times_one_factor(self, upright):
        project = read_sample("tie_rod")
        member = drawn(project)
        place_ = drawing_place(member, SIZES[1], upright=upright)
        shown = lay_out(member, place_)
        scale = shown.factor * place_.ruler.pixels_per_metre
        for index, segment in enumerate(project.segments):
            body = next(s for s in shown.strokes if s.part == Part("segment", index) and s.closed)
            rect = QRectF(body.points[0], body.points[0])
            for point in body.points:
                rect |= QRectF(point, QPointF(point.x() + 1e-9, point.y() + 1e-9))
            across = rect.width() if upright else rect.height()
            along = rect.height() if upright else rect.width()
            deepest = max(outline(segment.section, s).outer for s in (0.0, 1.0))
            assert across == pytest.approx(2 * deepest * scale, rel=1e-6)
            assert along == pytest.approx(segment.length * place_.ruler.pixels_per_metre, rel=1e-6)

    def test_upright_the_first_joint_is_at_the_foot(self):
        shown = picture(read_sample("quay_pile"), upright=True)
        first, last = (
            next(s for s in shown.strokes if s.part == Part("segment", i) and s.closed) for i in (0, 4)
        )
        assert max(p.y() for p in first.points) > max(p.y() for p in last.points)


@pytest.mark.usefixtures("qapp")
class TestParts:
    @EVERY_MEMBER
    @BOTH_WAYS
    def test_every_segment_and_joint_can_be_pointed_at(self, name, upright):
        shown = picture(MEMBERS[name], upright=upright)
        hit = {shown.target_at(target.rect.center()).part for target in shown.targets}
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
        assert {"gap 0.2 mm", "gap 0.5 mm"} <= texts

    def test_a_tooltip_keeps_what_a_label_says(self):
        member = drawn(busy_member(12))
        said = tip(member, Part("segment", 3))
        for words in ("S3", "A 2000→3000", "450 mm", "Steel", "bedding 1 N/mm²", "0.2 mm too long"):
            assert words in said
        assert "fixed" in tip(member, Part("support", 0))
        assert "force" in tip(member, Part("force", 4))

    def test_outside_everything_there_is_nothing(self):
        assert picture(busy_member(1)).target_at(QPointF(-5.0, -5.0)) is None


@pytest.mark.usefixtures("qapp")
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
        shown = lay_out(member, drawing_place(member, SIZES[0], upright=False))
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
        place_ = drawing_place(member, SIZES[1], upright=upright)
        shaft = next(
            s for s in lay_out(member, place_).strokes if s.part == Part("force", 3) and len(s.points) == 2
        )
        moved = place_.axes.along(shaft.points[1]) - place_.axes.along(shaft.points[0])
        grows = place_.ruler.pixel(1.0) - place_.ruler.pixel(0.0)
        assert moved * grows * force > 0


@pytest.mark.usefixtures("qapp")
@BOTH_WAYS
def test_zoomed_in_only_what_is_in_the_window_is_labelled(upright):
    member = drawn(busy_member(25))
    whole = drawing_place(member, SIZES[0], upright=upright)
    ruler = whole.ruler.zoomed(6.0, whole.ruler.begin)
    shown = lay_out(member, replace(whole, ruler=ruler))
    marked = {t.part.index for t in shown.texts if t.part is not None and t.part.kind == "segment"}
    inside = {i for i in range(25) if member.position[i] < ruler.last}
    assert marked == inside
    assert overlapping(shown.texts) == []


def test_first_state_of_the_helpers_is_a_state():
    assert first_state(busy_member(2)) == Shown("combination", "Combination 0")


LABELS = st.lists(
    st.tuples(st.floats(0, 500), st.floats(1, 80), st.integers(0, 3), st.floats(0, 60)), max_size=25
)


@given(LABELS, st.integers(1, 3))
def test_placed_labels_stay_apart_inside_and_near(labels, rows):
    wishes = [Wish("x", at, extent, 10.0, Part("note", 0), rank, slide) for at, extent, rank, slide in labels]
    placed = place(wishes, rows, (0.0, 500.0))
    for label in placed:
        middle = 0.5 * sum(label.span)
        assert abs(middle - label.wish.along) <= label.wish.slide + 1e-3
        assert label.span[0] >= -1e-3
        assert label.span[1] <= 500.0 + 1e-3
    for a, b in combinations(placed, 2):
        assert a.row != b.row or a.span[1] <= b.span[0] or b.span[1] <= a.span[0]


def has_room(wish: Wish, standing: list[tuple[float, float]]) -> bool:
    """Whether a gap between what stands in a row of 500 px is plainly (by 0.001 px) wide enough in reach."""
    half, at = 0.5 * wish.extent, max(wish.along - wish.slide, 0.5 * wish.extent)
    last = min(wish.along + wish.slide, 500.0 - half)
    for low, high in sorted(standing):
        if at + 1e-3 <= min(last, low - CLEAR - half):
            return True
        at = max(at, high + CLEAR + half)
    return at + 1e-3 <= last


@given(LABELS, st.integers(1, 3))
@example([(120.0, 40.0, 0, 0.0), (80.0, 40.0, 1, 15.0)], 1)  # the second gives way by less than its half
def test_a_label_is_dropped_only_where_no_row_has_room_for_it(labels, rows):
    wishes = [Wish("x", at, extent, 10.0, Part("note", 0), rank, slide) for at, extent, rank, slide in labels]
    placed = place(wishes, rows, (0.0, 500.0))
    standing = [[] for _ in range(rows)]
    for wish in sorted(wishes, key=lambda w: (w.rank, w.along)):
        label = next((label for label in placed if label.wish is wish), None)
        if label is not None:
            standing[label.row].append(label.span)
        else:
            assert not any(has_room(wish, row) for row in standing)


@given(LABELS, st.integers(1, 3))
def test_labels_fit_where_all_are_placed(labels, rows):
    wishes = [Wish("x", at, extent, 10.0, Part("note", 0), rank, slide) for at, extent, rank, slide in labels]
    assert fits(wishes, rows, (0.0, 500.0)) == (len(place(wishes, rows, (0.0, 500.0))) == len(wishes))


@given(st.lists(st.floats(1, 80), min_size=1, max_size=20))
def test_labels_that_just_fill_a_row_fit_and_no_more(extents):
    wishes, end = [], 0.0
    for extent in extents:
        wishes.append(Wish("x", end + 0.5 * extent, extent, 10.0, Part("note", 0)))
        end += extent + CLEAR
    room = (0.0, end - CLEAR)
    assert fits(wishes, 1, room)
    assert not fits([*wishes, Wish("x", 0.0, 1.0, 10.0, Part("note", 0), slide=end)], 1, room)
