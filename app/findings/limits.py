"""The limits on displacements and reactions, the worst first; and what was not checked, by reason."""

from __future__ import annotations

from collections.abc import Iterable, Mapping, Sequence

from app.beside import beside
from app.findings.listing import listed
from app.findings.records import LimitFinding, NotMade
from app.findings.subjects import subject_of, worst_first
from app.phrases.checks import NOT_MADE, check_sentence, remedy_text, state_text, why_text
from app.phrases.shoulders import not_made_words
from app.phrases.stability import factor_text
from app.units import utilisation_text
from app.words import tr
from solver.checks import STRESSES, Check, Reason
from solver.model import UnitSystemName
from solver.results import Results

_Group = tuple[Reason, str, str, float | None]  # reason, material, kind, and how far out of range


def limit_findings(
    results: Results, system: UnitSystemName, checks: Iterable[Check]
) -> tuple[LimitFinding, ...]:
    """One finding for each limit, shoulder and place of fatigue checked among `checks` of the results."""
    project = results.project
    joints = {joint.mark: index for index, joint in enumerate(project.joints)}
    segments = {segment.mark: index for index, segment in enumerate(project.segments)}
    companions = {of.segment.mark: index for index, of in enumerate(beside(project))}
    worst = worst_first(check for check in checks if check.check not in STRESSES)
    return tuple(_finding(check, joints, (segments, companions), system) for check in worst)


def _finding(
    check: Check,
    joints: Mapping[str, int],
    segments: tuple[Mapping[str, int], Mapping[str, int]],
    system: UnitSystemName,
) -> LimitFinding:
    """`segments` are the places of the member's, and of the companions' among themselves."""
    marks = (check.joint, check.start, check.end)
    mark = check.segment if check.joint is None else None
    on_member, on_companion = (_at(places, mark) for places in segments)
    utilisation = check.utilisation or 0.0
    return LimitFinding(
        subject=subject_of(check),
        joints=tuple(joints[mark] for mark in marks if mark is not None),
        segments=on_member,
        sentence=check_sentence(check, system),
        state=check.combination,
        utilisation=utilisation,
        utilisation_text=utilisation_text(utilisation, check.status),
        status=check.status,
        position=check.position,
        companions=on_companion,
    )


def _at(places: Mapping[str, int], mark: str | None) -> tuple[int, ...]:
    """The place of a mark, if it is among them."""
    return () if mark is None or mark not in places else (places[mark],)


def not_made(results: Results, among: Iterable[Check]) -> tuple[NotMade, ...]:
    """The checks not made `among` those of the results, together by reason and material, as they come up."""
    materials = {segment.mark: segment.material for segment in results.project.segments}
    materials |= {of.segment.mark: of.segment.material for of in beside(results.project)}
    groups: dict[_Group, list[Check]] = {}
    for check in among:
        if check.reason is not None and check.waiver is None:
            material = check.material or materials.get(check.segment or "", "")
            groups.setdefault((check.reason, material, _kind(check), check.ratio), []).append(check)
    return tuple(
        _not_made(reason, material, checks, results) for (reason, material, *_), checks in groups.items()
    )


def _kind(check: Check) -> str:
    """What was not checked, where one reason can keep from several things."""
    return "" if check.check in STRESSES else subject_of(check).kind


def _not_made(reason: Reason, material: str, checks: Sequence[Check], results: Results) -> NotMade:
    project = results.project
    segments = {check.segment for check in checks if check.joint is None} | _unknown(reason, results)
    joints = {check.joint for check in checks}
    states = list(dict.fromkeys(map(state_text, checks)))
    places = list(dict.fromkeys(c.segment for c in checks if c.joint is None and c.segment is not None))
    places += [j.mark for j in project.joints if j.mark in joints]
    template = tr(NOT_MADE[reason]) if reason in NOT_MADE else not_made_words(checks[0])
    return NotMade(
        reason=reason,
        material=material,
        sentence=template.format(
            places=listed(places),
            states=listed(states),
            reason=why_text(reason, checks[0].ratio),
            factor=_least_factor(checks),
        ),
        remedy=remedy_text(reason, material),
        count=len(checks),
        marks=tuple(places),
        segments=tuple(i for i, s in enumerate(project.segments) if s.mark in segments),
        joints=tuple(i for i, j in enumerate(project.joints) if j.mark in joints),
        companions=tuple(i for i, of in enumerate(beside(project)) if of.segment.mark in segments),
    )


def _unknown(reason: Reason, results: Results) -> set[str | None]:
    """The marks of the segments whose second moment stability lacks."""
    if reason != "no_second_moment":
        return set()
    places = {place for found in results.stability if found is not None for place in found.segments}
    return {results.project.segments[place].mark for place in places}


def _least_factor(checks: Sequence[Check]) -> str:
    """The smallest critical factor of checks that have one and were not made all the same."""
    found = [check.value for check in checks if check.check == "stability" and check.value is not None]
    return factor_text(min(found)) if found else ""
