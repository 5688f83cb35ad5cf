"""Where two pictures differ: what a step of a pull has to paint anew."""

from __future__ import annotations

import pytest

from app.drawing.difference import bounds_of, differing_box
from app.drawing.shapes import Box, Circle, Part, Picture, Stroke, Target, Text

LINE = Stroke(((10.0, 20.0), (30.0, 5.0)))
TEXT = Text(Box(100.0, 40.0, 120.0, 50.0), "2 kN")
TARGET = Target(Box(0.0, 0.0, 3.0, 4.0), Part("joint", 0))
CIRCLE = Circle((50.0, 50.0), 6.0)


def test_pictures_alike_do_not_differ():
    one, other = (Picture(strokes=[LINE], circles=[CIRCLE], texts=[TEXT], targets=[TARGET]) for _ in "ab")
    assert differing_box(one, other) is None


@pytest.mark.parametrize(
    ("kind", "shape", "box"),
    [
        ("strokes", LINE, Box(10.0, 5.0, 30.0, 20.0)),
        ("circles", CIRCLE, Box(44.0, 44.0, 56.0, 56.0)),
        ("texts", TEXT, TEXT.box),
        ("targets", TARGET, TARGET.box),
    ],
)
def test_what_came_or_went_is_in_the_box(kind, shape, box):
    more, less = Picture(strokes=[LINE] * 2), Picture(strokes=[LINE] * 2)
    getattr(more, kind)[:] = [shape]
    getattr(less, kind)[:] = []
    assert bounds_of(shape) == box
    assert differing_box(more, less) == differing_box(less, more) == box


def test_the_box_holds_where_a_part_was_and_where_it_is():
    moved = Text(Box(200.0, 40.0, 220.0, 50.0), "2 kN")
    box = differing_box(Picture(texts=[TEXT]), Picture(texts=[moved]))
    assert box == Box(100.0, 40.0, 220.0, 50.0)
