"""Trade symbols as plain lines on a grid of 24 by 24, y downward: supports, loads and what else is put on.

They say in small what the drawing shows in large: a hatched wall, a zigzag, an arrow.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import Final, TypeAlias

GRID: Final = 24.0
Points: TypeAlias = tuple[tuple[float, float], ...]


@dataclass(frozen=True, slots=True)
class Line:
    """A line through points of the grid."""

    points: Points
    width: float = 1.4
    closed: bool = False
    filled: bool = False
    dashed: bool = False


Symbol: TypeAlias = tuple[Line, ...]


def _bar(start: float, end: float, y: float = 12.0, half: float = 2.5) -> Symbol:
    """The end of a member: its two edges, closed at the right."""
    edges = ((start, y - half), (end, y - half), (end, y + half), (start, y + half))
    return (Line(edges),)


def _wall(x: float, top: float = 4.0, foot: float = 20.0, out: float = 4.0) -> Symbol:
    """A wall across the axis, hatched on its outer side."""
    count = int((foot - top) / 4.0)
    hatch = tuple(Line(((x, top + 4.0 * i + 3.5), (x + out, top + 4.0 * i)), 1.0) for i in range(count))
    return (Line(((x, top), (x, foot)), 2.0), *hatch)


def _arrow(start: tuple[float, float], end: tuple[float, float], head: float, width: float = 1.4) -> Symbol:
    """An arrow along one of the axes, its head filled."""
    along = 1.0 if end[0] + end[1] > start[0] + start[1] else -1.0
    back, wing = along * head, 0.55 * head
    if start[1] == end[1]:
        wings = ((end[0] - back, end[1] - wing), end, (end[0] - back, end[1] + wing))
    else:
        wings = ((end[0] - wing, end[1] - back), end, (end[0] + wing, end[1] - back))
    return (Line((start, end), width), Line(wings, 1.0, closed=True, filled=True))


FIXED: Final[Symbol] = (*_bar(3.0, 16.0), *_wall(16.0))
SPRING: Final[Symbol] = (
    Line(
        (
            (2.0, 12.0),
            (5.0, 12.0),
            (6.5, 7.0),
            (9.0, 17.0),
            (11.5, 7.0),
            (13.5, 17.0),
            (15.0, 12.0),
            (18.0, 12.0),
        )
    ),
    *_wall(18.0, 5.0, 19.0),
)
STOP: Final[Symbol] = (
    *_bar(2.0, 11.0),
    Line(((11.0, 7.0), (11.0, 17.0)), 2.4),
    *_wall(17.0),
)
FREE: Final[Symbol] = (
    *_bar(2.0, 12.0),
    Line(((15.5, 8.5), (22.0, 15.5)), 1.8),
    Line(((15.5, 15.5), (22.0, 8.5)), 1.8),
)
FORCE: Final[Symbol] = _arrow((2.0, 12.0), (22.0, 12.0), 8.0, 2.4)
DISTRIBUTED: Final[Symbol] = (
    Line(((2.0, 18.0), (2.0, 6.0), (22.0, 6.0), (22.0, 18.0)), closed=True),
    *_arrow((4.0, 12.0), (11.0, 12.0), 4.0),
    *_arrow((13.0, 12.0), (20.0, 12.0), 4.0),
)
WARMTH: Final[Symbol] = (
    Line(((2.0, 19.0), (7.0, 5.0), (12.0, 19.0)), closed=True),
    Line(((13.5, 5.5), (22.5, 5.5)), 1.8),
    Line(((18.0, 5.5), (18.0, 19.0)), 1.8),
)
FIT: Final[Symbol] = (
    Line(((2.0, 10.0), (10.0, 10.0), (10.0, 18.0), (2.0, 18.0))),
    Line(((22.0, 10.0), (14.0, 10.0), (14.0, 18.0), (22.0, 18.0))),
    *_arrow((3.0, 5.0), (10.0, 5.0), 4.0),
    *_arrow((21.0, 5.0), (14.0, 5.0), 4.0),
)
WEIGHT: Final[Symbol] = (
    Line(((5.0, 3.0), (19.0, 3.0), (19.0, 10.0), (5.0, 10.0)), closed=True),
    *_arrow((12.0, 10.0), (12.0, 22.0), 6.0, 2.0),
)
SHOULDER: Final[Symbol] = (
    Line(((2.0, 4.0), (12.0, 4.0), (12.0, 6.0), (12.7, 8.6), (14.6, 10.5), (17.0, 11.0), (22.0, 11.0)), 1.8),
    Line(((2.0, 20.0), (12.0, 20.0), (12.0, 19.0), (13.0, 17.0), (22.0, 17.0))),
    Line(((2.0, 4.0), (2.0, 20.0))),
    Line(((22.0, 11.0), (22.0, 17.0))),
)
LATERAL: Final[Symbol] = (
    *_bar(2.0, 22.0),
    Line(((12.0, 8.5), (8.0, 3.0), (16.0, 3.0)), closed=True),
    Line(((12.0, 15.5), (8.0, 21.0), (16.0, 21.0)), closed=True),
    Line(((6.0, 2.5), (18.0, 2.5)), 1.6),
    Line(((6.0, 21.5), (18.0, 21.5)), 1.6),
)
TURNING: Final[Symbol] = (
    *_bar(2.0, 22.0),
    Line(((5.0, 7.0), (19.0, 7.0)), 2.0),
    Line(((5.0, 17.0), (19.0, 17.0)), 2.0),
    *(Line(((6.0 + 4.0 * i, 7.0), (9.0 + 4.0 * i, 3.0)), 1.0) for i in range(4)),
    *(Line(((6.0 + 4.0 * i, 17.0), (9.0 + 4.0 * i, 21.0)), 1.0) for i in range(4)),
)
BEDDING: Final[Symbol] = (
    *_bar(2.0, 22.0, 8.0),
    *(Line(((3.0 + 4.0 * i, 20.0), (6.0 + 4.0 * i, 14.0)), 1.0) for i in range(5)),
    Line(((2.0, 14.0), (22.0, 14.0)), 1.8),
)
BONDED: Final[Symbol] = (
    Line(((2.0, 5.0), (22.0, 5.0), (22.0, 19.0), (2.0, 19.0)), closed=True),
    Line(((2.0, 10.0), (22.0, 10.0))),
    Line(((2.0, 14.0), (22.0, 14.0))),
    *(Line(((3.0 + 4.0 * i, 14.0), (6.5 + 4.0 * i, 10.0)), 1.0) for i in range(5)),
)
COMPANION: Final[Symbol] = (
    *_bar(2.0, 22.0, 8.0),
    *_bar(5.0, 19.0, 18.0, 2.0),
    Line(((5.0, 20.0), (5.0, 10.5)), 1.8),
    Line(((19.0, 16.0), (19.0, 20.0))),
    Line(((19.0, 20.0), (19.0, 10.5)), 1.8),
)
MOVEMENT: Final[Symbol] = (
    *_wall(7.0, out=-4.0),
    Line(((18.0, 4.0), (18.0, 20.0)), 1.8, dashed=True),
    *_arrow((8.5, 12.0), (17.0, 12.0), 5.0),
)
