"""What a segment is called, and which of its parts where several are bonded."""

from __future__ import annotations

from app.words import tr
from solver.checks import Check


def part_words(part: int, material: str | None) -> str:
    """One of several bonded parts, counted from 1 as people do, the segment's own first."""
    return tr("part {number}, {material}").format(number=part + 1, material=material)


def segment_words(check: Check) -> str | None:
    """The segment that a check is of, and which of its parts where several are bonded."""
    if check.part is None or check.segment is None:
        return check.segment
    words = tr("{segment}, {part}")
    return words.format(segment=check.segment, part=part_words(check.part, check.material))
