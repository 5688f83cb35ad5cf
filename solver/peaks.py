"""Peak stresses at shoulders: the nominal stress of the smaller side times its factor, and their allowable.

The allowable peak stress is for either sign and is scaled by the combination's factor on allowable stresses.
"""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass

from msgspec import UnsetType

from solver.arrays import FloatArray
from solver.checks import Check, Reason, status_of
from solver.extremes import Extremes
from solver.model import Project
from solver.results import State
from solver.shoulders import Notch


@dataclass(frozen=True, slots=True)
class PeakChecker:
    """Makes the checks of peak stress of one project, state by state."""

    project: Project
    position: FloatArray
    stress: Extremes
    zero: FloatArray  # (m,) up to this a stress is none
    shoulders: tuple[Notch, ...]

    def checks(self, index: int, state: State) -> Iterator[Check]:
        """The checks of one state along the chain."""
        for notch in self.shoulders:
            yield self._check(notch, index, state)

    def _check(self, notch: Notch, index: int, state: State) -> Check:
        allowable = self._allowable(notch)
        if notch.factor is None or allowable is None:
            return self._not_made(notch, state, notch.reason or "no_allowable_peak")
        side = self.stress.start if notch.at_start else self.stress.end
        nominal = float(side[index, notch.segment])
        nominal = 0.0 if abs(nominal) <= self.zero[index] else nominal
        value, limit = notch.factor * nominal, state.allowable_factor * allowable
        return Check(
            check="peak",
            combination=state.name,
            status=status_of(abs(value) / limit),
            segment=self.project.segments[notch.segment].mark,
            joint=self.project.joints[notch.joint].mark,
            position=float(self.position[notch.joint]),
            value=value,
            limit=limit,
            utilisation=abs(value) / limit,
            factor=notch.factor,
            nominal=nominal,
        )

    def _not_made(self, notch: Notch, state: State, reason: Reason) -> Check:
        return Check(
            "peak",
            state.name,
            "not_made",
            segment=self.project.segments[notch.segment].mark,
            joint=self.project.joints[notch.joint].mark,
            position=float(self.position[notch.joint]),
            reason=reason,
            factor=notch.factor,
            ratio=notch.ratio,
        )

    def _allowable(self, notch: Notch) -> float | None:
        name = self.project.segments[notch.segment].material
        found = next(material for material in self.project.materials if material.name == name)
        return None if isinstance(found.allowable_peak, UnsetType) else float(found.allowable_peak)
