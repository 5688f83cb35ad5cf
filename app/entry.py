"""A typed number: a small grammar of our own for the number, the rest of the text is the unit's name.

    entry  := sum [unit]            sum    := product {(+ | -) product}
    product:= factor {(* | /) factor}    factor := [+ | -] (number | mixed | '(' sum ')')

One "." or "," is the decimal sign and nothing groups thousands, so "1.500" is 1.5 in every language. pint's
own reader of numbers was rejected: it takes "25,5" for 255 and "1 1/2 in" for half an inch. Everything is an
exact fraction until the end, where it is rounded once to the nearest double. There are no powers and names,
and length, depth and exponents are bounded, so no text takes long.
"""

from __future__ import annotations

import re
from fractions import Fraction
from typing import Final

from app.numerals import localised
from app.phrases.entries import EntryRule, entry_sentence
from app.unit_names import UnknownUnitError, nearest_unit, unit_factor
from app.units import Quantity, decimal_text, symbol, unit
from solver.model import UnitSystemName

MOST_CHARACTERS: Final = 300
_MOST_DEPTH: Final = 20
_MOST_POWER: Final = 400

_SIGNS: Final = str.maketrans({"−": "-", "×": "*", "÷": "/", "\u00a0": " ", "\t": " "})
_NUMBER: Final = re.compile(r"(?:[0-9]+[.,]?[0-9]*|[.,][0-9]+)(?:[eE][+-]?[0-9]+)?")
_MIXED: Final = re.compile(r"([0-9]+) +([0-9]+) ?/ ?([0-9]+)(?![0-9.,])")
_UNIT_START: Final = re.compile(r"(?:1? ?/ ?)?[^\W\d_]|(?:1? ?/ ?)?°|[%‰\"″]")
_EXAMPLES: Final[dict[Quantity, float]] = {"modulus": 2.1e11, "stress": 1.6e8, "force": 25e3, "length": 0.35}


class EntryError(ValueError):
    """The text cannot be read as what is wanted; `sentence` says why, in the user's language."""

    def __init__(self, sentence: str) -> None:
        super().__init__(sentence)
        self.sentence = sentence


def refusal(rule: EntryRule, **facts: object) -> EntryError:
    """The error for a rule of `app.phrases.entries` and its facts."""
    return EntryError(entry_sentence(rule, facts))


def parse_entry(text: str, quantity: Quantity, system: UnitSystemName) -> float:
    """The SI value of a typed number; without a unit the display unit of the system is meant.

    Always finite. Raises EntryError.
    """
    return nearest_double(parse_exact(text, quantity, system))


def parse_exact(text: str, quantity: Quantity, system: UnitSystemName) -> Fraction:
    """Like `parse_entry`, before rounding."""
    number, unit_text = read_number(text, quantity, system)
    factor = factor_of(unit_text, quantity, system) if unit_text else unit(quantity, system).factor
    return number * factor


def read_number(text: str, quantity: Quantity, system: UnitSystemName) -> tuple[Fraction, str]:
    """The number and the text of the unit (empty where there is none), not yet put together."""
    if len(text) > MOST_CHARACTERS:
        raise refusal("too_long", length=len(text), most=MOST_CHARACTERS)
    reader = _Reader(text.translate(_SIGNS).strip(), _example(quantity, system))
    number = reader.sum()
    return number, reader.unit()


def factor_of(unit_text: str, quantity: Quantity, system: UnitSystemName) -> Fraction:
    """The exact factor of a typed unit; EntryError with the nearest spelling where it is not one."""
    try:
        return unit_factor(unit_text, quantity)
    except UnknownUnitError:
        pass
    if not symbol(quantity, system):
        raise refusal("no_unit", found=unit_text)
    nearest = nearest_unit(unit_text, quantity)
    if nearest:
        raise refusal("near_unit", found=unit_text, nearest=nearest)
    raise refusal("unknown_unit", found=unit_text, example=symbol(quantity, system))


def nearest_double(exact: Fraction) -> float:
    """The double nearest to an exact number; EntryError beyond the largest and for what would vanish."""
    try:
        value = float(exact)
    except OverflowError:
        raise refusal("too_large") from None
    if exact and not value:
        raise refusal("too_small")
    return value


def _example(quantity: Quantity, system: UnitSystemName) -> str:
    """A number of the usual size, as it would be typed."""
    value = _EXAMPLES.get(quantity)
    number = "25" if value is None else localised(f"{float(decimal_text(value, quantity, system)):.4g}")
    return f"{number} {symbol(quantity, system)}".strip()


class _Reader:
    """Reads one text from left to right; `position` is where it stands, gaps before it skipped."""

    def __init__(self, text: str, example: str) -> None:
        self.text = text
        self.example = example
        self.position = 0
        self.depth = 0
        if not text:
            raise refusal("empty", example=example)

    def sum(self) -> Fraction:
        """Terms added and taken away."""
        total = self._product()
        while sign := self._take("+-"):
            term = self._product()
            total += term if sign == "+" else -term
        return total

    def unit(self) -> str:
        """What is left of the text: a unit's name or nothing."""
        rest = self.text[self.position :].strip()
        if not rest or _UNIT_START.match(rest):
            return rest
        if rest[0] == ")":
            raise refusal("bracket_stray")
        if _NUMBER.match(rest):
            self._refuse_second_number(rest)
        raise refusal("not_a_number", found=_short(self.text), example=self.example)

    def _refuse_second_number(self, rest: str) -> None:
        """A number right behind a number: a second decimal sign, or thousands set apart."""
        if rest[0] in ".," and self.text[self.position - 1] != " ":
            raise refusal("two_decimal_signs", found=_short(self.text))
        raise refusal("two_numbers", found=_short(rest))

    def _product(self) -> Fraction:
        product = self._factor()
        while sign := self._take("*/"):
            factor = self._factor()
            if sign == "/" and factor == 0:
                raise refusal("zero_divisor")
            product = product * factor if sign == "*" else product / factor
        return product

    def _factor(self) -> Fraction:
        if self._take("-"):
            return -self._atom()
        self._take("+")
        return self._atom()

    def _atom(self) -> Fraction:
        if self._take("("):
            return self._bracket()
        if mixed := self._match(_MIXED):
            return self._mixed(*map(int, mixed.groups()))
        if number := self._match(_NUMBER):
            return _exact(number.group())
        rest = self.text[self.position :].strip()
        if rest and rest[0] in "+-*/)" and self.position:
            raise refusal("number_missing", found=rest[0])
        raise refusal("not_a_number", found=_short(rest or self.text), example=self.example)

    def _bracket(self) -> Fraction:
        self.depth += 1
        if self.depth > _MOST_DEPTH:
            raise refusal("too_deep", most=_MOST_DEPTH)
        total = self.sum()
        if not self._take(")"):
            self._refuse_open_bracket()
        self.depth -= 1
        return total

    def _refuse_open_bracket(self) -> None:
        """Say why a bracket does not close where it should."""
        rest = self.text[self.position :].strip()
        if rest and _NUMBER.match(rest):
            self._refuse_second_number(rest)
        raise refusal("bracket_open")

    @staticmethod
    def _mixed(whole: int, over: int, under: int) -> Fraction:
        """1 1/2; a gap before an improper fraction is more likely a slip than a sum."""
        if over >= under:
            raise refusal("two_numbers", found=f"{over}/{under}")
        return whole + Fraction(over, under)

    def _match(self, pattern: re.Pattern[str]) -> re.Match[str] | None:
        """Take what the pattern matches here."""
        self._skip_gap()
        match = pattern.match(self.text, self.position)
        if match:
            self.position = match.end()
        return match

    def _take(self, signs: str) -> str:
        """Take one of the signs if it stands here, except a / that begins a unit ("12e-6 /K")."""
        self._skip_gap()
        sign = self.text[self.position : self.position + 1]
        if not sign or sign not in signs or (sign == "/" and _UNIT_START.match(self.text, self.position)):
            return ""
        self.position += 1
        return sign

    def _skip_gap(self) -> None:
        while self.text[self.position : self.position + 1] == " ":
            self.position += 1


def _exact(number: str) -> Fraction:
    """A plain number as a fraction; its power of ten is bounded before it is raised."""
    mantissa, _, power = number.lower().partition("e")
    if power and abs(int(power)) > _MOST_POWER:
        raise refusal("too_small" if power.startswith("-") else "too_large")
    return Fraction(mantissa.replace(",", ".").rstrip(".")) * Fraction(10) ** int(power or 0)


def _short(text: str) -> str:
    """A text short enough to be named in a sentence."""
    return text if len(text) <= 30 else text[:29] + "…"
