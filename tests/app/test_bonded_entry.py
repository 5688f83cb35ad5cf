"""Bonded parts as typed: materials and sections, names that look like sections, and why a text is refused."""

from __future__ import annotations

import pytest
from hypothesis import given
from hypothesis import strategies as st

from app.bonded_entry import bonded_label, bonded_text, parse_bonded
from app.entry import EntryError
from solver.model import AreaSection, BondedPart, RectangleSection, RoundSection, TubeSection
from tests.strategies import sections

NAMES = ("Concrete", "Steel", "Steel A", "S355; hot")


def parsed(text):
    return parse_bonded(text, "mm-N-MPa", NAMES)


def test_several_parts_are_read_in_their_order():
    found = parsed("Concrete r300x300; steel A 1200;")
    assert [part.material for part in found] == ["Concrete", "Steel"]
    assert found[0].section == RectangleSection(width=0.3, depth=0.3)
    assert found[1].section == AreaSection(area=1.2e-3)


def test_nothing_is_no_part():
    assert parsed("  ") == ()


@pytest.mark.parametrize(
    ("text", "part"),
    [
        ("Steel A 1200", BondedPart("Steel", AreaSection(area=1.2e-3))),
        ("Steel A A 1200", BondedPart("Steel A", AreaSection(area=1.2e-3))),
        ("Steel A d20", BondedPart("Steel A", RoundSection(diameter=0.02))),
        ("S355; hot ⌀20", BondedPart("S355; hot", RoundSection(diameter=0.02))),
        ("Steel d20->d30", BondedPart("Steel", RoundSection(diameter=0.02, diameter_end=0.03))),
        ("Steel d60x5", BondedPart("Steel", TubeSection(outer=0.06, inner=0.05))),
    ],
)
def test_names_and_shapes_are_told_apart(text, part):
    assert parsed(text) == (part,)


@pytest.mark.parametrize(
    ("text", "said"),
    [
        ("Stel d20", "did you mean “Steel”?"),
        ("Wood d20", "“Wood” is no material"),
        ("d20", "“d20” is no material"),
        ("Steel", "section of the part of Steel is missing"),
        ("Steel; Concrete d20", "section of the part of Steel is missing"),
        ("Steel 20", "Say the shape of “20”"),
        ("Steel d", "is no section"),
        ("Steel d-5", "greater than 0"),
        ("Concrete d20 Steel d10", "is no unit"),
    ],
)
def test_what_is_wrong_is_said(text, said):
    with pytest.raises(EntryError) as refused:
        parsed(text)
    assert said in refused.value.sentence


def test_the_second_moment_of_an_area_is_typed_behind_it():
    (part,) = parsed("Steel A 1200 I 4.5e4")
    assert part.section.second_moment == pytest.approx(4.5e-8)
    assert "I" in bonded_label((part,), "mm-N-MPa")


PARTS = st.lists(st.builds(BondedPart, st.sampled_from(NAMES), sections()), max_size=3).map(tuple)


@given(PARTS, st.sampled_from(["mm-N-MPa", "in-lbf-psi"]))
def test_the_text_reads_back_to_the_same_parts(parts, system):
    assert parse_bonded(bonded_text(parts, system), system, NAMES, parts) == parts
    assert bonded_label(parts, system).count(";") >= len(parts) - 1
