"""Results: everything a screen, a terminal or a sheet shows, computed once from the solution, frozen.

The fields along the member stay piecewise polynomials; `solver.fields` evaluates them where they are wanted.
"""

from __future__ import annotations

from dataclasses import dataclass, fields
from typing import Literal, TypeAlias

import numpy as np

from solver.arrays import BoolArray, FloatArray, IntArray
from solver.chain import Chain, Companions, Loads
from solver.checks import Check, Verdict
from solver.model import Project
from solver.solution import Solution
from solver.stability import Stability

StateKind: TypeAlias = Literal["combination", "case", "unloaded"]


@dataclass(frozen=True, slots=True)
class State:
    """One loading of the member: a combination, a case alone, or no load at all.

    `checked` says whether it takes part in checks, verdict and envelope: combinations do, and cases
    only where there are no combinations.
    """

    name: str
    kind: StateKind
    factors: dict[str, float]
    allowable_factor: float
    checked: bool


@dataclass(frozen=True, slots=True)
class Allowables:
    """Allowable stresses times the state's factor, Pa, both positive, (m, n); NaN where there is none."""

    tension: FloatArray
    compression: FloatArray


@dataclass(frozen=True, slots=True)
class SegmentResults:
    """Extremes by state and segment, all (m, n); NaN in `utilisation` and its place where no check was made.

    Exact: taken among ends and stationary points, not among samples.
    `*_at` are positions x along the member in m, the smallest x among places within 1e-9 of the extreme.
    """

    force_start: FloatArray
    force_end: FloatArray
    force_max: FloatArray
    force_min: FloatArray
    stress_max: FloatArray
    stress_max_at: FloatArray
    stress_min: FloatArray
    stress_min_at: FloatArray
    utilisation: FloatArray
    utilisation_at: FloatArray
    force_bound: FloatArray
    force_max_at: FloatArray
    force_min_at: FloatArray
    displacement_max: FloatArray
    displacement_max_at: FloatArray
    displacement_min: FloatArray
    displacement_min_at: FloatArray


@dataclass(frozen=True, slots=True)
class PartResults:
    """Extremes of the stress in every part where parts are bonded, all (m, s), as in `SegmentResults`.

    In the order of `solver.bonded`: the first n parts are the segments' own.
    """

    segment: IntArray  # (s,)
    number: IntArray  # (s,) within its segment: 0 is the segment's own part
    material: tuple[str, ...]  # (s,)
    stress_max: FloatArray
    stress_max_at: FloatArray
    stress_min: FloatArray
    stress_min_at: FloatArray
    utilisation: FloatArray
    utilisation_at: FloatArray
    allowables: Allowables

    def of_segment(self, segment: int) -> IntArray:
        """The parts of one segment in their order."""
        return np.flatnonzero(self.segment == segment)


@dataclass(frozen=True, slots=True)
class CompanionResults:
    """All companions, c in all, in the states of the results; their k segments stand one after the other.

    Companion i has the segments `companions.first[i]` to before `companions.first[i + 1]`. One-sided ones
    (`companions.parting` is not 0) are `separated` where they have parted from their far joint.
    """

    chain: Chain  # of the k segments, as loads and solution
    loads: Loads
    solution: Solution
    companions: Companions
    begins: FloatArray  # (k,) x along the member, m
    ends: FloatArray  # (k,)
    force_from: FloatArray  # (m, c) N, axial force at the joint where it is tied
    force_to: FloatArray  # (m, c) N, axial force at the other joint, 0 where separated
    separated: BoolArray  # (m, c)
    gap: FloatArray  # (m, c) m, how far it has parted; 0 where it has not
    clamp: FloatArray  # (m, c) N, what a one-sided one pushes or pulls its far joint with; else 0
    least_clamp: FloatArray  # (c,) N, the least of it over the checked states; NaN where tied at both ends
    least_clamp_state: IntArray  # (c,) the state that has it, the first of equals
    segments: SegmentResults  # (m, k)
    allowables: Allowables  # (m, k)
    segment_mass: FloatArray  # (k,) kg


@dataclass(frozen=True, slots=True)
class Results:
    """The results of one project: states first the checked ones, in the project's order, then the others.

    Stress and allowables of a segment are those of its own part, its utilisation is the largest of all parts;
    `parts` has each of them and is None where nothing is bonded. `companions` is None where there are none:
    what goes by segment is the member's, while energies, balance and error bound are those of the whole.
    """

    project: Project
    chain: Chain
    loads: Loads
    states: tuple[State, ...]
    solution: Solution
    position: FloatArray  # (n + 1,) x of the joints, m
    segments: SegmentResults
    parts: PartResults | None
    allowables: Allowables
    no_stress: FloatArray  # (m,) Pa: up to this a stress has no sign and no check
    checks: tuple[Check, ...]
    verdict: Verdict
    governing: Check | None
    segment_mass: FloatArray  # (n,) kg
    mass: float  # kg, companions included
    stability: tuple[Stability | None, ...]  # by state, None where it is not checked at all
    companions: CompanionResults | None = None

    @property
    def unloaded(self) -> tuple[State, ...]:
        """The checked states in which nothing loads the member; their checks pass without saying anything."""
        every = [self.loads] if self.companions is None else [self.loads, self.companions.loads]
        loaded = [
            any(getattr(loads, load.name)[i].any() for loads in every for load in fields(loads))
            for i in range(len(self.states))
        ]
        return tuple(
            state for state, some in zip(self.states, loaded, strict=True) if state.checked and not some
        )

    def state_index(self, name: str, kind: StateKind | None = None) -> int:
        """The index of the state called `name`; KeyError where there is none."""
        for index, state in enumerate(self.states):
            if state.name == name and kind in (None, state.kind):
                return index
        raise KeyError(name)
