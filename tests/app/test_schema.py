"""The JSON Schema says what the reader does: a small reader of schemas of our own judges beside it."""

from __future__ import annotations

import json
from typing import Any

import pytest
from hypothesis import given
from hypothesis import strategies as st

from app.project_file import dump, parse, schema
from app.samples import names, read_sample
from app.schema import KEYS
from tests.app.test_decode import JSON, ONE_FAULT, places
from tests.documents import changed, documents, encoded, example, faults_of

SCHEMA = schema()
# rules that concern records together or the text, which a schema cannot say
BEYOND = {"joint_count", "duplicate_mark", "unknown_reference", "inner_not_below_outer", "duplicate_limit",
          "same_joint", "not_utf8", "companion_order", "same_combination"}  # fmt: skip


def fits(value: Any, part: dict[str, Any]) -> bool:
    """Whether the value fits this part of the schema; knows the words used here and fails on others."""
    part = {
        word: rule
        for word, rule in part.items()
        if word not in ("title", "description", "default", "$schema")
    }
    return all(WORDS[word](value, rule, part) for word, rule in part.items())


NOTES = ("$schema", "title", "description", "default")


def is_number(value: Any) -> bool:
    return isinstance(value, int | float) and not isinstance(value, bool)


TYPES = {
    "object": lambda value: isinstance(value, dict),
    "array": lambda value: isinstance(value, list),
    "string": lambda value: isinstance(value, str),
    "number": is_number,
}
WORDS: dict[str, Any] = {
    "$ref": lambda value, rule, _: fits(value, SCHEMA["$defs"][rule.rpartition("/")[2]]),
    "$defs": lambda *_: True,
    "type": lambda value, rule, _: TYPES[rule](value),
    "oneOf": lambda value, rule, _: sum(fits(value, one) for one in rule) == 1,
    "not": lambda value, rule, _: not isinstance(value, dict) or not fits(value, rule),
    "enum": lambda value, rule, _: any(value == one and isinstance(value, bool) is False for one in rule),
    "anyOf": lambda value, rule, _: any(fits(value, one) for one in rule),
    "discriminator": lambda *_: True,
    "required": lambda value, rule, _: not isinstance(value, dict) or set(rule) <= set(value),
    "properties": lambda value, rule, _: (
        not isinstance(value, dict)
        or all(fits(item, rule[key]) for key, item in value.items() if key in rule)
    ),
    "additionalProperties": lambda value, rule, part: (
        not isinstance(value, dict)
        or all(
            rule is not False and fits(item, rule)
            for key, item in value.items()
            if key not in part.get("properties", {})
        )
    ),
    "dependentRequired": lambda value, rule, _: (
        not isinstance(value, dict)
        or all(set(needed) <= set(value) for key, needed in rule.items() if key in value)
    ),
    "items": lambda value, rule, _: not isinstance(value, list) or all(fits(item, rule) for item in value),
    "minItems": lambda value, rule, _: not isinstance(value, list) or len(value) >= rule,
    "minLength": lambda value, rule, _: not isinstance(value, str) or len(value) >= rule,
    "minimum": lambda value, rule, _: not is_number(value) or value >= rule,
    "exclusiveMinimum": lambda value, rule, _: not is_number(value) or value > rule,
}


@pytest.mark.parametrize("name", names())
def test_the_samples_fit(name: str) -> None:
    assert fits(json.loads(dump(read_sample(name))), SCHEMA)


@given(documents())
def test_what_is_well_formed_fits(document: Any) -> None:
    assert fits(document, SCHEMA)


@pytest.mark.parametrize("change", [case[0] for case in ONE_FAULT])
def test_what_the_reader_refuses_in_one_record_does_not_fit(change: tuple[Any, ...]) -> None:
    assert not fits(changed(*change), SCHEMA)


@pytest.mark.parametrize("short", [changed("segments", []), changed("joints", [{"mark": "0"}])])
def test_a_member_has_a_segment_between_two_joints(short: Any) -> None:
    assert faults_of(short)
    assert not fits(short, SCHEMA)


@given(st.data())
def test_reader_and_schema_agree_on_anything_anywhere(data: st.DataObject) -> None:
    document = example()
    place = data.draw(st.sampled_from([p for p in places(document) if p]))
    holder = document
    for step in place[:-1]:
        holder = holder[step]
    holder[place[-1]] = data.draw(JSON)
    text = json.dumps(document)
    plain = json.loads(text, parse_constant=lambda _: None)  # which fits nowhere, as NaN ought not to
    rules = {fault.rule for fault in faults_of(text.encode())}
    assert fits(plain, SCHEMA) == (not rules - BEYOND)


def test_the_schema_is_strict_and_says_what_every_key_means() -> None:
    for record, definition in SCHEMA["$defs"].items():
        assert definition["additionalProperties"] is False, record
        for key, value in definition["properties"].items():
            assert value["title"], (record, key)
            assert value["description"], (record, key)


def test_no_key_is_described_that_is_not_there() -> None:
    for record, words in KEYS.items():
        assert set(words) == set(SCHEMA["$defs"][record.__name__]["properties"])


def test_the_defaults_shown_are_those_the_reader_takes() -> None:
    """Writing each default out changes nothing."""
    least = {
        "format": "barwright-project",
        "version": 1,
        "materials": [{"name": "Steel", "modulus": 1.0}],
        "joints": [{"mark": "0"}, {"mark": "1"}],
        "segments": [
            {"mark": "A", "length": 1.0, "material": "Steel", "section": {"shape": "area", "area": 1.0}}
        ],
        "load_cases": [{"name": "L", "segment_loads": [{"segment": "A"}], "joint_loads": [{"joint": "0"}]}],
        "combinations": [{"name": "C"}],
    }
    full = {
        **with_defaults("Project", least),
        "materials": [with_defaults("Material", least["materials"][0])],
        "segments": [with_defaults("Segment", least["segments"][0])],
        "load_cases": [
            {
                **with_defaults("LoadCase", {"name": "L"}),
                "segment_loads": [with_defaults("SegmentLoad", {"segment": "A"})],
                "joint_loads": [with_defaults("JointLoad", {"joint": "0"})],
            }
        ],
        "combinations": [with_defaults("Combination", {"name": "C"})],
        "display": {},
    }
    assert parse(encoded(full)) == parse(encoded(least))
    display = parse(encoded(full | {"display": with_defaults("Display", {})})).display
    assert (display.unit_system, display.layout) == (display.units, display.orientation)


def with_defaults(record: str, least: Any) -> Any:
    properties = SCHEMA["$defs"][record]["properties"]
    defaults = {key: value["default"] for key, value in properties.items() if "default" in value}
    assert defaults
    return defaults | least


def test_the_schema_is_plain_json() -> None:
    assert json.loads(json.dumps(SCHEMA, allow_nan=False)) == SCHEMA
    assert SCHEMA["$schema"].endswith("2020-12/schema")
