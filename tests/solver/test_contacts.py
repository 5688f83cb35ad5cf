"""Stops: against every choice of open and closed contacts, and by cases that a reader can check by hand."""

from __future__ import annotations

from contextlib import suppress
from dataclasses import replace
from itertools import product

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from numpy.testing import assert_allclose

from solver import closing, patterns
from solver.axial import solve_axial
from solver.chain import Stops
from solver.errors import NotSolvable, never
from solver.passes import Pass
from solver.refine import first_mesh
from tests.solver.chains import chain_of, loads_of, random_loads, random_prismatic, random_tapered
from tests.solver.test_bound import Difference

NAMES = ("First", "Second", "Third")
INF = np.inf


def stops_of(*given_ones):
    """Each as (joint, side, clearance) or with its stiffness behind."""
    rows = [(*one, INF) if len(one) == 3 else one for one in given_ones]
    joint, side, clearance, stiffness = zip(*sorted(rows, key=lambda row: row[0]), strict=True)
    return Stops(
        np.array(joint), np.array(side, float), np.array(clearance, float), np.array(stiffness, float)
    )


def random_stops(rng, count):
    """Up to six of every kind, zero clearances and several at one joint among them."""
    number = int(rng.integers(1, 7))
    return Stops(
        joint=np.sort(rng.integers(0, count, number)),
        side=rng.choice([-1.0, 1.0], number),
        clearance=rng.choice([0.0, 1.0, 1.0], number) * 10 ** rng.uniform(-5, -3, number),
        stiffness=np.where(rng.random(number) < 0.5, INF, 10 ** rng.uniform(6, 10, number)),
    )


class Dense:
    """A prismatic unbedded member in one state as a full matrix, solved for any choice of closed stops."""

    def __init__(self, chain, loads, state):
        count = chain.length.size
        stiffness = chain.modulus * chain.area[:, 1] / chain.length
        self.stops, self.movement = chain.stops, loads.movement[state]
        self.fixed = np.flatnonzero(chain.fixed)
        self.held = bool(chain.fixed.any() or chain.spring.any())
        self.matrix = np.diag(chain.spring)
        self.right = loads.joint_force[state] + chain.spring * self.movement
        q = loads.distributed[state] + (loads.gravity[state] * chain.density * chain.area[:, 1])[:, None]
        strain = (
            chain.expansion * loads.temperature[state].mean(axis=1) + loads.lack_of_fit[state] / chain.length
        )
        for i in range(count):
            self.matrix[i : i + 2, i : i + 2] += stiffness[i] * np.array([[1, -1], [-1, 1]])
            self.right[i : i + 2] += chain.length[i] / 6 * (np.array([[2, 1], [1, 2]]) @ q[i])
            self.right[i : i + 2] += stiffness[i] * chain.length[i] * strain[i] * np.array([-1, 1])

    def with_closed(self, closed):
        """u (n + 1) and the forces (s) by a bordered matrix; the least one where it is singular."""
        stops, held = self.stops, self.fixed
        shut = np.flatnonzero(closed)
        n, k = self.matrix.shape[0], held.size + shut.size
        whole, right = np.zeros((n + k, n + k)), np.zeros(n + k)
        whole[:n, :n], right[:n] = self.matrix, self.right
        scale = np.abs(self.matrix).max()
        for row, joint in enumerate(held, start=n):
            whole[row, joint] = whole[joint, row] = scale
            right[row] = scale * self.movement[joint]
        for row, i in enumerate(shut, start=n + held.size):
            joint = stops.joint[i]
            whole[row, joint] = whole[joint, row] = scale * stops.side[i]
            whole[row, row] = -(scale**2) / stops.stiffness[i]
            right[row] = scale * (stops.side[i] * self.movement[joint] + stops.clearance[i])
        solution = np.linalg.lstsq(whole, right, rcond=1e-13)[0]
        sound = np.abs(whole @ solution - right).max() <= 1e-9 * np.abs(right).max(initial=1e-9)
        force = np.zeros(closed.size)
        force[shut] = scale * solution[n + held.size :]
        return solution[:n], force, sound

    def by_enumeration(self):
        """The displacements of the first choice without contradiction that holds the member, or None."""
        stops = self.stops
        for choice in product([False, True], repeat=stops.joint.size):
            u, force, sound = self.with_closed(np.array(choice))
            gap = stops.clearance - stops.side * (u - self.movement)[stops.joint]
            size, largest = np.abs(u).max(initial=1e-9), np.abs(force).max(initial=1e-6)
            pressed_in = gap[~np.array(choice)].min(initial=0.0) < -1e-8 * size
            if sound and not pressed_in and force.min(initial=0.0) >= -1e-8 * largest and self._holds(force):
                return u
        return None

    def _holds(self, force):
        return self.held or force.max(initial=0.0) > 1e-9 * np.abs(self.right).max(initial=1.0)


@settings(max_examples=150)
@given(seed=st.integers(0, 2**32), alone=st.booleans())
def test_agrees_with_all_choices_of_closed_contacts(seed, alone):
    rng = np.random.default_rng(seed)
    chain = random_prismatic(rng)
    size = chain.length.size + 1
    chain = replace(chain, modulus=10 ** rng.uniform(10, 11.5, size - 1), stops=random_stops(rng, size))
    chain = replace(chain, spring=np.where(chain.spring > 0, 10 ** rng.uniform(6, 9, size), 0.0))
    if alone:
        chain = replace(chain, fixed=np.zeros(size, bool), spring=np.zeros(size))
    loads = random_loads(rng, replace(chain, fixed=np.ones(size, bool)), 1)
    expected = Dense(chain, loads, 0).by_enumeration()
    if expected is None:
        with pytest.raises(NotSolvable, match="not_pressed"):
            solve_axial(chain, loads, NAMES[:1])
        return
    solution = solve_axial(chain, loads, NAMES[:1])
    scale = np.abs(expected).max() + 1e-6
    assert_allclose(solution.joint_displacement[0], expected, rtol=0, atol=1e-7 * scale)
    assert_complementary(chain, loads, solution)


def assert_complementary(chain, loads, solution):
    stops = chain.stops
    moved = solution.joint_displacement[:, stops.joint] - loads.movement[:, stops.joint]
    gap = stops.clearance - stops.side * moved
    noise = 1e-12 * np.abs(solution.joint_displacement).max()
    rigid = np.isinf(stops.stiffness)
    assert (gap[:, rigid] >= -noise).all()
    assert (solution.push >= 0).all()
    assert (solution.gap >= 0).all()
    assert ((solution.push == 0) | (solution.gap == 0)).all()
    open_ones = solution.push == 0
    assert_allclose(solution.gap[open_ones], np.maximum(gap, 0)[open_ones], atol=noise)
    # what the supports of a joint do adds up to its reaction
    springs = -chain.spring * (solution.joint_displacement - loads.movement)
    total = np.where(chain.spring > 0, springs, 0.0)
    np.add.at(total.T, stops.joint, (-stops.side * solution.push).T)
    free = ~chain.fixed & ~np.isnan(solution.reaction[0])
    largest = 1e-6 + np.abs(solution.force).max() + np.nanmax(np.abs(solution.reaction))
    assert_allclose(total[:, free], solution.reaction[:, free], atol=1e-7 * largest)
    assert (np.abs(solution.residual) <= 1e-9 * largest).all()


BAR = {"length": [1.0, 1.0], "rigidity_or_area": [1e-3, 1e-3], "modulus": 2e11}
STIFF = 2e8  # EA/L of each half


def test_a_gap_closes_and_the_rest_of_the_load_goes_to_the_stop():
    chain = replace(chain_of(**BAR, fixed=[0]), stops=stops_of((2, 1, 1e-4)))
    loads = loads_of(chain, 3)
    loads.joint_force[:, 2] = [5e3, 1e4, 3e4]  # the gap takes EA/2L · 1e-4 = 1e4
    solution = solve_axial(chain, loads, NAMES)
    assert_allclose(solution.push[:, 0], [0, 0, 2e4], atol=1e-6)
    assert_allclose(solution.gap[:, 0], [5e-5, 0, 0], atol=1e-15)
    assert_allclose(solution.joint_displacement[:, 2], [5e-5, 1e-4, 1e-4], rtol=1e-12)
    assert_allclose(solution.reaction[:, 2], [0, 0, -2e4], atol=1e-6)
    assert_allclose(solution.reaction[:, 0], [-5e3, -1e4, -1e4], rtol=1e-12)


def test_a_stop_with_stiffness_is_a_spring_behind_its_gap():
    chain = replace(chain_of(**BAR, fixed=[0]), stops=stops_of((2, 1, 1e-4, 1e8)))
    solution = solve_axial(chain, loads_of(chain, force=[(2, 3e4)]), NAMES[:1])
    u = (3e4 + 1e8 * 1e-4) / (1e8 + 1e8)
    assert_allclose(solution.joint_displacement[0, 2], u, rtol=1e-12)
    assert_allclose(solution.push[0, 0], 1e8 * (u - 1e-4), rtol=1e-11)
    strain = 0.5 * 1e8 * u**2 + 0.5 * 1e8 * (u - 1e-4) ** 2
    assert_allclose(solution.strain_energy[0], strain, rtol=1e-11)
    assert_allclose(solution.potential[0], strain - 3e4 * u, rtol=1e-11)


@pytest.mark.parametrize("stiffness", [1e15, 1e18, 1e21, 1e24])
def test_a_stop_that_hardly_gives_way_pushes_with_what_its_joint_is_held(stiffness):
    # it is pressed in by less than a displacement has digits for; a second one shares the force with it
    stops = stops_of((2, 1, 1e-3, stiffness), (2, 1, 1e-3, stiffness / 4), (1, 1, 1.0, 1e8))
    chain = replace(chain_of(**BAR, fixed=[0]), stops=stops)
    loads = loads_of(chain, 2, movement=[(2, -1e-3)])
    loads.joint_force[:, 2] = [100.0, 1e5]
    solution = solve_axial(chain, loads, NAMES[:2])
    assert_allclose(solution.push[:, 1:], [[80.0, 20.0], [8e4, 2e4]], rtol=1e-6)
    assert_allclose(-solution.push.sum(axis=1), solution.reaction[:, 2], rtol=1e-11)


def test_a_movement_takes_the_stop_along_and_the_clearance_is_never_factored():
    chain = replace(chain_of(**BAR, fixed=[0]), stops=stops_of((2, -1, 1e-4)))
    loads = loads_of(chain, 2, movement=[(2, 0.0)])
    loads.movement[:, 2] = [2e-4, 4e-4]  # pushes the end up to movement less clearance
    solution = solve_axial(chain, loads, NAMES[:2])
    assert_allclose(solution.joint_displacement[:, 2], [1e-4, 3e-4], rtol=1e-12)
    assert_allclose(solution.push[:, 0], [1e4, 3e4], rtol=1e-11)
    assert_allclose(solution.reaction[:, 2], [1e4, 3e4], rtol=1e-11)


def test_facing_rigid_stops_without_clearance_hold_like_a_fixed_support(monkeypatch):
    chain = replace(chain_of(**BAR), stops=stops_of((0, 1, 0.0), (0, -1, 0.0)))
    loads = loads_of(chain, 3, movement=[(0, 1e-3)])
    loads.joint_force[:, 2] = [3e4, -3e4, 0.0]
    monkeypatch.setattr(closing, "complementary", None)  # there is nothing to find out
    solution = solve_axial(chain, loads, NAMES)
    fixed = solve_axial(chain_of(**BAR, fixed=[0]), loads, NAMES)
    assert_allclose(solution.joint_displacement, fixed.joint_displacement, rtol=1e-14)
    assert_allclose(solution.reaction[:, 0], fixed.reaction[:, 0])
    assert_allclose(solution.push[:2], [[3e4, 0], [0, 3e4]], rtol=1e-12)
    assert not solution.push[2].any()
    assert not solution.gap.any()


@pytest.mark.parametrize("first", [INF, 1e8])
@pytest.mark.parametrize("second", [INF, 2e8])
def test_facing_stops_without_clearance_push_one_way_each(first, second):
    chain = replace(chain_of(**BAR), stops=stops_of((2, 1, 0.0, first), (2, -1, 0.0, second)))
    loads = loads_of(chain, 3)
    loads.joint_force[:, 0] = [1e4, -1e4, 0.0]
    solution = solve_axial(chain, loads, NAMES)
    assert_allclose(solution.push, [[1e4, 0], [0, 1e4], [0, 0]], rtol=1e-11)
    assert_allclose(solution.joint_displacement[:, 2], [1e4 / first, -1e4 / second, 0.0], atol=1e-18)


def test_a_member_in_the_play_between_two_stops_floats_until_it_grows_into_both():
    chain = chain_of(**BAR, expansion=1e-5)
    chain = replace(chain, stops=stops_of((0, -1, 0.0), (2, 1, 1e-3)))
    with pytest.raises(NotSolvable) as refused:
        solve_axial(chain, loads_of(chain, temperature=49.0), NAMES[:1])
    assert refused.value.combinations == ("First",)
    assert refused.value.faults[0].rule == "not_pressed"
    touching = solve_axial(chain, loads_of(chain, temperature=50.0), NAMES[:1])
    assert_allclose(touching.joint_displacement[0], [0, 5e-4, 1e-3], atol=1e-15)
    assert not touching.push.any()
    clamped = solve_axial(chain, loads_of(chain, temperature=60.0), NAMES[:1])
    assert_allclose(clamped.push[0], 2e8 * 1e-5 * 10.0, rtol=1e-10)


@pytest.mark.parametrize("force", [0.0, -1e4])
def test_a_stop_that_nothing_presses_does_not_hold(force):
    chain = replace(chain_of(**BAR), stops=stops_of((2, 1, 1e-3)))
    pressed = solve_axial(chain, loads_of(chain, force=[(1, 1e4)]), NAMES[:1])
    assert_allclose(pressed.joint_displacement[0], [1e-3 + 1e4 / STIFF] * 2 + [1e-3], rtol=1e-12)
    loads = loads_of(chain, 2)
    loads.joint_force[:, 1] = [1e4, force]
    with pytest.raises(NotSolvable) as refused:
        solve_axial(chain, loads, NAMES[:2])
    assert refused.value.combinations == ("Second",)
    assert refused.value.states == (1,)


def test_forces_that_cancel_to_rounding_do_not_press():
    chain = replace(chain_of(**BAR), stops=stops_of((2, 1, 1e-3)))
    loads = loads_of(chain, force=[(0, 0.1 + 0.2), (2, -0.3)])
    assert loads.joint_force.sum() > 0.0
    with pytest.raises(NotSolvable):
        solve_axial(chain, loads, NAMES[:1])


def test_supports_at_one_joint_work_together():
    # spring, soft stop and rigid stop at the end: the stops take over one after the other
    chain = replace(
        chain_of(**BAR, fixed=[0], spring=[(2, 1e8)]), stops=stops_of((2, 1, 1e-4, 2e8), (2, 1, 2e-4))
    )
    loads = loads_of(chain, 3)
    loads.joint_force[:, 2] = [1e4, 3e4, 1e5]
    solution = solve_axial(chain, loads, NAMES)
    assert_allclose(solution.joint_displacement[:, 2], [5e-5, 1.25e-4, 2e-4], rtol=1e-12)
    assert_allclose(solution.push, [[0, 0], [5e3, 0], [2e4, 4e4]], rtol=1e-10, atol=1e-6)
    assert_allclose(solution.reaction[:, 2], [-5e3, -1.25e4 - 5e3, -8e4], rtol=1e-11)


def test_stops_at_a_fixed_joint_stay_open():
    chain = replace(chain_of(**BAR, fixed=[0]), stops=stops_of((0, 1, 0.0), (0, -1, 1e-3), (0, -1, 0.0)))
    solution = solve_axial(chain, loads_of(chain, force=[(2, 1e4)]), NAMES[:1])
    assert not solution.push.any()
    assert_allclose(solution.gap[0], [0, 1e-3, 0])
    assert_allclose(solution.reaction[0, 0], -1e4)


def test_of_two_alike_one_takes_the_force():
    chain = replace(chain_of(**BAR), stops=stops_of((2, 1, 1e-3), (2, 1, 1e-3)))
    solution = solve_axial(chain, loads_of(chain, force=[(0, 1e4)]), NAMES[:1])
    assert_allclose(sorted(solution.push[0]), [0, 1e4], atol=1e-8)


def test_changing_sides_finds_the_same_contacts_and_most_often_alone(monkeypatch):
    asked, whole = [], patterns.closed_contacts
    monkeypatch.setattr(patterns, "closed_contacts", lambda *given: asked.append(1) or whole(*given))
    fallen_back = 0
    for seed in range(24):
        rng = np.random.default_rng(seed)
        chain = random_tapered(rng)
        chain = replace(chain, stops=random_stops(rng, chain.length.size + 1))
        loads = random_loads(rng, chain, 3)
        expected = solve_axial(chain, loads, NAMES)
        asked.clear()
        with monkeypatch.context() as at_once:
            at_once.setattr(patterns, "FEW", 0)
            found = solve_axial(chain, loads, NAMES)
        fallen_back += len(asked)
        assert_allclose(found.push, expected.push, rtol=1e-9, atol=1e-9 * np.abs(expected.force).max())
    assert 1 <= fallen_back <= 3


@pytest.mark.parametrize("seed", range(12))
def test_a_state_alone_comes_out_as_among_others(seed):
    rng = np.random.default_rng(seed)
    chain = random_tapered(rng, bedded=seed % 2 == 0)
    chain = replace(chain, stops=random_stops(rng, chain.length.size + 1))
    loads = random_loads(rng, chain, 3)
    together = solve_axial(chain, loads, NAMES)
    for state in range(3):
        some = replace(loads, **{n: getattr(loads, n)[state : state + 1] for n in loads.__slots__})
        alone = solve_axial(chain, some, NAMES[:1])
        scale = np.abs(together.push[state]).max() + np.abs(together.force[state]).max()
        assert_allclose(alone.push[0], together.push[state], rtol=1e-8, atol=1e-8 * scale)
        assert_allclose(alone.potential[0], together.potential[state], rtol=1e-7)


def test_the_bound_holds_with_closed_stops():
    # ∫ EA e'² + 2 ∫ k e² + ∫ (N − y)² / EA ≤ Σ η², now an inequality, against a much finer solution
    seen = closed = 0
    for seed in range(40):
        rng = np.random.default_rng(seed)
        chain = random_tapered(rng, bedded=seed % 2 == 0)
        chain = replace(chain, stops=random_stops(rng, chain.length.size + 1))
        loads = random_loads(rng, chain)
        mesh = first_mesh(chain, 1e-3)
        coarse = Pass(chain, loads, replace(mesh, degree=np.where(mesh.closed, 3, 2)), never)
        eta, found = coarse.bound.discretisation[0], coarse.solution()
        if eta < 1e-6 * coarse.bound.size[0]:
            continue  # too near the finer one to be measured by it
        seen, closed = seen + 1, closed + bool(found.push.any())
        gap = Difference(chain, found, Pass(chain, loads, first_mesh(chain, 1e-12), never).solution())
        assert gap.elastic + gap.bedded + gap.force <= eta**2 * (1 + 1e-6), seed
        assert (gap.force_by_segment <= found.force_bound[0] * (1 + 1e-6)).all(), seed
    assert seen >= 25
    assert closed >= 12


def test_the_books_of_the_energies_balance():
    # 2 · strain = ∫ q u + Σ P u + Σ R d − ∫ N ε₀, d the support's movement, ± c at a closed stop
    for seed in range(24):
        rng = np.random.default_rng(seed)
        chain = random_prismatic(rng)
        size = chain.length.size + 1
        chain = replace(chain, modulus=np.full(size - 1, 2e11), expansion=np.zeros(size - 1))
        chain = replace(chain, stops=random_stops(rng, size), spring=np.where(chain.fixed, 0.0, chain.spring))
        loads = random_loads(rng, replace(chain, fixed=np.ones(size, bool)), 3)
        loads = replace(loads, lack_of_fit=np.zeros((3, size - 1)))
        solution = solve_axial(chain, loads, NAMES)
        stops, work = chain.stops, solution.strain_energy - solution.potential
        rest = loads.movement[:, stops.joint] + stops.side * stops.clearance
        parts = (
            -stops.side * solution.push * rest,
            -chain.spring * (solution.joint_displacement - loads.movement) * loads.movement,
            np.where(chain.fixed, solution.reaction * loads.movement, 0.0),
        )
        books = work + sum(part.sum(axis=1) for part in parts)
        scale = np.abs(work) + sum(np.abs(part).sum(axis=1) for part in parts) + solution.strain_energy
        assert (np.abs(2 * solution.strain_energy - books) <= 1e-9 * scale).all(), seed


@pytest.mark.parametrize("alone", [False, True])
def test_their_own_problem_needs_no_repair(monkeypatch, alone):
    monkeypatch.setattr(patterns, "REPAIRS", 1)
    solved = 0
    for seed in range(60):
        rng = np.random.default_rng(seed)
        chain = random_prismatic(rng)
        size = chain.length.size + 1
        chain = replace(chain, modulus=np.full(size - 1, 2e11), stops=random_stops(rng, size))
        if alone:
            chain = replace(chain, fixed=np.zeros(size, bool), spring=np.zeros(size))
        loads = random_loads(rng, replace(chain, fixed=np.ones(size, bool)), 2)
        with suppress(NotSolvable):
            solve_axial(chain, loads, NAMES[:2])
            solved += 1
    assert solved >= 30


def test_what_is_rounding_does_not_close_a_stop():
    rng = np.random.default_rng(7)
    sizes = rng.uniform(0.1, 2, 5), rng.uniform(1e-3, 4e-3, 5)
    chain = chain_of(*sizes, modulus=2.1e11, expansion=1.17e-5)
    chain = replace(chain, stops=stops_of((5, 1, 0.0), (5, -1, 0.0)))
    solution = solve_axial(chain, loads_of(chain, temperature=33.3), NAMES[:1])
    assert 0.0 < abs(solution.reaction[0, 5]) < 1e-6
    assert not solution.push.any()


def test_two_hundred_stops_of_a_member():
    rng = np.random.default_rng(5)
    count = 150
    chain = chain_of(np.full(count, 0.1), np.full(count, 1e-3), modulus=2e11, expansion=1.2e-5)
    joint, side = np.sort(rng.integers(0, count + 1, 200)), rng.choice([-1.0, 1.0], 200)
    stops = Stops(joint, side, rng.uniform(0, 2e-4, 200), np.where(rng.random(200) < 0.5, INF, 1e9))
    chain = replace(chain, stops=stops)
    loads = random_loads(rng, replace(chain, fixed=np.ones(count + 1, bool)), 3)
    solution = solve_axial(chain, loads, NAMES)
    assert (solution.push > 0).sum() > 30
    assert_complementary(chain, loads, solution)
