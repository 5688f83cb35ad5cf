"""Whether a change leaves a project well formed, asked only of the records that it changed.

Edits come by hundreds in a row where a value goes to all that is selected or rows are pasted, and each is
judged by itself. What it left alone is the very same object in both projects, so it is found at a glance. The
answer is on the safe side: where it is not sure, the rules are asked of the whole (`solver.validation`).
"""

from __future__ import annotations

from collections.abc import Sequence
from itertools import compress, count, zip_longest
from operator import attrgetter, is_not
from typing import Any, Final

from msgspec import structs

from solver import validation
from solver.model import Limits, LoadCase, Project

_Span = tuple[Sequence[Any], Sequence[Any]]  # records as they are now, and as they were

_NAMED: Final = (("materials", "name"), ("joints", "mark"), ("segments", "mark"), ("load_cases", "name"))
_LOADS: Final = (("segment_loads", "segment", "segments"), ("joint_loads", "joint", "joints"))


def is_surely_sound(project: Project, since: Project) -> bool:
    """Whether it is as well formed as the project it was made from; False where that is not sure.

    Values by themselves are taken to be right. Companions tie joints, marks and lengths together: not sure.
    """
    return (
        not (project.companions or since.companions)
        and project.fatigue is since.fatigue
        and project.combinations is since.combinations
        and project.limits is since.limits
        and len(project.joints) == len(project.segments) + 1
        and all(_names_stay(getattr(project, key), getattr(since, key), name) for key, name in _NAMED)
        and _segments_are_sound(project, since)
        and all(_loads_are_sound(project, since, *kind) for kind in _LOADS)
    )


def changed(new: Sequence[Any], old: Sequence[Any]) -> _Span:
    """All that lies between what is the very same record at both ends."""
    if new is old:
        return (), ()
    front = unchanged_before(new, old)
    new, old = new[front:], old[front:]
    back = unchanged_before(new[::-1], old[::-1])
    return new[: len(new) - back], old[: len(old) - back]


def unchanged_before(new: Sequence[Any], old: Sequence[Any]) -> int:
    """How many records are the very same from the front on, before the first that is not."""
    return next(compress(count(), map(is_not, new, old)), min(len(new), len(old)))


def _names_stay(new: Sequence[Any], old: Sequence[Any], name: str) -> bool:
    """Whether no name is lost that something may refer to, and none is given twice."""
    now, before = (list(map(attrgetter(name), records)) for records in changed(new, old))
    if now == before:
        return True
    return set(now).issuperset(before) and len(set(map(attrgetter(name), new))) == len(new)


def _segments_are_sound(project: Project, since: Project) -> bool:
    """Whether the changed segments are, by the rules of the whole."""
    segments, _old = changed(project.segments, since.segments)
    if not segments:
        return True
    joints = project.joints[: len(segments) + 1]
    rest = {"load_cases": (), "combinations": (), "fatigue": (), "limits": Limits()}
    return not validation.faults(structs.replace(project, segments=segments, joints=joints, **rest))


def _loads_are_sound(project: Project, since: Project, loads: str, key: str, named: str) -> bool:
    """Whether the changed loads lie on what there is."""
    cases, before = changed(project.load_cases, since.load_cases)
    nothing = LoadCase("")
    for case, old in zip_longest(cases, before, fillvalue=nothing):
        spans = changed(getattr(case, loads), getattr(old, loads))
        on, was_on = (set(map(attrgetter(key), records)) for records in spans)
        if not on <= was_on and not on <= set(map(attrgetter("mark"), getattr(project, named))):
            return False
    return True
