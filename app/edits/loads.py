"""Loads as tables show them: a cell for one segment or joint in one load case.

Several records may stand for one segment in one case; their cell shows a sum and cannot be set.
"""

from __future__ import annotations

from operator import attrgetter
from typing import Any

from msgspec import UNSET, UnsetType

from app.edits.cells import add_record, remove_records, set_value
from app.edits.checking import refused
from app.encode import plain
from solver.faults import Place
from solver.model import Project

_LISTS = {"segment": "segment_loads", "joint": "joint_loads"}


def set_segment_load(
    project: Project, case: str, segment: str, key: str, value: float | UnsetType
) -> Project:
    """The project with `key` of the segment's load in the case set, in a new record where there is none.

    UNSET takes the key away, and the record with its last one. EditError where several records stand for it.
    """
    return _set_load(project, case, "segment", segment, key, value)


def set_joint_load(project: Project, case: str, joint: str, key: str, value: float | UnsetType) -> Project:
    """The project with `key` of the joint's load in the case set, likewise."""
    return _set_load(project, case, "joint", joint, key, value)


def _case_index(project: Project, name: str) -> int:
    return next(index for index, case in enumerate(project.load_cases) if case.name == name)


def _places(project: Project, case: str, kind: str, mark: str) -> tuple[Place, ...]:
    index, name = _case_index(project, case), _LISTS[kind]
    marks = map(attrgetter(kind), getattr(project.load_cases[index], name))
    return tuple(("load_cases", index, name, number) for number, on in enumerate(marks) if on == mark)


def _set_load(
    project: Project, case: str, kind: str, mark: str, key: str, value: float | UnsetType
) -> Project:
    places = _places(project, case, kind, mark)
    name = _LISTS[kind]
    whole: Place = ("load_cases", _case_index(project, case), name)
    if len(places) > 1:
        raise refused(whole, "several_records", count=len(places))
    if not places:
        return project if value is UNSET else add_record(project, whole, {kind: mark, key: value})
    fresh = set_value(project, (*places[0], key), value)
    left: Any = plain(getattr(fresh.load_cases[int(whole[1])], name)[places[0][-1]])
    return remove_records(fresh, whole, [int(places[0][-1])]) if left == {kind: mark} else fresh
