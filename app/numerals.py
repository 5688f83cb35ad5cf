"""Numerals without units: the shortest decimal that means a given number, and figures laid out for reading.

Entries must show what was typed, to the last digit, so they are written by exact integer arithmetic; readings
are rounded to a few significant digits. Two different jobs that must not be mixed: what is edited is never
rounded, what is read never shows seventeen digits. The decimal sign is put in here and nowhere else: a text
for eyes or fingers has that of the user's language, a text to compute with has a point.
"""

from __future__ import annotations

import math
from collections.abc import Callable
from fractions import Fraction
from functools import lru_cache
from typing import Final

from app.words import decimal_sign

MINUS: Final = "\u2212"
GROUP: Final = "\u202f"  # the narrow no-break space: a thin space at which no line ends

# 17 digits tell any two doubles apart; the spare ones serve intervals narrower than a double's own.
_MOST_DIGITS: Final = 20
_PLAIN_FROM, _PLAIN_TO = -5, 15  # powers of ten between which an entry is written without an exponent
_SUPERSCRIPTS: Final = str.maketrans("0123456789-", "⁰¹²³⁴⁵⁶⁷⁸⁹⁻")


def shortest_decimal(target: Fraction, means: Callable[[Fraction], bool]) -> str:
    """The decimal of fewest digits near `target` for which `means` holds, as ASCII text.

    `means` must hold on an interval around `target`. More digits then never harm, so the number of digits is
    found by halving. ValueError where twenty digits are not enough, which no double needs.
    """
    if target == 0:
        return "0"
    least, most = 1, _MOST_DIGITS
    found = _accepted(target, most, means)
    if found is None:
        raise ValueError(target)
    while least < most:
        middle = (least + most) // 2
        candidate = _accepted(target, middle, means)
        if candidate is None:
            least = middle + 1
        else:
            found, most = candidate, middle
    return _written(*found)


def _accepted(target: Fraction, digits: int, means: Callable[[Fraction], bool]) -> tuple[int, int] | None:
    """The accepted (mantissa, power of ten) of that many digits next to the target, the nearer first."""
    power = _magnitude(target) - digits + 1
    scaled = target / Fraction(10) ** power
    below = math.floor(scaled)
    neighbours = sorted((below, below + 1), key=lambda mantissa: abs(mantissa - scaled))
    for mantissa in neighbours:
        if means(mantissa * Fraction(10) ** power):
            return mantissa, power
    return None


def _magnitude(value: Fraction) -> int:
    """The power of ten of the leading digit of a value other than 0."""
    value = abs(value)
    power = len(str(value.numerator)) - len(str(value.denominator))
    return power if value >= Fraction(10) ** power else power - 1


def _written(mantissa: int, power: int) -> str:
    """mantissa · 10^power as text without needless zeros, with an exponent where it is long otherwise."""
    sign, digits = "-" if mantissa < 0 else "", str(abs(mantissa))
    power += len(digits) - len(digits.rstrip("0"))
    digits = digits.rstrip("0")
    leading = power + len(digits) - 1
    if not _PLAIN_FROM < leading < _PLAIN_TO:
        return f"{sign}{digits[0]}{'.' + digits[1:] if digits[1:] else ''}e{leading}"
    if power >= 0:
        return sign + digits + "0" * power
    digits = digits.rjust(1 - power, "0")
    return f"{sign}{digits[:power]}.{digits[power:]}"


def localised(text: str) -> str:
    """A number with a point as its decimal sign, with that of the user's language instead."""
    return text.replace(".", decimal_sign())


def decimals_of(text: str) -> int:
    """How many decimals a number for reading shows."""
    return len(text.partition(decimal_sign())[2])


def reading(value: float, digits: int, *, strip: bool = False) -> str:
    """`value` to `digits` significant digits for reading: real minus, thin spaces, no rounding above units.

    `strip` takes needless zeros off the decimals. Not finite reads "–" (nothing to show) or "∞".
    """
    return localised(_reading(value, digits, strip))


@lru_cache(4096)  # numbers are written in several places, and most stay from one keystroke to the next
def _reading(value: float, digits: int, strip: bool) -> str:
    """`reading` with a decimal point."""
    if math.isnan(value):
        return "–"
    if math.isinf(value):
        return "∞" if value > 0 else MINUS + "∞"
    if value != 0 and not 1e-4 <= abs(value) < 1e9:
        return _with_power(value, digits, strip=strip)
    return _fixed(value, decimals_for(value, digits), strip=strip)


def rounded(value: float, digits: int) -> float:
    """The number that `reading` shows."""
    if value != 0 and not 1e-4 <= abs(value) < 1e9:
        return float(f"{value:.{digits - 1}e}")
    return float(f"{value:.{decimals_for(value, digits)}f}")


def at_most(bound: float) -> str:
    """A bound to one digit, rounded up: 2.1e-11 reads 3·10⁻¹¹."""
    if bound == 0 or not math.isfinite(bound):
        return reading(bound, 1)
    power = _magnitude(Fraction(bound))
    return reading(float(math.ceil(Fraction(bound) / Fraction(10) ** power) * Fraction(10) ** power), 1)


def fixed(value: float, decimals: int, *, strip: bool = False) -> str:
    """`value` with that many decimals for reading; what rounds to nothing has no sign."""
    return localised(_fixed(value, decimals, strip=strip))


def _fixed(value: float, decimals: int, *, strip: bool) -> str:
    """`fixed` with a decimal point."""
    text = f"{abs(value):.{decimals}f}"
    sign = MINUS if value < 0 and text.strip("0.") else ""
    whole, point, part = text.partition(".")
    part = part.rstrip("0") if strip else part
    return sign + _grouped(whole) + (point + part if part else "")


def laid_out(entry: str) -> str:
    """An entry's decimal, such as "-210000" or "1.2e-5", written as readings are, with every digit kept."""
    mantissa, _, power = entry.partition("e")
    whole, point, part = mantissa.lstrip("-").partition(".")
    text = localised((MINUS if entry.startswith("-") else "") + _grouped(whole) + point + part)
    return text + _power_of_ten(int(power)) if power else text


def decimals_for(value: float, digits: int) -> int:
    """How many decimals show `digits` significant digits, after rounding (9.996 has one digit less)."""
    if value == 0:
        return 0
    return max(0, digits - 1 - int(f"{value:.{digits - 1}e}".partition("e")[2]))


def _grouped(whole: str) -> str:
    """Thousands apart by a thin space from five figures on."""
    return whole if len(whole) < 5 else f"{int(whole):,}".replace(",", GROUP)


def _with_power(value: float, digits: int, *, strip: bool) -> str:
    """As a·10ⁿ."""
    mantissa, _, power = f"{abs(value):.{digits - 1}e}".partition("e")
    if strip and "." in mantissa:
        mantissa = mantissa.rstrip("0").rstrip(".")
    sign = MINUS if value < 0 else ""
    return sign + mantissa + _power_of_ten(int(power))


def _power_of_ten(power: int) -> str:
    """As it stands behind a factor."""
    return f"·10{str(power).translate(_SUPERSCRIPTS)}"
