"""The limits on displacements and reactions, the worst first; and what was not checked, by reason."""

from __future__ import annotations

from collections.abc import Iterable, Mapping, Sequence

from app.findings.listing import listed
from app.findings.records import LimitFinding, NotMade
from app.findings.subjects import subject_of, worst_first
from app.phrases.checks import NOT_MADE, check_sentence, remedy_text
from app.units import utilisation_text
from app.words import tr
from solver.checks import Check, Reason
from solver.model import Project, UnitSystemName
from solver.results import Results


def limit_findings(
    results: Results, system: UnitSystemName, checks: Iterable[Check]
) -> tuple[LimitFinding, ...]:
    """One finding for each limit that was checked among `checks` of the results."""
    places = {joint.mark: index for index, joint in enumerate(results.project.joints)}
    worst = worst_first(check for check in checks if check.segment is None)
    return tuple(_finding(check, places, system) for check in worst)


def _finding(check: Check, places: Mapping[str, int], system: UnitSystemName) -> LimitFinding:
    marks = (check.joint, check.start, check.end)
    utilisation = check.utilisation or 0.0
    return LimitFinding(
        subject=subject_of(check),
        joints=tuple(places[mark] for mark in marks if mark is not None),
        sentence=check_sentence(check, system),
        state=check.combination,
        utilisation=utilisation,
        utilisation_text=utilisation_text(utilisation, check.status),
        status=check.status,
        position=check.position,
    )


def not_made(results: Results, among: Iterable[Check]) -> tuple[NotMade, ...]:
    """The checks not made `among` those of the results, together by reason and material, as they come up."""
    materials = {segment.mark: segment.material for segment in results.project.segments}
    groups: dict[tuple[Reason, str], list[Check]] = {}
    for check in among:
        if check.reason is not None:
            groups.setdefault((check.reason, materials.get(check.segment or "", "")), []).append(check)
    return tuple(
        _not_made(reason, material, checks, results.project) for (reason, material), checks in groups.items()
    )


def _not_made(reason: Reason, material: str, checks: Sequence[Check], project: Project) -> NotMade:
    segments = {check.segment for check in checks}
    joints = {check.joint for check in checks}
    states = list(dict.fromkeys(check.combination for check in checks))
    places = [s.mark for s in project.segments if s.mark in segments]
    places += [j.mark for j in project.joints if j.mark in joints]
    return NotMade(
        reason=reason,
        material=material,
        sentence=tr(NOT_MADE[reason]).format(places=listed(places), states=listed(states)),
        remedy=remedy_text(reason, material),
        count=len(checks),
        marks=tuple(places),
        segments=tuple(i for i, s in enumerate(project.segments) if s.mark in segments),
        joints=tuple(i for i, j in enumerate(project.joints) if j.mark in joints),
    )
