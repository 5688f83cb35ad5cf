"""Which results the sheet shows, and what it says instead of them.

A load case alone has none where only stops hold the member and its loads do not press it against them. Then
nothing is shown rather than the curves of something else.
"""

from __future__ import annotations

from app.shown import Shown
from app.words import tr
from solver.results import Results


def results_to_show(results: Results | None, shown: Shown, *, current: bool) -> Results | None:
    """The results; none where they are of this member and do not have the state that is looked at."""
    return None if current and has_none_of(results, shown) else results


def has_none_of(results: Results | None, shown: Shown) -> bool:
    """Whether there are results, but none of the single state that is looked at."""
    if results is None or shown.kind == "envelope":
        return False
    return all((state.kind, state.name) != (shown.kind, shown.name) for state in results.states)


def notice_words(results: Results | None, shown: Shown, *, current: bool, waiting: bool, drawn: bool) -> str:
    """Why the strips show nothing, or that they are out of date; else empty."""
    if waiting:
        return tr("Solving…")
    if results is None:
        return tr("No results yet: the findings say what is missing.") if drawn else ""
    if current and has_none_of(results, shown):
        words = tr("No results of {case} alone: its loads do not press the member against the stops.")
        return words.format(case=shown.name)
    return "" if current else tr("out of date")
