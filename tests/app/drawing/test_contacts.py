"""Stops in the shown state on the drawing, and several supports at one joint: all told apart."""

from __future__ import annotations

from dataclasses import replace
from itertools import combinations

import pytest
from msgspec import structs

from app.drawing.frame import StopMark
from app.drawing.hanging import drawn_supports
from app.drawing.layout import lay_out, sketched
from app.drawing.shapes import Box, Part, Picture
from app.drawing.supports import faces_of, span_of
from app.units import format_value
from solver.model import StopSupport, supports_of
from tests.app.drawing.frames import SIZES, window_frame
from tests.drawn_members import crowded_supports, drawn, stopped_member

BOTH_WAYS = pytest.mark.parametrize("upright", [False, True], ids=["across", "upright"])
PROJECT = crowded_supports()
MARKS = tuple(
    StopMark(joint.mark, number, number % 2 == 0, f"{number}: closed, 12.4 kN")
    for joint in PROJECT.joints
    for number, support in enumerate(supports_of(joint))
    if isinstance(support, StopSupport)
)


def picture(*, upright: bool, marks: tuple[StopMark, ...] = MARKS, size=SIZES[1]) -> Picture:
    member = drawn(PROJECT)
    frame = window_frame(member, size, upright=upright)
    return lay_out(member, replace(frame, detail=structs.replace(frame.detail, contacts=marks)))


class TestSeveralAtOneJoint:
    @BOTH_WAYS
    def test_no_two_symbols_share_a_place(self, upright):
        member = drawn(PROJECT)
        sketch = sketched(member, window_frame(member, SIZES[1], upright=upright))
        hung = [one for one in sketch.supports if one.hangs]
        places = [(*span_of(sketch, one), sketch.rows.under + 20.0 * one.level, one.joint) for one in hung]
        for (low, high, across, joint), (first, last, other, beside) in combinations(places, 2):
            assert joint != beside or across != other or last <= low or high <= first

    def test_every_support_can_be_pointed_at_by_itself(self):
        aimed = {target.part for target in picture(upright=False).targets if target.part.kind == "support"}
        assert aimed == {
            Part("support", joint, number)
            for joint, one in enumerate(PROJECT.joints)
            for number in range(len(supports_of(one)))
        }

    def test_two_alike_but_for_their_side_have_one_label(self):
        texts = [text.text for text in picture(upright=False).texts]
        assert texts.count("± gap 0.2 mm, rigid") == 2
        assert "− gap 1.25 mm, rigid" in texts
        assert f"+ gap 0 mm, {format_value(3.5e8, 'spring', 'mm-N-MPa', with_unit=True)}" in texts

    def test_the_end_shows_what_it_moves_against_on_the_axis(self):
        on_axis = [(one.joint, one.number) for one in drawn_supports(PROJECT) if not one.hangs]
        assert on_axis == [(0, 1), (4, 0)]  # the stop outward; the spring rather than the stop


class TestContacts:
    @BOTH_WAYS
    @pytest.mark.parametrize("size", SIZES, ids=["small", "large"])
    def test_what_stops_do_meets_no_other_label(self, upright, size):
        shown = picture(upright=upright, size=size)
        boxes = [text.box for text in (*shown.texts, *shown.contact_texts)]
        assert not [1 for a, b in combinations(boxes, 2) if a.meets(b)]

    @BOTH_WAYS
    def test_each_is_said_beside_its_stop(self, upright):
        shown = picture(upright=upright)
        assert len(shown.contact_texts) == len(MARKS)
        for text in shown.contact_texts:
            assert text.face == ("small_strong" if text.part.number % 2 == 0 else "small")

    @BOTH_WAYS
    def test_a_bar_bridges_the_gap_of_each_that_is_closed(self, upright):
        member = drawn(PROJECT)
        frame = window_frame(member, SIZES[1], upright=upright)
        sketch = sketched(member, replace(frame, detail=structs.replace(frame.detail, contacts=MARKS)))
        bars = {stroke.part: stroke for stroke in sketch.picture.contact_strokes}
        assert {part.number % 2 for part in bars} == {0}
        for one in sketch.supports:
            bar = bars.get(Part("support", one.joint, one.number))
            if bar is not None:
                faces = faces_of(sketch, one)
                along = {point[1 if upright else 0] for point in bar.points}
                assert along == {faces.nose, faces.wall}

    def test_room_is_taken_by_members_with_results_of_stops_only(self):
        bare = picture(upright=False, marks=())
        assert (bare.contact_texts, bare.contact_strokes) == ([], [])
        assert bare.factor >= picture(upright=False).factor

    def test_a_stop_that_is_gone_is_passed_over(self):
        gone = (StopMark("1", 9, True, "x"), StopMark("none", 0, True, "x"), StopMark("2", 0, True, "x"))
        assert not picture(upright=False, marks=gone).contact_texts


def test_a_stop_behind_the_end_stands_clear_of_it():
    member = drawn(stopped_member())
    sketch = sketched(member, window_frame(member, SIZES[0], upright=False))
    first = sketch.supports[0]
    faces = faces_of(sketch, first)
    assert (first.end, faces.nose) == (-1, sketch.along(0))
    assert faces.wall < faces.nose
    assert isinstance(sketch.picture.box_of(Part("support", 0)), Box)
