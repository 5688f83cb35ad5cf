"""Whose a load on the drawing is: a state may show loads of several cases, and only one of them is edited.

A hand on a load that the edited case has no part in must not put a new one into it by the way; putting on is
what the symbols are for. What is refused names the case to choose.
"""

from __future__ import annotations

from typing import Final

from app.drawing.shapes import LOADS, Part, PartKind
from app.hand.cells import case_share
from app.hand.kinds import KINDS, Kind
from app.hand.putting import has
from app.shown import Shown
from app.words import tr
from solver.model import Project, supports_of

ENDS: Final[dict[PartKind, PartKind]] = {"distributed_end": "distributed"}
_APART: Final = ("support", "companion")  # of which what is clicked is no thing by itself, or one of several
_BY_PART: Final[dict[PartKind, Kind]] = {kind.part: kind for kind in KINDS if kind.part not in _APART}
_FREE: Final = next(kind for kind in KINDS if kind.key == "free")


def whole(part: Part) -> Part:
    """The thing that a part is of: a distributed load for its end."""
    return Part(ENDS.get(part.kind, part.kind), part.index, part.number)


def kind_of(part: Part) -> Kind | None:
    """The kind of thing that can be taken off where a part of the drawing shows it; None for other parts."""
    return _FREE if part.kind == "support" else _BY_PART.get(whole(part).kind)


def is_there(part: Part, project: Project, case: int | None) -> bool:
    """Whether there is such a thing, for a load in the case."""
    kind = kind_of(part)
    count = len(project.joints if kind is not None and kind.on == "joint" else project.segments)
    if kind is None or part.index >= count:
        return False
    if kind is _FREE:
        return part.number < len(supports_of(project.joints[part.index]))
    return has(kind, project, part.index, case)


def owners(part: Part, project: Project, shown: Shown) -> tuple[int, ...]:
    """The cases with such a load there that take part in what is shown."""
    return tuple(
        case
        for case in range(len(project.load_cases))
        if case_share(project, shown, case) and is_there(part, project, case)
    )


def why_not_here(part: Part, project: Project, shown: Shown, case: int | None) -> str:
    """Why the edited case cannot be changed by a hand on a load that is shown; empty where it can."""
    if part.kind not in LOADS or is_there(part, project, case):
        return ""
    names = [project.load_cases[owner].name for owner in owners(part, project, shown)]
    if not names:
        return ""
    if len(names) == 1:
        words = tr("this load is of {case}: choose {case} at “Edit loads of” (Ctrl+L)")
        return words.format(case=names[0])
    words = tr("this load is of {cases}: choose one of them at “Edit loads of” (Ctrl+L)")
    return words.format(cases=", ".join(names))
