"""What holds a joint: other supports, or none. A movement goes with the last support, without which nothing
could be solved.
"""

from __future__ import annotations

from collections.abc import Iterable

from msgspec import UNSET, structs

from app.edits.cells import set_value
from app.edits.checking import consistent
from app.edits.records import expanded, mapped, with_cases
from app.encode import is_absent, plain
from solver.absent import absent_list
from solver.model import AnySupport, Joint, JointLoad, LoadCase, Project, supports_of


def hold_joint(project: Project, index: int, supports: tuple[AnySupport, ...]) -> Project:
    """The project with exactly these supports at a joint; EditError where one of them is not well formed.

    With none its movements go as well. The key that the joint already writes them in is kept where it fits.
    """
    if not supports:
        return free_joints(project, (index,))
    joint = project.joints[index]
    if len(supports) == 1 and is_absent(joint.supports):
        return set_value(project, ("joints", index, "support"), supports[0])
    bare = _with_joint(project, index, structs.replace(joint, support=UNSET, supports=absent_list()))
    if len(supports) == 1:
        return set_value(bare, ("joints", index, "support"), supports[0])
    return set_value(bare, ("joints", index, "supports"), supports)


def without_support(project: Project, index: int, number: int) -> Project:
    """The project without one of the supports of a joint, by its place among them."""
    supports = supports_of(project.joints[index])
    return hold_joint(project, index, (*supports[:number], *supports[number + 1 :]))


def free_joints(project: Project, indexes: Iterable[int]) -> Project:
    """The project without the supports of these joints and their movements in every case.

    A load record that held nothing but a movement goes as a whole.
    """
    marks = {project.joints[index].mark for index in indexes}

    def freed(joint: Joint) -> Joint:
        held = joint.mark in marks and bool(supports_of(joint))
        return structs.replace(joint, support=UNSET, supports=absent_list()) if held else joint

    def still(case: LoadCase) -> LoadCase:
        loads = expanded(case.joint_loads, lambda load: _still(load) if load.joint in marks else (load,))
        return case if loads is case.joint_loads else structs.replace(case, joint_loads=loads)

    fresh = structs.replace(project, joints=mapped(project.joints, freed))
    return consistent(with_cases(fresh, still), project)


def _with_joint(project: Project, index: int, joint: Joint) -> Project:
    joints = (*project.joints[:index], joint, *project.joints[index + 1 :])
    return structs.replace(project, joints=joints)


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
