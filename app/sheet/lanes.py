"""Lanes of labels beside the member: each label finds a row of its own, so that no two overlap.

Across, labels that are too wide for their segment move to further rows, and turn upright where three rows
are not enough; upright, one below the other as far as there is room. What finds no room is left out and
counted, and the figure's caption says so: the tables hold every value.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

from app.sheet.colours import INK
from app.sheet.ruler import Ruler
from app.sheet.svg import Canvas, text_width

_MOST_ROWS = 3
_GAP = 5.0


@dataclass(frozen=True, slots=True)
class Label:
    """A text at a place along the axis, in points."""

    along: float
    text: str


@dataclass(frozen=True, slots=True)
class Style:
    """How a lane's texts look."""

    size: float = 7.5
    fill: str = INK
    bold: bool = False
    italic: bool = False


@dataclass(slots=True)
class Edge:
    """How far a drawing reaches to one side of the axis; `side` is +1 or −1, `reach` in points."""

    side: int
    reach: float
    left_out: int = 0

    def at(self, further: float) -> float:
        """The signed distance from the axis that much beyond the edge."""
        return self.side * (self.reach + further)


def packed(spans: Sequence[tuple[float, float]]) -> list[int]:
    """A row for each span (low, high), given in order of their middles, so that no two in a row touch."""
    ends: list[float] = []
    rows = []
    for low, high in spans:
        row = next((index for index, end in enumerate(ends) if end <= low), len(ends))
        if row == len(ends):
            ends.append(high)
        else:
            ends[row] = high
        rows.append(row)
    return rows


def thinned(labels: Sequence[Label], gap: float) -> list[Label]:
    """The labels without those that stand closer than `gap` to the one kept before."""
    kept: list[Label] = []
    for label in labels:
        if not kept or label.along - kept[-1].along >= gap:
            kept.append(label)
    return kept


def draw_lane(canvas: Canvas, ruler: Ruler, edge: Edge, labels: Sequence[Label], style: Style) -> None:
    """Draw the labels beyond the edge and move the edge behind them."""
    if not labels:
        return
    if ruler.upright:
        _draw_column(canvas, ruler, edge, labels, style)
        return
    halves = [text_width(label.text, style.size) / 2 + _GAP / 2 for label in labels]
    spans = [(label.along - half, label.along + half) for label, half in zip(labels, halves, strict=True)]
    rows = packed(spans)
    if max(rows) < _MOST_ROWS:
        _draw_rows(canvas, ruler, edge, list(zip(labels, rows, strict=True)), style)
    else:
        _draw_turned(canvas, ruler, edge, labels, style)


def _draw_rows(
    canvas: Canvas, ruler: Ruler, edge: Edge, placed: Sequence[tuple[Label, int]], style: Style
) -> None:
    pitch = style.size + 1.5
    for label, row in placed:
        baseline = edge.at(row * pitch + 2.0 if edge.side > 0 else (row + 1) * pitch)
        canvas.text(
            ruler.point(label.along, baseline),
            label.text,
            size=style.size,
            fill=style.fill,
            bold=style.bold,
            italic=style.italic,
            backed=True,
            anchor="middle",
        )
    edge.reach += (max(row for _, row in placed) + 1) * pitch + 2.5


def _draw_turned(canvas: Canvas, ruler: Ruler, edge: Edge, labels: Sequence[Label], style: Style) -> None:
    kept = thinned(labels, style.size)
    for label in kept:
        canvas.text(
            ruler.point(label.along + 0.35 * style.size, edge.at(3.0)),
            label.text,
            size=style.size,
            fill=style.fill,
            bold=style.bold,
            italic=style.italic,
            backed=True,
            anchor="start" if edge.side > 0 else "end",
            upwards=True,
        )
    edge.reach += max(text_width(label.text, style.size) for label in kept) + 6.0
    edge.left_out += len(labels) - len(kept)


def _draw_column(canvas: Canvas, ruler: Ruler, edge: Edge, labels: Sequence[Label], style: Style) -> None:
    kept = thinned(labels, style.size)
    for label in kept:
        x, y = ruler.point(label.along, edge.at(4.0))
        canvas.text(
            (x, y + 0.35 * style.size),
            label.text,
            size=style.size,
            fill=style.fill,
            bold=style.bold,
            italic=style.italic,
            backed=True,
            anchor="start" if edge.side > 0 else "end",
        )
    edge.reach += max(text_width(label.text, style.size) for label in kept) + 8.0
    edge.left_out += len(labels) - len(kept)
