"""Extremes against dense sampling polished by scipy, against closed forms, and the rule for equal places."""

from __future__ import annotations

import math

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st
from numpy.testing import assert_allclose
from scipy.optimize import minimize_scalar

from solver.fields import at, curves
from solver.model import FixedSupport, JointLoad, RoundSection, SegmentLoad
from solver.solve import solve
from tests.members import Part, area, case, member, round_bar
from tests.strategies import projects

BAR = area(1e-3)
HELD = {0: FixedSupport()}


def solved(parts, loads=(), pulls=(), gravity=0.0, supports=HELD):
    return solve(member(parts, supports, [case(gravity=gravity, on_segments=loads, on_joints=pulls)]))


def polished(results, segment, name, sign):
    """The largest of sign times a quantity in a segment: the best of many samples, then a bounded search."""
    samples = curves(results, 0, points=1000)
    own = samples.segment == segment
    x, values = samples.x[own], sign * getattr(samples, name)[own]
    best = int(np.argmax(values))
    if best in (0, len(x) - 1):
        return values[best]
    bounds = x[best - 1], x[best + 1]
    found = minimize_scalar(
        lambda place: -sign * getattr(at(results, 0, place).left, name), bounds=bounds, method="bounded"
    )
    return max(values[best], -found.fun)


@given(projects(max_segments=2), st.sampled_from(["stress", "force", "displacement"]))
def test_extremes_agree_with_a_search(project, name):
    results = solve(project)
    scale = np.max(np.abs(getattr(curves(results, 0), name)))
    for index in range(len(project.segments)):
        largest = getattr(results.segments, f"{name}_max")[0, index]
        smallest = getattr(results.segments, f"{name}_min")[0, index]
        # the search finds a flat top to about 1e-12 of it; a missed extreme would differ by 1e-6 and more
        assert_allclose(largest, polished(results, index, name, 1.0), rtol=0, atol=1e-11 * scale)
        assert_allclose(smallest, -polished(results, index, name, -1.0), rtol=0, atol=1e-11 * scale)


@given(projects())
def test_the_place_of_an_extreme_has_its_value(project):
    results = solve(project)
    segments = results.segments
    for name in ("stress", "force", "displacement"):
        scale = np.max(np.abs(getattr(curves(results, 0), name)))
        for which in ("max", "min"):
            values = getattr(segments, f"{name}_{which}")[0]
            for index, x in enumerate(getattr(segments, f"{name}_{which}_at")[0]):
                readout = at(results, 0, float(x))
                sides = [s for s in (readout.left, readout.right) if s is not None and s.segment == index]
                near = min(abs(getattr(side, name) - values[index]) for side in sides)
                assert near <= 2e-9 * scale


def test_force_peak_of_a_load_that_changes_sign():
    results = solved([Part(2.0, BAR)], [SegmentLoad("A", load_start=-8000.0, load_end=8000.0)])
    # N(x) = ∫_x^2 (−8000 + 8000 s) ds = 8000 x − 4000 x²
    assert_allclose(results.segments.force_max, 4000.0, rtol=1e-12)
    assert_allclose(results.segments.force_max_at, 1.0, rtol=1e-9)
    assert_allclose(results.segments.stress_max, 4e6, rtol=1e-12)
    assert_allclose(results.segments.force_min, 0.0, atol=1e-9)


def test_stress_peak_in_a_taper_under_an_even_load():
    # N = b (s − 1.2) and d = d₀ (1 − s/2) along s = x/L. σ' = 0 where N' d = 2 N d', that is
    # b (1 − s/2) = −b (s − 1.2), s = 0.4; there −σ = 1.25 b / A₀, against 1.2 and 0.8 b / A₀ at the ends.
    d0, length, b = 0.04, 2.0, 30e3
    results = solved(
        [Part(length, round_bar(d0, d0 / 2))],
        [SegmentLoad("A", load_start=-b / length)],
        [JointLoad("1", force=-0.2 * b)],
    )
    a0 = math.pi / 4 * d0**2
    assert_allclose(results.segments.stress_min, -1.25 * b / a0, rtol=1e-12)
    # a peak is flat: its place is known to about half the digits of its value
    assert_allclose(results.segments.stress_min_at, 0.4 * length, rtol=1e-7)
    assert_allclose(results.segments.stress_max, -0.8 * b / a0, rtol=1e-12)
    assert_allclose(results.segments.force_min, -1.2 * b, rtol=1e-12)


def test_stress_minimum_inside_a_hanging_cone_with_a_weight():
    # z is measured from the apex, which lies c beyond the free end; A = k z², N = P + w (z³ − c³)/3 with
    # w = ρ g k. σ = N / A is stationary where z³ = 2 (3 P / w − c³); P is chosen so that this is at z = 30 m.
    density, gravity, length, d1, d2 = 7850.0, 9.81, 40.0, 0.5, 0.1
    c = length * d2 / (d1 - d2)
    k = math.pi / 4 * (d2 / c) ** 2
    z = 30.0
    pull = density * gravity * k * (z**3 / 2 + c**3) / 3
    results = solved(
        [Part(length, RoundSection(diameter=d1, diameter_end=d2), density=density)],
        pulls=[JointLoad("1", force=pull)],
        gravity=gravity,
    )
    force = pull + density * gravity * k * (z**3 - c**3) / 3
    assert_allclose(results.segments.stress_min, force / (k * z**2), rtol=1e-11)
    assert_allclose(results.segments.stress_min_at, length + c - z, rtol=1e-7)


def test_constant_stress_counts_from_the_start_of_each_segment():
    results = solved([Part(1.0, BAR), Part(2.0, BAR)], pulls=[JointLoad("2", force=5e3)])
    assert_allclose(results.segments.stress_max_at, [[0.0, 1.0]], rtol=0, atol=0)
    assert_allclose(results.segments.stress_min_at, [[0.0, 1.0]], rtol=0, atol=0)
    assert_allclose(results.segments.stress_max, 5e6, rtol=1e-12)


@pytest.mark.parametrize(("slope", "place"), [(0.5e-9, 0.0), (4e-9, 1.0)])
def test_among_places_within_a_billionth_the_smallest_x_counts(slope, place):
    # a pull of 1 kN growing by slope · 1 kN towards the end
    results = solved(
        [Part(1.0, BAR)], [SegmentLoad("A", load_start=-1000.0 * slope)], [JointLoad("1", force=1000.0)]
    )
    assert results.segments.stress_max_at[0, 0] == place


def test_an_unloaded_part_counts_from_its_start_whatever_its_rounding():
    results = solved(
        [Part(1.0, round_bar(0.03, 0.05)), Part(1.0, round_bar(0.05, 0.02))],
        [SegmentLoad("A", load_start=1234.5, load_end=777.7)],
    )
    assert results.segments.stress_max_at[0, 1] == 1.0
    assert results.segments.stress_min_at[0, 1] == 1.0


def test_a_peak_on_the_seam_of_two_halves_is_found():
    # strong bedding makes the solver halve the segment; the load's symmetry puts the peak in the middle
    results = solved(
        [Part(4.0, BAR, bedding=8e9)],
        [SegmentLoad("A", load_start=-1e5, load_end=1e5)],
        supports={0: FixedSupport(), 1: FixedSupport()},
    )
    assert len(results.solution.segment) > 1
    middle = at(results, 0, 2.0).left
    assert_allclose(middle.displacement, 0.0, atol=1e-9 * results.segments.displacement_max[0, 0])
    assert_allclose(
        results.segments.displacement_max, -results.segments.displacement_min, rtol=1e-7
    )  # to the solver's tolerance
    assert_allclose(
        results.segments.displacement_max_at + results.segments.displacement_min_at, 4.0, rtol=1e-4
    )
    assert_allclose(results.segments.force_max, middle.force, rtol=1e-6)
