"""Parts of the chain taken over for others: their loads, and what their joints carry, under other marks."""

from __future__ import annotations

from collections.abc import Callable, Mapping, Sequence
from typing import TypeVar

from msgspec import Struct, structs

from app.edits.records import with_cases
from solver.model import JointLoad, LoadCase, Project, SegmentLoad

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
