"""What a solve gives the window: figures, states, problems."""

import numpy as np
import pytest

from app import edits, samples
from app.gui.outcome import (
    compute,
    figures_of,
    first_shown,
    governing,
    largest_bound,
    shown_states,
    still_shown,
)
from app.gui.tables.column import Figures
from app.gui.tables.segment_figures import utilisation, why_no_utilisation
from app.gui.view import Shown
from solver.errors import Cancelled
from solver.model import Combination, FixedSupport, JointLoad, SpringSupport
from tests.members import Part, case, member, round_bar


def never():
    return False


@pytest.fixture(scope="module")
def outcome():
    return compute(samples.read_sample(), never)


def test_figures_of_a_state_are_the_solvers_own(outcome):
    results = outcome.results
    name = results.states[0].name
    figures = figures_of(results, Shown("combination", name), current=True)
    np.testing.assert_array_equal(figures.displacement, results.solution.joint_displacement[0])
    # Two roads: the largest over the checks here, over the length in the solver; 1e-12 is rounding.
    np.testing.assert_allclose(figures.utilisation, results.segments.utilisation[0], rtol=1e-12)


def test_figures_of_the_envelope_are_the_largest_over_the_checked_states(outcome):
    results = outcome.results
    checked = [i for i, state in enumerate(results.states) if state.checked]
    figures = figures_of(results, Shown("envelope"), current=True)
    largest = np.nanmax(results.segments.utilisation[checked], axis=0)
    np.testing.assert_allclose(figures.utilisation, largest, rtol=1e-12)
    assert figures.displacement.size == 0, "an envelope is no state, so it has no reactions in equilibrium"


def test_where_no_check_was_made_the_table_says_so_and_why():
    figures = Figures(utilisation=np.array([0.0, np.nan]))
    assert [utilisation(i, figures, None) for i in (0, 1, 2)] == ["0.00", "–", ""]
    assert why_no_utilisation(0, figures) == ""
    assert "no allowable" in why_no_utilisation(1, figures)
    unchecked = Figures(utilisation=np.array([np.nan]), checked=False)
    assert why_no_utilisation(0, unchecked).startswith("not checked")


def test_a_case_that_is_not_checked_has_no_utilisation(outcome):
    name = outcome.results.project.load_cases[0].name
    figures = figures_of(outcome.results, Shown("case", name), current=True)
    assert np.isnan(figures.utilisation).all()
    assert figures.displacement.size == len(outcome.results.project.joints)


def test_the_sign_is_that_of_the_stress_that_governs(outcome):
    results = outcome.results
    figures = figures_of(results, Shown("envelope"), current=True)
    worst = max((c for c in results.checks if c.segment), key=lambda c: c.utilisation or 0)
    index = [segment.mark for segment in results.project.segments].index(worst.segment)
    assert figures.governs[index] == (1 if worst.check == "tension" else -1)


def test_a_member_that_is_not_held_has_problems_and_no_results():
    loose = member([Part(1.0, round_bar(0.04))], {}, [case("Dead")])
    outcome = compute(loose, never)
    assert outcome.results is None
    assert outcome.problems
    assert figures_of(None, Shown("envelope"), current=False).mass is None


def test_a_joint_that_does_not_balance_is_named_by_its_mark():
    push = case("Push", on_joints=[JointLoad(joint="1", force=1.0)])
    hardly_held = member([Part(1.0, round_bar(0.04))], {0: SpringSupport(stiffness=1e-9)}, [push])
    assert "left over at joint 1)" in compute(hardly_held, never).problems[0]


def test_a_cancelled_solve_says_so():
    with pytest.raises(Cancelled):
        compute(samples.read_sample(), lambda: True)


def test_states_are_envelope_combinations_cases_or_unloaded():
    bar = [Part(1.0, round_bar(0.04))]
    held = {0: FixedSupport()}
    bare = member(bar, held)
    assert shown_states(bare) == (Shown("unloaded", "Unloaded"),)
    one = member(bar, held, [case("Dead")])
    assert shown_states(one) == (Shown("case", "Dead"),)
    two = member(bar, held, [case("Dead"), case("Live")])
    assert shown_states(two)[0] == Shown("envelope")
    combined = edits.set_value(two, ("combinations",), [Combination("Working", {"Dead": 1.0})])
    assert shown_states(combined)[0] == Shown("combination", "Working")
    assert first_shown(two) == Shown("case", "Dead"), "an envelope draws no loads"


def test_what_is_looked_at_stays_through_other_edits_and_renaming():
    cases = [case("Dead"), case("Live")]
    combinations = [Combination("Live", {"Live": 1.0}), Combination("Both", {"Dead": 1.0, "Live": 1.0})]
    project = member([Part(1.0, round_bar(0.04))], {0: FixedSupport()}, cases, combinations)
    renamed = edits.rename_combination(project, "Live", "Working")
    assert still_shown(Shown("case", "Live"), project, renamed) == Shown("case", "Live")
    assert still_shown(Shown("combination", "Live"), project, renamed) == Shown("combination", "Working")
    assert still_shown(Shown("combination", "Working"), renamed, project) == Shown("combination", "Live")
    assert still_shown(Shown("envelope"), project, renamed) == Shown("envelope")
    fewer = edits.remove_records(project, ("combinations",), [1])
    assert still_shown(Shown("combination", "Both"), project, fewer) == Shown("combination", "Live")
    assert still_shown(Shown("combination", "Live"), project, fewer) == Shown("combination", "Live")


def test_the_governing_state_has_the_largest_utilisation(outcome):
    results = outcome.results
    worst = max(
        (i for i, state in enumerate(results.states) if state.checked),
        key=lambda i: np.nanmax(results.segments.utilisation[i]),
    )
    assert governing(results) == Shown("combination", results.states[worst].name)


def test_without_any_check_the_first_single_state_stands_for_the_governing_one():
    loads = [case("Dead", gravity=9.81), case("Live")]
    bare = member([Part(1.0, round_bar(0.04), density=7850.0)], {0: FixedSupport()}, loads)
    assert governing(compute(bare, never).results) == Shown("case", "Dead")


def test_the_largest_bound_is_over_checked_states(outcome):
    assert 0 < largest_bound(outcome.results) < 1e-9
