"""Companions: putting them beside the member, growing them, taking them off, and making their length fit.

A companion hangs on two joints by their marks. What happens to the chain between them can leave it too long
or too short; that is never mended unasked, it keeps the member from being solved and is said.
"""

from __future__ import annotations

from collections.abc import Callable, Collection, Iterable, Mapping
from fractions import Fraction
from string import ascii_lowercase

from msgspec import structs

from app.edits.checking import checked, refused
from app.edits.linear import exact, parted, rounded, turned
from app.edits.records import expanded, kept, mapped, with_cases
from solver.model import AnySection, Companion, CompanionSegment, Project, Segment, end_of
from solver.rules_of_companions import LENGTH_TOLERANCE

_Segments = tuple[CompanionSegment, ...]


def add_companion(project: Project, start: str, end: str, mark: str = "") -> Project:
    """The project with a companion between two joints, made as one segment that fits.

    It begins with the material and section of the first segment beside it, in either order of the joints.
    EditError where there are no such joints or the mark is taken.
    """
    places = {joint.mark: index for index, joint in enumerate(project.joints)}
    if places.get(start, 0) > places.get(end, 0):
        start, end = end, start
    mark = mark or fresh_companion_mark(project)
    like = project.segments[min(places.get(start, 0), len(project.segments) - 1)]
    length = span_of(project, start, end) or like.length  # of no span: the check says what is wrong
    piece = CompanionSegment(fresh_piece_mark(project, mark), length, like.material, at_start(like))
    made = Companion(mark=mark, start=start, end=end, segments=(piece,))
    return checked(structs.replace(project, companions=(*project.companions, made)))


def span_of(project: Project, start: str, end: str) -> float:
    """The decimal sum of the lengths between two joints; 0 where there is no such span."""
    places = {joint.mark: index for index, joint in enumerate(project.joints)}
    between = project.segments[places.get(start, 0) : places.get(end, 0)]
    return rounded(_sum(segment.length for segment in between))


def _sum(lengths: Iterable[float]) -> Fraction:
    return sum(map(exact, lengths), Fraction(0))


def at_start(segment: Segment) -> AnySection:
    """The section that a segment begins with, all along."""
    section = segment.section
    sizes = {name: getattr(section, name) for name in section.__struct_fields__ if not name.endswith("_end")}
    return type(section)(**sizes)


def _at_end(section: AnySection) -> AnySection:
    sizes = {name: getattr(section, name) for name in section.__struct_fields__ if not name.endswith("_end")}
    ends = {name: end_of(size, getattr(section, f"{name}_end")) for name, size in sizes.items()}
    return type(section)(**ends)


def extend_companion(project: Project, companion: int) -> Project:
    """The project with one more segment at the end of a companion, of its end's section.

    It is as long as what is missing; where nothing is missing, the last segment gives it half of its length.
    """
    found = project.companions[companion]
    last, missing = found.segments[-1], missing_length(project, found)
    mark = fresh_piece_mark(project, found.mark)
    if missing > 0:
        segments = (
            *found.segments,
            structs.replace(last, mark=mark, length=missing, section=_at_end(last.section)),
        )
    else:
        first, rest = parted(last.length, rounded(exact(last.length) / 2))
        halves = (structs.replace(last, length=first), structs.replace(last, mark=mark, length=rest))
        segments = (*found.segments[:-1], *halves)
    return _with(project, companion, segments)


def span_joints(project: Project, companion: int, start: str, end: str) -> Project:
    """The project with a companion between two other joints; its lengths stay."""
    fresh = list(project.companions)
    fresh[companion] = structs.replace(fresh[companion], start=start, end=end)
    return checked(structs.replace(project, companions=tuple(fresh)))


def is_unfit(project: Project, companion: Companion) -> bool:
    """Whether a companion is too long or too short for its span, as the solver sees it."""
    span = span_of(project, companion.start, companion.end)
    return abs(missing_length(project, companion)) > LENGTH_TOLERANCE * span


def missing_length(project: Project, companion: Companion) -> float:
    """How much a companion is too short for its span, in decimals; negative where it is too long."""
    span = span_of(project, companion.start, companion.end)
    return rounded(exact(span) - _sum(segment.length for segment in companion.segments))


def fit_companion(project: Project, companion: int) -> Project:
    """The project whose companion's last segment has the length that makes all add up to the span.

    EditError where the others alone are too long for that.
    """
    found = project.companions[companion]
    last = found.segments[-1]
    length = rounded(exact(last.length) + exact(missing_length(project, found)))
    if length <= 0:
        raise refused(("companions", companion, "segments"), "companion_full", companion=found.mark)
    return _with(project, companion, (*found.segments[:-1], structs.replace(last, length=length)))


def _with(project: Project, companion: int, segments: _Segments) -> Project:
    fresh = list(project.companions)
    fresh[companion] = structs.replace(fresh[companion], segments=segments)
    return checked(structs.replace(project, companions=tuple(fresh)))


def remove_companions(project: Project, indices: Iterable[int]) -> Project:
    """The project without these companions and the loads on them."""
    gone = set(indices)
    return checked(without(project, lambda index, _segment: index in gone))


def remove_companion_segments(project: Project, places: Collection[tuple[int, int]]) -> Project:
    """The project without these segments (companion, number) and their loads.

    A companion goes with its last segment.
    """
    numbers = {project.companions[index].segments[number].mark for index, number in places}
    return checked(without(project, lambda _index, segment: segment.mark in numbers))


def without(project: Project, is_gone: Callable[[int, CompanionSegment], bool]) -> Project:
    """The project without some of its companions' segments, and what goes with them; not checked."""
    marks = {s.mark for i, c in enumerate(project.companions) for s in c.segments if is_gone(i, s)}
    if not marks:
        return project

    def rest(companion: Companion) -> tuple[Companion, ...]:
        segments = kept(companion.segments, lambda segment: segment.mark not in marks)
        return (structs.replace(companion, segments=segments),) if segments else ()

    fresh = structs.replace(project, companions=expanded(project.companions, rest))
    return with_cases(
        fresh,
        lambda case: structs.replace(
            case, segment_loads=kept(case.segment_loads, lambda load: load.segment not in marks)
        ),
    )


def without_those_at(project: Project, joints: Collection[str]) -> Project:
    """The project without the companions that end at one of these joints; not checked."""
    gone = set(companions_at(project, joints))
    return (
        without(project, lambda index, _segment: project.companions[index].mark in gone) if gone else project
    )


def companions_at(project: Project, joints: Collection[str]) -> tuple[str, ...]:
    """The marks of the companions that end at one of these joints."""
    return tuple(c.mark for c in project.companions if {c.start, c.end} & set(joints))


def turned_companion(companion: Companion, marks: Mapping[str, str] | None = None) -> Companion:
    """The companion seen from the member's other end, with joints of these marks.

    It is tied at its first joint again, so one that acts one way only parts at what was its first joint.
    """
    named = marks or {}
    return structs.replace(
        companion,
        start=named.get(companion.end, companion.end),
        end=named.get(companion.start, companion.start),
        segments=tuple(structs.replace(s, section=turned(s.section)) for s in reversed(companion.segments)),
    )


def with_joints_marked(companions: tuple[Companion, ...], marks: Mapping[str, str]) -> tuple[Companion, ...]:
    """The companions with the joints that they hang on under other marks."""

    def marked(companion: Companion) -> Companion:
        if not {companion.start, companion.end} & set(marks):
            return companion
        start, end = (marks.get(mark, mark) for mark in (companion.start, companion.end))
        return structs.replace(companion, start=start, end=end)

    return mapped(companions, marked)


def with_segments(
    companions: tuple[Companion, ...], change: Callable[[CompanionSegment], CompanionSegment]
) -> tuple[Companion, ...]:
    """The companions with each of their segments changed."""

    def changed(companion: Companion) -> Companion:
        segments = mapped(companion.segments, change)
        return companion if segments is companion.segments else structs.replace(companion, segments=segments)

    return mapped(companions, changed)


def segment_marks(project: Project) -> list[str]:
    """The marks of all segments, of the member and of its companions."""
    beside = (segment.mark for companion in project.companions for segment in companion.segments)
    return [*(segment.mark for segment in project.segments), *beside]


def fresh_companion_mark(project: Project) -> str:
    """C1, C2, …: the first that no companion has."""
    taken, number = {companion.mark for companion in project.companions}, 1
    while f"C{number}" in taken:
        number += 1
    return f"C{number}"


def fresh_piece_mark(project: Project, companion: str) -> str:
    """The companion's mark with the first letter (then number) behind it that no segment has."""
    taken = set(segment_marks(project))
    free = (f"{companion}{letter}" for letter in ascii_lowercase if f"{companion}{letter}" not in taken)
    mark, number = next(free, ""), 1
    while not mark or mark in taken:
        mark, number = f"{companion}.{number}", number + 1
    return mark
