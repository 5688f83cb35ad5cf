"""Displacement, axial force and stress along one companion, as curves over the member's ruler."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.polynomial import legendre

from solver.arrays import FloatArray, IntArray, frozen
from solver.results import CompanionResults, Results
from solver.sections import area_at


@dataclass(frozen=True, slots=True)
class CompanionCurves:
    """One companion in one state, all (k,) in order of x; two points where its segments meet."""

    segment: IntArray  # within the companion
    x: FloatArray  # along the member, m
    displacement: FloatArray
    force: FloatArray
    stress: FloatArray


def companion_curves(results: Results, state: int, companion: int, points: int = 20) -> CompanionCurves:
    """Through `points` places of every element, ends included; KeyError where there are no companions."""
    found = results.companions
    if found is None:
        raise KeyError(companion)
    first, last = found.companions.first[[companion, companion + 1]].tolist()
    segment = found.solution.segment
    element = np.flatnonzero((segment >= first) & (segment < last))
    t = np.linspace(-1.0, 1.0, points)
    return _curves(found, state, element, t, first)


def _curves(
    found: CompanionResults, state: int, element: IntArray, t: FloatArray, first: int
) -> CompanionCurves:
    solution = found.solution
    segment = solution.segment[element]
    start, end = solution.start[element][:, None], solution.end[element][:, None]
    fraction = start + (end - start) * (1 + t) / 2
    x = found.begins[segment][:, None] + fraction * found.chain.length[segment][:, None]
    force = solution.force[state, element] @ legendre.legvander(t, solution.force.shape[-1] - 1).T
    moved = solution.displacement[state, element]
    displacement = moved @ legendre.legvander(t, moved.shape[-1] - 1).T
    stress = force / area_at(found.chain.area[segment][:, None, :], fraction)
    return CompanionCurves(
        np.repeat(segment - first, t.size), *(frozen(v.ravel()) for v in (x, displacement, force, stress))
    )


def companion_force_at(results: Results, state: int, companion: int, x: float) -> float | None:
    """The axial force (N) in a companion at x along the member; None where it does not lie beside x."""
    found = results.companions
    if found is None:
        return None
    first, last = found.companions.first[[companion, companion + 1]].tolist()
    segment = found.solution.segment
    element = np.flatnonzero((segment >= first) & (segment < last))
    own, length = segment[element], found.chain.length[segment[element]]
    begins = found.begins[own] + found.solution.start[element] * length
    ends = found.begins[own] + found.solution.end[element] * length
    near = 1e-12 * float(results.position[-1])
    holds = np.flatnonzero((begins - near <= x) & (x <= ends + near))
    if not holds.size:
        return None
    at = holds[0]
    t = min(max(2.0 * (x - begins[at]) / (ends[at] - begins[at]) - 1.0, -1.0), 1.0)
    return float(legendre.legval(t, found.solution.force[state, element[at]]))
