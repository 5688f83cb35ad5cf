"""From a member and a place to a picture: how much room each row gets, then the parts one after another.

Needs no window: only a ruler, a rectangle and the measure of texts.
"""

from __future__ import annotations

from dataclasses import dataclass

from PySide6.QtCore import QPointF, QRectF, QSizeF

from app.gui.drawing.body import aim_at_joints, draw_body
from app.gui.drawing.chain import (
    LEVEL_GAP,
    draw_chain,
    draw_levels,
    length_wishes,
    level_texts,
    section_wishes,
)
from app.gui.drawing.loads import draw_loads, lies_outside, load_wishes, no_loads_text
from app.gui.drawing.member import Member
from app.gui.drawing.placing import TIGHT, Span, Wish, fits
from app.gui.drawing.shapes import Part, Picture, Text
from app.gui.drawing.sketch import Rows, Sketch
from app.gui.drawing.supports import draw_supports, hanging_wishes, hangs, support_of
from app.gui.sheet_layout import Place
from app.units import format_value
from app.words import tr
from solver.model import end_of
from solver.sections import outline

BAND = 17.0  # distributed loads at their largest, px
ARROWS = 18.0  # the row of joint forces
UNDER = 20.0  # the row of hanging supports
LEAST_HALF = 13.0  # of the thickest section, before labels of loads give way, px
THINNEST = 6.0  # before lengths and sections do
EDGE = 10.0  # upright, between sections and the edge of the sheet
BEDDING = 6.0  # for the hatch along the member
BESIDE = 6.0  # between labels of hanging supports and lengths
CHAIN = 7.0  # to either side of the dimension line
FACTORS = (1.0, 1.2, 1.5, 1.8, 2.0, 2.5, 3.0, 3.5, 4.0, 4.5, 5.0, 6.0, 7.0, 8.0, 9.0)  # of each power of ten
MOST_ROWS = 3  # of labels of loads; upright as much less of a column
COLUMN = 0.34  # widest column of load labels upright, of the drawing's room


@dataclass(frozen=True, slots=True)
class _Wishes:
    """The labels that want a place in rows: how much room those get follows from them."""

    loads: list[Wish]
    lengths: list[Wish]
    sections: list[Wish]
    hanging: list[Wish]

    @classmethod
    def of(cls, sketch: Sketch) -> _Wishes:
        return cls(load_wishes(sketch), length_wishes(sketch), section_wishes(sketch), hanging_wishes(sketch))


def lay_out(member: Member, place: Place) -> Picture:
    """The picture of a member in its place."""
    sketch = Sketch(member, place, _no_rows(), zero=0.0, scale=0.0)
    wishes = _Wishes.of(sketch)
    _give_rows(sketch, wishes)
    draw_chain(sketch, wishes.lengths, wishes.sections)
    draw_body(sketch)
    draw_supports(sketch, wishes.hanging)
    _draw_no_loads(sketch)
    draw_loads(sketch, wishes.loads)
    aim_at_joints(sketch)
    _draw_factor(sketch)
    _set_edge(sketch)
    return sketch.picture


def _set_edge(sketch: Sketch) -> None:
    """Where joint lines begin: at the dimension line, or upright at the column of levels."""
    if sketch.place.axes.upright:
        column = _level_column(sketch)
        draw_levels(sketch, column)
        sketch.picture.chain_edge = column.left()
    else:
        sketch.picture.chain_edge = sketch.point(0.0, sketch.rows.sections[-1][1]).y()


def _level_column(sketch: Sketch) -> QRectF:
    rect = sketch.place.rect
    width = max(sketch.place.fonts.measure(t, "small").width() for t in level_texts(sketch))
    return QRectF(QPointF(rect.right() - width - LEVEL_GAP - 6.0, rect.top()), rect.bottomRight())


def _give_rows(sketch: Sketch, wishes: _Wishes) -> None:
    """Give a sketch its rows: those that are needed get their room, the member the rest."""
    place = sketch.place
    low, high = place.axes.across_of(place.rect)
    if place.axes.upright:
        high = _level_column(sketch).left()
        sketch.zero = high
    else:
        sketch.zero = low
    sketch.rows = _rows(sketch, wishes, high - low)
    factor = _factor(sketch.rows.half / (_thickest(sketch.member) * place.ruler.pixels_per_metre))
    sketch.scale = factor * place.ruler.pixels_per_metre
    sketch.picture.factor = factor


def _no_rows() -> Rows:
    nothing = (0.0, 0.0)
    return Rows((nothing,), nothing, 0.0, 0.0, 0.0, 0.0, nothing, (nothing,), 0.0, (nothing,))


def _rows(sketch: Sketch, wishes: _Wishes, room: float) -> Rows:
    """As many rows of labels as leave the member enough room."""
    for most in range(MOST_ROWS, 0, -1):
        rows = _rows_with(sketch, wishes, room, most)
        if rows.half >= (LEAST_HALF if most > 1 else THINNEST):
            return rows
    return _rows_with(sketch, wishes, room, 0)


def _rows_with(sketch: Sketch, wishes: _Wishes, room: float, most: int) -> Rows:
    """The rows from both sides inward; the member gets what is left between them.

    Of labels of loads there are at most `most` rows; with 0 one, and one of lengths and of sections each.
    """
    labels = _label_rows(sketch, wishes.loads, room, max(most, 1))
    top = labels[-1][1] + 2.0
    band = (top, top + (BAND if _has_distributed(sketch) else 0.0))
    first = band[1] + (ARROWS if _has_inner_forces(sketch) else 5.0)
    edge = EDGE if sketch.place.axes.upright else 4.0
    sections = _text_rows(sketch, wishes.sections, room - edge, most)
    chain = sections[0][0] - CHAIN
    lengths = _text_rows(sketch, wishes.lengths, chain - CHAIN, most)
    under_label, under = _under_rows(wishes.hanging, lengths[0][0])
    last = (under - 0.5 * UNDER if _has_hanging(sketch) else under_label[0]) - 9.0
    last -= BEDDING if _has_bedding(sketch) else 0.0
    return Rows(
        labels=tuple(reversed(labels)),
        band=band,
        arrows=band[1] + 0.5 * ARROWS,
        axis=0.5 * (first + last),
        half=max(0.5 * (last - first), 4.0),
        under=under,
        under_label=under_label,
        lengths=tuple(reversed(lengths)),
        chain=chain,
        sections=sections,
    )


def _label_rows(sketch: Sketch, wishes: list[Wish], room: float, most: int) -> tuple[Span, ...]:
    """As many rows as the labels of loads need, up to `most`; upright one column as wide as they are."""
    first = 4.0 if sketch.place.axes.upright else 4.0 + _note_size(sketch).height()
    if not wishes:
        return ((first, first),)
    depth = max(w.depth for w in wishes)
    if sketch.place.axes.upright:
        forces = max((w.depth for w in wishes if w.part.kind == "force"), default=0.0)
        column = min(max(COLUMN * room * most / MOST_ROWS, forces), COLUMN * room)
        widest = max((w.depth for w in wishes if w.depth <= column), default=0.0)
        return ((first, first + widest),)
    count = 1
    while count < most and not fits(wishes, count, sketch.room):
        count += 1
    return tuple((first + i * depth, first + (i + 1) * depth) for i in range(count))


def _under_rows(wishes: list[Wish], foot: float) -> tuple[Span, float]:
    """The row of labels of hanging supports, which ends at `foot`, and the line the supports hang on."""
    depth = max((w.depth for w in wishes), default=0.0)
    foot -= BESIDE if depth else 0.0
    return (foot - depth, foot), foot - depth - 0.5 * UNDER


def _text_rows(sketch: Sketch, wishes: list[Wish], foot: float, most: int) -> tuple[Span, ...]:
    """One row, or two where a text is too long for one; the last ends at `foot`."""
    if not wishes:
        return ((foot, foot),)
    depth = max(w.depth for w in wishes)
    single = not most or sketch.place.axes.upright or fits(wishes, 1, sketch.room, TIGHT)
    count = 1 if single else 2
    return tuple((foot - (count - i) * depth, foot - (count - i - 1) * depth) for i in range(count))


def _has_distributed(sketch: Sketch) -> bool:
    loads = sketch.member.loads
    return loads is not None and bool(loads.distributed.any())


def _has_inner_forces(sketch: Sketch) -> bool:
    """Whether any force is drawn in the row of arrows (those at free ends lie on the axis)."""
    if sketch.member.loads is None:
        return False
    last = len(sketch.member.project.segments)
    forces = sketch.member.loads.joint_force[0]
    return any(forces[j] and not lies_outside(sketch, j) for j in range(last + 1))


def _has_bedding(sketch: Sketch) -> bool:
    return any(s.bedding or end_of(s.bedding, s.bedding_end) for s in sketch.member.project.segments)


def _has_hanging(sketch: Sketch) -> bool:
    last = len(sketch.member.project.segments)
    return any(hangs(support_of(sketch, j), inner=0 < j < last) for j in range(last + 1))


def _thickest(member: Member) -> float:
    """The largest half depth of any section, m."""
    return max(outline(s.section, at).outer for s in member.project.segments for at in (0.0, 1.0))


def _factor(largest: float) -> float:
    """The largest round factor that still fits."""
    power = 1e-6
    best = power
    while power <= largest:
        best = max(power * f for f in FACTORS if power * f <= largest)
        power *= 10.0
    return best


def _draw_factor(sketch: Sketch) -> None:
    """How much the drawing is stretched across the axis, in its corner away from the loads."""
    text = tr("across ×{factor}").format(
        factor=format_value(sketch.picture.factor, "factor", sketch.member.system, strip=True)
    )
    size = sketch.place.fonts.measure(text, "small")
    rect = sketch.place.rect
    box = QRectF(QPointF(rect.left() + 6.0, rect.bottom() - size.height() - 2.0), size)
    sketch.picture.texts.append(Text(box, text, "small", "quiet", Part("note", -1)))


def _draw_no_loads(sketch: Sketch) -> None:
    """Why no loads are drawn, in the corner."""
    text = no_loads_text(sketch)
    if text:
        box = QRectF(sketch.place.rect.topLeft() + QPointF(6.0, 4.0), _note_size(sketch))
        sketch.picture.texts.append(Text(box, text, "small", "quiet", Part("note", 0)))


def _note_size(sketch: Sketch) -> QSizeF:
    text = no_loads_text(sketch)
    return sketch.place.fonts.measure(text, "small") if text else QSizeF(0.0, 0.0)
