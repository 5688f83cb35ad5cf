"""Stops in the shown state: a bar across the gap of each closed one, and beside each what it does.

They are results, so they lie apart from the rest of the picture: whoever paints it greys them with the other
results that are out of date. A stop that the drawn member has no more is passed over.
"""

from __future__ import annotations

from collections.abc import Iterator

from msgspec.structs import replace

from app.drawing.frame import StopMark
from app.drawing.hanging import Drawn
from app.drawing.placing import CLEAR, STACKED, Placed, Wish
from app.drawing.shapes import Face, Stroke
from app.drawing.sketch import Sketch
from app.drawing.supports import faces_of, part_of, slide_of, span_of
from solver.model import StopSupport

BAR = 4.0  # half the width of the bar of a closed stop, px
BEHIND = 0.1  # px, so that it comes after the label of its stop


def contact_wishes(sketch: Sketch) -> list[Wish]:
    """What the stops inside the window do."""
    wishes = []
    for one, mark in _marked(sketch):
        if sketch.holds(one.joint):
            low, high = span_of(sketch, one)
            face: Face = "small_strong" if mark.closed else "small"
            slide = slide_of(sketch, one)
            along = 0.5 * (low + high) + BEHIND
            wish = sketch.wish(mark.text, along, part_of(one), face=face, slide=slide)
            wishes.append(replace(wish, of_results=True))
    return wishes


def put_under(sketch: Sketch, labels: list[Wish], contacts: list[Wish]) -> None:
    """The labels of supports and what stops do, upright one beneath the other in one column."""
    if sketch.frame.upright:
        placed = sketch.placed(labels + contacts, sketch.rows.under_label, STACKED)
        _put(sketch, placed, sketch.rows.under_label)
        return
    sketch.put(labels, sketch.rows.under_label, "low")
    _put(sketch, sketch.placed(contacts, sketch.rows.contact, CLEAR), sketch.rows.contact)


def _put(sketch: Sketch, placed: list[Placed], rows: tuple[tuple[float, float], ...]) -> None:
    for label in placed:
        if label.wish.of_results:
            wish, row = label.wish, rows[label.row]
            text = sketch.text_at(wish, label.span, row, "low", wish.face, "ink")
            sketch.picture.contact_texts.append(text)
        else:
            sketch.text(label.wish, label.span, rows[label.row], "low")


def draw_contacts(sketch: Sketch) -> None:
    """The bars of those that are closed."""
    for one, mark in _marked(sketch):
        if mark.closed and sketch.holds(one.joint):
            faces = faces_of(sketch, one)
            corners = [
                (faces.nose, faces.across - BAR),
                (faces.wall, faces.across - BAR),
                (faces.wall, faces.across + BAR),
                (faces.nose, faces.across + BAR),
            ]
            points = sketch.points(corners)
            bar = Stroke(points, width=1.0, closed=True, fill="ink", part=part_of(one), clip=False)
            sketch.picture.contact_strokes.append(bar)


def _marked(sketch: Sketch) -> Iterator[tuple[Drawn, StopMark]]:
    marks = {(mark.joint, mark.number): mark for mark in sketch.frame.detail.contacts}
    for one in sketch.supports if marks else ():
        mark = marks.get((sketch.member.project.joints[one.joint].mark, one.number))
        if mark is not None and isinstance(one.support, StopSupport):
            yield one, mark
