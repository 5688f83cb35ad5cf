"""Which window of the member has points of its own, so that curves are as true close up as of the whole.

It reaches beyond what is shown, so that a step of a pan or of a zoom does not need other points.
"""

from __future__ import annotations

from app.drawing.ruler import Ruler

WHOLE = 0.7  # of the member: when more is shown, its own points do
BEYOND = 0.5  # of what is shown, on either side
COARSEST = 5.0  # times what is shown: a wider window has too few points in it


def sampled_window(ruler: Ruler, before: tuple[float, float] | None) -> tuple[float, float] | None:
    """The window (from, to in m) for what the ruler shows: the one before where that still does."""
    low, high = ruler.position(ruler.first), ruler.position(ruler.last)
    span = high - low
    if span >= WHOLE * ruler.length:
        return None
    if before and before[0] <= low and before[1] >= high and before[1] - before[0] <= COARSEST * span:
        return before
    return max(low - BEYOND * span, 0.0), min(high + BEYOND * span, ruler.length)
