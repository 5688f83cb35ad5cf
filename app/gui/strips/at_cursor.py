"""The values at the cursor for the strips that are shown, and the state drawn nearest to the pointer."""

from __future__ import annotations

from PySide6.QtCore import QPointF, QRectF

from app.drawing.ruler import Ruler
from app.gui.sheet_layout import Axes
from app.gui.strips.mode import mode_readout
from app.gui.strips.readout import BETWEEN, envelope_readout, nearest_state, state_readout
from app.gui.strips.strip import Strip
from app.strip_choice import StripChoice
from app.words import tr
from solver.results import Results

BESIDE = 6.0  # pixels that the pointer may be from the cursor, which takes joints


def values_at(results: Results, state: int | None, x: float, choice: StripChoice, *, current: bool) -> str:
    """The line beside the cursor, of the envelope where `state` is None."""
    x = min(max(x, 0.0), float(results.position[-1]))
    text = envelope_readout(results, x) if state is None else state_readout(results, state, x)
    if "mode" in choice.shown:
        text = BETWEEN.join(part for part in (text, mode_readout(results, state, x)) if part)
    return text if current else tr("{values}  (out of date)").format(values=text)


def nearest_to(
    point: QPointF, strips: tuple[Strip, ...], results: Results, x: float, ruler: Ruler, axes: Axes
) -> str:
    """The state drawn nearest to the pointer, where it is on a strip of an envelope and at the cursor."""
    strip = next((s for s in strips if s.place and s.place.rect.contains(point)), None)
    if strip is None or strip.scale is None or strip.content is None or not strip.content.traces:
        return ""
    if abs(axes.along(point) - ruler.pixel(x)) > BESIDE:  # keys have moved the cursor
        return ""
    across = axes.across_of(QRectF(point, point))[0]
    return nearest_state(results, strip.content.kind, x, strip.scale.value(across))
