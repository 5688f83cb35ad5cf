"""The same members, given as the solver's arrays, in scikit-fem: what the solver is measured against."""

from __future__ import annotations

import numpy as np
from numpy.polynomial import legendre
from skfem import Basis, BilinearForm, LinearForm, MeshLine, condense, solve

from solver.chain import Chain, Loads
from solver.solution import Solution


@BilinearForm
def stiffness(u, v, w):
    return w.rigidity * u.grad[0] * v.grad[0] + w.bedding * u * v


@LinearForm
def work(v, w):
    return w.thermal * v.grad[0] + w.load * v


class Reference:
    """A member of `parts` equal elements a segment, assembled once and solved state by state."""

    def __init__(self, chain: Chain, loads: Loads, element, parts: int):
        count = chain.length.size
        self.joints = np.concatenate([[0.0], np.cumsum(chain.length)])
        points = np.interp(np.arange(count * parts + 1) / parts, np.arange(count + 1), self.joints)
        self.basis = Basis(MeshLine(points), element, intorder=6)
        self.segment = np.repeat(np.arange(count), parts)
        self.at_joints = self.basis.nodal_dofs[0, ::parts]
        self.displacement = self._solved(chain, loads)

    def _solved(self, chain: Chain, loads: Loads):
        """(m, dofs)"""
        i, x = self.segment[:, None], np.asarray(self.basis.global_coordinates())[0]
        s = (x - self.joints[i]) / chain.length[i]
        first, middle, last = chain.area[i].transpose(2, 0, 1)
        area = first * (1 - s) ** 2 + 2 * middle * s * (1 - s) + last * s**2
        rigidity = chain.modulus[i] * area

        def linear(ends):
            return ends[i, 0] * (1 - s) + ends[i, 1] * s

        matrix = stiffness.assemble(self.basis, rigidity=rigidity, bedding=linear(chain.bedding)).tolil()
        matrix[self.at_joints, self.at_joints] += chain.spring
        right = []
        for state in range(loads.gravity.size):
            strain = chain.expansion[i] * linear(loads.temperature[state])
            strain = strain + loads.lack_of_fit[state][i] / chain.length[i]
            load = linear(loads.distributed[state]) + loads.gravity[state] * chain.density[i] * area
            vector = work.assemble(self.basis, thermal=rigidity * strain, load=load)
            vector[self.at_joints] += loads.joint_force[state] + chain.spring * loads.movement[state]
            right.append(vector)
        return self._with_supports(chain, loads, matrix.tocsr(), np.array(right))

    def _with_supports(self, chain: Chain, loads: Loads, matrix, right):
        u = np.zeros_like(right)
        held = self.at_joints[chain.fixed]
        u[:, held] = loads.movement[:, chain.fixed]
        for state in range(u.shape[0]):
            u[state] = solve(*condense(matrix, right[state], x=u[state], D=held))
        return u

    def energy_error(self, chain: Chain, solution: Solution, state: int) -> float:
        """The error in the energy norm against `solution`, relative to its norm; for unbedded members."""
        t, w = legendre.leggauss(3)
        parts = self.segment.size // chain.length.size
        s = (np.arange(self.segment.size) % parts)[:, None] / parts + (1 + t) / (2 * parts)
        length = chain.length[self.segment][:, None]
        own = np.searchsorted(solution.segment + solution.end, self.segment[:, None] + s)
        part = (solution.end - solution.start)[own]
        exact = np.zeros_like(s)
        for e in range(solution.segment.size):  # slopes of a few long series, not of many short ones
            there = own == e
            local = 2 * (s[there] - solution.start[e]) / part[there] - 1
            exact[there] = legendre.legval(local, legendre.legder(solution.displacement[state, e]))
        exact *= 2 / (part * length)
        ends = self.displacement[state, self.basis.nodal_dofs[0]]
        ours = (np.diff(ends) / (length[:, 0] / parts))[:, None]
        first, middle, last = chain.area[self.segment].T[:, :, None]
        area = first * (1 - s) ** 2 + 2 * middle * s * (1 - s) + last * s**2
        weights = w * length / (2 * parts) * chain.modulus[self.segment][:, None] * area
        return float(np.sqrt((weights * (exact - ours) ** 2).sum() / (weights * exact**2).sum()))
