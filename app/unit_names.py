"""The units that may be typed behind a number, by quantity, and what they are in SI, exactly.

Only spellings in these lists are taken, strictly by case (MPa is not mPa); pint does the conversion. The
rejected alternative was to hand pint the whole text: it reads "g" as gram where gravity is meant, "mil" as an
angle and "C" as an electric charge. pint takes a third of a second to import, so it is asked last: the
display units themselves are known without it.
"""

from __future__ import annotations

import difflib
import re
from collections import Counter
from collections.abc import Mapping
from fractions import Fraction
from functools import cache, lru_cache
from typing import TYPE_CHECKING, Final, TypeAlias

from app.units import SYSTEMS, Quantity

if TYPE_CHECKING:
    from pint import UnitRegistry

Product: TypeAlias = Mapping[str, int]  # pint's names with their powers


class UnknownUnitError(LookupError):
    """The text names no unit of the lists of its quantity, or units that do not make up this quantity."""


def _plain(**names: str) -> dict[str, Product]:
    return {spelling: {name: 1} for spelling, name in names.items()}


_LENGTHS = _plain(
    mm="millimeter", cm="centimeter", dm="decimeter", m="meter", km="kilometer", um="micrometer",
    inch="inch", inches="inch", ft="foot", yd="yard", mil="thou", thou="thou",
) | {"in": {"inch": 1}, "µm": {"micrometer": 1}, '"': {"inch": 1}, "″": {"inch": 1}}  # fmt: skip
_FORCES = _plain(
    N="newton", daN="decanewton", kN="kilonewton", MN="meganewton",
    lbf="pound_force", kip="kip", kips="kip", kgf="kilogram_force",
)  # fmt: skip
_PER_LENGTH: dict[str, Product] = {"plf": {"pound_force": 1, "foot": -1}, "klf": {"kip": 1, "foot": -1}}
_STRESSES = _plain(
    Pa="pascal", kPa="kilopascal", MPa="megapascal", GPa="gigapascal", bar="bar", psi="psi", ksi="ksi"
) | {"psf": {"pound_force": 1, "foot": -2}, "ksf": {"kip": 1, "foot": -2}}
_MASSES = _plain(g="gram", kg="kilogram", t="metric_ton", lb="pound", oz="ounce", slug="slug")
_DENSITIES: dict[str, Product] = {"pcf": {"pound": 1, "foot": -3}, "pci": {"pound": 1, "inch": -3}}
# Rises, that is differences: pint's delta units have no offset.
_TEMPERATURES = _plain(K="kelvin", C="delta_degC", degC="delta_degC", F="delta_degF", degF="delta_degF") | {
    "°C": {"delta_degC": 1}, "°F": {"delta_degF": 1},
}  # fmt: skip
_RATIOS = _plain(ppm="ppm") | {"%": {"percent": 1}, "‰": {"permille": 1}}
_ENERGIES = _plain(J="joule", kJ="kilojoule")

_METRE: Product = {"meter": 1}
_PASCAL: Product = {"pascal": 1}

# What may stand in a unit of each quantity, and the SI unit it must come out as.
ALLOWED: Final[Mapping[Quantity, tuple[Mapping[str, Product], Product]]] = {
    "length": (_LENGTHS, _METRE),
    "size": (_LENGTHS, _METRE),
    "displacement": (_LENGTHS, _METRE),
    "area": (_LENGTHS, {"meter": 2}),
    "second_moment": (_LENGTHS, {"meter": 4}),
    "force": (_FORCES, {"newton": 1}),
    "distributed": (_FORCES | _LENGTHS | _PER_LENGTH, {"newton": 1, "meter": -1}),
    "stress": (_STRESSES | _FORCES | _LENGTHS, _PASCAL),
    "modulus": (_STRESSES | _FORCES | _LENGTHS, _PASCAL),
    "spring": (_FORCES | _LENGTHS | _PER_LENGTH, {"newton": 1, "meter": -1}),
    "rotation_spring": (_FORCES | _LENGTHS | _plain(rad="radian"), {"newton": 1, "meter": 1, "radian": -1}),
    "bedding": (_STRESSES | _FORCES | _LENGTHS | _PER_LENGTH, _PASCAL),
    "temperature": (_TEMPERATURES, {"kelvin": 1}),
    "expansion": (_TEMPERATURES | _LENGTHS | _RATIOS, {"kelvin": -1}),
    "density": (_MASSES | _LENGTHS | _DENSITIES, {"kilogram": 1, "meter": -3}),
    "acceleration": (_LENGTHS | _plain(s="second", g="standard_gravity"), {"meter": 1, "second": -2}),
    "mass": (_MASSES, {"kilogram": 1}),
    "energy": (_ENERGIES | _FORCES | _LENGTHS, {"joule": 1}),
    "factor": (_RATIOS, {}),
}

_LONGEST: Final = 40
_SUPERSCRIPTS: Final = str.maketrans("⁰¹²³⁴⁵⁶⁷⁸⁹⁻", "0123456789-")
_PART: Final = re.compile(
    r"""\s* (?P<link>[/·*]?) \s* (?P<name>[^\W\d_]+|°[CF]|[%‰"″])
        \s* (?: (?:\^|\*\*)? \s* (?P<power>-?[0-9]) )?""",
    re.VERBOSE,
)


@lru_cache(maxsize=1024)
def unit_factor(text: str, quantity: Quantity) -> Fraction:
    """How many SI units of `quantity` one `text` is; UnknownUnitError where it is no unit of that."""
    for system in SYSTEMS.values():
        if text and text == system[quantity].symbol:
            return system[quantity].factor
    return _factor_by_pint(_product(text, quantity), ALLOWED[quantity][1])


def nearest_unit(text: str, quantity: Quantity) -> str | None:
    """A spelling that can be typed for this quantity and looks like `text`, or None.

    A name that only stands in a product, as N in N/mm, is none by itself.
    """
    spellings = dict.fromkeys([*(s[quantity].symbol for s in SYSTEMS.values()), *ALLOWED[quantity][0]])
    names = [name for name in spellings if name != text and _is_unit_of(name, quantity)]
    same = [name for name in names if name and name.casefold() == text.casefold()]
    close = same or difflib.get_close_matches(text[:_LONGEST], names, n=1, cutoff=0.6)
    return close[0] if close else None


@lru_cache(maxsize=1024)
def _is_unit_of(name: str, quantity: Quantity) -> bool:
    try:
        unit_factor(name, quantity)
    except UnknownUnitError:
        return False
    return True


def _product(text: str, quantity: Quantity) -> Product:
    """The unit's text as powers of pint's units: parts linked by / · or *, each with a digit as power."""
    rest = text.translate(_SUPERSCRIPTS).replace("μ", "µ").removeprefix("1")
    powers: Counter[str] = Counter()
    if not rest or len(text) > _LONGEST:
        raise UnknownUnitError(text)
    while rest:
        part = _PART.match(rest)
        atom = part and ALLOWED[quantity][0].get(part["name"])
        if not part or not atom or (powers and not part["link"]):
            raise UnknownUnitError(text)
        times = int(part["power"] or 1) * (-1 if part["link"] == "/" else 1)
        powers.update({name: power * times for name, power in atom.items()})
        rest = rest[part.end() :].strip()
    return powers


def _factor_by_pint(product: Product, si: Product) -> Fraction:
    """The exact factor from a product of units to SI; UnknownUnitError where the dimensions differ."""
    from pint import DimensionalityError

    registry = _registry()
    quantity = registry.Quantity(Fraction(1), registry.UnitsContainer(product))
    try:
        return Fraction(quantity.to(registry.UnitsContainer(si)).magnitude)
    except DimensionalityError:
        raise UnknownUnitError(*product) from None


@cache
def _registry() -> UnitRegistry[Fraction]:
    """pint's registry, counting in fractions."""
    from pint import UnitRegistry

    return UnitRegistry(non_int_type=Fraction)
