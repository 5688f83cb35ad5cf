"""How loads are drawn beside the member: bands, arrows at joints, brackets for temperature and misfit."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np

from app.sheet.colours import INK, LOAD, QUIET
from app.sheet.lanes import Edge, Label, Style, draw_lane, packed
from app.sheet.ruler import Ruler
from app.sheet.svg import Canvas, Ink, text_width
from app.units import Quantity, format_value, symbol
from app.words import tr
from solver.arrays import FloatArray
from solver.chain import Loads
from solver.model import UnitSystemName

_ARROW = 22.0
_BAND = 13.0
_SIZE = 7.5
_BOLD = Style(_SIZE, INK, bold=True)
_PLAIN = Style(_SIZE, INK)


@dataclass(frozen=True, slots=True)
class Arrow:
    """An arrow at a joint: its place in points, the sense (+1 or −1 along x) and its text."""

    along: float
    sense: int
    text: str
    dashed: bool = False


def draw_loads(
    canvas: Canvas,
    ruler: Ruler,
    edge: Edge,
    loads: Loads,
    state: int,
    joints: FloatArray,
    units: UnitSystemName,
) -> None:
    """All loads of one state beyond the edge; `joints` (n + 1,) are places in points."""
    _draw_arrows(canvas, ruler, edge, _joint_arrows(loads, state, joints, units))
    _draw_band(canvas, ruler, edge, loads.distributed[state], joints, units)
    for spans in (_temperatures(loads, state, joints, units), _misfits(loads, state, joints, units)):
        _draw_brackets(canvas, ruler, edge, spans)
    _draw_gravity(canvas, ruler, edge, float(loads.gravity[state]), units)


def _joint_arrows(loads: Loads, state: int, joints: FloatArray, units: UnitSystemName) -> list[Arrow]:
    arrows = []
    for along, force, movement in zip(joints, loads.joint_force[state], loads.movement[state], strict=True):
        if force:
            text = format_value(float(force), "force", units, strip=True, with_unit=True)
            arrows.append(Arrow(float(along), 1 if force > 0 else -1, text))
        if movement:
            text = format_value(float(movement), "displacement", units, strip=True, with_unit=True)
            arrows.append(
                Arrow(float(along), 1 if movement > 0 else -1, tr("moves {value}").format(value=text), True)
            )
    return arrows


def _draw_arrows(canvas: Canvas, ruler: Ruler, edge: Edge, arrows: Sequence[Arrow]) -> None:
    if not arrows:
        return
    ordered = sorted(arrows, key=lambda arrow: arrow.along + arrow.sense * _ARROW / 2)
    rows = packed([_span(ruler, arrow) for arrow in ordered])
    pitch = max(text_width(a.text, _SIZE) for a in arrows) + 14 if ruler.upright else _SIZE + 9
    stems = (
        (ruler.point(arrow.along, edge.at(0)), ruler.point(arrow.along, edge.at(6 + row * pitch)))
        for arrow, row in zip(ordered, rows, strict=True)
    )
    canvas.lines(stems, Ink(QUIET, 0.5))
    for arrow, row in zip(ordered, rows, strict=True):
        _draw_arrow(canvas, ruler, edge, arrow, 6 + row * pitch)
    edge.reach += 6 + (max(rows) + 1) * pitch - (0 if ruler.upright else 2)


def _span(ruler: Ruler, arrow: Arrow) -> tuple[float, float]:
    middle = arrow.along + arrow.sense * _ARROW / 2
    half = max(_ARROW / 2, (_SIZE if ruler.upright else text_width(arrow.text, _SIZE)) / 2) + 2
    return middle - half, middle + half


def _draw_arrow(canvas: Canvas, ruler: Ruler, edge: Edge, arrow: Arrow, further: float) -> None:
    aside = edge.at(further)
    tip, middle = arrow.along + arrow.sense * _ARROW, arrow.along + arrow.sense * _ARROW / 2
    canvas.path(
        ruler.points([(arrow.along, aside), (tip, aside)]),
        Ink(INK, 1.4, dashes="3 2" if arrow.dashed else ""),
    )
    draw_head(canvas, ruler, tip, aside, arrow.sense, 3.2)
    x, y = ruler.point(middle, aside)
    at = (x + 5, y + 0.35 * _SIZE) if ruler.upright else (x, y - 4)
    canvas.text(
        at, arrow.text, size=_SIZE, bold=True, anchor="start" if ruler.upright else "middle", backed=True
    )


def draw_head(canvas: Canvas, ruler: Ruler, tip: float, aside: float, sense: int, size: float) -> None:
    """The head of an arrow along the axis."""
    back = tip - sense * 1.8 * size
    canvas.path(
        ruler.points([(tip, aside), (back, aside - size * 0.8), (back, aside + size * 0.8)]),
        Ink(fill=INK),
        closed=True,
    )


def _draw_band(
    canvas: Canvas, ruler: Ruler, edge: Edge, load: FloatArray, joints: FloatArray, units: UnitSystemName
) -> None:
    largest = float(np.max(np.abs(load)))
    if not largest:
        return
    labels = []
    for index, (start, end) in enumerate(load):
        if start or end:
            span = (float(joints[index]), float(joints[index + 1]))
            _draw_trapezoid(canvas, ruler, edge, span, (float(start) / largest, float(end) / largest))
            text = _pair_text(float(start), float(end), "distributed", units)
            labels.append(Label(sum(span) / 2, text))
    edge.reach += _BAND + 4
    draw_lane(canvas, ruler, edge, labels, _PLAIN)


def _draw_trapezoid(
    canvas: Canvas, ruler: Ruler, edge: Edge, span: tuple[float, float], share: tuple[float, float]
) -> None:
    """The band over one segment; its depth shows the size of the load, its arrows the sense."""
    (low, high), (first, last) = span, share
    base = edge.at(3)
    depths = [base + edge.side * (1.5 + (_BAND - 1.5) * abs(part)) for part in share]
    canvas.path(
        ruler.points([(low, base), (low, depths[0]), (high, depths[1]), (high, base)]),
        Ink(QUIET, 0.7, LOAD),
        closed=True,
    )
    count = max(1, int((high - low) / 16))
    for index in range(count):
        s = (index + 0.5) / count
        value = (1 - s) * first + s * last
        if value and high - low > 6:
            _draw_small_arrow(
                canvas, ruler, low + s * (high - low), base + edge.side * 4, 1 if value > 0 else -1
            )


def _draw_small_arrow(canvas: Canvas, ruler: Ruler, middle: float, aside: float, sense: int) -> None:
    canvas.path(ruler.points([(middle - sense * 5, aside), (middle + sense * 4, aside)]), Ink(INK, 0.7))
    draw_head(canvas, ruler, middle + sense * 5, aside, sense, 2.2)


def _pair_text(start: float, end: float, quantity: Quantity, units: UnitSystemName) -> str:
    first = format_value(start, quantity, units, strip=True)
    last = format_value(end, quantity, units, strip=True)
    both = first if first == last else f"{first} → {last}"
    return f"{both} {symbol(quantity, units)}"


def _temperatures(
    loads: Loads, state: int, joints: FloatArray, units: UnitSystemName
) -> list[tuple[float, float, str]]:
    """Brackets (start, end, text), neighbours of one equal rise together."""
    spans: list[tuple[float, float, str]] = []
    for index, (start, end) in enumerate(loads.temperature[state]):
        if not (start or end):
            continue
        text = tr("ΔT {value}").format(value=_pair_text(float(start), float(end), "temperature", units))
        low, high = float(joints[index]), float(joints[index + 1])
        if spans and start == end and spans[-1][1:] == (low, text):
            low = spans.pop()[0]
        spans.append((low, high, text))
    return spans


def _misfits(
    loads: Loads, state: int, joints: FloatArray, units: UnitSystemName
) -> list[tuple[float, float, str]]:
    spans = []
    for index, misfit in enumerate(loads.lack_of_fit[state]):
        if misfit:
            value = format_value(float(misfit), "displacement", units, strip=True, with_unit=True)
            spans.append(
                (float(joints[index]), float(joints[index + 1]), tr("λ {value}").format(value=value))
            )
    return spans


def _draw_brackets(
    canvas: Canvas, ruler: Ruler, edge: Edge, spans: Sequence[tuple[float, float, str]]
) -> None:
    if not spans:
        return
    for low, high, _ in spans:
        inset = min(1.5, (high - low) / 4)
        foot, top = edge.at(3), edge.at(6)
        canvas.path(
            ruler.points(
                [(low + inset, foot), (low + inset, top), (high - inset, top), (high - inset, foot)]
            ),
            Ink(QUIET, 0.7),
        )
    edge.reach += 7
    draw_lane(canvas, ruler, edge, [Label((low + high) / 2, text) for low, high, text in spans], _PLAIN)


def _draw_gravity(canvas: Canvas, ruler: Ruler, edge: Edge, gravity: float, units: UnitSystemName) -> None:
    if not gravity:
        return
    text = tr("g {value}").format(
        value=format_value(gravity, "acceleration", units, strip=True, with_unit=True)
    )
    middle, sense = ruler.extent / 2, 1 if gravity > 0 else -1
    aside = edge.at(6)
    canvas.path(ruler.points([(middle - sense * 11, aside), (middle + sense * 10, aside)]), Ink(QUIET, 0.9))
    draw_head(canvas, ruler, middle + sense * 11, aside, sense, 2.4)
    edge.reach += 8
    draw_lane(canvas, ruler, edge, [Label(middle, text)], _PLAIN)
