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
from solver.closing import CLOSED
from solver.condense import ClosedForm, Condensation, Condensed, Stacked
from solver.errors import Cancelled
from solver.joints import largest_load, spring_force, taken, unbalanced
from solver.mesh import Mesh, block
from solver.patterns import Group, patterns
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
        self.condensed = joined(parts, loads.gravity.size, mesh.segment.size)
        self.patterns = patterns(chain, loads, mesh, self.condensed)
        self.ends = self.patterns.ends
        if cancelled():
            raise Cancelled
        net = self.patterns.net
        mean, stretch = self.ends.mean(net), self.ends.stretch(net)
        self.fields = gathered(parts, mean, stretch, mesh)
        del parts  # a long member's are as large as its results: their memory serves the rest of the pass
        self.leftover = self.patterns.each(self._leftover)
        self.bound = self._bound(mean, stretch)

    def _leftover(self, group: Group) -> FloatArray:
        return unbalanced(group.held, group.ends, *self._end_forces(group))

    def _end_forces(self, group: Group) -> tuple[FloatArray, FloatArray]:
        return self.fields.start_force[group.states], self.fields.end_force[group.states]

    def _bound(self, mean: FloatArray, stretch: FloatArray) -> Bound:
        def leftover(group: Group) -> FloatArray:
            at, rows = group.held, (mean[group.states], stretch[group.states])
            roundings = joint_roundings(at, group.condensed, group.ends, *rows)
            return joint_share(group.system, self.leftover[group.states], roundings)

        rounding = displacement_share(self.condensed, self.ends, self.patterns.net)
        rounding += field_share(self.fields.force_norm + self.fields.strain_norm)
        return Bound(
            discretisation=np.sqrt(self.fields.error.sum(axis=1)),
            leftover=self.patterns.each(leftover),
            rounding=rounding,
            size=np.sqrt(self._size_squared()),
        )

    def _size_squared(self) -> FloatArray:
        fields = self.fields
        floor = FLOOR * np.abs(self.ends.high).max(axis=1) ** 2 * fields.stretching
        springs = self.patterns.each(
            lambda group: np.asarray(group.ends.high[:, group.held.sprung] ** 2 @ group.held.spring)
        )
        return np.asarray(fields.norm + fields.strain_norm + springs + floor)

    def largest_force(self) -> FloatArray:
        """(m,) N, the largest of all forces that meet at a joint, and of what the loads do there."""
        found = (np.abs(self.fields.start_force).max(axis=1), np.abs(self.fields.end_force).max(axis=1))
        loads = self.patterns.each(lambda group: largest_load(group.held, group.condensed))
        return np.asarray(np.max([*found, loads], axis=0))

    def solution(self) -> Solution:
        """What the caller gets."""
        fields, mesh, joints = self.fields, self.mesh, self.patterns.net.joints
        u = self.ends.high + self.ends.low
        reaction = self.patterns.each(self._reactions)[:, joints]
        push, gap = self._contacts(u)
        force = self.loads.joint_force
        work = np.einsum("mj,mj->m", force, u[:, joints])
        applied = fields.load + force.sum(axis=1)
        balance = applied + np.where(np.isnan(reaction), 0.0, reaction).sum(axis=1) + fields.bedding_force
        strain = fields.strain_energy + self._spring_energy(u[:, joints], push)
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
            "push": push,
            "gap": gap,
            "loads": applied,
            "bedding": fields.bedding_force,
            "residual": balance,
            "strain_energy": strain,
            "potential": strain - fields.work - work,
            "error_bound": self.bound.relative(),
            "force_bound": self._force_bound(),
        }
        mesh.segment.setflags(write=False)
        return Solution(segment=mesh.segment, **{name: frozen(array) for name, array in arrays.items()})

    def _reactions(self, group: Group) -> FloatArray:
        at = group.held
        reaction = np.full(at.force.shape, np.nan)
        if self.chain.stops.joint.size:
            reaction[:, self.patterns.net.joints[self.chain.stops.joint]] = 0.0
        reaction[:, at.sprung] = spring_force(at, group.ends)
        reaction[:, at.fixed] = taken(at, *self._end_forces(group))[:, at.fixed]
        return reaction

    def _contacts(self, u: FloatArray) -> tuple[FloatArray, FloatArray]:
        """(m, s) contact forces, 0 where next to nothing pushes, and the clearances that remain."""
        found, fields = self.patterns, self.fields
        if not found.contacts.node.size:
            return np.zeros(found.closed.shape), np.zeros(found.closed.shape)
        push = found.contact_forces(fields.start_force, fields.end_force)
        largest = np.maximum(self.largest_force(), push.max(axis=1))
        push = np.where(push > CLOSED * largest[:, None], push, 0.0)
        gap = np.maximum(found.contacts.gap(found.contacts.relative(u)), 0.0)
        return push, np.where(push > 0.0, 0.0, gap)

    def _spring_energy(self, u: FloatArray, push: FloatArray) -> FloatArray:
        """(m,) of the springs and the closed stops, from the displacements (m, n + 1) of the joints."""
        sprung = np.flatnonzero(self.chain.spring)
        shortening = u[:, sprung] - self.loads.movement[:, sprung]
        in_springs = (shortening * shortening) @ self.chain.spring[sprung] / 2
        if not push.shape[1]:
            return np.asarray(in_springs)
        return np.asarray(in_springs + (push * push) @ (1.0 / self.patterns.contacts.stiffness) / 2)

    def _force_bound(self) -> FloatArray:
        first = self.mesh.joints(self.chain.length.size)[:-1]
        flexibility = np.add.reduceat(self.fields.flexibility, first)
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
