"""Stress concentration and fatigue against the outside, from the project file's records to the checks.

The factors of a shouldered round bar in tension are those of the chart of R. E. Peterson in the form
A (r/d)^b that R. L. Norton, Machine Design, gives for it, from memory: another fit of the same chart than the
solver's, so they agree to some per cent and not better. The straight line between endured amplitude and
ultimate stress is the one named after J. Goodman, tried at its two ends and in its middle.
"""

from __future__ import annotations

import math

import pytest
from msgspec.structs import replace

from solver.model import Combination, Endurance, FatigueRange, FixedSupport, JointLoad, Shoulder
from solver.solve import solve
from tests.members import Part, case, member, round_bar

CHART = {  # D/d: A, b
    2.0: (1.01470, -0.30035),
    1.5: (0.99957, -0.28221),
    1.2: (0.96272, -0.25527),
    1.1: (0.98450, -0.20818),
}
SMALL = 0.03
FORCE = 50e3
NOMINAL = FORCE / (math.pi / 4 * SMALL**2)


def stepped(ratio, fillet, factors=(1.0,), endurance=None):
    """A bar of D = ratio · d and d, pulled in as many combinations as there are factors."""
    parts = [Part(0.2, round_bar(ratio * SMALL)), Part(0.2, round_bar(SMALL))]
    pull = case("Pull", on_joints=[JointLoad("2", force=FORCE)])
    names = [Combination(f"C{i}", {"Pull": factor}) for i, factor in enumerate(factors)]
    project = member(parts, {0: FixedSupport()}, [pull], names)
    joints = list(project.joints)
    joints[1] = replace(joints[1], shoulder=fillet)
    materials = (replace(m, allowable_peak=400e6) for m in project.materials)
    if endurance is not None:
        materials = (replace(m, endurance=endurance) for m in project.materials)
        project = replace(project, fatigue=(FatigueRange("C0", "C1"),))
    return replace(project, joints=tuple(joints), materials=tuple(materials))


@pytest.mark.parametrize("ratio", CHART)
@pytest.mark.parametrize("relative", [0.05, 0.1, 0.2])
def test_the_peak_of_a_shouldered_bar_is_that_of_the_chart(ratio, relative):
    a, b = CHART[ratio]
    project = stepped(ratio, Shoulder(fillet_radius=relative * SMALL))
    (peak,) = (check for check in solve(project).checks if check.check == "peak")
    assert peak.value == pytest.approx(a * relative**b * NOMINAL, rel=0.06)
    assert peak.utilisation == pytest.approx(peak.value / 400e6)


@pytest.mark.parametrize(
    ("factors", "share"),
    [
        ((1.0, -1.0), (1.0, 0.0)),  # swinging about nothing: the amplitude alone
        ((1.0, 1.0 - 1e-12), (0.0, 1.0)),  # resting: the mean alone
        ((1.0, 0.0), (0.5, 0.5)),  # pulsating
        ((0.0, -1.0), (0.5, 0.0)),  # pulsating in compression: its mean is not counted
    ],
)
def test_goodmans_line(factors, share):
    line = Endurance(amplitude=200e6, ultimate=500e6)
    project = stepped(1.5, Shoulder(factor=1.7), factors, line)
    check = next(c for c in solve(project).checks if c.check == "fatigue" and c.joint == "1")
    peak = 1.7 * NOMINAL
    assert check.utilisation == pytest.approx(share[0] * peak / 200e6 + share[1] * peak / 500e6, rel=1e-9)
