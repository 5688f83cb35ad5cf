"""How much room each part gets across the axis: the rows what they need from both sides, the member the rest.

On the screen labels give way before the member is too thin to be seen; on paper the drawing gets the depth
that it needs for all of them.
"""

from __future__ import annotations

import math
from dataclasses import dataclass, replace

from app.drawing.bonded import outer_of
from app.drawing.chain import joint_wishes, length_wishes, section_wishes
from app.drawing.companions import companion_wishes, lane_rows
from app.drawing.contacts import contact_wishes
from app.drawing.frame import Frame
from app.drawing.laterals import lateral_wishes, room_beside
from app.drawing.loads import GRAVITY_RANK, bracketed, lies_outside, load_wishes, no_loads_text
from app.drawing.member import Member
from app.drawing.placing import CLEAR, STACKED, TIGHT, Span, Wish, fits
from app.drawing.shoulders import shoulder_wishes
from app.drawing.sketch import Rows, Sketch
from app.drawing.supports import LEVEL, support_wishes
from app.drawing.words import not_to_scale
from app.words import tr
from solver.model import end_of

BAND = 17.0  # distributed loads at their largest, px
BRACKET = 7.0  # a row of brackets and the gap under it
ARROWS = 18.0  # the row of joint forces
UNDER = 20.0  # the row of hanging supports
THINNEST = 9.0  # of the thickest section, before lengths and sections give way, px
EDGE = 10.0  # upright, between sections and the edge of the sheet
HANDLE = 5.0  # upright, between a distributed load, where it is taken hold of, and its label
BEDDING = 6.0  # for the hatch along the member
BESIDE = 6.0  # between labels of hanging supports and lengths, and between columns of labels of loads
CHAIN = 7.0  # to either side of the dimension line
FACTORS = (1.0, 1.2, 1.5, 1.8, 2.0, 2.5, 3.0, 3.5, 4.0, 4.5, 5.0, 6.0, 7.0, 8.0, 9.0)  # of each power of ten
AMPLE = 1e5  # across: room enough for any label, px


@dataclass(frozen=True, slots=True)
class Wishes:
    """The labels that want a place in rows: how much room those get follows from them."""

    loads: list[Wish]
    lengths: list[Wish]
    sections: list[Wish]
    hanging: list[Wish]
    contacts: list[Wish]
    joints: list[Wish]
    companions: list[list[Wish]]  # by lane
    held: float  # what the signs of lateral supports want on either side, px
    lanes_labelled: bool = True

    @classmethod
    def of(cls, sketch: Sketch) -> Wishes:
        """The labels of a member in its frame."""
        return cls(
            load_wishes(sketch),
            length_wishes(sketch),
            section_wishes(sketch),
            [*support_wishes(sketch), *shoulder_wishes(sketch), *lateral_wishes(sketch)],
            contact_wishes(sketch),
            joint_wishes(sketch),
            companion_wishes(sketch),
            room_beside(sketch),
        )

    def without_lateral(self) -> Wishes:
        """Those but of lateral supports, which only stability needs; their signs get no room of their own."""
        others = [w for w in self.hanging if w.part.kind not in ("lateral", "turning")]
        return replace(self, hanging=others, held=0.0)


def no_rows() -> Rows:
    """Rows without any room, for a sketch whose rows are not known yet."""
    nothing = (0.0, 0.0)
    none = (nothing,)
    return Rows(none, (), nothing, 0.0, 0.0, 0.0, 0.0, none, none, none, none, 0.0, none)


def rows_in(sketch: Sketch, wishes: Wishes, room: float) -> Rows:
    """As many rows of labels as leave the member enough of the room across; upright columns as wide."""
    if sketch.frame.upright:
        return _rows_upright(sketch, wishes, room)
    for most in range(sketch.frame.detail.load_rows, 0, -1):
        rows = _rows_with(sketch, wishes, room, most)
        if rows.half >= (sketch.frame.detail.least_half if most > 1 else THINNEST):
            return rows
    return _rows_with(sketch, wishes, room, 0)


def _rows_upright(sketch: Sketch, wishes: Wishes, room: float) -> Rows:
    """Columns of labels that leave the member enough.

    Before the loads lose their labels, lateral supports give theirs up, then the companions.
    """
    fewer = wishes.without_lateral()
    fewest = replace(fewer, lanes_labelled=False)
    for those in (wishes, fewer, fewest):
        rows = _columns_in(sketch, those, room)
        if rows.half >= THINNEST:
            return rows
    rows = _rows_with(sketch, wishes, room, 0, 0.0)
    return rows if rows.half >= THINNEST else _rows_with(sketch, fewest, room, 0, 0.0)


def _columns_in(sketch: Sketch, wishes: Wishes, room: float) -> Rows:
    """The column of loads as wide as the member can spare: the narrower, the more lines a label takes."""
    column = sketch.frame.detail.column * room
    rows = _rows_with(sketch, wishes, room, 1, column)
    missing = 2.0 * (sketch.frame.detail.least_half - rows.half)
    if missing > 0.0:
        taken = rows.labels[0][1] - rows.labels[-1][0]
        least = _least_column(sketch, wishes.loads)
        rows = _rows_with(sketch, wishes, room, 1, min(max(taken - missing, least), column))
    return rows


def _least_column(sketch: Sketch, wishes: list[Wish]) -> float:
    """What forces need in one line, and what all else that comes before warming needs in many."""
    forces = [w.depth for w in wishes if w.part.kind == "force"]
    first = [w for w in wishes if w.rank <= GRAVITY_RANK or w.part.kind == "gravity"]
    words = [sketch.narrowed(w, 0.0).depth for w in first]
    return max((*forces, *words), default=0.0)


def depth_for(member: Member, frame: Frame, half: float) -> float:
    """The room across that all labels need and a member whose thickest section has `half`, px."""
    sketch = Sketch(member, frame, no_rows(), zero=0.0, scale=0.0)
    rows = _rows_with(sketch, Wishes.of(sketch), AMPLE, frame.detail.load_rows, frame.detail.column * AMPLE)
    return AMPLE - 2.0 * (rows.half - half)


def _rows_with(sketch: Sketch, wishes: Wishes, room: float, most: int, column: float = 0.0) -> Rows:
    """The rows from both sides inward; the member gets what is left between them.

    Of labels of loads there are at most `most` rows; with 0 one, and one of lengths and of sections each.
    Upright they have a width of `column` together.
    """
    if sketch.frame.upright:
        labels = _label_columns(sketch, wishes.loads, column)
    else:
        labels = _label_rows(sketch, wishes.loads, max(most, 1))
    beside = HANDLE if sketch.frame.upright and _has_distributed(sketch) else 2.0
    brackets = _bracket_rows(sketch, labels[-1][1] + beside)
    top = brackets[-1][1] if brackets else labels[-1][1] + beside
    band = (top, top + (BAND if _has_distributed(sketch) else 0.0))
    first = band[1] + (ARROWS if _has_inner_forces(sketch) else 5.0)
    first += wishes.held
    edge = EDGE if sketch.frame.upright else 4.0 + foot_of(sketch)
    sections = _text_rows(sketch, wishes.sections, room - edge, most)
    chain = sections[0][0] - CHAIN
    lengths = _text_rows(sketch, wishes.lengths, chain - CHAIN, most)
    marks = _text_rows(sketch, wishes.joints, lengths[0][0], most)
    under_label, contact = _under_rows(sketch, wishes, marks[0][0], most)
    under = under_label[0][0] - 0.5 * UNDER - LEVEL * max(sketch.levels - 1, 0)
    last = (under - 0.5 * UNDER if sketch.levels else under_label[0][0]) - 9.0 - wishes.held
    lanes, last = lane_rows(
        sketch, wishes.companions, last, room, labelled=wishes.lanes_labelled and most > 0
    )
    last -= BEDDING if _has_bedding(sketch) else 0.0
    return Rows(
        labels=tuple(reversed(labels)),
        brackets=brackets,
        band=band,
        arrows=band[1] + 0.5 * ARROWS,
        axis=0.5 * (first + last),
        half=max(0.5 * (last - first), 4.0),
        under=under,
        under_label=under_label,
        contact=contact,
        marks=tuple(reversed(marks)),
        lengths=tuple(reversed(lengths)),
        chain=chain,
        sections=sections,
        lanes=lanes,
    )


def _label_rows(sketch: Sketch, wishes: list[Wish], most: int) -> tuple[Span, ...]:
    """As many rows as the labels of loads need, up to `most`."""
    first = 4.0 + _note_height(sketch)
    if not wishes:
        return ((first, first),)
    depth, count = max(w.depth for w in wishes), 1
    while count < most and not fits(wishes, count, sketch.room):
        count += 1
    return tuple((first + i * depth, first + (i + 1) * depth) for i in range(count))


def _label_columns(sketch: Sketch, wishes: list[Wish], width: float) -> tuple[Span, ...]:
    """Upright: a column as wide as the labels of loads, and others beside it while they are of use."""
    fitting = [w for wish in wishes if (w := sketch.narrowed(wish, width)).depth <= width]
    widest, count = max((w.depth for w in fitting), default=0.0), 1
    step = widest + BESIDE
    while count * step + widest <= width and not fits(fitting, count, sketch.room, STACKED):
        count += 1
    return tuple((4.0 + i * step, 4.0 + i * step + widest) for i in range(count))


def _bracket_rows(sketch: Sketch, first: float) -> tuple[Span, ...]:
    """A row for the brackets of warming, and one for those of misfit."""
    count = len(bracketed(sketch))
    return tuple((first + i * BRACKET, first + (i + 1) * BRACKET - 3.0) for i in range(count))


def _under_rows(
    sketch: Sketch, wishes: Wishes, foot: float, most: int
) -> tuple[tuple[Span, ...], tuple[Span, ...]]:
    """The rows of labels of supports and of what stops do, ending at `foot`; upright one column for both."""
    foot -= BESIDE if wishes.hanging or wishes.contacts else 0.0
    if sketch.frame.upright:
        depth = max((w.depth for w in (*wishes.hanging, *wishes.contacts)), default=0.0)
        return ((foot - depth, foot),), ((foot - depth, foot),)
    contact = _text_rows(sketch, wishes.contacts, foot, most, CLEAR)
    return _text_rows(sketch, wishes.hanging, contact[0][0], most, CLEAR), contact


def _text_rows(
    sketch: Sketch, wishes: list[Wish], foot: float, most: int, clear: float = TIGHT
) -> tuple[Span, ...]:
    """One row, or more where a text is too long for one; the last ends at `foot`."""
    if not wishes:
        return ((foot, foot),)
    depth = max(w.depth for w in wishes)
    count, limit = 1, sketch.frame.detail.text_rows if most and not sketch.frame.upright else 1
    while count < limit and not fits(wishes, count, sketch.room, clear):
        count += 1
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


def _note_height(sketch: Sketch) -> float:
    text = no_loads_text(sketch)
    return sketch.frame.measure(text, "small")[1] if text else 0.0


def foot_of(sketch: Sketch) -> float:
    """Across, the row under everything that says what is special about the drawing, and holds its scale."""
    text, legend = said_of(sketch), sketch.frame.detail.legend[1]
    said = sketch.frame.measure(text, "small")[1] if text else 0.0
    return said + legend if legend_below(sketch) else max(said, legend)


def legend_below(sketch: Sketch) -> bool:
    """Across, whether the scale of colours needs a row of its own under what is said."""
    room = sketch.frame.box.right - sketch.frame.box.left - 24.0
    said, legend = sketch.frame.measure(said_of(sketch), "small")[0], sketch.frame.detail.legend[0]
    return not sketch.frame.upright and legend > 0.0 and said + legend > room


def said_of(sketch: Sketch) -> str:
    """Which segments are not to scale, and what else is to be said; empty where nothing is."""
    if not sketch.frame.detail.factor:
        return ""
    segments = sketch.member.project.segments
    unlike = not_to_scale([segments[index].mark for index in sketch.frame.ruler.widened])
    beside = tr("companions: not to scale across") if sketch.member.project.companions else ""
    return "; ".join(text for text in (sketch.frame.detail.words, unlike, beside) if text)


def thickest(member: Member) -> float:
    """The largest half depth of any section, m."""
    return max(outer_of(s, at) for s in member.project.segments for at in (0.0, 1.0))


def round_factor(largest: float) -> float:
    """The largest round factor that still fits."""
    power = min(1e-6, 10.0 ** math.floor(math.log10(largest))) if largest > 0.0 else 1e-300
    best = power
    while power <= largest:
        best = max(power * f for f in FACTORS if power * f <= largest)
        power *= 10.0
    return best
