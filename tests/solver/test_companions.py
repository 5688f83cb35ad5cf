"""Companions as arrays: against a dense matrix and every choice of separated ones, and by hand."""

from __future__ import annotations

from dataclasses import replace
from itertools import product

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from numpy.testing import assert_allclose

from solver.axial import solve_axial
from solver.chain import Companions
from solver.errors import NotSolvable, never
from solver.passes import Pass
from solver.refine import first_mesh
from tests.solver.chains import chain_of, loads_of, random_loads, random_prismatic, random_tapered
from tests.solver.test_contacts import stops_of

NAMES = ("First", "Second", "Third")


def beside(chain, *companions):
    """Each as (start, end, parting, [length], [area]); modulus and the like as the member's first."""
    lengths, areas = (np.concatenate([one[i] for one in companions]) for i in (3, 4))
    count = lengths.size

    def longer(values, more):
        return np.concatenate([values, more])

    return replace(
        chain,
        length=longer(chain.length, lengths),
        modulus=longer(chain.modulus, np.full(count, chain.modulus[0])),
        area=longer(chain.area, np.repeat(areas[:, None], 3, axis=1)),
        bedding=longer(chain.bedding, np.zeros((count, 2))),
        expansion=longer(chain.expansion, np.full(count, chain.expansion[0])),
        density=longer(chain.density, np.full(count, chain.density[0])),
        companions=Companions(
            start=np.array([one[0] for one in companions]),
            end=np.array([one[1] for one in companions]),
            first=np.cumsum([0, *(len(one[3]) for one in companions)]),
            parting=np.array([one[2] for one in companions], float),
        ),
    )


def random_companions(rng, chain, number):
    """Over any span, of one to three parts each; some lie in others, some beside others."""
    joints = chain.fixed.size
    found = []
    for _ in range(number):
        start, end = np.sort(rng.choice(joints, 2, replace=False))
        parts = int(rng.integers(1, 4))
        length = np.full(parts, chain.length[start:end].sum() / parts)
        found.append((start, end, rng.choice([-1.0, 0.0, 1.0]), length, 10 ** rng.uniform(-4, -2, parts)))
    return beside(chain, *found)


class Dense:
    """Prismatic, unbedded: every chain condensed to springs between the member's joints, by hand."""

    def __init__(self, chain, loads):
        self.chain, joints = chain, chain.fixed.size
        first = joints - 1 + chain.companions.first
        self.parting = np.flatnonzero(chain.companions.parting)
        self.size = joints + int(first[-1] - first[0])  # a companion's inner nodes and its far end
        self.matrix, self.right = np.zeros((self.size, self.size)), np.zeros(self.size)
        self.matrix[np.arange(joints), np.arange(joints)] = chain.spring
        self.right[:joints] = loads.joint_force[0] + chain.spring * loads.movement[0]
        for i in range(joints - 1):
            self._add(loads, i, i, i + 1)
        node, self.far = joints, []
        for c, start in enumerate(chain.companions.start):
            here = start
            for i in range(first[c], first[c + 1]):
                self._add(loads, i, here, node)
                here, node = node, node + 1
            self.far.append(node - 1)
        self.movement = loads.movement[0]

    def _add(self, loads, i, start, end):
        chain, both = self.chain, [start, end]
        stiffness, length = chain.modulus[i] * chain.area[i, 1] / chain.length[i], chain.length[i]
        q = loads.distributed[0, i] + loads.gravity[0] * chain.density[i] * chain.area[i, 1]
        strain = chain.expansion[i] * loads.temperature[0, i].mean() + loads.lack_of_fit[0, i] / length
        self.matrix[np.ix_(both, both)] += stiffness * np.array([[1, -1], [-1, 1]])
        self.right[both] += length / 6 * (np.array([[2, 1], [1, 2]]) @ q)
        self.right[both] += stiffness * length * strain * np.array([-1, 1])

    def with_closed(self, closed):
        """u and the push of every companion that can part, by Lagrange multipliers."""
        rows = []
        for c, far in enumerate(self.far):
            if c in self.parting and not closed[c]:
                continue
            rows.append((far, self.chain.companions.end[c], 0.0))
        rows += [(j, None, self.movement[j]) for j in np.flatnonzero(self.chain.fixed)]
        scale, n = np.abs(self.matrix).max(), self.size
        whole, right = np.zeros((n + len(rows), n + len(rows))), np.zeros(n + len(rows))
        whole[:n, :n], right[:n] = self.matrix, self.right
        for row, (node, other, value) in enumerate(rows, start=n):
            whole[row, node] = whole[node, row] = scale
            if other is not None:
                whole[row, other] = whole[other, row] = -scale
            right[row] = scale * value
        solution = np.linalg.solve(whole, right)
        push, row = np.zeros(len(self.far)), n
        for c in range(len(self.far)):
            if c in self.parting and not closed[c]:
                continue
            push[c] = self.chain.companions.parting[c] * scale * solution[row]
            row += 1
        return solution[:n], push

    def by_enumeration(self):
        """u of the joints and what the companions push with, of the choice without contradiction."""
        best = None
        for choice in product([False, True], repeat=len(self.far)):
            closed = np.array(choice)
            if (closed & (self.chain.companions.parting == 0)).any():
                continue
            u, push = self.with_closed(closed)
            gap = -self.chain.companions.parting * (u[self.far] - u[self.chain.companions.end])
            worst = max(
                -push.min(initial=0) / np.abs(self.right).max(), -gap.min(initial=0) / np.abs(u).max()
            )
            if best is None or worst < best[0]:
                best = (worst, u[: self.chain.fixed.size], push[self.parting])
        return best


@settings(max_examples=120)
@given(seed=st.integers(0, 2**32), number=st.integers(1, 4))
def test_agrees_with_all_choices_of_separated_companions(seed, number):
    rng = np.random.default_rng(seed)
    chain = random_prismatic(rng)
    count = chain.length.size
    spring = np.where(chain.spring > 0, 10 ** rng.uniform(6, 9, count + 1), 0.0)
    chain = replace(chain, modulus=np.full(count, 2e11), spring=np.where(chain.fixed, 0.0, spring))
    chain = random_companions(rng, chain, number)
    loads = with_member_joints(random_loads(rng, whole_joints(chain)), chain)
    worst, moved, push = Dense(chain, loads).by_enumeration()
    assert worst < 1e-6
    solution = solve_axial(chain, loads, NAMES[:1])
    assert_allclose(solution.joint_displacement[0], moved, rtol=0, atol=1e-8 * np.abs(moved).max() + 1e-14)
    assert_allclose(solution.push[0], push, rtol=0, atol=1e-7 * np.abs(solution.force).max() + 1e-6)


def whole_joints(chain):
    """The chain with as many joints as random loads take it to have."""
    joints = chain.length.size + 1
    return replace(chain, fixed=np.ones(joints, bool), spring=np.zeros(joints))


def with_member_joints(loads, chain):
    joints = chain.fixed.size
    movement = loads.movement[:, :joints] * (chain.fixed | (chain.spring > 0))
    return replace(loads, joint_force=loads.joint_force[:, :joints], movement=movement)


BAR = {"length": [1.0, 1.0], "rigidity_or_area": [1e-3, 1e-3], "modulus": 2e11, "fixed": [0]}


def loads_for(chain, states=1, **given_loads):
    plain = loads_of(replace(chain, fixed=np.ones(chain.length.size + 1, bool)), states, **given_loads)
    joints = chain.fixed.size
    return replace(plain, joint_force=plain.joint_force[:, :joints], movement=plain.movement[:, :joints])


def test_a_companion_tied_at_both_ends_is_a_spring_in_parallel():
    chain = beside(chain_of(**BAR), (0, 2, 0, [2.0], [3e-3]))
    solution = solve_axial(chain, loads_for(chain, force=[(2, 8e4)]), NAMES[:1])
    assert_allclose(solution.joint_displacement[0], [0, 1e-4, 2e-4], rtol=1e-12)
    assert_allclose(solution.force[0, :, 0], [2e4, 2e4, 6e4], rtol=1e-12)
    assert_allclose(solution.reaction[0, 0], -8e4, rtol=1e-12)


@pytest.mark.parametrize(("parting", "force"), [(1, 8e4), (-1, -8e4)])
def test_one_that_parts_takes_one_way_only(parting, force):
    chain = beside(chain_of(**BAR), (0, 2, parting, [2.0], [3e-3]))
    loads = loads_for(chain, 2)
    loads.joint_force[:, 2] = [force, -force]
    solution = solve_axial(chain, loads, NAMES[:2])
    assert_allclose(solution.push[:, 0], [0, 6e4], atol=1e-6)
    assert_allclose(solution.gap[:, 0], [8e-4, 0], atol=1e-14)
    assert_allclose(solution.joint_displacement[:, 2], [force / 1e8, -force / 4e8], rtol=1e-11)
    assert_allclose(solution.force[:, 2, 0], [0, -force * 3 / 4], atol=1e-6)


def test_a_companion_over_a_fixed_joint_and_between_two():
    chain = chain_of(length=[1.0] * 3, rigidity_or_area=[1e-3] * 3, modulus=2e11, fixed=[0, 3])
    chain = beside(chain, (0, 3, 0, [1.0, 2.0], [1e-3, 2e-3]), (1, 2, 1, [1.0], [1e-3]))
    solution = solve_axial(chain, loads_for(chain, force=[(1, 1e4), (2, -1e4)]), NAMES[:1])
    push = 1e4 / (1 + 1 + 0.5)  # squeezed middle: two bars against the two outer ones in series
    assert_allclose(solution.push[0], [push], rtol=1e-9)
    assert_allclose(solution.force[0, 3:5, 0], 0, atol=1e-8)


def test_a_member_between_stops_floats_unless_the_clamped_companion_makes_it_long():
    chain = chain_of(length=[1.0], rigidity_or_area=[1e-3], modulus=2e11)
    chain = replace(chain, stops=stops_of((0, -1, 0.0), (1, 1, 1e-4)))
    chain = beside(chain, (0, 1, 1, [1.0], [1e-3]))
    misfit = [[0, 3e-4]]  # clamped, both together are longer by half of it
    solution = solve_axial(chain, loads_for(chain, misfit=misfit), NAMES[:1])
    assert_allclose(solution.joint_displacement[0], [0, 1e-4], atol=1e-15)
    assert_allclose(solution.push[0], [2e4, 2e4, 4e4], rtol=1e-10)
    with pytest.raises(NotSolvable):
        solve_axial(chain, loads_for(chain, misfit=[[0, 1.9e-4]]), NAMES[:1])


@pytest.mark.parametrize("seed", range(12))
def test_the_bound_covers_the_companions(seed):
    rng = np.random.default_rng(seed)
    chain = random_companions(rng, random_tapered(rng, bedded=seed % 2 == 0), 2)
    loads = with_member_joints(random_loads(rng, whole_joints(chain)), chain)
    mesh = first_mesh(chain, 1e-3)
    coarse = Pass(chain, loads, replace(mesh, degree=np.where(mesh.closed, 3, 2)), never).solution()
    fine = solve_axial(chain, loads, NAMES[:1])
    begun = [_first_forces(solution, chain.length.size) for solution in (coarse, fine)]
    allowed = coarse.force_bound[0] + fine.force_bound[0]
    assert (np.abs(begun[0] - begun[1]) <= allowed * (1 + 1e-6)).all()


def _first_forces(solution, segments):
    first = np.searchsorted(solution.segment, np.arange(segments))
    return np.polynomial.legendre.legval(-1.0, solution.force[0, first].T)
