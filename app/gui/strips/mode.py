"""The strip of the mode shape: made by itself, since it is hidden unless somebody wants it.

A shape has no size and no unit, and there is one only of a single state. Where there is none, the strip
says why in the place of the words that say what a shape is.
"""

from __future__ import annotations

import numpy as np

from app.gui.strips.company import PLAIN, Trace
from app.gui.strips.content import Extreme, StripContent
from app.mode_shape import shape_notes, why_no_shape
from app.numerals import reading
from app.strip_choice import kind_symbols
from app.words import tr
from solver.mode_fields import ModeCurve, mode_at, mode_curve
from solver.results import Results
from solver.sampling import Window

LEAST = 1e-9  # of the largest, which is 1: what is smaller is rounding
_DIGITS = 3
_AIR = 0.07


def mode_content(
    results: Results,
    state: int | None,
    earlier: tuple[Results, int | None] | None = None,
    other: StripContent | None = None,
    *,
    near: Window | None = None,
) -> StripContent:
    """The strip of a state; `earlier` is a reference and its state of that name; `other` has the legend."""
    shown = mode_curve(results, state, near=near)
    before = None if earlier is None or state is None else mode_curve(*earlier, near=near)
    traces, others = _traces(shown), _traces(before)
    low, high = _range(traces + others)
    return StripContent(
        kind="mode",
        title=kind_symbols()["mode"],
        unit="",
        traces=traces,
        low=low,
        high=high,
        extremes=_extremes(shown),
        filled=False,
        earlier=others,
        legend=other.legend if other else "",
        notes=shape_notes(results, state),
    )


def mode_readout(results: Results, state: int | None, x: float) -> str:
    """What the line beside the cursor says of it, and why there is none: not everybody sees the strip."""
    value = mode_at(results, state, x)
    if value is None:
        return why_no_shape(results, state)
    words = tr("{symbol} {value} (shape only)")
    return words.format(symbol=kind_symbols()["mode"], value=_text(value))


def _text(value: float) -> str:
    return reading(value if abs(value) > LEAST else 0.0, _DIGITS)


def _traces(curve: ModeCurve | None) -> tuple[Trace, ...]:
    if curve is None:
        return ()
    return (Trace(curve.x, curve.deflection, np.full(len(curve.x) - 1, PLAIN)),)


def _range(traces: tuple[Trace, ...]) -> tuple[float, float]:
    """With 0 and some air, as every strip; without a shape as if it were 1."""
    values = np.concatenate([trace.value for trace in traces]) if traces else np.ones(1)
    low, high = min(float(values.min()), 0.0), max(float(values.max()), 0.0)
    air = _AIR * (high - low)
    return (low - air if low < 0.0 else low), high + air


def _extremes(curve: ModeCurve | None) -> tuple[Extreme, ...]:
    """The largest, which is 1, and what the member bends out most to the other side."""
    if curve is None:
        return ()
    ends = (int(np.argmax(curve.deflection)), int(np.argmin(curve.deflection)))
    found = [Extreme(float(curve.x[i]), float(curve.deflection[i]), _text(curve.deflection[i])) for i in ends]
    return tuple(extreme for extreme in found if abs(extreme.value) > LEAST)
