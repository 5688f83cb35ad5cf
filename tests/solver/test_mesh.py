"""Elements as parts of segments: nothing of area, load, strain or length may change by dividing."""

from __future__ import annotations

from dataclasses import replace

import numpy as np
from numpy.polynomial import legendre
from numpy.testing import assert_allclose

from solver.condense import Stacked
from solver.mesh import block, closed_segments
from solver.passes import blocks
from solver.refine import first_mesh, halved
from tests.solver.chains import chain_of, loads_of, random_loads, random_tapered

T = np.linspace(-1, 1, 5)


def divided(chain, times=3):
    mesh = first_mesh(chain, 1e-9)
    for _ in range(times):
        mesh = halved(mesh, ~mesh.closed & (mesh.start < 0.3))
    return mesh


def test_elements_tile_every_segment_in_order():
    chain = random_tapered(np.random.default_rng(1), bedded=True)
    mesh = divided(chain)
    for i in range(chain.length.size):
        own = mesh.segment == i
        assert mesh.start[own][0] == 0
        assert mesh.end[own][-1] == 1
        assert (mesh.start[own][1:] == mesh.end[own][:-1]).all()
    assert (np.diff(mesh.segment) >= 0).all()
    assert mesh.joints(mesh.segment[-1] + 1).tolist() == [
        *np.searchsorted(mesh.segment, range(chain.length.size)),
        mesh.segment.size,
    ]


def test_parts_have_the_data_of_their_segments():
    rng = np.random.default_rng(3)
    chain = random_tapered(rng, bedded=True)
    loads = random_loads(rng, chain, states=2)
    mesh = divided(chain)
    own = block(chain, loads, mesh, slice(None))
    s = mesh.start[:, None] + (mesh.end - mesh.start)[:, None] * (1 + T) / 2
    i = mesh.segment
    area = sum(
        c * b
        for c, b in zip(chain.area[i].T[:, :, None], ((1 - s) ** 2, 2 * s * (1 - s), s * s), strict=True)
    )
    bernstein = np.array([(1 - T) ** 2, 2 * (1 - T) * (1 + T), (1 + T) ** 2]) / 4
    assert_allclose(own.stiffness @ bernstein, chain.modulus[i][:, None] * area, rtol=1e-14)
    assert_allclose(own.length, chain.length[i] * (mesh.end - mesh.start), rtol=1e-15)

    def linear(ends):
        return ends[..., 0, None] * (1 - s) + ends[..., 1, None] * s

    rise = chain.expansion[i][:, None] * linear(loads.temperature[:, i])
    strain = rise + (loads.lack_of_fit[:, i] / chain.length[i])[:, :, None]
    weight = loads.gravity[:, None, None] * chain.density[i][:, None] * area
    load = linear(loads.distributed[:, i]) + weight
    close = {"rtol": 1e-12}
    assert_allclose(legendre.legval(T, own.strain), strain, atol=1e-15 * np.abs(strain).max(), **close)
    assert_allclose(legendre.legval(T, own.load), load, atol=1e-14 * np.abs(load).max(), **close)
    assert_allclose(legendre.legval(T, own.bedding.T), linear(chain.bedding[i]), atol=1e-9, **close)


def test_blocks_hold_every_element_once_and_of_one_kind():
    chain = random_tapered(np.random.default_rng(5), bedded=True)
    mesh = divided(chain)
    mesh = replace(mesh, degree=np.where(mesh.closed, 3, 4 + np.arange(mesh.segment.size) % 3))
    seen = []
    for where, degree in blocks(mesh):
        members = np.arange(mesh.segment.size)[where]
        assert (np.where(mesh.closed, 0, mesh.degree)[members] == degree).all()
        seen.extend(members.tolist())
    assert sorted(seen) == list(range(mesh.segment.size))


def test_closed_are_the_prismatic_unbedded_ones():
    chain = chain_of(
        [1, 1, 1, 1],
        [[2, 2, 2], [2, 2 * (1 + 2e-16), 2], [2, 2.001, 2.002], [2, 2, 2]],
        bedding=[(0, 0), (0, 0), (0, 0), (0, 1e-9)],
        fixed=[0],
    )
    assert closed_segments(chain).tolist() == [True, True, False, False]


def test_closed_form_agrees_with_the_stack_on_prismatic_elements():
    # Two roads to the same element: the closed form, and the general one of degree 3.
    rng = np.random.default_rng(11)
    chain = chain_of([2.0, 0.7], [1e-3, 3e-3], modulus=2e11, fixed=[0], expansion=1e-5, density=7850)
    loads = random_loads(rng, chain, states=3)
    mesh = first_mesh(chain, 1e-9)
    data = block(chain, loads, mesh, slice(None))
    ((_, degree),) = blocks(mesh)
    assert degree == 0
    from solver.condense import ClosedForm

    closed, stacked = ClosedForm(data), Stacked(data, 3)
    mean, stretch = rng.normal(size=(2, 3, 2)) * 1e-3
    for name in ("mean_mean", "mean_stretch", "stretch_stretch", "load_mean", "load_stretch"):
        ours, theirs = getattr(closed.condensed, name), getattr(stacked.condensed, name)
        assert_allclose(ours, theirs, rtol=1e-12, atol=1e-9, err_msg=name)
    ours, theirs = closed.fields(mean, stretch), stacked.fields(mean, stretch)
    scale = np.abs(theirs.force).max()
    assert_allclose(ours.force, theirs.force[..., :3], rtol=0, atol=1e-13 * scale)
    assert_allclose(theirs.force[..., 3:], 0, atol=1e-13 * scale)
    assert_allclose(ours.displacement, theirs.displacement, rtol=0, atol=1e-15)
    assert ours.error is None
    assert np.sqrt(theirs.error.max()) < 1e-13 * np.sqrt(theirs.force_norm.max())
    for name in (
        "start_force", "end_force", "flexibility", "stretching", "norm", "strain_norm",
        "force_norm", "strain_energy", "work", "load", "bedding_force",
    ):  # fmt: skip
        mine, other = getattr(ours, name), getattr(theirs, name)
        assert_allclose(mine, other, rtol=1e-12, atol=1e-13 * np.abs(other).max(), err_msg=name)


def test_unloaded_states_of_a_loaded_member_stay_at_nothing():
    chain = chain_of([1.0], [1.0], fixed=[0])
    data = block(chain, loads_of(chain, states=2), first_mesh(chain, 1e-9), slice(None))
    assert not data.load.any()
    assert not data.strain.any()
