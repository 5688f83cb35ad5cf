"""Companions on the drawing: lanes beside the member, ties, ends that part, labels; in both layouts."""

from __future__ import annotations

import pytest
from msgspec.structs import astuple, replace

from app import edits
from app.drawing.companions import lanes_of, pieces_of
from app.drawing.layout import lay_out, sketched
from app.drawing.member import Member
from app.drawing.shapes import OF_COMPANION, Box, Part
from app.drawing.tips import tip
from app.samples import read_sample
from app.shown import Shown
from solver.model import Display, Project
from tests.app.drawing.frames import SIZES, window_frame
from tests.sleeves import draw_bolt

PULLED = Shown("combination", "Pulled")
WARM = Shown("combination", "Paying out, warm")
BOTH_WAYS = pytest.mark.parametrize("upright", [False, True], ids=["across", "upright"])


def laid(project: Project, *, upright: bool, size=SIZES[1], shown=PULLED):
    layout = "vertical" if upright else "horizontal"
    project = replace(project, display=Display(orientation=layout))
    member = Member.of(project, shown)
    return sketched(member, window_frame(member, size, upright=upright))


def many() -> Project:
    """Four companions: one beside all, one at either end, one between."""
    project = edits.add_companion(draw_bolt(), "0", "3", "T")
    project = edits.set_value(project, ("companions", 1, "acts"), "tension")
    project = edits.add_companion(project, "0", "1", "U")
    return edits.add_companion(project, "2", "3", "V")


def body(sketch, index: int) -> Box:
    (found,) = [t.box for t in sketch.picture.targets if t.part == Part("companion", index)][:1]
    return found


def test_companions_share_a_lane_unless_they_lie_beside_one_another():
    assert lanes_of(Member.of(many(), PULLED)) == (0, 1, 0, 0)


@BOTH_WAYS
@pytest.mark.parametrize("size", SIZES, ids=["small", "large"])
def test_bodies_meet_neither_each_other_nor_the_member(upright, size):
    sketch = laid(many(), upright=upright, size=size)
    bodies = [body(sketch, index) for index in range(5)]
    assert not any(a.meets(b) for i, a in enumerate(bodies) for b in bodies[i + 1 :])
    member = [t.box for t in sketch.picture.targets if t.part.kind == "segment"]
    assert not any(a.meets(b) for a in bodies for b in member)
    texts = [text.box for text in sketch.picture.texts if text.part is not None and text.part.kind != "note"]
    assert not any(a.meets(b) for i, a in enumerate(texts) for b in texts[i + 1 :])


@BOTH_WAYS
def test_a_body_lies_between_its_joints_and_short_of_one_that_it_parts_from(upright):
    project = draw_bolt()
    parted, tied = (laid(p, upright=upright) for p in (project, draw_bolt("both")))
    low, high = (parted.along(joint) for joint in (1, 2))
    first, last = pieces_of(parted)
    assert first.ends[0] == pytest.approx(low)
    assert first.ends[1] == last.ends[0] == pytest.approx(low + 14 / 24 * (high - low))
    assert last.ends[1] == pytest.approx(high)

    def reach(sketch):
        (stroke,) = [s for s in sketch.picture.strokes if s.closed and s.part == Part("companion", 1)]
        along = [point[1] if upright else point[0] for point in stroke.points]
        return max(along, key=lambda a: abs(a - low))

    assert reach(tied) == pytest.approx(high)
    assert abs(high - reach(parted)) == pytest.approx(7.0)


@BOTH_WAYS
def test_ties_reach_from_the_members_edge_to_the_lane(upright):
    sketch = laid(draw_bolt("both"), upright=upright)
    for index, joint in ((0, 1), (1, 2)):
        ties = [
            s
            for s in sketch.picture.strokes
            if s.part == Part("companion", index) and not s.closed and len(s.points) == 2
        ]
        (tie,) = ties
        along = {point[1] if upright else point[0] for point in tie.points}
        assert along == {sketch.along(joint)}


@BOTH_WAYS
def test_labels_say_name_section_length_and_what_acts(upright):
    sketch = laid(draw_bolt(), upright=upright)
    said = {
        (text.part.kind, text.part.index): " ".join(text.text.split())
        for text in sketch.picture.texts
        if text.part is not None and text.part.kind in OF_COMPANION
    }
    assert said[("companion_name", 0)] == "S, compression only"
    assert said[("companion_load", 0)] == "ΔT 20 → 40 K"
    assert said[("companion_load", 1)] == "0.3 mm too long"
    assert said[("companion_section", 0)] == "⌀36×7"
    assert said[("companion_length", 1)] == "100"
    assert said[("companion_mark", 1)] == "Sb"
    assert sketch.picture.left_out == 0


def test_loads_are_those_of_the_shown_state_and_none_of_an_envelope():
    assert Member.of(draw_bolt(), Shown("combination", "Tight")).beside[0].heat == (0.0, 0.0)
    assert Member.of(draw_bolt(), PULLED).beside[0].heat == (20.0, 40.0)
    assert Member.of(draw_bolt(), Shown("envelope")).beside == ()


def test_one_that_does_not_fit_is_drawn_between_its_joints():
    project = edits.set_value(draw_bolt(), ("companions", 0, "segments", 0, "length"), 0.5)
    sketch = laid(project, upright=False)
    assert pieces_of(sketch)[1].ends[1] == pytest.approx(sketch.along(2))


def test_what_finds_no_room_is_counted_and_the_member_stays():
    project = draw_bolt()
    for _ in range(40):
        project = edits.add_companion(project, "0", "3")
    sketch = laid(project, upright=False, size=SIZES[0])
    drawn = {t.part.index for t in sketch.picture.targets if t.part.kind == "companion"}
    assert 0 < len(drawn) < 42
    assert sketch.picture.left_out >= 42 - len(drawn)
    assert sketch.rows.half >= 10.0


def test_the_tip_says_whose_segment_it_is():
    said = tip(Member.of(draw_bolt(), PULLED), Part("companion_mark", 0))
    assert "Segment Sa: ⌀36×7, 140 mm, Steel" in said
    assert "of companion S beside joints 1 to 2, compression only" in said
    assert "ΔT 20 → 40 K" in said


def test_a_member_without_companions_has_no_lanes():
    project = edits.remove_companions(draw_bolt(), [0])
    member = Member.of(project, PULLED)
    picture = lay_out(member, window_frame(member, SIZES[0], upright=False))
    assert not any("companions" in text.text for text in picture.texts)


@pytest.mark.parametrize("width", [560, 640, 760, 900, 1200])
@BOTH_WAYS
def test_a_label_stays_beside_its_own_segment_where_it_is_not_longer(upright, width):
    sketch = laid(read_sample("capstan_shaft"), upright=upright, size=(width, 1400), shown=WARM)
    labels = {"companion_name", "companion_load", "companion_section", "companion_length"}
    along = (1, 3) if upright else (0, 2)
    for text in sketch.picture.texts:
        if text.part is None or text.part.kind not in labels:
            continue
        piece = pieces_of(sketch)[text.part.index]
        low, high = (astuple(text.box)[i] for i in along)
        start, end = sorted(piece.ends)
        if high - low <= end - start:
            assert start - 0.01 <= low
            assert high <= end + 0.01
