"""Shoulders and fatigue from results to words: findings, terminal, results file, marks, drawing, edits."""

from __future__ import annotations

import pytest
from msgspec import UNSET, UnsetType
from msgspec.structs import replace

from app import edits
from app.drawing.member import Member
from app.drawing.shapes import Part as Shape
from app.drawing.tips import tip
from app.edits import EditError
from app.findings import findings, findings_in
from app.findings.cells import cell_of_finding
from app.findings.subjects import Subject
from app.hand.cells import Cell
from app.phrases import check_sentence, verdict_detail
from app.point_marks import point_marks
from app.results_file import results_json
from app.shown import Shown
from app.terminal import report
from solver.model import Companion, CompanionSegment, Endurance, FatigueRange, Project, Shoulder
from solver.shoulders import Step
from solver.solve import solve
from tests.shouldered import FILLET, spindle, with_shoulders, without_strength

MM = "mm-N-MPa"
SPINDLE = spindle()
RESULTS = solve(SPINDLE)
KT = Step(0.05, 0.04, 0.002).factor


def sentences(results):
    return [finding.sentence for finding in findings(results, MM).limits]


def test_findings_say_peaks_and_fatigue():
    found = sentences(RESULTS)
    assert "Joint 1: peak 182 of 300 MPa, Kt 2.08, 0.61, Pulling" in found
    assert found[0] == (
        "Joint 1: fatigue, amplitude 141 of 140 MPa and mean 41.4 of 600 MPa, 1.07, Pulling to Pushing"
    )
    assert any(s.startswith("C: fatigue, amplitude 77.3 of 140 MPa") and "at 550 mm" in s for s in found)
    assert verdict_detail(RESULTS) == (
        "Largest utilisation 1.07: fatigue at joint 1, Pulling to Pushing. 2 of 16 checks fail, 1 waived"
    )


def test_a_compressive_mean_is_said_not_to_count():
    turned = replace(
        SPINDLE,
        combinations=tuple(
            replace(c, factors={"Push": factor})
            for c, factor in zip(SPINDLE.combinations, (0, 1), strict=True)
        ),
    )
    assert any("mean −49.7 MPa not counted" in s for s in sentences(solve(turned)))


def test_segments_keep_one_finding_of_stress_and_one_of_fatigue():
    found = findings(RESULTS, MM)
    assert [f.mark for f in found.segments] == ["C", "B", "A"]
    kinds = [f.subject.kind for f in found.limits]
    assert (kinds.count("fatigue"), kinds.count("fatigue_joint"), kinds.count("peak")) == (3, 2, 2)
    cells = {f.subject.kind: cell_of_finding(f.subject, SPINDLE) for f in found.limits}
    assert cells["peak"].column == cells["fatigue_joint"].column == "shoulder"
    assert cells["fatigue"].column == "section"
    pulling = findings_in(found, RESULTS, "Pushing", MM)
    assert {f.subject.kind for f in pulling.limits} == {"peak", "fatigue", "fatigue_joint"}


def test_what_lacks_a_number_is_listed_with_what_to_enter():
    bare = without_strength(SPINDLE)
    results = solve(bare)
    assert results.verdict == "incomplete"
    missing = findings(results, MM).not_made
    first = next(m for m in missing if m.reason == "no_allowable_peak")
    assert first.sentence == (
        "Not checked: peak stress at joint 1 (Pulling, Pushing): the material has no allowable peak stress"
    )
    assert first.remedy == "enter an allowable peak stress for of B"
    assert cell_of_finding(first, bare) == Cell("materials", 1, "allowable_peak")
    endured = next(m for m in missing if m.reason == "no_endurance" and m.segments)
    assert cell_of_finding(endured, bare) == Cell("materials", 0, "endured_amplitude")


@pytest.mark.parametrize(
    ("shoulder", "joint", "words"),
    [
        (
            Shoulder(fillet_radius=0.0002),
            1,
            "25 times as high as the fillet radius, the fit holds for 0.1",
        ),
        (FILLET, 2, "between two solid round sections only"),
        (FILLET, 3, "at an end of the member there is no step"),
    ],
)
def test_why_there_is_no_factor_is_said_with_its_value(shoulder, joint, words):
    project = with_shoulders(SPINDLE, {joint: shoulder})
    results = solve(project)
    missing = findings(results, MM).not_made
    assert {m.sentence.split(" (")[0] for m in missing} == {
        f"Not checked: peak stress at joint {joint}",
        f"Not checked: fatigue at joint {joint}",
    }
    assert all(words in m.sentence for m in missing)
    assert all(cell_of_finding(m, project) == Cell("joints", joint, "shoulder") for m in missing)
    checks = [c for c in results_json(results)["checks"] if c["status"] == "not_made"]
    assert all(words in c["reason"] for c in checks)
    assert words in check_sentence(next(c for c in results.checks if c.reason), MM)


def test_the_terminal_has_a_table_of_fatigue():
    text = report(SPINDLE, RESULTS, "spindle.barwright.json")
    assert "Joint 1: peak stress      0.61     0.33" in text
    assert "Utilisation by fatigue  Pulling to Pushing" in text
    assert "Joint 1: fatigue                      1.07" in text


def test_the_results_file_has_what_the_checks_are_made_of():
    checks = results_json(RESULTS)["checks"]
    peak = next(c for c in checks if c["check"] == "peak")
    assert (peak["joint"], peak["segment"], peak["combination"]) == ("1", "B", "Pulling")
    assert peak["value"] == pytest.approx(peak["factor"] * peak["nominal"])
    swing = [c for c in checks if c["check"] == "fatigue"][-1]
    assert (swing["from"], swing["to"], swing["joint"]) == ("Pulling", "Pushing", "2")
    assert "combination" not in swing
    assert swing["utilisation"] == pytest.approx(
        swing["amplitude"] / swing["limit"] + swing["mean"] / swing["ultimate"]
    )
    assert swing["amplitude"] == pytest.approx(0.9 * abs(swing["nominal"] - swing["nominal_to"]))


def sleeved(endurance: Endurance | UnsetType) -> Project:
    """The spindle with a sleeve over its first segment, of a material of its own."""
    soft = replace(SPINDLE.materials[0], name="Soft", endurance=endurance)
    sleeve = CompanionSegment("S", 0.3, "Soft", SPINDLE.segments[0].section)
    companions = (Companion(mark="K", start="0", end="1", segments=(sleeve,)),)
    return replace(SPINDLE, materials=(*SPINDLE.materials, soft), companions=companions)


def test_fatigue_of_a_companion_is_found_told_and_written_by_its_segment():
    project = sleeved(Endurance(amplitude=20e6, ultimate=600e6))
    results = solve(project)
    (check,) = (c for c in results.checks if c.segment == "S" and c.check == "fatigue")
    assert check.status == "fail"
    assert verdict_detail(results).startswith("Largest utilisation 1.09: fatigue in segment S, Pulling to")
    found = next(f for f in findings(results, MM).limits if f.subject == Subject("fatigue", ("S",)))
    assert (found.segments, found.joints, found.companions) == ((), (), (0,))
    assert found.sentence.startswith("S: fatigue, amplitude 21.6 of 20 MPa and mean ")
    assert cell_of_finding(found.subject, project) == Cell("companions", 0, "section")
    lines = report(project, results, "spindle.barwright.json").splitlines()
    assert ["S:", "fatigue", "1.09"] in [line.split() for line in lines]
    (written,) = (c for c in results_json(results)["checks"] if c.get("segment") == "S" and "from" in c)
    assert (written["from"], written["to"], written["status"]) == ("Pulling", "Pushing", "fail")


def test_the_strips_of_the_member_mark_no_fatigue_of_companions():
    results = solve(sleeved(Endurance(amplitude=20e6, ultimate=600e6)))
    worst = {c.segment: c.utilisation for c in results.checks if c.check == "fatigue" and c.joint is None}
    assert max(worst, key=worst.get) == "S"
    marks = point_marks(results, (0, 1), "utilisation")
    plain = max(value for mark, value in worst.items() if mark != "S")
    assert any(mark.value == plain for mark in marks)
    assert all(mark.value != worst["S"] for mark in marks)


def test_without_endurance_fatigue_of_a_companion_is_listed_as_not_checked():
    project = sleeved(UNSET)
    results = solve(project)
    (missing,) = findings(results, MM).not_made
    assert (missing.marks, missing.companions) == (("S",), (0,))
    assert missing.remedy == "enter endured amplitude and ultimate stress for Soft"
    assert cell_of_finding(missing, project) == Cell("materials", 3, "endured_amplitude")


# --- marks in the strips ---


def texts(marks):
    return [mark.text for mark in marks]


def test_marks_of_one_state_and_of_all():
    pulling, pushing = (RESULTS.state_index(name) for name in ("Pulling", "Pushing"))
    assert texts(point_marks(RESULTS, (pushing,), "stress")) == ["peak −99.4", "peak −98.2"]
    assert texts(point_marks(RESULTS, (pulling, pushing), "stress")) == [
        "peak 182",
        "peak 180",
        "peak −99.4",
        "peak −98.2",
    ]
    used = point_marks(RESULTS, (pushing,), "utilisation")
    assert texts(used) == ["fatigue 1.07", "fatigue 1.06", "fatigue 0.59", "peak 0.33", "peak 0.33"]
    assert [mark.over for mark in used] == [True, True, False, False, False]
    assert point_marks(RESULTS, (pulling,), "force") == ()


def test_a_state_that_is_not_checked_has_no_marks():
    alike = solve(edits.rename_case(SPINDLE, "Pull", "Pulling"))  # called as a combination is
    case = alike.state_index("Pulling", "case")
    assert point_marks(alike, (case,), "stress") == point_marks(alike, (case,), "utilisation") == ()


# --- drawing ---


def test_the_tip_says_what_was_entered_and_the_factor():
    drawn = Member.of(SPINDLE, Shown("combination", "Pulling"))
    assert "r 2 mm, Kt 2.08" in tip(drawn, Shape("joint", 1))
    assert "Kt 1.8" in tip(drawn, Shape("shoulder", 2))
    sharp = with_shoulders(SPINDLE, {1: Shoulder(fillet_radius=1e-4)})
    assert "r 0.1 mm, no Kt" in tip(Member.of(sharp, Shown("envelope")), Shape("joint", 1))


# --- edits ---


def shoulders(project):
    return {joint.mark: joint.shoulder for joint in project.joints if joint.shoulder}


def test_combinations_are_renamed_in_ranges_and_take_them_along_when_deleted():
    renamed = edits.rename_combination(SPINDLE, "Pulling", "Feed")
    assert renamed.fatigue == (FatigueRange("Feed", "Pushing"),)
    again = edits.set_value(renamed, ("combinations", 1, "name"), "Return")
    assert again.fatigue == (FatigueRange("Feed", "Return"),)
    assert edits.remove_combinations(SPINDLE, (1,)).fatigue == ()
    more = edits.add_record(SPINDLE, ("combinations",), {"name": "Idle"})
    assert edits.remove_combinations(more, (2,)).fatigue == SPINDLE.fatigue


def test_joining_over_a_shoulder_is_refused():
    with pytest.raises(EditError) as caught:
        edits.join_segments(SPINDLE, 0, 1)
    faults = [(fault.rule, fault.facts) for fault in caught.value.faults]
    assert ("joint_carries", {"joint": "1", "kind": "shoulder"}) in faults


def test_edits_of_the_chain_keep_shoulders_at_their_joints():
    turned = edits.reverse_member(SPINDLE)
    assert shoulders(turned) == shoulders(SPINDLE)
    assert edits.reverse_member(turned) == SPINDLE
    assert shoulders(edits.split_segment(SPINDLE, 1, 0.1)) == shoulders(SPINDLE)
    assert shoulders(edits.rename_joint(SPINDLE, "1", "step")) == {
        "step": SPINDLE.joints[1].shoulder,
        "2": SPINDLE.joints[2].shoulder,
    }
    mirrored = edits.mirror_member(SPINDLE)
    assert [bool(joint.shoulder) for joint in mirrored.joints] == [
        False,
        True,
        True,
        False,
        True,
        True,
        False,
    ]
    repeated = edits.repeat_segments(SPINDLE, 0, 2, 1)
    assert [bool(joint.shoulder) for joint in repeated.joints] == [
        False,
        True,
        True,
        False,
        True,
        True,
        False,
    ]


def test_a_reversed_member_has_the_same_peaks():
    own, turned = (
        [(c.joint, c.segment, c.factor, c.value) for c in solve(p).checks if c.check == "peak"]
        for p in (SPINDLE, edits.reverse_member(SPINDLE))
    )
    assert [(j, s, f) for j, s, f, _ in sorted(own)] == [(j, s, f) for j, s, f, _ in sorted(turned)]
    assert [v for *_, v in sorted(own)] == pytest.approx([v for *_, v in sorted(turned)])
