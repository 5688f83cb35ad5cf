"""Texts of a strip in pixels: title, extremes, limits and signs, placed so that none lies on another.

Plain layout: a content, its rectangle and a measure of text give labels with their boxes.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from typing import TypeAlias

import numpy as np
from PySide6.QtCore import QPointF, QRectF, QSizeF

from app.gui.fonts import Face
from app.gui.ruler import Ruler
from app.gui.sheet_layout import Axes
from app.gui.strips.content import COMPRESSION, TENSION, Extreme, StripContent, Trace
from app.gui.strips.paths import Scale, runs
from app.words import tr

Measure: TypeAlias = Callable[[str, Face], QSizeF]
EDGE = 6.0  # between a strip and its labels
SIGN_ROOM = 15.0  # a fill this wide and high carries its sign


@dataclass(frozen=True, slots=True)
class Label:
    """A text in its box; `ink` names a colour of the theme."""

    rect: QRectF
    text: str
    face: Face = "plain"
    ink: str = "ink"


def strip_labels(
    content: StripContent, rect: QRectF, ruler: Ruler, axes: Axes, measure: Measure
) -> tuple[Label, ...]:
    """All labels of a strip."""
    scale = Scale.of(content, rect, axes)
    placer = _Placer(content, rect, ruler, axes, measure, scale)
    title = placer.title()
    return (*title, *placer.extremes(title), *placer.limits(), *placer.unchecked(), *placer.signs())


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
        at = QPointF(self.rect.left(), self.rect.top() - 2.6 * size.height())
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
        labels: list[Label] = []
        first = self.rect.top()
        for extreme in extremes:
            size = self.measure(extreme.text, "small")
            right = self.rect.left() - EDGE
            top = max(self.scale.pixel(extreme.value) - 0.5 * size.height(), first)
            top = min(top, self.rect.bottom() - size.height())
            box = QRectF(QPointF(right - size.width(), top), size)
            for label in title:
                if label.rect.intersects(box):
                    box.moveTop(label.rect.bottom())
            if box.top() >= first - 0.5 and box.bottom() <= self.rect.bottom() + 0.5:
                labels.append(Label(box, extreme.text, "small", "quiet"))
                first = box.bottom()
        return labels

    def _extremes_upright(self, extremes: list[Extreme], title: list[Label]) -> list[Label]:
        labels: list[Label] = []
        first = self.rect.left()
        for extreme in extremes:
            size = self.measure(extreme.text, "small")
            left = self.scale.pixel(extreme.value) - 0.5 * size.width()
            left = min(max(left, first), self.rect.right() - size.width())
            box = QRectF(QPointF(left, title[0].rect.bottom()), size)
            if box.left() >= first - 0.5:
                labels.append(Label(box, extreme.text, "small", "quiet"))
                first = box.right() + EDGE
        return labels

    def limits(self) -> list[Label]:
        """Each allowable at the end of its line where there is room; those off the strip at its edge."""
        labels: list[Label] = []
        drawn = [(limit, False) for limit in self.content.limits if self.content.kind == "stress"]
        for limit, off in drawn + [(limit, True) for limit in self.content.beyond]:
            size = self.measure(limit.text, "small")
            span = sorted((self._shown(limit.first), self._shown(limit.last)))
            box = self._limit_box(limit.value, span[1], size, off=off)
            along = self.axes.along_of(box)
            fits = along[0] >= span[0] and self.rect.contains(box)
            if fits and not any(other.rect.intersects(box) for other in labels):
                labels.append(Label(box, limit.text, "small", "quiet"))
        return labels

    def _limit_box(self, value: float, end: float, size: QSizeF, *, off: bool) -> QRectF:
        """Beside the line, on the side of 0, at the far end of the span."""
        inward = 1.0 if self.scale.pixel(0.0) > self.scale.pixel(value) else -1.0
        low, high = self.axes.across_of(self.rect)
        line = (low if inward > 0 else high) if off else self.scale.pixel(value)
        room = size.width() if self.axes.upright else size.height()
        across = line + 2.0 if inward > 0 else line - 2.0 - room
        if self.axes.upright:
            begin = min(self._shown(self.ruler.length), self._shown(0.0))
            return QRectF(QPointF(across, max(begin, end - size.height() - 2.0)), size)
        return QRectF(QPointF(end - size.width() - 4.0, across), size)

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
                labels.append(Label(box, tr("not checked"), "small", "quiet"))
        return labels

    def signs(self) -> list[Label]:
        """+ and − in every fill that has room for them, so that colour is not alone in saying it."""
        if self.content.kind not in ("force", "stress"):
            return []
        return [label for trace in self.content.traces for label in self._signs_of(trace)]

    def _signs_of(self, trace: Trace) -> list[Label]:
        along, across = self.ruler.pixel(trace.x), self.scale.pixels(trace.value)
        zero, labels = self.scale.pixel(0.0), []
        for run in runs(trace.drawn):
            if run.drawn not in (TENSION, COMPRESSION):
                continue
            part = slice(run.first, run.last + 1)
            span = np.clip(np.sort(along[[run.first, run.last]]), *self.axes.along_of(self.rect))
            middle = 0.5 * float(span[0] + span[1])
            order = np.argsort(along[part], kind="stable")
            height = float(np.interp(middle, along[part][order], across[part][order]))
            if span[1] - span[0] >= SIGN_ROOM and abs(height - zero) >= SIGN_ROOM:
                labels.append(self._sign(run.drawn, middle, 0.5 * (height + zero)))
        return labels

    def _sign(self, drawn: int, along: float, across: float) -> Label:
        text, ink = ("+", "tension") if drawn == TENSION else ("−", "compression")
        size = self.measure(text, "mark")
        corner = self.axes.point(along, across) - QPointF(0.5 * size.width(), 0.5 * size.height())
        return Label(QRectF(corner, size), text, "mark", ink)
