"""Random members against general references: scipy's boundary value solver and a fine scikit-fem mesh.

Both know nothing of our elements: `scipy.integrate.solve_bvp` is a collocation code, `scikit-fem` a general
finite element library (P2 elements here; axial force from the assembled end forces, which converge faster
than stresses). Agreement to 1e-7 of the largest |u| and |N|: what the references themselves reach.
"""

from __future__ import annotations

import numpy as np
from hypothesis import given, settings
from hypothesis import strategies as st
from numpy.testing import assert_allclose
from scipy.integrate import solve_bvp
from skfem import Basis, BilinearForm, ElementLineP2, LinearForm, MeshLine
from skfem import solve as skfem_solve

from solver.fields import at
from solver.model import FixedSupport, JointLoad, SegmentLoad, SpringSupport
from solver.solve import solve
from tests.members import Part, case, member, round_bar, segment_mark

AGREEMENT = 1e-7


@st.composite
def random_members(draw):
    """Steps, tapers, springs, bedding and every kind of load, in the range of real works."""
    count = draw(st.integers(1, 3))
    chain, on_segments = [], []
    for i in range(count):
        start = draw(st.floats(0.02, 0.2))
        chain.append(
            Part(
                length=draw(st.floats(0.2, 4.0)),
                section=round_bar(start, start * draw(st.floats(0.5, 2.0))),
                modulus=draw(st.sampled_from([7e10, 2.1e11, 3.3e10])),
                expansion=draw(st.floats(0, 2.4e-5)),
                density=draw(st.floats(0, 7850)),
                bedding=draw(st.just(0.0) | st.floats(1e5, 2e8)),
                bedding_end=draw(st.floats(1e5, 2e8)),
            )
        )
        on_segments.append(
            SegmentLoad(
                segment_mark(i),
                load_start=draw(st.floats(-5e4, 5e4)),
                load_end=draw(st.floats(-5e4, 5e4)),
                temperature_start=draw(st.floats(-40, 60)),
                temperature_end=draw(st.floats(-40, 60)),
                lack_of_fit=draw(st.floats(-5e-4, 5e-4)),
            )
        )
    on_joints = [JointLoad(str(i), force=draw(st.floats(-2e5, 2e5))) for i in range(count + 1)]
    movement = draw(st.floats(-1e-3, 1e-3))
    load = case(
        gravity=draw(st.floats(-10, 10)),
        on_segments=on_segments,
        on_joints=[*on_joints, JointLoad("0", movement=movement)],
    )
    spring = draw(st.floats(1e7, 1e9))
    return chain, load, spring, movement


def properties(part, load, record):
    """EA, ε₀, q and k of a part as functions of its own 0…1, written anew from the definitions."""
    d0, d1 = part.section.diameter, part.section.diameter_end

    def area(s):
        return np.pi / 4 * (d0 + s * (d1 - d0)) ** 2

    def free_strain(s):
        rise = record.temperature_start + s * (record.temperature_end - record.temperature_start)
        return part.expansion * rise + record.lack_of_fit / part.length

    def per_length(s):
        applied = record.load_start + s * (record.load_end - record.load_start)
        return applied + part.density * area(s) * load.gravity

    def bedding(s):
        return part.bedding + s * (part.bedding_end - part.bedding)

    return (lambda s: part.modulus * area(s)), free_strain, per_length, bedding


def forces_by_joint(load, count):
    return [sum(j.force for j in load.joint_loads if j.joint == str(i)) for i in range(count + 1)]


def reference_by_collocation(chain, load, spring, movement):
    """u and N of every part at its own 0…1, all parts as one system on a common interval."""
    count = len(chain)
    fields = [properties(p, load, r) for p, r in zip(chain, load.segment_loads, strict=True)]
    force = forces_by_joint(load, count)
    us = max(abs(movement), 1e-4)  # scales, so that u and N weigh alike in the code's error control
    ns = 1e5

    def rhs(s, y):
        rows = []
        for i, (stiffness, free, load_of, bedding) in enumerate(fields):
            u, n = y[2 * i] * us, y[2 * i + 1] * ns
            rows.append(chain[i].length * (n / stiffness(s) + free(s)) / us)
            rows.append(chain[i].length * (bedding(s) * u - load_of(s)) / ns)
        return np.array(rows)

    def ends(y0, y1):
        rest = [y0[1] * ns + force[0] - spring * (y0[0] * us - movement)]
        for i in range(count - 1):
            rest.append(y1[2 * i] - y0[2 * i + 2])
            rest.append((y0[2 * i + 3] - y1[2 * i + 1]) * ns + force[i + 1])
        rest.append(y1[2 * count - 2])
        return np.array(rest) / np.array([ns, *([1, ns] * (count - 1)), 1])

    mesh = np.linspace(0, 1, 41)
    answer = solve_bvp(rhs, ends, mesh, np.zeros((2 * count, mesh.size)), tol=1e-9, max_nodes=20000)
    assert answer.success, answer.message
    return answer.sol, us, ns


@settings(max_examples=25)
@given(random_members())
def test_agrees_with_scipy_collocation_along_the_member(drawn):
    chain, load, spring, movement = drawn
    supports = {0: SpringSupport(stiffness=spring), len(chain): FixedSupport()}
    results = solve(member(chain, supports, [load]))
    sol, us, ns = reference_by_collocation(chain, load, spring, movement)
    s = np.linspace(0, 1, 9)
    theirs = sol(s)
    u, n = theirs[0::2] * us, theirs[1::2] * ns
    ours_u, ours_n = np.empty_like(u), np.empty_like(n)
    for i, part in enumerate(chain):
        for j, share in enumerate(s):
            here = at(results, 0, float(results.position[i] + share * part.length))
            values = here.right if share == 0 else here.left
            values = values or here.left or here.right
            ours_u[i, j], ours_n[i, j] = values.displacement, values.force
    assert_allclose(ours_u, u, rtol=0, atol=AGREEMENT * np.abs(u).max() + 1e-14)
    assert_allclose(ours_n, n, rtol=0, atol=AGREEMENT * np.abs(n).max() + 1e-3)


def reference_by_mesh(chain, load, spring, movement, per_part=160):
    """Joint displacements and the axial force at both ends of each part from a fine P2 mesh."""
    count = len(chain)
    force = forces_by_joint(load, count)
    fields = [properties(p, load, r) for p, r in zip(chain, load.segment_loads, strict=True)]
    lengths = np.array([p.length for p in chain])
    joints = np.concatenate([[0.0], np.cumsum(lengths)])
    points = np.concatenate(
        [np.linspace(joints[i], joints[i + 1], per_part + 1)[(i > 0) :] for i in range(count)]
    )
    mesh = MeshLine(points)
    nodes = np.searchsorted(points, joints - 1e-9 * joints[-1])
    parts_k, parts_f = [], []
    for i, (stiffness, free, load_of, bedding) in enumerate(fields):
        basis = Basis(mesh, ElementLineP2(), elements=np.arange(i * per_part, (i + 1) * per_part), intorder=8)
        at_s = lambda w, i=i: (w.x[0] - joints[i]) / lengths[i]  # noqa: E731

        @BilinearForm
        def energy(u, v, w, stiffness=stiffness, bedding=bedding, at_s=at_s):
            s = at_s(w)
            return stiffness(s) * u.grad[0] * v.grad[0] + bedding(s) * u * v

        @LinearForm
        def work(v, w, stiffness=stiffness, free=free, load_of=load_of, at_s=at_s):
            s = at_s(w)
            return stiffness(s) * free(s) * v.grad[0] + load_of(s) * v

        parts_k.append(energy.assemble(basis))
        parts_f.append(work.assemble(basis))
    whole = Basis(mesh, ElementLineP2())
    dofs = whole.nodal_dofs[0, nodes]
    k, f = sum(parts_k).tolil(), sum(parts_f)
    k[dofs[0], dofs[0]] += spring
    f[dofs[0]] += spring * movement
    f[dofs] += force
    k = k.tocsr()
    free_dofs = np.setdiff1d(np.arange(k.shape[0]), dofs[-1:])
    u = np.zeros(k.shape[0])
    u[free_dofs] = skfem_solve(k[free_dofs][:, free_dofs], f[free_dofs])
    ends = []
    for i in range(count):
        out = parts_k[i] @ u - parts_f[i]
        ends.append((-out[dofs[i]], out[dofs[i + 1]]))
    return u[dofs], np.array(ends)


@settings(max_examples=25)
@given(random_members())
def test_agrees_with_a_fine_scikit_fem_mesh(drawn):
    chain, load, spring, movement = drawn
    supports = {0: SpringSupport(stiffness=spring), len(chain): FixedSupport()}
    results = solve(member(chain, supports, [load]))
    u, n = reference_by_mesh(chain, load, spring, movement)
    assert_allclose(
        results.solution.joint_displacement[0], u, rtol=0, atol=AGREEMENT * np.abs(u).max() + 1e-14
    )
    ours = np.column_stack([results.segments.force_start[0], results.segments.force_end[0]])
    assert_allclose(ours, n, rtol=0, atol=AGREEMENT * np.abs(n).max() + 1e-3)
