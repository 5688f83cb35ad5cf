"""Paints the shapes of `app.drawing` on the sheet's canvas, in the colours and the font of paper."""

from __future__ import annotations

from typing import Final

from app.drawing.shapes import Face, Fill, Picture, Stroke, Text
from app.drawing.shapes import Ink as InkName
from app.sheet.colours import BAND, BODY, INK, LOAD, QUIET
from app.sheet.svg import Canvas, Ink, number, text_width

_PAPER: Final = "#FFFFFF"
_SIZES: Final[dict[Face, float]] = {
    "plain": 11.7,
    "strong": 12.0,
    "small": 10.5,
    "small_strong": 10.5,
    "mark": 14.0,
}
_INKS: Final[dict[InkName, str]] = {"ink": INK, "quiet": QUIET, "joint": QUIET, "select": INK}
_FILLS: Final[dict[Fill, str]] = {
    "": "none",
    "body_fill": BODY,
    "band_fill": BAND,
    "select_fill": BODY,
    "load_fill": LOAD,
    "paper": _PAPER,
    "ink": INK,
}
_LINE: Final = 1.2  # height of a line in sizes of its letters
_BASELINE: Final = 0.34  # of the baseline under the middle of a line, in sizes
_ON_LINES: Final = frozenset({"joint", "length", "section", "support"})  # what stands where thin lines run


def measure(text: str, face: Face) -> tuple[float, float]:
    """Width and height of a text on paper, in pixels of the layout; line breaks in it count."""
    lines, size = text.split("\n"), _SIZES[face]
    return max(text_width(line, size) for line in lines), _LINE * size * len(lines)


def draw_picture(canvas: Canvas, picture: Picture) -> None:
    """Strokes, circles, texts; what can be pointed at has no meaning on paper."""
    for stroke in picture.strokes:
        _draw_stroke(canvas, stroke)
    for circle in picture.circles:
        canvas.pill(circle.centre, 2 * circle.radius, 2 * circle.radius, Ink(INK, 1.0, _PAPER))
    for text in picture.texts:
        _draw_text(canvas, text)


def _draw_stroke(canvas: Canvas, stroke: Stroke) -> None:
    dashes = " ".join(number(length) for length in stroke.dash)
    ink = Ink(_INKS[stroke.ink], stroke.width, _FILLS[stroke.fill], dashes)
    if stroke.pairs:
        canvas.lines(zip(stroke.points[::2], stroke.points[1::2], strict=True), ink)
    else:
        canvas.path(stroke.points, ink, closed=stroke.closed)


def _draw_text(canvas: Canvas, text: Text) -> None:
    """Line by line; a text keeps the side of its box that it is anchored to, as letters may run narrower."""
    size, box = _SIZES[text.face], text.box
    x = {"start": box.left, "middle": box.centre[0], "end": box.right}[text.anchor]
    part = text.part
    for index, line in enumerate(text.text.split("\n")):
        canvas.text(
            (x, box.top + (index + 0.5) * _LINE * size + _BASELINE * size),
            line,
            size=size,
            fill=_INKS[text.ink],
            anchor=text.anchor,
            bold=text.face in ("strong", "small_strong", "mark"),
            italic=part is not None and part.kind == "joint",
            backed=part is not None and part.kind in _ON_LINES,
        )
