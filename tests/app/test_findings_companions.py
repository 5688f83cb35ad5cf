"""What is found of companions: forces, what has parted, the clamp force that is left, their own checks."""

from __future__ import annotations

import pytest
from msgspec.structs import replace

from app import edits
from app.cures import failing, seek
from app.findings import comparison, findings, findings_in
from app.findings.cells import cell_of_finding
from app.hand.cells import Cell
from app.references import Reference
from app.terminal import report
from solver.model import JointLoad, Lateral, LoadCase
from solver.solve import solve
from tests.sleeves import draw_bolt, overpulled

UNITS = "mm-N-MPa"


def test_the_least_clamp_force_is_told_with_its_combination():
    (found,) = findings(solve(draw_bolt()), UNITS).companions
    assert (found.mark, found.clamp_state, found.parts) == ("S", "Pulled", False)
    assert found.clamp == pytest.approx(42456.8, abs=0.1)
    assert found.sentence == "Companion S: least clamp force 42 457 N, Pulled".replace(" 457", "\u202f457")
    assert [(s.name, s.separated) for s in found.states] == [("Tight", False), ("Pulled", False)]


def test_one_that_separates_says_where_by_how_much_and_when():
    (found,) = findings(solve(overpulled()), UNITS).companions
    assert found.parts
    assert found.clamp == 0.0
    assert found.sentence.startswith("Companion S separates at joint 2: no clamp force, gap 0.")
    assert found.sentence.endswith("mm, Apart")
    assert found.states[2].text.startswith("separated, gap 0.")


def test_a_rope_goes_slack_and_one_that_is_tied_has_no_clamp_force():
    rope = edits.set_value(draw_bolt("tension"), ("load_cases", 0, "segment_loads"), ())
    (found,) = findings(solve(rope), UNITS).companions
    assert found.sentence.startswith("Companion S: least tension 0")
    (slack,) = findings(solve(draw_bolt("tension")), UNITS).companions
    assert slack.sentence.startswith("Companion S is slack: no force, gap 0.")
    (tied,) = findings(solve(draw_bolt("both")), UNITS).companions
    assert (tied.sentence, tied.clamp) == ("", None)


def test_stresses_of_their_segments_are_checked_by_their_marks():
    found = findings(solve(draw_bolt()), UNITS)
    beside = {item.mark: item for item in found.segments if item.beside}
    assert set(beside) == {"Sa", "Sb"}
    assert beside["Sb"].segment == 1
    assert beside["Sb"].band.compression == pytest.approx(-1.2e8)
    assert beside["Sb"].band.low == pytest.approx(-60.23e6, rel=1e-3)
    assert cell_of_finding(beside["Sb"].subject, draw_bolt()) == Cell("companions", 1, "section")
    tight = findings_in(found, solve(draw_bolt()), "Tight", UNITS)
    assert {item.state for item in tight.segments} == {"Tight"}


def test_a_missing_allowable_of_theirs_is_not_passed_over():
    bare = edits.set_value(draw_bolt(), ("materials", 1, "allowable_compression"), _unset())
    (missing, *_) = findings(solve(bare), UNITS).not_made
    assert (missing.material, missing.marks, missing.companions) == ("Brass", ("Sb",), (1,))


def _unset() -> object:
    from msgspec import UNSET

    return UNSET


def test_the_terminal_prints_forces_and_what_is_left():
    project = overpulled()
    said = report(project, solve(project), "bolt.json")
    assert "Force in companions" in said
    assert "separated, gap" in said
    assert "Companion S separates at joint 2" in said
    assert any(line.startswith("Sa ") for line in said.splitlines())


def test_a_cure_for_a_sleeve_changes_the_sleeve():
    weak = edits.set_value(draw_bolt(), ("materials", 1, "allowable_compression"), 5e7)
    results = solve(weak)
    (subject,) = failing(results)
    assert subject.marks == ("Sb",)
    cures = seek(results, subject)
    (place,) = cures.found[0].change.places
    assert place == ("companions", 0, "segments", 1, "section")
    cured = solve(cures.found[0].change.applied(weak))
    assert {c.status for c in cured.checks if c.segment == "Sb"} == {"pass"}


def test_reactions_that_are_rounding_alone_read_as_none():
    (book, *_) = findings(solve(draw_bolt()), UNITS).books
    assert book.reactions_text == "0 N"
    assert book.residual_text == "0 N"


def test_what_heats_nothing_in_a_companion_is_said():
    cold = edits.set_value(draw_bolt(), ("materials", 0, "expansion"), 0.0)
    assert any("Sa" in note for note in findings(solve(cold), UNITS).notes)


def test_what_is_left_of_a_clamping_is_held_against_a_reference():
    turned = edits.set_value(draw_bolt(), ("load_cases", 0, "segment_loads", 0, "lack_of_fit"), 0.0004)
    compared = comparison(Reference("before", solve(draw_bolt())), solve(turned), UNITS)
    (change,) = [one for one in compared.overall if "clamp" in one.name]
    assert change.name == "least clamp force of S"
    assert change.text.startswith("42\u202f457 → 60\u202f0")


def test_what_companions_are_for_stability_is_said_where_there_is_a_factor():
    said = "For stability companions neither brace nor load the member"
    held = tuple(replace(j, lateral=Lateral(translation="fixed")) for j in draw_bolt().joints)
    push = LoadCase("Push", joint_loads=(JointLoad("3", force=-1e3),))
    pushed = replace(draw_bolt(), joints=held, load_cases=(push,), combinations=())
    results = solve(pushed)
    assert results.stability[0].critical_factor is not None
    assert said in findings(results, UNITS).notes
    assert said not in findings(solve(draw_bolt()), UNITS).notes
