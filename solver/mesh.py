"""Where the elements lie and of what degree, and the data of a block of them.

An element is a segment or a dyadic part of one; the part's area is found from sums of positive terms only, so
that a part of a taper is as exact as the whole.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import TypeAlias

import numpy as np

from solver.arrays import BoolArray, FloatArray, IntArray
from solver.bonded import even
from solver.chain import Chain, Loads, Where
from solver.sections import part_of

Parts: TypeAlias = tuple[FloatArray, FloatArray]  # (b,) where parts of segments start and end, as fractions


@dataclass(frozen=True, slots=True)
class Mesh:
    """e elements in chain order; `closed` ones are prismatic and unbedded and solved in closed form."""

    segment: IntArray  # (e,)
    start: FloatArray  # (e,) fractions of the segment
    end: FloatArray  # (e,)
    degree: IntArray  # (e,)
    closed: BoolArray  # (e,)
    whole: bool  # every element is a whole segment

    def joints(self, segments: int) -> IntArray:
        """(n + 1,) the element ends (counted 0…e) at which the joints of the first n segments lie."""
        if self.whole:
            return np.arange(segments + 1)
        return np.searchsorted(self.segment, np.arange(segments + 1))


@dataclass(frozen=True, slots=True)
class Block:
    """Some elements' own data, all on t = −1…1; b elements, m states."""

    length: FloatArray  # (b,)
    stiffness: FloatArray  # (b, 3) E A, Bernstein
    bedding: FloatArray  # (b, 2) k, Legendre
    strain: FloatArray  # (2, m, b) stress-free strain ε₀, Legendre
    load: FloatArray  # (3, m, b) q with self-weight, Legendre
    constraint: Constraint | None = None  # what bonded parts add to E A ε₀ beside E A times `strain`


@dataclass(frozen=True, slots=True)
class Constraint:
    """Of bonded parts that expand differently: the force C ΔT that belongs to `Block.strain`'s own part."""

    excess: FloatArray  # (b, 3) C, Bernstein
    temperature: FloatArray  # (2, m, b) Legendre


def closed_segments(chain: Chain) -> BoolArray:
    """(n,) True where the area is the same throughout (up to rounding) and nothing beds the segment."""
    prismatic = even(chain.area) if chain.bonded is None else chain.bonded.even
    return np.asarray(prismatic & (chain.bedding == 0).all(axis=1))


def block(chain: Chain, loads: Loads, mesh: Mesh, where: Where) -> Block:
    """The data of the elements of `mesh` that `where` picks."""
    parts = None if mesh.whole else (mesh.start[where], mesh.end[where])
    segment = where if mesh.whole else mesh.segment[where]
    length = chain.length[segment]
    temperature = _linear(loads.temperature[:, segment], parts)
    strain = chain.expansion[segment] * temperature
    strain[0] += loads.lack_of_fit[:, segment] / length
    stiffness = _on(chain.rigidity(segment), parts)
    constraint = _constraint(chain, segment, temperature, parts)
    if constraint is not None and mesh.closed[where].all():  # everything is even: the mean strain is linear
        strain += (constraint.excess[:, 1] / stiffness[:, 1]) * temperature
        constraint = None
    return Block(
        length=length if parts is None else length * (parts[1] - parts[0]),
        stiffness=stiffness,
        bedding=np.ascontiguousarray(_linear(chain.bedding[segment], parts).T),
        strain=strain,
        load=_load(loads, segment, _on(chain.mass(segment), parts), parts),
        constraint=constraint,
    )


def _on(coefficients: FloatArray, parts: Parts | None) -> FloatArray:
    """Bernstein coefficients (b, 3) of segments on their parts."""
    return coefficients if parts is None else part_of(coefficients, *parts)


def _constraint(
    chain: Chain, segment: Where, temperature: FloatArray, parts: Parts | None
) -> Constraint | None:
    if chain.bonded is None:
        return None
    excess = chain.bonded.excess[: chain.length.size][segment]  # of the segments' own parts
    return Constraint(_on(excess, parts), temperature) if excess.any() else None


def _linear(ends: FloatArray, parts: Parts | None) -> FloatArray:
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
    mass: FloatArray,
    parts: Parts | None,
) -> FloatArray:
    gravity = loads.gravity[:, None]
    first, middle, last = mass.T
    linear = _linear(loads.distributed[:, segment], parts)
    load = np.empty((3, gravity.size, first.size))
    load[0] = linear[0] + gravity * ((first + middle + last) / 3)
    load[1] = linear[1] + gravity * ((last - first) / 2)
    load[2] = gravity * ((first - 2 * middle + last) / 6)
    return load
