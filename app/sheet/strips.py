"""Strips of u, N, σ and utilisation on one position axis, with allowables and over-limit hatching.

Tension is blue and marked +, compression orange and marked −; what exceeds its limit is hatched as well as
coloured. The curves come from `solver.fields`; only where they cross zero or the limit is interpolated here,
between neighbouring points of the drawing.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, field
from typing import Final

import numpy as np

from app.point_marks import PointMark
from app.sheet import colours
from app.sheet.limit_labels import Limit, Scale, draw_limit_labels
from app.sheet.point_marks import draw_point_marks
from app.sheet.ruler import Ruler
from app.sheet.svg import Canvas, Ink, Point
from app.strip_choice import Kind
from app.units import Quantity, format_value, symbol, utilisation_text
from app.words import tr
from solver.arrays import BoolArray, FloatArray
from solver.checks import PASS_MARGIN
from solver.model import UnitSystemName

DEPTH_ACROSS: Final = {"displacement": 44.0, "force": 56.0, "stress": 70.0, "utilisation": 44.0, "mode": 44.0}
DEPTH_UPRIGHT: Final = 96.0
_SIZE = 7.5
_LIMIT = Ink(colours.INK, 0.7, dashes="4 2.5")


@dataclass(frozen=True, slots=True)
class Strip:
    """One strip: curves (k,) over x in SI; of each, `over` (k,) is above 1 where it is hatched."""

    name: str
    kind: Kind
    quantity: Quantity
    x: FloatArray
    curves: tuple[FloatArray, ...]
    over: tuple[FloatArray, ...] = ()
    limits: tuple[Limit, ...] = field(default_factory=tuple)
    marks: tuple[PointMark, ...] = field(default_factory=tuple)


def draw_strip(
    canvas: Canvas,
    ruler: Ruler,
    strip: Strip,
    start: float,
    depth: float,
    joints: FloatArray,
    units: UnitSystemName,
) -> None:
    """Draw a strip in the box between `start` and `start + depth` aside; joints (n + 1,) in m."""
    scale, least, most = _scale(strip, start, depth)
    _draw_frame(canvas, ruler, strip, scale, joints)
    for number in range(len(strip.curves)):
        _draw_curve(canvas, ruler, strip, scale, number)
    for number in range(len(strip.curves)):
        _draw_signs(canvas, ruler, strip, scale, number)
    canvas.path(ruler.points([(0.0, scale.zero), (ruler.extent, scale.zero)]), Ink(colours.INK, 0.7))
    for limit in strip.limits:
        if not limit.far:
            canvas.path(_line(ruler, limit, scale.aside(limit.value)), _LIMIT)
    draw_limit_labels(canvas, ruler, scale, strip.limits, (strip.x, strip.curves))
    _draw_words(canvas, ruler, strip, scale, (least, most), units)
    draw_point_marks(canvas, ruler, scale, strip.marks)


def _scale(strip: Strip, start: float, depth: float) -> tuple[Scale, float, float]:
    """The scale, and the smallest and largest value of the curves."""
    values = np.concatenate([c[np.isfinite(c)] for c in strip.curves] or [np.zeros(1)])
    least, most = (float(values.min()), float(values.max())) if values.size else (0.0, 0.0)
    largest = max(abs(least), abs(most))
    least, most = (0.0 if abs(value) <= 1e-12 * largest else value for value in (least, most))  # rounding
    near = [limit.value for limit in strip.limits if not limit.far]
    near += [mark.value for mark in strip.marks]
    low, high = min(0.0, least, *near), max(0.0, most, *near)
    if high - low <= 1e-12 * largest or high == low:
        low, high = low - 1.0, high + 1.0
    inner = depth - 10.0
    factor = inner / (high - low)
    return Scale(start, start + depth, start + 5 - low * factor, factor), least, most


def _draw_frame(canvas: Canvas, ruler: Ruler, strip: Strip, scale: Scale, joints: FloatArray) -> None:
    """Ground, allowable band, frame, and the lines of the inner joints."""
    corners = [(0.0, scale.low), (ruler.extent, scale.low), (ruler.extent, scale.high), (0.0, scale.high)]
    canvas.path(ruler.points(corners), Ink(fill="#FFFFFF"), closed=True)
    for limit in strip.limits if strip.kind == "stress" else ():
        edge = min(max(scale.aside(limit.value), scale.low), scale.high)
        inside = [*_line(ruler, limit, edge), *_line(ruler, limit, scale.zero)[::-1]]
        canvas.path(inside, Ink(fill=colours.BAND), closed=True)
    canvas.path(ruler.points(corners), Ink(colours.RULE, 0.6), closed=True)
    inner = [ruler.along(x) for x in joints[1:-1].tolist()]
    canvas.lines(
        ((ruler.point(a, scale.low), ruler.point(a, scale.high)) for a in inner),
        Ink(colours.RULE, 0.5, dashes="2 2"),
    )


def _draw_curve(canvas: Canvas, ruler: Ruler, strip: Strip, scale: Scale, number: int) -> None:
    curve = strip.curves[number]
    over = strip.over[number] if strip.over else np.zeros_like(curve)
    x, value, over = _with_crossings(strip.x, curve, over)
    for held, colour, fill in _colours(strip, value):
        for low, high in _runs(np.isfinite(value) & held):
            _draw_run(canvas, ruler, scale, (x[low:high], value[low:high]), colour, fill)
    for low, high in _runs(over >= 1 + PASS_MARGIN):
        _draw_over(canvas, ruler, scale, (x[low:high], value[low:high]))


def _colours(strip: Strip, value: FloatArray) -> list[tuple[BoolArray, str, str]]:
    """Which part of a curve is drawn in which colour and over which ground."""
    if strip.kind in ("displacement", "mode"):
        return [(np.ones(value.shape, dtype=np.bool_), colours.DISPLACEMENT, "")]
    if strip.kind == "utilisation":
        return [(np.ones(value.shape, dtype=np.bool_), colours.INK, colours.LOAD)]
    with np.errstate(invalid="ignore"):
        return [
            (value >= 0, colours.TENSION, colours.TENSION_FILL),
            (value <= 0, colours.COMPRESSION, colours.COMPRESSION_FILL),
        ]


def _with_crossings(
    x: FloatArray, value: FloatArray, over: FloatArray
) -> tuple[FloatArray, FloatArray, FloatArray]:
    """The points with those added where the value crosses 0 or the utilisation crosses its limit."""
    columns = _crossed(np.vstack([x, value, over]), 1, 0.0)
    x, value, over = _crossed(columns, 2, 1 + PASS_MARGIN)
    return x, value, over


def _crossed(columns: FloatArray, row: int, level: float) -> FloatArray:
    """Points (c, k) with one put in wherever a row crosses a level on its way; where it jumps it does not."""
    above = columns[row] - level
    with np.errstate(invalid="ignore"):
        at = np.flatnonzero((above[:-1] * above[1:] < 0) & (np.diff(columns[0]) > 0))
    t = above[at] / (above[at] - above[at + 1])
    between = (1 - t) * columns[:, at] + t * columns[:, at + 1]
    between[row] = level
    return np.insert(columns, at + 1, between, axis=1)


def _runs(mask: BoolArray) -> list[tuple[int, int]]:
    """Half-open index ranges where the mask holds, at least two points long."""
    edges = np.flatnonzero(np.diff(np.r_[False, mask, False].astype(np.int8)))
    return [(int(a), int(b)) for a, b in zip(edges[::2], edges[1::2], strict=True) if b - a > 1]


def _places(ruler: Ruler, scale: Scale, run: tuple[FloatArray, FloatArray]) -> list[tuple[float, float]]:
    return [(ruler.along(x), scale.aside(v)) for x, v in zip(run[0].tolist(), run[1].tolist(), strict=True)]


def _draw_run(
    canvas: Canvas, ruler: Ruler, scale: Scale, run: tuple[FloatArray, FloatArray], colour: str, fill: str
) -> None:
    if not np.any(run[1]) and fill:
        return
    places = _places(ruler, scale, run)
    if fill:
        closed = [(places[0][0], scale.zero), *places, (places[-1][0], scale.zero)]
        canvas.path(ruler.points(closed), Ink(fill=fill), closed=True)
    canvas.path(ruler.points(places), Ink(colour, 1.2))


def _draw_over(canvas: Canvas, ruler: Ruler, scale: Scale, run: tuple[FloatArray, FloatArray]) -> None:
    places = _places(ruler, scale, run)
    closed = ruler.points([(places[0][0], scale.zero), *places, (places[-1][0], scale.zero)])
    canvas.hatch(closed, colours.OVER)
    canvas.path(ruler.points(places), Ink(colours.OVER, 1.6))


def _draw_signs(canvas: Canvas, ruler: Ruler, strip: Strip, scale: Scale, number: int) -> None:
    """+ and − in the middle of each run with room for it; of two curves the larger carries +, the other −."""
    if strip.kind not in ("force", "stress"):
        return
    x, value = strip.x, strip.curves[number]
    for sign in (1, -1) if len(strip.curves) == 1 else ((1,), (-1,))[number]:
        for low, high in _runs(sign * value > 0):
            along = ruler.along(x[low:high])
            a, b = float(along[0]), float(along[-1])
            middle = float(np.interp((a + b) / 2, along, value[low:high]))
            if b - a > 14 and abs(middle * scale.factor) > 11:
                _draw_sign(canvas, ruler, ((a + b) / 2, scale.zero + middle * scale.factor / 2), sign)


def _draw_sign(canvas: Canvas, ruler: Ruler, place: tuple[float, float], sign: int) -> None:
    x, y = ruler.point(*place)
    colour, text = (colours.TENSION, "+") if sign > 0 else (colours.COMPRESSION, "−")
    canvas.pill((x, y), 9, 9, Ink(fill="#FFFFFF"))
    canvas.text((x, y + 3.2), text, size=10, fill=colour, bold=True, anchor="middle")


def _line(ruler: Ruler, limit: Limit, aside: float) -> list[Point]:
    """From a limit's start to its end, at some distance aside."""
    return ruler.points([(ruler.along(limit.first), aside), (ruler.along(limit.last), aside)])


def _draw_words(
    canvas: Canvas,
    ruler: Ruler,
    strip: Strip,
    scale: Scale,
    values: tuple[float, float],
    units: UnitSystemName,
) -> None:
    """The name with its unit, and the largest and smallest value at their height."""
    unit = symbol(strip.quantity, units)
    if ruler.upright:
        x, y = ruler.point(ruler.extent, scale.low)
        canvas.text((x, y - 15), f"{strip.name} {unit}".strip(), size=8.5, bold=True)
        canvas.text((x, y - 5), _range_text(strip, values, units), size=_SIZE, fill=colours.QUIET)
        return
    x, y = ruler.point(0.0, (scale.low + scale.high) / 2)
    canvas.text((x - 46, y), strip.name, size=8.5, bold=True, anchor="end")
    canvas.text((x - 46, y + 9), unit, size=_SIZE, fill=colours.QUIET, anchor="end")
    shown = (values[1], 0.0) if strip.kind == "utilisation" else sorted({*values, 0.0})
    _draw_heights(canvas, ruler, scale, [(value, _value_text(value, strip, units)) for value in shown])


def _range_text(strip: Strip, values: tuple[float, float], units: UnitSystemName) -> str:
    least, most = (_value_text(value, strip, units) for value in values)
    if strip.kind == "utilisation":
        return tr("up to {most}").format(most=most)
    return tr("{least} to {most}").format(least=least, most=most)


def _value_text(value: float, strip: Strip, units: UnitSystemName) -> str:
    if strip.kind == "utilisation":
        return utilisation_text(value, "fail" if value > 1 + PASS_MARGIN else "pass")
    return format_value(value, strip.quantity, units, 4)


def _draw_heights(canvas: Canvas, ruler: Ruler, scale: Scale, texts: Sequence[tuple[float, str]]) -> None:
    """Values beside the box, those too near to the one of larger size left out."""
    taken: list[float] = []
    for value, text in sorted(texts, key=lambda pair: -abs(pair[0])):
        x, y = ruler.point(0.0, scale.aside(value))
        if all(abs(y - other) >= _SIZE for other in taken):
            taken.append(y)
            canvas.text((x - 4, y + 2.6), text, size=_SIZE, fill=colours.QUIET, anchor="end")
