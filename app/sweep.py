"""Running a number up and down within the text of a cell: which number, by what step, how it is written.

The text keeps everything else: unit, decimal sign, shape, the other numbers. A step is a round one that a
hand would take (350 goes by 10, 357 by 1, 12.5 by 0.1, 1 1/2 by a half), taken from the text that the sweep
began with, so that going back gives the very same text. What is valid, the caller says.
"""

from __future__ import annotations

import re
from collections.abc import Callable, Iterator
from dataclasses import dataclass
from fractions import Fraction
from typing import Final

from app.entry import MOST_CHARACTERS
from app.numerals import GROUP, MINUS

COARSE: Final = 10  # steps taken at once where larger ones are wanted
_FINEST: Final = 3  # powers of ten below its first digit that a number is still swept by
_SHAPES: Final = "dDrRaAxXøØ"  # letters that may stand right before a number

_FRACTION: Final = re.compile(r"(?:([0-9]+) +)?([0-9]+) ?/ ?([0-9]+)(?![0-9.,])")
_DECIMAL: Final = re.compile(r"([0-9]*)(?:([.,])([0-9]*))?(?:[eE][+-]?[0-9]+)?")
_START: Final = re.compile(r"[0-9]|[.,][0-9]")
_PER: Final = re.compile(r"1 ?/ ?[^\W\d_]")  # the 1 of a unit such as 1/K
_UNARY: Final = re.compile(r"(?:^|[(+\-−*/×÷→>])\s*([-−])\s*$")


@dataclass(frozen=True, slots=True)
class Number:
    """A number in a text, its sign included, from `start` to `end`; an exponent behind it stays as it is."""

    start: int
    end: int
    value: Fraction
    parts: int  # what it is counted in: 1/parts of the unit
    decimals: int | None  # None for a fraction such as 3/8
    sign: str = "."
    minus: str = "-"

    @property
    def step(self) -> Fraction:
        """The round step."""
        last, size = Fraction(1, self.parts), abs(self.value)
        if self.decimals is None or size < 20 * last:
            return last
        round_one = last
        while round_one * 10 <= size / 20 and size % (round_one * 10) == 0:
            round_one *= 10
        finest = last
        while finest * 10 ** (_FINEST + 1) <= size:
            finest *= 10
        return max(round_one, finest)

    def written(self, value: Fraction) -> str:
        """Another value in the same manner."""
        minus = self.minus if value < 0 else ""
        count = abs(value) * self.parts
        whole, rest = divmod(int(count), self.parts)
        if self.decimals is None:
            fraction = f"{rest}/{self.parts}" if rest else ""
            return minus + (" ".join(filter(None, (str(whole) if whole else "", fraction))) or "0")
        return minus + str(whole) + (f"{self.sign}{rest:0{self.decimals}d}" if self.decimals else "")


def numbers_in(text: str) -> tuple[Number, ...]:
    """The numbers that can be swept, in order; digits of a unit, as in N/mm2, are none."""
    return tuple(_numbers(text)) if len(text) <= MOST_CHARACTERS else ()


def _numbers(text: str) -> Iterator[Number]:
    place = 0
    while match := _START.search(text, place):
        number, place = _number_at(text, match.start())
        if not _belongs_to_a_word(text, match.start()) and not _PER.match(text, match.start()):
            yield number


def _belongs_to_a_word(text: str, start: int) -> bool:
    before = text[:start].rstrip("*") if text[:start].endswith("**") else text[:start]
    if before.endswith("^") or before != text[:start]:
        return True
    word = re.search(r"[^\W\d_]+$", before)
    return word is not None and not (len(word[0]) == 1 and word[0] in _SHAPES)


def _number_at(text: str, start: int) -> tuple[Number, int]:
    """The number that begins there, and where the text goes on behind it."""
    signed = _UNARY.search(text[:start])
    first, minus = (signed.start(1), signed[1]) if signed else (start, "-")
    negative = -1 if signed else 1
    fraction = _FRACTION.match(text, start)
    if fraction and _is_fraction(fraction):
        whole, over, under = (int(part or 0) for part in fraction.groups())
        value = negative * (whole + Fraction(over, under))
        return Number(first, fraction.end(), value, under, None, minus=minus), fraction.end()
    decimal = _DECIMAL.match(text, start)
    assert decimal is not None  # noqa: S101 - for the type checker: it matches nothing at least
    digits, sign, tenths = decimal[1], decimal[2] or ".", decimal[3] or ""
    end = max(decimal.end(1), decimal.end(2), decimal.end(3))
    parts = 10 ** len(tenths)
    value = negative * Fraction(int(digits + tenths), parts)
    return Number(first, end, value, parts, len(tenths), sign, minus), decimal.end()


def _is_fraction(match: re.Match[str]) -> bool:
    """A proper fraction; others are a division, whose numbers are swept one by one."""
    return int(match[2]) < int(match[3])


@dataclass(frozen=True, slots=True)
class Sweep:
    """A text and the number in it that is swept."""

    before: str
    number: Number

    def text(self, steps: int) -> str:
        """The text that many steps up (down where negative)."""
        if steps == 0:
            return self.before
        number = self.number
        swept = number.written(number.value + steps * number.step)
        return self.before[: number.start] + swept + self.before[number.end :]

    def reached(self, now: int, goal: int, valid: Callable[[str], bool]) -> int:
        """How far it goes from `now` towards `goal` through valid texts only."""
        way = 1 if goal > now else -1
        while now != goal and valid(self.text(now + way)):
            now += way
        return now


def sweep_of(text: str, at: int | None = None) -> Sweep | None:
    """The sweep of the number at a place of the text, or of its first; None where it holds none."""
    numbers = numbers_in(text)
    if not numbers:
        return None
    under = (number for number in numbers if at is not None and number.start <= at <= number.end)
    return Sweep(text, next(under, numbers[0]))


def place_in_entry(shown: str, at: int, entry: str) -> int | None:
    """Where the number at a place of a shown text stands in the cell's own text.

    What is shown may be rounded, grouped and have a joint's mark before it: numbers are counted from the end.
    """
    at -= shown[:at].count(GROUP)
    plain = re.sub("·10[⁻⁰¹²³⁴⁵⁶⁷⁸⁹]+", "", shown.replace(GROUP, "")).replace(MINUS, "-")
    found, own = numbers_in(plain), numbers_in(entry)
    here = next((i for i, number in enumerate(found) if number.start <= at <= number.end), None)
    if here is None:
        return None
    behind = len(found) - 1 - here
    return own[-1 - behind].end if behind < len(own) else None
