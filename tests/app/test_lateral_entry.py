"""What holds a joint sideways, as it is typed; second moments behind areas."""

from __future__ import annotations

import pytest
from msgspec import UNSET

from app.edits import EditError, hold_sideways, join_segments, reverse_member, split_segment
from app.entry import EntryError
from app.lateral_entry import LateralError, hold_entry, hold_text, parse_hold
from app.samples import read_sample
from app.section_entry import parse_section, section_text
from solver.model import AreaSection, Lateral, RoundSection


@pytest.mark.parametrize(
    ("text", "key", "hold"),
    [
        ("fixed", "translation", "fixed"),
        (" Fixed ", "rotation", "fixed"),
        ("free", "translation", UNSET),
        ("", "rotation", UNSET),
        ("500", "translation", 5e5),
        ("500 N/mm", "translation", 5e5),
        ("2 kN/m", "translation", 2e3),
        ("20 kN·m/rad", "rotation", 2e4),
    ],
)
def test_what_is_typed(text, key, hold):
    assert parse_hold(text, key, "mm-N-MPa") == hold


@pytest.mark.parametrize("text", ["-5", "0", "held", "5 mm", "spring"])
def test_what_is_refused_says_why(text):
    with pytest.raises((LateralError, EntryError)) as refused:
        parse_hold(text, "translation", "mm-N-MPa")
    assert str(refused.value)


@pytest.mark.parametrize("lateral", [UNSET, Lateral(translation="fixed"), Lateral(translation=123456.789)])
def test_the_text_of_an_editor_is_read_back(lateral):
    text = hold_entry(lateral, "translation", "in-kip-ksi")
    held = UNSET if lateral is UNSET else lateral.translation
    assert parse_hold(text, "translation", "in-kip-ksi") == held
    assert hold_text(lateral, "translation", "in-kip-ksi")


@pytest.mark.parametrize(
    ("text", "section"),
    [
        ("A 1200 I 4.5e4", AreaSection(area=1.2e-3, second_moment=4.5e-8)),
        ("a 12 cm² I 4.5 cm⁴", AreaSection(area=1.2e-3, second_moment=4.5e-8)),
        (
            "A 1200 I 45000 → 1400 I 60000",
            AreaSection(area=1.2e-3, area_end=1.4e-3, second_moment=4.5e-8, second_moment_end=6e-8),
        ),
        ("A 1200 I 45000->1400", AreaSection(area=1.2e-3, area_end=1.4e-3, second_moment=4.5e-8)),
    ],
)
def test_second_moments_behind_areas(text, section):
    assert parse_section(text, "mm-N-MPa") == section
    assert parse_section(section_text(section, "mm-N-MPa"), "mm-N-MPa") == section


def test_an_area_typed_with_its_sign_and_without_i_has_none_any_more():
    old = AreaSection(area=1.2e-3, second_moment=4.5e-8)
    assert parse_section("A 1300", "mm-N-MPa", old) == AreaSection(area=1.3e-3)
    assert parse_section("1300", "mm-N-MPa", old) == AreaSection(area=1.3e-3, second_moment=4.5e-8)


@pytest.mark.parametrize("text", ["d40 I 5", "A 1200 → 1400 I 5", "A 1200 I -5", "A 1200 I 5 mm"])
def test_a_second_moment_in_the_wrong_place_is_refused(text):
    with pytest.raises(EntryError):
        parse_section(text, "mm-N-MPa", RoundSection(diameter=0.04))


class TestEdits:
    COLUMN = read_sample("loft_column")

    def test_a_split_leaves_the_new_joint_free(self):
        split = split_segment(self.COLUMN, 1, 1.0)
        laterals = [joint.lateral for joint in split.joints]
        old = [joint.lateral for joint in self.COLUMN.joints]
        assert laterals == [*old[:2], UNSET, *old[2:]]

    def test_the_reverse_turns_their_order(self):
        turned = reverse_member(self.COLUMN)
        assert [j.lateral for j in turned.joints] == [j.lateral for j in reversed(self.COLUMN.joints)]

    def test_a_joint_that_is_held_is_not_joined_over(self):
        with pytest.raises(EditError) as refused:
            join_segments(self.COLUMN, 0, 1)
        assert "lateral support" in {fault.facts.get("kind") for fault in refused.value.faults}

    def test_freeing_both_halves_takes_the_record_away(self):
        freed = hold_sideways(self.COLUMN, (0,), "translation", UNSET)
        assert hold_sideways(freed, (0,), "rotation", UNSET).joints[0].lateral is UNSET
