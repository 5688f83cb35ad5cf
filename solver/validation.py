"""What makes a project well formed as a whole, and what keeps a well-formed one from being solved.

The rules of a single value (types, sizes greater than zero) are in the model's types; here is what concerns
records together: marks, references, the number of joints, inner below outer. A project read from a faulty
file holds None where a part could not be read: such parts are passed over, so that one fault neither hides
the others nor brings forth new ones.
"""

from __future__ import annotations

from collections.abc import Iterator
from functools import cache
from itertools import chain

from msgspec import UNSET

from solver.faults import Fault, Place, place_text
from solver.model import AreaSection, LoadCase, Project, TubeSection, end_of, supports_of
from solver.nearest import nearest
from solver.readable import duplicates, names, records, text
from solver.rules_of_companions import companion_faults, companion_segments, length_faults
from solver.rules_of_joints import joint_faults


def faults(project: Project) -> tuple[Fault, ...]:
    """All faults of records together; empty for a well-formed project."""
    rules = (
        _count_faults,
        _mark_faults,
        joint_faults,
        companion_faults,
        _reference_faults,
        _section_faults,
        _limit_faults,
    )
    return tuple(chain.from_iterable(rule(project) for rule in rules))


def unsolvable(project: Project) -> tuple[Fault, ...]:
    """What keeps a well-formed project from being solved: not held, a movement without support, lengths."""
    rules = (_hold_faults, _movement_faults, length_faults)
    return tuple(chain.from_iterable(rule(project) for rule in rules))


# --- records together ---


def _count_faults(project: Project) -> Iterator[Fault]:
    segments, joints = project.segments, project.joints
    if isinstance(segments, tuple) and not segments:
        yield Fault("segments", "too_few_segments")
    elif isinstance(segments, tuple) and isinstance(joints, tuple) and len(joints) != len(segments) + 1:
        yield Fault("joints", "joint_count", {"joints": len(joints), "segments": len(segments)})


_NAMED = (
    ("materials", "name"),
    ("joints", "mark"),
    ("companions", "mark"),
    ("load_cases", "name"),
    ("combinations", "name"),
)


def _mark_faults(project: Project) -> Iterator[Fault]:
    for name, key in _NAMED:
        listed = getattr(project, name)
        if not _all_differ(listed, key):
            yield from duplicates([((name, index, key), text(r, key)) for index, r in records(listed)])
    beside = [((*place, "mark"), text(segment, "mark")) for place, segment in companion_segments(project)]
    if beside or not _all_differ(project.segments, "mark"):
        own = [(("segments", index, "mark"), text(s, "mark")) for index, s in records(project.segments)]
        yield from duplicates([*own, *beside])


def _all_differ(records: object, key: str) -> bool:
    """Whether they do, at a glance: every edit asks this of every list."""
    marks = [getattr(record, key, None) for record in records] if isinstance(records, tuple) else []
    return set(map(type, marks)) <= {str} and len(set(marks)) == len(marks)


# --- references ---

_KINDS = {
    "joint": ("joints", "mark"),
    "material": ("materials", "name"),
    "load case": ("load_cases", "name"),
    "combination": ("combinations", "name"),
}
_Reference = tuple[str, Place, object]


def _reference_faults(project: Project) -> Iterator[Fault]:
    known_names = {kind: names(getattr(project, field), key) for kind, (field, key) in _KINDS.items()}
    known_names["segment"] = _segment_marks(project)
    suggest = cache(lambda kind, value: nearest(value, known_names[kind] or ()))
    for kind, place, value in _references(project):
        known = known_names[kind]
        if known is not None and isinstance(value, str) and value not in known:
            facts = {"kind": kind, "value": value, "nearest": suggest(kind, value)}
            yield Fault(place_text(place), "unknown_reference", facts)


def _segment_marks(project: Project) -> dict[str, None] | None:
    """The marks of the member's segments and of the companions'; None where one could not be read."""
    own = names(project.segments, "mark")
    lists = [getattr(companion, "segments", None) for _, companion in records(project.companions)]
    beside = [names(segments, "mark") for segments in lists]
    if own is None or None in beside or not isinstance(project.companions, tuple):
        return None
    return dict.fromkeys(chain(own, *(marks for marks in beside if marks)))


def _references(project: Project) -> Iterator[_Reference]:
    """Everything that names another record: of what kind, where, and the name."""
    for place, part in _parts(project):
        yield "material", (*place, "material"), text(part, "material")
    for index, companion in records(project.companions):
        yield "joint", ("companions", index, "from"), text(companion, "start")
        yield "joint", ("companions", index, "to"), text(companion, "end")
    for index, case in records(project.load_cases):
        yield from _load_references(case, ("load_cases", index))
    for index, combination in records(project.combinations):
        factors = getattr(combination, "factors", None)
        for name in factors if isinstance(factors, dict) else ():
            yield "load case", ("combinations", index, "factors", name), name
    for index, span in records(project.fatigue):
        yield "combination", ("fatigue", index, "from"), text(span, "start")
        yield "combination", ("fatigue", index, "to"), text(span, "end")
    yield from _limit_references(project)


def _parts(project: Project) -> Iterator[tuple[Place, object]]:
    """All that has a material and a section: segments, what is bonded to them, companions' segments."""
    for index, segment in records(project.segments):
        yield ("segments", index), segment
        for number, part in records(getattr(segment, "bonded", None)):
            yield ("segments", index, "bonded", number), part
    yield from companion_segments(project)


def _load_references(case: LoadCase, place: Place) -> Iterator[_Reference]:
    for key, kind in (("segment_loads", "segment"), ("joint_loads", "joint")):
        for index, load in records(getattr(case, key, None)):
            yield kind, (*place, key, index, kind), text(load, kind)


def _limit_references(project: Project) -> Iterator[_Reference]:
    for key, ends in (("displacement", ("joint",)), ("relative", ("start", "end")), ("reaction", ("joint",))):
        for index, limit in records(getattr(project.limits, key, None)):
            for end in ends:
                file_key = {"start": "from", "end": "to"}.get(end, end)
                yield "joint", ("limits", key, index, file_key), text(limit, end)


# --- sections and limits ---


def _section_faults(project: Project) -> Iterator[Fault]:
    for part, record in _parts(project):
        section, place = getattr(record, "section", None), (*part, "section")
        if isinstance(section, TubeSection):
            yield from _wall_faults(section, place)
        if isinstance(section, AreaSection) and _ends_in_nothing(section):
            yield Fault(place_text(place), "missing_key", {"key": "second_moment"})


def _ends_in_nothing(section: AreaSection) -> bool:
    """Whether the second moment is known at the end only."""
    return section.second_moment is UNSET and section.second_moment_end is not UNSET


def _wall_faults(tube: TubeSection, place: Place) -> Iterator[Fault]:
    """Both dimensions are linear, so inner is below outer everywhere when it is at both ends."""
    yield from _wall_fault(tube.inner, tube.outer, "start", (*place, "inner"))
    if (tube.inner_end, tube.outer_end) != (UNSET, UNSET):
        key = "outer_end" if tube.inner_end is UNSET else "inner_end"
        inner, outer = end_of(tube.inner, tube.inner_end), end_of(tube.outer, tube.outer_end)
        yield from _wall_fault(inner, outer, "end", (*place, key))


def _wall_fault(inner: object, outer: object, end: str, place: Place) -> Iterator[Fault]:
    if isinstance(inner, float) and isinstance(outer, float) and not inner < outer:
        facts = {"inner": inner, "outer": outer, "end": end}
        yield Fault(place_text(place), "inner_not_below_outer", facts)


def _limit_faults(project: Project) -> Iterator[Fault]:
    for key in ("displacement", "reaction"):
        yield from _duplicate_limits(key, getattr(project.limits, key, None))
    for index, limit in records(getattr(project.limits, "relative", None)):
        start, end = text(limit, "start"), text(limit, "end")
        if start is not None and start == end:
            yield Fault(place_text(("limits", "relative", index, "to")), "same_joint", {"joint": end})
    yield from _waiver_faults(getattr(project.limits, "waived", None))
    for index, span in records(project.fatigue):
        start, end = text(span, "start"), text(span, "end")
        if start is not None and start == end:
            yield Fault(place_text(("fatigue", index, "to")), "same_combination", {"combination": end})


def _waiver_faults(waived: object) -> Iterator[Fault]:
    """A check is waived once, with one reason."""
    named = [(("limits", "waived", index, "check"), text(w, "check")) for index, w in records(waived)]
    yield from duplicates(named)
    for index, waiver in records(waived):
        reason = text(waiver, "reason")
        if reason is not None and not reason.strip():
            yield Fault(place_text(("limits", "waived", index, "reason")), "no_reason")


def _duplicate_limits(key: str, limits: object) -> Iterator[Fault]:
    first: dict[str, int] = {}
    for index, limit in records(limits):
        joint = text(limit, "joint")
        if joint is not None and first.setdefault(joint, index) != index:
            facts = {"joint": joint, "first": place_text(("limits", key, first[joint], "joint"))}
            yield Fault(place_text(("limits", key, index, "joint")), "duplicate_limit", facts)


# --- solvability ---


def _hold_faults(project: Project) -> Iterator[Fault]:
    """Held by any support or bedding; whether a stop holds depends on the loads, so it counts here."""
    supported = any(supports_of(joint) for joint in project.joints)
    bedded = any(s.bedding > 0 or end_of(s.bedding, s.bedding_end) > 0 for s in project.segments)
    if not (supported or bedded):
        yield Fault("joints", "not_held")


def _movement_faults(project: Project) -> Iterator[Fault]:
    free = {joint.mark for joint in project.joints if not supports_of(joint)}
    for index, case in enumerate(project.load_cases):
        for number, load in enumerate(case.joint_loads):
            if load.movement != 0 and load.joint in free:
                place = ("load_cases", index, "joint_loads", number, "movement")
                facts = {"joint": load.joint, "case": case.name}
                yield Fault(place_text(place), "movement_without_support", facts)
