"""Texts of a strip in pixels: title, extremes, limits and signs, placed so that none lies on another.

Plain layout: a content, its rectangle and a measure of text give labels with their boxes.
"""

from __future__ import annotations

from collections.abc import Callable, Iterator, Sequence
from dataclasses import dataclass
from itertools import pairwise, product
from typing import TypeAlias

import numpy as np
from msgspec import Struct
from msgspec.structs import replace
from PySide6.QtCore import QPointF, QRectF, QSizeF

from app.drawing.ruler import Ruler
from app.gui.fonts import Face
from app.gui.sheet_layout import GAP, Axes
from app.gui.strips.company import COMPRESSION, NONE, TENSION, Trace
from app.gui.strips.content import Extreme, Limit, StripContent
from app.gui.strips.legend import ON_ZERO, cost_of_lines, legend_place
from app.gui.strips.paths import Scale, stretches
from app.words import tr
from solver.arrays import BoolArray

Measure: TypeAlias = Callable[[str, Face], QSizeF]
EDGE = 6.0  # between a strip and its labels
BELOW = 0.8 * GAP  # how far a value beside a strip may reach below it
OVER_EDGE = 0.4 * GAP  # how far the label of a limit may reach over the edge of the strip
SHARES = (1.0, 0.0, 0.5, 0.75, 0.25)  # of the way along a limit, where its label is tried
DIAMOND = 4.0  # half a mark of a single place, px
HARDLY = 2  # pixels of a curve that a label may cover
NEAR = 0.5  # of a limit: nearer than this its label may cover a curve
SIGN_ROOM = 15.0  # a fill this wide and high carries its sign


class Label(Struct, frozen=True, gc=False):
    """A text in its box; `ink` and `ground` name colours of the theme."""

    rect: QRectF
    text: str
    face: Face = "plain"
    ink: str = "ink"
    ground: str = ""  # none where empty


def strip_labels(
    content: StripContent, rect: QRectF, ruler: Ruler, axes: Axes, measure: Measure
) -> tuple[Label, ...]:
    """All labels of a strip."""
    scale = Scale.of(content, rect, axes)
    placer = _Placer(content, rect, ruler, axes, measure, scale)
    title = placer.title()
    standing = [*title, *placer.extremes(title), *placer.limits(), *placer.unchecked()]
    standing += placer.marks(standing)
    standing += placer.legend(standing)
    standing += placer.note(standing)
    return (*standing, *(sign for sign in placer.signs() if not _meets(sign.rect, standing)))


def _meets(box: QRectF, labels: Sequence[Label]) -> bool:
    """Whether a box lies on any of the labels."""
    return any(label.rect.intersects(box) for label in labels)


def _widest_between(zero: float, outer: float, *inner: float) -> tuple[float, float]:
    """The widest of the parts into which `inner` divides what lies between 0 and a curve, growing."""
    low, high = min(zero, outer), max(zero, outer)
    corners = [low, *sorted(at for at in inner if low < at < high), high]
    return max(pairwise(corners), key=lambda span: span[1] - span[0])


def spread(wanted: list[float], sizes: list[float], first: float, last: float) -> list[float]:
    """Places in growing order, as near to the wanted ones as they can be without overlap in first…last.

    Fewer than were wanted where there is not room for all.
    """
    while wanted and sum(sizes) > last - first + 0.5:
        wanted, sizes = wanted[:-1], sizes[:-1]
    places, at = [], first
    for want, size in zip(wanted, sizes, strict=True):
        places.append(max(want, at))
        at = places[-1] + size
    at = last
    for index in range(len(places) - 1, -1, -1):
        places[index] = min(places[index], at - sizes[index])
        at = places[index]
    return places


@dataclass(frozen=True, slots=True)
class _Placer:
    content: StripContent
    rect: QRectF
    ruler: Ruler
    axes: Axes
    measure: Measure
    scale: Scale

    def title(self) -> list[Label]:
        """Symbol and unit: left of the strip, or above it upright."""
        size = self.measure(self.content.title, "strong")
        left = min(
            self.rect.left(), self.rect.right() + GAP - size.width()
        )  # beyond the last one is the edge
        at = QPointF(left, self.rect.top() - 2.6 * size.height())
        if not self.axes.upright:
            at = QPointF(EDGE, self.rect.top())
        title = Label(QRectF(at, size), self.content.title, "strong")
        if not self.content.unit:
            return [title]
        unit_size = self.measure(self.content.unit, "small")
        corner = QPointF(title.rect.right() + 4.0, title.rect.bottom() - unit_size.height())
        return [title, Label(QRectF(corner, unit_size), self.content.unit, "small", "quiet")]

    def extremes(self, title: list[Label]) -> list[Label]:
        """The largest and the smallest value, at their heights, kept off each other and off the title."""
        extremes = sorted(self.content.extremes, key=lambda e: self.scale.pixel(e.value))
        place = self._extremes_upright if self.axes.upright else self._extremes_across
        return place(extremes, title)

    def _extremes_across(self, extremes: list[Extreme], title: list[Label]) -> list[Label]:
        sizes = [self.measure(e.text, "small") for e in extremes]
        wanted = [self.scale.pixel(e.value) - 0.5 * s.height() for e, s in zip(extremes, sizes, strict=True)]
        right = self.rect.left() - EDGE
        widest = max((s.width() for s in sizes), default=0.0)
        beside = right - widest > title[-1].rect.right() + 2.0
        first = self.rect.top() if beside else title[0].rect.bottom()
        tops = spread(wanted, [s.height() for s in sizes], first, self.rect.bottom() + BELOW)
        return [
            Label(QRectF(QPointF(right - size.width(), top), size), extreme.text, "small", "quiet")
            for extreme, size, top in zip(extremes, sizes, tops, strict=False)
        ]

    def _extremes_upright(self, extremes: list[Extreme], title: list[Label]) -> list[Label]:
        sizes = [self.measure(e.text, "small") for e in extremes]
        wanted = [self.scale.pixel(e.value) - 0.5 * s.width() for e, s in zip(extremes, sizes, strict=True)]
        room = [s.width() + EDGE for s in sizes]
        last = self.rect.right() + EDGE
        if sum(room) > last - self.rect.left() + 0.5:  # the smaller value below the strip
            order = sorted(range(len(extremes)), key=lambda i: -abs(extremes[i].value))
            lefts = {i: spread([wanted[i]], [room[i]], self.rect.left(), last) for i in order}
            tops = {order[0]: title[0].rect.bottom()} | dict.fromkeys(order[1:], self.rect.bottom() + 2.0)
            found = [(i, QPointF(lefts[i][0], tops[i])) for i in order if lefts[i]]
        else:
            lefts_of_all = spread(wanted, room, self.rect.left(), last)
            found = [(i, QPointF(left, title[0].rect.bottom())) for i, left in enumerate(lefts_of_all)]
        return [Label(QRectF(corner, sizes[i]), extremes[i].text, "small", "quiet") for i, corner in found]

    def limits(self) -> list[Label]:
        """Each allowable along its line, in short where room is little; those off the strip at its edge."""
        drawn = [(limit, False) for limit in self.content.limits if self.content.kind == "stress"]
        labels: list[Label] = []
        for limit, off in drawn + [(limit, True) for limit in self.content.beyond]:
            box, covered = self._least_covering(limit, labels, off=off)
            if box is not None and (not covered or off or self._is_near(limit)):
                labels.append(replace(box, ink="ink") if covered else box)
        return labels

    def _least_covering(self, limit: Limit, taken: list[Label], *, off: bool) -> tuple[Label | None, float]:
        """The first place of a label that covers no curve, else the one that covers least, and how much.


        Off the strip the words stay whole, as there is no line to say what the number is.
        """
        best: Label | None = None
        least = np.inf
        for box in self._limit_boxes(limit, off=off):
            if _meets(box.rect, taken) or (off and best is not None and box.text != best.text):
                continue
            covered = self._covered(box.rect)
            if covered < least:
                best, least = box, covered
            if not covered:
                break
        return best, least

    def _is_near(self, limit: Limit) -> bool:
        """Whether a curve comes so near to a limit that its number matters more than what it covers."""
        shares = [
            trace.value[(trace.x > limit.first) & (trace.x < limit.last)] / limit.value
            for trace in self.content.traces
        ]
        return max(float(share.max(initial=0.0)) for share in shares) >= NEAR

    def _limit_boxes(self, limit: Limit, *, off: bool) -> Iterator[Label]:
        """Where the label could stand: at the ends or between, on either side of the line, long or short."""
        low, high = sorted((self._shown(limit.first), self._shown(limit.last)))
        line = self.scale.pixel(limit.value)
        inward = 1.0 if self.scale.pixel(0.0) > line else -1.0
        edges = self.axes.across_of(self.rect)
        if off:
            line = edges[0] if inward > 0 else edges[1]
        for words in limit.texts:
            text = f"{self._outward(inward)} {words}" if off else words
            size = self.measure(text, "small")
            extent, depth = (size.width(), size.height())[:: -1 if self.axes.upright else 1]
            starts = [low + 4.0 + share * (high - low - extent - 8.0) for share in SHARES]
            for side, first in product((inward, -inward), starts):
                top = line + 2.0 if side > 0 else line - 2.0 - depth
                within = edges[0] - OVER_EDGE <= top and top + depth <= edges[1] + OVER_EDGE
                if first >= low and first + extent <= high and within:
                    box = self.axes.rect((first, first + extent), (top, top + depth))
                    yield Label(box, text, "small", "quiet", "band_fill" if side == inward else "card")

    def _outward(self, inward: float) -> str:
        """The small mark of a limit that lies off the strip: an arrow that points there."""
        return ("←→" if self.axes.upright else "↑↓")[0 if inward > 0 else 1]

    def _covered(self, box: QRectF) -> float:
        """How deep a box lies on a curve or on the fill between a curve and 0, in pixels across the axis."""
        ends = sorted(self.ruler.position_at(along) for along in self.axes.along_of(box))
        across, zero, deepest = self.axes.across_of(box), self.scale.pixel(0.0), 0.0
        for trace in self.content.traces:
            inside = slice(*np.searchsorted(trace.x, ends).tolist())
            values = np.concatenate([trace.value[inside], np.interp(ends, trace.x, trace.value)])
            reached = [*self.scale.pixels(values), zero]
            overlap = min(np.nanmax(reached), across[1]) - max(np.nanmin(reached), across[0])
            deepest = max(deepest, float(overlap))
        return deepest if deepest > HARDLY else 0.0

    def marks(self, standing: list[Label]) -> list[Label]:
        """The words beside the diamonds of single places, as many as have room, the worst first."""
        found: list[Label] = []
        shown = [mark for mark in self.content.marks if self.ruler.holds(mark.x)]
        places = [self.axes.point(self.ruler.pixel(mark.x), self.scale.pixel(mark.value)) for mark in shown]
        half = QPointF(DIAMOND, DIAMOND)
        diamonds = [Label(QRectF(at - half, at + half), "") for at in places]
        for mark, at in zip(shown, places, strict=True):
            size = self.measure(mark.text, "small")
            corners = (
                QPointF(DIAMOND + 3.0, -0.5 * size.height()),
                QPointF(-DIAMOND - 3.0 - size.width(), -0.5 * size.height()),
                QPointF(-0.5 * size.width(), DIAMOND + 2.0),
                QPointF(-0.5 * size.width(), -DIAMOND - 2.0 - size.height()),
                QPointF(-size.width(), DIAMOND + 2.0),
                QPointF(-size.width(), -DIAMOND - 2.0 - size.height()),
            )
            boxes = (QRectF(at + corner, size) for corner in corners)
            taken = [*standing, *diamonds, *found]
            box = next((b for b in boxes if self._is_inside(b) and not _meets(b, taken)), None)
            if box is not None:
                found.append(Label(box, mark.text, "small", "over" if mark.over else "ink", "card"))
        return found

    def _is_inside(self, box: QRectF) -> bool:
        return self.rect.adjusted(0.0, -OVER_EDGE, 0.0, OVER_EDGE).contains(box)

    def legend(self, standing: list[Label]) -> list[Label]:
        """What the dashed, dotted and thin lines are, where it hides least."""
        if not self.content.legend:
            return []
        return [self._quiet(self.content.legend, standing)[0]]

    def note(self, standing: list[Label]) -> list[Label]:
        """What is to know of the strip: as many words as fit beside the curves, else the fewest."""
        found = [self._quiet(words, standing) for words in self.content.notes]
        roomy = [label for label, cost in found if cost <= ON_ZERO and self.rect.contains(label.rect)]
        return [next(iter(roomy), found[-1][0])] if found else []

    def _quiet(self, said: str, standing: list[Label]) -> tuple[Label, float]:
        """Words where they hide least, and what they cost there."""

        def cost(box: QRectF) -> float:
            if _meets(box, standing):
                return np.inf
            if not box.intersects(self.rect):  # below
                return 0.0
            fill = self._covered(box) if self.content.filled else 0.0
            return fill + cost_of_lines(self.content, box, self.ruler, self.axes, self.scale)

        box, words = legend_place(
            said, self.rect, self.axes, lambda words: self.measure(words, "small"), cost
        )
        return Label(box, words, "small", "quiet", "card"), cost(box)

    def _shown(self, x: float) -> float:
        """The pixel of a position, kept within the strip."""
        low, high = self.axes.along_of(self.rect)
        return min(max(self.ruler.pixel(x), low), high)

    def unchecked(self) -> list[Label]:
        """Says in words that a stretch has no check."""
        labels = []
        size = self.measure(tr("not checked"), "small")
        for first, last in self.content.unchecked:
            span = self._shown(first), self._shown(last)
            middle = self.axes.rect(span, self.axes.across_of(self.rect)).center()
            box = QRectF(middle - QPointF(0.5 * size.width(), 0.5 * size.height()), size)
            if self.axes.along_of(box)[0] >= min(span) and self.axes.along_of(box)[1] <= max(span):
                labels.append(Label(box, tr("not checked"), "small"))
        return labels

    def signs(self) -> list[Label]:
        """+ and − in every fill that has room for them, so that colour is not alone in saying it."""
        if self.content.kind not in ("force", "stress"):
            return []
        plus = self._signs_of(self.content.traces[0], TENSION)
        return plus + self._signs_of(self.content.traces[-1], COMPRESSION)

    def _signs_of(self, trace: Trace, drawn: int) -> list[Label]:
        """Of the largest values the + , of the smallest the − (the same curve, except of an envelope)."""
        chosen = trace.drawn == drawn
        middles = self._middles(trace, chosen)
        if not middles:  # many short segments: once for each stretch, across the jumps between them
            chosen = chosen | ((trace.drawn == NONE) & (np.diff(trace.x) == 0.0))
            middles = self._middles(trace, chosen)
        signs = zip(middles, self._sign_spans(trace, middles), strict=True)
        return [
            self._sign(drawn, a, 0.5 * (low + high)) for a, (low, high) in signs if high - low >= SIGN_ROOM
        ]

    def _middles(self, trace: Trace, chosen: BoolArray) -> list[float]:
        """The pixels along the axis in the middle of the runs of chosen intervals that are wide enough."""
        low, high = self.axes.along_of(self.rect)
        first, last = (np.clip(self.ruler.pixel(trace.x[at]), low, high) for at in stretches(chosen))
        wide = np.abs(last - first) >= SIGN_ROOM
        middles: list[float] = (0.5 * (first + last))[wide].tolist()
        return middles

    def _sign_spans(self, trace: Trace, along: list[float]) -> list[tuple[float, float]]:
        """Between 0 and the curve; where the other curve of an envelope runs between them, the wider part."""
        x, zero = [self.ruler.position_at(a) for a in along], self.scale.pixel(0.0)
        outer = self._across_at(x, trace)
        others = [self._across_at(x, other) for other in self.content.traces if other is not trace]
        return [_widest_between(zero, *at) for at in zip(outer, *others, strict=True)]

    def _across_at(self, x: list[float], trace: Trace) -> list[float]:
        """The pixels across the axis of a curve at positions that are no joints."""
        return self.scale.pixels(np.interp(x, trace.x, trace.value)).tolist()

    def _sign(self, drawn: int, along: float, across: float) -> Label:
        text, ink = ("+", "tension") if drawn == TENSION else ("−", "compression")
        size = self.measure(text, "mark")
        corner = self.axes.point(along, across) - QPointF(0.5 * size.width(), 0.5 * size.height())
        return Label(QRectF(corner, size), text, "mark", ink)
