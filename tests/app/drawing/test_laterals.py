"""What holds joints sideways: drawn where it is, put on and taken off by hand, typed into its own cell."""

from __future__ import annotations

import pytest
from msgspec import UNSET, structs

from app.drawing.layout import lay_out
from app.drawing.member import Member
from app.drawing.shapes import Part
from app.hand.cells import Cell, cell_of, part_of
from app.hand.kinds import KINDS
from app.hand.putting import has, put_on, take_off
from app.samples import read_sample
from app.shown import Shown
from solver.model import Lateral
from tests.app.drawing.frames import SIZES, window_frame

COLUMN = read_sample("loft_column")
SIDEWAYS, TURNING = (next(kind for kind in KINDS if kind.key == key) for key in ("lateral", "turning"))


def picture(upright, project=COLUMN):
    member = Member.of(project, Shown("combination", "Full use"))
    return lay_out(member, window_frame(member, SIZES[0], upright=upright))


@pytest.mark.parametrize("upright", [True, False])
def test_every_lateral_support_is_drawn_and_pointed_at(upright):
    targets = {target.part for target in picture(upright).targets}
    assert {part.index for part in targets if part.kind == "lateral"} == set(range(6))
    assert {part.index for part in targets if part.kind == "turning"} == {0}


def test_those_that_give_say_how_much():
    said = {
        text.text.replace("\n", " ")
        for text in picture(True).texts
        if text.part and text.part.kind == "lateral"
    }
    assert said == {"sideways 3 kN/mm", "sideways 6 kN/mm"}


def test_a_member_that_nothing_holds_sideways_is_drawn_as_before():
    bare = structs.replace(COLUMN, joints=tuple(structs.replace(j, lateral=UNSET) for j in COLUMN.joints))
    assert not {t.part.kind for t in picture(True, bare).targets} & {"lateral", "turning"}


@pytest.mark.parametrize("kind", [SIDEWAYS, TURNING])
def test_put_on_and_taken_off_again(kind):
    bare = structs.replace(COLUMN, joints=tuple(structs.replace(j, lateral=UNSET) for j in COLUMN.joints))
    put = put_on(kind, bare, (1, 2), None)
    held = Lateral(translation="fixed") if kind is SIDEWAYS else Lateral(rotation="fixed")
    assert [joint.lateral for joint in put.project.joints] == [UNSET, held, held, UNSET, UNSET, UNSET]
    assert put.cells == tuple(Cell("joints", joint, f"lateral_{kind.keys[0]}") for joint in (1, 2))
    assert take_off(kind, put.project, (1, 2), None) == bare


def test_one_half_is_taken_off_and_the_other_stays():
    left = take_off(SIDEWAYS, COLUMN, (0,), None)
    assert left.joints[0].lateral == Lateral(rotation=2.0e7)
    assert has(TURNING, left, 0, None)
    assert not has(SIDEWAYS, left, 0, None)


def test_what_is_there_stays_as_it_is():
    assert put_on(SIDEWAYS, COLUMN, (4,), None).project == COLUMN


@pytest.mark.parametrize(
    ("kind", "column"), [("lateral", "lateral_translation"), ("turning", "lateral_rotation")]
)
def test_a_sign_is_typed_into_its_own_cell(kind, column):
    cell = cell_of(Part(kind, 2), COLUMN, None)
    assert cell == Cell("joints", 2, column)
    assert part_of(cell, COLUMN, None) == Part(kind, 2)
