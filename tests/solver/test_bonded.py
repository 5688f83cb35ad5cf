"""Bonded parts on random members: one material is one bar, order does not matter, forces add up."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from msgspec.structs import replace
from numpy.polynomial import legendre
from numpy.testing import assert_allclose

from solver.fields import at, curves, envelope
from solver.model import AreaSection, BondedPart, FixedSupport, JointLoad, SegmentLoad
from solver.results import Results
from solver.sections import area_at, area_coefficients
from solver.solve import solve
from tests.members import Part, area, case, member
from tests.strategies import bonded, projects, sections

SAME = 1e-9  # the tolerance of the solver


@st.composite
def composite_projects(draw, max_segments=3):
    """Members with bonded parts in some of their segments, at least the first."""
    project = draw(projects(max_segments))
    first = (BondedPart(project.materials[-1].name, draw(sections())), *draw(bonded(project)))
    parts = [first, *(draw(bonded(project)) for _ in project.segments[1:])]
    return replace(
        project,
        segments=tuple(replace(s, bonded=p) for s, p in zip(project.segments, parts, strict=True)),
    )


def scales(results: Results, state: int):
    stress = max(np.abs(results.parts.stress_max[state]).max(), np.abs(results.parts.stress_min[state]).max())
    return max(np.abs(curves(results, state).displacement).max(), 1e-12), max(stress, 1.0)


@given(composite_projects(), st.floats(0.01, 0.99))
def test_the_parts_stresses_add_up_to_the_axial_force(project, share):
    results = solve(project)
    for index, segment in enumerate(project.segments):
        x = results.position[index] + share * segment.length
        sections = [segment.section, *(part.section for part in segment.bonded)]
        areas = [float(area_at(np.array(area_coefficients(s)), np.array(share))) for s in sections]
        for state in range(len(results.states)):
            here = at(results, state, float(x)).left
            stresses = here.parts or (here.stress,)
            forces = np.array(stresses) * areas
            scale = np.abs(forces).sum() + abs(here.force)
            assert abs(forces.sum() - here.force) <= 1e-12 * scale
            assert len(stresses) == len(areas)
            assert stresses[0] == here.stress


@given(composite_projects(2))
def test_the_order_of_the_parts_moves_nothing(project):
    def turned(segment):
        parts = (BondedPart(segment.material, segment.section), *segment.bonded)[::-1]
        return replace(segment, material=parts[0].material, section=parts[0].section, bonded=parts[1:])

    one = solve(project)
    other = solve(replace(project, segments=tuple(map(turned, project.segments))))
    for state in range(len(one.states)):
        u, stress = scales(one, state)
        moved = one.solution.joint_displacement[state] - other.solution.joint_displacement[state]
        assert np.abs(moved).max() <= 1e-7 * u
        for index in range(len(project.segments)):
            mine = one.parts.stress_max[state, one.parts.of_segment(index)]
            theirs = other.parts.stress_max[state, other.parts.of_segment(index)][::-1]
            assert_allclose(mine, theirs, rtol=0, atol=1e-6 * stress)
    used = [r.segments.utilisation for r in (one, other)]
    assert_allclose(*used, rtol=1e-5, atol=1e-9)


PIECES = st.lists(st.tuples(st.floats(1e-4, 1e-2), st.floats(1e-4, 1e-2)), min_size=2, max_size=4)


@given(PIECES, st.floats(-50, 50), st.floats(-50, 50), st.floats(0, 1e8))
def test_parts_of_one_material_are_one_bar_of_their_summed_area(pieces, t0, t1, bed):
    load = case(
        gravity=9.81,
        on_segments=[SegmentLoad("A", load_start=1e3, temperature_start=t0, temperature_end=t1)],
        on_joints=[JointLoad("1", force=-2e4)],
    )
    whole = area(sum(a for a, _ in pieces), sum(b for _, b in pieces))
    one = member(
        [Part(1.3, whole, expansion=1.2e-5, density=7850.0, bedding=bed)], {0: FixedSupport()}, [load]
    )
    parts = [AreaSection(area=a, area_end=b) for a, b in pieces]
    own = one.segments[0]
    split = replace(own, section=parts[0], bonded=tuple(BondedPart(own.material, s) for s in parts[1:]))
    bar, many = solve(one), solve(replace(one, segments=(split,)))
    assert_allclose(many.solution.joint_displacement, bar.solution.joint_displacement, rtol=1e-8)
    assert_allclose(many.solution.strain_energy, bar.solution.strain_energy, rtol=1e-8)
    assert_allclose(many.mass, bar.mass, rtol=1e-12)
    for name in ("stress_max", "stress_min"):
        whole_bar = getattr(bar.segments, name)
        scale = np.abs(bar.segments.stress_max).max() + np.abs(bar.segments.stress_min).max()
        assert_allclose(getattr(many.parts, name)[0], whole_bar[0, 0], rtol=0, atol=1e-7 * scale)


@settings(max_examples=25)
@given(composite_projects(2))
def test_the_books_balance_with_each_parts_own_force(project):
    """2 · strain = ∫ q u + Σ P u + Σ R δ − Σ over the parts of ∫ N_i ε₀ᵢ, N_i = σ_i A_i."""
    results = solve(project)
    solution, loads = results.solution, results.loads
    t, weights = legendre.leggauss(24)
    for state in range(len(results.states)):
        reaction = np.nan_to_num(solution.reaction[state])
        terms = [
            solution.joint_displacement[state] @ loads.joint_force[state],
            reaction @ loads.movement[state],
        ]
        elements = zip(solution.segment, solution.start, solution.end, strict=True)
        for e, (i, start, end) in enumerate(elements):
            terms += _work(project, results, state, e, i, start + (end - start) * (1 + t) / 2, t, weights)
        total = 2 * solution.strain_energy[state]
        scale = total + sum(map(abs, terms))
        assert abs(sum(terms) - total) <= 1e-7 * scale


def _work(project, results, state, e, i, s, t, weights):
    """∫ q u and −∫ N_i ε₀ᵢ of each part on one element, from the project's own records."""
    segment, loads, solution = project.segments[i], results.loads, results.solution
    materials = {m.name: m for m in project.materials}
    half = segment.length * (solution.end[e] - solution.start[e]) / 2 * weights
    u = legendre.legval(t, solution.displacement[state, e])
    slope = legendre.legval(t, legendre.legder(solution.displacement[state, e]))
    slope = slope * 2 / (segment.length * (solution.end[e] - solution.start[e]))
    rise = loads.temperature[state, i, 0] * (1 - s) + loads.temperature[state, i, 1] * s
    q = loads.distributed[state, i, 0] * (1 - s) + loads.distributed[state, i, 1] * s
    found = []
    for part in (segment, *segment.bonded):
        material = materials[part.material]
        a = area_at(np.array(area_coefficients(part.section)), s)
        q = q + material.density * a * loads.gravity[state]
        free = material.expansion * rise + loads.lack_of_fit[state, i] / segment.length
        found.append(-float(half @ (material.modulus * a * (slope - free) * free)))
    return [float(half @ (q * u)), *found]


@given(composite_projects(2))
def test_no_place_is_worse_than_the_extremes_of_its_parts(project):
    results = solve(project)
    for state in range(len(results.states)):
        _, stress = scales(results, state)
        used = results.segments.utilisation[state]
        drawn = curves(results, state, points=400)
        for index, segment in enumerate(project.segments):
            own = drawn.segment == index
            if not np.isnan(used[index]):
                assert np.nanmax(drawn.utilisation[own]) <= used[index] * (1 + 1e-7) + 1e-9
                assert np.nanmax(drawn.utilisation[own]) >= used[index] * (1 - 1e-7) - 1e-9
            parts = results.parts.of_segment(index)
            for x in drawn.x[own][:: max(1, own.sum() // 7)][1:-1]:
                here = at(results, state, float(x)).left
                stresses = np.array(here.parts or [here.stress])
                assert np.all(stresses <= results.parts.stress_max[state, parts] + 1e-9 * stress)
                assert np.all(stresses >= results.parts.stress_min[state, parts] - 1e-9 * stress)
            assert segment.mark


def two_parts(**second):
    """A bar with a second part, each with allowables of its own."""
    parts = [
        Part(1.0, area(1e-3), modulus=2e11, allowable_tension=2e8, allowable_compression=1e8),
        Part(1.0, area(1e-3), modulus=1e11, **second),
    ]
    load = case(on_joints=[JointLoad("1", force=1.5e5), JointLoad("2", force=1.5e5)])
    project = member(parts, {0: FixedSupport()}, [load])
    first = replace(project.segments[0], bonded=(BondedPart("of B", area(1e-3)),))
    return replace(project, segments=(first, project.segments[1]))


def test_every_part_has_its_checks_in_the_order_of_the_chain():
    results = solve(two_parts(allowable_tension=1e8, allowable_compression=1e8))
    found = [(c.segment, c.part, c.material, c.check) for c in results.checks]
    assert found == [
        ("A", 0, "of A", "tension"),
        ("A", 1, "of B", "tension"),
        ("B", None, None, "tension"),
    ]
    assert_allclose([c.value for c in results.checks], [2e8, 1e8, 1.5e8], rtol=1e-12)
    assert [c.status for c in results.checks] == ["pass", "pass", "fail"]
    assert_allclose(results.segments.utilisation[0], [1.0, 1.5])


def test_a_part_without_allowable_is_a_check_not_made():
    results = solve(two_parts())
    statuses = [(c.part, c.status, c.reason) for c in results.checks if c.segment == "A"]
    assert statuses == [(0, "pass", None), (1, "not_made", "no_allowable_tension")]
    assert results.verdict == "incomplete"


@pytest.mark.parametrize(("limit", "most"), [(5e7, 2.0), (4e8, 1.0)])
def test_the_utilisation_is_that_of_the_worst_part(limit, most):
    results = solve(two_parts(allowable_tension=limit, allowable_compression=1e8))
    assert_allclose(results.segments.utilisation[0, 0], most)
    assert_allclose(curves(results, 0).utilisation[0], most)
    assert_allclose(envelope(results).utilisation[0], most)
    assert_allclose(envelope(results).stress_max[0], 2e8)  # the stress of the segment is its own part's
