"""The check of stability of one state: the critical factor against the least that is required.

The allowable factor of a combination has no part in it: it is about stresses. A check that could not be made
is waived where the engineer gave a reason for doing without; a check that was made is never waived. A factor
that is known and below 1 is no missing check, whatever was entered: the loads themselves buckle the member.
"""

from __future__ import annotations

from collections.abc import Iterator

from msgspec import UnsetType

from solver.arrays import FloatArray
from solver.checks import Check, status_of
from solver.model import Project
from solver.stability import UNSTABLE, Stability


def stability_checks(
    project: Project, position: FloatArray, stability: Stability | None, name: str
) -> Iterator[Check]:
    """One check, or none where nothing is compressed."""
    if stability is None or stability.status == "no_compression":
        return
    required, factor = project.limits.stability_factor, stability.critical_factor
    if isinstance(required, UnsetType) and factor is not None and factor < UNSTABLE:
        required = UNSTABLE
    elif stability.reason is not None or factor is None or isinstance(required, UnsetType):
        waiver = waiver_of(project)
        yield Check(
            check="stability",
            combination=name,
            status="not_made" if waiver is None else "waived",
            value=factor,
            reason=stability.reason,
            waiver=waiver,
        )
        return
    utilisation = float(required) / factor
    yield Check(
        check="stability",
        combination=name,
        status=status_of(utilisation),
        position=_peak(position, stability),
        value=factor,
        limit=float(required),
        utilisation=utilisation,
    )


def waiver_of(project: Project) -> str | None:
    """The engineer's reason for doing without the check of stability."""
    for waiver in project.limits.waived:
        if waiver.check == "stability":
            return waiver.reason
    return None


def _peak(position: FloatArray, stability: Stability) -> float | None:
    """Where the member bends out most, m."""
    mode = stability.mode
    if mode is None:
        return None
    start, end = position[mode.peak_segment], position[mode.peak_segment + 1]
    return float(start + mode.peak * (end - start))
