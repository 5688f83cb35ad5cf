"""What stops do, in findings, terminal and calc sheet, against a heated bar done by hand.

A bar of 1 m and 1000 mm² grows freely by α ΔT L = 0.48 mm in Hot and by 0.096 mm in Cold. Against a stop
after 0.2 mm it is pressed with E A / L · 0.28 mm = 58.8 kN in Hot, and has 0.104 mm left in Cold.
"""

from __future__ import annotations

import pytest
from msgspec.structs import replace

from app import edits
from app.contacts import has_stops, stop_states
from app.cures.changes import spring_knobs
from app.findings import comparison, findings, findings_in
from app.findings.cells import cell_of_finding
from app.hand.cells import Cell
from app.phrases.contacts import contact_texts
from app.references import Reference
from app.results_file import results_json
from app.sheet.contacts import contact_blocks, stop_assumptions
from app.sheet.readings import Readings
from app.terminal import report
from solver.model import Combination, FixedSupport, Project, SegmentLoad, SpringSupport, StopSupport
from solver.solve import solve
from tests.members import Part, area, case, member

MM = "mm-kN-MPa"
STOP = StopSupport(side="plus", clearance=2e-4)
BACK = StopSupport(side="minus", clearance=1e-4)
SPRING = SpringSupport(stiffness=1e7)


def bar(*supports, loads=40.0) -> Project:
    warm = case("Warm", on_segments=[SegmentLoad("A", temperature_start=loads)])
    states = Combination("Hot", {"Warm": 1.0}), Combination("Cold", {"Warm": 0.2})
    made = member([Part(1.0, area(1e-3), expansion=1.2e-5)], {0: FixedSupport()}, [warm], states)
    made = edits.set_value(made, ("display", "units"), MM)
    return edits.hold_joint(made, 1, supports)


def rows_of(project: Project) -> dict[str, list[str]]:
    """The rows of the terminal's report by their first cell, without narrow spaces."""
    text = report(project, solve(project, cases=False), "file.json").replace("\u202f", "")
    cells = (line.split("  ") for line in text.split("\n"))
    return {name: [cell.strip() for cell in rest if cell.strip()] for name, *rest in cells}


def test_a_stop_is_closed_with_its_force_or_open_with_what_is_left():
    results = solve(bar(STOP, BACK))
    hot, cold = stop_states(results, 0), stop_states(results, 1)
    assert [(s.closed, s.number, s.alone) for s in hot] == [(True, 0, False), (False, 1, False)]
    assert hot[0].push == pytest.approx(58.8e3, rel=1e-9)
    assert hot[1].left == pytest.approx(1e-4 + 2e-4, rel=1e-9)
    assert [s.left for s in cold] == pytest.approx([1.04e-4, 1.96e-4], rel=1e-9)
    assert contact_texts(results, 0)[0] == ""
    assert not has_stops(bar(SPRING))


class TestFindings:
    def test_one_sentence_says_all_combinations_the_largest_force_first(self):
        found = findings(solve(bar(STOP)), MM)
        (contact,) = found.contacts
        words = "Joint 1, stop + 0.2 mm: closed in Hot (58.80 kN); open in Cold (0.1040 mm left)"
        assert contact.sentence == words
        assert any("do not add up" in note for note in found.notes)
        assert cell_of_finding(Cell("joints", contact.joint, "support"), bar(STOP)) is not None

    def test_the_largest_force_and_the_least_left_come_first(self):
        project = bar(STOP)
        more = [Combination(name, {"Warm": share}) for name, share in (("Hotter", 1.5), ("Tepid", 0.3))]
        found = findings(solve(replace(project, combinations=(*project.combinations, *more))), MM)
        words = found.contacts[0].sentence
        order = [words.index(name) for name in ("Hotter (", "Hot (", "Tepid (", "Cold (")]
        assert order == sorted(order)

    def test_of_one_combination_alone(self):
        results = solve(bar(STOP, BACK))
        found = findings_in(findings(results, MM), results, "Cold", MM)
        assert len(found.contacts) == 2
        assert all(": open in Cold (" in item.sentence for item in found.contacts)
        assert not any("Hot" in item.sentence for item in found.contacts)

    def test_without_stops_nothing_is_said(self):
        found = findings(solve(bar(SPRING)), MM)
        assert found.contacts == ()
        assert not any("do not add up" in note for note in found.notes)
        assert all(reaction.parts == () for book in found.books for reaction in book.reactions)

    def test_the_supports_of_a_joint_add_up_to_its_reaction(self):
        found = findings(solve(bar(SPRING, STOP)), MM)
        hot = found.books[0].reactions[1]
        spring = 1e7 * 2e-4  # the joint has gone 0.2 mm
        assert hot.value == pytest.approx(-58.8e3, rel=1e-9)
        assert hot.text == "−58.80 kN"
        assert [part.text for part in hot.parts] == [f"−{spring / 1e3:.2f} kN", "closed, −56.80 kN"]
        assert found.books[0].residual == pytest.approx(0.0, abs=1e-6)

    def test_against_a_reference_joints_are_compared_as_always(self):
        then, now = solve(bar(STOP)), solve(bar(replace(STOP, clearance=3e-4)))
        compared = comparison(Reference("before", then), now, MM)
        assert {change.text for change in compared.reactions} == {
            "58.80 → 37.80 kN (−21.00)",
            "−58.80 → −37.80 kN (+21.00)",
        }


def test_a_cure_turns_the_one_spring_beside_a_stop_and_leaves_the_stop():
    project = bar(STOP, SPRING)
    changed = spring_knobs(project, 1)[0].change(2e7).applied(project)
    assert changed.joints[1].supports == (STOP, SpringSupport(stiffness=2e7))
    assert spring_knobs(bar(SPRING, SPRING), 1) == ()


def test_the_terminal_says_it_combination_by_combination():
    rows = rows_of(bar(STOP))
    assert rows["Joint 1"] == ["−58.80 kN", "0 kN"]
    assert rows["Joint 1, stop + 0.2 mm"] == ["closed, −58.80 kN", "open, 0.1040 mm left"]
    assert rows["Sum"] == ["0.00 kN", "0 kN"]


class TestSheet:
    def test_every_support_has_its_row(self):
        results = solve(bar(SPRING, STOP))
        (table,) = contact_blocks(results, 0, Readings(MM))
        assert table["rows"] == [
            ["1", "spring, 10 kN/mm", "–", "−2.0000", "–"],
            ["1", "stop against +x, clearance 0.2 mm, rigid", "closed", "−56.800", "–"],
        ]
        (cold,) = contact_blocks(solve(bar(STOP)), 1, Readings(MM))
        assert cold["rows"][0][2:] == ["open", "0", "0.10400"]

    def test_superposition_is_named_as_not_valid_only_with_stops(self):
        assert any("superposition is not valid" in line for line in stop_assumptions(bar(STOP)))
        assert stop_assumptions(bar(SPRING)) == []
        assert list(contact_blocks(solve(bar(SPRING)), 0, Readings(MM))) == []


def test_the_results_file_has_contact_and_what_is_left():
    alone = results_json(solve(bar(STOP)))["combinations"]
    assert alone[0]["joints"][1]["contact"] == "closed"
    assert alone[1]["joints"][1]["clearance"] == pytest.approx(1.04e-4)
    several = results_json(solve(bar(SPRING, STOP)))["combinations"][0]["joints"][1]
    assert several["contact"] == [None, "closed"]
    assert "contact" not in results_json(solve(bar(SPRING)))["combinations"][0]["joints"][1]
