"""The member as a figure of the sheet: laid out as for the window, with all the room it needs, as SVG.

The depth is drawn at the scale of the length where that can be read; otherwise at a scale of its own, which
the caption then names. The layout counts in pixels of the window; here one of them is `POINT` points.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, fields
from dataclasses import replace as dataclass_replace
from typing import Final

from msgspec.structs import replace

from app.drawing.frame import Detail, Frame
from app.drawing.layout import lay_out
from app.drawing.member import Member, acting_beside
from app.drawing.rows import depth_for, round_factor, thickest
from app.drawing.ruler import Ruler
from app.drawing.shapes import Box, Picture
from app.drawing.words import named
from app.numerals import reading
from app.sheet.picture_svg import draw_picture, measure
from app.sheet.svg import Canvas, fitted
from app.units import format_value
from app.words import tr
from solver.arrays import FloatArray
from solver.chain import Loads
from solver.model import Companion, Project
from solver.packing import states_of
from solver.shoulders import notches

POINT: Final = 0.7
_ACROSS, _UPRIGHT, _SMALL = 386.0 / POINT, 300.0 / POINT, 190.0 / POINT  # drawn length of the member
_MARK, _WIDEST_MARK = 12.0, 80.0  # size and width of the longest mark
BETWEEN: Final = 10.0  # drawing and strips, points
_BEYOND = 76.0  # room beyond the member's ends
_LEAST_HALF, _MOST_HALF, _SMALL_HALF = 11.0 / POINT, 34.0 / POINT, 20.0 / POINT
_WHOLE = Detail(
    load_rows=8, text_rows=5, column=1.0, levels=False, explained=True, factor=False, least_half=0.0
)
_LOADS_ONLY = replace(_WHOLE, dimensions=False)


@dataclass(frozen=True, slots=True)
class Figure:
    """A figure ready for paper or export: SVG text, size in points, and what it says in words."""

    svg: str
    width: float
    height: float
    alt: str
    note: str = ""


def member_figure(
    project: Project, positions: FloatArray, loads: Loads | None = None, state: int = 0, *, chain: bool = True
) -> Figure:
    """The drawing with the loads of `state`, if any, and the dimension chain; `positions` (n + 1,) in m."""
    member = _member(project, positions, loads, state)
    frame = _frame(member, whole=chain)
    picture = lay_out(member, frame)
    canvas = Canvas(scale=POINT)
    draw_picture(canvas, picture)
    alt = member_alt(project)
    return Figure(canvas.render(alt), *canvas.size, alt, _note(project, frame, picture))


def draw_above(
    canvas: Canvas, project: Project, positions: FloatArray, loads: Loads | None, state: int, extent: float
) -> None:
    """The drawing over the strips of a canvas, upright at their left, on their ruler of `extent` points."""
    member = _member(project, positions, loads, state)
    frame = _frame(member, whole=True)
    drawing = Canvas()
    draw_picture(drawing, lay_out(member, frame))
    scale = extent / abs(frame.ruler.end - frame.ruler.begin)
    start = -scale * frame.ruler.begin  # of the first joint, which is at 0 on the canvas
    if frame.upright:
        canvas.put(drawing, (canvas.low[0] - BETWEEN - scale * drawing.high[0], start), scale)
    else:
        canvas.put(drawing, (start, canvas.low[1] - BETWEEN - scale * drawing.high[1]), scale)


def drawn_positions(positions: Sequence[float], extent: float, *, upright: bool) -> Ruler:
    """The ruler of the drawing on so many points, from 0: short segments are as wide as in the drawing."""
    drawn = Ruler.fitting(positions, 0.0, _UPRIGHT if upright else _ACROSS)
    return dataclass_replace(drawn, end=extent)


def _member(project: Project, positions: FloatArray, loads: Loads | None, state: int) -> Member:
    of_state = None if loads is None else _of_state(loads, state)
    shown = _with_short_marks(project)
    factors = {} if loads is None else states_of(project)[state].factors
    beside = acting_beside(project, factors)
    return Member(shown, tuple(map(float, positions)), of_state, notches(shown), beside)


def _with_short_marks(project: Project) -> Project:
    """The project with marks cut to what a drawing has room for; the tables hold them whole."""
    return replace(
        project,
        segments=tuple(replace(s, mark=fitted(s.mark, _MARK, _WIDEST_MARK)) for s in project.segments),
        joints=tuple(replace(j, mark=fitted(j.mark, _MARK, _WIDEST_MARK)) for j in project.joints),
        companions=tuple(map(_with_short_joints, project.companions)),
    )


def _with_short_joints(companion: Companion) -> Companion:
    """The companion between joints whose marks are cut alike."""
    start, end = (fitted(mark, _MARK, _WIDEST_MARK) for mark in (companion.start, companion.end))
    return replace(companion, start=start, end=end)


def _of_state(loads: Loads, state: int) -> Loads:
    """The loads of one state, as one row."""
    return Loads(*(getattr(loads, field.name)[state : state + 1] for field in fields(loads)))


def _frame(member: Member, *, whole: bool) -> Frame:
    """As much room as the member at a scale that can be read needs with all its labels."""
    upright = member.project.display.layout == "vertical"
    extent = (_UPRIGHT if whole else _SMALL) if upright else _ACROSS
    ends = (_BEYOND + extent, _BEYOND) if upright else (_BEYOND, _BEYOND + extent)
    ruler = Ruler.fitting(member.position, *ends)
    detail = _WHOLE if whole else _LOADS_ONLY
    along = extent + 2.0 * _BEYOND
    endless = Frame(_box(along, 0.0, upright=upright), ruler, upright, measure, detail)
    across = depth_for(member, endless, _half(member, ruler, _MOST_HALF if whole else _SMALL_HALF))
    return Frame(_box(along, across, upright=upright), ruler, upright, measure, detail)


def _box(along: float, across: float, *, upright: bool) -> Box:
    return Box(0.0, 0.0, across, along) if upright else Box(0.0, 0.0, along, across)


def _half(member: Member, ruler: Ruler, most: float) -> float:
    """Half the depth of the thickest section: at the scale of the length where that reads well, else not."""
    true = thickest(member) * ruler.pixels_per_metre
    factor = 1.0 if _LEAST_HALF <= true <= most else round_factor(most / true)
    return factor * true * (1.0 + 1e-9)  # so that rounding does not take the next smaller factor


def _note(project: Project, frame: Frame, picture: Picture) -> str:
    left_out = tr("Labels without room are left out; the tables hold them.") if picture.left_out else ""
    marks = [project.segments[index].mark for index in frame.ruler.widened]
    beside = tr("Companions are not to scale across.") if project.companions else ""
    scale = _scale_note(frame.ruler, picture.factor, marks)
    return " ".join(said for said in (scale, beside, left_out) if said)


def _scale_note(ruler: Ruler, factor: float, longer: Sequence[str]) -> str:
    """At which scale lengths and depths are drawn, and which short segments are drawn longer."""
    lengths = 72 / 0.0254 / (POINT * ruler.pixels_per_metre)
    scale, depths = _ratio(lengths), _ratio(lengths / factor)
    if abs(factor - 1.0) < 1e-9:
        words = (
            tr("Drawn to scale, about 1:{scale}, except {marks}, drawn longer.")
            if longer
            else tr("Drawn to scale, about 1:{scale}.")
        )
        return words.format(scale=scale, marks=named(longer))
    words = (
        tr(
            "Lengths to scale, about 1:{lengths}, except {marks}, drawn longer; "
            "depths to a scale of their own, about 1:{depths}."
        )
        if longer
        else tr("Lengths to scale, about 1:{lengths}; depths to a scale of their own, about 1:{depths}.")
    )
    return words.format(lengths=scale, depths=depths, marks=named(longer))


def _ratio(value: float) -> str:
    """How many times smaller than the member the drawing is, to three digits."""
    return reading(float(f"{value:.3g}"), 3, strip=True)


def member_alt(project: Project) -> str:
    """The drawing in words."""
    units = project.display.unit_system
    length = format_value(
        float(sum(s.length for s in project.segments)), "length", units, strip=True, with_unit=True
    )
    marks = ", ".join(s.mark for s in project.segments[:40])
    return tr("Drawing of the member, {length} long, segments {marks}").format(length=length, marks=marks)
