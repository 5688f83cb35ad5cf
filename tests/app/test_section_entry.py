"""Sections as text: every spelling, exact round trips, and the refusal to guess."""

from __future__ import annotations

import pytest
from hypothesis import given
from hypothesis import strategies as st
from msgspec import UNSET

from app.entry import EntryError
from app.section_entry import parse_section, section_label, section_text, taken_as
from app.units import SYSTEM_NAMES
from solver.model import AreaSection, RectangleSection, RoundSection, TubeSection, end_of
from tests.strategies import area_sections, rectangle_sections, round_sections, tube_sections

MM = "mm-N-MPa"
TUBE = TubeSection(outer=0.06, inner=0.05)
FLAT = RectangleSection(width=0.06, depth=0.005)


@pytest.mark.parametrize(
    ("text", "section"),
    [
        ("⌀40", RoundSection(diameter=0.04)),
        ("d40", RoundSection(diameter=0.04)),
        ("Ø 40", RoundSection(diameter=0.04)),
        ("40", RoundSection(diameter=0.04)),
        ("⌀1 1/2 in", RoundSection(diameter=0.0381)),
        ("⌀2*20", RoundSection(diameter=0.04)),
        ("40->30", RoundSection(diameter=0.04, diameter_end=0.03)),
        ("⌀75→⌀52", RoundSection(diameter=0.075, diameter_end=0.052)),
        ("⌀75→52 mm", RoundSection(diameter=0.075, diameter_end=0.052)),
        ("⌀7,5 cm → 2 in", RoundSection(diameter=0.075, diameter_end=0.0508)),
        ("⌀60×5", TUBE),
        ("d60x5", TUBE),
        ("⌀60 bore 50", TUBE),
        ("60 bore 50", TUBE),
        ("⌀60×30", TubeSection(outer=0.06, inner=0.0)),
        ("⌀60×5→50×5", TubeSection(outer=0.06, outer_end=0.05, inner=0.05, inner_end=0.04)),
        ("▭60×5", FLAT),
        ("r60x5", FLAT),
        ("▭20×30→20×40", RectangleSection(width=0.02, width_end=0.02, depth=0.03, depth_end=0.04)),
        ("A 1200", AreaSection(area=0.0012)),
        ("a12 cm²", AreaSection(area=0.0012)),
        ("A 1200→900", AreaSection(area=0.0012, area_end=0.0009)),
    ],
)
def test_spellings(text: str, section: object) -> None:
    assert parse_section(text, MM) == section


@pytest.mark.parametrize(
    ("text", "said"),
    [
        ("", "Nothing entered"),
        ("⌀", "is no section"),
        ("beam 200", "is no section"),
        ("⌀1→2→3", "is no section"),
        ("20x30", "type r20x30 for a rectangle"),
        ("60x5->20x30", "type r20x30 for a rectangle"),
        ("▭20", "needs 2 dimensions"),
        ("⌀60×5→⌀50", "needs 2 dimensions"),
        ("⌀60×5×3", "needs 2 dimensions"),
        ("A 5 bore 3", "needs 1"),
        ("⌀60→▭20×30", "the same shape"),
        ("⌀60×40", "thicker than half"),
        ("⌀60 bore 60", "smaller than the outside"),
        ("⌀0", "greater than 0"),
        ("⌀-4", "greater than 0"),
        ("⌀60×0", "greater than 0"),
        ("⌀60 mm×5", "Give the unit once"),
        ("⌀60 kN", "no unit"),
        ("⌀" + "1" * 1000, "Too long"),
    ],
)
def test_what_is_refused_is_said_in_words(text: str, said: str) -> None:
    with pytest.raises(EntryError) as caught:
        parse_section(text, MM)
    assert said in caught.value.sentence


@pytest.mark.parametrize(
    ("text", "previous", "section"),
    [
        ("60x5", None, TUBE),
        ("60x5", RoundSection(diameter=1.0), TUBE),
        ("60x5", AreaSection(area=1.0), TUBE),
        ("60x5", TubeSection(outer=1.0, inner=0.5), TUBE),
        ("60x5", RectangleSection(width=1.0, depth=1.0), FLAT),
        ("1500", AreaSection(area=1.0, second_moment=2.0), AreaSection(area=0.0015, second_moment=2.0)),
        ("40", TUBE, RoundSection(diameter=0.04)),
        ("⌀40", AreaSection(area=1.0), RoundSection(diameter=0.04)),
    ],
)
def test_bare_numbers_are_what_the_section_was(text: str, previous: object, section: object) -> None:
    assert parse_section(text, MM, previous) == section


@pytest.mark.parametrize(
    ("text", "previous", "said"),
    [
        ("60x5", TUBE, "tube"),
        ("60 × 5 mm", None, "tube"),
        ("60x5->50x5", RoundSection(diameter=1.0), "tube"),
        ("60x5", FLAT, "rectangle"),
        ("d60x5", FLAT, ""),
        ("60 bore 50", FLAT, ""),
        ("40", TUBE, ""),
    ],
)
def test_what_a_bare_pair_was_taken_as_is_known(text: str, previous: object, said: str) -> None:
    assert taken_as(text, previous) == said


@given(st.integers(1, 900), st.integers(1, 900), st.sampled_from([None, TUBE, FLAT]))
def test_a_bare_pair_is_what_it_is_said_to_be(first: int, second: int, previous: object) -> None:
    text = f"{first}x{second}"
    shape = {"tube": "d", "rectangle": "r"}[taken_as(text, previous)]
    if shape == "r" or 2 * second <= first:
        assert parse_section(text, MM, previous) == parse_section(shape + text, MM)


SECTIONS = st.one_of(area_sections(), round_sections(), tube_sections(), rectangle_sections())
SYSTEM = st.sampled_from(SYSTEM_NAMES)


@given(SECTIONS, SYSTEM)
def test_a_section_that_is_not_touched_stays_the_same(section: object, system: str) -> None:
    assert parse_section(section_text(section, system), system, section) is section


@given(SECTIONS, SYSTEM)
def test_every_dimension_survives_its_text(section: object, system: str) -> None:
    read = parse_section(section_text(section, system), system)
    assert type(read) is type(section)
    for name in section.__struct_fields__:
        if not name.endswith("_end") and "moment" not in name:
            start, end = getattr(section, name), getattr(section, f"{name}_end")
            assert getattr(read, name) == start
            assert end_of(getattr(read, name), getattr(read, f"{name}_end")) == end_of(start, end)


@given(st.integers(1, 5000), st.integers(1, 2000), SYSTEM)
def test_a_tube_is_seen_again_as_typed(outer: int, wall: int, system: str) -> None:
    if 2 * wall > outer:
        return
    text = f"⌀{outer / 10:g}×{wall / 10:g}"
    assert section_text(parse_section(text, system), system) == text


def test_an_end_that_is_not_typed_is_absent() -> None:
    assert parse_section("⌀40", MM).diameter_end is UNSET


def test_labels_are_for_reading() -> None:
    assert section_label(TUBE, "in-kip-ksi") == "⌀2.3622×0.1969"
    assert section_label(RoundSection(diameter=0.075, diameter_end=0.052), MM) == "⌀75→⌀52"


@given(st.text(max_size=20) | st.text("⌀▭Ad0123456789x×→->. bore", max_size=20))
def test_any_text_is_a_section_or_an_entry_error(text: str) -> None:
    try:
        section = parse_section(text, MM)
    except EntryError:
        return
    assert section_text(section, MM)


def test_a_bore_too_small_for_any_wall_is_written_as_a_bore():
    """Six inches of outside less a micrometre: no wall of twenty digits gives that very double."""
    tube = TubeSection(outer=0.25, inner=1e-06)
    text = section_text(tube, "in-lbf-psi")
    assert "bore" in text
    assert parse_section(text, "in-lbf-psi") == tube
