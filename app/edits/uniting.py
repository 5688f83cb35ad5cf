"""Joining all neighbours that differ in nothing but length and mark, so that nothing is lost by it.

They have the same material, the same section all along, the same bedding and the same loads and temperatures
in every case, none of them varying; and the joint between them carries nothing. A lack of fit adds up.
"""

from __future__ import annotations

from msgspec import UNSET, UnsetType, structs

from app.edits.checking import checked
from app.edits.linear import PAIRS
from app.edits.parts import carried, join_segments
from solver.absent import absent_zero
from solver.model import LoadCase, Project, Record, SegmentLoad, parts_of


def join_equal_neighbours(project: Project) -> Project:
    """The project with every run of equal neighbours made one; itself where there is none."""
    joined = project
    for index in range(len(project.segments) - 2, -1, -1):
        if _are_equal(joined, index):
            joined = join_segments(joined, index, index + 1)
    return checked(joined) if joined is not project else project


def _are_equal(project: Project, index: int) -> bool:
    """Whether a segment and the next differ in nothing but length and mark."""
    first, second = project.segments[index : index + 2]
    return (
        first.material == second.material
        and first.section == second.section
        and structs.replace(first, mark="", length=1.0) == structs.replace(second, mark="", length=1.0)
        and _is_uniform(first)
        and all(_is_uniform(part.section) for part in parts_of(first))
        and not any(carried(project, index + 1))
        and all(_are_loaded_alike(case, first.mark, second.mark) for case in project.load_cases)
    )


def _is_uniform(record: Record) -> bool:
    """Whether nothing varies along it."""
    pairs = ((getattr(record, start), getattr(record, end)) for start, end in PAIRS[type(record)])
    return all(isinstance(end, UnsetType) or end == start for start, end in pairs)


def _are_loaded_alike(case: LoadCase, first: str, second: str) -> bool:
    ones, others = _loads(case, first), _loads(case, second)
    return ones == others and all(_is_uniform(load) for load in ones)


def _loads(case: LoadCase, mark: str) -> list[SegmentLoad]:
    """What acts on a segment in the case, one record after another, its lack of fit aside."""
    own = (load for load in case.segment_loads if load.segment == mark)
    return [_plain(load) for load in own]


def _plain(load: SegmentLoad) -> SegmentLoad:
    """The load with each end written out or not, as it acts."""
    ends = {end: UNSET for start, end in PAIRS[SegmentLoad] if getattr(load, end) == getattr(load, start)}
    return structs.replace(load, segment="", lack_of_fit=absent_zero(), **ends)
