"""Long names are cut for the sheet, each to a name of its own, everywhere at once."""

from __future__ import annotations

from hypothesis import given
from hypothesis import strategies as st

from app.edits import rename_combination, rename_segment
from app.samples import read_sample
from app.sheet.short_names import LONGEST, LONGEST_MARK, distinct, with_short_names
from solver.solve import solve


@given(st.lists(st.text(min_size=1), unique=True, max_size=8), st.integers(10, 30))
def test_cut_names_stay_apart(names: list[str], length: int) -> None:
    shown = distinct(names, length)
    assert len(set(shown.values())) == len(names)
    assert all(len(short) <= length for short in shown.values())


def test_short_names_leave_the_results_alone() -> None:
    results = solve(read_sample("tie_rod"))
    assert with_short_names(results) is results


def test_a_long_name_is_cut_in_project_states_and_checks_alike() -> None:
    project = read_sample("tie_rod")
    project = rename_segment(project, "D", "D" * 500)
    project = rename_combination(project, "Storm surge", "S" * 500)
    shown = with_short_names(solve(project))
    marks = {segment.mark for segment in shown.project.segments}
    names = {state.name for state in shown.states}
    assert "D" * (LONGEST_MARK - 1) + "…" in marks
    assert "S" * (LONGEST - 1) + "…" in names
    assert {check.segment for check in shown.checks} <= marks | {None}
    assert {check.combination for check in shown.checks} <= names
    assert shown.governing in shown.checks
