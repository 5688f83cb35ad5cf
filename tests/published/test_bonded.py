"""Bonded parts against the textbook: transformed section, heated bimetal rod, concrete with steel in it.

Nothing bends here: a rod of two metals keeps straight, as one does whose section is symmetrical.
"""

from __future__ import annotations

import math

import numpy as np
import pytest
from msgspec.structs import replace
from numpy.testing import assert_allclose
from scipy.integrate import quad

from solver.fields import at
from solver.model import (
    FORMAT,
    VERSION,
    BondedPart,
    FixedSupport,
    Joint,
    JointLoad,
    Material,
    Project,
    RectangleSection,
    RoundSection,
    Segment,
    SegmentLoad,
    TubeSection,
)
from solver.solve import solve
from tests.members import area, case

FIXED = FixedSupport()


def rod(materials, sections, load, *, length=2.0, ends=(FIXED,)):
    """One segment of several parts in the order of their materials, held at its start or at both ends."""
    names = [material.name for material in materials]
    bonded = tuple(BondedPart(n, s) for n, s in zip(names[1:], sections[1:], strict=True))
    segment = Segment("A", length, names[0], sections[0], bonded=bonded)
    joints = [Joint("0", ends[0]), Joint("1", ends[1]) if len(ends) > 1 else Joint("1")]
    return Project(
        format=FORMAT,
        version=VERSION,
        materials=tuple(materials),
        joints=tuple(joints),
        segments=(segment,),
        load_cases=(load,),
    )


CONCRETE = Material("Concrete", 31e9, 1e-5, 2400.0, 2.6e6, 17e6)
STEEL = Material("Steel", 200e9, 1.2e-5, 7850.0, 400e6, 400e6)


def test_the_transformed_section_of_a_reinforced_column():
    # Short column of concrete with bars of steel, elastic: every textbook of reinforced concrete. With
    # n = E_s/E_c the steel counts as n A_s of concrete: σ_c = P/(A_c + n A_s), σ_s = n σ_c.
    load, length = -1.9e6, 3.2
    gross, bars = RectangleSection(width=0.4, depth=0.4), 8 * math.pi * 0.02**2 / 4
    net = area(0.16 - bars)
    pushed = case(on_joints=[JointLoad("1", force=load)])
    results = solve(rod([CONCRETE, STEEL], [net, area(bars)], pushed, length=length))
    n = 200e9 / 31e9
    concrete = load / (0.16 - bars + n * bars)
    assert gross.width * gross.depth == pytest.approx(0.16)
    assert_allclose(results.parts.stress_min[0], [concrete, n * concrete], rtol=1e-12)
    assert_allclose(results.segments.stress_min[0], [concrete], rtol=1e-12)
    assert_allclose(results.solution.joint_displacement[0, 1], concrete / 31e9 * length, rtol=1e-12)
    share = n * bars / (0.16 - bars + n * bars)  # of the load that the steel takes
    assert_allclose(results.parts.stress_min[0, 1] * bars, share * load, rtol=1e-12)


def test_a_bimetal_rod_that_is_heated_and_free_to_grow():
    # Timoshenko, Strength of Materials, Part I, bars of two metals under heating (from memory):
    # ε = (E₁A₁α₁ + E₂A₂α₂) ΔT / (E₁A₁ + E₂A₂), and equal and opposite forces in the two.
    rise = 80.0
    copper, steel = Material("Copper", 110e9, 1.7e-5), Material("Steel", 200e9, 1.2e-5)
    a1, a2 = 4e-4, 7e-4
    heated = case(on_segments=[SegmentLoad("A", temperature_start=rise)])
    results = solve(rod([copper, steel], [area(a1), area(a2)], heated))
    k1, k2 = 110e9 * a1, 200e9 * a2
    strain = (k1 * 1.7e-5 + k2 * 1.2e-5) * rise / (k1 + k2)
    held = k1 * k2 * (1.7e-5 - 1.2e-5) * rise / (k1 + k2)
    assert_allclose(results.solution.joint_displacement[0, 1], strain * 2.0, rtol=1e-12)
    assert_allclose(results.parts.stress_min[0], [-held / a1, held / a2], rtol=1e-12)
    assert_allclose(results.parts.stress_max[0], [-held / a1, held / a2], rtol=1e-12)
    energy = held**2 / 2 * (1 / k1 + 1 / k2) * 2.0  # what two bars store that hold each other
    assert_allclose(results.solution.strain_energy[0], energy, rtol=1e-12)
    assert_allclose(results.solution.potential[0], energy, rtol=1e-12)
    assert abs(results.segments.force_max[0, 0]) <= 1e-9 * held
    assert [c.status for c in results.checks] == ["not_made", "not_made"]  # stressed without any axial force


def test_a_bimetal_rod_that_is_heated_and_held():
    # Held at both ends nothing stretches: each part has −E α ΔT of its own.
    copper, steel = Material("Copper", 110e9, 1.7e-5), Material("Steel", 200e9, 1.2e-5)
    heated = case(on_segments=[SegmentLoad("A", temperature_start=80.0)])
    results = solve(rod([copper, steel], [area(4e-4), area(7e-4)], heated, ends=(FIXED, FIXED)))
    assert_allclose(results.parts.stress_min[0], [-110e9 * 1.7e-5 * 80, -200e9 * 1.2e-5 * 80], rtol=1e-12)


def test_a_filled_tube_hangs_with_the_weight_of_both():
    # σ at the held end: weight of both parts over the transformed area (from the definitions).
    tube, fill = TubeSection(outer=0.3, inner=0.28), RoundSection(diameter=0.28)
    results = solve(rod([STEEL, CONCRETE], [tube, fill], case(gravity=9.81), length=5.0))
    a1, a2 = math.pi / 4 * (0.09 - 0.0784), math.pi / 4 * 0.0784
    weight = 9.81 * 5.0 * (7850 * a1 + 2400 * a2)
    assert_allclose(results.mass, 5.0 * (7850 * a1 + 2400 * a2), rtol=1e-12)
    strain = weight / (200e9 * a1 + 31e9 * a2)
    assert_allclose(results.parts.stress_max[0], [200e9 * strain, 31e9 * strain], rtol=1e-11)


def test_a_lack_of_fit_is_shared_without_stress():
    # Parts that are made too long together grow together.
    too_long = case(on_segments=[SegmentLoad("A", lack_of_fit=1e-3)])
    results = solve(rod([CONCRETE, STEEL], [area(0.1), area(0.01)], too_long))
    assert_allclose(results.solution.joint_displacement[0, 1], 1e-3, rtol=1e-12)
    assert results.checks == ()


TAPERED = (
    TubeSection(outer=0.20, outer_end=0.30, inner=0.15, inner_end=0.10),
    RoundSection(diameter=0.15, diameter_end=0.10),
    area(2e-3, 9e-3),
)
METALS = (
    Material("Outer", 2.0e11, 1.2e-5, 7850.0),
    Material("Core", 1.1e11, 2.1e-5, 8900.0),
    Material("Strip", 7.0e10, -0.3e-5, 2700.0),
)


def areas(s):
    """Of the tapered parts at the fraction s, written anew."""
    outer, inner, core = 0.2 + 0.1 * s, 0.15 - 0.05 * s, 0.15 - 0.05 * s
    return np.array([math.pi / 4 * (outer**2 - inner**2), math.pi / 4 * core**2, 2e-3 + 7e-3 * s])


def test_tapered_parts_that_expand_differently_agree_with_plain_quadrature():
    # Statically determinate, so everything follows from integrals: ∫ (N/EA + ε₀) dx and the sums of parts.
    length, pull, q0, q1, t0, t1, misfit = 1.7, 4e5, 3e4, -5e4, 20.0, 110.0, 2e-4
    load = case(
        on_segments=[
            SegmentLoad(
                "A",
                load_start=q0,
                load_end=q1,
                temperature_start=t0,
                temperature_end=t1,
                lack_of_fit=misfit,
            )
        ],
        on_joints=[JointLoad("1", force=pull)],
    )
    results = solve(rod(METALS, TAPERED, load, length=length))
    modulus = np.array([m.modulus for m in METALS])
    alpha = np.array([m.expansion for m in METALS])

    def force(s):
        return pull + length * (q0 * (1 - s) + (q1 - q0) * (1 - s * s) / 2)

    def own(s):
        return alpha * (t0 + s * (t1 - t0)) + misfit / length

    def slope(s):
        stiffness = modulus * areas(s)
        return (force(s) + stiffness @ own(s)) / stiffness.sum()

    def stresses(s):
        return modulus * (slope(s) - own(s))

    def integral(function):
        return length * quad(function, 0, 1, epsabs=0, epsrel=1e-13)[0]

    solution = results.solution
    assert_allclose(solution.joint_displacement[0, 1], integral(slope), rtol=1e-10)
    energy = integral(lambda s: (modulus * areas(s)) @ (slope(s) - own(s)) ** 2 / 2)
    assert_allclose(solution.strain_energy[0], energy, rtol=1e-10)
    samples = np.linspace(0, 1, 20001)
    found = np.array([stresses(s) for s in samples])
    assert_allclose(results.parts.stress_max[0], found.max(axis=0), rtol=1e-7)
    assert_allclose(results.parts.stress_min[0], found.min(axis=0), rtol=1e-7)
    for s in (0.1, 0.45, 0.8):
        assert_allclose(at(results, 0, s * length).left.parts, stresses(s), rtol=1e-9)


def test_the_bound_holds_where_stiffnesses_run_against_each_other():
    # One part grows as the other shrinks: EA has no real zero, and is nearly even where its parts are not.
    sections = (RoundSection(diameter=0.02, diameter_end=0.2), RoundSection(diameter=0.2, diameter_end=0.02))
    heated = case(on_segments=[SegmentLoad("A", temperature_start=50.0, temperature_end=-20.0)])
    project = rod(METALS[:2], sections, heated, length=1.0)
    results = solve(project)

    def strain(s):
        k1, k2 = 2.0e11 * (0.02 + 0.18 * s) ** 2, 1.1e11 * (0.2 - 0.18 * s) ** 2
        return (k1 * 1.2e-5 + k2 * 2.1e-5) * (50 - 70 * s) / (k1 + k2)

    end = quad(strain, 0, 1, epsabs=0, epsrel=1e-13)[0]
    assert_allclose(results.solution.joint_displacement[0, 1], end, rtol=0, atol=1e-9 * 1e-3)
    assert 0 < results.solution.error_bound[0] <= 1e-9
    assert np.all(np.abs(results.segments.force_max[0]) <= results.segments.force_bound[0])
    without = solve(replace(project, segments=(replace(project.segments[0], bonded=()),)))
    assert without.parts is None


def test_a_tapered_layer_around_an_even_core():
    # The own part alone is prismatic, the whole is not: EA is linear, and ∫ dx / EA a logarithm.
    pulled = case(on_joints=[JointLoad("1", force=1e5)])
    results = solve(rod([STEEL, CONCRETE], [area(1e-3), area(1e-3, 9e-2)], pulled, length=1.0))
    first, last = 200e9 * 1e-3 + 31e9 * 1e-3, 200e9 * 1e-3 + 31e9 * 9e-2
    end = 1e5 * math.log(last / first) / (last - first)
    assert_allclose(results.solution.joint_displacement[0, 1], end, rtol=1e-9)
    assert_allclose(results.parts.stress_max[0], [1e5 / first * 200e9, 1e5 / first * 31e9], rtol=1e-9)
    assert_allclose(results.parts.stress_max_at[0], 0.0, atol=1e-9)
