"""Records together: marks, references, counts, bores; and what keeps a member from being solved."""

from __future__ import annotations

from typing import Any

import pytest
from hypothesis import given
from msgspec import UNSET, structs

from app.project_file import parse
from solver.faults import place_text
from solver.model import FixedSupport, JointLoad, Project, SpringSupport, StopSupport
from solver.nearest import nearest
from solver.validation import faults, unsolvable
from tests.documents import changed, encoded, example, faults_of
from tests.members import Part, area, case, member
from tests.strategies import full_projects, projects


@given(projects())
def test_a_well_formed_project_has_no_fault(project: Project) -> None:
    assert faults(project) == ()
    assert unsolvable(project) == ()


@given(full_projects())
def test_every_record_of_a_file_can_be_well_formed(project: Project) -> None:
    assert faults(project) == ()


def added(*place: Any, record: Any) -> Any:
    document = example()
    records: Any = document
    for step in place:
        records = records[step]
    records.append(record)
    return document


STEEL = {"name": "Steel", "modulus": 1.0}
SEGMENT = {"mark": "C", "length": 1.0, "material": "Steel", "section": {"shape": "area", "area": 1.0}}

TOGETHER: list[tuple[Any, str, str, dict[str, Any]]] = [
    (changed("segments", []) | {"load_cases": [], "combinations": []}, "segments", "too_few_segments", {}),
    (added("joints", record={"mark": "3"}), "joints", "joint_count", {"joints": 4, "segments": 2}),
    (added("segments", record=SEGMENT), "joints", "joint_count", {"joints": 3, "segments": 3}),
    (added("materials", record=STEEL), "materials[1].name", "duplicate_mark", {"first": "materials[0].name"}),
    (changed("joints", 2, "mark", "1") | {"limits": {}}, "joints[2].mark", "duplicate_mark", {"value": "1"}),
    (
        changed("segments", 1, "mark", "A"),
        "segments[1].mark",
        "duplicate_mark",
        {"first": "segments[0].mark"},
    ),
    (added("load_cases", record={"name": "Dead"}), "load_cases[2].name", "duplicate_mark", {"value": "Dead"}),
    (added("combinations", record={"name": "Idle"}), "combinations[2].name", "duplicate_mark", {}),
    (
        changed("segments", 0, "material", "steel "),
        "segments[0].material",
        "unknown_reference",
        {"kind": "material", "value": "steel ", "nearest": "Steel"},
    ),
    (
        added("load_cases", 0, "segment_loads", record={"segment": "a"}),
        "load_cases[0].segment_loads[0].segment",
        "unknown_reference",
        {"kind": "segment", "nearest": "A"},
    ),
    (
        added("load_cases", 0, "joint_loads", record={"joint": "9"}),
        "load_cases[0].joint_loads[0].joint",
        "unknown_reference",
        {"kind": "joint", "nearest": None},
    ),
    (
        changed("combinations", 0, "factors", {"Dead": 1.0, "Servce": 1.0}),
        "combinations[0].factors.Servce",
        "unknown_reference",
        {"kind": "load case", "nearest": "Service"},
    ),
    (
        changed("combinations", 0, "factors", {"Dead load": 1.0}),
        'combinations[0].factors["Dead load"]',
        "unknown_reference",
        {},
    ),
    (
        changed("limits", "displacement", 0, "joint", "9"),
        "limits.displacement[0].joint",
        "unknown_reference",
        {},
    ),
    (changed("limits", "relative", 0, "from", "9"), "limits.relative[0].from", "unknown_reference", {}),
    (changed("limits", "relative", 0, "to", "9"), "limits.relative[0].to", "unknown_reference", {}),
    (changed("limits", "reaction", 0, "joint", "9"), "limits.reaction[0].joint", "unknown_reference", {}),
    (
        added("limits", "reaction", record={"joint": "0", "limit": 1.0}),
        "limits.reaction[1].joint",
        "duplicate_limit",
        {"joint": "0", "first": "limits.reaction[0].joint"},
    ),
    (
        added("limits", "displacement", record={"joint": "2", "limit": 1.0}),
        "limits.displacement[1].joint",
        "duplicate_limit",
        {},
    ),
    (changed("limits", "relative", 0, "to", "0"), "limits.relative[0].to", "same_joint", {"joint": "0"}),
    (
        changed("segments", 1, "section", {"shape": "area", "area": 1.0, "second_moment_end": 1.0}),
        "segments[1].section",
        "missing_key",
        {"key": "second_moment"},
    ),
]


@pytest.mark.parametrize(("document", "place", "rule", "facts"), TOGETHER)
def test_a_fault_of_records_together(document: Any, place: str, rule: str, facts: dict[str, Any]) -> None:
    (fault,) = faults_of(document)
    assert (fault.place, fault.rule) == (place, rule)
    assert facts.items() <= fault.facts.items()


@pytest.mark.parametrize(
    ("tube", "places"),
    [
        ({"outer": 0.04, "inner": 0.04}, ["inner"]),
        ({"outer": 0.04, "inner": 0.05}, ["inner"]),
        ({"outer": 0.04, "inner": 0.0}, []),
        ({"outer": 0.04, "inner": 0.02, "inner_end": 0.04}, ["inner_end"]),
        ({"outer": 0.04, "inner": 0.02, "outer_end": 0.02}, ["outer_end"]),
        ({"outer": 0.04, "outer_end": 0.03, "inner": 0.02, "inner_end": 0.03}, ["inner_end"]),
        ({"outer": 0.04, "outer_end": 0.03, "inner": 0.05, "inner_end": 0.03}, ["inner", "inner_end"]),
        ({"outer": 0.03, "outer_end": 0.05, "inner": 0.02, "inner_end": 0.04}, []),
    ],
)
def test_the_bore_is_below_the_outside_at_both_ends(tube: dict[str, float], places: list[str]) -> None:
    found = faults_of(changed("segments", 0, "section", {"shape": "tube", **tube}))
    assert [fault.rule for fault in found] == ["inner_not_below_outer"] * len(places)
    assert [fault.place for fault in found] == [f"segments[0].section.{place}" for place in places]


BAR = [Part(1.0, area(1e-3)), Part(1.0, area(1e-3))]


@pytest.mark.parametrize("support", [FixedSupport(), SpringSupport(stiffness=1.0)])
@pytest.mark.parametrize("joint", [0, 1, 2])
def test_one_support_anywhere_holds(support: Any, joint: int) -> None:
    assert unsolvable(member(BAR, {joint: support})) == ()


def test_bedding_alone_holds() -> None:
    assert unsolvable(member([Part(1.0, area(1e-3), bedding=1.0)], {})) == ()
    assert unsolvable(member([Part(1.0, area(1e-3), bedding=0.0, bedding_end=1.0)], {})) == ()


def test_a_bedding_of_nothing_does_not_hold() -> None:
    (fault,) = unsolvable(member([Part(1.0, area(1e-3), bedding=0.0, bedding_end=0.0)], {}))
    assert (fault.place, fault.rule) == ("joints", "not_held")


def test_a_stop_counts_as_holding_for_that_depends_on_the_loads() -> None:
    assert unsolvable(member(BAR, {1: StopSupport(side="plus", clearance=0.0)})) == ()


def test_a_movement_needs_a_support_at_its_joint() -> None:
    loads = [JointLoad("0", movement=0.001), JointLoad("1", movement=0.0), JointLoad("2", movement=0.002)]
    (fault,) = unsolvable(member(BAR, {0: FixedSupport()}, [case("Settlement", on_joints=loads)]))
    assert fault.place == "load_cases[0].joint_loads[2].movement"
    assert (fault.rule, fault.facts) == ("movement_without_support", {"joint": "2", "case": "Settlement"})


def test_an_unfinished_member_is_well_formed() -> None:
    project = parse(encoded(example() | {"segments": [SEGMENT | {"mark": "A"}, SEGMENT | {"mark": "B"}]}))
    free = structs.replace(project, joints=tuple(structs.replace(j, support=UNSET) for j in project.joints))
    assert faults(free) == ()
    assert {fault.rule for fault in unsolvable(free)} == {"not_held", "movement_without_support"}


@pytest.mark.parametrize(
    ("place", "text"),
    [
        ((), ""),
        (("title",), "title"),
        (("segments", 2, "section", "diameter"), "segments[2].section.diameter"),
        (("limits", "relative", 0, "from"), "limits.relative[0].from"),
        (("combinations", 0, "factors", "Last €"), 'combinations[0].factors["Last €"]'),
        (("combinations", 0, "factors", "größte"), "combinations[0].factors.größte"),
        (("combinations", 0, "factors", 'a"b'), 'combinations[0].factors["a\\"b"]'),
        (("combinations", 0, "factors", ""), 'combinations[0].factors[""]'),
    ],
)
def test_a_place_reads_as_a_path(place: tuple[Any, ...], text: str) -> None:
    assert place_text(place) == text


@pytest.mark.parametrize(
    ("given_name", "names", "meant"),
    [
        ("diamter", ["diameter", "diameter_end"], "diameter"),
        ("STEEL", ["Stone", "Steel"], "Steel"),
        ("a", ["A", "B"], "A"),
        ("zzz", ["A", "B"], None),
        ("x", [], None),
        ("Steel", ["Stee"] * 1000, None),
    ],
)
def test_the_nearest_name(given_name: str, names: list[str], meant: str | None) -> None:
    assert nearest(given_name, names) == meant
