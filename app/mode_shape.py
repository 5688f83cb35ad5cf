"""What is said of a mode shape: that it is a shape only, of which critical load, or why there is none.

The same on screen, in copied numbers and in pictures, so that a shape is never taken for a movement.
"""

from __future__ import annotations

from app.phrases.stability import REASONS, factor_text, factor_texts
from app.words import tr
from solver.results import Results
from solver.stability import Stability

BETWEEN = " · "


def shape_notes(results: Results, state: int | None) -> tuple[str, ...]:
    """What to know of the shape, or why there is none, and the same in fewer words."""
    why = why_no_shape(results, state)
    if why:
        return why, tr("no mode shape")
    found = None if state is None else results.stability[state]
    if state is None or found is None or found.critical_factor is None:
        return ()
    only = tr("shape only")
    factor = _factor(results, results.states[state].name, found.critical_factor)
    load = tr("elastic critical load: loads × {factor}, not a design resistance").format(factor=factor)
    whole = BETWEEN.join([only, load])
    if found.reason is None:
        return whole, BETWEEN.join([only, tr("elastic, loads × {factor}").format(factor=factor)]), only
    unchecked = BETWEEN.join([only, tr("stability not checked")])
    return BETWEEN.join([whole, _not_checked(found)]), unchecked


def _factor(results: Results, state: str, factor: float) -> str:
    """The critical factor as findings write it, never on the other side of the required one."""
    check = next((c for c in results.checks if c.check == "stability" and c.combination == state), None)
    if check is None or check.limit is None:
        return factor_text(factor)
    return factor_texts(factor, check.limit, check.status)[0]


def why_no_shape(results: Results, state: int | None) -> str:
    """Why there is none; empty where there is one."""
    if state is None:
        return tr("no mode shape of an envelope, only of a single combination")
    found = results.stability[state]
    if found is None:
        return tr("no mode shape: this state is not checked")
    if found.mode is not None:
        return ""
    if found.status == "no_compression":
        return tr("no mode shape: nothing is compressed")
    return tr("no mode shape") + BETWEEN + _not_checked(found)


def _not_checked(found: Stability) -> str:
    reason = tr(REASONS[found.reason]) if found.reason is not None else ""
    return tr("stability not checked: {reason}").format(reason=reason)
