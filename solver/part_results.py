"""Results of bonded parts: each part's stresses and checks, and what a segment takes over from its parts.

A segment's stresses are those of its own part; its utilisation is the largest over all its parts.
"""

from __future__ import annotations

import numpy as np

from solver.allowables import StressChecks
from solver.arrays import FloatArray, IntArray, frozen
from solver.bonded import Bonded
from solver.extremes import SAME, Extremes
from solver.model import BondedPart, Project, Segment
from solver.results import Allowables, PartResults


def every_part(project: Project) -> tuple[Segment | BondedPart, ...]:
    """All parts with material and section: the segments' own first, then the bonded ones along the chain."""
    return (*project.segments, *(part for segment in project.segments for part in segment.bonded))


def part_results(
    project: Project, bonded: Bonded | None, stress: Extremes, checks: StressChecks, limits: Allowables
) -> PartResults | None:
    """The results by part; None where nothing is bonded."""
    if bonded is None:
        return None
    numbers = [number for segment in project.segments for number in range(1, len(segment.bonded) + 1)]
    return PartResults(
        segment=bonded.segment,
        number=np.array([0] * len(project.segments) + numbers, dtype=np.intp),
        material=tuple(part.material for part in every_part(project)),
        stress_max=stress.largest,
        stress_max_at=stress.largest_at,
        stress_min=stress.smallest,
        stress_min_at=stress.smallest_at,
        utilisation=checks.utilisation,
        utilisation_at=checks.utilisation_at,
        allowables=limits,
    )


def own_stress(stress: Extremes, count: int) -> Extremes:
    """Of the segments' own parts, which are the first of all."""
    names = Extremes.__dataclass_fields__
    return Extremes(**{name: getattr(stress, name)[:, :count] for name in names})


def own_limits(limits: Allowables, count: int) -> Allowables:
    """Of the segments' own parts."""
    return Allowables(limits.tension[:, :count], limits.compression[:, :count])


def utilisation_of_segments(checks: StressChecks, bonded: Bonded | None) -> tuple[FloatArray, FloatArray]:
    """The largest utilisation over the parts of each segment with the smallest x that has it, (m, n)."""
    if bonded is None:
        return checks.utilisation, checks.utilisation_at
    return _largest(checks, bonded.segment, len(bonded.rigidity))


def _largest(checks: StressChecks, segment: IntArray, count: int) -> tuple[FloatArray, FloatArray]:
    largest = np.full((len(checks.utilisation), count), np.nan)
    np.fmax.at(largest.T, segment, checks.utilisation.T)
    same = checks.utilisation >= largest[:, segment] * (1.0 - SAME)
    places = np.full_like(largest, np.nan)
    np.fmin.at(places.T, segment, np.where(same, checks.utilisation_at, np.nan).T)
    return frozen(largest), frozen(places)
