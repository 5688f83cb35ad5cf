"""Peak stresses and fatigue: by hand at shoulders, the worst place of a segment against a fine sampling."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from msgspec import UNSET
from msgspec.structs import replace

from solver.fields import at, bundle
from solver.model import (
    BondedPart,
    Combination,
    Endurance,
    FatigueRange,
    FixedSupport,
    JointLoad,
    Material,
    SegmentLoad,
    Shoulder,
    SpringSupport,
)
from solver.shoulders import Step
from solver.solve import solve
from tests.members import Part, area, case, member, round_bar

PARTS = [Part(0.3, round_bar(0.05)), Part(0.4, round_bar(0.04))]
PULL = case("Pull", on_joints=[JointLoad("2", force=100e3)])
COMBINATIONS = [
    Combination("Pulled", {"Pull": 1.0}, allowable_factor=1.25),
    Combination("Pushed", {"Pull": -0.5}),
    Combination("Half", {"Pull": 0.5}),
]
SIGMA = 100e3 / (np.pi / 4 * 0.04**2)
KT = Step(0.05, 0.04, 0.005).factor
LINE = Endurance(amplitude=120e6, ultimate=600e6)


FILLET = Shoulder(fillet_radius=0.005)


def shaft(*ranges, shoulder=FILLET, endurance=LINE, allowable_peak=200e6, parts=PARTS):
    project = member(parts, {0: FixedSupport()}, [PULL], COMBINATIONS)
    joints = (project.joints[0], replace(project.joints[1], shoulder=shoulder), *project.joints[2:])
    materials = tuple(
        replace(material, allowable_peak=allowable_peak, endurance=endurance)
        for material in project.materials
    )
    fatigue = tuple(FatigueRange(*names) for names in ranges)
    return replace(project, joints=joints, materials=materials, fatigue=fatigue)


def found(project, kind):
    return [check for check in solve(project).checks if check.check == kind]


def test_the_peak_is_the_factor_times_the_stress_of_the_smaller_side():
    pulled, pushed, _ = found(shaft(), "peak")
    assert (pulled.joint, pulled.segment, pulled.position) == ("1", "B", 0.3)
    assert pulled.factor == KT
    assert pulled.nominal == pytest.approx(SIGMA, rel=1e-12)
    assert pulled.value == pytest.approx(KT * SIGMA, rel=1e-12)
    assert pulled.limit == 250e6  # the combination's factor scales it
    assert pulled.utilisation == pytest.approx(KT * SIGMA / 250e6, rel=1e-12)
    assert (pushed.value, pushed.limit) == (pytest.approx(-0.5 * KT * SIGMA), 200e6)
    assert pushed.utilisation == pytest.approx(0.5 * KT * SIGMA / 200e6)
    assert (pulled.status, pushed.status) == ("pass", "pass")
    assert found(shaft(allowable_peak=100e6), "peak")[0].status == "fail"


def test_a_nominal_stress_of_rounding_alone_is_none():
    """Both bars of a free end carry nothing beside the one that is pulled."""
    parts = [Part(0.1, round_bar(0.03)), Part(0.13, round_bar(0.045)), Part(0.36, round_bar(0.05))]
    pull = case("Pull", on_joints=[JointLoad("2", force=77e3), JointLoad("3", force=-77e3)])
    project = member(parts, {1: SpringSupport(stiffness=5e8)}, [pull], [Combination("Pulled", {"Pull": 1.0})])
    joints = tuple(replace(j, shoulder=FILLET) if j.mark in "12" else j for j in project.joints)
    materials = tuple(replace(m, allowable_peak=200e6) for m in project.materials)
    peaks = found(replace(project, joints=joints, materials=materials), "peak")
    assert [(c.nominal, c.value, c.utilisation) for c in peaks] == [(0.0, 0.0, 0.0)] * 2


@pytest.mark.parametrize(
    ("changes", "reason"),
    [
        ({"allowable_peak": UNSET}, "no_allowable_peak"),
        ({"shoulder": Shoulder(fillet_radius=0.0001)}, "shoulder_out_of_range"),
    ],
)
def test_a_peak_that_cannot_be_checked_is_listed_as_not_made(changes, reason):
    results = solve(shaft(**changes))
    peaks = [check for check in results.checks if check.check == "peak"]
    assert [(c.status, c.reason, c.utilisation) for c in peaks] == [("not_made", reason, None)] * 3
    assert results.verdict == "incomplete"


@pytest.mark.parametrize(
    ("names", "amplitude", "mean"),
    [
        (("Pulled", "Pushed"), 0.75, 0.25),
        (("Pushed", "Pulled"), 0.75, 0.25),
        (("Half", "Pulled"), 0.25, 0.75),
    ],
)
def test_fatigue_at_the_shoulder_and_beside_it_by_hand(names, amplitude, mean):
    first, second, notched = found(shaft(names), "fatigue")
    assert [c.segment for c in (first, second, notched)] == ["A", "B", "B"]
    assert (first.joint, second.joint, notched.joint) == (None, None, "1")
    assert {(c.between, c.combination) for c in (first, second, notched)} == {(names, names[1])}
    for check, factor in ((second, 1.0), (notched, KT)):
        a, m = factor * amplitude * SIGMA, factor * mean * SIGMA
        assert (check.amplitude, check.mean) == (pytest.approx(a), pytest.approx(m))
        assert (check.value, check.limit, check.ultimate) == (pytest.approx(a), 120e6, 600e6)
        assert check.utilisation == pytest.approx(a / 120e6 + m / 600e6, rel=1e-12)
        assert check.factor == factor
    shares = {"Pulled": 1.0, "Pushed": -0.5, "Half": 0.5}
    nominals = notched.nominal, notched.nominal_to
    assert nominals == pytest.approx([shares[name] * SIGMA for name in names])


def test_a_mean_in_compression_takes_nothing_off():
    project = shaft(("Pulled", "Pushed"))
    pressed = replace(
        project, combinations=(Combination("Pulled", {"Pull": -0.2}), Combination("Pushed", {"Pull": -1.0}))
    )
    _, _, notched = found(pressed, "fatigue")
    assert notched.mean == pytest.approx(-0.6 * KT * SIGMA)
    assert notched.utilisation == pytest.approx(0.4 * KT * SIGMA / 120e6)


def test_without_endurance_or_factor_fatigue_is_listed_as_not_made():
    for check in found(shaft(("Pulled", "Pushed"), endurance=UNSET), "fatigue"):
        assert (check.status, check.reason) == ("not_made", "no_endurance")
    *_, notched = found(shaft(("Pulled", "Half"), shoulder=Shoulder(fillet_radius=1.0)), "fatigue")
    assert (notched.status, notched.reason) == ("not_made", "shoulder_out_of_range")
    assert notched.ratio == pytest.approx(0.005)


def test_the_factor_on_allowables_does_not_touch_fatigue():
    ordinary = found(shaft(("Pulled", "Half")), "fatigue")
    project = shaft(("Pulled", "Half"))
    eased = replace(project, combinations=tuple(replace(c, allowable_factor=2.0) for c in COMBINATIONS))
    assert found(eased, "fatigue") == ordinary


def test_the_order_is_states_then_ranges():
    checks = solve(shaft(("Pulled", "Half"), ("Half", "Pushed"))).checks
    kinds = [(c.check, c.combination) for c in checks if c.check in ("peak", "fatigue")]
    assert [name for kind, name in kinds if kind == "peak"] == ["Pulled", "Pushed", "Half"]
    assert kinds[3:] == [("fatigue", "Half")] * 3 + [("fatigue", "Pushed")] * 3


def part_curves(results, state, part):
    """The stress of a bonded part along the only segment."""
    places = np.linspace(0.0, float(results.position[-1]), 301)
    readouts = [at(results, state, float(x)) for x in places]
    return np.array([(readout.left or readout.right).parts[part] for readout in readouts])


def test_every_bonded_part_has_its_own_swing():
    """Two bars of unlike expansion in one, pulled and warmed: each by its own stress and endurance."""
    warm = case("Warm", on_segments=[SegmentLoad("A", temperature_start=80.0, temperature_end=20.0)])
    pull = case("Pull", on_joints=[JointLoad("1", force=50e3)])
    project = member(
        [Part(0.5, round_bar(0.03, 0.05), expansion=1.2e-5)],
        {0: FixedSupport()},
        [warm, pull],
        [Combination("C1", {"Warm": 1.0}), Combination("C2", {"Pull": 1.0})],
    )
    other = Material("Bronze", 1.1e11, expansion=1.8e-5, endurance=Endurance(amplitude=60e6, ultimate=300e6))
    materials = (replace(project.materials[0], endurance=LINE), other)
    bonded = replace(project.segments[0], bonded=(BondedPart("Bronze", area(4e-4, 8e-4)),))
    project = replace(project, materials=materials, segments=(bonded,), fatigue=(FatigueRange("C1", "C2"),))
    results = solve(project)
    own, bronze = (check for check in results.checks if check.check == "fatigue")
    assert [(c.part, c.material, c.segment) for c in (own, bronze)] == [(0, "of A", "A"), (1, "Bronze", "A")]
    assert (own.limit, bronze.limit) == (120e6, 60e6)
    for check, line in ((own, LINE), (bronze, other.endurance)):
        first, second = (part_curves(results, state, check.part) for state in (0, 1))
        sampled = 0.5 * np.abs(first - second) / line.amplitude
        sampled += np.maximum(0.5 * (first + second), 0.0) / line.ultimate
        assert check.utilisation == pytest.approx(float(sampled.max()), rel=1e-3)
        assert check.utilisation >= float(sampled.max()) * (1 - 3e-9)


@given(
    st.lists(st.integers(-2000, 2000).map(lambda kn: 1e3 * kn), min_size=4, max_size=4),
    st.tuples(st.floats(0.02, 0.06), st.floats(0.02, 0.06)),
    st.floats(50e6, 500e6),
)
@settings(max_examples=25)
def test_the_worst_place_of_a_segment_is_the_worst_of_a_fine_sampling(loads, sizes, ultimate):
    """Tapered, with distributed loads of either sign: the place is inside as often as not."""
    one = case("One", on_segments=[SegmentLoad("A", load_start=loads[0], load_end=loads[1])])
    other = case("Two", on_segments=[SegmentLoad("A", load_start=loads[2], load_end=loads[3])])
    combinations = [Combination("C1", {"One": 1.0}), Combination("C2", {"Two": 1.0})]
    project = member(
        [Part(0.5, round_bar(*sizes))],
        {0: FixedSupport(), 1: FixedSupport()},
        [one, other],
        combinations,
    )
    line = Endurance(amplitude=100e6, ultimate=ultimate)
    materials = (replace(project.materials[0], endurance=line),)
    results = solve(replace(project, materials=materials, fatigue=(FatigueRange("C1", "C2"),)))
    (check,) = [c for c in results.checks if c.check == "fatigue"]
    first, second = bundle(results, points=2001).stress
    sampled = 0.5 * np.abs(first - second) / 100e6 + np.maximum(0.5 * (first + second), 0.0) / ultimate
    scale = float(sampled.max())
    assert check.utilisation >= scale * (1 - 3e-9)  # places as good to 1e-9 count as equal
    assert check.utilisation <= scale * (1 + 1e-3) + 1e-12
