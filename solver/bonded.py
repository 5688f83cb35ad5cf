"""Bonded parts: several materials in one segment that share its strain (steel in concrete, a filled tube).

With parts i, the segment's own first, each with E_i, A_i and its stress-free strain ε₀ᵢ = α_i ΔT + λ/L:

    EA = Σ E_i A_i,   EA ε₀ = Σ E_i A_i ε₀ᵢ,   N = EA (u' − ε₀),   σ_i = E_i (u' − ε₀ᵢ)

The lack of fit is the same for all of them, so that a part differs from the mean by its expansion alone:
EA (ε₀ − ε₀ᵢ) = C_i ΔT with C_i = Σ_j E_j A_j (α_j − α_i), its `excess`. That is a sum of areas, at most
quadratic along the segment and known before any load; nothing is lost where all parts expand alike. With the
transformed area A_i* = EA/E_i the stress is then the ratio

    σ_i = (N + C_i ΔT) / A_i*

and what the parts hold against each other, whatever N is, stores ½ ∫ Σ E_i A_i (C_i ΔT/EA)² dx.
A segment without bonded parts is its own only part: C = 0 and A* = A.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.polynomial import legendre

from solver.arrays import BoolArray, FloatArray, IntArray, frozen
from solver.sections import area_at, part_of

_POINTS = 22  # of the self-stress's quadrature on each element: as many as the bound's, which has 1/A too


@dataclass(frozen=True, slots=True)
class Bonded:
    """All parts of a member of n segments: the first n are the segments' own, the bonded ones follow.

    Areas and what is summed from them are quadratic along the segment, held in Bernstein coefficients.
    """

    segment: IntArray  # (s,) the segment each part belongs to; part i < n is segment i's own
    expansion: FloatArray  # (s,) 1/K
    stiffness: FloatArray  # (s, 3) N, E_i A_i
    transformed: FloatArray  # (s, 3) m², EA/E_i; the area itself where nothing is bonded
    excess: FloatArray  # (s, 3) N/K, C_i
    rigidity: FloatArray  # (n, 3) N, EA of the segment
    mass: FloatArray  # (n, 3) kg/m of the segment
    several: BoolArray  # (n,) which segments have bonded parts at all
    even: BoolArray  # (n,) where each part has the same area throughout, up to rounding

    @property
    def added(self) -> IntArray:
        """The parts that are not a segment's own."""
        return np.arange(self.rigidity.shape[0], self.segment.size)


def bonded_parts(
    segment: IntArray, modulus: FloatArray, area: FloatArray, expansion: FloatArray, density: FloatArray
) -> Bonded:
    """From the parts as such, (s,) and (s, 3), the segments' own first and in the segments' order."""
    count = int(segment.max()) + 1
    stiffness = modulus[:, None] * area
    rigidity, mass = np.zeros((count, 3)), np.zeros((count, 3))
    np.add.at(rigidity, segment, stiffness)
    np.add.at(mass, segment, density[:, None] * area)
    several = np.bincount(segment, minlength=count) > 1
    transformed = np.where(several[segment][:, None], rigidity[segment] / modulus[:, None], area)
    return Bonded(
        segment=segment,
        expansion=frozen(expansion),
        stiffness=frozen(stiffness),
        transformed=frozen(transformed),
        excess=frozen(_excess(segment, stiffness, expansion)),
        rigidity=frozen(rigidity),
        mass=frozen(mass),
        several=several,
        even=np.minimum.reduceat(even(area)[np.argsort(segment, kind="stable")], _starts(segment)),
    )


def even(area: FloatArray) -> BoolArray:
    """Where an area (…, 3) is the same throughout, up to rounding."""
    spread = area.max(axis=-1) - area.min(axis=-1)
    return np.asarray(spread <= 4e-16 * area[..., 1])


def _starts(segment: IntArray) -> IntArray:
    counts = np.bincount(segment)
    return np.asarray(np.cumsum(counts) - counts)


def _excess(segment: IntArray, stiffness: FloatArray, expansion: FloatArray) -> FloatArray:
    """(s, 3) Σ_j E_j A_j (α_j − α_i) over the parts of the same segment: pair by pair, nothing cancels."""
    order = np.argsort(segment, kind="stable")
    starts, counts = _starts(segment), np.bincount(segment)
    pairs = counts[segment]
    one = np.repeat(np.arange(segment.size), pairs)
    rank = np.arange(one.size) - np.repeat(np.cumsum(pairs) - pairs, pairs)
    other = order[starts[segment[one]] + rank]
    excess = np.zeros_like(stiffness)
    np.add.at(excess, one, stiffness[other] * (expansion[other] - expansion[one])[:, None])
    return excess


def self_stress(
    bonded: Bonded, length: FloatArray, temperature: FloatArray, start: FloatArray, end: FloatArray,
    segment: IntArray,
) -> FloatArray:  # fmt: skip
    """(m,) J: the energy of what the parts hold against each other, over elements start…end of segments.

    The temperature is (m, n, 2), the length (n,); elements make the quadrature as fine as the solution.
    """
    energy = np.zeros(temperature.shape[0])
    for part in np.flatnonzero(bonded.several[bonded.segment] & bonded.excess.any(axis=1)).tolist():
        own = np.flatnonzero(segment == bonded.segment[part])
        energy += _part_energy(bonded, part, temperature, start[own], end[own]) * length[bonded.segment[part]]
    return energy


def _part_energy(
    bonded: Bonded, part: int, temperature: FloatArray, start: FloatArray, end: FloatArray
) -> FloatArray:
    """(m,) the part's share for a length of 1."""
    t, weights = legendre.leggauss(_POINTS)
    width = (end - start)[:, None]
    s, weights = start[:, None] + width * (1 + t) / 2, weights * width / 2
    of = bonded.segment[part]
    strain = area_at(bonded.excess[part], s) / area_at(bonded.rigidity[of], s)
    ends = temperature[:, of]
    rise = ends[:, :1, None] * (1 - s) + ends[:, 1:, None] * s
    density = area_at(bonded.stiffness[part], s) * strain * strain * weights
    return np.asarray(np.einsum("mkg,kg->m", rise * rise, density) / 2)


# --- stresses ---


def constrained(bonded: Bonded | None, temperature: FloatArray) -> BoolArray | None:
    """(m,) whether parts hold each other against their expansion; None where nothing is bonded."""
    return None if bonded is None else np.asarray(constrained_segments(bonded, temperature).any(axis=1))


def constrained_segments(bonded: Bonded, temperature: FloatArray) -> BoolArray:
    """(m, n) in which segments they do."""
    uneven = np.zeros(len(bonded.rigidity), dtype=np.bool_)
    uneven[bonded.segment[bonded.excess.any(axis=1)]] = True
    return np.asarray(temperature.any(axis=2) & uneven)


_PRODUCT = 5  # points that make the product of a quadratic and a linear function exact


def constraint(
    bonded: Bonded, part: IntArray, temperature: FloatArray, start: FloatArray, end: FloatArray
) -> FloatArray:
    """(m, k, 4) N, C ΔT of parts on the pieces start…end of their segments (k,), in Legendre form."""
    t, weights = legendre.leggauss(_PRODUCT)
    s = (1 + t) / 2
    excess = area_at(part_of(bonded.excess[part], start, end)[:, None, :], s)
    ends = temperature[:, bonded.segment[part]]
    first, last = (ends[..., 0] * (1 - x) + ends[..., 1] * x for x in (start, end))
    rise = first[..., None] * (1 - s) + last[..., None] * s
    back = legendre.legvander(t, 3) * weights[:, None] * (2 * np.arange(4) + 1) / 2
    return np.asarray((rise * excess) @ back)


def constraint_at(bonded: Bonded, part: IntArray, temperature: FloatArray, s: FloatArray) -> FloatArray:
    """(m, k) N, C ΔT of parts (k,) at the fractions s (k,) of their segments."""
    ends = temperature[:, bonded.segment[part]]
    rise = ends[..., 0] * (1 - s) + ends[..., 1] * s
    return np.asarray(rise * area_at(bonded.excess[part], s))
