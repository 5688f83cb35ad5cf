"""What stands beside the chain: several supports, shoulders, lateral supports, bonded parts, companions."""

from __future__ import annotations

from typing import Any

import pytest
from msgspec import UNSET

from app.phrases.faults import fault_sentence
from app.project_file import parse
from solver.model import FixedSupport, SpringSupport, supports_of
from solver.validation import unsolvable
from tests.documents import changed, encoded, example, faults_of

STOP = {"kind": "stop", "side": "plus", "clearance": 0.001}
PART = {"material": "Steel", "section": {"shape": "round", "diameter": 0.02}}


def companion(**changes: Any) -> dict[str, Any]:
    segments = [{"mark": "S1", "length": 0.35, **PART}, {"mark": "S2", "length": 0.5, **PART}]
    return {"mark": "Sleeve", "from": "0", "to": "2", "segments": segments} | changes


def beside(*companions: dict[str, Any], **others: Any) -> Any:
    return example() | {"companions": list(companions)} | others


def renamed(index: int, mark: str) -> dict[str, Any]:
    made = companion()
    made["segments"][index]["mark"] = mark
    return made


def long(length: float) -> dict[str, Any]:
    made = companion()
    made["segments"][1]["length"] = length
    return made


FAULTY: list[tuple[Any, str, str, dict[str, Any]]] = [
    (changed("joints", 0, "supports", [STOP]), "joints[0]", "both_keys", {"other": "support"}),
    (changed("joints", 0, "supports", []), "joints[0]", "both_keys", {"key": "supports"}),
    (changed("joints", 1, "shoulder", {}), "joints[1].shoulder", "neither_key", {"other": "factor"}),
    (
        changed("joints", 1, "shoulder", {"fillet_radius": 0.001, "factor": 1.5}),
        "joints[1].shoulder",
        "both_keys",
        {},
    ),
    (
        changed("joints", 1, "shoulder", {"factor": 0.9}),
        "joints[1].shoulder.factor",
        "below_least",
        {"bound": 1},
    ),
    (
        changed("joints", 1, "lateral", {"translation": "fixd"}),
        "joints[1].lateral.translation",
        "no_word_or_number",
        {"nearest": "fixed"},
    ),
    (
        changed("joints", 1, "lateral", {"rotation": -2.0}),
        "joints[1].lateral.rotation",
        "not_greater_than",
        {"value": -2.0},
    ),
    (
        changed("joints", 1, "lateral", {"rotation": True}),
        "joints[1].lateral.rotation",
        "no_word_or_number",
        {},
    ),
    (
        changed("segments", 1, "bonded", [PART | {"material": "Steal"}]),
        "segments[1].bonded[0].material",
        "unknown_reference",
        {"nearest": "Steel"},
    ),
    (
        changed("segments", 1, "bonded", [PART | {"section": {"shape": "tube", "outer": 0.1, "inner": 0.2}}]),
        "segments[1].bonded[0].section.inner",
        "inner_not_below_outer",
        {},
    ),
    (beside(companion(segments=[])), "companions[0].segments", "no_companion_segments", {}),
    (
        beside(companion(), companion(segments=[{"mark": "T", "length": 0.85, **PART}])),
        "companions[1].mark",
        "duplicate_mark",
        {"value": "Sleeve"},
    ),
    (
        beside(renamed(1, "A")),
        "companions[0].segments[1].mark",
        "duplicate_mark",
        {"first": "segments[0].mark"},
    ),
    (beside(companion(to="4")), "companions[0].to", "unknown_reference", {"kind": "joint"}),
    (beside(companion(to="0")), "companions[0].to", "same_joint", {"joint": "0"}),
    (
        beside(companion() | {"from": "2", "to": "0"}),
        "companions[0].to",
        "companion_order",
        {"from": "2", "to": "0"},
    ),
    (beside(companion(acts="pull")), "companions[0].acts", "not_a_choice", {}),
    (
        beside(fatigue=[{"from": "Working", "to": "Workin"}]),
        "fatigue[0].to",
        "unknown_reference",
        {"kind": "combination", "nearest": "Working"},
    ),
    (
        beside(fatigue=[{"from": "Working", "to": "Working"}]),
        "fatigue[0].to",
        "same_combination",
        {"combination": "Working"},
    ),
    (
        beside(limits={"waived": [{"check": "stability", "reason": "held"}] * 2}),
        "limits.waived[1].check",
        "duplicate_mark",
        {},
    ),
    (
        beside(limits={"waived": [{"check": "stability", "reason": ""}]}),
        "limits.waived[0].reason",
        "empty_text",
        {},
    ),
    (
        beside(limits={"waived": [{"check": "stability", "reason": " \n"}]}),
        "limits.waived[0].reason",
        "no_reason",
        {},
    ),
]


@pytest.mark.parametrize(
    ("document", "place", "rule", "facts"), FAULTY, ids=[f"{f[1]} {f[2]}" for f in FAULTY]
)
def test_a_fault_has_its_place_its_rule_and_its_words(
    document: Any, place: str, rule: str, facts: dict[str, Any]
) -> None:
    (fault,) = faults_of(document)
    assert (fault.place, fault.rule) == (place, rule)
    assert facts.items() <= fault.facts.items()
    assert fault_sentence(fault).startswith(f"{place}: ")
    assert fault_sentence(fault, "mm-N-MPa")


def test_loads_may_name_the_segment_of_a_companion() -> None:
    document = beside(companion())
    document["load_cases"][0]["segment_loads"] = [{"segment": "S2", "lack_of_fit": 0.001}]
    assert parse(encoded(document)).companions[0].segments[1].mark == "S2"


@pytest.mark.parametrize(("length", "kind"), [(0.5 + 2e-6, "too_long"), (0.49, "too_short")])
def test_a_companion_of_another_length_opens_and_is_not_solved(length: float, kind: str) -> None:
    project = parse(encoded(beside(long(length))))
    (fault,) = [fault for fault in unsolvable(project) if fault.rule == "companion_length"]
    assert (fault.place, fault.facts["kind"]) == ("companions[0].segments[1].length", kind)
    assert "spans 850 mm; it is " in fault_sentence(fault, "mm-N-MPa")


def test_a_companion_may_differ_by_rounding() -> None:
    project = parse(encoded(beside(long(0.5 + 8e-7))))
    assert not [fault for fault in unsolvable(project) if fault.rule == "companion_length"]


def test_supports_are_one_or_several() -> None:
    spring = {"kind": "spring", "stiffness": 1e6}
    document = changed("joints", 1, {"mark": "1", "supports": [STOP, spring]})
    first, second, _third = parse(encoded(document)).joints
    assert supports_of(first) == (FixedSupport(),)
    assert supports_of(second)[1] == SpringSupport(stiffness=1e6)
    assert second.support is UNSET
