"""The drawing as plain values: strokes and texts in pixels, and what can be pointed at.

A picture is made by `layout` without a window, painted and hit-tested by `MemberDrawing`. Its parts are
structs: hundreds are made for every edit, and they are made faster than dataclasses.
"""

from __future__ import annotations

from dataclasses import dataclass, field
from typing import Literal, TypeAlias

from msgspec import Struct
from PySide6.QtCore import QPointF, QRectF

from app.gui.fonts import Face

PartKind: TypeAlias = Literal["segment", "joint", "support", "force", "distributed", "length", "note"]
Ink: TypeAlias = Literal["ink", "quiet", "joint", "select"]
Fill: TypeAlias = Literal["", "body_fill", "band_fill", "select_fill", "load_fill", "paper", "ink"]


class Part(Struct, frozen=True):
    """What a point of the drawing stands for: `index` along the chain, of segments or of joints."""

    kind: PartKind
    index: int


class Stroke(Struct, frozen=True):
    """A line through points, closed or not; `fill` names a colour of the theme, empty for none."""

    points: tuple[QPointF, ...]
    ink: Ink = "ink"
    width: float = 1.0
    closed: bool = False
    fill: Fill = ""
    dash: tuple[float, ...] = ()
    part: Part | None = None
    clip: bool = True  # to the window of the ruler
    pairs: bool = False  # every two points are a line of their own


class Circle(Struct, frozen=True):
    """A circle on paper around a mark."""

    centre: QPointF
    radius: float


class Text(Struct, frozen=True):
    """A text centred in its box."""

    rect: QRectF
    text: str
    face: Face = "plain"
    ink: Ink = "ink"
    part: Part | None = None


class Target(Struct, frozen=True):
    """Where a part can be pointed at."""

    rect: QRectF
    part: Part


@dataclass(slots=True)
class Picture:
    """All of a drawing; later targets lie over earlier ones."""

    factor: float = 1.0  # how much larger the drawing is across the axis than along it
    chain_edge: float = 0.0  # across the axis: where joint lines begin
    strokes: list[Stroke] = field(default_factory=list)
    circles: list[Circle] = field(default_factory=list)
    texts: list[Text] = field(default_factory=list)
    targets: list[Target] = field(default_factory=list)

    def target_at(self, point: QPointF) -> Target | None:
        """The topmost target at a point, or None."""
        for target in reversed(self.targets):
            if target.rect.contains(point):
                return target
        return None
