"""Random members against plain cubic beams on a fine mesh, forces from statics; stops; companions."""

from __future__ import annotations

import math

import numpy as np
import pytest
from msgspec import UNSET, structs
from scipy.linalg import eigh

from solver.model import FixedSupport, JointLoad, Lateral, Limits, SegmentLoad, StopSupport
from solver.solve import solve
from tests.members import STEEL, Part, case, member, round_bar
from tests.sleeves import draw_bolt

ELEMENTS = 40  # of a segment
POINTS, WEIGHTS = np.polynomial.legendre.leggauss(5)
CLAMPED = Lateral(translation="fixed", rotation="fixed")
PINNED = Lateral(translation="fixed")


def with_laterals(project, laterals):
    joints = tuple(structs.replace(j, lateral=laterals.get(i, UNSET)) for i, j in enumerate(project.joints))
    return structs.replace(project, joints=joints, limits=Limits(stability_factor=1.5))


class Drawn:
    """A member drawn at random: lengths, diameters at both ends, loads, and what holds it sideways."""

    def __init__(self, seed):
        rng = np.random.default_rng(seed)
        n = int(rng.integers(1, 5))
        self.lengths = rng.uniform(0.4, 1.6, n)
        self.diameters = rng.uniform(0.03, 0.06, (n, 2))
        self.ends = -rng.uniform(2e3, 2e4, n) * rng.choice([1.0, 1.0, -0.3], n)
        self.ends[-1] = -2e4
        self.spread = -rng.uniform(0.0, 5e3, n)
        stiffness = 10.0 ** rng.uniform(4.0, 7.0, n + 1)
        self.laterals = {
            i: Lateral(translation=float(k)) for i, k in enumerate(stiffness) if rng.random() < 0.5
        }
        self.laterals |= {0: Lateral(translation="fixed", rotation=float(10.0 ** rng.uniform(3.0, 6.0)))}

    def project(self):
        parts = [
            Part(float(length), round_bar(float(a), float(b)))
            for length, (a, b) in zip(self.lengths, self.diameters, strict=True)
        ]
        loads = case(
            on_joints=[JointLoad(str(i + 1), force=float(f)) for i, f in enumerate(self.ends)],
            on_segments=[
                SegmentLoad(part, load_start=float(q)) for part, q in zip("ABCD", self.spread, strict=False)
            ],
        )
        return with_laterals(member(parts, {0: FixedSupport()}, [loads]), self.laterals)

    def force(self, segment, s):
        """By statics: all that acts beyond."""
        beyond = self.ends[segment:].sum() + (self.spread * self.lengths)[segment + 1 :].sum()
        return beyond + self.spread[segment] * self.lengths[segment] * (1.0 - s)

    def bending(self, segment, s):
        a, b = self.diameters[segment]
        return STEEL * math.pi * (a + s * (b - a)) ** 4 / 64

    def factor(self):
        """The least positive one of the dense problem."""
        size = 2 * (len(self.lengths) * ELEMENTS + 1)
        stiff, geometric = np.zeros((size, size)), np.zeros((size, size))
        for segment, length in enumerate(self.lengths):
            for element in range(ELEMENTS):
                at = 2 * (segment * ELEMENTS + element)
                for t, weight in zip(0.5 * (POINTS + 1.0), 0.5 * WEIGHTS, strict=True):
                    slope, curvature = shapes(t, length / ELEMENTS)
                    s, share = (element + t) / ELEMENTS, weight * length / ELEMENTS
                    part = slice(at, at + 4), slice(at, at + 4)
                    stiff[part] += share * self.bending(segment, s) * np.outer(curvature, curvature)
                    geometric[part] += share * self.force(segment, s) * np.outer(slope, slope)
        kept = np.ones(size, dtype=bool)
        for joint, lateral in self.laterals.items():
            for way, hold in enumerate((lateral.translation, lateral.rotation)):
                freedom = 2 * joint * ELEMENTS + way
                if hold == "fixed":
                    kept[freedom] = False
                elif hold is not UNSET and hold != "free":
                    stiff[freedom, freedom] += hold
        both = np.ix_(kept, kept)
        return 1.0 / eigh(-geometric[both], stiff[both], eigvals_only=True)[-1]


def shapes(t, h):
    """First and second derivatives of the cubic Hermite polynomials of an element of length h."""
    slope = [(6 * t * t - 6 * t) / h, 1 - 4 * t + 3 * t * t, (6 * t - 6 * t * t) / h, 3 * t * t - 2 * t]
    curvature = [(12 * t - 6) / h**2, (6 * t - 4) / h, (6 - 12 * t) / h**2, (6 * t - 2) / h]
    return np.array(slope), np.array(curvature)


@pytest.mark.parametrize("seed", range(8))
def test_the_critical_factor_is_that_of_many_plain_beams(seed):
    drawn = Drawn(seed)
    (found,) = solve(drawn.project()).stability
    assert found.status == "checked"
    assert found.critical_factor == pytest.approx(drawn.factor(), rel=2e-6)


@pytest.mark.parametrize(("clearance", "span"), [(2.0, 2.0), (0.0, 1.0)])
def test_stops_stay_as_they_are_under_the_loads_themselves(clearance, span):
    """Clamped sideways between two spans: open, the longer one buckles; closed, it carries no force.

    The open stop would close at twice the loads, long before the member buckles.
    """
    load, diameter, lengths = 1e3, 0.04, (2.0, 1.0)
    moved = load * lengths[0] / (STEEL * math.pi * diameter**2 / 4)
    stop = StopSupport(side="minus", clearance=clearance * moved)
    parts = [Part(length, round_bar(diameter)) for length in lengths]
    project = member(parts, {0: FixedSupport(), 1: stop}, [case(on_joints=[JointLoad("2", force=-load)])])
    (found,) = solve(with_laterals(project, {0: PINNED, 1: CLAMPED, 2: PINNED})).stability
    root = 4.493409457909064  # tan kL = kL
    euler = root**2 * STEEL * math.pi * diameter**4 / 64 / (span**2 * load)
    assert euler > 2.0
    assert found.critical_factor == pytest.approx(euler, rel=1e-6)


def test_a_compressed_companion_makes_the_check_not_made():
    """Though the member beside it is pulled, and would need nothing by itself."""
    results = solve(structs.replace(draw_bolt(), limits=Limits(stability_factor=2.0)))
    forces = results.companions.force_from[:, 0]
    pressed = [i for i, state in enumerate(results.states) if state.checked and forces[i] < 0.0]
    assert pressed
    for state in pressed:
        assert results.stability[state].reason == "companion_compressed"
        name = results.states[state].name
        (check,) = [c for c in results.checks if c.check == "stability" and c.combination == name]
        assert (check.status, check.utilisation) == ("not_made", None)
    assert results.verdict == "incomplete"
