"""Display units: the five systems of the project file, exact factors, numbers as people read and type them.

Units turn at the border: everything behind it is SI. A factor is an exact fraction (SI units per display
unit), because an entry is converted exactly and rounded once. The inch and the pound are those of the
international yard and pound agreement of 1959 (25.4 mm, 0.45359237 kg); standard gravity is 9.80665 m/s²
(3rd CGPM, 1901). Temperatures are rises, that is differences: 1 °F is 5/9 K and there is no offset.
"""

from __future__ import annotations

import re
from collections.abc import Mapping
from dataclasses import dataclass
from fractions import Fraction
from functools import cache, lru_cache
from typing import Final, Literal, TypeAlias, get_args, overload

from app.numerals import fixed, localised, reading, shortest_decimal
from solver.arrays import FloatArray
from solver.checks import Status
from solver.model import UnitSystemName

Quantity: TypeAlias = Literal[
    "length",  # of segments, positions along the member
    "size",  # of a section
    "displacement",  # also movement, lack of fit, clearance
    "area",
    "second_moment",
    "force",
    "distributed",
    "stress",
    "modulus",
    "spring",
    "rotation_spring",  # moment per radian
    "bedding",
    "temperature",
    "expansion",
    "density",
    "acceleration",
    "mass",
    "energy",
    "factor",
]
QUANTITIES: Final[tuple[Quantity, ...]] = get_args(Quantity)
SYSTEM_NAMES: Final[tuple[UnitSystemName, ...]] = get_args(UnitSystemName)


_LONGEST_INPUT: Final = 9


@dataclass(frozen=True, slots=True)
class Unit:
    """A unit as it is shown, and how many SI units one of it is."""

    symbol: str
    factor: Fraction


UnitSystem: TypeAlias = Mapping[Quantity, Unit]
_Units: TypeAlias = dict[Quantity, Unit]  # one that is still being put together

_ONE = Fraction(1)
_KILO = Fraction(1000)
_INCH = Fraction(254, 10_000)
_POUND = Fraction(45_359_237, 100_000_000)
_POUND_FORCE = _POUND * Fraction(980_665, 100_000)

_MILLIMETRE = Unit("mm", 1 / _KILO)

_EVERYWHERE: _Units = {"factor": Unit("", _ONE)}
_METRIC: _Units = {
    **_EVERYWHERE,
    "length": _MILLIMETRE,
    "size": _MILLIMETRE,
    "displacement": _MILLIMETRE,
    "area": Unit("mm²", _KILO**-2),
    "second_moment": Unit("mm⁴", _KILO**-4),
    "stress": Unit("MPa", _KILO**2),
    "modulus": Unit("MPa", _KILO**2),
    "bedding": Unit("N/mm²", _KILO**2),
    "temperature": Unit("K", _ONE),
    "expansion": Unit("1/K", _ONE),
    "density": Unit("kg/m³", _ONE),
    "acceleration": Unit("m/s²", _ONE),
    "mass": Unit("kg", _ONE),
    "energy": Unit("J", _ONE),
}
_KILONEWTONS: _Units = {
    "force": Unit("kN", _KILO),
    "distributed": Unit("kN/m", _KILO),
    "spring": Unit("kN/mm", _KILO**2),
    "rotation_spring": Unit("kN·m/rad", _KILO),
}


def _inches(force: str, stress: str, force_factor: Fraction) -> _Units:
    """A system of inches with that unit of force."""
    inch, per_inch, per_area = Unit("in", _INCH), force_factor / _INCH, force_factor / _INCH**2
    return {
        **_EVERYWHERE,
        "length": inch,
        "size": inch,
        "displacement": inch,
        "area": Unit("in²", _INCH**2),
        "second_moment": Unit("in⁴", _INCH**4),
        "force": Unit(force, force_factor),
        "distributed": Unit(f"{force}/in", per_inch),
        "stress": Unit(stress, per_area),
        "modulus": Unit(stress, per_area),
        "spring": Unit(f"{force}/in", per_inch),
        "rotation_spring": Unit(f"{force}·in/rad", force_factor * _INCH),
        "bedding": Unit(f"{force}/in²", per_area),
        "temperature": Unit("°F", Fraction(5, 9)),
        "expansion": Unit("1/°F", Fraction(9, 5)),
        "density": Unit("lb/in³", _POUND / _INCH**3),
        "acceleration": Unit("ft/s²", 12 * _INCH),
        "mass": Unit("lb", _POUND),
        "energy": Unit(f"{force}·in", force_factor * _INCH),
    }


_NEWTONS: Final[_Units] = {
    "force": Unit("N", _ONE),
    "distributed": Unit("N/mm", _KILO),
    "spring": Unit("N/mm", _KILO),
    "rotation_spring": Unit("N·m/rad", _ONE),
}
_METRES: Final[_Units] = {"length": Unit("m", _ONE), "bedding": Unit("kN/m²", _KILO)}

SYSTEMS: Final[Mapping[UnitSystemName, UnitSystem]] = {
    "mm-N-MPa": {**_METRIC, **_NEWTONS},
    "mm-kN-MPa": {**_METRIC, **_KILONEWTONS},
    "m-kN-MPa": {**_METRIC, **_KILONEWTONS, **_METRES},
    "in-lbf-psi": _inches("lbf", "psi", _POUND_FORCE),
    "in-kip-ksi": _inches("kip", "ksi", 1000 * _POUND_FORCE),
}


def unit(quantity: Quantity, system: UnitSystemName) -> Unit:
    """The display unit of a quantity in a system."""
    return SYSTEMS[system][quantity]


def symbol(quantity: Quantity, system: UnitSystemName) -> str:
    """The unit as it is written behind a number; empty for a factor."""
    return unit(quantity, system).symbol


@cache
def _per_si(quantity: Quantity, system: UnitSystemName) -> float:
    """Display units per SI unit, rounded once."""
    return float(1 / unit(quantity, system).factor)


@overload
def to_display(value: float, quantity: Quantity, system: UnitSystemName) -> float: ...
@overload
def to_display(value: FloatArray, quantity: Quantity, system: UnitSystemName) -> FloatArray: ...
def to_display(value: float | FloatArray, quantity: Quantity, system: UnitSystemName) -> float | FloatArray:
    """SI to display units, for drawing and reading; the last digit may be off by one."""
    return value * _per_si(quantity, system)


@overload
def from_display(value: float, quantity: Quantity, system: UnitSystemName) -> float: ...
@overload
def from_display(value: FloatArray, quantity: Quantity, system: UnitSystemName) -> FloatArray: ...
def from_display(value: float | FloatArray, quantity: Quantity, system: UnitSystemName) -> float | FloatArray:
    """Display units to SI, for what a hand drags; typed text goes through `app.entry`, which is exact."""
    return value * float(unit(quantity, system).factor)


@lru_cache(maxsize=8192)
def decimal_text(value: float, quantity: Quantity, system: UnitSystemName) -> str:
    """The shortest decimal in the display unit that converts back to the same double, to compute with.

    `value` is finite, in SI. "-" for minus, a point in every language; −0 reads "0".
    """
    factor = unit(quantity, system).factor
    return shortest_decimal(Fraction(value) / factor, lambda decimal: rounds_to(decimal * factor, value))


def entry_text(value: float, quantity: Quantity, system: UnitSystemName) -> str:
    """The same as it is typed: what an editor starts from and a spreadsheet of the user's language reads."""
    return localised(decimal_text(value, quantity, system))


def rounds_to(exact: Fraction, value: float) -> bool:
    """Whether `value` is the nearest double of an exact number."""
    try:
        return float(exact) == value
    except OverflowError:
        return False


def format_value(
    value: float,
    quantity: Quantity,
    system: UnitSystemName,
    digits: int = 4,
    *,
    strip: bool = False,
    with_unit: bool = False,
) -> str:
    """An SI value for reading in the display unit: `digits` significant digits, whole units never rounded.

    Real minus, thin spaces between thousands; `strip` takes needless zeros off; `with_unit` adds the symbol.
    """
    text = reading(to_display(value, quantity, system), digits, strip=strip)
    return f"{text} {symbol(quantity, system)}".rstrip() if with_unit else text


def input_text(value: float, quantity: Quantity, system: UnitSystemName) -> str:
    """An input for reading: to the last digit as typed where that is short, else rounded to five digits."""
    typed = decimal_text(value, quantity, system)
    if "e" in typed or len(typed.lstrip("-")) > _LONGEST_INPUT:
        return format_value(value, quantity, system, 5, strip=True)
    return fixed(to_display(value, quantity, system), len(typed.partition(".")[2]))


def utilisation_text(value: float, status: Status) -> str:
    """A utilisation to two decimals, and as many more as it takes not to contradict its status.

    1.0004 fails, so it reads "1.0004" and never "1.00"; 0.9996 passes and may read "1.00".
    """
    if value >= 100:
        return reading(value, 3)
    for decimals in range(2, 17):
        text = fixed(value, decimals)
        if (float(f"{value:.{decimals}f}") > 1) == (status == "fail"):
            return text
    return localised(repr(value))


@cache
def _before_unit() -> re.Pattern[str]:
    """The space between a figure and any system's unit."""
    symbols = {unit.symbol for system in SYSTEMS.values() for unit in system.values() if unit.symbol}
    longest_first = sorted(symbols, key=lambda symbol: (-len(symbol), symbol))
    return re.compile(rf"(?<=[\d⁰¹²³⁴⁵⁶⁷⁸⁹]) (?=(?:{'|'.join(map(re.escape, longest_first))})(?!\w))")


def unbroken(text: str) -> str:
    """A sentence for where lines are broken: no line ends between a number and its unit.

    Only the window asks for it; what a terminal or a file gets stays plain, so that it can be searched.
    """
    return _before_unit().sub("\u00a0", text)
