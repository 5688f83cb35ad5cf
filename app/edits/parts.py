"""Splitting a segment and joining segments: the one undoes the other, to the last digit.

Joining runs straight from the first start to the last end. It is refused where that would lose something that
was put in on purpose: another material or shape, and whatever the joint between carries.
"""

from __future__ import annotations

from collections.abc import Iterator
from fractions import Fraction
from itertools import count, pairwise, zip_longest

from msgspec import UnsetType, structs

from app.edits.bonded import can_be_united, sections_cut, sections_united
from app.edits.checking import EditError, checked, refused
from app.edits.companions import companions_at
from app.edits.linear import cut, exact, parted, rounded, sum_of, united
from app.edits.member import fresh_joint, fresh_segment_mark
from app.edits.records import expanded, with_cases
from app.edits.renaming import LIMIT_JOINTS
from app.encode import is_absent
from solver.faults import Fault, place_text
from solver.model import LoadCase, Project, Segment, SegmentLoad, supports_of


def split_segment(project: Project, index: int, at: float) -> Project:
    """The project with a segment split at `at` (m from its start), a free joint between the two parts.

    The first part keeps the mark. EditError where `at` is not inside the segment.
    """
    whole = project.segments[index]
    if not 0 < at < whole.length:
        raise refused(("segments", index, "length"), "not_inside", length=whole.length, value=at)
    mark = fresh_segment_mark(project, whole.mark)
    fraction = exact(at) / exact(whole.length)
    segments, joints = list(project.segments), list(project.joints)
    segments[index : index + 1] = _segment_parts(whole, float(at), fraction, mark)
    joints.insert(index + 1, fresh_joint(project, index))
    fresh = structs.replace(project, segments=tuple(segments), joints=tuple(joints))
    return checked(with_cases(fresh, lambda case: _loads_split(case, whole.mark, mark, fraction)))


def _segment_parts(whole: Segment, at: float, fraction: Fraction, mark: str) -> tuple[Segment, Segment]:
    first, second = cut(whole, fraction)
    ones, others = sections_cut(whole, fraction)
    length, rest = parted(whole.length, at)
    return (
        structs.replace(first, length=length, section=ones.section, bonded=ones.bonded),
        structs.replace(second, mark=mark, length=rest, section=others.section, bonded=others.bonded),
    )


def _loads_split(case: LoadCase, old: str, new: str, fraction: Fraction) -> LoadCase:
    def parts(load: SegmentLoad) -> tuple[SegmentLoad, ...]:
        return _load_parts(load, new, fraction) if load.segment == old else (load,)

    return structs.replace(case, segment_loads=expanded(case.segment_loads, parts))


def _load_parts(load: SegmentLoad, mark: str, fraction: Fraction) -> tuple[SegmentLoad, SegmentLoad]:
    first, second = cut(load, fraction)
    second = structs.replace(second, segment=mark)
    if is_absent(load.lack_of_fit):
        return first, second
    share, rest = parted(load.lack_of_fit, rounded(exact(load.lack_of_fit) * fraction))
    return structs.replace(first, lack_of_fit=share), structs.replace(second, lack_of_fit=rest)


def join_segments(project: Project, first: int, last: int) -> Project:
    """The project with the segments `first` to `last` made one, marked as the first.

    EditError, naming every hindrance, where they differ in material or shape or where a joint between them
    has a support, a load, a shoulder or a limit.
    """
    faults = tuple(_hindrances(project, first, last))
    if faults:
        raise EditError(faults)
    for _ in range(last - first):
        project = _joined(project, first)
    return checked(project)


def _hindrances(project: Project, first: int, last: int) -> Iterator[Fault]:
    for index, other in pairwise(range(first, last + 1)):
        a, b = project.segments[index], project.segments[other]
        if a.material != b.material:
            yield Fault(place_text(("segments", other, "material")), "parts_differ", {"kind": "material"})
        if type(a.section) is not type(b.section):
            yield Fault(place_text(("segments", other, "section")), "parts_differ", {"kind": "section"})
        if not can_be_united(a, b):
            yield Fault(place_text(("segments", other, "bonded")), "parts_differ", {"kind": "bonded"})
        for what in carried(project, other):
            facts = {"joint": project.joints[other].mark, "kind": what}
            yield Fault(place_text(("joints", other)), "joint_carries", facts)


def carried(project: Project, index: int) -> Iterator[str]:
    """What the joint carries, by kind; nothing where joining over it loses nothing."""
    joint = project.joints[index]
    if supports_of(joint):
        yield "support"
    if joint.shoulder:
        yield "shoulder"
    if not isinstance(joint.lateral, UnsetType):
        yield "lateral support"
    if any(load.joint == joint.mark for case in project.load_cases for load in case.joint_loads):
        yield "load"
    if any(getattr(x, end) == joint.mark for key, end in LIMIT_JOINTS for x in getattr(project.limits, key)):
        yield "limit"
    if companions_at(project, (joint.mark,)):
        yield "companion"


def _joined(project: Project, index: int) -> Project:
    """Two neighbours made one."""
    first, second = project.segments[index : index + 2]
    sections = sections_united(first, second)
    whole = structs.replace(
        united(first, second),
        length=sum_of(first.length, second.length),
        section=sections.section,
        bonded=sections.bonded,
    )
    segments = (*project.segments[:index], whole, *project.segments[index + 2 :])
    joints = (*project.joints[: index + 1], *project.joints[index + 2 :])
    fresh = structs.replace(project, segments=segments, joints=joints)
    return with_cases(fresh, lambda case: _loads_joined(case, first.mark, second.mark))


def _loads_joined(case: LoadCase, first: str, second: str) -> LoadCase:
    """The k-th record of the one part with the k-th of the other; where one has fewer, with a blank."""
    ones = [load for load in case.segment_loads if load.segment == first]
    others = [load for load in case.segment_loads if load.segment == second]
    nothing = SegmentLoad(first)
    wholes = iter([_load_united(a, b) for a, b in zip_longest(ones, others, fillvalue=nothing)])
    numbers = count()

    def merged(load: SegmentLoad) -> tuple[SegmentLoad, ...]:
        if load.segment not in (first, second):
            return (load,)
        absorbed = load.segment == second and next(numbers) < len(ones)
        return () if absorbed else (next(wholes),)

    return structs.replace(case, segment_loads=expanded(case.segment_loads, merged))


def _load_united(first: SegmentLoad, second: SegmentLoad) -> SegmentLoad:
    load = united(first, second)
    if is_absent(first.lack_of_fit) and is_absent(second.lack_of_fit):
        return load
    return structs.replace(load, lack_of_fit=sum_of(first.lack_of_fit, second.lack_of_fit))
