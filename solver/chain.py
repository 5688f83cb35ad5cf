"""The member as arrays: what the solver passes work on, packed once from the records of a project.

n segments, n + 1 joints, m states (combinations and load cases). A quantity that is linear along a segment is
held as its values at start and end; the area, at most quadratic, as its three Bernstein
coefficients, which are all positive for every section, so that nothing cancels where a taper runs thin.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import TypeAlias

import numpy as np

from solver.arrays import BoolArray, FloatArray, IntArray, frozen
from solver.bonded import Bonded

Where: TypeAlias = slice | IntArray


@dataclass(frozen=True, slots=True)
class Stops:
    """The one-sided supports, s in all, several at one joint among them."""

    joint: IntArray  # (s,) in chain order, at one joint in the order of its supports
    side: FloatArray  # (s,) +1 blocks motion along +x, −1 along −x
    clearance: FloatArray  # (s,) m
    stiffness: FloatArray  # (s,) N/m, infinite for a rigid one


_NOWHERE = np.zeros(0, dtype=np.intp)
_NOWHERE.setflags(write=False)
NO_STOPS = Stops(_NOWHERE, *(frozen(np.zeros(0)) for _ in range(3)))


@dataclass(frozen=True, slots=True)
class Companions:
    """Chains beside the member, c in all; their segments follow the member's n in all arrays by segment."""

    start: IntArray  # (c,) joint where each is tied
    end: IntArray  # (c,) joint at the other end
    first: IntArray  # (c + 1,) its first segment, counted from the first companion's; ends with their number
    parting: (
        FloatArray  # (c,) 0 tied at both ends, +1 where the far end can only push its joint, −1 only pull
    )


@dataclass(frozen=True, slots=True)
class Chain:
    """The member without loads. Shapes by segment (n, …) or by joint (n + 1).

    Modulus, area, expansion and density are those of a segment's own part; `bonded` is None where no segment
    has others beside it.
    """

    length: FloatArray  # (n,) m
    modulus: FloatArray  # (n,) Pa
    area: FloatArray  # (n, 3) m², Bernstein coefficients on the segment's 0…1
    bedding: FloatArray  # (n, 2) N/m², at start and end
    expansion: FloatArray  # (n,) 1/K
    density: FloatArray  # (n,) kg/m³
    fixed: BoolArray  # (n + 1,) joints held at their movement
    spring: FloatArray  # (n + 1,) N/m, 0 where there is none, the sum where there are several
    stops: Stops = NO_STOPS
    companions: Companions | None = None
    bonded: Bonded | None = None

    def rigidity(self, where: Where) -> FloatArray:
        """(b, 3) EA of the segments `where`, all their parts together."""
        if self.bonded is None:
            return self.modulus[where][:, None] * self.area[where]
        return self.bonded.rigidity[where]

    def mass(self, where: Where) -> FloatArray:
        """(b, 3) kg/m of the segments `where`, all their parts together."""
        if self.bonded is None:
            return self.density[where][:, None] * self.area[where]
        return self.bonded.mass[where]


@dataclass(frozen=True, slots=True)
class Loads:
    """The loads of m states, already factored and summed. Shapes (m, …)."""

    distributed: FloatArray  # (m, n, 2) N/m along +x, at start and end; without self-weight
    gravity: FloatArray  # (m,) m/s² along +x; acts on density times area
    temperature: FloatArray  # (m, n, 2) K above the stress-free state, at start and end
    lack_of_fit: FloatArray  # (m, n) m, positive for a part made too long
    joint_force: FloatArray  # (m, n + 1) N along +x
    movement: FloatArray  # (m, n + 1) m along +x, 0 where there is no support
