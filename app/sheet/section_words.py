"""A section on paper: as it is typed, with a legible number of digits."""

from __future__ import annotations

from msgspec import UnsetType

from app.section_entry import section_text
from app.sheet.readings import Readings, legible
from app.words import tr
from solver.model import AnySection, AreaSection, end_of
from solver.sections import area_coefficients


def section_words(section: AnySection, say: Readings) -> str:
    """As typed; of a bare area, which has a column of its own, its second moment."""
    if not isinstance(section, AreaSection):
        return legible(section_text(section, say.units))
    if isinstance(section.second_moment, UnsetType):
        return tr("area given")
    moment = say.pair(
        section.second_moment, end_of(section.second_moment, section.second_moment_end), "second_moment"
    )
    return tr("area given, I {value} {unit}").format(value=moment, unit=say.unit("second_moment"))


def area_words(section: AnySection, say: Readings) -> str:
    """Its area at the start, and at the end where that differs."""
    first, _, last = area_coefficients(section)
    area = [say.read(a, "area") for a in (first, last)]
    return area[0] if first == last else " → ".join(area)
