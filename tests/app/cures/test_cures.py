"""Cures: what is said holds in a fresh solve, and what else fails then is said with it."""

from __future__ import annotations

import math
from dataclasses import replace
from fractions import Fraction
from importlib import import_module

import pytest
from hypothesis import assume, given, settings
from hypothesis import strategies as st
from msgspec import UNSET, structs

from app import edits
from app.cures import failing, is_small, seek
from app.cures.changes import section_knobs, spring_knobs
from app.cures.rounds import above, round_numbers
from app.cures.search import first_passing
from app.entry import parse_entry
from app.findings.subjects import Subject, subject_of
from app.phrases.cures import cure_sentence, cures_sentences, unsought_sentence
from app.samples import read_sample
from app.section_entry import parse_section
from app.units import SYSTEM_NAMES, entry_text
from solver.checks import Check
from solver.errors import Cancelled, OutOfRange
from solver.model import (
    DisplacementLimit,
    FixedSupport,
    JointLoad,
    Limits,
    ReactionLimit,
    RectangleSection,
    RelativeLimit,
    SegmentLoad,
    SpringSupport,
    TubeSection,
)
from solver.solve import solve
from tests.members import Part, area, case, member, round_bar
from tests.strategies import projects

PULL = case("Pull", on_joints=[JointLoad("1", 100e3)])
HEAT = case(
    "Heat", on_segments=[SegmentLoad("A", temperature_start=50.0), SegmentLoad("B", temperature_start=50.0)]
)
STEEL = {"allowable_tension": 1.6e8, "allowable_compression": 1.4e8, "expansion": 1.2e-5}


def pulled(section, **allowables):
    """A bar held at its start and pulled with 100 kN."""
    return member([Part(1.0, section, **{**STEEL, **allowables})], {0: FixedSupport()}, [PULL])


def limited(project, **limits):
    return structs.replace(project, limits=Limits(**limits))


def sought(project, subject=None):
    results = solve(project, cases=False)
    return seek(results, subject or failing(results)[0])


def typed(project, change):
    """The project with the change typed as its text, as a person would."""
    system = project.display.unit_system
    for place in change.places:
        old = edits.value_at(project, place)
        if change.kind == "section":
            project = edits.set_value(project, place, parse_section(change.text, system, old))
        else:
            stiffness = parse_entry(change.text.replace("\u202f", ""), "spring", system)
            project = edits.set_value(project, (*place, "stiffness"), stiffness)
    return project


class TestRoundNumbers:
    @given(st.floats(1e-4, 10.0), st.sampled_from([3.0, 1 / 3]), st.sampled_from(SYSTEM_NAMES))
    def test_are_short_in_order_and_within_reach(self, value, reach, system):
        found = round_numbers(value, reach, "size", system)
        beyond = sorted(found, reverse=reach < 1)
        assert list(found) == beyond
        low, high = sorted((value, reach * value))
        assert all(low * (1 - 1e-12) <= number <= high * (1 + 1e-12) for number in found)
        for number in found:
            digits = entry_text(number, "size", system).partition("e")[0].replace(".", "").strip("0")
            assert len(digits) <= 3

    @given(st.floats(1e-4, 10.0))
    def test_the_next_one_above_is_hardly_more(self, value):
        assert value * (1 - 1e-12) <= above(value, "size", "mm-N-MPa") <= 1.0151 * value

    def test_are_those_of_a_drawing(self):
        assert [round(1e3 * d, 6) for d in round_numbers(0.0423, 3.0, "size", "mm-N-MPa")[:3]] == [
            42.5,
            43.0,
            43.5,
        ]
        assert (
            Fraction(entry_text(round_numbers(8.17e-4, 9.0, "area", "mm-N-MPa")[0], "area", "mm-N-MPa"))
            == 820
        )


class TestSearch:
    @given(st.integers(0, 300), st.integers(0, 320))
    def test_a_threshold_is_found_exactly(self, count, threshold):
        found = first_passing(count, lambda index: index >= threshold)
        assert found == (threshold if threshold < count else None)

    @given(st.lists(st.booleans(), max_size=80))
    def test_what_is_found_passes_and_was_asked_last_of_those_that_do(self, row):
        asked = []

        def passes(index):
            asked.append(index)
            return row[index]

        found = first_passing(len(row), passes)
        if found is not None:
            assert row[found]
            assert [index for index in asked if row[index]][-1] == found
            assert found == 0 or not row[found - 1]

    def test_few_are_asked(self):
        asked = []
        assert first_passing(200, lambda index: asked.append(index) or index >= 137) == 137
        assert len(asked) < 20


class TestStress:
    @pytest.mark.parametrize(
        ("section", "texts"),
        [
            (area(6e-4), ["A 625 mm²"]),  # 100 kN by 160 MPa
            (round_bar(0.028), ["⌀28.4 mm"]),  # 28.21
            (TubeSection(outer=0.05, inner=0.042), ["⌀50×4.4 mm", "⌀54×4 mm"]),  # wall 4.34, outside 53.74
            (RectangleSection(width=0.02, depth=0.03), ["▭21×30 mm", "▭20×31.4 mm"]),  # 20.83 and 31.25
            (round_bar(0.04, 0.028), ["⌀40.5→⌀28.4 mm"]),
        ],
    )
    def test_each_shape_has_its_dimensions(self, section, texts):
        found = [cure.change.text for cure in sought(pulled(section)).found]
        assert sorted(found) == sorted(texts)

    def test_a_tapered_tube_keeps_its_proportions(self):
        tube = TubeSection(outer=0.05, outer_end=0.04, inner=0.04, inner_end=0.032)
        found = {cure.change.text for cure in sought(pulled(tube)).found}
        assert found == {"⌀50×7.3→⌀40×5.85 mm", "⌀67×5→⌀54×4 mm"}  # 628 mm² each at the end

    def test_equal_sections_that_fail_alike_are_changed_together(self):
        results = solve(read_sample("tie_rod"), cases=False)
        first, second = failing(results)
        (cure,) = seek(results, first).found
        assert cure.change.text == "A 860 mm²"
        assert set(cure.subjects) == {first, second}
        assert cure_sentence(cure) == "D, F pass with A 860 mm² each, 1.00"
        assert solve(cure.change.applied(results.project)).verdict == "pass"

    def test_what_one_of_equal_sections_needs_by_itself_is_said_too(self):
        parts = [
            Part(1.0, area(6e-4), **STEEL),
            Part(1.0, area(6e-4), **{**STEEL, "allowable_tension": 1.2e8}),
        ]
        bar = member(parts, {0: FixedSupport()}, [case("Pull", on_joints=[JointLoad("2", 100e3)])])
        together, alone = sought(bar, Subject("stress", ("A",))).found
        assert cure_sentence(together) == "A, B pass with A 840 mm² each, 0.99"
        assert cure_sentence(alone) == "Passes with A 625 mm², 1.00; B still does not pass, 1.39"

    def test_equal_sections_that_pass_are_left_as_they_are(self):
        parts = [Part(1.0, area(6e-4), **STEEL), Part(1.0, area(6e-4), **{**STEEL, "allowable_tension": 3e8})]
        bar = member(parts, {0: FixedSupport()}, [case("Pull", on_joints=[JointLoad("2", 100e3)])])
        (cure,) = sought(bar).found
        assert cure.change.marks == ("A",)

    def test_where_no_section_cures_all_one_alone_is_said(self):
        """Heated and held, both; the second also pulled: only that is cured by a larger section."""
        parts = [Part(1.0, area(6e-4), **{**STEEL, "allowable_tension": 1.0}), Part(1.0, area(6e-4), **STEEL)]
        held = {0: FixedSupport(), 1: FixedSupport()}
        bar = member(
            parts,
            held,
            [
                case(
                    "Pull",
                    on_segments=[SegmentLoad("A", temperature_start=-9.0)],
                    on_joints=[JointLoad("2", 100e3)],
                )
            ],
        )
        (cure,) = sought(bar, Subject("stress", ("B",))).found
        assert cure.change.marks == ("B",)
        assert sought(bar, Subject("stress", ("A",))).found == ()

    def test_a_single_heated_bar_has_no_cure(self):
        heat = case("Heat", on_segments=[SegmentLoad("A", temperature_start=70.0)])
        bar = member([Part(1.0, round_bar(0.03), **STEEL)], {0: FixedSupport(), 1: FixedSupport()}, [heat])
        assert cures_sentences(sought(bar)) == ("None tried up to ⌀90 mm passes",)

    def test_another_that_fails_only_then_is_named(self):
        """Heated and held: a thicker A presses harder on B."""
        parts = [
            Part(1.0, area(1e-3), **{**STEEL, "allowable_compression": 1.25e8}),
            Part(1.0, area(1e-3), **STEEL),
        ]
        bar = member(parts, {0: FixedSupport(), 2: FixedSupport()}, [HEAT])
        cures = sought(bar)
        (cure,) = cures.found
        assert [check.segment for check in cure.fails_then] == []
        tight = structs.replace(
            bar,
            materials=(bar.materials[0], structs.replace(bar.materials[1], allowable_compression=1.262e8)),
        )
        (cure,) = sought(tight, Subject("stress", ("A",))).found
        assert [check.segment for check in cure.fails_then] == ["B"]
        assert "; then B does not pass, 1.0" in cure_sentence(cure)


class TestLimits:
    def test_a_spring_grows_stiffer_for_a_displacement(self):
        bar = member([Part(1.0, area(1e-2), **STEEL)], {0: SpringSupport(stiffness=5e7)}, [PULL])
        cures = sought(limited(bar, displacement=(DisplacementLimit("1", 1.5e-3),)))
        assert cures.found[0].change.kind == "spring"
        assert cure_sentence(cures.found[0]).startswith(
            "Passes with a spring of 69\u202f000 N/mm at joint 0, "
        )

    def test_a_spring_grows_softer_for_a_reaction(self):
        """Heated between a wall and a spring: what gives way is pressed less."""
        bar = member(
            [Part(1.0, area(1e-3), **STEEL)] * 2, {0: FixedSupport(), 2: SpringSupport(stiffness=1e8)}, [HEAT]
        )
        cures = sought(limited(bar, reaction=(ReactionLimit("2", 3e4),)))
        (cure,) = cures.found
        assert cure.change.value.stiffness < 1e8

    def test_a_segment_between_grows_for_a_relative_displacement(self):
        bar = limited(pulled(area(1e-3)), relative=(RelativeLimit("0", "1", 4e-4),))
        (cure,) = sought(bar).found
        assert cure_sentence(cure) == "Passes with A 1200 mm² in A, 0.99"

    def test_a_reaction_of_a_fixed_support_has_no_cure_and_nothing_is_said(self):
        bar = limited(pulled(area(1e-3)), reaction=(ReactionLimit("0", 5e4),))
        assert cures_sentences(sought(bar)) == ()


def test_a_change_that_keeps_a_check_from_being_made_is_no_cure():
    """So heavy that a little more of it stands on its foot, in compression, which has no allowable here."""
    heavy = case("Pull", gravity=-9.81, on_joints=[JointLoad("1", 100e3)])
    bar = pulled(area(6e-4), allowable_compression=UNSET, density=1.682e7)
    assert sought(bar).found
    cures = sought(structs.replace(bar, load_cases=(heavy,)))
    assert cures.found == ()
    assert cures.tried is not None


def test_a_cure_stands_only_where_each_case_alone_is_solved_too(monkeypatch):
    """The window solves every case alone as well, and has no results where one of them cannot be."""
    bar = pulled(area(6e-4))
    assert sought(bar).found

    def refusing(project, *, cases=True, cancelled):
        if cases:
            raise OutOfRange("Pull", "stress")
        return solve(project, cases=False, cancelled=cancelled)

    results = solve(bar, cases=False)
    monkeypatch.setattr(import_module("solver.solve"), "solve", refusing)
    assert seek(results, failing(results)[0]).found == ()


def test_a_search_can_be_cancelled():
    results = solve(pulled(area(6e-4)), cases=False)
    with pytest.raises(Cancelled):
        seek(results, failing(results)[0], lambda: True)


def test_knobs_hold_only_what_is_well_formed_or_cannot_be_typed():
    tube = pulled(TubeSection(outer=0.05, inner=0.001))
    assert all(len(knob.values) for knob in section_knobs(tube, 0))
    assert spring_knobs(tube, 0) == ()


@settings(max_examples=12)
@given(projects(max_segments=3))
def test_whatever_is_said_holds_when_it_is_typed(project):
    results = solve(project, cases=False)
    worst = failing(results)[:2]
    assume(worst)
    for subject in worst:
        for cure in seek(results, subject).found:
            changed = typed(project, cure.change)
            assert changed == cure.change.applied(project)
            rest = [structs.replace(one, segments=(), joints=()) for one in (changed, project)]
            assert rest[0] == rest[1]
            fresh = solve(changed)
            assert subject in cure.subjects
            own = [check for check in fresh.checks if subject_of(check) in cure.subjects]
            assert {subject_of(check) for check in own} == set(cure.subjects)
            assert all(check.status != "fail" for check in own)
            made = [check.utilisation for check in own if check.utilisation is not None]
            assert max(made) == cure.worst.utilisation
            told = {subject_of(check) for check in (*cure.fails_then, *cure.still_fails)}
            assert told == set(failing(fresh))
            assert math.isfinite(cure.worst.utilisation)
            assert cure_sentence(cure)


def test_many_that_fail_anyway_are_counted_and_new_ones_named():
    project = read_sample("tie_rod")
    weak = tuple(structs.replace(material, allowable_tension=9e7) for material in project.materials)
    results = solve(structs.replace(project, materials=weak), cases=False)
    subjects = failing(results)
    (cure,) = seek(results, Subject("stress", ("D",))).found
    assert len(cure.still_fails) == len(subjects) - 2
    assert cure_sentence(cure).endswith(f"; {len(subjects) - 2} others still do not pass")
    two = replace(cure, fails_then=cure.still_fails[:2], still_fails=())
    names = ", ".join(str(check.segment) for check in two.fails_then)
    assert cure_sentence(two).endswith(f"; then these do not pass: {names}")


def test_a_very_large_member_is_left_alone():
    results = solve(read_sample("tie_rod"), cases=False)
    assert is_small(results)
    assert not is_small(replace(results, checks=results.checks * 200))


def test_what_is_not_sought_is_said():
    assert unsought_sentence(8, 8, small=True) == ""
    assert unsought_sentence(9, 8, small=True) == "Cures are sought for the 8 worst only"
    assert unsought_sentence(1, 8, small=False) == "No cures are sought: the member has too many checks"


SEEKING = import_module("app.cures.seek")


class TestChecksThatAreLost:
    """What a change keeps from being made is said, be it waived or not."""

    def test_a_check_that_is_waived_from_then_on_counts(self):
        made = Check("stability", "Working", "pass", value=5.0, limit=4.0, utilisation=0.8)
        waived = Check("stability", "Working", "waived", reason="no_lateral")
        assert list(SEEKING._not_made_checks([waived], SEEKING._not_made([made]))) == [waived]
        assert list(SEEKING._not_made_checks([waived], SEEKING._not_made([waived]))) == []

    def test_two_ranges_of_fatigue_with_one_end_are_told_apart(self):
        first, other = (
            Check("fatigue", "Full", "not_made", segment="A", between=(start, "Full"))
            for start in ("Empty", "Cold")
        )
        assert list(SEEKING._not_made_checks([first, other], SEEKING._not_made([first]))) == [other]
