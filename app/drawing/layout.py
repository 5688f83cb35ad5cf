"""From a member and a frame to a picture: the rows first, then the parts one after another.

Needs no window and no paper: only a ruler, a box and the measure of texts.
"""

from __future__ import annotations

from app.drawing.body import aim_at_joints, draw_body, edge_at
from app.drawing.chain import LEVEL_GAP, draw_chain, draw_joint_marks, draw_levels, level_width
from app.drawing.companions import draw_companions
from app.drawing.contacts import draw_contacts, put_under
from app.drawing.crowded import free_box, say_left_out
from app.drawing.frame import Frame
from app.drawing.laterals import draw_laterals
from app.drawing.loads import draw_loads, no_loads_text
from app.drawing.member import Member
from app.drawing.rows import Wishes, foot_of, legend_below, no_rows, round_factor, rows_in, said_of, thickest
from app.drawing.shapes import LOADS, OF_COMPANION, Box, Part, Picture, Target, Text
from app.drawing.shoulders import draw_shoulders
from app.drawing.sketch import Sketch
from app.drawing.supports import LEVEL, draw_supports
from app.units import format_value
from app.words import tr

NOTE_INSET = 6.0  # px, of a note from the edge of the drawing
HANGING = 13.0  # upright, from the line that supports hang on to what is said under them
BESIDE_WALL = 10.0  # upright, from what is said under the member to what holds its foot
BESIDE_AXIS = 24.0  # upright, from what is said under the member to its axis


def lay_out(member: Member, frame: Frame) -> Picture:
    """The picture of a member in its frame."""
    return sketched(member, frame).picture


def sketched(member: Member, frame: Frame, like: Sketch | None = None) -> Sketch:
    """The finished sketch of a member in its frame, with the rows and proportions of another one if given.

    So what is pulled by hand stays under the pointer, where the drawing would else share its room anew.
    """
    sketch = Sketch(member, frame, no_rows(), zero=0.0, scale=0.0)
    wishes = Wishes.of(sketch)
    if like is None:
        _give_rows(sketch, wishes)
    else:
        sketch.take_proportions(like)
    sketch.picture.scale = sketch.scale
    sketch.picture.axis = sketch.point(0.0, sketch.rows.axis)[0 if frame.upright else 1]
    if frame.detail.explained:
        draw_joint_marks(sketch, wishes.joints)
    if frame.detail.dimensions:
        draw_chain(sketch, wishes.lengths, wishes.sections)
    draw_body(sketch)
    if frame.detail.factor:
        _draw_scales(sketch)
    draw_shoulders(sketch)
    draw_laterals(sketch)
    draw_supports(sketch)
    draw_contacts(sketch)
    put_under(sketch, wishes.hanging, wishes.contacts)
    draw_companions(sketch, wishes.companions)
    _draw_no_loads(sketch)
    draw_loads(sketch, wishes.loads)
    _aim_at_labels(sketch.picture)
    aim_at_joints(sketch)
    _set_edge(sketch)
    _keep_legend(sketch)
    say_left_out(sketch)
    return sketch


def _aim_at_labels(picture: Picture) -> None:
    """What acts is pointed at by its label as well; some of it is said in words only."""
    for text in (*picture.texts, *picture.contact_texts):
        labelled = LOADS | {"bedding", "bonded", "support", "shoulder", "lateral", "turning"} | OF_COMPANION
        if text.part is not None and text.part.kind in labelled:
            picture.targets.append(Target(text.box, text.part))


def _set_edge(sketch: Sketch) -> None:
    """Where joint lines begin: at the dimension line, or upright at the column of levels."""
    if sketch.frame.upright:
        sketch.picture.chain_edge = column = _level_column(sketch)
        if sketch.frame.detail.levels:
            draw_levels(sketch, column)
    else:
        sketch.picture.chain_edge = sketch.point(0.0, sketch.rows.sections[-1][1] + foot_of(sketch))[1]


def _level_column(sketch: Sketch) -> float:
    """Upright, where the column of levels begins, or the room ends where there is none."""
    if not sketch.frame.detail.levels:
        return sketch.frame.box.right
    return sketch.frame.box.right - level_width(sketch) - LEVEL_GAP - 6.0


def _give_rows(sketch: Sketch, wishes: Wishes) -> None:
    """Give a sketch its rows: those that are needed get their room, the member the rest."""
    low, high = sketch.frame.across
    if sketch.frame.upright:
        high = _level_column(sketch)
    sketch.zero = high if sketch.frame.upright else low
    sketch.rows = rows_in(sketch, wishes, high - low)
    to_scale = thickest(sketch.member) * sketch.frame.ruler.pixels_per_metre
    sketch.picture.factor = round_factor(sketch.rows.half / to_scale)
    sketch.scale = sketch.picture.factor * sketch.frame.ruler.pixels_per_metre


def _draw_scales(sketch: Sketch) -> None:
    """How the drawing departs from one scale, in its corner away from the loads."""
    factor = format_value(sketch.picture.factor, "factor", sketch.member.system, strip=True)
    text = tr("across ×{factor}").format(factor=factor)
    foot = sketch.frame.box.bottom - 2.0 - (sketch.frame.detail.legend[1] if legend_below(sketch) else 0.0)
    said = said_of(sketch)
    notes = _notes_up(sketch, [text, *said.split("\n")], foot)
    if sketch.frame.upright:
        for width in _said_widths(sketch):
            notes = _notes_up(sketch, [text, *sketch.in_lines(said, "small", width).split("\n")], foot)
            if not any(one.box.meets(other.box) for one in notes for other in sketch.picture.texts):
                break
    sketch.picture.texts += notes


def _notes_up(sketch: Sketch, lines: list[str], foot: float) -> list[Text]:
    """The lines from the last one at the foot up."""
    notes = []
    for line in filter(None, reversed(lines)):
        foot -= sketch.frame.measure(line, "small")[1]
        notes.append(_note(sketch, line, foot, index=-1))
    return notes


def _said_widths(sketch: Sketch) -> tuple[float, float]:
    """Upright, how far texts at the foot may reach: up to what hangs beside the axis, else to the axis."""
    hanging = sketch.rows.under_label[-1][1] > sketch.rows.under_label[0][0]
    aside = max(edge_at(sketch, 0) + BESIDE_WALL, BESIDE_AXIS)
    lowest = sketch.rows.under + LEVEL * max(sketch.levels - 1, 0)
    end = lowest + HANGING if hanging else sketch.rows.axis + aside
    left = sketch.frame.box.left + NOTE_INSET
    return sketch.point(0.0, end)[0] - left, sketch.point(0.0, sketch.rows.axis + BESIDE_AXIS)[0] - left


def _keep_legend(sketch: Sketch) -> None:
    """Room for a scale of colours: at the foot right; upright in the first corner without other texts."""
    width, height = sketch.frame.detail.legend
    if not width:
        return
    box = sketch.frame.box
    if not sketch.frame.upright:
        corner = box.right - 6.0, box.bottom - 2.0
        sketch.picture.legend = Box(corner[0] - width, corner[1] - height, *corner)
        return
    texts = [text.box for text in sketch.picture.texts]
    lines = [0.0, *(text.bottom - box.top for text in texts if text.left <= box.left + 6.0)]
    tops = [box.top + 6.0, *(box.top + line for line in sorted(lines))]
    rights = box.left + 6.0 + width, _level_column(sketch) - 4.0
    free = (Box(right - width, top, right, top + height) for right in rights for top in tops)
    inside = (one for one in free if one.bottom <= box.bottom)
    corner_free = (one for one in inside if not any(one.meets(t) for t in texts))
    sketch.picture.legend = next(corner_free, free_box(sketch, width, height))


def _draw_no_loads(sketch: Sketch) -> None:
    """Why no loads are drawn, in the corner."""
    text = no_loads_text(sketch)
    if text:
        sketch.picture.texts.append(_note(sketch, text, sketch.frame.box.top + 4.0, index=0))


def _note(sketch: Sketch, text: str, top: float, index: int) -> Text:
    width, height = sketch.frame.measure(text, "small")
    left = sketch.frame.box.left + NOTE_INSET
    box = Box(left, top, left + width, top + height)
    return Text(box, text, "small", "quiet", Part("note", index))
