"""The measured rule by which labels are placed: none overlaps another, none is cut off, the rest are dropped.

Labels are tried by rank, each in the first row (nearest to what it names), at its place, then slid along the
axis as far as it allows, then in the next row. What finds no room is left to the tooltip.
Everything here is in (along, across) pixels, so that it serves both layouts.
"""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from dataclasses import dataclass

from app.gui.drawing.shapes import Part

CLEAR = 9.0  # least pixels between two labels in a row, so that they do not read as one
TIGHT = 4.0  # of lengths and sections, which ticks and lines tell apart
Span = tuple[float, float]


@dataclass(frozen=True, slots=True)
class Wish:
    """A label that wants to be centred at `along`; `slide` is how far it may move; low ranks come first."""

    text: str
    along: float
    extent: float  # along the axis
    depth: float  # across it
    part: Part
    rank: int = 0
    slide: float = 0.0


@dataclass(frozen=True, slots=True)
class Placed:
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
                taken[row].append(span)
                placed.append(Placed(wish, row, span))
                break
    return placed


def _free_span(wish: Wish, taken: Sequence[Span], room: Span, clear: float) -> Span | None:
    """The free span nearest to where the label wants to be, or None."""
    half = 0.5 * wish.extent
    if wish.slide == 0.0:
        taken_by = [other for other in taken if _meets((wish.along - half, wish.along + half), other, clear)]
        span = wish.along - half, wish.along + half
        return span if _inside(span, room) and not taken_by else None
    centres = [wish.along, room[0] + half, room[1] - half]
    centres += [low - clear - half for low, _ in taken] + [high + clear + half for _, high in taken]
    for centre in sorted(centres, key=lambda c: abs(c - wish.along)):
        span = centre - half, centre + half
        near = abs(centre - wish.along) <= wish.slide + 1e-6
        if near and _inside(span, room) and not any(_meets(span, other, clear) for other in taken):
            return span
    return None


def _inside(span: Span, room: Span) -> bool:
    return span[0] >= room[0] - 1e-6 and span[1] <= room[1] + 1e-6


def _meets(span: Span, other: Span, clear: float) -> bool:
    return span[0] < other[1] + clear - 1e-6 and other[0] < span[1] + clear - 1e-6
