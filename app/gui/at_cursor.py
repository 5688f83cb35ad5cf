"""What a click selects, and what the space bar does at the cursor: one thing after another."""

from __future__ import annotations

from collections.abc import Iterable, Sequence

from app.drawing.shapes import OF_COMPANION, OF_JOINT, OF_SEGMENT, Part
from app.gui.view import Selection


def choices_at(joints: Iterable[int], segment: int, companions: Iterable[int]) -> tuple[Selection, ...]:
    """The joint there, the segment, the segments of companions beside it."""
    return (
        *(Selection(joints=frozenset((index,))) for index in joints),
        Selection(segments=frozenset((segment,))),
        *(Selection(companions=frozenset((index,))) for index in companions),
    )


def selection_of(part: Part) -> Selection | None:
    """The segment, the joint or the companion's segment that a part belongs to; None for other parts."""
    one = frozenset((part.index,))
    if part.kind in OF_SEGMENT:
        return Selection(segments=one)
    if part.kind in OF_JOINT:
        return Selection(joints=one)
    return Selection(companions=one) if part.kind in OF_COMPANION else None


def next_of(choices: Sequence[Selection], chosen: Selection) -> Selection:
    """The one behind what is chosen; the first where none of them is."""
    here = choices.index(chosen) if chosen in choices else -1
    return choices[(here + 1) % len(choices)]
