"""Members that grow into stops, in closed form: common practice of shaft and piping design, no single source.

A shaft located at one end grows by α ΔT L until it meets the end stop; what it would still grow is held back
by its own stiffness and, in series with it, the stop's.
"""

from __future__ import annotations

import math

import pytest
from numpy.testing import assert_allclose

from solver.model import Combination, FixedSupport, SegmentLoad, StopSupport
from solver.outcomes import support_outcomes
from solver.solve import solve
from tests.members import STEEL, Part, area, case, member, round_bar

ALPHA = 1.2e-5
LENGTH, D1, D2 = 1.2, 0.06, 0.04


def shaft(stop, rise=(1.0,)):
    heat = case("Warm", on_segments=[SegmentLoad("A", temperature_start=1.0)])
    factors = [Combination(f"{kelvin:g} K", {"Warm": kelvin}) for kelvin in rise]
    part = Part(LENGTH, round_bar(D1, D2), expansion=ALPHA)
    return solve(member([part], {0: FixedSupport(), 1: stop}, [heat], factors), cases=False)


@pytest.mark.parametrize("stiffness", [None, 5e8])
def test_a_tapered_shaft_grows_into_an_end_stop(stiffness):
    gap = 3e-4
    known = {} if stiffness is None else {"stiffness": stiffness}
    rises = (10.0, gap / (ALPHA * LENGTH), 40.0, 80.0)
    results = shaft(StopSupport(side="plus", clearance=gap, **known), rises)
    flexibility = 4 * LENGTH / (math.pi * STEEL * D1 * D2) + (1 / stiffness if stiffness else 0.0)
    for state, rise in enumerate(rises):
        growth = ALPHA * rise * LENGTH
        push = max(0.0, growth - gap) / flexibility
        (stop,) = support_outcomes(results, state, 1)
        assert_allclose(-stop.force, push, rtol=1e-9, atol=1e-3)
        assert stop.contact == ("closed" if state > 1 else "open")
        assert_allclose(stop.clearance, max(0.0, gap - growth), atol=1e-12)
        least = -4 * push / (math.pi * D2**2)
        assert_allclose(results.segments.stress_min[state, 0], least, rtol=1e-9, atol=1.0)


def test_twice_the_load_is_not_twice_the_answer():
    results = shaft(StopSupport(side="plus", clearance=3e-4), (30.0, 60.0))
    once, twice = -results.solution.reaction[:, 1]
    stiffness = math.pi * STEEL * D1 * D2 / (4 * LENGTH)
    assert twice == pytest.approx(once + ALPHA * 30 * LENGTH * stiffness)
    assert twice > 2 * once


def test_a_bar_with_play_at_both_ends_floats_into_both():
    # Gaps a and b at the ends of a bar of two parts, heated: what goes beyond a + b is pressed back
    parts = [Part(0.8, area(1e-3), expansion=ALPHA), Part(0.4, area(2e-3), expansion=ALPHA)]
    stops = {0: StopSupport(side="minus", clearance=1e-4), 2: StopSupport(side="plus", clearance=2e-4)}
    heat = case("Warm", on_segments=[SegmentLoad(mark, temperature_start=50.0) for mark in "AB"])
    results = solve(member(parts, stops, [heat]))
    push = (ALPHA * 50 * 1.2 - 3e-4) / (0.8 / (STEEL * 1e-3) + 0.4 / (STEEL * 2e-3))
    assert_allclose(results.solution.reaction[0, [0, 2]], [push, -push], rtol=1e-9)
    assert_allclose(results.solution.joint_displacement[0, [0, 2]], [-1e-4, 2e-4], rtol=1e-12)
