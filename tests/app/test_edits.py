"""Edits of single values, records and names: what changes, what is taken along, and what is refused."""

from __future__ import annotations

import json
import math
from collections.abc import Callable
from typing import Any

import pytest
from hypothesis import given
from hypothesis import strategies as st
from msgspec import UNSET

from app import edits
from app.edits import EditError, set_value
from app.project_file import dump, parse
from solver.faults import Place
from solver.model import Project, RoundSection, StopSupport, TubeSection
from tests.app.test_decode import JSON, ONE_FAULT, places
from tests.documents import changed, documents, encoded, example, without


def project(document: Any = None) -> Project:
    return parse(encoded(example() if document is None else document))


def document_of(edited: Project) -> Any:
    return json.loads(dump(edited))


def refusal(edit: Callable[[], Project]) -> list[tuple[str, str]]:
    with pytest.raises(EditError) as caught:
        edit()
    return [(fault.place, fault.rule) for fault in caught.value.faults]


# --- cells ---


@given(documents(), st.data())
def test_a_value_set_to_itself_changes_nothing(document: Any, data: st.DataObject) -> None:
    place = data.draw(st.sampled_from([p for p in places(document) if p and p[-1] not in ("shape", "kind")]))
    assert dump(set_value(project(document), place, value_in(document, place))) == encoded(document)


def number_places() -> list[Place]:
    def holds_number(place: Place) -> bool:
        return isinstance(value_in(example(), place), float)

    return [place for place in places(example()) if place and holds_number(place)]


def value_in(document: Any, place: Place) -> Any:
    for step in place:
        document = document[step]
    return document


@pytest.mark.parametrize("place", number_places(), ids=str)
def test_a_number_is_set_at_any_place_as_the_file_would_have_it(place: Place) -> None:
    value = value_in(example(), place) * 1.25
    assert dump(set_value(project(), place, value)) == encoded(changed(*place, value))


@pytest.mark.parametrize(
    "place",
    [
        ("title",),
        ("sheet",),
        ("sheet", "job"),
        ("display", "units"),
        ("limits",),
        ("limits", "relative"),
        ("combinations",),
        ("combinations", 0, "factors"),
        ("combinations", 0, "factors", "Dead"),
        ("combinations", 0, "allowable_factor"),
        ("materials", 0, "expansion"),
        ("materials", 0, "allowable_tension"),
        ("joints", 0, "support"),
        ("joints", 1, "support", "stiffness"),
        ("segments", 1, "bedding"),
        ("segments", 1, "bedding_end"),
        ("load_cases", 0, "gravity"),
        ("load_cases", 1, "segment_loads"),
        ("load_cases", 1, "segment_loads", 0, "load_end"),
        ("load_cases", 1, "joint_loads", 0, "force"),
    ],
    ids=str,
)
def test_an_optional_key_is_taken_away(place: Place) -> None:
    assert dump(set_value(project(), place, UNSET)) == encoded(without(*place))


def test_a_required_key_stays() -> None:
    edit = lambda: set_value(project(), ("segments", 0, "length"), UNSET)  # noqa: E731
    assert refusal(edit) == [("segments[0]", "missing_key")]


def test_a_record_is_given_as_itself_or_as_plain_values() -> None:
    place = ("segments", 1, "section")
    plain = {"shape": "round", "diameter": 0.03, "diameter_end": 0.02}
    record = RoundSection(diameter=0.03, diameter_end=0.02)
    assert dump(set_value(project(), place, record)) == dump(set_value(project(), place, plain))
    assert dump(set_value(project(), place, record)) == encoded(changed(*place, plain))
    fresh = set_value(project(), ("joints", 1, "support"), StopSupport(side="minus", clearance=0))
    assert document_of(fresh)["joints"][1]["support"] == {"kind": "stop", "side": "minus", "clearance": 0.0}


def test_an_edit_leaves_the_project_it_was_given_as_it_was() -> None:
    before = project()
    edits.set_factor(before, "Working", "Dead", 9.0)
    edits.reverse_member(before)
    edits.remove_case(before, "Dead")
    assert dump(before) == encoded(example())


SINGLE = ("not_greater_than", "below_least", "wrong_type")


@pytest.mark.parametrize(
    ("change", "place", "rule"),
    [(c, p, r) for c, p, r, _ in ONE_FAULT if r in SINGLE and len(c) > 2 and c[-2] not in ("kind", "shape")],
)
def test_a_value_that_a_file_may_not_hold_is_refused_with_the_same_words(
    change: tuple[Any, ...], place: str, rule: str
) -> None:
    assert refusal(lambda: set_value(project(), change[:-1], change[-1])) == [(place, rule)]


@pytest.mark.parametrize("value", [math.nan, math.inf, -math.inf])
def test_what_is_no_finite_number_is_refused(value: float) -> None:
    place = ("load_cases", 0, "gravity")
    assert refusal(lambda: set_value(project(), place, value)) == [("load_cases[0].gravity", "not_finite")]


def test_what_breaks_the_project_as_a_whole_is_refused() -> None:
    tube = TubeSection(outer=0.02, inner=0.03)
    assert refusal(lambda: set_value(project(), ("segments", 0, "section"), tube)) == [
        ("segments[0].section.inner", "inner_not_below_outer")
    ]
    assert refusal(lambda: set_value(project(), ("segments", 0, "material"), "Oak")) == [
        ("segments[0].material", "unknown_reference")
    ]


@given(st.data())
def test_any_value_anywhere_is_taken_or_refused_and_what_is_taken_is_well_formed(data: st.DataObject) -> None:
    place = data.draw(st.sampled_from([p for p in places(example()) if p and p[-1] not in ("shape", "kind")]))
    try:
        edited = set_value(project(), place, data.draw(JSON))
    except EditError as error:
        faults = error.faults
        assert faults
    else:
        assert parse(dump(edited)) == edited


@pytest.mark.parametrize(
    "place", [("segments", 0, "lenght"), ("joints", 0, "support", "stiffness"), ("titel",)]
)
def test_a_place_that_does_not_exist_is_a_fault_of_ours(place: Place) -> None:
    with pytest.raises(KeyError):
        set_value(project(), place, 1.0)


# --- lists ---


def test_records_are_added_and_removed() -> None:
    materials = ("materials",)
    fresh = edits.add_record(project(), materials, {"name": "Oak", "modulus": 1e10})
    fresh = edits.add_record(fresh, materials, {"name": "Brass", "modulus": 1e11}, 0)
    assert names(fresh) == ["Brass", "Steel", "Oak"]
    assert dump(edits.remove_records(fresh, materials, [0, 2])) == encoded(example())


def names(edited: Project) -> list[str]:
    return [material.name for material in edited.materials]


def test_a_material_in_use_is_not_removed() -> None:
    assert refusal(lambda: edits.remove_records(project(), ("materials",), [0])) == [
        ("segments[0].material", "unknown_reference"),
        ("segments[1].material", "unknown_reference"),
    ]


def test_a_limit_is_put_into_a_project_that_has_none() -> None:
    fresh = edits.add_record(project(without("limits")), ("limits", "reaction"), {"joint": "0", "limit": 1.0})
    assert document_of(fresh)["limits"] == {"reaction": [{"joint": "0", "limit": 1.0}]}
    assert parse(dump(fresh)) == fresh


# --- names ---


@pytest.mark.parametrize(
    ("rename", "place", "old"),
    [
        (edits.rename_segment, ("segments", 0, "mark"), "A"),
        (edits.rename_joint, ("joints", 0, "mark"), "0"),
        (edits.rename_joint, ("joints", 2, "mark"), "2"),
        (edits.rename_material, ("materials", 0, "name"), "Steel"),
        (edits.rename_case, ("load_cases", 0, "name"), "Dead"),
        (edits.rename_combination, ("combinations", 0, "name"), "Working"),
    ],
)
def test_a_name_takes_every_reference_along(
    rename: Callable[[Project, str, str], Project], place: Place, old: str
) -> None:
    """In the text each of these names stands for one thing only, so replacing it there is the other road."""
    text = encoded(example()).decode().replace(f'"{old}"', '"new name"')
    assert dump(rename(project(), old, "new name")).decode() == text
    assert dump(set_value(project(), place, "new name")).decode() == text
    assert dump(rename(rename(project(), old, "new name"), "new name", old)) == encoded(example())


def test_what_was_never_written_stays_unwritten_in_a_renaming() -> None:
    document = without("limits")
    del document["load_cases"], document["combinations"]
    renamed = document | {"joints": [document["joints"][0] | {"mark": "x"}, *document["joints"][1:]]}
    assert dump(edits.rename_joint(project(document), "0", "x")) == encoded(renamed)


@pytest.mark.parametrize(
    ("place", "new", "fault"),
    [
        (("segments", 1, "mark"), "A", ("segments[1].mark", "duplicate_mark")),
        (("joints", 1, "mark"), "", ("joints[1].mark", "empty_text")),
        (("materials", 0, "name"), "\ud800", ("materials[0].name", "not_utf8")),
        (("load_cases", 1, "name"), "Dead", ("load_cases[1].name", "duplicate_mark")),
        (("combinations", 0, "name"), 5, ("combinations[0].name", "wrong_type")),
    ],
)
def test_a_name_that_cannot_be_is_refused(place: Place, new: Any, fault: tuple[str, str]) -> None:
    assert fault in refusal(lambda: set_value(project(), place, new))


# --- loads, cases, factors ---


def test_a_load_is_set_in_its_record_or_in_a_new_one() -> None:
    fresh = edits.set_segment_load(project(), "Service", "A", "load_end", 7.0)
    place = ("load_cases", 1, "segment_loads", 0, "load_end")
    assert dump(fresh) == encoded(changed(*place, 7.0))
    fresh = edits.set_segment_load(project(), "Dead", "B", "temperature_start", 20.0)
    assert document_of(fresh)["load_cases"][0]["segment_loads"] == [
        {"segment": "B", "temperature_start": 20.0}
    ]
    fresh = edits.set_joint_load(fresh, "Dead", "2", "force", -5.0)
    assert document_of(fresh)["load_cases"][0]["joint_loads"] == [{"joint": "2", "force": -5.0}]


def test_a_record_goes_with_its_last_value() -> None:
    fresh = edits.set_joint_load(project(), "Dead", "2", "force", 5.0)
    fresh = edits.set_joint_load(fresh, "Dead", "2", "movement", 0.001)
    fresh = edits.set_joint_load(fresh, "Dead", "2", "force", UNSET)
    assert document_of(fresh)["load_cases"][0]["joint_loads"] == [{"joint": "2", "movement": 0.001}]
    fresh = edits.set_joint_load(fresh, "Dead", "2", "movement", UNSET)
    assert dump(fresh) == encoded(example())
    assert edits.set_joint_load(fresh, "Dead", "2", "movement", UNSET) is fresh


def test_a_cell_of_several_records_is_not_set() -> None:
    loads = [
        {"segment": "A", "load_start": 10.0},
        {"segment": "B", "load_start": 99.0},
        {"segment": "A", "load_start": 1.0, "load_end": 5.0},
    ]
    loaded = project(changed("load_cases", 0, "segment_loads", loads))
    assert refusal(lambda: edits.set_segment_load(loaded, "Dead", "A", "load_end", 1.0)) == [
        ("load_cases[0].segment_loads", "several_records")
    ]


def test_a_case_goes_with_its_factors() -> None:
    fresh = edits.add_record(project(), ("load_cases",), {"name": "Wind"})
    fresh = edits.set_factor(fresh, "Idle", "Wind", 1.5)
    assert document_of(fresh)["combinations"][1]["factors"] == {"Wind": 1.5}
    assert dump(edits.remove_case(fresh, "Wind")) == encoded(example())
    factors = document_of(edits.remove_case(project(), "Dead"))["combinations"][0]["factors"]
    assert factors == {"Service": 1.0}


def test_a_factor_is_set_or_taken_out() -> None:
    assert document_of(edits.set_factor(project(), "Idle", "Dead", 0.5))["combinations"][1]["factors"] == {
        "Dead": 0.5
    }
    assert "Dead" not in edits.set_factor(project(), "Working", "Dead", UNSET).combinations[0].factors


def test_a_record_kept_from_a_sound_project_is_not_looked_at_again_and_a_new_one_is():
    from msgspec import structs

    from app.edits.checking import EditError, checked
    from app.samples import read_sample

    old = read_sample("tie_rod")
    bad = structs.replace(old.segments[2], length=-1.0)
    new = structs.replace(old, segments=(*old.segments[:2], bad, *old.segments[3:]))
    with pytest.raises(EditError) as since:
        checked(new, old)
    with pytest.raises(EditError) as whole:
        checked(new)
    assert since.value.faults == whole.value.faults
    again = structs.replace(old, segments=(*old.segments[:2], old.segments[2], *old.segments[3:]))
    assert checked(again, old) is again


@pytest.mark.parametrize("sound", [True, False])
def test_a_value_within_a_segment_is_judged_as_in_the_whole_project(sound):
    from app import edits
    from app.edits import EditError
    from app.samples import read_sample
    from solver.model import TubeSection

    project = read_sample("tie_rod")
    tube = TubeSection(outer=0.05, inner=0.04 if sound else 0.06)
    if sound:
        assert edits.set_value(project, ("segments", 2, "section"), tube).segments[2].section == tube
        return
    with pytest.raises(EditError) as error:
        edits.set_value(project, ("segments", 2, "section"), tube)
    assert error.value.faults[0].place.startswith("segments[2].section")
