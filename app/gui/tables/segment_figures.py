"""What the segment table shows of results: mass, force, stress and utilisation, and the member's totals."""

from __future__ import annotations

from collections.abc import Callable
from math import fsum
from typing import Literal

from app.gui.tables.column import Figures, Sight
from app.units import format_value, utilisation_text
from app.words import tr
from solver.arrays import FloatArray
from solver.checks import PASS_MARGIN
from solver.model import Project


def utilisation(index: int, figures: Figures, _sight: Sight) -> str:
    """The utilisation in words, with the digits that its verdict needs."""
    value = figures.value(figures.utilisation, index)
    if value is None:
        return "–" if 0 <= index < len(figures.utilisation) else ""
    return utilisation_text(value, "pass" if value <= 1 + PASS_MARGIN else "fail")


def why_no_utilisation(index: int, figures: Figures) -> str:
    """Why no check of stress was made of a segment; empty where one was, or there are no results."""
    if not 0 <= index < len(figures.utilisation) or figures.value(figures.utilisation, index) is not None:
        return ""
    if not figures.checked:
        return tr("not checked: checks are made of the combinations, not of the cases in them")
    return tr("no check was made here: there is no stress, or no allowable stress for it")


def mass(index: int, figures: Figures, sight: Sight) -> str:
    """The mass of the segment."""
    value = figures.value(figures.segment_mass, index)
    return "" if value is None else format_value(value, "mass", sight.system, 3)


def between(name: Literal["force", "stress"]) -> Callable[[int, Figures, Sight], str]:
    """The least and the largest force or stress within the segment in the shown state."""

    def text(index: int, figures: Figures, sight: Sight) -> str:
        values: FloatArray = getattr(figures, name)
        if not 0 <= index < len(values):
            return ""
        ends = [format_value(float(value), name, sight.system, 3) for value in values[index]]
        return ends[0] if ends[0] == ends[1] else "…".join(ends)

    return text


def bar(index: int, figures: Figures) -> tuple[float, float] | None:
    """Utilisation and sign of the stress for the bar."""
    value = figures.value(figures.utilisation, index)
    return None if value is None else (value, float(figures.governs[index]))


def total_line(project: Project, figures: Figures, sight: Sight) -> str:
    """Length and mass of the whole member."""
    length = fsum(segment.length for segment in project.segments)
    text = format_value(length, "length", sight.system, with_unit=True, strip=True)
    if figures.mass is None:
        return tr("total {length}").format(length=text)
    mass = format_value(figures.mass, "mass", sight.system, 3, with_unit=True)
    return tr("total {length}, {mass}").format(length=text, mass=mass)
