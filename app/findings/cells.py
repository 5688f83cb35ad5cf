"""The table cell that is to be changed for a finding: a section, a limit, an allowable stress, a support."""

from __future__ import annotations

from collections.abc import Callable, Iterable
from typing import Final

from app.beside import index_of_mark
from app.findings.records import NotMade
from app.findings.subjects import Subject
from app.hand.cells import Cell
from solver.checks import Reason
from solver.model import Project

_ALLOWABLES: Final[dict[Reason, str]] = {
    "no_allowable_tension": "allowable_tension",
    "no_allowable_compression": "allowable_compression",
    "no_allowable_peak": "allowable_peak",
    "no_endurance": "endured_amplitude",
}
_OF_STABILITY: Final[dict[Reason, Cell]] = {
    "no_lateral": Cell("joints", 0, "lateral_translation"),
    "lateral_insufficient": Cell("joints", 0, "lateral_translation"),
    "no_stability_factor": Cell("limits stability", 0, "stability_factor"),
}


def cell_of_finding(of: Subject | NotMade | Cell, project: Project) -> Cell | None:
    """The cell; None where this project has no such thing (any more)."""
    if isinstance(of, Cell):
        return of if of.record < len(project.joints) else None
    return _of_missing(of, project) if isinstance(of, NotMade) else _of_subject(of, project)


def _of_subject(subject: Subject, project: Project) -> Cell | None:
    marks = subject.marks
    if subject.kind in ("peak", "fatigue_joint"):
        return _cell("joints", "shoulder", project.joints, lambda joint: (joint.mark,) == marks)
    if subject.kind in ("stress", "fatigue"):
        index = index_of_mark(project, marks[0])
        if index is not None:
            return Cell("companions", index, "section")
        return _cell("segments", "section", project.segments, lambda segment: (segment.mark,) == marks)
    if subject.kind == "stability":
        return Cell("limits stability", 0, "stability_factor")
    limits = getattr(project.limits, subject.kind)
    if subject.kind == "relative":
        return _cell("limits relative", "limit", limits, lambda limit: (limit.start, limit.end) == marks)
    return _cell(f"limits {subject.kind}", "limit", limits, lambda limit: (limit.joint,) == marks)


def _of_missing(missing: NotMade, project: Project) -> Cell | None:
    if missing.reason in _ALLOWABLES:
        column = _ALLOWABLES[missing.reason]
        return _cell("materials", column, project.materials, lambda found: found.name == missing.material)
    if missing.reason in _OF_STABILITY:
        return _OF_STABILITY[missing.reason]
    if missing.reason == "no_second_moment" and missing.segments:
        return Cell("segments", missing.segments[0], "section")
    column = "support" if missing.reason == "no_support" else "shoulder"
    return Cell("joints", missing.joints[0], column) if missing.joints else None


def _cell(table: str, column: str, records: Iterable[object], is_it: Callable[..., bool]) -> Cell | None:
    found = (index for index, record in enumerate(records) if is_it(record))
    index = next(found, None)
    return None if index is None else Cell(table, index, column)
