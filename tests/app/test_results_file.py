"""The results file: its keys in its order to the letter, strict JSON, and the numbers of the results."""

from __future__ import annotations

import json
from collections.abc import Iterator
from typing import Any

import numpy as np
import pytest
from hypothesis import given, settings
from msgspec import structs

from app.phrases import reason_text
from app.project_file import parse, sha256
from app.results_file import results_json
from app.samples import names, read_sample
from app.version import PROGRAM
from solver.model import FixedSupport, JointLoad, Project
from solver.results import Results
from solver.solve import solve
from tests.documents import encoded, example
from tests.members import Part, area, case, member
from tests.strategies import projects

TOP = ["format", "version", "title", "program", "project_sha256", "verdict", "governing", "checks",
       "combinations"]  # fmt: skip
STATE = ["name", "joints", "segments", "equilibrium", "energy", "error_bound", "stability"]
JOINT = ["mark", "position", "displacement", "reaction"]
SEGMENT = ["mark", "force_start", "force_end", "force_max", "force_min", "stress_max", "stress_max_at",
           "stress_min", "stress_min_at", "utilisation", "utilisation_at", "force_bound"]  # fmt: skip
EQUILIBRIUM = ["loads", "reactions", "bedding", "residual"]
CHECK = ["check", "combination", "segment", "joint", "from", "to", "position", "value", "limit",
         "utilisation", "status", "reason", "waiver"]  # fmt: skip
WHAT = {"tension": ["segment"], "compression": ["segment"], "displacement": ["joint"], "reaction": ["joint"],
        "relative": ["from", "to"], "stability": []}  # fmt: skip


def solved(project: Project) -> tuple[Results, Any]:
    """The results and what a reader of the file gets."""
    results = solve(project)
    text = json.dumps(results_json(results), allow_nan=False, ensure_ascii=False)
    return results, json.loads(text)


def plain_example() -> Project:
    """The example without its stop."""
    document = example()
    document["joints"][1] = {"mark": "1"}
    return parse(encoded(document))


def checks_of(file: Any) -> Iterator[Any]:
    yield from file["checks"]
    if file["governing"] is not None:
        yield file["governing"]


@settings(max_examples=20)
@given(projects(max_segments=3))
def test_keys_stand_in_the_order_of_the_format(project: Project) -> None:
    _, file = solved(project)
    assert list(file) == TOP
    for check in checks_of(file):
        assert list(check) == [key for key in CHECK if key in check]
        assert None not in check.values()
        assert [key for key in CHECK[2:6] if key in check] == WHAT[check["check"]]
        unmade = check["status"] in ("not_made", "waived")
        assert ("reason" in check) == unmade
        assert ("waiver" in check) == (check["status"] == "waived")
        assert ("utilisation" in check) != unmade
    for state in file["combinations"]:
        assert list(state) == STATE
        assert all(list(joint) == JOINT for joint in state["joints"])
        assert all(list(segment) == SEGMENT for segment in state["segments"])
        assert list(state["equilibrium"]) == EQUILIBRIUM
        assert list(state["energy"]) == ["strain", "potential"]


def test_the_head_says_what_was_computed_and_by_whom() -> None:
    project = plain_example()
    _, file = solved(project)
    assert (file["format"], file["version"]) == ("barwright-results", 1)
    assert file["title"] == project.title
    assert file["program"] == PROGRAM == "barwright 0.1.0"
    assert file["project_sha256"] == sha256(project)


@pytest.mark.parametrize("name", names())
def test_every_number_is_that_of_the_results(name: str) -> None:
    results, file = solved(read_sample(name))
    assert len(file["combinations"]) == sum(state.checked for state in results.states)
    for index, state in enumerate(file["combinations"]):
        assert state["name"] == results.states[index].name
        solution, segments = results.solution, results.segments
        same(state["joints"], "position", results.position)
        same(state["joints"], "displacement", solution.joint_displacement[index])
        same(state["joints"], "reaction", solution.reaction[index])
        for key in SEGMENT[1:]:
            same(state["segments"], key, getattr(segments, key)[index])
        assert state["error_bound"] == solution.error_bound[index]
        assert state["energy"]["strain"] == solution.strain_energy[index]
        assert state["energy"]["potential"] == solution.potential[index]
        balance = state["equilibrium"]
        rest = balance["loads"] + balance["reactions"] + balance["bedding"] - balance["residual"]
        largest = max(abs(force) for force in balance.values())
        assert abs(rest) <= 1e-12 * largest  # four roundings of sums of a few dozen terms


def same(rows: list[Any], key: str, expected: Any) -> None:
    found = np.array([np.nan if row[key] is None else row[key] for row in rows])
    np.testing.assert_array_equal(found, expected)


def test_a_reaction_is_null_where_nothing_supports() -> None:
    _, file = solved(plain_example())
    reactions = [joint["reaction"] for joint in file["combinations"][0]["joints"]]
    assert [reaction is None for reaction in reactions] == [False, True, False]


def test_a_check_that_was_not_made_says_why() -> None:
    pulled = member(
        [Part(1.0, area(1e-3))], {0: FixedSupport()}, [case("Pull", on_joints=[JointLoad("1", force=1e3)])]
    )
    _, file = solved(pulled)
    (check,) = file["checks"]
    assert (check["check"], check["segment"], check["status"]) == ("tension", "A", "not_made")
    assert check["reason"] == reason_text("no_allowable_tension")
    assert (file["verdict"], file["governing"]) == ("incomplete", None)
    (segment,) = file["combinations"][0]["segments"]
    assert segment["utilisation"] is segment["utilisation_at"] is None


def test_only_what_is_checked_is_in_the_file() -> None:
    project = plain_example()
    assert names_in(project) == ["Working", "Idle"]
    assert names_in(structs.replace(project, combinations=())) == ["Dead", "Service"]
    assert names_in(structs.replace(project, combinations=(), load_cases=())) == ["Unloaded"]


def names_in(project: Project) -> list[str]:
    return [state["name"] for state in solved(project)[1]["combinations"]]


def test_a_zero_has_no_sign() -> None:
    text = json.dumps(solved(member([Part(1.0, area(1e-3))], {0: FixedSupport()}))[1])
    assert "-0.0" not in text


def test_companions_have_a_list_of_their_own():
    document = example()
    tube = {"mark": "T", "length": 0.85, "material": "Steel", "section": {"shape": "area", "area": 1e-3}}
    tie = {"mark": "Tie", "from": "0", "to": "2", "acts": "tension", "segments": [tube]}
    sleeve = {"mark": "Sleeve", "from": "0", "to": "2", "segments": [tube | {"mark": "U"}]}
    document["joints"][1] = {"mark": "1"}
    document["companions"] = [tie, sleeve]
    results, file = solved(parse(encoded(document)))
    combination = file["combinations"][0]
    one, other = combination["companions"]
    assert (one["mark"], other["mark"]) == ("Tie", "Sleeve")
    assert (one["separated"], one["gap"] == 0.0) in ((False, True), (True, False))
    assert "separated" not in other
    assert other["force_from"] == pytest.approx(results.companions.force_from[0, 1])
    assert [segment["mark"] for segment in other["segments"]] == ["U"]
    assert set(other["segments"][0]) == set(combination["segments"][0])
    assert {"T", "U"} & {check.get("segment") for check in file["checks"]}


def test_contacts_stand_at_their_joint_as_one_or_as_a_list():
    document = example()
    document["joints"][1] = {"mark": "1", "support": {"kind": "stop", "side": "plus", "clearance": 0.5}}
    soft = {"kind": "stop", "side": "minus", "clearance": 0.25, "stiffness": 1e8}
    document["joints"][2] = {"mark": "2", "supports": [{"kind": "spring", "stiffness": 4e7}, soft]}
    _results, file = solved(parse(encoded(document)))
    joints = file["combinations"][0]["joints"]
    assert "contact" not in joints[0]
    assert joints[1]["contact"] == "open"
    assert joints[1]["clearance"] == pytest.approx(0.5, rel=0.05)
    assert joints[1]["reaction"] == 0.0
    assert joints[2]["contact"] == [None, "open"]
    assert joints[2]["clearance"] == [None, pytest.approx(0.25, rel=0.05)]
    assert joints[2]["support_forces"] == [joints[2]["reaction"], 0.0]
