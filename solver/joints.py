"""The tridiagonal system of the joints: assembled, factored once, solved for all states together.

"Joints" are here the nodes: the ends of all elements. A support that holds a joint takes its equation out
(one on the diagonal, nothing beside it), so that the matrix stays symmetric, positive definite and
tridiagonal, as LAPACK's pttrf and pttrs want it. Where companions make loops it is sparse instead
(`solver.sparse_system`).

The solution is kept as a sum of two doubles, the second being what iterative refinement adds: the stretch of
an element is the difference of its ends, and where a stiff part hangs on a soft spring it lies in digits that
a single double no longer has. The plain sum would lose them again. One step of refinement is enough up to
stiffnesses some 1e9 apart, and only beyond are there more.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import TYPE_CHECKING

import numpy as np
from scipy.linalg.lapack import dpttrf, dpttrs

from solver.arrays import FloatArray, IntArray
from solver.chain import Chain, Loads
from solver.condense import Condensed
from solver.net import Net

if TYPE_CHECKING:
    from solver.sparse_system import SparseSystem  # costly, and needed only where there are companions

REFINEMENTS = 4
SETTLED = 1e-9  # a correction up to this part of the displacement needs no other after it


@dataclass(frozen=True, slots=True)
class Held:
    """Supports and joint loads at the ends of the elements."""

    net: Net
    fixed: IntArray  # which nodes are held
    sprung: IntArray  # (s,) which other nodes have a spring
    spring: FloatArray  # (s,) its stiffness
    force: FloatArray  # (m, nodes)
    movement: FloatArray  # (m, nodes) where what holds the node would have it


@dataclass(frozen=True, slots=True)
class Displacements:
    """Of the nodes, (m, nodes) each: the displacement is their sum."""

    high: FloatArray
    low: FloatArray

    def corrected(self, correction: FloatArray) -> Displacements:
        """With the correction added, the high part again the sum's nearest double."""
        low = self.low + correction
        high = self.high + low
        return Displacements(high, low - (high - self.high))

    def mean(self, net: Net) -> FloatArray:
        """(m, e) the mean of each element's ends."""
        total = self.high + self.low
        return np.asarray((total[:, net.end] + total[:, net.start]) / 2)

    def stretch(self, net: Net) -> FloatArray:
        """(m, e) end less start of each element."""
        high, low = self.high, self.low
        return np.asarray((high[:, net.end] - high[:, net.start]) + (low[:, net.end] - low[:, net.start]))


class FactorError(Exception):
    """The factor met a pivot that is not positive, at the node `at`: no digit is left there."""

    def __init__(self, at: int, largest_load: FloatArray) -> None:
        super().__init__(f"pivot {at}")
        self.at = at
        self.largest_load = largest_load  # (m,) N


def held(chain: Chain, loads: Loads, net: Net) -> Held:
    """Supports and joint loads spread from the joints to the nodes."""
    fixed, sprung = np.flatnonzero(chain.fixed), np.flatnonzero((chain.spring > 0.0) & ~chain.fixed)
    spring, force, movement = chain.spring[sprung], loads.joint_force, loads.movement
    if net.count > net.joints.size:
        joints, shape = net.joints, (force.shape[0], net.count)
        fixed, sprung = joints[fixed], joints[sprung]
        force, movement = np.zeros(shape), np.zeros(shape)
        force[:, joints], movement[:, joints] = loads.joint_force, loads.movement
    return Held(net, fixed, sprung, spring, force, movement)


class JointSystem:
    """The condensed matrix K, factored."""

    def __init__(self, condensed: Condensed, at: Held) -> None:
        self._ends = condensed
        self._held = at
        self._bedded = bool(condensed.mean_mean.any())
        self._sparse = None if at.net.plain else self._of_loops()
        if self._sparse is not None:
            return
        diagonal, beside = self._assembled()
        self._diagonal, self._beside, failed = dpttrf(diagonal, beside, overwrite_d=1, overwrite_e=1)
        if failed:
            raise FactorError(failed - 1, largest_load(at, condensed))

    def _of_loops(self) -> SparseSystem:
        from solver.sparse_system import NotPositive, SparseSystem

        at = self._held
        try:
            return SparseSystem(self._ends, at.net, at.fixed, at.sprung, at.spring)
        except NotPositive as lost:
            raise FactorError(0, largest_load(at, self._ends)) from lost

    def _assembled(self) -> tuple[FloatArray, FloatArray]:
        ends, fixed = self._ends, self._held.fixed
        quarter = ends.mean_mean / 4
        own = quarter + ends.stretch_stretch
        diagonal = np.zeros(own.size + 1)
        diagonal[self._held.sprung] = self._held.spring
        diagonal[:-1] += own - ends.mean_stretch
        diagonal[1:] += own + ends.mean_stretch
        beside = quarter - ends.stretch_stretch
        diagonal[fixed] = 1.0
        beside[fixed[fixed < beside.size]] = 0.0
        beside[fixed[fixed > 0] - 1] = 0.0
        return diagonal, beside

    def solve(self, right: FloatArray) -> FloatArray:
        """K⁻¹ right for (r, nodes); zero at held nodes where right is."""
        if self._sparse is not None:
            return self._sparse.solve(right)
        solution, _ = dpttrs(self._diagonal, self._beside, right.T)
        return np.asarray(solution.T)

    def displacements(self) -> Displacements:
        """Solve, and refine: once, and again only while a correction is more than rounding."""
        start = np.zeros_like(self._held.movement)
        start[:, self._held.fixed] = self._held.movement[:, self._held.fixed]
        self._held.net.follow(start)
        u = Displacements(start, np.zeros_like(start))
        u = u.corrected(self.solve(self._leftover(u)))
        for _ in range(REFINEMENTS):
            correction = self.solve(self._leftover(u))
            u = u.corrected(correction)
            if np.abs(correction).max() <= SETTLED * np.abs(u.high).max():
                break
        return u

    def _leftover(self, u: Displacements) -> FloatArray:
        return unbalanced(self._held, u, *self.end_forces(u))

    def end_forces(self, u: Displacements) -> tuple[FloatArray, FloatArray]:
        """(m, e) each, the axial force at the start and at the end of every element."""
        ends, stretch = self._ends, u.stretch(self._held.net)
        half_sum = ends.stretch_stretch * stretch - ends.load_stretch
        difference = -ends.load_mean
        if self._bedded:
            mean = u.mean(self._held.net)
            half_sum += ends.mean_stretch * mean
            difference = ends.mean_mean * mean + ends.mean_stretch * stretch - ends.load_mean
        return half_sum - difference / 2, half_sum + difference / 2


def unbalanced(at: Held, u: Displacements, start_force: FloatArray, end_force: FloatArray) -> FloatArray:
    """(m, nodes) the force along +x left over at each node; 0 where a support takes whatever comes."""
    left = at.force.copy()
    left[:, at.sprung] += spring_force(at, u)
    left[:, at.net.start] += start_force
    left[:, at.net.end] -= end_force
    at.net.hand_on(left)
    at.net.clear(left)
    left[:, at.fixed] = 0.0
    return left


def taken(at: Held, start_force: FloatArray, end_force: FloatArray) -> FloatArray:
    """(m, nodes) what a support at each node exerts, along +x, to balance all others that meet there."""
    whole = -at.force
    whole[:, at.net.start] -= start_force
    whole[:, at.net.end] += end_force
    at.net.hand_on(whole)
    return whole


def spring_force(at: Held, u: Displacements) -> FloatArray:
    """(m, s) what the springs exert on the member along +x."""
    sprung = at.sprung
    return np.asarray(at.spring * ((at.movement[:, sprung] - u.high[:, sprung]) - u.low[:, sprung]))


def largest_load(at: Held, ends: Condensed) -> FloatArray:
    """(m,) N, the largest of what loads do to a joint: by forces, by elements, by movements of supports."""
    own, net = ends.stretch_stretch + ends.mean_mean, at.net
    beside, stiffness = np.zeros(net.count), np.zeros(net.count)
    beside[net.start] = own
    beside[net.end] = np.maximum(beside[net.end], own)
    if net.tied.size:
        np.maximum.at(beside, net.to, beside[net.tied])
    stiffness[at.sprung] = np.minimum(at.spring, beside[at.sprung])  # a stiffer one moves the element
    stiffness[at.fixed] = beside[at.fixed]
    loads = (at.force, ends.load_stretch, ends.load_mean, stiffness * at.movement)
    return np.asarray(np.max([np.abs(load).max(axis=1) for load in loads], axis=0))
