"""The words that say which lines are which: in as few lines as fit, where they lie on no curve.

A strip upright is narrow, so that a name may need a line of its own, and what is left of a long one is cut.
Where curves leave no room in it, the words stand below.
"""

from __future__ import annotations

from collections.abc import Callable, Iterator
from itertools import chain, product
from typing import TypeAlias

import numpy as np
from PySide6.QtCore import QPointF, QRectF, QSizeF

from app.drawing.ruler import Ruler
from app.gui.sheet_layout import Axes
from app.gui.strips.company import LEGEND_BETWEEN
from app.gui.strips.content import StripContent
from app.gui.strips.paths import Scale

SizeOf: TypeAlias = Callable[[str], QSizeF]
SHARES = np.linspace(1.0, 0.0, 9).tolist()  # of the way along the strip, where the words are tried
INSET_ALONG, INSET_ACROSS = 4.0, 2.0
SHORTEST = 8  # characters that a line keeps
ON_A_LINE = 100.0  # what it costs to lie on a curve, in pixels of a fill
ON_ZERO = 1.0
BELOW = 0.5 * ON_A_LINE  # what it costs to stand off the strip
UNDER = 2.0  # px, below the strip


def legend_place(
    text: str, rect: QRectF, axes: Axes, size_of: SizeOf, cost: Callable[[QRectF], float]
) -> tuple[QRectF, str]:
    """Where the words stand and in which lines: the first place that costs nothing, else the cheapest."""
    inset = axes.point(INSET_ALONG, INSET_ACROSS)
    inner = rect.adjusted(inset.x(), inset.y(), -inset.x(), -inset.y())
    inside = ((cost(box), box, words) for words, box in _boxes(text, inner, axes, size_of))
    below = ((BELOW + cost(box), box, words) for words, box in _below(text, rect, axes, size_of))
    tried = chain(inside, below)
    best = next(tried)
    for found in tried:
        if best[0] == 0.0:
            break
        best = min(best, found, key=lambda one: one[0])
    return best[1], best[2]


def _boxes(text: str, inner: QRectF, axes: Axes, size_of: SizeOf) -> Iterator[tuple[str, QRectF]]:
    """Every wording at both edges, from one end of the strip to the other."""
    for words in _wordings(text, inner.width(), size_of):
        size = size_of(words)
        room = QSizeF(inner.width() - size.width(), inner.height() - size.height())
        for along, across in product(SHARES, (0.0, 1.0)):
            share = axes.point(along, across)
            corner = inner.topLeft() + QPointF(share.x() * room.width(), share.y() * room.height())
            yield words, QRectF(corner, size)


def _below(text: str, rect: QRectF, axes: Axes, size_of: SizeOf) -> Iterator[tuple[str, QRectF]]:
    """Upright, under the strip, or a line further down, where a value may stand; as broad as the strip."""
    if not axes.upright:
        return
    words = _wordings(text, rect.width(), size_of)[-1]
    for top in (rect.bottom() + UNDER, rect.bottom() + UNDER + size_of("0").height()):
        yield words, QRectF(QPointF(rect.left(), top), size_of(words))


def _wordings(text: str, width: float, size_of: SizeOf) -> list[str]:
    """In one line, in one for each part, the name below; else in lines that fit whatever is said."""
    parts = text.split(LEGEND_BETWEEN)
    lines = "\n".join(_cut(line, width, size_of) for part in parts for line in _lines(part, width, size_of))
    behind_colon = "\n".join(parts).replace(": ", ":\n")
    fitting = [w for w in (text, "\n".join(parts), behind_colon) if size_of(w).width() <= width]
    return list(dict.fromkeys(fitting)) or [lines]


def _lines(part: str, width: float, size_of: SizeOf) -> list[str]:
    """A part in lines of whole words."""
    lines = [""]
    for word in part.split(" "):
        longer = f"{lines[-1]} {word}".strip()
        if lines[-1] and size_of(longer).width() > width:
            lines.append(word)
        else:
            lines[-1] = longer
    return lines


def _cut(line: str, width: float, size_of: SizeOf) -> str:
    """As much of a line as the strip is wide."""
    while len(line) > SHORTEST and size_of(line).width() > width:
        line = line.rstrip("…")[:-1] + "…"
    return line


def cost_of_lines(content: StripContent, box: QRectF, ruler: Ruler, axes: Axes, scale: Scale) -> float:
    """What it costs that words in a box hide lines: curves of every kind, and that of 0."""
    low, high = axes.across_of(box)
    ends = sorted(ruler.position_at(along) for along in axes.along_of(box))
    cost = ON_ZERO if low < scale.pixel(0.0) < high else 0.0
    for trace in (*content.traces, *content.earlier, *content.singles, *content.around):
        inside = slice(*np.searchsorted(trace.x, ends).tolist())
        values = np.concatenate([trace.value[inside], np.interp(ends, trace.x, trace.value)])
        values = values[np.isfinite(values)]
        if len(values):
            reached = scale.pixels(values)
            deep = min(float(reached.max()), high + 1.0) - max(float(reached.min()), low - 1.0)
            cost += ON_A_LINE + deep if deep >= 0.0 else 0.0
    return cost
