"""What each support of a joint does, in the order of the file."""

from __future__ import annotations

from msgspec import structs
from numpy.testing import assert_allclose

from solver.model import FixedSupport, JointLoad, Project, SpringSupport, StopSupport
from solver.outcomes import SupportOutcome, support_outcomes
from solver.solve import solve
from tests.members import STEEL, Part, area, case, member

BAR = [Part(1.0, area(1e-3))]
STIFF = STEEL * 1e-3


def with_supports(*supports, force=3e4, movement=0.0) -> Project:
    project = member(BAR, {0: FixedSupport()}, [case(on_joints=[JointLoad("1", force, movement)])])
    end = structs.replace(project.joints[1], supports=supports)
    return structs.replace(project, joints=(project.joints[0], end))


def test_a_free_and_a_fixed_joint():
    results = solve(with_supports())
    assert support_outcomes(results, 0, 1) == ()
    (fixed,) = support_outcomes(results, 0, 0)
    assert (fixed.kind, fixed.contact, fixed.clearance) == ("fixed", None, None)
    assert_allclose(fixed.force, -3e4)


def test_spring_and_stops_in_their_order():
    stops = StopSupport(side="plus", clearance=1e-4), StopSupport(side="minus", clearance=2e-4)
    results = solve(with_supports(stops[0], SpringSupport(stiffness=1e7), stops[1]))
    near, spring, far = support_outcomes(results, 0, 1)
    assert (near.kind, near.contact, near.clearance) == ("stop", "closed", 0.0)
    assert_allclose(spring.force, -1e3, rtol=1e-9)
    assert_allclose(near.force, -(3e4 - STIFF * 1e-4 - 1e3), rtol=1e-9)
    assert (far.kind, far.contact, far.force) == ("stop", "open", 0.0)
    assert_allclose(far.clearance, 3e-4)
    assert_allclose(results.solution.reaction[0, 1], near.force + spring.force, rtol=1e-12)


def test_a_movement_takes_all_supports_of_a_joint_along():
    results = solve(
        with_supports(SpringSupport(stiffness=1e7), SpringSupport(stiffness=2e7), force=0.0, movement=1e-3)
    )
    one, other = support_outcomes(results, 0, 1)
    u = 3e7 * 1e-3 / (STIFF + 3e7)
    assert_allclose([one.force, other.force], [1e7 * (1e-3 - u), 2e7 * (1e-3 - u)], rtol=1e-9)


def test_two_fixed_supports_are_one_and_leave_nothing_to_the_others():
    supports = (
        FixedSupport(),
        SpringSupport(stiffness=1e7),
        FixedSupport(),
        StopSupport(side="plus", clearance=0.0),
    )
    first, spring, second, stop = support_outcomes(solve(with_supports(*supports)), 0, 1)
    assert_allclose(first.force, -3e4)
    assert second == SupportOutcome("fixed", 0.0)
    assert (abs(spring.force), abs(stop.force), stop.contact) == (0.0, 0.0, "open")
