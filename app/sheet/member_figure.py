"""The member drawn to scale: outline, marks, supports, bedding, loads of one state, dimension chain.

The depth is drawn at the scale of the length where that can be read; otherwise at a scale of its own, which
the caption then names.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from functools import partial

import numpy as np

from app.section_entry import section_label
from app.sheet.colours import BODY, INK, QUIET
from app.sheet.lanes import Edge, Label, Style, draw_lane
from app.sheet.load_marks import draw_loads
from app.sheet.ruler import Ruler
from app.sheet.supports import draw_bedding, draw_end_support, draw_side_support
from app.sheet.svg import Canvas, Ink, fitted, text_width
from app.units import format_value, symbol
from app.words import tr
from solver.arrays import FloatArray
from solver.chain import Loads
from solver.model import Joint, Project, Segment, SpringSupport, UnitSystemName
from solver.sections import outline

ACROSS, UPRIGHT, SMALL = 420.0, 330.0, 190.0  # drawn length of the member in points
_LEAST_HALF, _MOST_HALF, _SMALL_HALF = 11.0, 34.0, 20.0
_OUTLINE = Ink(INK, 1.2, BODY)
_QUIET = Style(7.0, QUIET)
_MARK = 8.0
_WIDEST_MARK = 56.0
_LONGEST_SECTION = 26


@dataclass(frozen=True, slots=True)
class Figure:
    """A figure ready for paper or export: SVG text, size in points, and what it says in words."""

    svg: str
    width: float
    height: float
    alt: str
    note: str = ""


@dataclass(frozen=True, slots=True)
class _Member:
    """The member on its ruler: joints (n + 1,) in points along it, depth in points per m."""

    project: Project
    ruler: Ruler
    joints: FloatArray
    depth: float

    def half(self, segment: Segment, s: float) -> float:
        """Half the drawn depth at the fraction s of a segment, in points."""
        return outline(segment.section, s).outer * self.depth

    def half_at_joint(self, index: int) -> float:
        """Half the larger drawn depth at a joint."""
        segments = self.project.segments
        before = [self.half(segments[index - 1], 1.0)] if index else []
        after = [self.half(segments[index], 0.0)] if index < len(segments) else []
        return max(before + after)


def member_figure(
    project: Project, positions: FloatArray, loads: Loads | None = None, state: int = 0, *, chain: bool = True
) -> Figure:
    """The drawing with the loads of `state`, if any, and the dimension chain; `positions` (n + 1,) in m."""
    member = _on_ruler(project, positions, UPRIGHT if chain else SMALL)
    units = project.display.unit_system
    canvas, feet = Canvas(), Canvas()
    half = max(member.half(s, t) for s in project.segments for t in (0.0, 1.0))
    near, far = Edge(1, half + 5), Edge(-1, half + 5)
    behind = _draw_body(canvas, member, far)
    _draw_supports(canvas, member, far)
    if chain:
        _draw_stiffnesses(canvas, member, far, units)
    if loads is not None:
        draw_loads(canvas, member.ruler, near, loads, state, member.joints, units)
    if chain:
        _draw_chain(canvas, feet, member, far, units)
        canvas.parts[behind:behind] = feet.parts
    note = (
        tr("Labels without room are left out; the tables hold them.") if near.left_out + far.left_out else ""
    )
    alt = _alt(project, units)
    return Figure(canvas.render(alt), *canvas.size, alt, f"{_scale_note(member)} {note}".strip())


def _on_ruler(project: Project, positions: FloatArray, height: float) -> _Member:
    upright = project.display.layout == "vertical"
    ruler = Ruler(upright, float(positions[-1]), height if upright else ACROSS)
    half = max(outline(s.section, t).outer for s in project.segments for t in (0.0, 1.0))
    true = ruler.extent / ruler.length
    largest = _SMALL_HALF if ruler.extent == SMALL else _MOST_HALF
    # at the scale of the length where that reads well; else as deep as the sheet has room for
    depth = true if _LEAST_HALF <= true * half <= largest else largest / half
    return _Member(project, ruler, ruler.extent * np.asarray(positions) / ruler.length, depth)


def _scale_note(member: _Member) -> str:
    lengths = member.ruler.length / member.ruler.extent * 72 / 0.0254
    depths = 72 / 0.0254 / member.depth
    if abs(lengths / depths - 1) < 1e-9:
        return tr("Drawn to scale, about 1 : {scale}.").format(scale=f"{lengths:.3g}")
    return tr(
        "Lengths to scale, about 1 : {lengths}; depths to a scale of their own, about 1 : {depths}."
    ).format(lengths=f"{lengths:.3g}", depths=f"{depths:.3g}")


def _alt(project: Project, units: UnitSystemName) -> str:
    length = format_value(
        float(sum(s.length for s in project.segments)), "length", units, strip=True, with_unit=True
    )
    marks = ", ".join(s.mark for s in project.segments[:40])
    return tr("Drawing of the member, {length} long, segments {marks}").format(length=length, marks=marks)


def _draw_body(canvas: Canvas, member: _Member, far: Edge) -> int:
    """The segments with their marks; returns how many shapes lie behind all labels beside the member."""
    outside: list[Label] = []
    bedded = []
    for index, segment in enumerate(member.project.segments):
        span = (float(member.joints[index]), float(member.joints[index + 1]))
        _draw_segment(canvas, member, segment, span)
        bedded.append(draw_bedding(canvas, member.ruler, segment, span, partial(member.half, segment)))
    _draw_axis(canvas, member)
    for index, segment in enumerate(member.project.segments):
        label = Label(float(member.joints[index] + member.joints[index + 1]) / 2, _short(segment.mark))
        if not _draw_mark(canvas, member, index, label):
            outside.append(label)
    behind = len(canvas.parts)
    draw_lane(canvas, member.ruler, far, outside, Style(_MARK, INK, bold=True))
    return behind


def _short(mark: str) -> str:
    return fitted(mark, _MARK, _WIDEST_MARK)


def _draw_segment(canvas: Canvas, member: _Member, segment: Segment, span: tuple[float, float]) -> None:
    start, end = span
    first, last = outline(segment.section, 0.0), outline(segment.section, 1.0)
    a, b = first.outer * member.depth, last.outer * member.depth
    corners = [(start, a), (end, b), (end, -b), (start, -a)]
    canvas.path(member.ruler.points(corners), _OUTLINE, closed=True)
    if first.inner or last.inner:
        a, b = first.inner * member.depth, last.inner * member.depth
        for side in (-1, 1):
            bore = member.ruler.points([(start, side * a), (end, side * b)])
            canvas.path(bore, Ink(QUIET, 0.7, dashes="3 2"))


def _draw_axis(canvas: Canvas, member: _Member) -> None:
    ends = member.ruler.points([(-6.0, 0.0), (member.ruler.extent + 6.0, 0.0)])
    canvas.path(ends, Ink(QUIET, 0.5, dashes="9 2 2 2"))


def _draw_mark(canvas: Canvas, member: _Member, index: int, label: Label) -> bool:
    """The segment's mark in a ring on the axis or close beside; False where it has no room in either."""
    width = max(13.0, text_width(label.text, _MARK) + 7)
    long = float(member.joints[index + 1] - member.joints[index])
    deep = 2 * member.half(member.project.segments[index], 0.5)
    room, height = (deep, long) if member.ruler.upright else (long, deep)
    if width + 2 > room or height < 14:
        return _draw_mark_beside(canvas, member, index, label, long)
    x, y = member.ruler.point(label.along, 0.0)
    canvas.pill((x, y), width, 13.0, Ink(INK, 0.7, "#FFFFFF"))
    canvas.text((x, y + 0.34 * _MARK), label.text, size=_MARK, bold=True, anchor="middle")
    return True


def _draw_mark_beside(canvas: Canvas, member: _Member, index: int, label: Label, long: float) -> bool:
    segment, upright = member.project.segments[index], member.ruler.upright
    half = max(member.half(segment, s) for s in (0.0, 0.5, 1.0)) + 6
    if long < (_MARK if upright else text_width(label.text, _MARK) + 1):
        return False
    x, y = member.ruler.point(label.along, -half)
    at = (x, y + 0.34 * _MARK) if upright else (x, y + 0.7 * _MARK)
    canvas.text(at, label.text, size=_MARK, bold=True, anchor="end" if upright else "middle")
    return True


def _draw_supports(canvas: Canvas, member: _Member, far: Edge) -> None:
    joints = member.project.joints
    for index, out in ((0, -1), (len(joints) - 1, 1)):
        along = float(member.joints[index])
        half = member.half_at_joint(index)
        draw_end_support(canvas, member.ruler, joints[index], along, half, out)
    inner = _inner_supports(joints)
    for index in inner:
        half = member.half_at_joint(index)
        draw_side_support(canvas, member.ruler, joints[index], float(member.joints[index]), far, half)
    if inner:
        far.reach += 18


def _inner_supports(joints: tuple[Joint, ...]) -> list[int]:
    return [index for index in range(1, len(joints) - 1) if joints[index].support]


def _draw_stiffnesses(canvas: Canvas, member: _Member, far: Edge, units: UnitSystemName) -> None:
    """The stiffness of springs and bedding."""
    joints = member.project.joints
    for index, out in ((0, -1), (len(joints) - 1, 1)):
        _draw_end_stiffness(canvas, member, index, out, _stiffness(joints[index], units))
    labels = [
        Label(float(member.joints[index]), text)
        for index in _inner_supports(joints)
        if (text := _stiffness(joints[index], units))
    ]
    draw_lane(canvas, member.ruler, far, labels, _QUIET)
    _draw_bedding_labels(canvas, member, far, units)


def _draw_end_stiffness(canvas: Canvas, member: _Member, index: int, out: int, text: str) -> None:
    """The stiffness of an end spring, beside it on the side without loads."""
    half = member.half_at_joint(index) + 6
    x, y = member.ruler.point(float(member.joints[index]) + out * (13 if member.ruler.upright else 3), -half)
    upright, size = member.ruler.upright, _QUIET.size
    at = (x - 3, y + 0.35 * size) if upright else (x, y + size)
    canvas.text(at, text, size=size, fill=QUIET, anchor="end" if upright or out < 0 else "start")


def _stiffness(joint: Joint, units: UnitSystemName) -> str:
    if isinstance(joint.support, SpringSupport):
        return format_value(joint.support.stiffness, "spring", units, strip=True, with_unit=True)
    return ""


def _draw_bedding_labels(canvas: Canvas, member: _Member, far: Edge, units: UnitSystemName) -> None:
    labels = []
    for index, segment in enumerate(member.project.segments):
        end = segment.bedding_end if isinstance(segment.bedding_end, float) else segment.bedding
        if segment.bedding or end:
            values = [format_value(v, "bedding", units, strip=True) for v in (segment.bedding, end)]
            pair = values[0] if values[0] == values[1] else " → ".join(values)
            middle = float(member.joints[index] + member.joints[index + 1]) / 2
            labels.append(
                Label(middle, tr("bedding {value}").format(value=f"{pair} {symbol('bedding', units)}"))
            )
    draw_lane(canvas, member.ruler, far, labels, _QUIET)


def _draw_chain(canvas: Canvas, feet: Canvas, member: _Member, far: Edge, units: UnitSystemName) -> None:
    """Joint marks, then the lengths along a line with slanted ticks, then the sections."""
    ruler = member.ruler
    marks = [
        Label(float(a), _short(j.mark)) for a, j in zip(member.joints, member.project.joints, strict=True)
    ]
    draw_lane(canvas, ruler, far, marks, Style(7.0, QUIET, italic=True))
    middles = [(a + b) / 2 for a, b in zip(member.joints, member.joints[1:], strict=False)]
    lengths = [format_value(s.length, "length", units, strip=True) for s in member.project.segments]
    draw_lane(
        canvas, ruler, far, [Label(float(m), t) for m, t in zip(middles, lengths, strict=True)], Style(7.5)
    )
    _draw_ticks(canvas, member, far)
    _draw_feet(feet, member, far)
    far.reach += 3
    sections = _section_labels(member, units)
    shown = [label for label in sections if len(label.text) <= _LONGEST_SECTION]
    far.left_out += len(sections) - len(shown)
    draw_lane(canvas, ruler, far, shown, _QUIET)


def _draw_ticks(canvas: Canvas, member: _Member, far: Edge) -> None:
    ruler, line = member.ruler, far.at(1.5)
    canvas.path(ruler.points([(0.0, line), (ruler.extent, line)]), Ink(INK, 0.6))
    canvas.lines(
        (
            (ruler.point(a - 2.2, line - 2.2), ruler.point(a + 2.2, line + 2.2))
            for a in member.joints.tolist()
        ),
        Ink(INK, 1.0),
    )


def _draw_feet(canvas: Canvas, member: _Member, far: Edge) -> None:
    """Thin lines from the joints to the dimension chain."""
    ruler = member.ruler
    ends = (
        (ruler.point(a, far.side * (member.half_at_joint(i) + 2)), ruler.point(a, far.at(0.0)))
        for i, a in enumerate(member.joints.tolist())
    )
    canvas.lines(ends, Ink(QUIET, 0.35))


def _section_labels(member: _Member, units: UnitSystemName) -> Sequence[Label]:
    middles = ((a + b) / 2 for a, b in zip(member.joints, member.joints[1:], strict=False))
    texts = (section_label(s.section, units) for s in member.project.segments)
    return [Label(float(m), t) for m, t in zip(middles, texts, strict=True)]
