"""Shoulders as typed text: both notations, what a bare number means, and what is refused with a reason."""

from __future__ import annotations

import pytest
from msgspec import UNSET

from app.entry import EntryError
from app.shoulder_entry import parse_shoulder, shoulder_entry, shoulder_text
from app.units import SYSTEM_NAMES
from solver.model import Shoulder

MM = "mm-N-MPa"
RADIUS, FACTOR = Shoulder(fillet_radius=0.002), Shoulder(factor=1.8)


@pytest.mark.parametrize(
    ("text", "shoulder"),
    [
        ("", UNSET),
        ("r 2", RADIUS),
        ("R2", RADIUS),
        ("r = 2 mm", RADIUS),
        ("2 mm", RADIUS),
        ("r 0,2 cm", RADIUS),
        ("Kt 1.8", FACTOR),
        ("kt=1,8", FACTOR),
        ("K 1.8", FACTOR),
        ("Kt 1", Shoulder(factor=1.0)),
    ],
)
def test_what_can_be_typed(text, shoulder):
    assert parse_shoulder(text, MM) == shoulder


def test_a_bare_number_is_what_the_cell_holds_already():
    assert parse_shoulder("3", MM, RADIUS) == Shoulder(fillet_radius=0.003)
    assert parse_shoulder("3", MM, FACTOR) == Shoulder(factor=3.0)


@pytest.mark.parametrize(
    ("text", "reason"),
    [
        ("3", "r 2 mm"),
        ("sharp", "Kt 1.8"),
        ("r 0", "greater than 0"),
        ("r -1", "greater than 0"),
        ("Kt 0.9", "at least 1"),
        ("Kt 2 mm", "unit"),
        ("r", "number"),
    ],
)
def test_what_cannot_is_refused_with_the_reason(text, reason):
    with pytest.raises(EntryError, match=reason):
        parse_shoulder(text, MM)


@pytest.mark.parametrize("system", SYSTEM_NAMES)
@pytest.mark.parametrize("shoulder", [UNSET, RADIUS, FACTOR, Shoulder(fillet_radius=0.0031)])
def test_what_an_editor_starts_from_gives_the_same_again(shoulder, system):
    assert parse_shoulder(shoulder_entry(shoulder, system), system) == shoulder


def test_how_it_is_read():
    assert shoulder_text(RADIUS, MM) == "r 2 mm"
    assert shoulder_text(FACTOR, MM) == "Kt 1.8"
    assert shoulder_text(UNSET, MM) == ""
