"""Where texts of drawing and strips stand under a line across the sheet, which leaves them room."""

from __future__ import annotations

from collections.abc import Iterable

from PySide6.QtCore import QRectF

from app.drawing.shapes import Text
from app.gui.sheet_layout import Axes

Stretch = tuple[float, float]  # pixels across the axis
AIR = 2.0  # px between a text and the line


def texts_under(
    along: float | None, axes: Axes, texts: Iterable[Text], labels: Iterable[QRectF]
) -> list[Stretch]:
    """The stretches of texts that the line at the pixel `along` would run through; none without a line."""
    if along is None:
        return []
    boxes = [(text.box.left, text.box.right, text.box.top, text.box.bottom) for text in texts]
    boxes += [(rect.left(), rect.right(), rect.top(), rect.bottom()) for rect in labels]
    found = []
    for left, right, top, bottom in boxes:
        first, last, low, high = (top, bottom, left, right) if axes.upright else (left, right, top, bottom)
        if first - AIR < along < last + AIR:
            found.append((low - AIR, high + AIR))
    return found


def rest_of(whole: Stretch, gaps: Iterable[Stretch]) -> list[Stretch]:
    """What is left of a line between its gaps."""
    left, at = [], whole[0]
    for low, high in sorted(gaps):
        if low > at:
            left.append((at, min(low, whole[1])))
        at = max(at, high)
    if at < whole[1]:
        left.append((at, whole[1]))
    return [stretch for stretch in left if stretch[1] > stretch[0]]
