"""Several supports at one joint: how they are written, taken off, turned round and moved along."""

import pytest

from app import edits
from app.edits import EditError
from app.encode import plain
from solver import validation
from solver.model import FixedSupport, JointLoad, SpringSupport, StopSupport, supports_of
from tests.members import Part, area, case, member

PLUS, MINUS = StopSupport(side="plus", clearance=1e-3), StopSupport(side="minus", clearance=2e-3)


class TestSupportsOfAJoint:
    @pytest.mark.parametrize(
        ("supports", "written"),
        [
            ((PLUS,), {"mark": "2", "support": {"kind": "stop", "side": "plus", "clearance": 1e-3}}),
            ((PLUS, FixedSupport()), ["stop", "fixed"]),
            ((), {"mark": "2"}),
        ],
    )
    def test_one_is_written_as_support_and_several_as_supports(self, supports, written):
        chain = member([Part(1.0, area(1e-4))] * 2, {0: FixedSupport()})
        for before in ((MINUS, PLUS), (), (MINUS,)):  # whatever it was before
            held = edits.hold_joint(edits.hold_joint(chain, 2, before), 2, supports)
            joint = plain(held.joints[2])
            assert supports_of(held.joints[2]) == supports
            assert not validation.faults(held)
            assert (joint if isinstance(written, dict) else [s["kind"] for s in joint["supports"]]) == written

    def test_one_of_several_is_taken_off(self):
        chain = member([Part(1.0, area(1e-4))] * 2, {0: FixedSupport()})
        held = edits.hold_joint(chain, 2, (PLUS, MINUS, FixedSupport()))
        assert supports_of(edits.without_support(held, 2, 1).joints[2]) == (PLUS, FixedSupport())

    def test_a_movement_stays_with_what_is_left_and_goes_with_the_last(self):
        moved = case(on_joints=[JointLoad("2", movement=1e-3)])
        held = edits.hold_joint(member([Part(1.0, area(1e-4))] * 2, {}, [moved]), 2, (PLUS, MINUS))
        one = edits.without_support(held, 2, 0)
        assert one.load_cases == held.load_cases
        assert not edits.without_support(one, 2, 0).load_cases[0].joint_loads

    def test_what_no_support_can_be_is_refused(self):
        chain = member([Part(1.0, area(1e-4))], {0: FixedSupport()})
        with pytest.raises(EditError):
            edits.hold_joint(chain, 1, (PLUS, SpringSupport(stiffness=-1.0)))


class TestTheMemberTurned:
    def test_every_stop_changes_its_side_and_twice_is_as_before(self):
        chain = edits.hold_joint(
            member([Part(1.0, area(1e-4))] * 2, {0: PLUS}), 2, (PLUS, MINUS, FixedSupport())
        )
        turned = edits.reverse_member(chain)
        assert [getattr(s, "side", "") for s in supports_of(turned.joints[0])] == ["minus", "plus", ""]
        assert supports_of(turned.joints[2])[0].side == "minus"
        assert edits.reverse_member(turned) == chain

    def test_mirroring_gives_the_image_the_other_side(self):
        half = edits.hold_joint(member([Part(1.0, area(1e-4))], {1: FixedSupport()}), 0, (PLUS, MINUS))
        whole = edits.mirror_member(half)
        assert [s.side for s in supports_of(whole.joints[2])] == ["minus", "plus"]

    def test_repeating_copies_all_supports_between(self):
        chain = edits.hold_joint(member([Part(1.0, area(1e-4))] * 2, {}), 1, (PLUS, MINUS))
        assert supports_of(edits.repeat_segments(chain, 0, 1, 1).joints[3]) == (PLUS, MINUS)

    def test_joining_is_refused_over_any_of_them(self):
        chain = edits.hold_joint(member([Part(1.0, area(1e-4))] * 2, {0: FixedSupport()}), 1, (PLUS, MINUS))
        one = edits.set_value(chain, ("segments", 1, "material"), chain.segments[0].material)
        with pytest.raises(EditError) as refused:
            edits.join_segments(one, 0, 1)
        assert [fault.rule for fault in refused.value.faults] == ["joint_carries"]
        assert edits.join_equal_neighbours(one) is one
