"""Closed forms from handbooks and textbooks, evaluated from their formula and not from pasted digits.

Tolerances: the solver promises 1e-9 in the energy norm; displacements at a point and forces are held to 1e-9
of the largest value along the member, which a single wrong coefficient misses by many orders.
"""

from __future__ import annotations

import math

import numpy as np
import pytest
from numpy.testing import assert_allclose

from solver.fields import at
from solver.model import FixedSupport, JointLoad, SegmentLoad, SpringSupport
from solver.solve import solve
from tests.members import STEEL, Part, area, case, member, round_bar

FIXED = FixedSupport()
GRAVITY = 9.80665


def displacement_at(results, x):
    value = at(results, 0, x)
    return (value.left or value.right).displacement


def test_hanging_prismatic_bar_under_its_own_weight():
    # Timoshenko, Strength of Materials, Part I, bars under their own weight: δ = ρ g L² / 2E (from memory).
    length, density = 40.0, 7850.0
    project = member([Part(length, area(3e-4), density=density)], {0: FIXED}, [case(gravity=GRAVITY)])
    results = solve(project)
    end = density * GRAVITY * length**2 / (2 * STEEL)
    assert_allclose(results.solution.joint_displacement[0, 1], end, rtol=1e-12)
    assert_allclose(results.segments.stress_max[0, 0], density * GRAVITY * length, rtol=1e-12)
    assert results.segments.stress_max_at[0, 0] == 0.0


@pytest.mark.parametrize("thin", [0.05, 0.3, 0.9])
def test_hanging_frustum_under_its_own_weight(thin):
    # Value from memory, and derived anew: with s from the apex, σ(s) = ρ g (s³ − s₁³) / 3 s²,
    # elongation = ρ g / 3E · [(s₂² − s₁²)/2 − s₁² (s₂ − s₁)/s₂].
    density, apex_to_held, held_diameter = 7850.0, 25.0, 0.5
    s1, s2 = thin * apex_to_held, apex_to_held
    project = member(
        [Part(s2 - s1, round_bar(held_diameter, held_diameter * thin), density=density)],
        {0: FIXED},
        [case(gravity=GRAVITY)],
    )
    results = solve(project)
    weight = density * GRAVITY
    end = weight / (3 * STEEL) * ((s2**2 - s1**2) / 2 - s1**2 * (s2 - s1) / s2)
    assert_allclose(results.solution.joint_displacement[0, 1], end, rtol=1e-9)
    held_stress = weight * (s2**3 - s1**3) / (3 * s2**2)
    assert_allclose(results.segments.stress_max[0, 0], held_stress, rtol=1e-9)


@pytest.mark.parametrize("ratio", [1.5, 4.0, 12.0])
def test_round_taper_under_end_load(ratio):
    # Handbook case of the tapered round bar: δ = 4 P L / (π E d₁ d₂) (Roark-type tables; from memory).
    load, length, d1 = 80e3, 1.7, 0.03
    d2 = d1 * ratio
    project = member(
        [Part(length, round_bar(d1, d2))],
        {0: FIXED},
        [case(on_joints=[JointLoad("1", force=load)])],
    )
    results = solve(project)
    end = 4 * load * length / (math.pi * STEEL * d1 * d2)
    assert_allclose(results.solution.joint_displacement[0, 1], end, rtol=1e-9)
    assert_allclose(results.segments.stress_max[0, 0], 4 * load / (math.pi * d1**2), rtol=1e-9)


def test_bar_held_at_both_ends_with_a_load_between():
    # Statically indeterminate bar of every textbook: R = P b / L at the start, P a / L at the end.
    load, a, b = 55e3, 0.7, 1.1
    project = member(
        [Part(a, area(9e-4)), Part(b, area(9e-4))],
        {0: FIXED, 2: FIXED},
        [case(on_joints=[JointLoad("1", force=load)])],
    )
    reaction = solve(project).solution.reaction[0]
    assert_allclose(reaction[[0, 2]], [-load * b / (a + b), -load * a / (a + b)], rtol=1e-12)
    assert math.isnan(reaction[1])


def test_heated_bar_held_at_both_ends():
    # σ = −E α ΔT; E and α of structural steel as in EN 1993-1-1:2005, 3.2.6 (values from memory).
    modulus, expansion, rise = 210e9, 12e-6, 37.0
    project = member(
        [Part(3.0, round_bar(0.04), modulus=modulus, expansion=expansion)],
        {0: FIXED, 1: FIXED},
        [case(on_segments=[SegmentLoad("A", temperature_start=rise)])],
    )
    results = solve(project)
    assert_allclose(results.segments.stress_min[0, 0], -modulus * expansion * rise, rtol=1e-12)
    assert_allclose(results.segments.stress_max[0, 0], -modulus * expansion * rise, rtol=1e-12)


def test_en_1993_1_1_constants_give_the_familiar_stress_per_kelvin():
    # EN 1993-1-1:2005, 3.2.6: E = 210 000 N/mm², α = 12·10⁻⁶ per K for T ≤ 100 °C (values from memory):
    # a fully restrained steel member gains 2.52 N/mm² for each kelvin.
    project = member(
        [Part(8.0, area(2.5e-3), modulus=210e9, expansion=12e-6)],
        {0: FIXED, 1: FIXED},
        [case(on_segments=[SegmentLoad("A", temperature_start=1.0)])],
    )
    assert_allclose(solve(project).segments.stress_min[0, 0], -2.52e6, rtol=1e-12)


def test_heated_bar_between_springs():
    # Common practice, no source: free growth α ΔT L shared by three flexibilities in series.
    length, section, expansion, rise, k0, k1 = 2.4, 1.3e-3, 12e-6, 45.0, 6e7, 2.5e7
    project = member(
        [Part(length, area(section), expansion=expansion)],
        {0: SpringSupport(stiffness=k0), 1: SpringSupport(stiffness=k1)},
        [case(on_segments=[SegmentLoad("A", temperature_start=rise)])],
    )
    results = solve(project)
    force = -expansion * rise * length / (length / (STEEL * section) + 1 / k0 + 1 / k1)
    assert_allclose(results.segments.force_min[0, 0], force, rtol=1e-12)
    assert_allclose(results.solution.joint_displacement[0], [force / k0, -force / k1], rtol=1e-12)
    assert_allclose(results.solution.reaction[0], [-force, force], rtol=1e-12)


@pytest.mark.parametrize("mu_length", [0.05, 0.5, 1.0, 3.0, 8.0, 15.0, 30.0])
def test_bedded_bar_along_its_length(mu_length):
    # Axially loaded pile in an elastic, linear medium, free tip (Randolph and Wroth, 1978, for a
    # pile; formula from memory, and it satisfies E A u'' = k u, N(0) = −P, N(L) = 0 term by term):
    # u(x) = P cosh μ(L−x) / (E A μ sinh μL), N(x) = −P sinh μ(L−x) / sinh μL.
    length, section, load = 12.0, 0.02, 9e5
    mu = mu_length / length
    bedding = STEEL * section * mu**2
    project = member(
        [Part(length, area(section), bedding=bedding)],
        {},
        [case(on_joints=[JointLoad("0", force=load)])],
    )
    results = solve(project)
    x = np.linspace(0.0, length, 41)
    # exp form: cosh and sinh of 30 are harmless, of 800 would not be; ours ends at 30
    exact_u = load * np.cosh(mu * (length - x)) / (STEEL * section * mu * np.sinh(mu_length))
    exact_n = -load * np.sinh(mu * (length - x)) / np.sinh(mu_length)
    values = [at(results, 0, float(place)) for place in x]
    u = np.array([(v.left or v.right).displacement for v in values])
    force = np.array([(v.left or v.right).force for v in values])
    assert_allclose(u, exact_u, atol=1e-9 * exact_u.max(), rtol=0)
    assert_allclose(force, exact_n, atol=1e-9 * load, rtol=0)
    head_stiffness = STEEL * section * mu * math.tanh(mu_length)
    assert_allclose(load / u[0], head_stiffness, rtol=1e-9)


def test_bars_in_series_add_their_flexibilities():
    # Common practice, no source: δ = P Σ L / E A.
    load = 21e3
    parts = [Part(0.4, area(2e-4)), Part(1.1, area(7e-4), modulus=7e10), Part(0.2, area(5e-5))]
    project = member(parts, {0: FIXED}, [case(on_joints=[JointLoad("3", force=load)])])
    end = load * sum(p.length / (p.modulus * p.section.area) for p in parts)
    assert_allclose(solve(project).solution.joint_displacement[0, 3], end, rtol=1e-12)


def test_bars_in_parallel_share_in_proportion_to_stiffness():
    # Two bars that meet at the loaded joint and are held at their far ends share in proportion to E A / L.
    load = 64e3
    first, second = Part(0.8, area(6e-4)), Part(1.5, area(2e-3), modulus=7e10)
    project = member([first, second], {0: FIXED, 2: FIXED}, [case(on_joints=[JointLoad("1", force=load)])])
    stiffness = np.array([p.modulus * p.section.area / p.length for p in (first, second)])
    results = solve(project)
    share = load * stiffness / stiffness.sum()
    assert_allclose(results.segments.force_max[0, 0], share[0], rtol=1e-12)
    assert_allclose(results.segments.force_min[0, 1], -share[1], rtol=1e-12)


def exponential_bar_error(count: int) -> float:
    """Largest deviation from uniform stress when the ideal shape is approached by `count` tapers."""
    weight, stress, length, top = 7850.0 * GRAVITY, 8e6, 300.0, 0.05
    x = np.linspace(0.0, length, count + 1)
    areas = top * np.exp(-weight * x / stress)
    parts = [
        Part(length / count, area(float(areas[i]), float(areas[i + 1])), density=7850.0) for i in range(count)
    ]
    project = member(
        parts,
        {0: FIXED},
        [case(gravity=GRAVITY, on_joints=[JointLoad(str(count), force=stress * float(areas[-1]))])],
    )
    results = solve(project)
    return float(np.max(np.abs(results.segments.stress_max[0] - stress)) / stress)


def test_area_growing_exponentially_gives_uniform_stress_with_second_order():
    # The solid of uniform strength (tower under its own weight; value from memory): A(x) = A₀ e^(−ρ g x / σ)
    # along the hanging bar. Straight tapers cut the corner between n points, an error of order (1/n)².
    counts = [4, 8, 16, 32]
    errors = [exponential_bar_error(n) for n in counts]
    orders = np.log2(np.array(errors[:-1]) / np.array(errors[1:]))
    assert errors[0] > 1e-4, "the coarse approach must show an error for the order to mean anything"
    assert_allclose(orders, 2.0, atol=0.1)


def test_iso_898_1_proof_load_of_a_bolt_shank():
    # ISO 898-1, property class 8.8, M16 coarse thread: stress area 157 mm², proof force 91 kN (values from
    # memory), from a stress under proof load of 580 MPa, to the 0.1 kN that the table keeps.
    stress_area, proof_force, proof_stress = 157e-6, 91.0e3, 580e6
    project = member(
        [Part(0.1, area(stress_area), allowable_tension=proof_stress)],
        {0: FIXED},
        [case(on_joints=[JointLoad("1", force=proof_force)])],
    )
    results = solve(project)
    assert_allclose(results.segments.stress_max[0, 0], proof_stress, rtol=1e-3)
    assert results.governing is not None
    assert results.governing.utilisation == pytest.approx(
        proof_force / (stress_area * proof_stress), rel=1e-12
    )
    assert results.verdict == "pass"
