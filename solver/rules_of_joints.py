"""Rules of what a joint carries beside its mark: its supports, its shoulder."""

from __future__ import annotations

from collections.abc import Iterator

from msgspec import UNSET

from solver.absent import AbsentList
from solver.faults import Fault, place_text
from solver.model import Project, Shoulder
from solver.readable import records


def joint_faults(project: Project) -> Iterator[Fault]:
    """One support or a list of them; a shoulder by its fillet or by its factor."""
    for index, joint in records(project.joints):
        if joint is None:
            continue
        if joint.support is not UNSET and not isinstance(joint.supports, AbsentList):
            facts = {"key": "supports", "other": "support"}
            yield Fault(place_text(("joints", index)), "both_keys", facts)
        if isinstance(joint.shoulder, Shoulder):
            yield from _shoulder_faults(joint.shoulder, place_text(("joints", index, "shoulder")))


def _shoulder_faults(shoulder: Shoulder, place: str) -> Iterator[Fault]:
    radius, factor = shoulder.fillet_radius, shoulder.factor
    if radius is UNSET and factor is UNSET:
        yield Fault(place, "neither_key", {"key": "fillet_radius", "other": "factor"})
    if radius is not UNSET and factor is not UNSET:
        yield Fault(place, "both_keys", {"key": "factor", "other": "fillet_radius"})
