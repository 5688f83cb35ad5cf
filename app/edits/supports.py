"""Taking supports off: a movement goes with its support, without which nothing could be solved."""

from __future__ import annotations

from collections.abc import Iterable

from msgspec import UNSET, UnsetType, structs

from app.edits.checking import consistent
from app.edits.records import expanded, mapped, with_cases
from app.encode import plain
from solver.model import Joint, JointLoad, LoadCase, Project


def free_joints(project: Project, indexes: Iterable[int]) -> Project:
    """The project without the supports of these joints and their movements in every case.

    A load record that held nothing but a movement goes as a whole.
    """
    marks = {project.joints[index].mark for index in indexes}

    def freed(joint: Joint) -> Joint:
        held = joint.mark in marks and not isinstance(joint.support, UnsetType)
        return structs.replace(joint, support=UNSET) if held else joint

    def still(case: LoadCase) -> LoadCase:
        loads = expanded(case.joint_loads, lambda load: _still(load) if load.joint in marks else (load,))
        return case if loads is case.joint_loads else structs.replace(case, joint_loads=loads)

    fresh = structs.replace(project, joints=mapped(project.joints, freed))
    return consistent(with_cases(fresh, still), project)


def _still(load: JointLoad) -> tuple[JointLoad, ...]:
    """The load without its movement; nothing where that was all."""
    if load.movement == 0.0:
        return (load,)
    left = plain(load)
    del left["movement"]
    values = {key: getattr(load, key) for key in left}
    return (JointLoad(**values),) if set(left) != {"joint"} else ()


def moving_joints(project: Project, indexes: Iterable[int]) -> tuple[str, ...]:
    """The marks of those of the joints whose support moves in some case."""
    moving = {load.joint for case in project.load_cases for load in case.joint_loads if load.movement != 0.0}
    marks = (project.joints[index].mark for index in indexes)
    return tuple(mark for mark in marks if mark in moving)
