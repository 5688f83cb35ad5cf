"""The axial solver against statics and closed forms, and every error it can raise.

Exact solutions of whole random members are in test_bound; here are the cases a reader can check by hand.
"""

from __future__ import annotations

import numpy as np
import pytest
from numpy.polynomial import legendre
from numpy.testing import assert_allclose

from solver.axial import solve_axial
from solver.errors import Cancelled, NotSolvable, OutOfRange, StiffnessContrast
from solver.joints import FactorError
from tests.solver.chains import chain_of, loads_of, random_loads, random_prismatic, random_tapered

STEEL = 2.1e11
NAMES = ("First",)
CLOSE = {"rtol": 1e-12}


def ends(solution, what):
    """(m, e, 2) start and end values of a field held as Legendre series."""
    series = getattr(solution, what)
    return np.moveaxis(legendre.legval(np.array([-1.0, 1.0]), np.moveaxis(series, -1, 0)), -1, -1)


def random_member(seed, states=2):
    rng = np.random.default_rng(seed)
    chain = random_tapered(rng, bedded=seed % 2 == 0) if seed % 3 else random_prismatic(rng)
    loads = random_loads(rng, chain, states)
    return chain, loads, solve_axial(chain, loads, [f"S{i}" for i in range(states)])


def test_hanging_bar_under_its_own_weight():
    length, density, gravity = 30.0, 7850.0, 9.81
    chain = chain_of([length], [2e-3], modulus=STEEL, density=density, fixed=[0])
    solution = solve_axial(chain, loads_of(chain, gravity=gravity), NAMES)
    weight = density * gravity * 2e-3 * length
    assert_allclose(solution.joint_displacement[0, 1], density * gravity * length**2 / (2 * STEEL), **CLOSE)
    assert_allclose(solution.reaction[0, 0], -weight, **CLOSE)
    assert np.isnan(solution.reaction[0, 1])
    assert_allclose(ends(solution, "force")[0, 0], [weight, 0], rtol=1e-12, atol=1e-12 * weight)
    assert_allclose(solution.loads, weight, **CLOSE)
    assert solution.bedding[0] == 0
    # strain energy of a bar hanging: ∫ N²/2EA = W² L / 6EA, and Π = −strain where nothing is heated
    assert_allclose(solution.strain_energy[0], weight**2 * length / (6 * STEEL * 2e-3), **CLOSE)
    assert_allclose(solution.potential[0], -solution.strain_energy[0], **CLOSE)


def test_round_taper_under_end_load():
    d1, d2, length, force = 0.08, 0.03, 1.4, 5e4
    area = np.pi / 4 * np.array([[d1 * d1, d1 * d2, d2 * d2]])
    chain = chain_of([length], area, modulus=STEEL, fixed=[0])
    solution = solve_axial(chain, loads_of(chain, force=[(1, force)]), NAMES)
    stretch = 4 * force * length / (np.pi * STEEL * d1 * d2)
    assert_allclose(solution.joint_displacement[0, 1], stretch, rtol=1e-12)
    assert_allclose(ends(solution, "force"), force, **CLOSE)
    assert_allclose(solution.strain_energy[0], force * stretch / 2, **CLOSE)


def test_bar_held_at_both_ends_shares_the_load_by_the_far_lengths():
    a, b, force = 0.7, 1.9, 3e4
    chain = chain_of([a, b], [1e-3, 1e-3], modulus=STEEL, fixed=[0, 2])
    solution = solve_axial(chain, loads_of(chain, force=[(1, force)]), NAMES)
    assert_allclose(solution.reaction[0, [0, 2]], [-force * b / (a + b), -force * a / (a + b)], **CLOSE)
    assert_allclose(solution.residual, 0, atol=1e-11 * force)


def test_heated_bar_between_fixed_ends_and_between_springs():
    length, area, alpha, rise, spring = 2.0, 1e-3, 1.2e-5, 50.0, 4e7
    chain = chain_of([length], [area], modulus=STEEL, expansion=alpha, fixed=[0, 1])
    held = solve_axial(chain, loads_of(chain, temperature=rise), NAMES)
    assert_allclose(ends(held, "force"), -STEEL * area * alpha * rise, **CLOSE)
    chain = chain_of([length], [area], modulus=STEEL, expansion=alpha, spring=[(0, spring), (1, spring)])
    sprung = solve_axial(chain, loads_of(chain, temperature=rise), NAMES)
    expected = -alpha * rise * length / (length / (STEEL * area) + 2 / spring)
    assert_allclose(ends(sprung, "force"), expected, **CLOSE)
    assert_allclose(sprung.reaction[0], [-expected, expected], **CLOSE)


@pytest.mark.parametrize("mu", [0.1, 1.0, 5.0, 30.0])
def test_bedded_bar_with_a_head_load_along_its_length(mu):
    length, rigidity, force = 1.0, 3.0, 2.0
    bedding = mu**2 * rigidity
    chain = chain_of([length], [1.0], modulus=rigidity, bedding=[(bedding, bedding)])
    solution = solve_axial(chain, loads_of(chain, force=[(0, force)]), NAMES)
    t = np.linspace(-1, 1, 9)
    u = legendre.legval(t, solution.displacement[0].T)
    x = solution.start[:, None] + (solution.end - solution.start)[:, None] * (1 + t) / 2
    expected = force * np.cosh(mu * (length - x)) / (rigidity * mu * np.sinh(mu * length))
    assert_allclose(u, expected, rtol=0, atol=1e-10 * expected.max())
    assert_allclose(solution.bedding, -force, rtol=1e-10)
    assert_allclose(solution.residual, 0, atol=1e-10 * force)


def test_movement_and_lack_of_fit_act_alike():
    # a held bar made too long by λ is as tight as one whose support moves in by λ
    chain = chain_of([1.5, 0.5], [1e-3, 2e-3], modulus=STEEL, fixed=[0, 2])
    misfit = solve_axial(chain, loads_of(chain, misfit=[[1e-4, 0]]), NAMES)
    moved = solve_axial(chain, loads_of(chain, movement=[(2, -1e-4)]), NAMES)
    assert_allclose(ends(misfit, "force"), ends(moved, "force"), **CLOSE)
    flexibility = (1.5 / 1e-3 + 0.5 / 2e-3) / STEEL
    assert_allclose(ends(moved, "force"), -1e-4 / flexibility, **CLOSE)
    assert_allclose(moved.joint_displacement[0, 2], -1e-4, rtol=0)


@pytest.mark.parametrize("seed", range(24))
def test_fields_meet_at_the_joints_and_forces_balance(seed):
    chain, loads, solution = random_member(seed)
    u, y = ends(solution, "displacement"), ends(solution, "force")
    joint = np.searchsorted(solution.segment, np.arange(chain.length.size))
    scale = np.abs(u).max(axis=(1, 2))[:, None]
    assert (np.abs(u[:, 1:, 0] - u[:, :-1, 1]) <= 1e-13 * scale).all()
    assert (np.abs(u[:, joint, 0] - solution.joint_displacement[:, :-1]) <= 1e-13 * scale).all()
    assert (np.abs(u[:, -1, 1] - solution.joint_displacement[:, -1]) <= 1e-13 * scale[:, 0]).all()
    jump = np.zeros((2, chain.length.size + 1))
    jump[:, :-1] += y[:, joint, 0]
    jump[:, 1:] -= y[:, np.append(joint[1:], y.shape[1]) - 1, 1]
    left_over = jump + loads.joint_force + np.nan_to_num(solution.reaction)
    force = np.maximum(np.abs(y).max(axis=(1, 2)), np.abs(loads.joint_force).max(axis=1))[:, None]
    assert (np.abs(left_over) <= 1e-9 * force).all()
    assert (np.isnan(solution.reaction) == ~(chain.fixed | (chain.spring > 0))).all()


@pytest.mark.parametrize("seed", range(24))
def test_the_books_of_the_energies_balance(seed):
    # 2 · strain = ∫ q u + Σ P u + Σ R d − ∫ N ε₀ (Clapeyron, with stress-free strains), in other quadrature
    chain, loads, solution = random_member(seed)
    t, w = legendre.leggauss(24)
    i = solution.segment
    s = solution.start[:, None] + (solution.end - solution.start)[:, None] * (1 + t) / 2
    weights = w / 2 * (chain.length[i] * (solution.end - solution.start))[:, None]
    first, middle, last = chain.area[i].T[:, :, None]
    area = first * (1 - s) ** 2 + 2 * middle * s * (1 - s) + last * s**2

    def linear(values):
        return values[..., 0, None] * (1 - s) + values[..., 1, None] * s

    u = legendre.legval(t, np.moveaxis(solution.displacement, -1, 0))
    y = legendre.legval(t, np.moveaxis(solution.force, -1, 0))
    q = linear(loads.distributed[:, i]) + loads.gravity[:, None, None] * chain.density[i][:, None] * area
    strain = chain.expansion[i][:, None] * linear(loads.temperature[:, i])
    strain = strain + (loads.lack_of_fit[:, i] / chain.length[i])[:, :, None]
    joints = solution.joint_displacement
    terms = np.stack(
        [
            (weights * q * u).sum((1, 2)),
            (loads.joint_force * joints).sum(1),
            (np.nan_to_num(solution.reaction) * loads.movement).sum(1),
            -(weights * y * strain).sum((1, 2)),
        ]
    )
    scale = np.abs(terms).sum(0) + solution.strain_energy
    assert (np.abs(2 * solution.strain_energy - terms.sum(0)) <= 1e-9 * scale).all()
    assert_allclose(solution.potential, solution.strain_energy - terms[0] - terms[1], atol=1e-9 * scale.max())
    assert_allclose(
        solution.loads,
        (weights * q).sum((1, 2)) + loads.joint_force.sum(1),
        rtol=1e-11,
        atol=1e-9 * np.abs(loads.joint_force).max(),
    )
    bedding = -(weights * linear(chain.bedding[i]) * u).sum((1, 2))
    assert_allclose(solution.bedding, bedding, rtol=1e-9, atol=1e-9 * np.abs(y).max())
    sums = solution.loads + np.nansum(solution.reaction, axis=1) + solution.bedding
    assert_allclose(solution.residual, sums, rtol=0, atol=0)


@pytest.mark.parametrize("seed", range(24))
def test_the_force_is_in_equilibrium_with_load_and_bedding_inside_each_element(seed):
    chain, loads, solution = random_member(seed)
    t = np.linspace(-0.9, 0.9, 7)
    i, half = solution.segment, (solution.end - solution.start) * chain.length[solution.segment] / 2
    s = solution.start[:, None] + (solution.end - solution.start)[:, None] * (1 + t) / 2
    first, middle, last = chain.area[i].T[:, :, None]
    area = first * (1 - s) ** 2 + 2 * middle * s * (1 - s) + last * s**2
    u = legendre.legval(t, np.moveaxis(solution.displacement, -1, 0))
    slope = legendre.legval(t, legendre.legder(np.moveaxis(solution.force, -1, 0))) / half[:, None]
    q = loads.distributed[:, i, :1] * (1 - s) + loads.distributed[:, i, 1:] * s
    q = q + loads.gravity[:, None, None] * chain.density[i][:, None] * area
    k = chain.bedding[i, :1] * (1 - s) + chain.bedding[i, 1:] * s
    scale = (np.abs(q) + np.abs(k * u)).max() + np.abs(solution.force).max() / half.min()
    assert_allclose(slope, k * u - q, rtol=0, atol=1e-11 * scale)


def test_results_are_read_only():
    _, _, solution = random_member(1)
    for name in solution.__dataclass_fields__:
        assert not getattr(solution, name).flags.writeable, name


def test_a_state_alone_comes_out_as_among_others():
    # one tall stack of states is one solve, so none may leak into another
    chain, loads, together = random_member(4, states=4)
    for state in range(4):
        one = type(loads)(
            **{name: getattr(loads, name)[state : state + 1] for name in loads.__dataclass_fields__}
        )
        alone = solve_axial(chain, one, NAMES)
        scale = np.abs(alone.joint_displacement).max()
        assert_allclose(
            together.joint_displacement[state], alone.joint_displacement[0], rtol=0, atol=1e-12 * scale
        )


def test_a_member_that_nothing_holds_is_not_solvable():
    chain = chain_of([1.0], [1.0])
    with pytest.raises(NotSolvable) as raised:
        solve_axial(chain, loads_of(chain, states=2), ("First", "Second"))
    assert [fault.rule for fault in raised.value.faults] == ["not_held"]
    assert raised.value.combinations == ("First", "Second")


@pytest.mark.parametrize(
    "held",
    [{"fixed": [1]}, {"spring": [(0, 1e-3)]}, {"bedding": [(0, 1e-3)]}],
    ids=["fixed", "spring", "bedding"],
)
def test_any_one_support_holds(held):
    chain = chain_of([1.0], [1.0], **held)
    solution = solve_axial(chain, loads_of(chain, force=[(1, 1.0)]), NAMES)
    assert np.isfinite(solution.joint_displacement).all()


def apart(exponent):
    """Soft and stiff in turn on a soft spring; mantissas that no double holds exactly."""
    chain = chain_of(
        [1.1, 0.7, 1.3],
        [1.7, 0.9, 1.1],
        modulus=[3.3 * 10.0**exponent, 1.9, 2.3 * 10.0**exponent],
        spring=[(0, 0.7)],
    )
    return chain, loads_of(chain, force=[(3, 1.3)], movement=[(0, 0.3)])


@pytest.mark.parametrize("exponent", [3, 6, 9, 12])
def test_stiffnesses_far_apart_are_solved(exponent):
    chain, loads = apart(exponent)
    solution = solve_axial(chain, loads, NAMES)
    assert_allclose(ends(solution, "force"), 1.3, rtol=1e-9)
    assert solution.error_bound[0] <= 1e-9


def test_joints_that_do_not_balance_are_reported():
    chain, loads = apart(14.3)
    with pytest.raises(StiffnessContrast) as raised:
        solve_axial(chain, loads, NAMES)
    assert not isinstance(raised.value.__cause__, FactorError)
    assert raised.value.combination == "First"
    assert raised.value.residual > 1e-9 * raised.value.largest_force > 0
    assert raised.value.joint in {0, 1, 2, 3}


def test_a_factor_without_digits_is_reported():
    chain, loads = apart(18)
    with pytest.raises(StiffnessContrast) as raised:
        solve_axial(chain, loads, NAMES)
    assert isinstance(raised.value.__cause__, FactorError)
    assert raised.value.largest_force >= 1.3
    assert raised.value.joint in {1, 2, 3}


@pytest.mark.parametrize(
    ("force", "what"),
    [(1e-200, "energy"), (1e200, "energy"), (1e308, "displacement"), (np.inf, "displacement")],
)
def test_numbers_that_floating_point_cannot_hold_are_reported(force, what):
    chain = chain_of([1.0], [1e-3], fixed=[0])
    loads = loads_of(chain, states=2, force=[(1, force)])
    loads.joint_force[0] = 1.0
    with pytest.raises(OutOfRange) as raised:
        solve_axial(chain, loads, ("Fair", "Wild"))
    assert raised.value.combination == "Wild"
    assert raised.value.what == what


def test_a_force_that_overflows_is_reported():
    chain = chain_of([1.0, 1.0], [1.0, 1.0], modulus=1e-100, fixed=[0, 1])
    loads = loads_of(chain, temperature=0.0, misfit=[[1e150, 0]])
    loads.movement[0, 1] = -1e308
    with pytest.raises(OutOfRange):
        solve_axial(chain, loads, NAMES)


@pytest.mark.parametrize("calls", [0, 1])
def test_a_cancelled_request_ends_between_the_stages(calls):
    chain = chain_of([1.0], [1.0], fixed=[0])
    answers = iter([False] * calls + [True] * 3)
    with pytest.raises(Cancelled):
        solve_axial(chain, loads_of(chain), NAMES, cancelled=lambda: next(answers))
