"""Mirroring the half: the member becomes symmetrical about its far end, which is then its middle.

Segments and joints follow in reverse order with start and end swapped. Forces, loads and movements turn round
with the side they are on; temperatures, lack of fit and bedding stay. Companions have images too, and limits
of joints are those of their mirror images. The middle joint keeps its support; a force or movement of its own
would push the halves the same way, which no symmetry has, so it is taken off. Gravity acts on both halves
alike and stays.
"""

from __future__ import annotations

from collections.abc import Callable, Sequence

from msgspec import structs

from app.edits.checking import checked
from app.edits.companions import segment_marks, turned_companion
from app.edits.copying import Marks, with_companions_copied, with_loads_copied
from app.edits.member import joint_load_turned, joint_turned, segment_load_turned, segment_turned
from app.edits.records import FreshMarks, kept, with_cases
from app.encode import is_absent
from solver.model import Companion, Limits, LoadCase, Project


def mirror_member(project: Project) -> Project:
    """The project with the whole member's mirror image put behind its far end."""
    middle = project.joints[-1].mark
    segments = _marks_of_images([segment.mark for segment in project.segments], "", segment_marks(project))
    joints = _marks_of_images([joint.mark for joint in project.joints[:-1]], middle)
    fresh = structs.replace(
        project,
        segments=(*project.segments, *_images(project, segments)),
        joints=(*project.joints, *_joint_images(project, joints)),
        limits=_limits_mirrored(project.limits, joints, middle),
    )
    fresh, beside = with_companions_copied(fresh, project.companions, _turned_to({**joints, middle: middle}))
    fresh = with_cases(fresh, lambda case: _without_joint(case, middle))
    return checked(
        with_loads_copied(fresh, [{**segments, **beside}], [joints], segment_load_turned, joint_load_turned)
    )


def _turned_to(joints: Marks) -> Callable[[Companion], Companion]:
    return lambda companion: turned_companion(companion, joints)


def _marks_of_images(marks: list[str], middle: str, others: Sequence[str] = ()) -> Marks:
    """A mark for the image of each, from the middle on; `middle` has none, and is gone on from.

    `others` are taken as well.
    """
    taken = [*marks, middle] if middle else marks
    fresh = FreshMarks((*taken, *others))
    return dict(zip(reversed(marks), fresh.in_turn(len(marks), taken[-1]), strict=True))


def _images(project: Project, marks: Marks) -> tuple[object, ...]:
    turned = (segment_turned(segment) for segment in reversed(project.segments))
    return tuple(structs.replace(segment, mark=marks[segment.mark]) for segment in turned)


def _joint_images(project: Project, marks: Marks) -> tuple[object, ...]:
    turned = (joint_turned(joint) for joint in reversed(project.joints[:-1]))
    return tuple(structs.replace(joint, mark=marks[joint.mark]) for joint in turned)


def _without_joint(case: LoadCase, mark: str) -> LoadCase:
    return structs.replace(case, joint_loads=kept(case.joint_loads, lambda load: load.joint != mark))


def _limits_mirrored(limits: Limits, marks: Marks, middle: str) -> Limits:
    """The limits, and those of the mirror images; one between a joint and the middle has an image too."""
    if is_absent(limits):
        return limits
    images = {**marks, middle: middle}
    moved = [x for x in limits.displacement if x.joint in marks]
    apart = [x for x in limits.relative if x.start in marks or x.end in marks]
    held = [x for x in limits.reaction if x.joint in marks]
    return structs.replace(
        limits,
        displacement=_with(limits.displacement, [structs.replace(x, joint=marks[x.joint]) for x in moved]),
        relative=_with(
            limits.relative,
            [structs.replace(x, start=images[x.start], end=images[x.end]) for x in apart],
        ),
        reaction=_with(limits.reaction, [structs.replace(x, joint=marks[x.joint]) for x in held]),
    )


def _with(limits: tuple[object, ...], images: list[object]) -> tuple[object, ...]:
    return (*limits, *images) if images else limits
