"""Companions against the classical bolt and tube and the joint diagram.

A tube over a bolt, tightened by a nut: every text on the strength of materials has it (Timoshenko, Strength
of Materials, Part I, statically indeterminate problems; from memory). The nut's travel is the pitch times the
part of a turn, here a lack of fit of the tube. The joint diagram of bolted joints (VDI 2230 and every machine
design text; common practice, from memory): a working load on the bolt raises the bolt's force by
Φ = c_b / (c_b + c_t) of it and lowers the clamp force by the rest, until the parts separate.
"""

from __future__ import annotations

import numpy as np
import pytest
from msgspec import structs
from numpy.testing import assert_allclose

from solver.companion_fields import companion_curves
from solver.errors import InputError
from solver.model import (
    Combination,
    Companion,
    CompanionSegment,
    FixedSupport,
    JointLoad,
    Material,
    SegmentLoad,
    SpringSupport,
)
from solver.solve import solve
from tests.members import STEEL, Part, area, case, member

LENGTH, PITCH = 0.75, 3e-3
BOLT, TUBE = 5e-4, 1.2e-3  # areas, m²
COPPER, WARMER, COOLER = 1.1e11, 1.7e-5, 1.2e-5
BOLT_RATE, TUBE_RATE = STEEL * BOLT / LENGTH, COPPER * TUBE / LENGTH


def tightened(turn, acts="compression", combinations=(), supports=None, parts=1):
    """A bolt between joints 0 and 1, the tube beside it; the nut turned by a part of a turn."""
    cases = [
        case("Tightening", on_segments=[SegmentLoad("T1", lack_of_fit=turn * PITCH)]),
        case("Warm", on_segments=[SegmentLoad(m, temperature_start=1.0) for m in ("A", *marks(parts))]),
        case("Pull", on_joints=[JointLoad("1", force=1.0), JointLoad("0", force=-1.0)]),
    ]
    bolt = Part(LENGTH, area(BOLT), expansion=COOLER, density=7850.0)
    project = member([bolt], supports or {0: FixedSupport()}, cases, combinations)
    copper = Material("Copper", COPPER, WARMER, 8900.0, allowable_compression=1e8)
    tube = Companion(
        mark="Tube",
        start="0",
        end="1",
        acts=acts,
        segments=tuple(CompanionSegment(m, LENGTH / parts, "Copper", area(TUBE)) for m in marks(parts)),
    )
    return structs.replace(project, materials=(*project.materials, copper), companions=(tube,))


def marks(parts):
    return tuple(f"T{number + 1}" for number in range(parts))


def combined(**factors):
    return Combination("Working", {"Tightening": 1.0} | factors)


def clamp_of(turn, rise=0.0):
    """Steel and copper strained alike: P (1/c_b + 1/c_t) = travel + (α_t − α_b) ΔT L."""
    return (turn * PITCH + (WARMER - COOLER) * rise * LENGTH) / (1 / BOLT_RATE + 1 / TUBE_RATE)


@pytest.mark.parametrize("parts", [1, 3])
@pytest.mark.parametrize("acts", ["compression", "both"])
def test_a_nut_turned_by_a_quarter_then_heated(acts, parts):
    for rise in (0.0, 60.0):
        results = solve(tightened(0.25, acts, [combined(Warm=rise)], parts=parts), cases=False)
        clamp = clamp_of(0.25, rise)
        found = results.companions
        assert_allclose(results.segments.force_max[0, 0], clamp, rtol=1e-9)
        assert_allclose([found.force_from[0, 0], found.force_to[0, 0]], -clamp, rtol=1e-9)
        assert_allclose(found.segments.stress_min[0], -clamp / TUBE, rtol=1e-9)
        assert not found.separated.any()
        if acts == "compression":
            assert_allclose([found.clamp[0, 0], found.least_clamp[0]], clamp, rtol=1e-9)
        else:
            assert np.isnan(found.least_clamp[0])


def test_cooled_until_the_tube_is_loose():
    turn = 0.05
    loose = -turn * PITCH / ((WARMER - COOLER) * LENGTH)  # K
    for rise, separated in ((0.99 * loose, False), (1.5 * loose, True)):
        results = solve(tightened(turn, combinations=[combined(Warm=rise)]), cases=False)
        found = results.companions
        assert found.separated[0, 0] == separated
        assert_allclose(found.clamp[0, 0], max(0.0, clamp_of(turn, rise)), rtol=1e-7)
        gap = (WARMER - COOLER) * (loose - rise) * LENGTH
        assert_allclose(found.gap[0, 0], gap if separated else 0.0, rtol=1e-9, atol=1e-15)


@pytest.mark.parametrize("share", [0.0, 0.3, 0.9, 1.0 - 1e-9, 1.1, 2.0])
def test_the_joint_diagram_until_it_opens(share):
    clamp, ratio = clamp_of(0.25), BOLT_RATE / (BOLT_RATE + TUBE_RATE)
    opening = clamp / (1 - ratio)
    pull = share * opening
    results = solve(tightened(0.25, combinations=[combined(Pull=pull)]), cases=False)
    bolt, rest = (clamp + ratio * pull, clamp - (1 - ratio) * pull) if share < 1 else (pull, 0.0)
    assert_allclose(results.segments.force_max[0, 0], bolt, rtol=1e-9)
    assert_allclose(results.companions.clamp[0, 0], rest, rtol=1e-9, atol=1e-7 * clamp)
    assert results.companions.separated[0, 0] == (share > 1)
    assert results.companions.force_to[0, 0] == (0.0 if share > 1 else results.companions.force_to[0, 0])


def test_the_least_clamp_force_of_all_combinations_and_where():
    some = [Combination(f"C{k}", {"Tightening": 1.0, "Pull": k * 1e4}) for k in (1, 3, 2)]
    results = solve(tightened(0.25, combinations=some))
    ratio = BOLT_RATE / (BOLT_RATE + TUBE_RATE)
    assert_allclose(results.companions.least_clamp, [clamp_of(0.25) - (1 - ratio) * 3e4], rtol=1e-9)
    assert results.states[results.companions.least_clamp_state[0]].name == "C3"


def test_a_rope_goes_slack():
    # a tie inside a column: it pulls only; pressed columns leave it slack
    for force, slack in ((5e4, False), (-5e4, True)):
        results = solve(tightened(0.0, "tension", [combined(Pull=force)]), cases=False)
        assert results.companions.separated[0, 0] == slack
        stiffness = BOLT_RATE if slack else BOLT_RATE + TUBE_RATE
        assert_allclose(results.solution.joint_displacement[0, 1], force / stiffness, rtol=1e-9)


def test_checks_mass_and_weight_know_the_companions():
    hung = {0: SpringSupport(stiffness=1e8)}
    project = tightened(
        0.25, combinations=[Combination("Working", {"Tightening": 1.0})], supports=hung, parts=2
    )
    weighted = structs.replace(
        project, load_cases=(structs.replace(project.load_cases[0], gravity=9.81), *project.load_cases[1:])
    )
    results = solve(weighted, cases=False)
    mass = LENGTH * (BOLT * 7850 + TUBE * 8900)
    assert_allclose(results.mass, mass, rtol=1e-12)
    assert_allclose(results.solution.reaction[0, 0], -9.81 * mass, rtol=1e-9)
    assert_allclose(results.solution.joint_displacement[0, 0], 9.81 * mass / 1e8, rtol=1e-9)
    found, weight = results.companions, 9.81 * LENGTH * TUBE * 8900
    assert_allclose(found.force_from - found.force_to, weight, rtol=1e-9)
    assert found.force_from[0, 0] != found.force_to[0, 0]
    own = [check for check in results.checks if check.segment in ("T1", "T2")]
    assert [check.check for check in own] == ["compression"] * 2
    assert own[1].position == pytest.approx(LENGTH)  # where the tube also carries what hangs on it
    most = max(own, key=lambda check: check.utilisation)
    assert_allclose(most.utilisation, -most.value / 1e8)


def test_the_books_of_the_whole_balance():
    # 2 · strain = Σ P u − ∫ N ε₀, over bolt and tube
    results = solve(tightened(0.25, combinations=[combined(Pull=2e4, Warm=30.0)]), cases=False)
    solution, found = results.solution, results.companions
    work = 2e4 * solution.joint_displacement[0, 1]
    bolt, tube = results.segments.force_max[0, 0], found.force_from[0, 0]
    free = bolt * COOLER * 30 * LENGTH + tube * (WARMER * 30 * LENGTH + 0.25 * PITCH)
    assert_allclose(2 * solution.strain_energy[0], work - free, rtol=1e-9)
    assert solution.error_bound[0] < 1e-9
    assert_allclose(solution.potential[0], solution.strain_energy[0] - work, rtol=1e-12)


def test_curves_along_a_companion():
    results = solve(tightened(0.25, combinations=[combined(Warm=40.0)], parts=3), cases=False)
    along = companion_curves(results, 0, 0)
    assert along.x[0] == 0.0
    assert along.x[-1] == pytest.approx(LENGTH)
    assert_allclose(along.force, -clamp_of(0.25, 40.0), rtol=1e-9)
    assert_allclose(along.stress, -clamp_of(0.25, 40.0) / TUBE, rtol=1e-9)
    assert set(along.segment) == {0, 1, 2}
    assert_allclose(along.displacement[0], 0.0, atol=1e-15)
    assert_allclose(along.displacement[-1], results.solution.joint_displacement[0, 1], rtol=1e-9)


def test_a_companion_has_its_place_along_the_member():
    plates = Companion(
        mark="Plates",
        start="1",
        end="2",
        acts="compression",
        segments=(
            CompanionSegment("P", 0.3, "of A", area(4e-4)),
            CompanionSegment("Q", 0.2, "of A", area(1e-3)),
        ),
    )
    press = case(on_joints=[JointLoad("2", force=-1e4)])
    project = member([Part(1.0, area(1e-3)), Part(0.5, area(1e-3))], {0: FixedSupport()}, [press])
    results = solve(structs.replace(project, companions=(plates,)))
    found = results.companions
    assert_allclose([found.begins, found.ends], [[1.0, 1.3], [1.3, 1.5]])
    assert_allclose(companion_curves(results, 0, 0).x[[0, -1]], [1.0, 1.5])
    flexibility = (0.3 / 4e-4 + 0.2 / 1e-3) / STEEL
    share = 1e4 * (0.5 / (STEEL * 1e-3)) / (0.5 / (STEEL * 1e-3) + flexibility)
    assert_allclose(found.clamp[0, 0], share, rtol=1e-9)


def test_a_length_that_does_not_fit_is_refused():
    project = tightened(0.25)
    tube = project.companions[0]
    short = structs.replace(tube.segments[0], length=LENGTH * (1 - 1e-5))
    with pytest.raises(InputError):
        solve(structs.replace(project, companions=(structs.replace(tube, segments=(short,)),)))
