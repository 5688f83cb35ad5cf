"""Project files: what is written is read back to the last digit, and what is read is written as it was."""

from __future__ import annotations

import hashlib
import json
import math
import os
from pathlib import Path
from typing import Any

import pytest
from hypothesis import given
from hypothesis import strategies as st
from msgspec import structs

from app.project_file import dump, parse, read, sha256, write
from app.samples import names, sample_path
from solver.model import ABSENT_LIMITS, Limits, Project
from tests.documents import changed, documents, encoded, example, without
from tests.strategies import full_projects


@given(full_projects())
def test_a_project_is_read_back_as_it_was(project: Project) -> None:
    assert parse(dump(project)) == project


@given(documents())
def test_a_file_is_saved_byte_for_byte_as_it_was_read(document: Any) -> None:
    """What is absent stays absent, a written default stays written; the form is the standard writer's."""
    data = encoded(document)
    assert dump(parse(data)) == data


@pytest.mark.parametrize("name", names())
def test_a_sample_is_saved_byte_for_byte(name: str) -> None:
    data = Path(str(sample_path(name))).read_bytes()
    assert dump(parse(data)) == data


def test_the_example_of_the_format_is_saved_as_it_was() -> None:
    assert dump(parse(encoded(example()))) == encoded(example())


@pytest.mark.parametrize("key", ["sheet", "display", "limits"])
def test_an_empty_record_and_none_are_told_apart(key: str) -> None:
    assert dump(parse(encoded(changed(key, {})))) == encoded(changed(key, {}))
    assert dump(parse(encoded(without(key)))) == encoded(without(key))
    assert parse(encoded(changed(key, {}))) == parse(encoded(without(key)))


def test_what_is_put_into_absent_limits_is_written() -> None:
    project = parse(encoded(without("limits")))
    assert project.limits is ABSENT_LIMITS
    fresh = structs.replace(project, limits=structs.replace(project.limits, displacement=()))
    assert json.loads(dump(fresh))["limits"] == {"displacement": []}
    assert fresh.limits == Limits()


def test_keys_are_written_in_the_order_of_the_format_whatever_order_they_were_read_in() -> None:
    assert dump(parse(encoded(_backwards(example())))) == encoded(
        example() | {"combinations": _combinations()}
    )


def _backwards(value: Any) -> Any:
    if isinstance(value, dict):
        return {key: _backwards(item) for key, item in reversed(value.items())}
    return [_backwards(item) for item in value] if isinstance(value, list) else value


def _combinations() -> Any:
    """Factors are the user's own table: they keep the order of the file."""
    first, second = example()["combinations"]
    return [first | {"factors": {"Dead": 1.0, "Service": 1.0}}, second]


@given(st.floats(allow_nan=False, allow_infinity=False))
def test_every_double_is_kept_to_the_last_bit(value: float) -> None:
    document = changed("load_cases", 0, "gravity", value)
    kept = parse(dump(parse(encoded(document)))).load_cases[0].gravity
    assert kept == value
    assert math.copysign(1.0, kept) == math.copysign(1.0, value)


@pytest.mark.parametrize(
    ("text", "value"),
    [
        ("0.1000000000000000055511151231257827", 0.1),
        ("9007199254740993", 9007199254740992.0),
        ("210000000000", 2.1e11),
        ("5e-324", 5e-324),
        ("1" + "0" * 308, 1e308),
        ("0." + "0" * 400 + "1", 0.0),
    ],
)
def test_a_number_of_any_length_becomes_the_nearest_double(text: str, value: float) -> None:
    data = encoded(example()).replace(b"-9.80665", text.encode())
    assert parse(data).load_cases[0].gravity == value


def test_minus_zero_stays_also_without_a_point() -> None:
    gravity = parse(encoded(example()).replace(b"-9.80665", b"-0")).load_cases[0].gravity
    assert math.copysign(1.0, gravity) == -1.0


def test_whole_numbers_given_by_code_are_written_as_they_are_read_back() -> None:
    project = parse(encoded(example()))
    segment = structs.replace(project.segments[0], length=2)
    fresh = structs.replace(project, segments=(segment, *project.segments[1:]))
    assert dump(parse(dump(fresh))) == dump(fresh)


def test_a_byte_order_mark_is_passed_over() -> None:
    assert parse(b"\xef\xbb\xbf" + encoded(example())) == parse(encoded(example()))


def test_text_of_any_script_stands_as_itself() -> None:
    data = encoded(changed("title", "Zugstange ⌀40 – 引張材 🔩"))
    assert "引張材 🔩".encode() in data
    assert dump(parse(data)) == data


def test_the_fingerprint_is_of_the_canonical_bytes() -> None:
    project = parse(encoded(_backwards(example())))
    assert sha256(project) == hashlib.sha256(dump(project)).hexdigest()
    assert sha256(project) != sha256(parse(encoded(changed("title", "Other"))))


def test_a_number_that_is_none_is_never_written() -> None:
    project = parse(encoded(example()))
    broken = structs.replace(project, segments=(structs.replace(project.segments[0], length=math.nan),))
    with pytest.raises(ValueError, match="JSON compliant"):
        dump(broken)


def test_written_and_read_through_a_file(tmp_path: Path) -> None:
    project = parse(encoded(example()))
    path = tmp_path / "rod.barwright.json"
    write(project, path)
    assert path.read_bytes() == dump(project)
    assert read(os.fspath(path)) == project


def test_a_missing_file_is_the_systems_own_error(tmp_path: Path) -> None:
    with pytest.raises(FileNotFoundError):
        read(tmp_path / "none.json")
