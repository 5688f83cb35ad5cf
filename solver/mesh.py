"""Where the elements lie and of what degree, and the data of a block of them.

An element is a segment or a dyadic part of one; the part's area is found from sums of positive terms only, so
that a part of a taper is as exact as the whole.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import TypeAlias

import numpy as np

from solver.arrays import BoolArray, FloatArray, IntArray
from solver.chain import Chain, Loads
from solver.sections import part_of

Where: TypeAlias = slice | IntArray


@dataclass(frozen=True, slots=True)
class Mesh:
    """e elements in chain order; `closed` ones are prismatic and unbedded and solved in closed form."""

    segment: IntArray  # (e,)
    start: FloatArray  # (e,) fractions of the segment
    end: FloatArray  # (e,)
    degree: IntArray  # (e,)
    closed: BoolArray  # (e,)
    whole: bool  # every element is a whole segment

    def joints(self) -> IntArray:
        """(n + 1,) the element ends (counted 0…e) at which the joints of the chain lie."""
        if self.whole:
            return np.arange(self.segment.size + 1)
        first = np.flatnonzero(np.diff(self.segment, prepend=-1))
        return np.append(first, self.segment.size)


@dataclass(frozen=True, slots=True)
class Block:
    """Some elements' own data, all on t = −1…1; b elements, m states."""

    length: FloatArray  # (b,)
    stiffness: FloatArray  # (b, 3) E A, Bernstein
    bedding: FloatArray  # (b, 2) k, Legendre
    strain: FloatArray  # (2, m, b) stress-free strain ε₀, Legendre
    load: FloatArray  # (3, m, b) q with self-weight, Legendre


def closed_segments(chain: Chain) -> BoolArray:
    """(n,) True where the area is the same throughout (up to rounding) and nothing beds the segment."""
    area = chain.area
    spread = area.max(axis=1) - area.min(axis=1)
    return np.asarray((spread <= 4e-16 * area[:, 1]) & (chain.bedding == 0).all(axis=1))


def block(chain: Chain, loads: Loads, mesh: Mesh, where: Where) -> Block:
    """The data of the elements of `mesh` that `where` picks."""
    parts = None if mesh.whole else (mesh.start[where], mesh.end[where])
    segment = where if mesh.whole else mesh.segment[where]
    length = chain.length[segment]
    temperature = _linear(loads.temperature[:, segment], parts)
    strain = chain.expansion[segment] * temperature
    strain[0] += loads.lack_of_fit[:, segment] / length
    area = chain.area[segment] if parts is None else part_of(chain.area[segment], *parts)
    return Block(
        length=length if parts is None else length * (parts[1] - parts[0]),
        stiffness=chain.modulus[segment][:, None] * area,
        bedding=np.ascontiguousarray(_linear(chain.bedding[segment], parts).T),
        strain=strain,
        load=_load(loads, segment, area, chain.density[segment], parts),
    )


def _linear(ends: FloatArray, parts: tuple[FloatArray, FloatArray] | None) -> FloatArray:
    """Values at start and end (…, b, 2) to Legendre coefficients (2, …, b) on the parts."""
    first, last = ends[..., 0], ends[..., 1]
    if parts is not None:
        start, end = parts
        first, last = first * (1 - start) + last * start, first * (1 - end) + last * end
    series = np.empty((2, *first.shape))
    np.add(first, last, out=series[0])
    np.subtract(last, first, out=series[1])
    series *= 0.5
    return series


def _load(
    loads: Loads,
    segment: Where,
    area: FloatArray,
    density: FloatArray,
    parts: tuple[FloatArray, FloatArray] | None,
) -> FloatArray:
    weight = loads.gravity[:, None] * density
    first, middle, last = area.T
    linear = _linear(loads.distributed[:, segment], parts)
    load = np.empty((3, *weight.shape))
    load[0] = linear[0] + weight * ((first + middle + last) / 3)
    load[1] = linear[1] + weight * ((last - first) / 2)
    load[2] = weight * ((first - 2 * middle + last) / 6)
    return load
