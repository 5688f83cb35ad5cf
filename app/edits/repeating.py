"""Repeating a part of the chain, such as a storey or a pitch of a thread, a number of times.

A copy has the segments with their bedding and their loads, and the joints between them with their supports
and loads. The joints where copies meet are free and carry nothing, so that a support at the far end is not
multiplied unasked; that far joint stays at the end of the last copy, with what lies beyond. Limits are not
repeated. Marks are fresh.
"""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from itertools import chain
from typing import TypeVar

from msgspec import structs

from app.edits.checking import consistent, refused
from app.edits.copying import Marks, with_loads_copied
from app.edits.records import FreshMarks
from solver.model import Joint, Project, Segment

_R = TypeVar("_R", bound=Joint | Segment)

MOST = 200  # copies at once; a slip of the finger should not make a member of millions


def repeat_segments(project: Project, first: int, last: int, times: int) -> Project:
    """The project with the segments `first` to `last` repeated `times` times behind themselves.

    EditError where the number is not between 1 and MOST.
    """
    if not 1 <= times <= MOST:
        raise refused(("segments", first), "repeats", count=times, most=MOST)
    block, between = project.segments[first : last + 1], project.joints[first + 1 : last + 1]
    segments = _marks_of_copies(project.segments, last, block, times)
    joints = _marks_of_copies(project.joints, last, (project.joints[last + 1], *between), times)
    inner = [{joint.mark: marks[joint.mark] for joint in between} for marks in joints]
    copies = (_copied(block, marks) for marks in segments)
    chains = ((Joint(next(iter(marks.values()))), *_copied(between, marks)) for marks in joints)
    grown = structs.replace(
        project,
        segments=_with(project.segments, last + 1, copies),
        joints=_with(project.joints, last + 1, chains),
    )
    return consistent(with_loads_copied(grown, segments, inner), project)


def _marks_of_copies(
    all_of_them: Sequence[_R], last: int, copied: Sequence[_R], times: int
) -> list[dict[str, str]]:
    """For each copy the marks of what is copied, going on in the manner of the record `last`."""
    fresh = FreshMarks(record.mark for record in all_of_them)
    given = iter(fresh.in_turn(times * len(copied), all_of_them[last].mark))
    return [{record.mark: next(given) for record in copied} for _ in range(times)]


def _copied(records: Sequence[_R], marks: Marks) -> list[_R]:
    return [structs.replace(record, mark=marks[record.mark]) for record in records]


def _with(records: Sequence[_R], place: int, copies: Iterable[Iterable[_R]]) -> tuple[_R, ...]:
    return (*records[:place], *chain.from_iterable(copies), *records[place:])
