"""A plain SVG canvas that knows how far its drawing reaches, so that no figure is ever clipped.

Only lines, paths and text in fonts that Typst embeds, every number rounded, so that the same project gives
the same bytes. One unit is one point on paper, unless a canvas has another scale. The rejected alternatives:
the plotting widget's exporter is broken with this Qt, and its lines flood the picture in Typst.
"""

from __future__ import annotations

import re
from collections.abc import Iterable, Sequence
from dataclasses import dataclass, field
from typing import Final, Literal, TypeAlias
from xml.sax.saxutils import escape, quoteattr

from app.sheet.printable import printable, printable_in_figure

Point: TypeAlias = tuple[float, float]
Anchor: TypeAlias = Literal["start", "middle", "end"]

FONT: Final = "Libertinus Serif"
_NARROW: Final = frozenset("iljt.,:;!|'()[]/· \u2009\u202f")
_OTHER_FONT: Final = "▭"  # a text with it is set in a wider font as a whole
_WIDE: Final = frozenset("mwMW@—%")


def text_width(text: str, size: float) -> float:
    """About how wide the text runs as it is shown, in points; rather too much than too little."""
    text = printable_in_figure(text)
    narrow = sum(c in _NARROW for c in text)
    wide = sum(c in _WIDE or ord(c) > 0x2FF for c in text)
    capital = sum(c.isupper() for c in text)
    plain = len(text) - narrow - wide - capital
    if _OTHER_FONT in text:
        return size * (0.66 * len(text) + 0.34 * text.count(_OTHER_FONT))
    return size * (0.34 * narrow + 0.86 * wide + 0.7 * capital + 0.52 * plain)


def fitted(text: str, size: float, width: float) -> str:
    """The text, cut with an ellipsis where it would run wider than `width` points."""
    if text_width(text, size) <= width:
        return text
    kept = next(
        (end for end in range(len(text[:80]), 0, -1) if text_width(text[:end] + "…", size) <= width), 0
    )
    return text[:kept] + "…"


def number(value: float) -> str:
    """A coordinate to a hundredth of a point, without a trailing or a negative zero."""
    text = f"{value:.2f}".rstrip("0").rstrip(".")
    return "0" if text == "-0" else text


@dataclass(frozen=True, slots=True)
class Ink:
    """How a shape is drawn: stroke and fill as #RRGGBB or "none", width and dashes in points."""

    stroke: str = "none"
    width: float = 1.0
    fill: str = "none"
    dashes: str = ""

    def attributes(self) -> str:
        """The SVG attributes."""
        dashed = f' stroke-dasharray="{self.dashes}"' if self.dashes else ""
        return f'fill="{self.fill}" stroke="{self.stroke}" stroke-width="{number(self.width)}"{dashed}'


@dataclass(slots=True)
class Canvas:
    """Collects shapes; `render` wraps them in a view box around all of them."""

    parts: list[str] = field(default_factory=list)
    scale: float = 1.0  # points on paper per unit of the drawing
    definitions: dict[str, str] = field(default_factory=dict)
    low: list[float] = field(default_factory=lambda: [float("inf"), float("inf")])
    high: list[float] = field(default_factory=lambda: [float("-inf"), float("-inf")])

    def reach(self, x: float, y: float) -> None:
        """Make the figure reach at least to this point."""
        self.low = [min(self.low[0], x), min(self.low[1], y)]
        self.high = [max(self.high[0], x), max(self.high[1], y)]

    def path(self, points: Sequence[Point], ink: Ink, *, closed: bool = False) -> None:
        """A line through the points, or the area inside them."""
        if len(points) < 2:
            return
        for point in points:
            self.reach(*point)
        steps = " L".join(f"{number(x)} {number(y)}" for x, y in points)
        self.parts.append(
            f'<path d="M{steps}{" Z" if closed else ""}" {ink.attributes()} stroke-linejoin="round"/>'
        )

    def lines(self, pairs: Iterable[tuple[Point, Point]], ink: Ink) -> None:
        """Many short straight lines as one shape."""
        steps = []
        for start, end in pairs:
            self.reach(*start)
            self.reach(*end)
            steps.append(f"M{number(start[0])} {number(start[1])} L{number(end[0])} {number(end[1])}")
        if steps:
            self.parts.append(f'<path d="{" ".join(steps)}" {ink.attributes()}/>')

    def pill(self, center: Point, width: float, height: float, ink: Ink) -> None:
        """A rounded box, a circle where it is as wide as high."""
        x, y = center[0] - width / 2, center[1] - height / 2
        self.reach(x, y)
        self.reach(x + width, y + height)
        self.parts.append(
            f'<rect x="{number(x)}" y="{number(y)}" width="{number(width)}" height="{number(height)}"'
            f' rx="{number(height / 2)}" {ink.attributes()}/>'
        )

    def text(
        self,
        at: Point,
        text: str,
        *,
        size: float = 8.0,
        fill: str = "#1F2A33",
        anchor: Anchor = "start",
        bold: bool = False,
        italic: bool = False,
        upwards: bool = False,
        backed: bool = False,
    ) -> None:
        """Text with its baseline at the point; `upwards` reads from below, `backed` hides lines behind it."""
        corners = _corners(at, text_width(text, size), size, anchor, upwards=upwards)
        for corner in corners:
            self.reach(*corner)
        if backed:
            self.path(corners, Ink(fill="#FFFFFF"), closed=True)
        x, y = number(at[0]), number(at[1])
        style = (
            (' font-weight="700"' if bold else "")
            + (' font-style="italic"' if italic else "")
            + (f' transform="rotate(-90 {x} {y})"' if upwards else "")
        )
        self.parts.append(
            f'<text x="{x}" y="{y}" font-family="{FONT}" font-size="{number(size)}" fill="{fill}"'
            f' text-anchor="{anchor}"{style}>{escape(printable_in_figure(text))}</text>'
        )

    def hatch(self, points: Sequence[Point], colour: str) -> None:
        """The area inside the points in slanted lines."""
        name = f"hatch{re.sub('[^0-9A-Za-z]', '', colour)}"
        self.definitions[name] = (
            f'<pattern id="{name}" width="4" height="4" patternUnits="userSpaceOnUse"'
            f' patternTransform="rotate(45)"><line x1="0" y1="0" x2="0" y2="4" stroke="{colour}"'
            f' stroke-width="2"/></pattern>'
        )
        self.path(points, Ink(fill=f"url(#{name})"), closed=True)

    def put(self, other: Canvas, at: Point, scale: float) -> None:
        """All of another canvas, `scale` times as large, with its origin at a point."""
        for corner in (other.low, other.high):
            self.reach(at[0] + scale * corner[0], at[1] + scale * corner[1])
        self.definitions |= other.definitions
        moved = f"translate({number(at[0])} {number(at[1])}) scale({scale:.5g})"
        self.parts.append(f'<g transform="{moved}">{"".join(other.parts)}</g>')

    @property
    def size(self) -> tuple[float, float]:
        """Width and height in points, a small margin included."""
        width, height = self._extent
        return self.scale * width, self.scale * height

    @property
    def _extent(self) -> tuple[float, float]:
        return self.high[0] - self.low[0] + 4, self.high[1] - self.low[1] + 4

    def render(self, title: str) -> str:
        """The SVG text, with a title for those who cannot see it."""
        width, height = self.size
        box = " ".join(number(v) for v in (self.low[0] - 2, self.low[1] - 2, *self._extent))
        definitions = "".join(self.definitions[name] for name in sorted(self.definitions))
        return (
            f'<svg xmlns="http://www.w3.org/2000/svg" width="{number(width)}" height="{number(height)}"'
            f' viewBox="{box}" role="img" aria-label={quoteattr(printable(title))}>'
            f"<defs>{definitions}</defs>{''.join(self.parts)}</svg>"
        )


def _corners(at: Point, width: float, size: float, anchor: Anchor, *, upwards: bool) -> list[Point]:
    """The corners of the box around a text."""
    before = {"start": 0.0, "middle": width / 2, "end": width}[anchor]
    box = [(-before, -0.8), (width - before, -0.8), (width - before, 0.25), (-before, 0.25)]
    if upwards:
        return [(at[0] + rise * size, at[1] - run) for run, rise in box]
    return [(at[0] + run, at[1] + rise * size) for run, rise in box]
