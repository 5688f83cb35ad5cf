"""Entries that several tables share: one number, and two numbers for the two ends of a segment."""

from __future__ import annotations

import re

from msgspec import UNSET, UnsetType

from app.entry import EntryError, parse_entry
from app.units import Quantity, entry_text, format_value
from app.words import tr
from solver.model import UnitSystemName, end_of

_ARROW = re.compile(r"->|→")


def parts_of_pair(text: str) -> list[str]:
    """The texts on either side of the arrow; the whole text where there is none."""
    return _ARROW.split(text)


def parse_pair(text: str, quantity: Quantity, system: UnitSystemName) -> tuple[float, float | UnsetType]:
    """Start and end of "10 -> 20"; the end is UNSET where one number says both."""
    parts = parts_of_pair(text)
    if len(parts) > 2:
        raise EntryError(tr("at most two values, such as 10 -> 20"))
    values = [parse_entry(part.strip(), quantity, system) for part in parts]
    return values[0], values[1] if len(values) == 2 else UNSET


def pair_entry(start: float, end: float | UnsetType, quantity: Quantity, system: UnitSystemName) -> str:
    """What an editor shows of two ends: one number where they are equal."""
    texts = [entry_text(value, quantity, system) for value in (start, end_of(start, end))]
    return texts[0] if texts[0] == texts[1] else "→".join(texts)


def pair_text(start: float, end: float | UnsetType, quantity: Quantity, system: UnitSystemName) -> str:
    """Two ends for reading."""
    texts = [format_value(value, quantity, system, strip=True) for value in (start, end_of(start, end))]
    return texts[0] if texts[0] == texts[1] else "→".join(texts)
