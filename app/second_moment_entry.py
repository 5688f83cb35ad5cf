"""The second moment of a section known by its area, typed behind it: A 1200 I 4.5e4 → 1400 I 6e4.

A text with the sign of an area says all of the section, so that one without I has no second moment any more;
a bare number is the area alone and leaves the second moment as it was.
"""

from __future__ import annotations

import re
from collections.abc import Callable, Sequence
from typing import Final

from msgspec import UNSET, UnsetType, structs

from app.entry import parse_entry, refusal
from app.units import Quantity
from solver.model import AnySection, AreaSection, UnitSystemName, end_of

ARROW: Final = re.compile(r"→|->|=>")
_SIGN: Final = re.compile(r"(?<![^\W\d_])I(?![^\W\d_])")  # a letter of its own, not one of a unit


def without_second_moments(text: str) -> tuple[str, tuple[str, ...]]:
    """The text of the section alone, and what stands behind each I; empty texts where an end has none."""
    parts = [_SIGN.split(end, maxsplit=1) for end in ARROW.split(text)]
    if all(len(part) == 1 for part in parts):
        return text, ()
    return "→".join(part[0].strip() for part in parts), tuple(
        part[1].strip() if len(part) > 1 else "" for part in parts
    )


def with_second_moments(section: AnySection, texts: Sequence[str], system: UnitSystemName) -> AnySection:
    """The section with the second moments of the texts; EntryError where it is none of a bare area."""
    if not texts:
        return section
    if not isinstance(section, AreaSection) or not texts[0]:
        raise refusal("second_moment", example="A 1200 I 4.5e4")
    values = [parse_entry(text, "second_moment", system) if text else None for text in texts]
    if any(value is not None and value <= 0 for value in values):
        raise refusal("size_not_positive")
    end = values[1] if len(values) > 1 else None
    return structs.replace(section, second_moment=values[0], second_moment_end=UNSET if end is None else end)


def cleared(section: AnySection) -> AnySection:
    """The section without second moments."""
    if not isinstance(section, AreaSection):
        return section
    return structs.replace(section, second_moment=UNSET, second_moment_end=UNSET)


def area_words(section: AreaSection, number: Callable[[float, Quantity], str]) -> str:
    """The section as it is typed: "A 1200 I 45000→1400"."""
    start = f"A {_end_words(section.area, section.second_moment, number)}"
    if section.area_end is UNSET and section.second_moment_end is UNSET:
        return start
    end = _end_words(end_of(section.area, section.area_end), section.second_moment_end, number)
    return f"{start}→{end}"


def _end_words(area: float, moment: float | UnsetType, number: Callable[[float, Quantity], str]) -> str:
    text = number(area, "area")
    return text if isinstance(moment, UnsetType) else f"{text} I {number(moment, 'second_moment')}"
