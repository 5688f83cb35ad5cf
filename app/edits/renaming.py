"""Renaming: a mark or name changes together with every reference to it, in one step."""

from __future__ import annotations

from collections.abc import Callable, Mapping
from typing import Final, TypeVar

from msgspec import Struct, structs

from app.edits.bonded import with_materials_named
from app.edits.checking import checked
from app.edits.companions import with_joints_marked, with_segments
from app.edits.records import mapped
from solver.faults import Place
from solver.model import LoadCase, Project

_R = TypeVar("_R", bound=Struct)
# where limits name joints: the list, and the record's field
LIMIT_JOINTS: Final = (
    ("displacement", "joint"),
    ("relative", "start"),
    ("relative", "end"),
    ("reaction", "joint"),
)
_Renamer = Callable[[Project, str, str], Project]


def rename_segment(project: Project, old: str, new: str) -> Project:
    """The project with the segment marked `old` marked `new`; EditError where `new` is taken or empty."""
    cases = _each(project.load_cases, lambda case: _records_of(case, "segment_loads", "segment", old, new))
    segments = _renamed(project.segments, "mark", old, new)
    return checked(structs.replace(project, segments=segments, load_cases=cases), project)


def rename_companion_segment(project: Project, old: str, new: str) -> Project:
    """The project with the companion's segment marked `old` marked `new`, in its loads as well."""
    cases = _each(project.load_cases, lambda case: _records_of(case, "segment_loads", "segment", old, new))
    companions = with_segments(
        project.companions,
        lambda segment: structs.replace(segment, mark=new) if segment.mark == old else segment,
    )
    return checked(structs.replace(project, companions=companions, load_cases=cases), project)


def rename_joint(project: Project, old: str, new: str) -> Project:
    """The project with the joint marked `old` marked `new`, in loads and limits as well."""
    cases = _each(project.load_cases, lambda case: _records_of(case, "joint_loads", "joint", old, new))
    limits = project.limits
    for key, end in LIMIT_JOINTS:
        limits = _records_of(limits, key, end, old, new)
    fresh = structs.replace(
        project,
        joints=_renamed(project.joints, "mark", old, new),
        companions=with_joints_marked(project.companions, {old: new}),
        load_cases=cases,
        limits=limits,
    )
    return checked(fresh, project)


def number_joints(project: Project) -> Project:
    """The project with its joints that are numbers numbered 0…n along the chain; other marks stay.

    A number stands for the joint's place in the chain, so joint 3 is the fourth, also behind one with a name.
    All change at once, since one by one each would meet the one whose mark it takes.
    """
    marks = {
        joint.mark: str(place)
        for place, joint in enumerate(project.joints)
        if joint.mark.isdecimal() and joint.mark != str(place)
    }
    if not marks:
        return project
    cases = _each(project.load_cases, lambda case: _marked(case, "joint_loads", "joint", marks))
    limits = project.limits
    for key, end in LIMIT_JOINTS:
        limits = _marked(limits, key, end, marks)
    fresh = structs.replace(
        project,
        joints=tuple(structs.replace(j, mark=marks.get(j.mark, j.mark)) for j in project.joints),
        companions=with_joints_marked(project.companions, marks),
        load_cases=cases,
        limits=limits,
    )
    return checked(fresh, project)


def rename_material(project: Project, old: str, new: str) -> Project:
    """The project with the material `old` called `new`, in all segments as well."""
    own = _renamed(project.segments, "material", old, new)
    segments = mapped(own, lambda segment: with_materials_named(segment, {old: new}))
    materials = _renamed(project.materials, "name", old, new)
    companions = with_segments(
        project.companions,
        lambda segment: structs.replace(segment, material=new) if segment.material == old else segment,
    )
    fresh = structs.replace(project, materials=materials, segments=segments, companions=companions)
    return checked(fresh, project)


def rename_case(project: Project, old: str, new: str) -> Project:
    """The project with the load case `old` called `new`, in the combinations' factors as well."""
    cases = _renamed(project.load_cases, "name", old, new)
    combinations = project.combinations
    if any(old in combination.factors for combination in combinations):
        combinations = tuple(
            structs.replace(combination, factors=_with_key(combination.factors, old, new))
            if old in combination.factors
            else combination
            for combination in combinations
        )
    return checked(structs.replace(project, load_cases=cases, combinations=combinations), project)


def rename_combination(project: Project, old: str, new: str) -> Project:
    """The project with the combination `old` called `new`, in the ranges of fatigue as well."""
    combinations = _renamed(project.combinations, "name", old, new)
    fatigue = _renamed(_renamed(project.fatigue, "start", old, new), "end", old, new)
    return checked(structs.replace(project, combinations=combinations, fatigue=fatigue), project)


RENAMERS: Mapping[tuple[str | int, str | int], _Renamer] = {
    ("segments", "mark"): rename_segment,
    ("joints", "mark"): rename_joint,
    ("materials", "name"): rename_material,
    ("load_cases", "name"): rename_case,
    ("combinations", "name"): rename_combination,
}


def is_of_a_name(place: Place) -> bool:
    """Whether what stands at the place is a mark or name that others may refer to."""
    if len(place) == 3:
        return (place[0], place[2]) in RENAMERS
    return len(place) == 5 and place[0] == "companions" and place[4] == "mark"


def rename(project: Project, place: Place, new: str) -> Project:
    """Rename what stands at the place of a mark or name, such as ("joints", 1, "mark")."""
    if place[0] == "companions":
        old = project.companions[int(place[1])].segments[int(place[3])]
        return rename_companion_segment(project, old.mark, new)
    record = getattr(project, str(place[0]))[place[1]]
    return RENAMERS[place[0], place[2]](project, getattr(record, str(place[2])), new)


def _renamed(records: tuple[_R, ...], key: str, old: str, new: str) -> tuple[_R, ...]:
    """The records with `old` replaced by `new` under `key`; the very same list where nothing names `old`."""
    if all(getattr(record, key) != old for record in records):
        return records
    return tuple(
        structs.replace(record, **{key: new}) if getattr(record, key) == old else record for record in records
    )


def _records_of(holder: _R, field: str, key: str, old: str, new: str) -> _R:
    """The holder with `old` replaced in the records of one of its lists; itself where nothing names `old`."""
    records = getattr(holder, field)
    renamed = _renamed(records, key, old, new)
    return holder if renamed is records else structs.replace(holder, **{field: renamed})


def _marked(holder: _R, field: str, key: str, marks: Mapping[str, str]) -> _R:
    """The holder with all of these marks replaced at once in one of its lists; itself where it names none."""
    records = getattr(holder, field, ())
    if not any(getattr(record, key) in marks for record in records or ()):
        return holder
    renamed = [
        structs.replace(record, **{key: marks.get(getattr(record, key), getattr(record, key))})
        for record in records
    ]
    return structs.replace(holder, **{field: tuple(renamed)})


def _each(cases: tuple[LoadCase, ...], change: Callable[[LoadCase], LoadCase]) -> tuple[LoadCase, ...]:
    return tuple(change(case) for case in cases) if cases else cases


def _with_key(factors: Mapping[str, float], old: str, new: str) -> dict[str, float]:
    """The factors with a key renamed in its place; a key already called `new` stays for the check to find."""
    return {(new if key == old else key): factor for key, factor in factors.items()}
