"""Edits of the chain itself: insert, move, delete and reverse. Split and join are in `parts`.

A segment's own joint is the one at its far end, as in a row of the segment table: it comes and goes with the
segment, so the first joint always stays.
"""

from __future__ import annotations

from collections.abc import Iterable
from typing import TypeVar

from msgspec import Struct, UnsetType, structs

from app.edits.bonded import sections_turned, with_sections
from app.edits.checking import checked
from app.edits.companions import segment_marks, turned_companion, without_those_at
from app.edits.linear import turned
from app.edits.records import fresh_mark, kept, mapped, with_cases
from app.encode import is_absent
from solver.model import (
    AnySection,
    AnySupport,
    Joint,
    JointLoad,
    Limits,
    LoadCase,
    Project,
    Segment,
    SegmentLoad,
    StopSupport,
    end_of,
)

_R = TypeVar("_R", bound=Struct)


def insert_segment(
    project: Project, index: int, segment: Segment | None = None, joint: Joint | None = None
) -> Project:
    """The project with a segment put in at `index` (0…n), with a new joint at its far end.

    Without a segment given it is like its neighbour before (or after), with the parts bonded there, without
    taper and bedding.
    """
    if segment is None:
        segment = _like(project, max(index - 1, 0), at_start=index == 0)
    if joint is None:
        joint = fresh_joint(project, index)
    segments, joints = list(project.segments), list(project.joints)
    segments.insert(index, segment)
    joints.insert(index + 1, joint)
    return checked(structs.replace(project, segments=tuple(segments), joints=tuple(joints)), project)


def fresh_joint(project: Project, before: int) -> Joint:
    """A free joint with a mark of its own, in the manner of the joint with index `before`."""
    return Joint(fresh_mark((joint.mark for joint in project.joints), project.joints[before].mark))


def fresh_segment_mark(project: Project, like: str) -> str:
    """A mark that no segment has yet."""
    return fresh_mark(segment_marks(project), like)


def _like(project: Project, neighbour: int, *, at_start: bool) -> Segment:
    model = project.segments[neighbour]
    mark = fresh_segment_mark(project, model.mark)
    like = Segment(mark, model.length, model.material, model.section, bonded=model.bonded)
    return with_sections(like, lambda section: _prismatic(section, at_start=at_start))


def _prismatic(section: AnySection, *, at_start: bool) -> AnySection:
    """The section as it is at one end of its segment."""
    sizes = {name: getattr(section, name) for name in section.__struct_fields__ if not name.endswith("_end")}
    ends = {name: getattr(section, f"{name}_end") for name in sizes}
    if at_start:
        return type(section)(**sizes)
    return type(section)(**{name: end_of(size, ends[name]) for name, size in sizes.items()})


def move_segments(project: Project, indices: Iterable[int], before: int) -> Project:
    """The project with these segments, in their order, put before the one that is now at `before` (0…n).

    A segment travels with its section, material, bedding and loads, as they belong to its mark. The joints
    stay where they are in the chain, by their order, with their marks, supports, loads and limits: a bearing
    that was the second from the start still is, wherever that lies now. No support comes or goes by a move.
    """
    moving = set(indices)
    taken = [segment for index, segment in enumerate(project.segments) if index in moving]
    front = [segment for index, segment in enumerate(project.segments[:before]) if index not in moving]
    back = [s for index, s in enumerate(project.segments[before:], before) if index not in moving]
    return checked(structs.replace(project, segments=(*front, *taken, *back)))


def delete_segments(project: Project, indices: Iterable[int]) -> Project:
    """The project without these segments and their loads, and without their far joints, loads and limits.

    Companions that end at one of those joints go with it.
    """
    gone = set(indices)
    segments = tuple(segment for index, segment in enumerate(project.segments) if index not in gone)
    joints = tuple(joint for index, joint in enumerate(project.joints) if index - 1 not in gone)
    marks = {project.segments[index].mark for index in gone}
    joint_marks = far_joints(project, gone)
    fresh = structs.replace(
        without_those_at(project, joint_marks),
        segments=segments,
        joints=joints,
        limits=_limits_without(project.limits, joint_marks),
    )
    return checked(with_cases(fresh, lambda case: _without(case, marks, joint_marks)))


def far_joints(project: Project, indices: Iterable[int]) -> set[str]:
    """The marks of the joints that come and go with these segments."""
    return {project.joints[index + 1].mark for index in indices}


def _without(case: LoadCase, segments: set[str], joints: set[str]) -> LoadCase:
    segment_loads = kept(case.segment_loads, lambda load: load.segment not in segments)
    joint_loads = kept(case.joint_loads, lambda load: load.joint not in joints)
    return structs.replace(case, segment_loads=segment_loads, joint_loads=joint_loads)


def _limits_without(limits: Limits, joints: set[str]) -> Limits:
    if is_absent(limits):
        return limits
    return structs.replace(
        limits,
        displacement=kept(limits.displacement, lambda limit: limit.joint not in joints),
        relative=kept(limits.relative, lambda limit: not {limit.start, limit.end} & joints),
        reaction=kept(limits.reaction, lambda limit: limit.joint not in joints),
    )


def reverse_member(project: Project) -> Project:
    """The same member described from its other end; twice gives the project back."""
    fresh = structs.replace(
        project,
        joints=tuple(joint_turned(joint) for joint in reversed(project.joints)),
        segments=tuple(segment_turned(segment) for segment in reversed(project.segments)),
        companions=mapped(project.companions, turned_companion),
    )
    return checked(with_cases(fresh, _case_turned))


def joint_turned(joint: Joint) -> Joint:
    """The joint seen from the other end: every stop changes its side."""
    return structs.replace(
        joint,
        support=joint.support if isinstance(joint.support, UnsetType) else _support_turned(joint.support),
        supports=mapped(joint.supports, _support_turned),
    )


def _support_turned(support: AnySupport) -> AnySupport:
    if not isinstance(support, StopSupport):
        return support
    return structs.replace(support, side="minus" if support.side == "plus" else "plus")


def segment_turned(segment: Segment) -> Segment:
    """The segment seen from its other end."""
    return sections_turned(turned(segment))


def _case_turned(case: LoadCase) -> LoadCase:
    return structs.replace(
        _negated(case, "gravity"),
        segment_loads=mapped(case.segment_loads, segment_load_turned),
        joint_loads=mapped(case.joint_loads, joint_load_turned),
    )


def segment_load_turned(load: SegmentLoad) -> SegmentLoad:
    """The load seen from the segment's other end: what acts along x changes sign."""
    return _negated(turned(load), "load_start", "load_end")


def joint_load_turned(load: JointLoad) -> JointLoad:
    """The load seen from the other end: what acts along x changes sign."""
    return _negated(load, "force", "movement")


def _negated(record: _R, *keys: str) -> _R:
    """The record with these values negated; nothing stays as it is, a 0 without a sign and unwritten."""
    values = {key: getattr(record, key) for key in keys}
    return structs.replace(record, **{key: -value for key, value in values.items() if value})
