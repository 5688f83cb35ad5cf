"""The measured rule by which labels are placed: none overlaps another, none is cut off, the rest are dropped.

Labels are tried by rank, each in the first row (nearest to what it names), at its place, then slid along the
axis as far as it allows, then in the next row. What finds no room is left to the tooltip.
Everything here is in (along, across) pixels, so that it serves both layouts.
"""

from __future__ import annotations

import bisect
import math
from collections.abc import Iterable, Sequence

from msgspec import Struct

from app.drawing.shapes import Face, Part

CLEAR = 9.0  # least pixels between two labels in a row, so that they do not read as one
STACKED = 3.0  # of labels of loads that stand under each other
TIGHT = 4.0  # of lengths and sections, which ticks and lines tell apart
UNDER_EACH_OTHER = 0.5  # of the same upright, where a line of text has air of its own
ROUNDING = 1e-6
Span = tuple[float, float]


class Wish(Struct, frozen=True, gc=False):
    """A label that wants to be centred at `along`; `slide` is how far it may move; low ranks come first."""

    text: str
    along: float
    extent: float  # along the axis
    depth: float  # across it
    part: Part
    rank: int = 0
    slide: float = 0.0
    face: Face = "small"
    of_results: bool = False


class Placed(Struct, frozen=True, gc=False):
    """A label that has found its place: row and span along the axis."""

    wish: Wish
    row: int
    span: Span


def place(wishes: Iterable[Wish], rows: int, room: Span, clear: float = CLEAR) -> list[Placed]:
    """Place what fits into `rows` rows between the two pixels of `room`."""
    gaps: list[list[Span]] = [[room] for _ in range(rows)]
    placed = []
    for wish in sorted(wishes, key=lambda w: (w.rank, w.along)):
        for row in range(rows):
            found = _nearest_gap(wish, gaps[row])
            if found is not None:
                gap, centre = found
                span = centre - 0.5 * wish.extent, centre + 0.5 * wish.extent
                low, high = gaps[row][gap]
                beside = ((low, span[0] - clear), (span[1] + clear, high))
                gaps[row][gap : gap + 1] = [free for free in beside if free[1] > free[0]]
                placed.append(Placed(wish, row, span))
                break
    return placed


def fits(wishes: Sequence[Wish], rows: int, room: Span, clear: float = CLEAR) -> bool:
    """Whether every label finds a place; not tried where they are longer together than all rows."""
    longest = rows * (room[1] - room[0] + clear + 1e-5)
    together = sum(wish.extent + clear - 1e-5 for wish in wishes)
    return together <= longest and len(place(wishes, rows, room, clear)) == len(wishes)


def _nearest_gap(wish: Wish, gaps: Sequence[Span]) -> tuple[int, float] | None:
    """The gap in which the label stands nearest to where it wants to be, and its centre there, or None.

    `gaps` are what is free of a row, growing, less what keeps clear of the labels that stand.
    """
    along, half = wish.along, 0.5 * wish.extent
    at = bisect.bisect_right(gaps, (along, math.inf)) - 1  # the gap that the place wanted is in or behind
    if at >= 0 and gaps[at][0] <= along - half + ROUNDING and along + half <= gaps[at][1] + ROUNDING:
        return at, along
    if not wish.slide:
        return None
    reach = wish.slide + ROUNDING
    before = _first_wide(gaps, range(at, -1, -1), along, half, reach)
    after = _first_wide(gaps, range(at + 1, len(gaps)), along, half, reach)
    found = [one for one in (before, after) if one is not None]
    return min(found, key=lambda one: abs(one[1] - along), default=None)


def _first_wide(
    gaps: Sequence[Span], order: range, along: float, half: float, reach: float
) -> tuple[int, float] | None:
    """The first gap that is wide enough and within reach, nearest first, and the centre of a label in it."""
    for gap in order:
        low, high = gaps[gap]
        centre = min(max(along, low + half), high - half)
        if high - low + ROUNDING >= 2.0 * half:
            return (gap, centre) if abs(centre - along) <= reach else None
        if low - along > reach or along - high > reach:  # and so are all that follow
            return None
    return None
