"""Repeating a part of the chain, such as a storey or a pitch of a thread, a number of times.

A copy has the segments with their bedding and their loads, and the joints between them with their supports
and loads. The joints where copies meet are free and carry nothing, so that a support at the far end is not
multiplied unasked; that far joint stays at the end of the last copy, with what lies beyond. Companions of the
part are repeated with it. Limits are not repeated. Marks are fresh.
"""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from functools import partial
from itertools import chain
from typing import TypeVar

from msgspec import structs

from app.edits.checking import consistent, refused
from app.edits.companions import segment_marks
from app.edits.copying import Marks, with_companions_copied, with_loads_copied
from app.edits.records import FreshMarks, mapped
from solver.model import Companion, Joint, Project, Segment

_R = TypeVar("_R", bound=Joint | Segment)

MOST = 200  # copies at once; a slip of the finger should not make a member of millions


def repeat_segments(project: Project, first: int, last: int, times: int) -> Project:
    """The project with the segments `first` to `last` repeated `times` times behind themselves.

    EditError where the number is not between 1 and MOST.
    """
    if not 1 <= times <= MOST:
        raise refused(("segments", first), "repeats", count=times, most=MOST)
    block, between = project.segments[first : last + 1], project.joints[first + 1 : last + 1]
    segments = _marks_of_copies(project.segments, last, block, times, segment_marks(project))
    joints = _marks_of_copies(project.joints, last, (project.joints[last + 1], *between), times)
    inner = [{joint.mark: marks[joint.mark] for joint in between} for marks in joints]
    copies = (_copied(block, marks) for marks in segments)
    chains = ((Joint(next(iter(marks.values()))), *_copied(between, marks)) for marks in joints)
    grown = structs.replace(
        project,
        segments=_with(project.segments, last + 1, copies),
        joints=_with(project.joints, last + 1, chains),
    )
    grown, beside = _with_companions(grown, project, first, last, joints)
    marks = [{**own, **others} for own, others in zip(segments, beside, strict=True)]
    return consistent(with_loads_copied(grown, marks, inner), project)


def _with_companions(
    grown: Project, project: Project, first: int, last: int, joints: Sequence[Marks]
) -> tuple[Project, list[Marks]]:
    """The companions of the repeated part at every copy of it; one that ended at the far joint stays put.

    The marks of the joints where copies meet are those of the far joint in `joints`.
    """
    places = {joint.mark: index for index, joint in enumerate(project.joints)}
    near, far = project.joints[first].mark, project.joints[last + 1].mark
    whole = [c for c in project.companions if first <= places[c.start] and places[c.end] <= last + 1]
    meets = [*(marks[far] for marks in joints), far]
    held = {companion.mark for companion in whole}
    grown = structs.replace(
        grown,
        companions=mapped(
            grown.companions,
            lambda c: structs.replace(c, end=meets[0]) if c.mark in held and c.end == far else c,
        ),
    )
    copied: list[Marks] = []
    for marks, begins, ends in zip(joints, meets, meets[1:], strict=False):
        moved = partial(_moved, marks={**marks, near: begins, far: ends})
        grown, of = with_companions_copied(grown, whole, moved)
        copied.append(of)
    return grown, copied


def _moved(companion: Companion, marks: Marks) -> Companion:
    return structs.replace(companion, start=marks[companion.start], end=marks[companion.end])


def _marks_of_copies(
    all_of_them: Sequence[_R], last: int, copied: Sequence[_R], times: int, others: Sequence[str] = ()
) -> list[dict[str, str]]:
    """For each copy the marks of what is copied, going on in the manner of the record `last`.

    `others` are taken as well.
    """
    fresh = FreshMarks((*(record.mark for record in all_of_them), *others))
    given = iter(fresh.in_turn(times * len(copied), all_of_them[last].mark))
    return [{record.mark: next(given) for record in copied} for _ in range(times)]


def _copied(records: Sequence[_R], marks: Marks) -> list[_R]:
    return [structs.replace(record, mark=marks[record.mark]) for record in records]


def _with(records: Sequence[_R], place: int, copies: Iterable[Iterable[_R]]) -> tuple[_R, ...]:
    return (*records[:place], *chain.from_iterable(copies), *records[place:])
