"""Round numbers of a display unit: what a drawing would say, 42.5 mm and not 42.317 mm.

A step is the largest of 1, 2 or 5 times a power of ten that is no more than 1.5 % of the number.
"""

from __future__ import annotations

import math
from collections.abc import Iterator
from fractions import Fraction
from typing import Final

from app.units import Quantity, decimal_text, unit
from solver.model import UnitSystemName

_COARSEST: Final = 0.015  # of the number itself


def round_step(number: Fraction) -> Fraction:
    """The step between round numbers about a positive number."""
    most = _COARSEST * float(number)
    power = math.floor(math.log10(most))
    digit = next(digit for digit in (5, 2, 1) if digit * 10.0**power <= most or digit == 1)
    return digit * Fraction(10) ** power


def above(value: float, quantity: Quantity, system: UnitSystemName) -> float:
    """The next round number from a positive SI value on, in SI; the value itself where it is round."""
    number = _typed(value, quantity, system)
    step = round_step(number)
    return float(math.ceil(number / step) * step * unit(quantity, system).factor)


def round_numbers(
    value: float, reach: float, quantity: Quantity, system: UnitSystemName
) -> tuple[float, ...]:
    """The round numbers beyond a positive SI value up to (or down to) `reach` times it, the nearest first."""
    factor = unit(quantity, system).factor
    number = _typed(value, quantity, system)
    last = number * Fraction(reach)
    return tuple(float(found * factor) for found in (_up(number, last) if reach > 1 else _down(number, last)))


def _typed(value: float, quantity: Quantity, system: UnitSystemName) -> Fraction:
    return Fraction(decimal_text(value, quantity, system))


def _up(number: Fraction, last: Fraction) -> Iterator[Fraction]:
    while True:
        step = round_step(number)
        number = (number // step + 1) * step
        if number > last:
            return
        yield number


def _down(number: Fraction, last: Fraction) -> Iterator[Fraction]:
    while True:
        step = round_step(number)
        number = (math.ceil(number / step) - 1) * step
        if number < last:
            return
        yield number
