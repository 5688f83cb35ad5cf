"""Fatigue of bolt and tube from the joint diagram, by hand: what a working load takes from each of them.

A bolted joint whose working load comes and goes (VDI 2230 and every machine design text; common practice,
from memory): the bolt's force swings by Φ times the load, the tube's by the rest, until the joint opens; from
then on the bolt takes all of it and the tube nothing.
"""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from msgspec import UNSET, structs
from numpy.testing import assert_allclose

from solver.companion_fields import companion_curves
from solver.model import Combination, Endurance, FatigueRange, SegmentLoad
from solver.solve import solve
from tests.members import area
from tests.published.test_companions import BOLT, BOLT_RATE, TUBE, TUBE_RATE, clamp_of, tightened

STEEL_LINE, COPPER_LINE = (Endurance(amplitude=a, ultimate=u) for a, u in ((60e6, 800e6), (40e6, 210e6)))
SHARE = BOLT_RATE / (BOLT_RATE + TUBE_RATE)  # Φ
OPENING = clamp_of(0.25) / (1.0 - SHARE)


def swinging(project, first="One", second="Two"):
    """With a range of fatigue, and what bolt and tube endure."""
    lines = {"Copper": COPPER_LINE}
    materials = tuple(structs.replace(m, endurance=lines.get(m.name, STEEL_LINE)) for m in project.materials)
    return structs.replace(project, materials=materials, fatigue=(FatigueRange(first, second),))


def pulled(one, two, acts="compression", parts=1):
    loads = {"One": one, "Two": two}
    states = [Combination(name, {"Tightening": 1.0, "Pull": pull}) for name, pull in loads.items()]
    return swinging(tightened(0.25, acts, states, parts=parts))


def found(project):
    results = solve(project)
    return results, {c.segment: c for c in results.checks if c.check == "fatigue"}


def held_to(check, first, second, line):
    """By hand: amplitude, and mean where it is tensile."""
    amplitude, mean = abs(first - second) / 2, (first + second) / 2
    assert_allclose([check.nominal, check.nominal_to], [first, second], rtol=1e-8)
    assert_allclose([check.amplitude, check.mean], [amplitude, mean], rtol=1e-8)
    assert_allclose(check.utilisation, amplitude / line.amplitude + max(mean, 0.0) / line.ultimate, rtol=1e-8)
    assert (check.factor, check.limit, check.ultimate) == (1.0, line.amplitude, line.ultimate)
    assert check.status == ("pass" if check.utilisation <= 1.0 else "fail")


@pytest.mark.parametrize("parts", [1, 3])
@pytest.mark.parametrize("acts", ["compression", "both"])
@pytest.mark.parametrize("order", [1, -1])
def test_a_working_load_that_comes_and_goes(acts, parts, order):
    pulls = (0.0, 0.6 * OPENING)[::order]
    _, checks = found(pulled(*pulls, acts, parts))
    assert list(checks) == ["A", *(f"T{n + 1}" for n in range(parts))]
    clamp = clamp_of(0.25)
    held_to(checks["A"], *((clamp + SHARE * pull) / BOLT for pull in pulls), STEEL_LINE)
    for n in range(parts):
        check = checks[f"T{n + 1}"]
        held_to(check, *(-(clamp - (1 - SHARE) * pull) / TUBE for pull in pulls), COPPER_LINE)
        assert check.mean < 0.0  # and so is not counted
        assert check.between == ("One", "Two")


def test_a_tube_that_has_parted_carries_nothing_in_that_combination():
    results, checks = found(pulled(0.0, 1.5 * OPENING))
    assert results.companions.separated[1, 0]
    assert checks["T1"].nominal_to == 0.0  # just that, not next to it
    held_to(checks["T1"], -clamp_of(0.25) / TUBE, 0.0, COPPER_LINE)
    held_to(checks["A"], clamp_of(0.25) / BOLT, 1.5 * OPENING / BOLT, STEEL_LINE)


def test_a_tube_that_has_parted_in_both_uses_nothing_and_is_named_at_its_start():
    _, checks = found(pulled(1.5 * OPENING, 2.0 * OPENING, parts=3))
    for number, mark in enumerate(("T1", "T2", "T3")):
        assert (checks[mark].utilisation, checks[mark].status) == (0.0, "pass")
        assert checks[mark].position == pytest.approx(0.25 * number)


def test_without_endurance_a_companion_is_listed_as_not_checked():
    project = pulled(0.0, 1e4)
    materials = tuple(
        structs.replace(m, endurance=UNSET) if m.name == "Copper" else m for m in project.materials
    )
    results, checks = found(structs.replace(project, materials=materials))
    assert (checks["A"].status, checks["T1"].status) == ("pass", "not_made")
    assert checks["T1"].reason == "no_endurance"
    assert results.verdict != "pass"


@given(
    st.lists(st.integers(-800, 800).map(lambda kn: 1e3 * kn), min_size=4, max_size=4),
    st.tuples(st.floats(4e-4, 2e-3), st.floats(4e-4, 2e-3)),
    st.floats(50e6, 500e6),
)
@settings(max_examples=25)
def test_the_worst_place_of_a_companion_is_the_worst_of_a_fine_sampling(loads, areas, ultimate):
    """Tapered, with loads along it: each of two segments by its own, the second not at the member's start."""
    project = tightened(0.25, "both", parts=2)
    (tube,) = project.companions
    tube = structs.replace(
        tube, segments=tuple(structs.replace(s, section=area(*areas)) for s in tube.segments)
    )
    cases = [
        structs.replace(project.load_cases[0], name=name, segment_loads=(
            SegmentLoad("T1", load_start=start), SegmentLoad("T2", load_start=start, load_end=end)
        ))
        for name, start, end in (("L1", *loads[:2]), ("L2", *loads[2:]))
    ]  # fmt: skip
    states = (Combination("One", {"L1": 1.0}), Combination("Two", {"L2": 1.0}))
    project = structs.replace(project, companions=(tube,), load_cases=tuple(cases), combinations=states)
    project = swinging(project)
    line = Endurance(amplitude=40e6, ultimate=ultimate)
    materials = tuple(structs.replace(m, endurance=line) for m in project.materials)
    results, checks = found(structs.replace(project, materials=materials))
    one, two = (companion_curves(results, state, 0, points=801) for state in (0, 1))
    used = np.abs(one.stress - two.stress) / 2 / line.amplitude
    used += np.maximum((one.stress + two.stress) / 2, 0.0) / ultimate
    for number, mark in enumerate(("T1", "T2")):
        sampled = float(used[one.segment == number].max())
        assert checks[mark].utilisation >= sampled * (1 - 3e-9) - 1e-8
        assert checks[mark].utilisation <= sampled * (1 + 1e-3) + 1e-8
