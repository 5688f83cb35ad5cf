"""What a solve gives the window: results with their findings, or the sentences on why there are none.

`compute` runs in the solver's thread and touches nothing but its arguments. What cannot be computed for a
reason in the input is an outcome like any other; what else escapes is a fault of ours and stays an exception.
"""

from __future__ import annotations

import time
from collections.abc import Callable, Sequence
from dataclasses import dataclass
from typing import TYPE_CHECKING

import numpy as np

from app.beside import beside
from app.gui.shown_results import results_to_show
from app.gui.tables.column import Figures
from app.gui.view import Shown
from app.phrases.contacts import contact_texts
from solver.arrays import FloatArray
from solver.checks import STRESSES
from solver.errors import InputError
from solver.model import Project
from solver.results import Results

if TYPE_CHECKING:
    from app.findings import Findings


@dataclass(frozen=True, slots=True)
class Outcome:
    """The project that was solved, with what came of it; `problems` say why there are no results."""

    project: Project
    results: Results | None
    findings: Findings | None
    problems: tuple[str, ...]
    seconds: float
    wording: float = 0.0  # seconds of work that the findings took to word

    @property
    def is_worded(self) -> bool:
        """Whether results come with their findings, where there are results."""
        return self.results is None or self.findings is not None


@dataclass(frozen=True, slots=True)
class Wanted:
    """A project to solve; not `worded`, its results alone are wanted, while a number is still moving."""

    project: Project
    worded: bool = True


def answer(wanted: Wanted, cancelled: Callable[[], bool]) -> Outcome:
    """What is wanted, for the solver's thread."""
    return compute(wanted.project, cancelled, worded=wanted.worded)


def compute(project: Project, cancelled: Callable[[], bool], *, worded: bool = True) -> Outcome:
    """Solve the project and word its findings, if wanted. Raises Cancelled."""
    from app.findings import findings
    from app.phrases import error_sentences
    from solver.solve import solve

    start = time.perf_counter()
    try:
        results = solve(project, cancelled=cancelled)
    except InputError as error:
        sentences = error_sentences(error, project=project, system=project.display.unit_system)
        return Outcome(project, None, None, sentences, time.perf_counter() - start)
    seconds, begun = time.perf_counter() - start, time.thread_time()
    found = findings(results, project.display.unit_system) if worded else None
    return Outcome(project, results, found, (), seconds, time.thread_time() - begun)


def narrow_of(outcome: Outcome) -> Callable[[str], Findings] | None:
    """What gives the findings of one combination; None where there are none."""
    results, found = outcome.results, outcome.findings
    if results is None or found is None:
        return None

    def narrow(state: str) -> Findings:
        from app.findings import findings_in

        return findings_in(found, results, state, results.project.display.unit_system)

    return narrow


def shown_states(project: Project) -> tuple[Shown, ...]:
    """What the strips can show: the envelope where several states are checked, then each state."""
    combinations = [Shown("combination", combination.name) for combination in project.combinations]
    cases = [Shown("case", case.name) for case in project.load_cases]
    checked = combinations or cases
    envelope = [Shown("envelope")] if len(checked) > 1 else []
    return (*envelope, *combinations, *cases) or (Shown("unloaded", "Unloaded"),)


def first_shown(project: Project) -> Shown:
    """What is looked at until another is chosen: the first single state, since it has loads to draw."""
    return next(state for state in shown_states(project) if state.kind != "envelope")


def still_shown(shown: Shown, old: Project, new: Project) -> Shown:
    """The same state in `new`, also where it was renamed; the first single one where it is gone."""
    before, after = shown_states(old), shown_states(new)
    if shown in after:
        return shown
    if shown in before and len(before) == len(after) and after[before.index(shown)].kind == shown.kind:
        return after[before.index(shown)]
    return first_shown(new)


def governing(results: Results) -> Shown:
    """The state with the largest utilisation; the first single one where nothing was checked."""
    made = [check for check in results.checks if check.utilisation is not None]
    worst = max(made, key=lambda check: check.utilisation or 0.0, default=None)
    kind = next((state.kind for state in results.states if state.checked), None)
    if worst is None or kind is None:
        return first_shown(results.project)
    return Shown(kind, worst.combination)


def figures_of(results: Results | None, shown: Shown, *, current: bool) -> Figures:
    """What the tables show of the results of the shown state."""
    results = results_to_show(results, shown, current=current)
    if results is None:
        return Figures(current=current)
    state = None if shown.kind == "envelope" else _index(results, shown)
    utilisation, governs = _utilisation(results, state, [s.mark for s in results.project.segments])
    nothing: FloatArray = np.zeros(0)
    return Figures(
        utilisation=utilisation,
        governs=governs,
        checked=state is None or results.states[state].checked,
        displacement=nothing if state is None else results.solution.joint_displacement[state],
        reaction=nothing if state is None else results.solution.reaction[state],
        contacts=() if state is None else contact_texts(results, state),
        mass=results.mass,
        segment_mass=results.segment_mass,
        force=_between(results, state, results.segments.force_min, results.segments.force_max),
        stress=_between(results, state, results.segments.stress_min, results.segments.stress_max),
        current=current,
        beside=_beside(results, state, current=current),
    )


def _beside(results: Results, state: int | None, *, current: bool) -> Figures | None:
    """The same of the companions' segments."""
    found = results.companions
    if found is None:
        return None
    utilisation, governs = _utilisation(results, state, [of.segment.mark for of in beside(results.project)])
    return Figures(
        utilisation=utilisation,
        governs=governs,
        checked=state is None or results.states[state].checked,
        segment_mass=found.segment_mass,
        force=_between(results, state, found.segments.force_min, found.segments.force_max),
        stress=_between(results, state, found.segments.stress_min, found.segments.stress_max),
        current=current,
    )


def _between(results: Results, state: int | None, least: FloatArray, most: FloatArray) -> FloatArray:
    """The least and the largest of each segment (n, 2) in the state, or over the checked ones."""
    states = [i for i, one in enumerate(results.states) if one.checked] if state is None else [state]
    return np.column_stack((least[states].min(axis=0), most[states].max(axis=0)))


def _index(results: Results, shown: Shown) -> int | None:
    """The shown state's index; None where these results (of an earlier edit) do not have it."""
    try:
        return results.state_index(shown.name, None if shown.kind == "envelope" else shown.kind)
    except KeyError:
        return None


def _utilisation(results: Results, state: int | None, marks: Sequence[str]) -> tuple[FloatArray, FloatArray]:
    """The largest utilisation of each segment over the made checks of stress, and the sign of that stress."""
    name = None if state is None else results.states[state].name
    found = np.full(len(marks), np.nan)
    signs = np.zeros(len(marks))
    if state is not None and not results.states[state].checked:
        return found, signs
    place = {mark: index for index, mark in enumerate(marks)}
    for check in results.checks:
        if check.check not in STRESSES or check.utilisation is None or name not in (None, check.combination):
            continue
        index = place.get(str(check.segment))
        if index is None:  # of the member where the companions are asked for, and the other way round
            continue
        if not check.utilisation <= found[index]:  # also where nothing was found yet
            found[index] = check.utilisation
            signs[index] = 1.0 if check.check == "tension" else -1.0
    return found, signs


def largest_bound(results: Results) -> float:
    """The largest numerical error over the checked states, relative, displacement in the energy norm."""
    checked = [index for index, state in enumerate(results.states) if state.checked]
    return float(results.solution.error_bound[checked].max())
