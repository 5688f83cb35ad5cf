"""What the space bar selects at the cursor: one thing after another, again from the first after the last."""

from __future__ import annotations

from collections.abc import Iterable, Sequence

from app.gui.view import Selection


def choices_at(joints: Iterable[int], segment: int, companions: Iterable[int]) -> tuple[Selection, ...]:
    """The joint there, the segment, the segments of companions beside it."""
    return (
        *(Selection(joints=frozenset((index,))) for index in joints),
        Selection(segments=frozenset((segment,))),
        *(Selection(companions=frozenset((index,))) for index in companions),
    )


def next_of(choices: Sequence[Selection], chosen: Selection) -> Selection:
    """The one behind what is chosen; the first where none of them is."""
    here = choices.index(chosen) if chosen in choices else -1
    return choices[(here + 1) % len(choices)]
