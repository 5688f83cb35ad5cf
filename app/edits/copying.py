"""Parts of the chain taken over for others: their loads, and what their joints carry, under other marks."""

from __future__ import annotations

from collections.abc import Callable, Iterable, Mapping, Sequence
from typing import TypeVar

from msgspec import Struct, structs

from app.edits.companions import fresh_companion_mark, fresh_piece_mark
from app.edits.records import with_cases
from solver.model import Companion, JointLoad, LoadCase, Project, SegmentLoad

_L = TypeVar("_L", bound=Struct)
Marks = Mapping[str, str]  # of the copied, to those of the copies


def with_loads_copied(
    project: Project,
    segments: Sequence[Marks],
    joints: Sequence[Marks],
    on_segment: Callable[[SegmentLoad], SegmentLoad] = lambda load: load,
    at_joint: Callable[[JointLoad], JointLoad] = lambda load: load,
) -> Project:
    """The project whose copies carry in every case what the copied carry, behind the loads of now.

    There is one `Marks` for each copy.
    """

    def grown(case: LoadCase) -> LoadCase:
        return structs.replace(
            case,
            segment_loads=_grown(case.segment_loads, "segment", segments, on_segment),
            joint_loads=_grown(case.joint_loads, "joint", joints, at_joint),
        )

    return with_cases(project, grown)


def with_companions_copied(
    project: Project, companions: Iterable[Companion], moved: Callable[[Companion], Companion]
) -> tuple[Project, Marks]:
    """The project with copies of companions, moved to other joints under marks of their own; not checked.

    With it come the marks of the copies' segments, by those of the copied.
    """
    marks: dict[str, str] = {}
    for companion in companions:
        copy = structs.replace(moved(companion), mark=fresh_companion_mark(project))
        of = {s.mark: mark for s, mark in zip(companion.segments, _piece_marks(project, copy), strict=True)}
        segments = tuple(structs.replace(segment, mark=of[segment.mark]) for segment in copy.segments)
        project = structs.replace(
            project, companions=(*project.companions, structs.replace(copy, segments=segments))
        )
        marks |= of
    return project, marks


def _piece_marks(project: Project, companion: Companion) -> list[str]:
    """Marks for the segments of a companion that is not there yet."""
    empty = structs.replace(companion, segments=())
    for piece in companion.segments:
        whole = structs.replace(project, companions=(*project.companions, empty))
        fresh = structs.replace(piece, mark=fresh_piece_mark(whole, companion.mark))
        empty = structs.replace(empty, segments=(*empty.segments, fresh))
    return [piece.mark for piece in empty.segments]


def _grown(
    loads: tuple[_L, ...], key: str, copies: Sequence[Marks], change: Callable[[_L], _L]
) -> tuple[_L, ...]:
    """The loads and their copies; the very same list where nothing is copied."""
    copied = {mark for marks in copies for mark in marks}
    own = [load for load in loads if getattr(load, key) in copied]
    fresh = [
        structs.replace(change(load), **{key: marks[getattr(load, key)]})
        for marks in copies
        for load in own
        if getattr(load, key) in marks
    ]
    return (*loads, *fresh) if fresh else loads
