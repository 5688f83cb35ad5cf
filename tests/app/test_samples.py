"""The packaged samples: canonical, solvable, and together showing all that a project can hold."""

from __future__ import annotations

import json

import pytest

from app import samples
from app.project_file import dump
from solver.model import Project
from solver.outcomes import support_outcomes
from solver.solve import solve

VERDICTS = {
    "hoist_shaft": "pass",
    "capstan_shaft": "pass",
    "loft_column": "pass",
    "tie_rod": "fail",
    "quay_pile": "pass",
}


@pytest.fixture(scope="module")
def projects() -> dict[str, Project]:
    return {name: samples.read_sample(name) for name in samples.names()}


def kinds(value: object) -> set[str]:
    """Every key, and every kind and shape, that stands in plain values."""
    if isinstance(value, dict):
        tags = {str(value[tag]) for tag in ("kind", "shape") if tag in value}
        return tags.union(value, *map(kinds, value.values()))
    if isinstance(value, list):
        return set().union(*map(kinds, value))
    return set()


def test_the_first_comes_first_and_the_others_by_alphabet() -> None:
    assert samples.names() == ("hoist_shaft", *sorted({*VERDICTS} - {"hoist_shaft"}))
    assert samples.sample_path() == samples.sample_path("hoist_shaft")


@pytest.mark.parametrize("name", ["", "missing", "../pyproject", "hoist_shaft.barwright.json"])
def test_an_unknown_name_is_an_error(name: str) -> None:
    with pytest.raises(KeyError):
        samples.sample_path(name)


@pytest.mark.parametrize("name", VERDICTS)
def test_saving_writes_the_same_bytes(name: str, projects: dict[str, Project]) -> None:
    assert dump(projects[name]) == samples.sample_path(name).read_bytes()


@pytest.mark.parametrize(("name", "verdict"), VERDICTS.items())
def test_one_fails_on_purpose_and_the_others_pass(
    name: str, verdict: str, projects: dict[str, Project]
) -> None:
    results = solve(projects[name])
    assert results.verdict == verdict
    assert all(check.status != "not_made" for check in results.checks)
    assert results.solution.error_bound.max() <= 1e-9


def test_the_failing_one_fails_where_its_notes_say(projects: dict[str, Project]) -> None:
    failed = [check for check in solve(projects["tie_rod"]).checks if check.status == "fail"]
    assert {(check.segment, check.combination) for check in failed} == {
        ("D", "Storm surge"),
        ("F", "Storm surge"),
    }
    assert all(1.0 < (check.utilisation or 0.0) < 1.1 for check in failed)


def test_each_state_of_the_passing_ones_uses_what_it_has(projects: dict[str, Project]) -> None:
    """Real sizes: what governs lies between a third and the whole of what is allowed."""
    for name in (name for name, verdict in VERDICTS.items() if verdict == "pass"):
        governing = solve(projects[name]).governing
        assert governing is not None
        assert 1 / 3 < (governing.utilisation or 0.0) < 1.0


def test_together_they_show_everything() -> None:
    shown = set().union(*(kinds(json.loads(samples.sample_path(name).read_bytes())) for name in VERDICTS))
    assert {"round", "tube", "rectangle", "area", "fixed", "spring"} <= shown
    assert {"diameter_end", "outer_end", "inner_end", "depth_end", "second_moment"} <= shown
    assert {"load_start", "load_end", "temperature_start", "temperature_end", "lack_of_fit"} <= shown
    assert {"gravity", "force", "movement", "bedding", "bedding_end", "allowable_factor"} <= shown
    assert {"displacement", "relative", "reaction"} <= shown
    assert {"bonded", "lateral", "translation", "rotation", "stability_factor"} <= shown
    assert {"stop", "side", "clearance", "fillet_radius", "factor", "allowable_peak"} <= shown
    assert {"companions", "acts", "waived"} <= shown


def test_the_float_of_the_capstan_s_shaft_is_used_up_only_where_it_runs_warm(
    projects: dict[str, Project],
) -> None:
    results = solve(projects["capstan_shaft"])
    names = ("Drawn tight", "Hauling, cold", "Hauling, warm", "Paying out, warm")
    found = [support_outcomes(results, results.state_index(name), 4)[0].contact for name in names]
    assert found == ["open", "open", "closed", "closed"]


def test_the_shaft_is_what_the_benchmarks_take(projects: dict[str, Project]) -> None:
    shaft = projects["hoist_shaft"]
    assert len(shaft.segments) == 12
    assert len(shaft.combinations) == 3
    sections = json.loads(samples.sample_path("hoist_shaft").read_bytes())["segments"]
    tapering = [segment for segment in sections if kinds(segment) & {"diameter_end", "outer_end"}]
    assert len(tapering) == 3


def test_each_shows_another_unit_system_and_one_stands_upright(projects: dict[str, Project]) -> None:
    assert len({project.display.unit_system for project in projects.values()}) == 3
    assert {project.display.layout for project in projects.values()} == {"horizontal", "vertical"}
