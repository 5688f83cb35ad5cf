"""Putting things of the table of kinds on joints and segments, and taking them off again: pure edits.

A load goes into the case whose loads are edited; where there is none yet, one is made. What is there already
stays as it is, so that putting the same on again only leads to its value. Self-weight points down: against
+x where the member stands upright, along +x where it lies across (a member that hangs).
"""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass
from typing import Final, Literal

from msgspec import UNSET, UnsetType
from msgspec.structs import replace

from app import edits
from app.drawing.shapes import Part, PartKind
from app.entry import parse_entry
from app.hand.bonding import bond, materials_added
from app.hand.cells import Cell, cell_of
from app.hand.companions import companions_beside, lay_beside
from app.hand.freeing import gone_with_supports
from app.hand.kinds import Kind
from app.hand.shoulders import begun_shoulder, is_at_end
from app.lateral_entry import LateralKey, hold_of
from app.support_entry import Supports, parse_supports
from app.words import tr
from solver.model import FixedSupport, LoadCase, Project, SpringSupport, StopSupport, supports_of


class NotPut(ValueError):  # noqa: N818 - its message is the sentence for the status line
    """Something cannot be put there."""


@dataclass(frozen=True, slots=True)
class Put:
    """The project with it, its case, the cells that hold it, and what else was done, in words."""

    project: Project
    case: int | None
    cells: tuple[Cell, ...]
    note: str = ""


def put_on(kind: Kind, project: Project, indexes: Iterable[int], case: int | None) -> Put:
    """The project with a thing of this kind on each of the joints or segments (on the member: once).

    NotPut or EditError where one of them cannot take it; then nothing is changed.
    """
    where = (0,) if kind.on == "member" else tuple(indexes)
    if kind.part == "companion":
        fresh, cells, note = lay_beside(project, where)
        return Put(fresh, case, cells, note)
    note = ""
    if kind.of_case and case is None:
        project, case, note = _with_case(project)
    old = project
    for index in where:
        if not _is_there(kind, project, index, case):
            project = _put(kind, project, index, case)
    found = (cell_of(Part(kind.part, index), project, case) for index in where)
    return Put(
        project,
        case,
        tuple(cell for cell in found if cell is not None),
        note or materials_added(old, project) or gone_with_supports(old, project),
    )


def _with_case(project: Project) -> tuple[Project, int, str]:
    """A first load case, and a line that says so; where combinations are checked it has no factor yet."""
    name = tr("Loads")
    made = edits.add_record(project, ("load_cases",), LoadCase(name))
    words = tr("load case {name} was made for it")
    if project.combinations:
        words = tr("load case {name} was made for it; give it its factors in Combinations")
    return made, 0, words.format(name=name)


def _is_there(kind: Kind, project: Project, index: int, case: int | None) -> bool:
    """Whether such a thing is there already."""
    if kind.part == "support":
        there = supports_of(project.joints[index])
        return bool(_of_this_kind(kind, there)) if _support(kind, project) else not there
    if kind.part == "bonded":
        return bool(project.segments[index].bonded)
    if kind.part == "bedding":
        return any(_written(getattr(project.segments[index], key)) for key in kind.keys)
    if kind.part == "shoulder":
        return bool(project.joints[index].shoulder)
    if kind.part in LATERAL:
        return hold_of(project.joints[index].lateral, LATERAL[kind.part]) != "free"
    if kind.part == "gravity":
        return case is not None and project.load_cases[case].gravity != 0.0
    loads = loads_of(kind, project, index, case)
    return any(_written(getattr(load, key)) for load in loads for key in kind.keys)


def _written(value: float | UnsetType) -> bool:
    return not isinstance(value, UnsetType) and value != 0.0


def loads_of(kind: Kind, project: Project, index: int, case: int | None) -> tuple[object, ...]:
    """The records of the case on a joint or a segment."""
    if case is None:
        return ()
    if kind.on == "joint":
        joints, mark = project.load_cases[case].joint_loads, project.joints[index].mark
        return tuple(load for load in joints if load.joint == mark)
    mark = project.segments[index].mark
    return tuple(load for load in project.load_cases[case].segment_loads if load.segment == mark)


def _support(kind: Kind, project: Project) -> Supports:
    """What a support begins with; none for a free joint."""
    system = project.display.unit_system
    return parse_supports(kind.begins_in(system), system)


def _of_this_kind(kind: Kind, supports: Supports) -> Supports:
    return tuple(support for support in supports if _TYPES.get(kind.key) is type(support))


def _held_with(kind: Kind, project: Project, index: int) -> Supports:
    """The supports of a joint with one more: a stop and a spring act beside others, a wall makes them idle.

    At the first joint a stop stands before the member's end, as it does behind it at any other.
    """
    fresh, held = _support(kind, project), supports_of(project.joints[index])
    if kind.key == "stop":
        side: Literal["plus", "minus"] = "plus" if index else "minus"
        fresh = tuple(replace(stop, side=side) for stop in fresh if isinstance(stop, StopSupport))
        return (*(other for other in held if not isinstance(other, FixedSupport)), *fresh)
    if kind.key == "spring":
        return (*fresh, *(other for other in held if isinstance(other, StopSupport)))
    return fresh


LATERAL: Final[dict[PartKind, LateralKey]] = {"lateral": "translation", "turning": "rotation"}
_TYPES: Final = {"fixed": FixedSupport, "spring": SpringSupport, "stop": StopSupport}


def _begins(kind: Kind, project: Project) -> float:
    system = project.display.unit_system
    value = parse_entry(kind.begins_in(system), kind.quantity, system)
    upright = project.display.layout == "vertical"
    return -value if kind.part == "gravity" and upright else value


def _put(kind: Kind, project: Project, index: int, case: int | None) -> Project:
    if kind.part == "support":
        return edits.hold_joint(project, index, _held_with(kind, project, index))
    if kind.part == "bonded":
        return bond(project, index, kind.begins_in(project.display.unit_system))
    if kind.part == "bedding":
        return edits.set_value(project, ("segments", index, "bedding"), _begins(kind, project))
    if kind.part == "shoulder":
        return _with_shoulder(kind, project, index)
    if kind.part in LATERAL:
        return edits.hold_sideways(project, (index,), LATERAL[kind.part], "fixed")
    if kind.part == "movement" and not supports_of(project.joints[index]):
        words = tr("joint {mark} has no support that could move: put one on first")
        raise NotPut(words.format(mark=project.joints[index].mark))
    return _set_load(kind, project, index, case, kind.keys[0], _begins(kind, project))


def _with_shoulder(kind: Kind, project: Project, joint: int) -> Project:
    if is_at_end(project, joint):
        words = tr("joint {mark} is an end of the member, where there is no step")
        raise NotPut(words.format(mark=project.joints[joint].mark))
    system = project.display.unit_system
    shoulder = begun_shoulder(project, joint, kind.begins_in(system), system)
    return edits.set_value(project, ("joints", joint, "shoulder"), shoulder)


def _set_load(
    kind: Kind, project: Project, index: int, case: int | None, key: str, value: float | UnsetType
) -> Project:
    """One key of the load in the case."""
    if case is None:
        return project
    name = project.load_cases[case].name
    if kind.on == "member":
        return edits.set_value(project, ("load_cases", case, key), value)
    if kind.on == "joint":
        return edits.set_joint_load(project, name, project.joints[index].mark, key, value)
    return edits.set_segment_load(project, name, project.segments[index].mark, key, value)


def take_off(kind: Kind, project: Project, indexes: Iterable[int], case: int | None) -> Project:
    """The project without such a thing on each of them; EditError where several loads stand behind one."""
    if kind.part == "companion":
        return edits.remove_companions(project, companions_beside(project, indexes))
    for index in (0,) if kind.on == "member" else tuple(indexes):
        if not has(kind, project, index, case):
            continue
        for key in reversed(kind.keys):  # the end before the start that it would follow
            project = _taken_off(kind, project, index, case, key)
    return project


def _taken_off(kind: Kind, project: Project, index: int, case: int | None, key: str) -> Project:
    if kind.of_case:
        return _set_load(kind, project, index, case, key, UNSET)
    if kind.part == "support":
        supports = supports_of(project.joints[index])
        own = _of_this_kind(kind, supports)
        return edits.hold_joint(project, index, tuple(s for s in supports if s not in own))
    if kind.part in LATERAL:
        return edits.hold_sideways(project, (index,), LATERAL[kind.part], UNSET)
    records = "joints" if kind.on == "joint" else "segments"
    return edits.set_value(project, (records, index, key), UNSET)


def has(kind: Kind, project: Project, index: int, case: int | None) -> bool:
    """Whether there is something of this kind that can be taken off."""
    if kind.part == "companion":
        return bool(companions_beside(project, (index,)))
    if kind.part == "support":
        return bool(_of_this_kind(kind, supports_of(project.joints[index])))
    return _is_there(kind, project, index, case)
