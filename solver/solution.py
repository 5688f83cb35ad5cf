"""What the axial solver returns: piecewise polynomials on elements, for all states together, and bounds.

An element is a segment or a part of one (refinement halves). On an element everything is a polynomial in
t = −1…1 along +x, held as Legendre coefficients (last axis, lowest degree first, padded with zeros).
"""

from __future__ import annotations

from dataclasses import dataclass

from solver.arrays import FloatArray, IntArray


@dataclass(frozen=True, slots=True)
class Solution:
    """e elements in chain order, m states, n segments, n + 1 joints; read-only arrays, SI units."""

    segment: IntArray  # (e,) the segment each element lies in, never decreasing
    start: FloatArray  # (e,) where the element starts, as a fraction 0…1 of its segment
    end: FloatArray  # (e,) where it ends
    displacement: FloatArray  # (m, e, p + 1) u, m
    force: FloatArray  # (m, e, q + 1) equilibrated axial force y, N
    joint_displacement: FloatArray  # (m, n + 1) m
    reaction: FloatArray  # (m, n + 1) N on the member along +x, NaN where the joint has no support
    push: (
        FloatArray  # (m, s) N, what each of the chain's stops pushes with, then each companion that can part
    )
    gap: FloatArray  # (m, s) m, the clearance that each of them has left; 0 where it is closed
    loads: FloatArray  # (m,) N, sum of all applied loads along +x, self-weight included
    bedding: FloatArray  # (m,) N, what the bedding exerts on the member along +x, −∫ k u dx
    residual: FloatArray  # (m,) N, what is left of loads + reactions + bedding
    strain_energy: FloatArray  # (m,) J
    potential: FloatArray  # (m,) J
    error_bound: FloatArray  # (m,) relative, displacement in the energy norm
    force_bound: FloatArray  # (m, n) N, the axial force differs from the exact one by at most this
