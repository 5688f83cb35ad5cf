"""The sheet of paper that the parts of the drawing are put on: (along, across) pixels, rows, and the picture.

`across` is counted from the side of the loads: downward when the sheet lies across, leftward when upright.
The parts (body, supports, loads, chain) draw in these coordinates and need not know which way it is turned.
"""

from __future__ import annotations

import re
from collections.abc import Sequence
from dataclasses import dataclass, field
from functools import cached_property
from itertools import pairwise
from typing import Literal, TypeAlias

import numpy as np
from msgspec.structs import replace

from app.drawing.frame import Frame
from app.drawing.hanging import Drawn, drawn_supports
from app.drawing.member import Member
from app.drawing.placing import CLEAR, Placed, Span, Wish, place
from app.drawing.shapes import Anchor, Box, Face, Fill, Ink, Part, Picture, Point, Stroke, Target, Text

Toward: TypeAlias = Literal["low", "middle", "high"]  # the side of a row, across
ANCHORS: dict[Toward, Anchor] = {"low": "end", "middle": "middle", "high": "start"}
FAR = 1e6  # px along the axis: beyond every label
MOST_HATCHES = 400  # strokes of one wall; what is longer is far outside the sheet
BARE_ARROW = re.compile(r"(?<! )→")  # of a taper, before which a line may end
LONGEST_LINE = 13.0  # of a label upright, in widths of a digit


@dataclass(frozen=True, slots=True)
class Lane:
    """Where companions lie across the axis: their bodies, and the rows of labels beside them."""

    body: Span
    labels: tuple[Span, ...]


@dataclass(frozen=True, slots=True)
class Rows:
    """Where the parts lie across the axis: each a span (or one coordinate), from the side of the loads."""

    labels: tuple[Span, ...]  # of loads, the nearest to the member first
    brackets: tuple[Span, ...]  # over segments that are warmed, or too long or short
    band: Span  # distributed loads
    arrows: float  # joint forces
    axis: float
    half: float  # of the thickest section
    under: float  # the first level of supports that hang from joints
    under_label: tuple[Span, ...]
    contact: tuple[Span, ...]  # what stops do in the shown state; upright in the column of their labels
    marks: tuple[Span, ...]  # of joints
    lengths: tuple[Span, ...]
    chain: float
    sections: tuple[Span, ...]
    lanes: tuple[Lane, ...] = ()  # of companions, the nearest to the member first


@dataclass
class Sketch:
    """A member, its frame, the rows, and the picture so far; what follows from member and frame is kept."""

    member: Member
    frame: Frame
    rows: Rows
    zero: float  # the pixel across the axis where `across` is 0
    scale: float  # pixels per metre across the axis
    largest: float = 0.0  # distributed load that fills its row, where that is held; else the largest there is
    picture: Picture = field(default_factory=Picture)

    def take_proportions(self, other: Sketch) -> None:
        """Lie in the rows of another sketch, as large across and with loads as high as there."""
        self.rows, self.zero, self.scale = other.rows, other.zero, other.scale
        self.picture.factor = other.picture.factor
        self.largest = other.largest or other.largest_load

    @property
    def largest_load(self) -> float:
        """The largest distributed load, N/m; 0 where there is none."""
        loads = self.member.loads
        return 0.0 if loads is None else float(np.max(np.abs(loads.distributed), initial=0.0))

    @cached_property
    def window(self) -> Span:
        """The pixels along the axis that the ruler shows, growing."""
        low, high = sorted((self.frame.ruler.begin, self.frame.ruler.end))
        return low, high

    @cached_property
    def room(self) -> Span:
        """The pixels along the axis that labels may use."""
        low, high = self.frame.along
        return low + 4.0, high - 4.0

    def margin_beyond(self, joint: int) -> Span:
        """The pixels along the axis from an end joint outward to where labels end, growing."""
        end = self.along(joint)
        if abs(end - self.window[0]) < abs(end - self.window[1]):
            return self.room[0], end - 4.0
        return end + 4.0, self.room[1]

    @property
    def forward(self) -> float:
        """+1 where x grows with the pixels, −1 upright."""
        return 1.0 if self.frame.ruler.end > self.frame.ruler.begin else -1.0

    @cached_property
    def joints(self) -> tuple[float, ...]:
        """The pixels of all joints."""
        return tuple(map(self.frame.ruler.pixel, self.member.position))

    def along(self, joint: int) -> float:
        """The pixel of a joint."""
        return self.joints[joint]

    def shortest_beside(self, joint: int) -> float:
        """The length in pixels of the shorter of the segments that meet at a joint."""
        return self._shortest[joint]

    @cached_property
    def _shortest(self) -> tuple[float, ...]:
        widths = [abs(last - first) for first, last in pairwise(self.joints)]
        return tuple(map(min, [widths[0], *widths], [*widths, widths[-1]]))

    def holds(self, joint: int) -> bool:
        """Whether a joint is inside the window."""
        low, high = self._held
        return low <= self.joints[joint] <= high

    @cached_property
    def _held(self) -> Span:
        return self.frame.ruler.held_pixels

    @cached_property
    def supports(self) -> tuple[Drawn, ...]:
        """All supports along the chain, each with its place."""
        return drawn_supports(self.member.project)

    @cached_property
    def levels(self) -> int:
        """How many levels the supports that hang take together; 0 where none does."""
        return max((one.level + 1 for one in self.supports if one.hangs), default=0)

    def is_lowest(self, one: Drawn) -> bool:
        """Whether no support of the same joint hangs below this one."""
        return all(other.level <= one.level for other in self.supports if other.joint == one.joint)

    def shown_span(self, segment: int) -> Span | None:
        """The pixels of a segment inside the window, growing; None where it is outside."""
        return self._spans[segment]

    @cached_property
    def _spans(self) -> tuple[Span | None, ...]:
        spans = []
        for ends in pairwise(self.joints):
            low, high = max(min(ends), self.window[0]), min(max(ends), self.window[1])
            spans.append((low, high) if high - low > 0.5 else None)
        return tuple(spans)

    def point(self, along: float, across: float) -> Point:
        """The point (x, y)."""
        turned = self.zero - across if self.frame.upright else self.zero + across
        return (turned, along) if self.frame.upright else (along, turned)

    def box(self, along: Span, across: Span) -> Box:
        """The box between two corners (along, across)."""
        (a, b), (c, d), zero = along, across, self.zero
        a, b = (a, b) if a <= b else (b, a)
        if self.frame.upright:
            c, d = zero - c, zero - d
            return Box(c, a, d, b) if c <= d else Box(d, a, c, b)
        c, d = zero + c, zero + d
        return Box(a, c, b, d) if c <= d else Box(a, d, b, c)

    def extents(self, text: str, face: Face = "small") -> tuple[float, float]:
        """How much of (along, across) a text takes; texts are never turned."""
        width, height = self.frame.measure(text, face)
        return (height, width) if self.frame.upright else (width, height)

    def line(
        self,
        *points: tuple[float, float],
        ink: Ink = "ink",
        width: float = 1.0,
        fill: Fill = "",
        closed: bool = False,
        dash: tuple[float, ...] = (),
        part: Part | None = None,
        clip: bool = False,
    ) -> None:
        """A stroke through points (along, across)."""
        turned = self.points(points)
        self.picture.strokes.append(Stroke(turned, ink, width, closed, fill, dash, part, clip))

    def lines(
        self,
        points: Sequence[tuple[float, float]],
        *,
        width: float = 1.0,
        part: Part | None = None,
        clip: bool = False,
    ) -> None:
        """Many short strokes as one, from every first of two points (along, across) to the second."""
        if points:
            turned = self.points(points)
            self.picture.strokes.append(Stroke(turned, width=width, part=part, clip=clip, pairs=True))

    def points(self, places: Sequence[tuple[float, float]]) -> tuple[Point, ...]:
        """The points (x, y) of many (along, across)."""
        zero = self.zero
        if self.frame.upright:
            return tuple([(zero - across, along) for along, across in places])
        return tuple([(along, zero + across) for along, across in places])

    def hatch(self, along: Span, across: Span, step: tuple[float, float]) -> None:
        """Short slanted strokes along a line from one end to the other: ground that does not move."""
        length = max(abs(along[1] - along[0]), abs(across[1] - across[0]))
        count = min(max(int(length / 6.0), 2), MOST_HATCHES)
        points = []
        for i in range(count + 1):
            a = along[0] + (along[1] - along[0]) * i / count
            c = across[0] + (across[1] - across[0]) * i / count
            points += [self.point(a, c), self.point(a + step[0], c + step[1])]
        self.picture.strokes.append(Stroke(tuple(points), clip=False, pairs=True))

    def wish(
        self, text: str, along: float, part: Part, *, face: Face = "small", rank: int = 0, slide: float = 0.0
    ) -> Wish:
        """A label that wants a place; upright a long one takes several lines."""
        if self.frame.upright:
            text = self.in_even_lines(text, face, LONGEST_LINE * self.frame.measure("0", face)[0])
        extent, depth = self.extents(text, face)
        return Wish(text, along, extent, depth, part, rank, slide, face)

    def narrowed(self, wish: Wish, widest: float) -> Wish:
        """The label in more lines where it is too wide for its column (upright) and has where to break."""
        if not self.frame.upright or wish.depth <= widest:
            return wish
        words = BARE_ARROW.sub(" →", wish.text.replace("\n", " "))
        text = self.in_even_lines(words, wish.face, widest)
        extent, depth = self.extents(text, wish.face)
        return replace(wish, text=text, extent=extent, depth=depth)

    def in_lines(self, text: str, face: Face, widest: float) -> str:
        """The text with line breaks at spaces, so that it stays within a width."""
        lines = [""]
        for word in text.split(" "):
            longer = f"{lines[-1]} {word}".strip()
            if lines[-1] and self.frame.measure(longer, face)[0] > widest:
                lines.append(word)
            else:
                lines[-1] = longer
        return "\n".join(lines)

    def in_even_lines(self, text: str, face: Face, widest: float) -> str:
        """As few lines as a width allows, none much longer than the others: no unit is left alone."""
        found = narrower = self.in_lines(text, face, widest)
        if "\n" not in found:
            return found
        while narrower.count("\n") == found.count("\n"):
            found = narrower
            narrower = self.in_lines(text, face, self.frame.measure(found, face)[0] - 1.0)
            if narrower == found:
                break
        return found

    def placed(self, wishes: list[Wish], rows: tuple[Span, ...], clear: float = CLEAR) -> list[Placed]:
        """Places for labels in rows; those wider than a row (upright) are dropped like those without room."""
        widest = max((high - low for low, high in rows), default=0.0) + 0.5
        fitting = [w for wish in wishes if (w := self.narrowed(wish, widest)).depth <= widest]
        found = place(fitting, len(rows), self.room, clear)
        self.picture.left_out += len(wishes) - len(found)
        return found

    def put(self, wishes: list[Wish], rows: tuple[Span, ...], toward: Toward, clear: float = CLEAR) -> None:
        """Place labels in rows and write them small and quiet, on the side of the row that is named."""
        for label in self.placed(wishes, rows, clear):
            self.text(label.wish, label.span, rows[label.row], toward)

    def text(
        self,
        wish: Wish,
        along: Span,
        across: Span,
        toward: Toward = "middle",
        face: Face = "small",
        ink: Ink = "quiet",
    ) -> None:
        """A text in a box of exactly its size within the given spans."""
        self.picture.texts.append(self.text_at(wish, along, across, toward, face, ink))

    def text_at(
        self, wish: Wish, along: Span, across: Span, toward: Toward, face: Face = "small", ink: Ink = "quiet"
    ) -> Text:
        """That text, not put on the picture."""
        box = self._box(wish, along, across, toward, face)
        anchor = ANCHORS[toward] if self.frame.upright else "middle"
        return Text(box, wish.text, face, ink, wish.part, anchor)

    def is_free(
        self, wish: Wish, along: Span, across: Span, toward: Toward, others: list[Box] | None = None
    ) -> bool:
        """Whether a label would meet none that stands outside the rows, such as that of an end force.

        `others` are the boxes of those, where they are known; else all texts so far.
        """
        box = self._box(wish, along, across, toward, "small")
        standing = [text.box for text in self.picture.texts] if others is None else others
        return not any(other.meets(box) for other in standing)

    def texts_in(self, rows: tuple[Span, ...]) -> list[Box]:
        """The boxes of the texts so far that reach into any of these rows."""
        low, high = min(row[0] for row in rows), max(row[1] for row in rows)
        room = self.box((-FAR, FAR), (low, high))
        return [text.box for text in self.picture.texts if text.box.meets(room)]

    def _box(self, wish: Wish, along: Span, across: Span, toward: Toward, face: Face) -> Box:
        spare = across[1] - across[0] - wish.depth
        first = across[0] + {"low": 0.0, "middle": 0.5, "high": 1.0}[toward] * spare
        centre = self.box(along, (first, first + wish.depth)).centre
        return Box.around(centre, *self.frame.measure(wish.text, face))

    def target(self, along: Span, across: Span, part: Part) -> None:
        """Where a part can be pointed at."""
        self.picture.targets.append(Target(self.box(along, across), part))
