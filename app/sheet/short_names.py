"""Names so long that they would burst a table are cut for the sheet, each to a text of its own.

The names are cut in a copy of the results, so that every sentence made from them stays whole. The project in
the PDF's attachment keeps the full names.
"""

from __future__ import annotations

import dataclasses
from collections.abc import Iterable, Mapping
from typing import Final

from msgspec import structs

from app.edits.bonded import with_materials_named
from app.edits.companions import segment_marks
from app.phrases.states import state_words
from app.sheet.printable import shortened
from solver.checks import Check
from solver.model import Companion, LoadCase, Project
from solver.results import PartResults, Results, StateKind

LONGEST: Final = 32
LONGEST_MARK: Final = 18


@dataclasses.dataclass(frozen=True, slots=True)
class _Names:
    """Old name to shown name, by what is named."""

    segments: Mapping[str, str]
    joints: Mapping[str, str]
    materials: Mapping[str, str]
    cases: Mapping[str, str]
    combinations: Mapping[str, str]
    companions: Mapping[str, str]


def with_short_names(results: Results) -> Results:
    """The same results with long names cut; the very same object where none is long."""
    names = _names_of(results.project)
    ours = any(state_words(state.name) != state.name for state in results.states)
    if not ours and all(old == new for mapping in _mappings(names) for old, new in mapping.items()):
        return results
    return dataclasses.replace(
        results,
        project=_renamed(results.project, names),
        states=tuple(
            dataclasses.replace(
                state,
                name=_of_kind(names, state.kind).get(state.name, state_words(state.name)),
                factors={names.cases.get(name, name): value for name, value in state.factors.items()},
            )
            for state in results.states
        ),
        parts=_parts(results.parts, names),
        checks=tuple(_check(check, names) for check in results.checks),
        governing=_check(results.governing, names) if results.governing else None,
    )


def _mappings(names: _Names) -> tuple[Mapping[str, str], ...]:
    every = (getattr(names, field.name) for field in dataclasses.fields(names))
    return tuple(every)


def _of_kind(names: _Names, kind: StateKind) -> Mapping[str, str]:
    return names.combinations if kind == "combination" else names.cases


def _names_of(project: Project) -> _Names:
    return _Names(
        distinct(segment_marks(project), LONGEST_MARK),
        distinct((j.mark for j in project.joints), LONGEST_MARK),
        distinct((m.name for m in project.materials), LONGEST),
        distinct((c.name for c in project.load_cases), LONGEST),
        distinct((c.name for c in project.combinations), LONGEST),
        distinct((c.mark for c in project.companions), LONGEST_MARK),
    )


def distinct(names: Iterable[str], length: int) -> dict[str, str]:
    """Each name on one line and at most `length` characters long; those cut alike get their number."""
    shown: dict[str, str] = {}
    taken: set[str] = set()
    for number, name in enumerate(names, start=1):
        short = shortened(name, length) or f"({number})"
        if short in taken:
            short = f"{shortened(short, length - 7)} ({number})"
        taken.add(short)
        shown[name] = short
    return shown


def _renamed(project: Project, names: _Names) -> Project:
    return structs.replace(
        project,
        materials=tuple(structs.replace(m, name=names.materials[m.name]) for m in project.materials),
        joints=tuple(structs.replace(j, mark=names.joints[j.mark]) for j in project.joints),
        segments=tuple(
            structs.replace(
                with_materials_named(s, names.materials),
                mark=names.segments[s.mark],
                material=names.materials[s.material],
            )
            for s in project.segments
        ),
        companions=tuple(_companion(companion, names) for companion in project.companions),
        load_cases=tuple(_case(case, names) for case in project.load_cases),
        combinations=tuple(
            structs.replace(
                c,
                name=names.combinations[c.name],
                factors={names.cases[name]: factor for name, factor in c.factors.items()},
            )
            for c in project.combinations
        ),
        fatigue=tuple(
            structs.replace(v, start=names.combinations[v.start], end=names.combinations[v.end])
            for v in project.fatigue
        ),
        limits=structs.replace(
            project.limits,
            displacement=tuple(
                structs.replace(v, joint=names.joints[v.joint]) for v in project.limits.displacement
            ),
            relative=tuple(
                structs.replace(v, start=names.joints[v.start], end=names.joints[v.end])
                for v in project.limits.relative
            ),
            reaction=tuple(structs.replace(v, joint=names.joints[v.joint]) for v in project.limits.reaction),
        ),
    )


def _parts(parts: PartResults | None, names: _Names) -> PartResults | None:
    if parts is None:
        return None
    return dataclasses.replace(parts, material=tuple(names.materials[name] for name in parts.material))


def _companion(companion: Companion, names: _Names) -> Companion:
    return structs.replace(
        companion,
        mark=names.companions[companion.mark],
        start=names.joints[companion.start],
        end=names.joints[companion.end],
        segments=tuple(
            structs.replace(s, mark=names.segments[s.mark], material=names.materials[s.material])
            for s in companion.segments
        ),
    )


def _case(case: LoadCase, names: _Names) -> LoadCase:
    return structs.replace(
        case,
        name=names.cases[case.name],
        segment_loads=tuple(
            structs.replace(load, segment=names.segments[load.segment]) for load in case.segment_loads
        ),
        joint_loads=tuple(structs.replace(load, joint=names.joints[load.joint]) for load in case.joint_loads),
    )


def _check(check: Check, names: _Names) -> Check:
    return structs.replace(
        check,
        combination=(names.combinations or names.cases).get(
            check.combination, state_words(check.combination)
        ),
        segment=None if check.segment is None else names.segments[check.segment],
        material=None if check.material is None else names.materials[check.material],
        joint=None if check.joint is None else names.joints[check.joint],
        start=None if check.start is None else names.joints[check.start],
        end=None if check.end is None else names.joints[check.end],
        between=check.between and tuple(names.combinations[name] for name in check.between),
    )
