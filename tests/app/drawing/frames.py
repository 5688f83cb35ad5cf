"""Frames as the window gives them, without a window: its proportions, and a measure of texts of its own."""

from __future__ import annotations

from app.drawing.frame import Frame
from app.drawing.member import Member
from app.drawing.ruler import Ruler
from app.drawing.shapes import Box, Face

SIZES = ((900.0, 480.0), (1900.0, 1000.0))  # of the sheet in windows of 1280×800 and 2560×1440
HEIGHT = 14.0  # of a line of plain text, px
_SMALL = ("small", "small_strong")


def measure(text: str, face: Face) -> tuple[float, float]:
    """A font in which every letter is as wide as a digit."""
    size = 0.9 if face in _SMALL else 1.0
    lines = text.split("\n")
    return size * 0.55 * HEIGHT * max(map(len, lines)), size * HEIGHT * len(lines)


def window_frame(member: Member, size: tuple[float, float], *, upright: bool) -> Frame:
    """The frame of the drawing on a sheet of a size: on top of it, or upright at its left."""
    width, height = size
    if upright:
        box, ends = Box(0.0, 0.0, 0.45 * width, height - 44.0), (height - 96.0, 48.0)
    else:
        box, ends = Box(0.0, 4.0, width, 4.0 + 0.4 * (height - 44.0)), (7.2 * HEIGHT, width - 5.2 * HEIGHT)
    return Frame(box, Ruler.fitting(member.position, *ends), upright, measure)
