"""What must not change when the same member is described differently, and the principles it must obey.

Betti's reciprocity (Betti, 1872) and the minimum of the potential energy are theorems of linear elasticity.
"""

from __future__ import annotations

import msgspec
import numpy as np
from hypothesis import given
from hypothesis import strategies as st
from numpy.testing import assert_allclose

from solver.model import Combination, FixedSupport, JointLoad, SegmentLoad, SpringSupport
from solver.solve import solve
from tests.members import Part, area, case, member, round_bar, segment_mark

size = st.floats(0.01, 0.2)
length = st.floats(0.05, 3.0)
stiffness = st.floats(1e6, 1e9)


def fair(low, high):
    """Numbers of which none is so near 0 that its energy underflows: the solver refuses 1e-200 N or mm."""
    return st.floats(low, high).map(lambda value: 0.0 if abs(value) < 1e-9 else value)


force = st.just(0.0) | st.floats(1e-3, 1e5) | st.floats(-1e5, -1e-3)


@st.composite
def parts(draw, least=1, most=4):
    count = draw(st.integers(least, most))
    return [
        Part(
            draw(length),
            round_bar(draw(size), draw(size)),
            modulus=draw(st.floats(1e10, 3e11)),
            expansion=draw(fair(0, 3e-5)),
            density=draw(fair(0, 9e3)),
            bedding=draw(st.just(0.0) | st.floats(1e4, 1e9)),
        )
        for _ in range(count)
    ]


@st.composite
def loading(draw, count, name="Load"):
    on_segments = [
        SegmentLoad(
            segment_mark(i),
            load_start=draw(force),
            load_end=draw(force),
            temperature_start=draw(fair(-50, 80)),
            temperature_end=draw(fair(-50, 80)),
            lack_of_fit=draw(fair(-1e-3, 1e-3)),
        )
        for i in range(count)
    ]
    on_joints = [JointLoad(str(i), force=draw(force)) for i in range(count + 1)]
    return case(name, gravity=draw(fair(-10, 10)), on_segments=on_segments, on_joints=on_joints)


def supports_of(count, k):
    return {0: SpringSupport(stiffness=k), count: FixedSupport()}


@given(st.data(), stiffness)
def test_reversing_the_member_mirrors_the_answer(data, k):
    chain = data.draw(parts())
    count = len(chain)
    load = data.draw(loading(count))
    there = solve(member(chain, supports_of(count, k), [load]))
    turned = [
        msgspec.structs.replace(p.section, diameter=p.section.diameter_end, diameter_end=p.section.diameter)
        for p in reversed(chain)
    ]
    back_parts = [
        Part(p.length, s, p.modulus, p.expansion, p.density, p.bedding)
        for p, s in zip(reversed(chain), turned, strict=True)
    ]
    back_load = case(
        "Load",
        gravity=-load.gravity,
        on_segments=[
            SegmentLoad(
                segment_mark(i),
                load_start=-s.load_end,
                load_end=-s.load_start,
                temperature_start=s.temperature_end,
                temperature_end=s.temperature_start,
                lack_of_fit=s.lack_of_fit,
            )
            for i, s in enumerate(reversed(load.segment_loads))
        ],
        on_joints=[JointLoad(str(i), force=-j.force) for i, j in enumerate(reversed(load.joint_loads))],
    )
    back = solve(member(back_parts, {count - i: s for i, s in supports_of(count, k).items()}, [back_load]))
    u, v = there.solution.joint_displacement[0], -back.solution.joint_displacement[0][::-1]
    assert_allclose(u, v, rtol=0, atol=1e-8 * np.abs(u).max() + 1e-18)
    n, m = there.segments.force_max[0], back.segments.force_max[0][::-1]
    scale = max(np.abs(there.segments.force_max).max(), np.abs(there.segments.force_min).max())
    assert_allclose(n, m, rtol=0, atol=1e-7 * scale + 1e-9)


@given(st.data(), st.floats(0.05, 0.95), stiffness)
def test_splitting_a_segment_changes_nothing(data, cut, k):
    chain = data.draw(parts(most=2))
    count = len(chain)
    load = data.draw(loading(count))
    whole = solve(member(chain, supports_of(count, k), [load]))
    first, rest = chain[0], chain[1:]
    middle = first.section.diameter + cut * (first.section.diameter_end - first.section.diameter)

    def half(section, share):
        return Part(
            share * first.length, section, first.modulus, first.expansion, first.density, first.bedding
        )

    halves = [
        half(round_bar(first.section.diameter, middle), cut),
        half(round_bar(middle, first.section.diameter_end), 1 - cut),
    ]
    s = load.segment_loads[0]
    q = s.load_start + cut * (s.load_end - s.load_start)
    t = s.temperature_start + cut * (s.temperature_end - s.temperature_start)
    on_segments = [
        SegmentLoad("A", s.load_start, q, s.temperature_start, t, s.lack_of_fit * cut),
        SegmentLoad("B", q, s.load_end, t, s.temperature_end, s.lack_of_fit * (1 - cut)),
    ] + [
        msgspec.structs.replace(r, segment=segment_mark(i + 2)) for i, r in enumerate(load.segment_loads[1:])
    ]
    on_joints = [
        msgspec.structs.replace(j, joint=str(int(j.joint) + (int(j.joint) > 0))) for j in load.joint_loads
    ]
    split_load = case("Load", gravity=load.gravity, on_segments=on_segments, on_joints=on_joints)
    split = solve(member([*halves, *rest], supports_of(count + 1, k), [split_load]))
    u, v = whole.solution.joint_displacement[0], np.delete(split.solution.joint_displacement[0], 1)
    assert_allclose(u, v, rtol=0, atol=1e-8 * np.abs(u).max() + 1e-18)
    assert_allclose(whole.solution.strain_energy, split.solution.strain_energy, rtol=1e-7, atol=1e-12)


@given(st.data(), stiffness, st.integers(-30, 30), st.integers(-30, 30))
def test_scaling_the_unit_of_length_and_of_force_scales_the_answer(data, k, p, q):
    # Powers of two, so that the scaled member holds the very same binary digits.
    chain = data.draw(parts())
    count = len(chain)
    load = data.draw(loading(count))
    a, f = 2.0**p, 2.0**q  # new metre = a old metres' number, new newton = f

    def scaled(part):
        s = part.section
        return Part(
            part.length * a,
            round_bar(s.diameter * a, s.diameter_end * a),
            part.modulus * f / a**2,
            part.expansion,
            part.density * f / a**4,  # so that ρ g A keeps its meaning with g scaled by a
            part.bedding * f / a**2,
        )

    scaled_load = case(
        "Load",
        gravity=load.gravity * a,
        on_segments=[
            msgspec.structs.replace(
                s,
                load_start=s.load_start * f / a,
                load_end=s.load_end * f / a,
                lack_of_fit=s.lack_of_fit * a,
            )
            for s in load.segment_loads
        ],
        on_joints=[msgspec.structs.replace(j, force=j.force * f) for j in load.joint_loads],
    )
    base = solve(member(chain, supports_of(count, k), [load]))
    other = solve(member([scaled(p) for p in chain], supports_of(count, k * f / a), [scaled_load]))
    u, v = base.solution.joint_displacement[0] * a, other.solution.joint_displacement[0]
    assert_allclose(u, v, rtol=1e-9, atol=1e-10 * np.abs(u).max())
    n, m = base.segments.force_max[0] * f, other.segments.force_max[0]
    assert_allclose(n, m, rtol=1e-9, atol=1e-9 * np.abs(n).max())


@given(st.data(), stiffness, fair(-2, 2), fair(-2, 2))
def test_a_combination_is_the_sum_of_its_factored_cases(data, k, a, b):
    chain = data.draw(parts())
    count = len(chain)
    first, second = data.draw(loading(count, "First")), data.draw(loading(count, "Second"))
    results = solve(
        member(
            chain,
            supports_of(count, k),
            [first, second],
            [Combination("Both", {"First": a, "Second": b})],
        )
    )
    both = results.state_index("Both")
    one, two = results.state_index("First", "case"), results.state_index("Second", "case")
    u = results.solution.joint_displacement
    scale = np.abs(u).max()
    assert_allclose(u[both], a * u[one] + b * u[two], rtol=0, atol=1e-8 * scale * (1 + abs(a) + abs(b)))
    assert u[both].any() or not (a or b)


@given(st.data(), stiffness, force, force)
def test_betti_reciprocity_between_two_joint_forces(data, k, p, q):
    # Betti, 1872: the work of the first forces on the second displacements equals the reverse.
    chain = data.draw(parts(least=2))
    count = len(chain)
    i, j = data.draw(st.integers(0, count - 1)), data.draw(st.integers(0, count - 1))
    results = solve(
        member(
            chain,
            supports_of(count, k),
            [
                case("First", on_joints=[JointLoad(str(i), force=p)]),
                case("Second", on_joints=[JointLoad(str(j), force=q)]),
            ],
        )
    )
    u = results.solution.joint_displacement
    there, back = p * u[1, i], q * u[0, j]
    scale = abs(p) * np.abs(u[1]).max() + abs(q) * np.abs(u[0]).max()
    assert_allclose(there, back, rtol=0, atol=1e-9 * scale)


def simpson_energy(chain, load, u_of, du_of, spring, shown=2001):
    """Π by fine Simpson quadrature in plain numpy, a road that shares nothing with the solver."""
    from scipy.integrate import simpson

    total, x0 = 0.0, 0.0
    for i, part in enumerate(chain):
        s = np.linspace(0, 1, shown)
        x = x0 + s * part.length
        d = part.section.diameter + s * (part.section.diameter_end - part.section.diameter)
        a = np.pi * d**2 / 4
        load_here = load.segment_loads[i]
        t = load_here.temperature_start + s * (load_here.temperature_end - load_here.temperature_start)
        free = part.expansion * t + load_here.lack_of_fit / part.length
        q = load_here.load_start + s * (load_here.load_end - load_here.load_start)
        q = q + part.density * a * load.gravity
        u, du = u_of(i, x), du_of(i, x)
        density = part.modulus * a * (du - free) ** 2 / 2 + part.bedding * u**2 / 2 - q * u
        total += simpson(density, x=x)
        x0 += part.length
    ends = [u_of(0, np.array([0.0]))[0]]
    x0 = 0.0
    for i, part in enumerate(chain):
        x0 += part.length
        ends.append(u_of(i, np.array([x0]))[0])
    total += spring * ends[0] ** 2 / 2
    return total - sum(j.force * ends[int(j.joint)] for j in load.joint_loads)


@given(st.data(), st.integers(0, 2**32 - 1))
def test_potential_energy_is_lowest_at_the_solution(data, seed):
    chain = data.draw(parts(least=2, most=3))
    count = len(chain)
    load = data.draw(loading(count))
    spring = 2.0e8
    results = solve(member(chain, supports_of(count, spring), [load]))
    solution = results.solution
    joints = results.position

    def u_of(i, x):
        # the solver's own field, evaluated from its Legendre coefficients element by element
        return _evaluate(solution, joints, i, x, derivative=False)

    def du_of(i, x):
        return _evaluate(solution, joints, i, x, derivative=True)

    lowest = simpson_energy(chain, load, u_of, du_of, spring)
    scale = abs(solution.strain_energy[0]) + abs(solution.potential[0])
    assert_allclose(solution.potential[0], lowest, rtol=0, atol=1e-7 * scale + 1e-12)

    rng = np.random.default_rng(seed)
    amplitude = np.abs(solution.joint_displacement).max() + 1e-9
    for _ in range(5):
        other = simpson_energy(chain, load, *disturbed(u_of, du_of, joints[-1], amplitude, rng), spring)
        assert other > lowest - 1e-9 * scale


def disturbed(u_of, du_of, total, amplitude, rng):
    """The solution plus waves that vanish at the fixed far end: admissible, and no longer the solution."""
    waves = rng.normal(size=4) * amplitude * 0.1
    number = (np.arange(4)[:, None] + 0.5) * np.pi / total

    def u(i, x):
        return u_of(i, x) + waves @ np.cos(number * x)

    def du(i, x):
        return du_of(i, x) - waves @ (number * np.sin(number * x))

    return u, du


def _evaluate(solution, joints, segment, x, *, derivative):
    legendre = np.polynomial.legendre
    length = joints[segment + 1] - joints[segment]
    s = (x - joints[segment]) / length
    out = np.empty_like(s)
    for e in np.flatnonzero(solution.segment == segment):
        a, b = solution.start[e], solution.end[e]
        here = (s >= a - 1e-12) & (s <= b + 1e-12)
        t = 2 * (s[here] - a) / (b - a) - 1
        coefficients = solution.displacement[0, e]
        if derivative:
            out[here] = legendre.legval(t, legendre.legder(coefficients)) * 2 / ((b - a) * length)
        else:
            out[here] = legendre.legval(t, coefficients)
    return out


def test_area_sections_obey_reversal_too():
    parts_there = [Part(1.0, area(1e-3, 4e-3)), Part(0.5, area(2e-3))]
    parts_back = [Part(0.5, area(2e-3)), Part(1.0, area(4e-3, 1e-3))]
    there = solve(member(parts_there, {0: FixedSupport()}, [case(on_joints=[JointLoad("2", force=1e4)])]))
    back = solve(member(parts_back, {2: FixedSupport()}, [case(on_joints=[JointLoad("0", force=-1e4)])]))
    assert_allclose(
        there.solution.joint_displacement[0],
        -back.solution.joint_displacement[0][::-1],
        rtol=1e-10,
        atol=1e-18,
    )
