"""Which nodes the elements run between: one chain, or a chain with companions beside it.

Every chain, the member first, has nodes of its own, one more than it has elements. Where a companion is
tied to a joint of the member its end node is tied: it moves with the joint's node and hands its forces on
to it. The end of a companion that can part is left as it is, and a contact with the joint's node comes in
instead. Without companions the nodes follow each other, and slices do for all of it.
"""

from __future__ import annotations

from dataclasses import dataclass, field, replace

import numpy as np

from solver.arrays import FloatArray, IntArray
from solver.chain import Chain, Where
from solver.mesh import Mesh


def _none() -> IntArray:
    return np.zeros(0, dtype=np.intp)


@dataclass(frozen=True, slots=True)
class Net:
    """The nodes of e elements."""

    start: Where  # (e,) where the elements start
    end: Where  # (e,)
    count: int  # of nodes
    joints: IntArray  # (n + 1,) the nodes of the member's joints
    tied: IntArray = field(default_factory=_none)  # (t,) nodes that move with another, each once
    to: IntArray = field(default_factory=_none)  # (t,) that other one, never tied itself
    far: IntArray = field(default_factory=_none)  # (c,) the ends of the companions
    owners: IntArray = field(default_factory=_none)  # (c,) the joints at which the companions start

    @property
    def plain(self) -> bool:
        """Whether there is one chain only."""
        return self.far.size == 0

    def with_ties(self, tied: IntArray, to: IntArray) -> Net:
        """With more nodes that move with others."""
        return replace(self, tied=np.append(self.tied, tied), to=np.append(self.to, to))

    def hand_on(self, force: FloatArray) -> None:
        """Add the forces (m, count) at tied nodes to those at the nodes they move with, in place."""
        if self.tied.size:
            np.add.at(force.T, self.to, force[:, self.tied].T)

    def clear(self, force: FloatArray) -> None:
        """Take the forces (m, count) off the tied nodes, in place."""
        if self.tied.size:
            force[:, self.tied] = 0.0

    def follow(self, moved: FloatArray) -> None:
        """Move the tied nodes with the others, displacements (m, count) in place."""
        if self.tied.size:
            moved[:, self.tied] = moved[:, self.to]

    def joint_of(self, node: int) -> int:
        """The index of the joint at a node or before it; of a companion's node the joint where it starts."""
        members = int(self.joints[-1]) + 1
        if node < members:
            return int(np.searchsorted(self.joints, node))
        return int(self.owners[np.searchsorted(self.far, node)])


def net_of(chain: Chain, mesh: Mesh) -> Net:
    """The nodes of a mesh."""
    joints = mesh.joints(chain.fixed.size - 1)
    companions, elements = chain.companions, mesh.segment.size
    if companions is None:
        return Net(slice(None, -1), slice(1, None), elements + 1, joints)
    count = companions.start.size
    first = np.searchsorted(mesh.segment, chain.fixed.size - 1 + companions.first)
    number = np.searchsorted(first, np.arange(elements), side="right")  # of the chain, the member is 0
    start = np.arange(elements) + number
    near, far = first[:-1] + np.arange(1, count + 1), first[1:] + np.arange(1, count + 1)
    both = companions.parting == 0.0
    return Net(
        start=start,
        end=start + 1,
        count=elements + count + 1,
        joints=joints,
        tied=np.concatenate([near, far[both]]),
        to=np.concatenate([joints[companions.start], joints[companions.end[both]]]),
        far=far,
        owners=companions.start,
    )
