"""The short texts of the drawing, the same on labels and in tooltips; empty where there is nothing to say."""

from __future__ import annotations

from collections.abc import Sequence
from functools import lru_cache

from app.section_entry import section_label
from app.units import Quantity, format_value
from app.words import language, tr, trn
from solver.model import AnySection, UnitSystemName

NAMED = 4  # segments that are named before the others are counted


def named(marks: Sequence[str]) -> str:
    """Segments by their marks, those after the first few by their number."""
    first, others = ", ".join(marks[:NAMED]), len(marks) - NAMED
    if others <= 0:
        return first
    return trn("{{marks}} and {count} other", "{{marks}} and {count} others", others).format(marks=first)


def not_to_scale(marks: Sequence[str]) -> str:
    """Which segments are drawn longer than to scale; empty where none is."""
    return tr("{marks}: not to scale along").format(marks=named(marks)) if marks else ""


def section_text(section: AnySection, system: UnitSystemName) -> str:
    """A section for reading; kept, because it is asked for at every keystroke and every step of a zoom."""
    return _section_text(section, system, language())


@lru_cache(maxsize=4096)
def _section_text(section: AnySection, system: UnitSystemName, _language: str) -> str:
    return section_label(section, system)


def value_text(value: float, quantity: Quantity, system: UnitSystemName) -> str:
    """A value with its unit, needless zeros taken off."""
    return format_value(value, quantity, system, strip=True, with_unit=True)


def signed_text(value: float, quantity: Quantity, system: UnitSystemName) -> str:
    """A value that shows its sign also where it is positive."""
    text = value_text(value, quantity, system)
    return f"+{text}" if value > 0 else text


def range_text(start: float, end: float, quantity: Quantity, system: UnitSystemName) -> str:
    """ "520 → 320 kN/m", or one value where both are equal; kept like those of sections."""
    return _range_text(start, end, quantity, system, language())


@lru_cache(maxsize=4096)
def _range_text(start: float, end: float, quantity: Quantity, system: UnitSystemName, _language: str) -> str:
    if start == end:
        return value_text(start, quantity, system)
    return f"{format_value(start, quantity, system, strip=True)} → {value_text(end, quantity, system)}"


def distributed_text(start: float, end: float, system: UnitSystemName, *, signed: bool) -> str:
    """A distributed load; beside its arrows without sign, where it keeps its direction."""
    if not (start or end):
        return ""
    if not signed and start * end >= 0.0:
        start, end = abs(start), abs(end)
    return range_text(start, end, "distributed", system)


def warmth_text(start: float, end: float, system: UnitSystemName) -> str:
    """A temperature rise."""
    return f"ΔT {range_text(start, end, 'temperature', system)}" if start or end else ""


def fit_text(value: float, system: UnitSystemName) -> str:
    """A lack of fit in words, which say its sign."""
    if not value:
        return ""
    words = tr("{amount} too long") if value > 0 else tr("{amount} too short")
    return words.format(amount=value_text(abs(value), "displacement", system))


def gravity_text(value: float, system: UnitSystemName) -> str:
    """Self-weight, by the component of gravity along x."""
    if not value:
        return ""
    return tr("self-weight, g {value} along x").format(value=signed_text(value, "acceleration", system))


def bedding_text(start: float, end: float, system: UnitSystemName) -> str:
    """A bedding's stiffness."""
    if not (start or end):
        return ""
    return tr("bedding {value}").format(value=range_text(start, end, "bedding", system))
