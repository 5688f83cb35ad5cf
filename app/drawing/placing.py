"""The measured rule by which labels are placed: none overlaps another, none is cut off, the rest are dropped.

Labels are tried by rank, each in the first row (nearest to what it names), at its place, then slid along the
axis as far as it allows, then in the next row. What finds no room is left to the tooltip.
Everything here is in (along, across) pixels, so that it serves both layouts.
"""

from __future__ import annotations

import bisect
import math
from collections.abc import Iterable, Sequence
from itertools import pairwise
from operator import itemgetter

from msgspec import Struct

from app.drawing.shapes import Face, Part

CLEAR = 9.0  # least pixels between two labels in a row, so that they do not read as one
STACKED = 3.0  # of labels of loads that stand under each other
TIGHT = 4.0  # of lengths and sections, which ticks and lines tell apart
UNDER_EACH_OTHER = 0.5  # of the same upright, where a line of text has air of its own
Span = tuple[float, float]


class Wish(Struct, frozen=True):
    """A label that wants to be centred at `along`; `slide` is how far it may move; low ranks come first."""

    text: str
    along: float
    extent: float  # along the axis
    depth: float  # across it
    part: Part
    rank: int = 0
    slide: float = 0.0
    face: Face = "small"


class Placed(Struct, frozen=True):
    """A label that has found its place: row and span along the axis."""

    wish: Wish
    row: int
    span: Span


def place(wishes: Iterable[Wish], rows: int, room: Span, clear: float = CLEAR) -> list[Placed]:
    """Place what fits into `rows` rows between the two pixels of `room`."""
    taken: list[list[Span]] = [[] for _ in range(rows)]
    placed = []
    for wish in sorted(wishes, key=lambda w: (w.rank, w.along)):
        for row in range(rows):
            span = _free_span(wish, taken[row], room, clear)
            if span is not None:
                bisect.insort(taken[row], span)
                placed.append(Placed(wish, row, span))
                break
    return placed


def fits(wishes: Sequence[Wish], rows: int, room: Span, clear: float = CLEAR) -> bool:
    """Whether every label finds a place; not tried where they are longer together than all rows."""
    longest = rows * (room[1] - room[0] + clear + 1e-5)
    together = sum(wish.extent + clear - 1e-5 for wish in wishes)
    return together <= longest and len(place(wishes, rows, room, clear)) == len(wishes)


def _free_span(wish: Wish, taken: Sequence[Span], room: Span, clear: float) -> Span | None:
    """The free span nearest to where the label wants to be, or None; `taken` grows along the row."""
    half = 0.5 * wish.extent
    own = wish.along - half, wish.along + half
    if _inside(own, room) and _is_free(own, taken, clear):
        return own
    for centre in _centres(wish, taken, room, clear) if wish.slide else ():
        span = centre - half, centre + half
        if _inside(span, room) and _is_free(span, taken, clear):
            return span
    return None


def _centres(wish: Wish, taken: Sequence[Span], room: Span, clear: float) -> list[float]:
    """Where the label may slide: the ends of the room, beside what stands; nearest first."""
    half, reach = 0.5 * wish.extent, wish.slide + 1e-6
    far = reach + clear + half
    first = bisect.bisect_left(taken, wish.along - far, key=itemgetter(1))
    last = bisect.bisect_right(taken, wish.along + far, key=itemgetter(0))
    beside = taken[first:last]
    centres = [room[0] + half, room[1] - half]
    for low, high in _gaps(beside, wish.extent + 2.0 * clear - 1e-5):
        centres += [high - clear - half, low + clear + half]
    near = [centre for centre in centres if abs(centre - wish.along) <= reach]
    return sorted(near, key=lambda centre: abs(centre - wish.along))


def _gaps(standing: Sequence[Span], least: float) -> list[Span]:
    """What is free before, between and after labels in a row, where it is wide enough."""
    if not standing:
        return []
    inner = [(one[1], other[0]) for one, other in pairwise(standing) if other[0] - one[1] >= least]
    return [(-math.inf, standing[0][0]), *inner, (standing[-1][1], math.inf)]


def _is_free(span: Span, taken: Sequence[Span], clear: float) -> bool:
    """Whether a span keeps clear of what stands: as that keeps clear of itself, its neighbours decide."""
    after = bisect.bisect(taken, span)
    return not any(_meets(span, other, clear) for other in taken[max(after - 1, 0) : after + 1])


def _inside(span: Span, room: Span) -> bool:
    return span[0] >= room[0] - 1e-6 and span[1] <= room[1] + 1e-6


def _meets(span: Span, other: Span, clear: float) -> bool:
    return span[0] < other[1] + clear - 1e-6 and other[0] < span[1] + clear - 1e-6
