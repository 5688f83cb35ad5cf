"""The extremes of displacement, force and stress by segment, put together as results."""

from __future__ import annotations

from solver.arrays import FloatArray
from solver.extremes import Extremes
from solver.results import SegmentResults


def segment_results(
    stress: Extremes,
    force: Extremes,
    displacement: Extremes,
    utilisation: tuple[FloatArray, FloatArray],
    force_bound: FloatArray,
) -> SegmentResults:
    """All of it (m, n); `utilisation` with its places."""
    return SegmentResults(
        force_start=force.start,
        force_end=force.end,
        force_max=force.largest,
        force_min=force.smallest,
        stress_max=stress.largest,
        stress_max_at=stress.largest_at,
        stress_min=stress.smallest,
        stress_min_at=stress.smallest_at,
        utilisation=utilisation[0],
        utilisation_at=utilisation[1],
        force_bound=force_bound,
        force_max_at=force.largest_at,
        force_min_at=force.smallest_at,
        displacement_max=displacement.largest,
        displacement_max_at=displacement.largest_at,
        displacement_min=displacement.smallest,
        displacement_min_at=displacement.smallest_at,
    )
