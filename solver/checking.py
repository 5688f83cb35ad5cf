"""The making of checks: one record for each comparison, in the contract's order, and the verdict over them.

By combination, then along the chain (tension before compression), then the peak stresses at shoulders, then
the limits on displacement, relative displacement and reaction, then stability; fatigue, which is of two
combinations, comes last. The numbers of stresses come compared from `solver.allowables`; here they get their
names.
"""

from __future__ import annotations

import math
from collections.abc import Iterator
from dataclasses import dataclass
from typing import Literal

import numpy as np
from msgspec import Struct

from solver.allowables import Side, StressChecks
from solver.arrays import FloatArray
from solver.checks import Check, Reason, Verdict, status_of
from solver.fatigue import FatigueChecker
from solver.model import Project, supports_of
from solver.peaks import PeakChecker
from solver.results import PartResults, State
from solver.solution import Solution
from solver.stability import Stability
from solver.stability_checks import stability_checks

_MISSING: dict[Literal["tension", "compression"], Reason] = {
    "tension": "no_allowable_tension",
    "compression": "no_allowable_compression",
}


@dataclass(frozen=True, slots=True)
class Checker:
    """Makes the checks of one project from what was computed."""

    project: Project
    states: tuple[State, ...]
    solution: Solution
    position: FloatArray
    stress: StressChecks  # by segment, or by part where there are `parts`
    peaks: PeakChecker
    stability: tuple[Stability | None, ...]
    fatigue: FatigueChecker
    parts: PartResults | None = None
    beside: StressChecks | None = None  # of the companions' segments, one companion after the other

    def checks(self) -> tuple[Check, ...]:
        """All checks of the checked states, in order."""
        joints = {joint.mark: index for index, joint in enumerate(self.project.joints)}
        of_states = (
            check
            for index, state in enumerate(self.states)
            if state.checked
            for check in self._of_state(index, state.name, joints)
        )
        return (*of_states, *self.fatigue.checks())

    def _of_state(self, index: int, name: str, joints: dict[str, int]) -> Iterator[Check]:
        yield from self._stresses(index, name)
        yield from self.peaks.checks(index, self.states[index])
        yield from self._displacements(index, name, joints)
        yield from self._relatives(index, name, joints)
        yield from self._reactions(index, name, joints)
        yield from stability_checks(self.project, self.position, self.stability[index], name)

    def _stresses(self, index: int, name: str) -> Iterator[Check]:
        tension = list(_compared(self.stress.tension, index))
        compression = list(_compared(self.stress.compression, index))
        if self.parts is None:
            subjects = [_Subject(segment.mark) for segment in self.project.segments]
        else:
            subjects, order = _along_the_chain(self.project, self.parts)
            tension, compression = ([side[part] for part in order] for side in (tension, compression))
        if self.beside is not None:
            every = (segment for companion in self.project.companions for segment in companion.segments)
            subjects = [*subjects, *(_Subject(segment.mark) for segment in every)]
            tension += _compared(self.beside.tension, index)
            compression += _compared(self.beside.compression, index)
        for subject, pulled, pushed in zip(subjects, tension, compression, strict=True):
            if pulled.present:
                yield pulled.check("tension", name, subject)
            if pushed.present:
                yield pushed.check("compression", name, subject)

    def _displacements(self, index: int, name: str, joints: dict[str, int]) -> Iterator[Check]:
        for limit in self.project.limits.displacement:
            place = joints[limit.joint]
            value = float(self.solution.joint_displacement[index, place])
            yield self._at_joint("displacement", name, place, value, limit.limit)

    def _relatives(self, index: int, name: str, joints: dict[str, int]) -> Iterator[Check]:
        for limit in self.project.limits.relative:
            moved = self.solution.joint_displacement[index]
            value = abs(float(moved[joints[limit.end]] - moved[joints[limit.start]]))
            utilisation = value / limit.limit
            yield Check(
                check="relative",
                combination=name,
                status=status_of(utilisation),
                start=limit.start,
                end=limit.end,
                value=value,
                limit=float(limit.limit),
                utilisation=utilisation,
            )

    def _reactions(self, index: int, name: str, joints: dict[str, int]) -> Iterator[Check]:
        for limit in self.project.limits.reaction:
            place = joints[limit.joint]
            value = float(self.solution.reaction[index, place])
            if not supports_of(self.project.joints[place]):
                position = float(self.position[place])
                yield Check(
                    "reaction", name, "not_made", joint=limit.joint, position=position, reason="no_support"
                )
            else:
                yield self._at_joint("reaction", name, place, value, limit.limit)

    def _at_joint(
        self, kind: Literal["displacement", "reaction"], name: str, place: int, value: float, limit: float
    ) -> Check:
        utilisation = abs(value) / limit
        return Check(
            check=kind,
            combination=name,
            status=status_of(utilisation),
            joint=self.project.joints[place].mark,
            position=float(self.position[place]),
            value=value,
            limit=float(limit),
            utilisation=utilisation,
        )


class _Subject(Struct, frozen=True, gc=False):
    """A segment, or one of its bonded parts with its number and material."""

    segment: str
    part: int | None = None
    material: str | None = None


class _Compared(Struct, frozen=True, gc=False):
    """A segment's stress of one sign against its allowable; `limit` is NaN where there is none."""

    present: bool
    position: float
    value: float
    limit: float
    utilisation: float

    def check(self, kind: Literal["tension", "compression"], name: str, of: _Subject) -> Check:
        """The record."""
        if math.isnan(self.limit):
            return Check(
                check=kind,
                combination=name,
                status="not_made",
                segment=of.segment,
                part=of.part,
                material=of.material,
                position=self.position,
                reason=_MISSING[kind],
            )
        return Check(
            check=kind,
            combination=name,
            status=status_of(self.utilisation),
            segment=of.segment,
            part=of.part,
            material=of.material,
            position=self.position,
            value=self.value,
            limit=self.limit,
            utilisation=self.utilisation,
        )


def _compared(side: Side, index: int) -> Iterator[_Compared]:
    arrays = (side.present, side.at, side.value, side.limit, side.utilisation)
    return map(_Compared, *(array[index].tolist() for array in arrays))


def _along_the_chain(project: Project, parts: PartResults) -> tuple[list[_Subject], list[int]]:
    """Every part with its place among the parts, segment by segment, the segment's own part first."""
    order: list[int] = np.argsort(parts.segment, kind="stable").tolist()
    subjects = []
    for part in order:
        segment = project.segments[parts.segment[part]]
        named = (int(parts.number[part]), parts.material[part]) if segment.bonded else (None, None)
        subjects.append(_Subject(segment.mark, *named))
    return subjects, order


def verdict_of(checks: tuple[Check, ...]) -> Verdict:
    """`fail` if any check fails; else `incomplete` if any was not made, or none was; else `pass`.

    A waived check counts neither way, but alone it is no check.
    """
    statuses = {check.status for check in checks} - {"waived"}
    if "fail" in statuses:
        return "fail"
    return "pass" if statuses == {"pass"} else "incomplete"


def governing_of(checks: tuple[Check, ...]) -> Check | None:
    """The made check of largest utilisation, the first of equals; None where none was made."""
    made = [check for check in checks if check.utilisation is not None]
    return max(made, key=lambda check: check.utilisation or 0.0, default=None)
