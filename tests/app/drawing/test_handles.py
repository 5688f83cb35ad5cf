"""Handles of the drawing: every number once on each side, none outside the window, nearest first."""

from __future__ import annotations

from collections import Counter

import pytest

from app.drawing.handles import handle_at, handles_of
from app.drawing.layout import sketched
from tests.app.drawing.frames import SIZES, window_frame
from tests.drawn_members import busy_member, drawn


@pytest.fixture(params=[False, True], ids=["across", "upright"])
def sketch(request):
    member = drawn(busy_member(12))
    return sketched(member, window_frame(member, SIZES[1], upright=request.param))


def test_every_joint_but_the_first_and_both_sides_of_every_edge(sketch):
    found = Counter((handle.kind, handle.index) for handle in handles_of(sketch))
    assert {index for kind, index in found if kind == "joint"} == set(range(1, 13))
    assert all(found["edge", index] in (2, 6) for index in range(12))
    assert {index for kind, index in found if kind == "bore"} == {1, 5, 9}


def test_some_alone_are_those_of_all(sketch):
    some = handles_of(sketch, frozenset((3, 4)))
    assert some == [handle for handle in handles_of(sketch) if handle.index in (3, 4)]


def test_a_point_on_an_edge_takes_it_and_the_middle_of_a_segment_takes_nothing(sketch):
    handles = handles_of(sketch)
    edge = next(h for h in handles if (h.kind, h.index, h.where) == ("edge", 1, "both"))
    assert handle_at(handles, edge.centre) == edge
    middle = 0.5 * (sketch.along(1) + sketch.along(2))
    assert handle_at(handles, sketch.point(middle, sketch.rows.axis)) is None


def test_proportions_are_kept_while_something_is_pulled(sketch):
    other = drawn(busy_member(11))
    held = sketched(other, sketch.frame, sketch)
    assert (held.rows, held.scale, held.zero) == (sketch.rows, sketch.scale, sketch.zero)
