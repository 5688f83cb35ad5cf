"""The first degree suffices in one pass, and refinement gets there from a mesh that is far too coarse."""

from __future__ import annotations

from dataclasses import replace

import numpy as np
import pytest
from numpy.polynomial import legendre
from numpy.testing import assert_allclose

from solver import axial, refine
from solver.axial import solve_axial
from solver.elements import GREATEST_DEGREE
from solver.errors import BoundNotMet, never
from solver.passes import Pass
from solver.refine import first_mesh, pole_decay, refined
from tests.solver.chains import chain_of, loads_of, random_loads, random_tapered

RATIOS = [1.1, 1.5, 2, 4, 8, 20]


def taper(ratio, *, bedding=0.0, ends=False):
    """A round taper of diameters 1 : ratio, pulled at its far end."""
    chain = chain_of(
        [1.0],
        [[1, ratio, ratio**2]],
        bedding=[(bedding, bedding)] if bedding else (),
        fixed=() if bedding else [0],
    )
    return chain, loads_of(chain, force=[(0 if ends else 1, 1.0)])


@pytest.mark.parametrize("ratio", [1.2, 2, 5])
def test_pole_decay_is_the_observed_decay_of_legendre_coefficients(ratio):
    decay = pole_decay(np.array([[1.0, ratio, ratio**2]]))[0]
    t, w = legendre.leggauss(200)
    area = (1 + (ratio - 1) * (1 + t) / 2) ** 2
    n = np.arange(1, 40)
    series = np.abs((n + 0.5) * ((legendre.legvander(t, 40)[:, n] / area[:, None]).T @ w))
    last = np.flatnonzero(series > 1e-10)[-1]  # beyond, they are rounding
    # a double pole: the coefficients fall like n decayⁿ
    assert series[last] / series[last - 1] * n[last - 1] / n[last] == pytest.approx(decay, rel=0.1)


def test_pole_decay_of_other_sections():
    # linear area of ratio 4; a constant one; a rectangle whose width grows as its depth shrinks
    area = np.array([[1, 2.5, 4], [3, 3, 3], [4.0, 8.5, 4.0]])
    assert_allclose(pole_decay(area), [1 / 3, 0, 1 / 3], rtol=1e-12)


@pytest.mark.parametrize("ratio", RATIOS)
@pytest.mark.parametrize("mu", [0.0, 0.1, 1.0, 10.0, 30.0])
@pytest.mark.parametrize("ends", [False, True])
def test_first_mesh_meets_the_bound(ratio, mu, ends):
    chain, loads = taper(ratio, bedding=mu**2, ends=ends)
    bound = Pass(chain, loads, first_mesh(chain, 1e-9), never).bound.relative()[0]
    assert bound <= 1e-9


def test_first_mesh_meets_the_bound_on_random_members():
    for seed in range(60):
        rng = np.random.default_rng(seed)
        chain = random_tapered(rng, bedded=True)
        loads = random_loads(rng, chain, states=3)
        assert Pass(chain, loads, first_mesh(chain, 1e-9), never).bound.relative().max() <= 1e-9, seed


def test_first_mesh_divides_only_where_it_must():
    chain = chain_of([1, 1, 1], [[1, 1, 1], [1, 20, 400], [1, 1.1, 1.21]], fixed=[0])
    mesh = first_mesh(chain, 1e-9)
    assert np.bincount(mesh.segment)[[0, 2]].tolist() == [1, 1]
    assert np.bincount(mesh.segment)[1] < 12
    narrow = mesh.end[mesh.segment == 1] - mesh.start[mesh.segment == 1]
    assert (np.diff(narrow) >= 0).all()  # the thin end has the short ones


def test_many_elements_get_few_different_degrees():
    ratio = 1 + np.linspace(0.001, 0.5, 2 * refine.FEW)
    chain = chain_of(np.ones(ratio.size), np.stack([ratio**0, ratio, ratio**2], 1), fixed=[0])
    mesh = first_mesh(chain, 1e-9)
    assert 2 <= np.unique(mesh.degree).size <= 6
    assert mesh.degree[0] < mesh.degree[-1] <= GREATEST_DEGREE


def coarse_mesh(chain, tolerance):
    mesh = first_mesh(chain, 1.0)
    count = chain.length.size
    whole = np.arange(count)
    return replace(
        mesh,
        segment=whole,
        start=np.zeros(count),
        end=np.ones(count),
        degree=np.where(refine.closed_segments(chain), 3, 2),
        closed=refine.closed_segments(chain),
        whole=True,
    )


@pytest.mark.parametrize(("ratio", "mu"), [(1.3, 0.0), (20, 0.0), (1.3, 30.0), (20, 10.0)])
def test_refinement_reaches_the_tolerance_from_one_element_of_degree_two(monkeypatch, ratio, mu):
    chain, loads = taper(ratio, bedding=mu**2)
    expected = solve_axial(chain, loads, ("Pull",))
    monkeypatch.setattr(axial, "first_mesh", coarse_mesh)
    solution = solve_axial(chain, loads, ("Pull",))
    assert solution.error_bound[0] <= 1e-9
    scale = np.abs(expected.joint_displacement).max()
    assert_allclose(solution.joint_displacement, expected.joint_displacement, rtol=0, atol=1e-9 * scale)


def test_only_elements_with_a_large_share_are_refined():
    chain = chain_of([1, 1, 1], [[1, 1, 1], [1, 4, 16], [1, 1.001, 1.002001]], fixed=[0])
    mesh = coarse_mesh(chain, 1e-9)
    share = Pass(chain, loads_of(chain, force=[(3, 1.0)]), mesh, never).fields.error
    finer = refined(mesh, share, np.array([1e-6]))
    assert finer is not None
    assert finer.degree.tolist() == [3, 4, 2]
    assert refined(mesh, share, np.array([np.inf])) is None


def test_beyond_the_greatest_degree_elements_are_halved():
    chain, _ = taper(3)
    mesh = replace(coarse_mesh(chain, 1e-9), degree=np.array([GREATEST_DEGREE]))
    finer = refined(mesh, np.ones((1, 1)), np.zeros(1))
    assert finer is not None
    assert finer.start.tolist() == [0, 0.5]
    assert finer.end.tolist() == [0.5, 1]
    assert finer.degree.tolist() == [GREATEST_DEGREE] * 2
    assert not finer.whole


def test_a_tolerance_below_rounding_is_given_up_after_one_pass(monkeypatch):
    chain, loads = taper(2)
    monkeypatch.setattr(axial, "refined", None)  # not asked: no refinement helps against rounding
    with pytest.raises(BoundNotMet) as raised:
        solve_axial(chain, loads, ("Pull",), tolerance=1e-16)
    assert raised.value.combination == "Pull"
    assert raised.value.bound > raised.value.tolerance == 1e-16


def test_halving_ends(monkeypatch):
    chain, loads = taper(20)
    monkeypatch.setattr(axial, "first_mesh", coarse_mesh)
    monkeypatch.setattr(refine, "MOST_HALVINGS", 2)
    with pytest.raises(BoundNotMet):
        solve_axial(chain, loads, ("Pull",))


def test_running_out_of_passes_is_reported(monkeypatch):
    chain, loads = taper(20)
    monkeypatch.setattr(axial, "first_mesh", coarse_mesh)
    monkeypatch.setattr(axial, "PASSES", 3)
    with pytest.raises(BoundNotMet) as raised:
        solve_axial(chain, loads, ("Pull",))
    assert raised.value.bound > 1e-9
