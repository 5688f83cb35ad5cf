"""Shoulders as typed text: "r 2" for a fillet radius, "Kt 1.8" for the factor itself, nothing for none.

Numbers in it follow the grammar of every entry; what is shown can be typed again. Both letters are those of
drawings and charts in every language.
"""

from __future__ import annotations

import re
from typing import Final

from msgspec import UNSET, UnsetType

from app.entry import EntryError, parse_entry, read_number
from app.units import entry_text, format_value, symbol
from app.words import tr
from solver.model import Shoulder, UnitSystemName

_RADIUS: Final = re.compile(r"\s*r\s*=?\s*(.*)", re.DOTALL | re.IGNORECASE)
_FACTOR: Final = re.compile(r"\s*k\s*t?\s*=?\s*(.*)", re.DOTALL | re.IGNORECASE)


def parse_shoulder(
    text: str, system: UnitSystemName, old: Shoulder | UnsetType = UNSET
) -> Shoulder | UnsetType:
    """The shoulder a text names, UNSET for none; EntryError with a sentence where it names none.

    A bare number is what `old`, what the cell holds, is already; with a unit of length it is a radius.
    """
    if not text.strip():
        return UNSET
    if found := _RADIUS.fullmatch(text):
        return _radius(found[1], system)
    if found := _FACTOR.fullmatch(text):
        return _factor(found[1], system)
    if not re.match(r"\s*[\d.,(+\-−]", text):
        raise EntryError(_example(system))
    return _bare(text, system, old)


def _bare(text: str, system: UnitSystemName, old: Shoulder | UnsetType) -> Shoulder:
    if read_number(text, "size", system)[1] or (old and not isinstance(old.fillet_radius, UnsetType)):
        return _radius(text, system)
    if old:
        return _factor(text, system)
    raise EntryError(_example(system))


def _example(system: UnitSystemName) -> str:
    sentence = tr("a shoulder is its fillet radius, such as {radius}, or its factor, such as {factor}")
    radius = "r 2 mm" if not system.startswith("in") else "r 3/32 in"
    return sentence.format(radius=radius, factor=f"Kt {format_value(1.8, 'factor', system, strip=True)}")


def _radius(text: str, system: UnitSystemName) -> Shoulder:
    radius = parse_entry(text, "size", system)
    if radius <= 0:
        raise EntryError(tr("a fillet radius is greater than 0"))
    return Shoulder(fillet_radius=radius)


def _factor(text: str, system: UnitSystemName) -> Shoulder:
    factor = parse_entry(text, "factor", system)
    if factor < 1:
        raise EntryError(tr("a factor Kt is at least 1"))
    return Shoulder(factor=factor)


def shoulder_entry(shoulder: Shoulder | UnsetType, system: UnitSystemName) -> str:
    """The text an editor starts from, with all digits; typed again it gives the same shoulder."""
    if isinstance(shoulder, UnsetType):
        return ""
    if not isinstance(shoulder.factor, UnsetType):
        return f"Kt {entry_text(shoulder.factor, 'factor', system)}"
    return f"r {entry_text(float(shoulder.fillet_radius or 0.0), 'size', system)} {symbol('size', system)}"


def shoulder_text(shoulder: Shoulder | UnsetType, system: UnitSystemName) -> str:
    """The text for reading."""
    if isinstance(shoulder, UnsetType):
        return ""
    if not isinstance(shoulder.factor, UnsetType):
        return f"Kt {format_value(shoulder.factor, 'factor', system, strip=True)}"
    radius = float(shoulder.fillet_radius or 0.0)
    return f"r {format_value(radius, 'size', system, strip=True, with_unit=True)}"
