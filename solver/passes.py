"""One pass: the member solved on one mesh, with its bound.

Elements of one kind go through condensation in blocks that fit the processor's cache; the joints are solved
as one tridiagonal system for all states; the fields are found again block by block.
"""

from __future__ import annotations

from collections.abc import Callable, Iterator
from dataclasses import dataclass
from typing import TypeAlias

import numpy as np

from solver.arrays import FloatArray, IntArray, frozen
from solver.bonded import self_stress
from solver.bound import FLOOR, Bound, displacement_share, field_share, joint_roundings, joint_share
from solver.chain import Chain, Loads, Where
from solver.condense import ClosedForm, Condensation, Condensed, Stacked
from solver.errors import Cancelled
from solver.joints import JointSystem, held, largest_load, spring_force, unbalanced
from solver.mesh import Mesh, block
from solver.solution import Solution

CLOSED_BLOCK = 4096
STACKED_BLOCK = 256

SUMMED = (
    "stretching",
    "norm",
    "strain_norm",
    "force_norm",
    "strain_energy",
    "work",
    "load",
    "bedding_force",
)  # the integrals of `Fields` that are sums over its elements

Part: TypeAlias = tuple[Where, Condensation]


@dataclass(frozen=True, slots=True)
class MemberFields:
    """The fields of all elements and their integrals summed; as in `condense.Fields`."""

    displacement: FloatArray  # (m, e, p + 1)
    force: FloatArray  # (m, e, q + 1)
    start_force: FloatArray  # (m, e)
    end_force: FloatArray  # (m, e)
    error: FloatArray  # (m, e) η²
    flexibility: FloatArray  # (e,)
    stretching: FloatArray  # ()
    norm: FloatArray  # (m,) as all below
    strain_norm: FloatArray
    force_norm: FloatArray
    strain_energy: FloatArray
    work: FloatArray
    load: FloatArray
    bedding_force: FloatArray


class Pass:
    """The member solved on one mesh: joints, fields, leftovers and bound of all states."""

    def __init__(self, chain: Chain, loads: Loads, mesh: Mesh, cancelled: Callable[[], bool]) -> None:
        self.chain, self.loads, self.mesh = chain, loads, mesh
        parts = condensations(chain, loads, mesh)
        self.held = held(chain, loads, mesh)
        self.condensed = joined(parts, loads.gravity.size, mesh.segment.size)
        system = JointSystem(self.condensed, self.held)
        self.ends = system.displacements()
        if cancelled():
            raise Cancelled
        mean, stretch = self.ends.mean(), self.ends.stretch()
        self.fields = gathered(parts, mean, stretch, mesh)
        del parts  # a long member's are as large as its results: their memory serves the rest of the pass
        self.leftover = unbalanced(self.held, self.ends, self.fields.start_force, self.fields.end_force)
        self.bound = self._bound(system, joint_roundings(self.held, self.condensed, self.ends, mean, stretch))

    def _bound(self, system: JointSystem, roundings: FloatArray) -> Bound:
        rounding = displacement_share(self.condensed, self.ends)
        rounding += field_share(self.fields.force_norm + self.fields.strain_norm)
        return Bound(
            discretisation=np.sqrt(self.fields.error.sum(axis=1)),
            leftover=joint_share(system, self.leftover, roundings),
            rounding=rounding,
            size=np.sqrt(self._size_squared()),
        )

    def _size_squared(self) -> FloatArray:
        u, fields = self.ends.high, self.fields
        floor = FLOOR * np.abs(u).max(axis=1) ** 2 * fields.stretching
        springs = u[:, self.held.sprung] ** 2 @ self.held.spring
        return np.asarray(fields.norm + fields.strain_norm + springs + floor)

    def largest_force(self) -> FloatArray:
        """(m,) N, the largest of all forces that meet at a joint, and of what the loads do there."""
        found = (np.abs(self.fields.start_force).max(axis=1), np.abs(self.fields.end_force).max(axis=1))
        return np.asarray(np.max([*found, largest_load(self.held, self.condensed)], axis=0))

    def solution(self) -> Solution:
        """What the caller gets."""
        fields, mesh, joints = self.fields, self.mesh, self.mesh.joints()
        u = self.ends.high + self.ends.low
        reaction = self._reactions()[:, joints]
        spring_energy, work = self._spring_energy(u), np.einsum("mj,mj->m", self.held.force, u)
        applied = fields.load + self.held.force.sum(axis=1)
        balance = applied + np.where(np.isnan(reaction), 0.0, reaction).sum(axis=1) + fields.bedding_force
        strain = fields.strain_energy + spring_energy
        if self.chain.bonded is not None:
            strain = strain + self_stress(
                self.chain.bonded,
                self.chain.length,
                self.loads.temperature,
                mesh.start,
                mesh.end,
                mesh.segment,
            )
        arrays = {
            "start": mesh.start,
            "end": mesh.end,
            "displacement": fields.displacement,
            "force": fields.force,
            "joint_displacement": u[:, joints],
            "reaction": reaction,
            "loads": applied,
            "bedding": fields.bedding_force,
            "residual": balance,
            "strain_energy": strain,
            "potential": strain - fields.work - work,
            "error_bound": self.bound.relative(),
            "force_bound": self._force_bound(joints),
        }
        mesh.segment.setflags(write=False)
        return Solution(segment=mesh.segment, **{name: frozen(array) for name, array in arrays.items()})

    def _reactions(self) -> FloatArray:
        at, fields = self.held, self.fields
        reaction = np.full(at.force.shape, np.nan)
        reaction[:, at.sprung] = spring_force(at, self.ends)
        whole = -at.force
        whole[:, :-1] -= fields.start_force
        whole[:, 1:] += fields.end_force
        reaction[:, at.fixed] = whole[:, at.fixed]
        return reaction

    def _spring_energy(self, u: FloatArray) -> FloatArray:
        at = self.held
        shortening = u[:, at.sprung] - at.movement[:, at.sprung]
        return np.asarray((shortening * shortening) @ at.spring / 2)

    def _force_bound(self, joints: IntArray) -> FloatArray:
        flexibility = np.add.reduceat(self.fields.flexibility, joints[:-1])
        return self.bound.of_force(flexibility, self.chain.bedding.mean(axis=1) * self.chain.length)


def blocks(mesh: Mesh) -> Iterator[tuple[Where, int]]:
    """The elements in blocks of one kind: which, and their degree, 0 for the closed form."""
    kind = np.where(mesh.closed, 0, mesh.degree)
    for degree in np.unique(kind).tolist():
        members = np.flatnonzero(kind == degree)
        step = STACKED_BLOCK if degree else CLOSED_BLOCK
        for first in range(0, members.size, step):
            yield as_slice(members[first : first + step]), degree


def as_slice(index: IntArray) -> Where:
    """A slice where the indices follow each other, which numpy reads without copying."""
    first, last = int(index[0]), int(index[-1])
    return slice(first, last + 1) if last - first + 1 == index.size else index


def condensations(chain: Chain, loads: Loads, mesh: Mesh) -> list[Part]:
    """Every block condensed."""
    parts: list[Part] = []
    for where, degree in blocks(mesh):
        data = block(chain, loads, mesh, where)
        parts.append((where, Stacked(data, degree) if degree else ClosedForm(data)))
    return parts


def joined(parts: list[Part], states: int, elements: int) -> Condensed:
    """What the joints see of all elements."""
    whole = Condensed(
        mean_mean=np.empty(elements),
        mean_stretch=np.empty(elements),
        stretch_stretch=np.empty(elements),
        load_mean=np.empty((states, elements)),
        load_stretch=np.empty((states, elements)),
    )
    for where, part in parts:
        ends = part.condensed
        whole.mean_mean[where] = ends.mean_mean
        whole.mean_stretch[where] = ends.mean_stretch
        whole.stretch_stretch[where] = ends.stretch_stretch
        whole.load_mean[:, where] = ends.load_mean
        whole.load_stretch[:, where] = ends.load_stretch
    return whole


def gathered(parts: list[Part], mean: FloatArray, stretch: FloatArray, mesh: Mesh) -> MemberFields:
    """The fields of all elements, from mean and stretch (m, e) of their end displacements."""
    states, elements = mean.shape
    stacked = not mesh.closed.all()
    degree = int(mesh.degree.max())
    displacement = np.zeros((states, elements, degree + 1))
    force = np.zeros((states, elements, degree + 3 if stacked else 3))
    start_force, end_force, error = np.empty_like(mean), np.empty_like(mean), np.zeros_like(mean)
    flexibility = np.empty(elements)
    sums: dict[str, FloatArray] = {}
    for where, part in parts:
        own = part.fields(mean[:, where], stretch[:, where])
        displacement[:, where, : own.displacement.shape[2]] = own.displacement
        force[:, where, : own.force.shape[2]] = own.force
        start_force[:, where], end_force[:, where] = own.start_force, own.end_force
        flexibility[where] = own.flexibility
        if own.error is not None:
            error[:, where] = own.error
        for name in SUMMED:
            sums[name] = sums.get(name, 0.0) + getattr(own, name)
    return MemberFields(displacement, force, start_force, end_force, error, flexibility, **sums)
