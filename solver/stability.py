"""Stability of the member in every checked state: whether it is compressed, and what its critical factor is.

Elastic flexural buckling of the whole member under its own axial force, all loads of the state scaled
together. What keeps it from being checked is found first, from the least to the most costly; a factor that
can be computed is computed all the same, since the engineer who has entered none as required may want it.
Where stops are in contact, they stay as they are at factor 1. Companions neither brace nor load the member.
"""

from __future__ import annotations

from collections.abc import Callable, Iterator
from dataclasses import dataclass, replace
from typing import Literal, TypeAlias

import numpy as np
from msgspec import UnsetType

from solver.arrays import BoolArray, FloatArray, frozen
from solver.beam_mesh import Column
from solver.buckling import Buckled, critical_factors
from solver.buckling_mode import Mode
from solver.chain import Chain
from solver.checks import NO_STRESS, StabilityReason, status_of
from solver.model import BondedPart, Lateral, LateralHold, Project, Segment, parts_of
from solver.second_moments import second_moment, stretches
from solver.solution import Solution

UNSTABLE = 1.0  # a critical factor below this: the loads themselves buckle the member
StabilityStatus: TypeAlias = Literal["checked", "no_compression", "not_checked"]


@dataclass(frozen=True, slots=True)
class Stability:
    """Of one state. `critical_factor` and `mode` are there where they could be computed, checked or not.

    `segments` are the indices of those that the reason is about: without a second moment.
    """

    status: StabilityStatus
    critical_factor: float | None = None
    mode: Mode | None = None
    reason: StabilityReason | None = None
    segments: tuple[int, ...] = ()


_NO_COMPRESSION = Stability("no_compression")


@dataclass(frozen=True, slots=True)
class Assessor:
    """What all states have in common."""

    project: Project
    chain: Chain
    solution: Solution
    cancelled: Callable[[], bool]

    def states(self, compressed: BoolArray, beside: BoolArray) -> tuple[Stability, ...]:
        """The stability of every state (m,): which of them compress the member, and which a companion."""
        if not (compressed.any() or beside.any()):
            return (_NO_COMPRESSION,) * len(compressed)
        of_member = self._of_member([int(state) for state in np.flatnonzero(compressed)])
        return tuple(
            self._beside(of_member.get(state)) if squeezed else of_member.get(state, _NO_COMPRESSION)
            for state, squeezed in enumerate(beside)
        )

    def _of_member(self, pressed: list[int]) -> dict[int, Stability]:
        """Of the states that compress the member."""
        reason = held_reason(self.project)
        unknown = () if reason else tuple(_without_second_moment(self.project.segments))
        if unknown:
            reason = "no_second_moment"
        if reason or not pressed:
            return dict.fromkeys(pressed, Stability("not_checked", reason=reason, segments=unknown))
        column = column_of(self.project, self.chain)
        found = critical_factors(column, self.solution, pressed, self.cancelled)
        return {state: self._assessed(buckled) for state, buckled in found.items()}

    def _assessed(self, buckled: Buckled | None) -> Stability:
        if buckled is None:
            return Stability("not_checked", reason="not_settled")
        if isinstance(self.project.limits.stability_factor, UnsetType) and buckled.factor >= UNSTABLE:
            return Stability("not_checked", buckled.factor, buckled.mode, "no_stability_factor")
        return Stability("checked", buckled.factor, buckled.mode)

    def _beside(self, of_member: Stability | None) -> Stability:
        """Where a companion is compressed: it is not part of the beam, so that nothing is known of it.

        A member that fails by itself fails all the same; that is no missing check, which might be waived.
        """
        if of_member is None:
            return Stability("not_checked", reason="companion_compressed")
        if of_member.status == "checked" and self._fails(of_member):
            return of_member
        if of_member.reason in (None, "no_stability_factor"):
            return replace(of_member, status="not_checked", reason="companion_compressed")
        return of_member

    def _fails(self, stability: Stability) -> bool:
        required, factor = self.project.limits.stability_factor, stability.critical_factor
        if factor is None:
            return False
        least = UNSTABLE if isinstance(required, UnsetType) else required
        return status_of(least / factor) == "fail"


def compressed_states(forces: tuple[FloatArray, FloatArray], force_bound: FloatArray) -> BoolArray:
    """(m,) where an axial force, largest and smallest by segment, is compression beyond rounding."""
    largest, smallest = forces
    size = np.maximum(np.abs(largest), np.abs(smallest))
    zero = np.maximum(NO_STRESS * size.max(axis=1, keepdims=True), force_bound)
    return np.asarray((smallest < -zero).any(axis=1))


def held_reason(project: Project) -> StabilityReason | None:
    """What the lateral supports lack to hold the member as a rigid body; a chain has no hinges."""
    translations = [hold for joint in project.joints if (hold := stiffness(joint.lateral, "translation")) > 0]
    rotations = [hold for joint in project.joints if (hold := stiffness(joint.lateral, "rotation")) > 0]
    if len(translations) > 1 or (translations and rotations):
        return None
    return "lateral_insufficient" if translations or rotations else "no_lateral"


def stiffness(lateral: Lateral | UnsetType, key: Literal["translation", "rotation"]) -> float:
    """What holds a joint sideways: infinite where it is fixed, 0 where it is free."""
    hold: LateralHold | UnsetType = "free" if isinstance(lateral, UnsetType) else getattr(lateral, key)
    if isinstance(hold, UnsetType) or hold == "free":
        return 0.0
    return np.inf if hold == "fixed" else float(hold)


def _without_second_moment(segments: tuple[Segment, ...]) -> Iterator[int]:
    for index, segment in enumerate(segments):
        if any(second_moment(part.section) is None for part in parts_of(segment)):
            yield index


def column_of(project: Project, chain: Chain) -> Column:
    """The member as a beam; every second moment must be known."""
    modulus = {material.name: float(material.modulus) for material in project.materials}
    of, starts, rigidities = [], [], []
    for index, segment in enumerate(project.segments):
        parts = parts_of(segment)
        for start, end in stretches(tuple(part.section for part in parts)):
            of.append(index)
            starts.append(start)
            rigidities.append(_rigidity(parts, modulus, 0.5 * (start + end)))
    return Column(
        length=chain.length,
        segment=np.array(of, dtype=np.intp),
        start=frozen(np.array(starts)),
        rigidity=frozen(np.array(rigidities)),
        translation=_holds(project, "translation"),
        rotation=_holds(project, "rotation"),
    )


def _rigidity(parts: tuple[BondedPart, ...], modulus: dict[str, float], s: float) -> FloatArray:
    """Σ E I of what bends together, as it is about the fraction s."""
    each = [modulus[part.material] * _known(second_moment(part.section, s)) for part in parts]
    return np.asarray(np.sum(each, axis=0))


def _known(coefficients: FloatArray | None) -> FloatArray:
    if coefficients is None:
        raise ValueError("a second moment is unknown")
    return coefficients


def _holds(project: Project, key: Literal["translation", "rotation"]) -> FloatArray:
    return frozen(np.array([stiffness(joint.lateral, key) for joint in project.joints]))
