"""The findings put together."""

from __future__ import annotations

from dataclasses import replace

from app.contacts import has_stops
from app.findings.books import displacements, state_books
from app.findings.companions import companion_findings
from app.findings.contacts import contact_findings
from app.findings.idle import idle_notes
from app.findings.limits import limit_findings, not_made
from app.findings.records import Findings
from app.findings.stability import stability_notes
from app.findings.stress import segment_findings
from app.phrases.checks import verdict_detail, verdict_line
from app.phrases.contacts import SUPERPOSITION
from app.phrases.notes import BEDDING, numerical_error_sentence
from app.units import format_value
from app.words import tr
from solver.model import UnitSystemName
from solver.results import Results


def findings(results: Results, system: UnitSystemName) -> Findings:
    """What there is to say about the results, in the display units of a system."""
    moved = displacements(results, system)
    checked = [index for index, state in enumerate(results.states) if state.checked]
    return Findings(
        verdict=results.verdict,
        headline=verdict_line(results),
        detail=verdict_detail(results),
        segments=segment_findings(results, system),
        limits=limit_findings(results, system, results.checks),
        not_made=not_made(results, results.checks),
        contacts=contact_findings(results, system),
        companions=companion_findings(results, system),
        notes=notes(results),
        books=state_books(results, system),
        displacements=moved,
        largest_displacement=max(moved, key=lambda joint: abs(joint.value)),
        mass_text=format_value(results.mass, "mass", system, with_unit=True),
        numerical_error=numerical_error_sentence(float(results.solution.error_bound[checked].max())),
    )


def findings_in(found: Findings, results: Results, state: str, system: UnitSystemName) -> Findings:
    """The findings with only those checks listed that one state has; the verdict stays that of all states."""
    checks = [check for check in results.checks if state in (check.between or (check.combination,))]
    return replace(
        found,
        segments=segment_findings(results, system, state),
        limits=limit_findings(results, system, checks),
        not_made=not_made(results, checks),
        contacts=contact_findings(results, system, state),
    )


def notes(results: Results) -> tuple[str, ...]:
    """What this calculation does not say, and what was entered in vain, where it matters for this member."""
    standing = list(stability_notes(results))
    if (results.chain.bedding > 0).any():
        standing.append(tr(BEDDING))
    if has_stops(results.project):
        standing.append(tr(SUPERPOSITION))
    return (*standing, *idle_notes(results))
