"""What is not well formed: every fault named with its place, all together, and nothing else may escape."""

from __future__ import annotations

import json
from typing import Any

import pytest
from hypothesis import example as given_example
from hypothesis import given
from hypothesis import strategies as st

from app.phrases import fault_sentence
from app.project_file import dump, parse
from app.strict_json import json_slip
from tests.documents import changed, encoded, example, faults_of, without

JSON = st.recursive(
    st.none()
    | st.booleans()
    | st.integers()
    | st.floats()  # NaN and infinities too, which the standard writer spells as no JSON has them
    | st.text(st.characters()),
    lambda children: st.lists(children, max_size=3) | st.dictionaries(st.text(), children, max_size=3),
    max_leaves=8,
)


def test_the_example_has_no_fault() -> None:
    assert faults_of(example()) == ()


NEAR_FIXED, NEAR_TUBE = {"nearest": "fixed"}, {"nearest": "tube"}
LOAD_JOINT = "load_cases[0].joint_loads[0].joint"
# what is put where → the place told, the rule, and some of the facts
ONE_FAULT: list[tuple[tuple[Any, ...], str, str, dict[str, Any]]] = [
    (("title", 5), "title", "wrong_type", {"expected": "text", "value": 5}),
    (("title", None), "title", "wrong_type", {"value": None}),
    (("sheet", []), "sheet", "wrong_type", {"expected": "object"}),
    (("sheet", "job", True), "sheet.job", "wrong_type", {"value": True}),
    (("display", "units", "mm-N-Mpa"), "display.units", "not_a_choice", {"nearest": "mm-N-MPa"}),
    (("display", "orientation", "upright"), "display.orientation", "not_a_choice", {"nearest": None}),
    (("display", "orientation", 1), "display.orientation", "wrong_type", {"expected": "text"}),
    (("materials", {}), "materials", "wrong_type", {"expected": "list"}),
    (("materials", 0, "modulus", 0), "materials[0].modulus", "not_greater_than", {"bound": 0, "value": 0.0}),
    (("materials", 0, "density", -1), "materials[0].density", "below_least", {"bound": 0, "value": -1.0}),
    (("materials", 0, "modulus", "2.1e11"), "materials[0].modulus", "wrong_type", {"expected": "number"}),
    (("materials", 0, "modulus", True), "materials[0].modulus", "wrong_type", {"value": True}),
    (("materials", 0, "expansion", None), "materials[0].expansion", "wrong_type", {"value": None}),
    (("materials", 0, "allowable_tension", -1.6e8), "materials[0].allowable_tension", "not_greater_than", {}),
    (("materials", 0, "expnsion", 1.0), "materials[0]", "unknown_key", {"nearest": "expansion"}),
    (("limits", "stability_factor", 0.5), "limits.stability_factor", "below_least", {"bound": 1}),
    (("materials", 0, "name", ""), "materials[0].name", "empty_text", {}),
    (("joints", 0, "support", {"kind": "fix"}), "joints[0].support.kind", "not_a_choice", NEAR_FIXED),
    (("joints", 0, "support", "stiffness", 1.0), "joints[0].support", "unknown_key", {"nearest": None}),
    (("joints", 0, "support", {}), "joints[0].support", "missing_key", {"key": "kind"}),
    (("joints", 0, "support", None), "joints[0].support", "wrong_type", {"value": None}),
    (("joints", 0, "support", "kind", ["fixed"]), "joints[0].support.kind", "wrong_type", {"value": "[…]"}),
    (("joints", 1, "support", "side", "left"), "joints[1].support.side", "not_a_choice", {}),
    (("joints", 1, "support", "clearance", -0.1), "joints[1].support.clearance", "below_least", {}),
    (("joints", 1, "support", "stiffness", 0), "joints[1].support.stiffness", "not_greater_than", {}),
    (("joints", 2, "support", {"kind": "spring"}), "joints[2].support", "missing_key", {"key": "stiffness"}),
    (("segments", 0, "length", -0.35), "segments[0].length", "not_greater_than", {"value": -0.35}),
    (("segments", 1, "section", "area", 0.0), "segments[1].section.area", "not_greater_than", {}),
    (("segments", 1, "section", "shape", "tub"), "segments[1].section.shape", "not_a_choice", NEAR_TUBE),
    (("segments", 1, "section", 3), "segments[1].section", "wrong_type", {"expected": "object", "value": 3}),
    (("segments", 1, "section", "diameter", 1), "segments[1].section", "unknown_key", {"key": "diameter"}),
    (("segments", 0, "section", "inner", -0.1), "segments[0].section.inner", "below_least", {}),
    (("segments", 1, "bedding_end", -1), "segments[1].bedding_end", "below_least", {}),
    (("load_cases", 0, "joint_loads", [{"joint": 1}]), LOAD_JOINT, "wrong_type", {"expected": "text"}),
    (("load_cases", 0, 7), "load_cases[0]", "wrong_type", {"expected": "object"}),
    (("combinations", 0, "allowable_factor", 0), "combinations[0].allowable_factor", "not_greater_than", {}),
    (("combinations", 0, "factors", "Dead", "1"), "combinations[0].factors.Dead", "wrong_type", {}),
    (("combinations", 0, "factors", [1]), "combinations[0].factors", "wrong_type", {"expected": "object"}),
    (("limits", "reaction", 0, "limit", 0), "limits.reaction[0].limit", "not_greater_than", {}),
    (("limits", "relative", 0, "start", "1"), "limits.relative[0]", "unknown_key", {"key": "start"}),
    (("tilte", "x"), "", "unknown_key", {"key": "tilte", "nearest": "title"}),
    (("version", "1"), "version", "wrong_type", {"expected": "number"}),
    (("version", True), "version", "wrong_type", {"value": True}),
    (("version", 0), "version", "not_a_choice", {"value": 0}),
]  # fmt: skip


@pytest.mark.parametrize(("change", "place", "rule", "facts"), ONE_FAULT)
def test_one_fault_is_named_with_place_rule_and_value(
    change: tuple[Any, ...], place: str, rule: str, facts: dict[str, Any]
) -> None:
    (fault,) = faults_of(changed(*change))
    assert (fault.place, fault.rule) == (place, rule)
    assert facts.items() <= fault.facts.items()


@pytest.mark.parametrize(
    ("place", "told"),
    [
        (("joints",), ""),
        (("segments",), ""),
        (("version",), ""),
        (("materials", 0, "name"), "materials[0]"),
        (("materials", 0, "modulus"), "materials[0]"),
        (("joints", 2, "mark"), "joints[2]"),
        (("segments", 0, "mark"), "segments[0]"),
        (("segments", 0, "length"), "segments[0]"),
        (("segments", 0, "material"), "segments[0]"),
        (("segments", 0, "section"), "segments[0]"),
        (("segments", 0, "section", "shape"), "segments[0].section"),
        (("segments", 0, "section", "inner"), "segments[0].section"),
        (("joints", 1, "support", "side"), "joints[1].support"),
        (("load_cases", 1, "segment_loads", 0, "segment"), "load_cases[1].segment_loads[0]"),
        (("limits", "relative", 0, "from"), "limits.relative[0]"),
    ],
)
def test_a_missing_key_is_named_and_brings_no_other_fault(place: tuple[Any, ...], told: str) -> None:
    (fault,) = faults_of(without(*place))
    assert (fault.place, fault.rule, fault.facts) == (told, "missing_key", {"key": place[-1]})


def test_all_faults_are_told_at_once() -> None:
    """Of single values and of records together, also where parts could not be read."""
    document = example()
    document["title"] = None
    document["segments"][0] |= {"length": "long", "material": "Stel"}
    document["segments"][1]["section"] = {"shape": "tube", "outer": 0.1, "inner": 0.2}
    document["segments"][1]["mark"] = "A"
    document["load_cases"][1]["joint_loads"][0]["joint"] = "9"
    document["joints"][0]["support"]["kind"] = "glued"
    found = {(fault.place, fault.rule) for fault in faults_of(document)}
    assert found == {
        ("title", "wrong_type"),
        ("segments[0].length", "wrong_type"),
        ("segments[0].material", "unknown_reference"),
        ("segments[1].section.inner", "inner_not_below_outer"),
        ("segments[1].mark", "duplicate_mark"),
        ("load_cases[1].joint_loads[0].joint", "unknown_reference"),
        ("joints[0].support.kind", "not_a_choice"),
    }


def test_what_may_name_an_unreadable_record_is_not_called_unknown() -> None:
    (fault,) = faults_of(changed("materials", 0, "name", 5))
    assert fault.place == "materials[0].name"


def test_a_tube_with_one_unreadable_end_is_compared_at_the_other_only() -> None:
    document = changed("segments", 0, "section", "outer_end", "wide")
    document["segments"][0]["section"]["inner_end"] = 0.05
    assert [fault.rule for fault in faults_of(document)] == ["wrong_type"]


# --- the text ---


@pytest.mark.parametrize(
    ("old", "new", "place", "key"),
    [
        ('"title":', '"notes": "", "title":', "", "notes"),
        ('"length": 0.35', '"length": 0.35, "length": 0.35', "segments[0]", "length"),
        ('"kind": "fixed"', '"kind": "fixed", "kind": "spring"', "joints[0].support", "kind"),
        ('"Service": 1.0', '"Service": 1.0, "Service": 2.0', "combinations[0].factors", "Service"),
    ],
)
def test_a_key_that_stands_twice_is_refused_with_its_place(old: str, new: str, place: str, key: str) -> None:
    """The standard decoder would silently take the last."""
    text = encoded(example()).decode()
    assert old in text
    (fault,) = faults_of(text.replace(old, new, 1).encode())
    assert (fault.place, fault.rule, fault.facts) == (place, "duplicate_key", {"key": key})


@pytest.mark.parametrize("text", ["NaN", "Infinity", "-Infinity", "1e999", "-1e999", "9" * 5000])
def test_a_number_that_no_double_holds_is_refused_with_its_place(text: str) -> None:
    (fault,) = faults_of(encoded(example()).replace(b"-9.80665", text.encode()))
    assert (fault.place, fault.rule) == ("load_cases[0].gravity", "not_finite")
    assert str(fault.facts["value"])[:40] == text[:40]


def test_such_a_number_is_refused_under_an_unknown_key_too() -> None:
    faults = faults_of(encoded(example()).replace(b'"title"', b'"extra": [1, NaN], "title"'))
    assert {(f.place, f.rule) for f in faults} == {("extra[1]", "not_finite"), ("", "unknown_key")}


@pytest.mark.parametrize(
    ("data", "rule"),
    [
        (b"", "not_json"),
        (b"{", "not_json"),
        (b'{"format": }', "not_json"),
        (encoded(example()) + b"}", "not_json"),
        (b'{"title": "\xff"}', "not_utf8"),
        ("{}".encode("utf-16"), "not_utf8"),
        (b"[" * 100_000, "too_deep"),
        (b'{"a":' * 300 + b"1" + b"}" * 300, "too_deep"),
        (b"[" * 50 + b"]" * 50, "too_deep"),
        (b"5", "not_a_project"),
        (b"null", "not_a_project"),
        (b"[]", "not_a_project"),
        (b"{}", "not_a_project"),
    ],
)
def test_what_is_no_project_at_all_is_told_alone(data: bytes, rule: str) -> None:
    (fault,) = faults_of(data)
    assert fault.rule == rule


def test_a_slip_in_the_text_is_told_with_line_and_column() -> None:
    (fault,) = faults_of(b'{\n  "title": oops\n}')
    assert (fault.facts["line"], fault.facts["column"]) == (2, 12)


@pytest.mark.parametrize(
    ("text", "slip"),
    [
        ("", "empty"),
        (" \n", "empty"),
        ("{", "ends_early"),
        ('{"a": 1', "ends_early"),
        ('{"a": 1,\n', "ends_early"),
        ('{"a": 1,}', "trailing_comma"),
        ('{"a": [1, ]}', "trailing_comma"),
        ('{"a": }', "no_value"),
        ('{"a": nul}', "no_value"),
        ('{"a": [,1]}', "no_value"),
        ("{'a': 1}", "no_key"),
        ('{"a" 1}', "no_colon"),
        ('{"a": 1 "b": 2}', "no_comma"),
        ('{"a": [1 2]}', "no_comma"),
        ('{"a": "b}', "text_open"),
        ('{"a": "\\q"}', "bad_escape"),
        ('{"a": "\\u12"}', "bad_escape"),
        ('{"a": "b\nc"}', "control_sign"),
        ("{}}", "goes_on"),
    ],
)
def test_slips_in_the_text_have_names_of_our_own(text: str, slip: str) -> None:
    (fault,) = faults_of(text.encode())
    assert (fault.rule, fault.facts["reason"]) == ("not_json", slip)


def test_words_that_the_decoder_may_learn_are_a_slip_all_the_same() -> None:
    assert json_slip(json.JSONDecodeError("Something new", "{}", 0)) == "other"


@pytest.mark.parametrize("found", ["barwright-results", "", "Barwright-Project"])
def test_a_foreign_format_is_told_before_everything_else(found: str) -> None:
    document = changed("format", found)
    document["segments"] = "none"
    (fault,) = faults_of(document)
    assert (fault.place, fault.rule, fault.facts) == ("format", "not_a_project", {"found": found})


@pytest.mark.parametrize("version", [2, 2.0, 1.5, 1e300])
def test_a_newer_version_is_told_before_everything_else(version: float) -> None:
    document = changed("version", version)
    document["segments"] = "none"
    (fault,) = faults_of(document)
    assert (fault.place, fault.rule) == ("version", "newer_version")
    assert fault.facts == {"value": version, "known": 1}


@pytest.mark.parametrize("steps", [("title",), ("materials", 0, "name"), ("load_cases", 0, "name")])
def test_half_a_character_is_refused_since_no_file_could_hold_it(steps: tuple[Any, ...]) -> None:
    data = json.dumps(changed(*steps, "half \ud800")).encode()
    assert "not_utf8" in {fault.rule for fault in faults_of(data)}


# --- anything at all ---


def only_the_named_error_escapes(data: bytes) -> None:
    """And what is read can be written; every fault can be worded and printed."""
    faults = faults_of(data)
    assert all(fault_sentence(fault).encode("utf-8") for fault in faults)
    if not faults:
        assert parse(dump(parse(data))) == parse(data)


@given(st.binary())
def test_any_bytes(data: bytes) -> None:
    only_the_named_error_escapes(data)


@given(JSON)
def test_any_json(value: Any) -> None:
    only_the_named_error_escapes(json.dumps(value).encode())


def places(value: Any, place: tuple[Any, ...] = ()) -> list[tuple[Any, ...]]:
    """Every place in the document."""
    steps = enumerate(value) if isinstance(value, list) else value.items() if isinstance(value, dict) else ()
    return [place, *(deeper for step, item in steps for deeper in places(item, (*place, step)))]


@given(st.data())
def test_a_project_with_anything_anywhere(data: st.DataObject) -> None:
    document = example()
    for _ in range(data.draw(st.integers(1, 3))):
        place = data.draw(st.sampled_from([p for p in places(document) if p]))
        holder = document
        for step in place[:-1]:
            holder = holder[step]
        holder[place[-1]] = data.draw(JSON)
    only_the_named_error_escapes(json.dumps(document).encode())


@given(st.integers(0, len(encoded(example())) - 1), st.binary(max_size=3))
@given_example(0, b"")
def test_a_project_with_a_byte_changed(index: int, other: bytes) -> None:
    data = encoded(example())
    only_the_named_error_escapes(data[:index] + other + data[index + 1 :])


@given(st.integers(0, len(encoded(example()))))
def test_a_project_cut_short_is_never_half_read(length: int) -> None:
    data = encoded(example())[:length]
    assert bool(faults_of(data)) == (length < len(encoded(example())) - 1)


def test_many_faults_are_told_in_reasonable_time() -> None:
    """Suggestions are searched once a name and not in endless lists."""
    document = example()
    document["segments"] *= 500
    document["joints"] = [{"mark": str(index)} for index in range(1001)]
    for index, segment in enumerate(document["segments"] or ()):
        document["segments"][index] = segment | {"material": "Stel", "mark": str(index)}
    faults = faults_of(document)
    assert sum(fault.facts.get("nearest") == "Steel" for fault in faults) == 1000
