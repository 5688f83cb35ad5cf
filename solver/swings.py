"""Stress swinging between two states along a row of segments: its worst place in each part, and its ends.

Along a segment the utilisation of fatigue is the largest of four sums c₁ σ₁ + c₂ σ₂ with constant c, for
|a| = max(a, −a) and the tensile mean is max(m, 0). Each sum is the stress of a state of its own, which has
that sum of the forces and of the temperatures, and whose extremes `ExtremeFinder` finds exactly, in bonded
parts as well; so the largest of them is exact too. The member is one such row, its companions are another.
"""

from __future__ import annotations

from dataclasses import dataclass, replace

import numpy as np
from numpy.polynomial import legendre

from solver.arrays import FloatArray, IntArray
from solver.bonded import constraint_at
from solver.chain import Chain, Loads
from solver.extremes import SAME, ExtremeFinder
from solver.model import Endurance
from solver.sections import area_at
from solver.solution import Solution


@dataclass(frozen=True, slots=True)
class Row:
    """Segments with their loads and what was solved of them; `begins` and `ends` (n,) are their x."""

    chain: Chain
    loads: Loads
    solution: Solution
    begins: FloatArray
    ends: FloatArray
    zero: FloatArray  # (m,) up to this a stress is none, as in companions that have parted; inf without any

    def owners(self) -> IntArray:
        """The segment of every part."""
        bonded = self.chain.bonded
        return np.arange(len(self.chain.length)) if bonded is None else bonded.segment

    def worst(self, states: IntArray, line: Endurance | None) -> FloatArray:
        """The x of the largest utilisation in each part if it endures so much, the smallest of equals."""
        amplitude, mean = (0.5 / line.amplitude, 0.5 / line.ultimate) if line is not None else (0.5, 0.0)
        half = np.array([amplitude, -amplitude])
        sums = np.stack([half, half + mean, mean - half])
        finder = ExtremeFinder(self.chain, *self._summed(states, sums), self.begins, self.ends)
        stress = finder.stress()
        sizes = np.concatenate([stress.largest, -stress.smallest[:1]])
        places = np.concatenate([stress.largest_at, stress.smallest_at[:1]])
        largest = sizes.max(axis=0)
        equal = sizes >= largest - SAME * np.abs(largest)
        x = np.min(np.where(equal, places, np.inf), axis=0)
        zero = self.zero[states]
        none = np.max(np.abs(sums) @ np.where(np.isinf(zero), 0.0, zero))
        return np.asarray(np.where(largest <= none, self.begins[self.owners()], x))

    def _summed(self, states: IntArray, sums: FloatArray) -> tuple[Solution, Loads]:
        """A state for each row of factors on the two; only force and temperature are of use."""
        force = np.einsum("rs,seq->req", sums, self.solution.force[states])
        temperature = np.einsum("rs,snk->rnk", sums, self.loads.temperature[states])
        return replace(self.solution, force=force), replace(self.loads, temperature=temperature)

    def stresses(self, states: IntArray, part: int, fraction: float) -> tuple[float, float]:
        """The nominal stresses of both states at a fraction 0…1 of a part."""
        s, bonded = np.array([fraction]), self.chain.bonded
        force = self._force(states, int(self.owners()[part]), fraction)
        area = self.chain.area[part] if bonded is None else bonded.transformed[part]
        if bonded is not None:
            held = self.loads.temperature[states]
            force = force + constraint_at(bonded, np.array([part]), held, s)[:, 0]
        stress = force / area_at(area, s)[0]
        first, second = np.where(np.abs(stress) <= self.zero[states], 0.0, stress).tolist()
        return first, second

    def _force(self, states: IntArray, segment: int, fraction: float) -> FloatArray:
        """The axial force (s,) of some states at a fraction 0…1 of a segment."""
        solution = self.solution
        first, last = (int(np.searchsorted(solution.segment, segment, side)) for side in ("left", "right"))
        inside = np.searchsorted(solution.start[first:last], fraction, "right")
        element = first + max(0, int(inside) - 1)
        start, end = float(solution.start[element]), float(solution.end[element])
        t = min(1.0, max(-1.0, (2.0 * fraction - start - end) / (end - start)))
        coefficients = solution.force[states, element]
        force: FloatArray = coefficients @ legendre.legvander(np.array([t]), coefficients.shape[-1] - 1)[0]
        return force
