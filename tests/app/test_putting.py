"""The table of kinds, and putting its things on and taking them off again."""

from collections import Counter

import pytest
from msgspec import UNSET
from msgspec.structs import replace

from app.edits import EditError
from app.hand.cells import Cell
from app.hand.kinds import KINDS
from app.hand.putting import NotPut, has, put_on, take_off
from app.hand.symbols import GRID
from app.units import SYSTEM_NAMES
from solver.model import FixedSupport, JointLoad, LoadCase, SpringSupport
from tests.drawn_members import busy_member

BUSY = busy_member(4)
PLAIN = replace(
    BUSY,
    joints=tuple(replace(j, support=UNSET) for j in BUSY.joints),
    segments=tuple(replace(s, bedding=0.0) for s in BUSY.segments),
    load_cases=(LoadCase("Dead"), LoadCase("Live")),
    combinations=(),
)
HELD = replace(PLAIN, joints=tuple(replace(j, support=FixedSupport()) for j in PLAIN.joints))
BY_KEY = {kind.key: kind for kind in KINDS}
EVERY = pytest.mark.parametrize("kind", KINDS, ids=lambda kind: kind.key)


def test_keys_and_letters_are_unique():
    for values in ([k.key for k in KINDS], [k.letter for k in KINDS], [k.name for k in KINDS]):
        assert [value for value, count in Counter(values).items() if count > 1] == []


@EVERY
def test_a_symbol_stays_on_its_grid(kind):
    assert kind.symbol
    assert all(0.0 <= c <= GRID for line in kind.symbol for point in line.points for c in point)


@EVERY
@pytest.mark.parametrize("units", SYSTEM_NAMES)
def test_each_is_put_on_in_every_unit_system_and_taken_off_again(kind, units):
    start = HELD if kind.key in ("movement", "free") else PLAIN
    start = replace(start, display=replace(start.display, units=units))
    put = put_on(kind, start, (1, 3), 1)
    assert put.cells
    assert put.project != start
    if kind.key != "free":
        assert has(kind, put.project, 1, 1)
        assert not has(kind, put.project, 2, 1) or kind.on == "member"
        taken = take_off(kind, put.project, (1, 3), 1)
        assert replace(taken, materials=start.materials) == start  # a material stays for other uses


def test_what_is_there_stays_as_it_is():
    once = put_on(BY_KEY["spring"], PLAIN, (0,), 0).project
    stiff = replace(
        once, joints=(replace(once.joints[0], support=SpringSupport(stiffness=5.0)), *once.joints[1:])
    )
    assert put_on(BY_KEY["spring"], stiff, (0,), 0).project == stiff
    assert put_on(BY_KEY["fixed"], stiff, (0,), 0).project.joints[0].support == FixedSupport()


def test_without_a_load_case_one_is_made_and_said():
    bare = replace(PLAIN, load_cases=())
    put = put_on(BY_KEY["force"], bare, (2,), None)
    (case,) = put.project.load_cases
    assert case.joint_loads == (JointLoad(PLAIN.joints[2].mark, 1000.0),)
    assert put.case == 0
    assert case.name in put.note
    assert put.cells == (Cell("joints", 2, "force"),)
    assert put_on(BY_KEY["fixed"], bare, (2,), None).project.load_cases == ()


def test_a_movement_needs_a_support():
    with pytest.raises(NotPut, match="no support"):
        put_on(BY_KEY["movement"], PLAIN, (0,), 0)


@pytest.mark.parametrize(("layout", "sign"), [("horizontal", 1.0), ("vertical", -1.0)])
def test_weight_points_down(layout, sign):
    turned = replace(PLAIN, display=replace(PLAIN.display, orientation=layout))
    put = put_on(BY_KEY["weight"], turned, (), 1)
    assert put.project.load_cases[1].gravity == sign * 9.80665
    assert put.cells == (Cell("load_cases", 1, "gravity"),)


def test_several_loads_are_refused_and_nothing_changes():
    mark = PLAIN.joints[1].mark
    twice = replace(PLAIN, load_cases=(LoadCase("Dead", joint_loads=(JointLoad(mark), JointLoad(mark))),))
    with pytest.raises(EditError):
        put_on(BY_KEY["force"], twice, (0, 1), 0)
