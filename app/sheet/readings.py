"""Numbers of a sheet as text in the project's display units: entries exact, results to a few digits.

An entry made in one unit system takes up to seventeen digits in another. Nobody computes by hand with those,
so entries of more than ten digits are rounded to nine; the attached project has them in full.
"""

from __future__ import annotations

import re
from dataclasses import dataclass

from app.numerals import laid_out
from app.units import Quantity, decimal_text, format_value, symbol
from solver.model import UnitSystemName

NOTHING = "–"
DIGITS = 5
PLAIN = 7
_MOST_DIGITS = 10
_ROUNDING = 1e-10  # of the largest value beside it: less than this is rounding and reads 0


def legible(text: str) -> str:
    """The text with each decimal number of more than ten significant digits rounded to nine."""
    return re.sub(r"\d+[.,]\d+", lambda found: _rounded(found.group()), text)


def _rounded(number: str) -> str:
    plain = number.replace(",", ".")
    digits = plain.replace(".", "").lstrip("0")
    if len(digits) <= _MOST_DIGITS:
        return number
    rounded = f"{float(plain):.9g}"
    return rounded if plain == number else rounded.replace(".", ",")


@dataclass(frozen=True, slots=True)
class Readings:
    """The words for numbers in one unit system."""

    units: UnitSystemName

    def unit(self, quantity: Quantity) -> str:
        """The unit's symbol."""
        return symbol(quantity, self.units)

    def exact(self, value: float, quantity: Quantity, *, unit: bool = False) -> str:
        """An entry to its last digit, as far as `legible` lets it."""
        text = laid_out(legible(decimal_text(float(value), quantity, self.units)))
        return f"{text} {self.unit(quantity)}".rstrip() if unit else text

    def pair(self, start: float, end: float, quantity: Quantity) -> str:
        """An entry that varies from start to end."""
        first, last = self.exact(start, quantity), self.exact(end, quantity)
        return first if first == last else f"{first} → {last}"

    def read(
        self,
        value: float,
        quantity: Quantity,
        *,
        unit: bool = False,
        digits: int = DIGITS,
        beside: float = 0.0,
    ) -> str:
        """A result; one that is nothing but rounding beside the largest of its kind reads 0."""
        shown = 0.0 if abs(value) < _ROUNDING * abs(beside) else float(value)
        return format_value(shown, quantity, self.units, digits, with_unit=unit)

    def plain(self, value: float, quantity: Quantity, *, unit: bool = False, digits: int = PLAIN) -> str:
        """A value without needless zeros: a position, or a number to compute with."""
        return format_value(float(value), quantity, self.units, digits, strip=True, with_unit=unit)
