"""References without a window: names, and what has changed against one, by closed forms."""

from __future__ import annotations

import pytest
from msgspec.structs import replace as with_fields

from app.findings import Comparison, comparison
from app.findings.comparison import MOST, change_text
from app.references import Reference, References
from app.samples import read_sample
from app.units import SYSTEM_NAMES
from solver.model import AreaSection, Combination, FixedSupport, JointLoad
from solver.results import Results
from solver.solve import solve
from tests.members import STEEL, Part, case, member, waived

FORCE, LENGTH = 1e5, 2.0


def bar(area: float, *, force: float = FORCE, state: str = "Pull", allowable: bool = True) -> Results:
    """A bar held at its start and pulled at its end: u = F·L/(E·A), σ = F/A, reaction −F."""
    limits = {"allowable_tension": 2e8, "allowable_compression": 2e8} if allowable else {}
    part = Part(LENGTH, AreaSection(area=area), density=7850.0, **limits)
    load = case(on_joints=[JointLoad("1", force=force)])
    return solve(member([part], {0: FixedSupport()}, [load], [Combination(state, {"Load": 1.0})]))


def texts(changes) -> dict[str, str]:
    return {change.name: change.text for change in changes}


def against(old: Results, new: Results, system="mm-kN-MPa") -> Comparison:
    return comparison(Reference("Before 1", old), new, system)


# Names


def test_the_first_free_number_is_proposed():
    kept = References().kept_as("Before 2", bar(1e-3))
    assert kept.proposed == "Before 1"
    kept = kept.kept_as("", bar(1e-3))
    assert kept.names == ("Before 2", "Before 1"), "no name takes the proposed one"
    assert kept.proposed == "Before 3"


def test_an_equal_name_loses_nothing():
    first, second, third = (bar(area) for area in (1e-3, 2e-3, 3e-3))
    kept = References().kept_as(" As  built ", first).kept_as("As built", second).kept_as("As built", third)
    assert kept.names == ("As built", "As built (2)", "As built (3)")
    assert [reference.results for reference in kept.kept] == [first, second, third]
    assert kept.against.results is third


def test_forgetting_takes_the_chosen_one_alone_and_looks_at_none():
    kept = References().kept_as("A", bar(1e-3)).kept_as("B", bar(2e-3)).looking_at("A").without_chosen()
    assert kept.names == ("B",)
    assert kept.against is None


# Differences


def test_differences_are_those_of_the_closed_form():
    found = against(bar(1e-3), bar(0.5e-3))
    overall = texts(found.overall)
    assert FORCE / 1e-3 / 2e8 == 0.5
    assert overall["largest utilisation"] == "0.50 → 1.00 (+0.50)"
    assert overall["mass"] == "15.70 → 7.85 kg (−7.85)", "7850 kg/m³ on 2 m of 1000 mm²"
    moved = 1e3 * FORCE * LENGTH / STEEL / 1e-3
    assert texts(found.displacements) == {"joint 1, Pull": f"{moved:.3f} → {2 * moved:.3f} mm (+{moved:.3f})"}
    assert found.reactions == (), "it is −F whatever the area"
    assert found.notes == ()


def test_the_verdict_before_is_said_where_it_was_another():
    found = against(bar(0.4e-3), bar(1e-3))
    assert texts(found.overall)["verdict before"] == "Does not pass"
    assert "verdict before" not in texts(against(bar(1e-3), bar(2e-3)).overall)


def test_what_the_verdict_before_held_back_is_not_lost():
    found = against(solve(waived(bar(1e-3, force=-FORCE).project)), bar(1e-3))
    assert [(change.name, change.text) for change in found.overall][:2] == [
        ("verdict before", "Passes"),
        ("", "stability waived"),
    ]


def test_a_check_that_was_not_made_has_no_difference_and_is_counted():
    overall = texts(against(bar(1e-3, allowable=False), bar(1e-3)).overall)
    assert overall["largest utilisation"] == "none checked → 0.50"
    assert overall["checks not made"] == "1 → 0"
    assert "verdict before" in overall


def test_what_is_the_same_to_the_tolerance_is_unchanged():
    found = against(bar(1e-3), bar(1e-3, force=FORCE * (1 + 1e-11)))
    assert texts(found.overall)["largest utilisation"] == "0.50, unchanged"
    assert texts(found.overall)["mass"] == "15.70 kg, unchanged"
    assert found.displacements == found.reactions == ()


def test_a_small_difference_is_not_rounded_away():
    assert change_text(100.0, 100.001, "force", "mm-N-MPa") == "100.0 → 100.0 N (+0.0010)"
    assert change_text(-2.0, 3.0, "displacement", "m-kN-MPa") == "−2000 → 3000 mm (+5000)"
    assert change_text(1e-12, 3e-12, "displacement", "mm-N-MPa") == "1.000·10⁻⁹ → 3.000·10⁻⁹ mm (+2.0·10⁻⁹)"


def test_a_state_of_another_name_is_not_held_against_this_one():
    found = against(bar(1e-3, state="Old"), bar(1e-3, force=2 * FORCE))
    assert found.displacements == found.reactions == ()
    assert texts(found.notes)["not compared"] == "2 states"


def test_joints_are_matched_by_mark_though_the_member_grew():
    """Joint 1 of the reference stands where the new first segment ends; its mark is gone."""
    part = Part(LENGTH, AreaSection(area=1e-3))
    load, pull = case(on_joints=[JointLoad("2", force=FORCE)]), [Combination("Pull", {"Load": 1.0})]
    project = member([part, part], {0: FixedSupport()}, [load], pull)
    marks = [with_fields(joint, mark=mark) for joint, mark in zip(project.joints, "0x1", strict=True)]
    ends = (case(on_joints=[JointLoad("1", force=FORCE)]),)
    grown = with_fields(project, joints=tuple(marks), load_cases=ends)
    found = against(bar(1e-3, allowable=False), solve(grown))
    moved = 1e3 * FORCE * LENGTH / STEEL / 1e-3
    assert texts(found.displacements) == {"joint 1, Pull": f"{moved:.3f} → {2 * moved:.3f} mm (+{moved:.3f})"}
    assert texts(found.overall)["length"] == "2000 → 4000 mm (+2000)"
    assert [note.text for note in found.notes] == ["1 joint"]


def test_a_support_that_only_one_of_them_has_is_said():
    old = bar(1e-3)
    free = with_fields(old.project.joints[1], support=FixedSupport())
    held = solve(with_fields(old.project, joints=(old.project.joints[0], free)))
    found = against(old, held)
    assert texts(found.reactions) == {"joint 0, Pull": "−100.0 → 0.0 kN (+100.0)"}
    assert [note.text for note in found.notes] == ["1 reaction"]


@pytest.mark.parametrize("system", SYSTEM_NAMES)
def test_the_largest_few_of_a_sample_in_every_unit_system(system):
    rod = read_sample("tie_rod")
    thread = with_fields(rod.segments[3], section=AreaSection(area=976e-6))
    new = solve(with_fields(rod, segments=(*rod.segments[:3], thread, *rod.segments[4:])))
    old = solve(rod)
    found = against(old, new, system)
    assert len(found.displacements) == MOST
    change = new.solution.joint_displacement[:3] - old.solution.joint_displacement[:3]
    state, joint = divmod(int(abs(change).argmax()), change.shape[1])
    name = f"joint {rod.joints[joint].mark}, {old.states[state].name}"
    assert found.displacements[0].name == name
    unit = "in" if system.startswith("in") else "mm"
    assert all(f" {unit} (" in item.text for item in found.displacements)
