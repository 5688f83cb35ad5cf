"""The guaranteed bound on the numerical error, after Prager and Synge (1947).

With e = u − u_h the error of the displacement and y the equilibrated force,

    ∫ EA e'² + 2 ∫ k e² + 2 Σ k_s e² + ∫ (N − y)²/EA = Σ η²,   η² = ∫ (y − EA (u_h' − ε₀))²/EA dx,

so √Σ η² bounds the error in the energy norm. Floating point adds its own share:

- what is left over at the joints, r, moves the member by K⁻¹ r; r itself is known only up to the rounding of
  the forces it is the sum of, ρ, and since K⁻¹ has no negative entry, |r| + ρ is the worst of all signs;
- the rounding of the displacements, 2 ε √Σ κ (|u_i| + |u_j|)²;
- the rounding of the polynomials inside the elements, 8 ε √(∫ y²/EA + ∫ EA ε₀²).
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from solver.arrays import FloatArray
from solver.condense import Condensed
from solver.joints import Displacements, Held, JointSystem
from solver.net import Net

EPSILON = float(np.finfo(np.float64).eps)
FLOOR = 1e-10  # of max|u|² Σ ∫ EA dx/L², so that a rigid movement has a size to compare with
FORCE_ROUNDINGS = 4  # in an end force, in units of ε times its terms
FIELD_ROUNDINGS = 8  # in a polynomial inside an element


@dataclass(frozen=True, slots=True)
class Bound:
    """All (m,), in the energy norm √J: the parts of the bound, and the size that makes it relative."""

    discretisation: FloatArray  # √Σ η²
    leftover: FloatArray  # √(r̃ᵀ K⁻¹ r̃)
    rounding: FloatArray
    size: FloatArray  # D

    def relative(self) -> FloatArray:
        """(m,) the bound over D, and 0 where D is 0."""
        total = np.hypot(self.discretisation, self.leftover) + self.rounding
        return np.divide(total, self.size, out=np.zeros_like(total), where=self.size != 0)

    def of_force(self, flexibility: FloatArray, bedding: FloatArray) -> FloatArray:
        """(m, n) N: how far y may be from the exact force, from ∫ dx/EA and ∫ k dx (n,) of each segment.

        In a segment the exact force differs from y by a mean, at most √(∫ (N − y)²/EA) / √(∫ dx/EA), and by
        what the bedding adds along it, at most √(∫ k dx ∫ k e²); the identity weighs ∫ k e² twice, whence
        the half. The leftovers at the joints are outside the identity, whence none for them.
        """
        by_error = self.discretisation[:, None] * np.sqrt(1 / flexibility + bedding / 2)
        outside = (self.leftover + self.rounding)[:, None]
        return np.asarray(by_error + outside * np.sqrt(1 / flexibility + bedding))


def joint_share(system: JointSystem, leftover: FloatArray, roundings: FloatArray) -> FloatArray:
    """(m,) √(r̃ᵀ K⁻¹ r̃) with r̃ = |r| + ρ, from r and ρ (m, nodes)."""
    worst = np.abs(leftover) + roundings
    energy = np.einsum("mj,mj->m", worst, system.solve(worst))
    return np.asarray(np.sqrt(np.maximum(energy, 0.0)))


def joint_roundings(
    at: Held, ends: Condensed, u: Displacements, mean: FloatArray, stretch: FloatArray
) -> FloatArray:
    """(m, nodes) as `force_roundings`, but 0 where a support takes whatever comes."""
    roundings = force_roundings(at, ends, u, mean, stretch)
    roundings[:, at.fixed] = 0.0
    return roundings


def force_roundings(
    at: Held, ends: Condensed, u: Displacements, mean: FloatArray, stretch: FloatArray
) -> FloatArray:
    """(m, nodes) how far rounding can have moved the sum of forces at each node."""
    size = np.abs(ends.stretch_stretch * stretch) + np.abs(ends.load_stretch) + np.abs(ends.load_mean) / 2
    if ends.mean_mean.any():
        size += np.abs(ends.mean_stretch) * (np.abs(mean) + np.abs(stretch) / 2)
        size += ends.mean_mean * np.abs(mean) / 2
    total = np.abs(at.force)
    total[:, at.sprung] += at.spring * (np.abs(at.movement[:, at.sprung]) + np.abs(u.high[:, at.sprung]))
    total[:, at.net.start] += size
    total[:, at.net.end] += size
    return np.asarray((FORCE_ROUNDINGS * EPSILON) * total)


def displacement_share(ends: Condensed, u: Displacements, net: Net) -> FloatArray:
    """(m,) 2 ε √Σ κ (|u_i| + |u_j|)², κ the largest diagonal entry of an element's condensed stiffness."""
    largest = ends.mean_mean / 4 + np.abs(ends.mean_stretch) + ends.stretch_stretch
    size = np.abs(u.high)
    both = size[:, net.end] + size[:, net.start]
    return np.asarray(2 * EPSILON * np.sqrt((both * both) @ largest))


def field_share(norm: FloatArray) -> FloatArray:
    """(m,) rounding inside the elements, from Σ ∫ y²/EA + ∫ EA ε₀²."""
    return np.asarray(FIELD_ROUNDINGS * EPSILON * np.sqrt(norm))
