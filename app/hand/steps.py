"""Round steps: a number under the hand goes in steps of 1, 2 or 5 of the display unit, a few pixels each.

Everything is an exact fraction of SI and rounded once, so that a length pulled to 420 mm is the very number
that typing 420 gives.
"""

from __future__ import annotations

import math
from fractions import Fraction
from typing import Final

from app.edits.linear import exact
from app.units import Quantity, unit
from solver.model import UnitSystemName

FEW: Final = 4.0  # pixels that a step takes at least
ALIKE: Final = 1e-9  # a rate is the quotient of pixels: 0.999999999999 mm is a millimetre
MANTISSAS: Final = (1, 2, 5, 10)


def round_step(per_pixel: float, quantity: Quantity, system: UnitSystemName) -> Fraction:
    """The smallest round step (SI) that takes a few pixels, where a pixel is `per_pixel` (SI, > 0)."""
    least, factor = _in_display(FEW * per_pixel * (1.0 - ALIKE), quantity, system)
    power = _power_below(least)
    return next(m * power for m in MANTISSAS if m * power >= least) * factor


def fine_step(per_pixel: float, quantity: Quantity, system: UnitSystemName) -> Fraction:
    """The largest round step (SI) within a pixel: as fine as a hand can be without inventing digits."""
    most, factor = _in_display(per_pixel * (1.0 + ALIKE), quantity, system)
    power = _power_below(most)
    return next(m * power for m in reversed(MANTISSAS) if m * power <= most) * factor


def _in_display(value: float, quantity: Quantity, system: UnitSystemName) -> tuple[Fraction, Fraction]:
    factor = unit(quantity, system).factor
    return Fraction(value) / factor, factor


def _power_below(value: Fraction) -> Fraction:
    """The largest power of ten that is not above a positive value."""
    power = Fraction(10) ** math.floor(math.log10(value))
    while power > value:
        power /= 10
    while power * 10 <= value:
        power *= 10
    return power


def snapped(value: float, step: Fraction) -> float:
    """The multiple of the step next to a value."""
    return float(round(Fraction(value) / step) * step)


def next_step(value: float, step: Fraction, count: int) -> float:
    """`count` steps on from a value (back where negative); the first one goes to a multiple of the step."""
    place = exact(value) / step
    near = round(place)
    on_grid = float(near * step) == value
    first = near if on_grid else math.floor(place) if count > 0 else math.ceil(place)
    return float((first + count) * step)
