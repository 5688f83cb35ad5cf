"""A position under the pointer as a number that a person would type: a round one within a pixel or so."""

from __future__ import annotations

import math

from app.entry import parse_entry
from solver.model import UnitSystemName


def rounded_position(x: float, metres_per_pixel: float, system: UnitSystemName) -> float:
    """The position (m) on a round step (1, 2 or 5 of a power of ten) of the display unit, a pixel or more."""
    unit = parse_entry("1", "length", system)
    step = _round_step(metres_per_pixel / unit)
    digits = max(0, -math.floor(math.log10(step)))
    return parse_entry(f"{round(x / unit / step) * step:.{digits}f}", "length", system)


def _round_step(least: float) -> float:
    """The smallest of 1, 2, 5, 10, … of any power of ten that is not below `least`."""
    power = 10.0 ** math.floor(math.log10(least))
    return next(power * digit for digit in (1, 2, 5, 10, 20) if power * digit >= least)
