"""The words of what stops do: open or closed, with what is left of the clearance or the contact force."""

from __future__ import annotations

from typing import Final

from app.contacts import StopState, stop_states
from app.units import format_value
from app.words import later, tr
from solver.model import UnitSystemName
from solver.results import Results

SUPERPOSITION: Final = later(
    "With stops the results of load cases do not add up: every combination is solved by itself,"
    " and its factors never scale a clearance"
)


def contact_text(state: StopState, system: UnitSystemName) -> str:
    """In a few words, beside the stop: "closed, 12.4 kN"."""
    if state.closed:
        return tr("closed, {force}").format(force=push_text(state, system))
    return tr("open, {gap} left").format(gap=left_text(state, system))


def signed_contact_text(state: StopState, system: UnitSystemName) -> str:
    """The same; where the joint has other supports, with the side of the stop before it."""
    words = contact_text(state, system)
    return words if state.alone else f"{'+' if state.stop.side == 'plus' else '−'} {words}"


def left_text(state: StopState, system: UnitSystemName) -> str:
    """What is left of the clearance, with its unit."""
    return format_value(state.left, "displacement", system, with_unit=True)


def push_text(state: StopState, system: UnitSystemName) -> str:
    """The contact force, with its unit."""
    return format_value(state.push, "force", system, with_unit=True)


def contact_texts(results: Results, state: int) -> tuple[str, ...]:
    """What the stops of every joint do in a state, an empty text where there is none."""
    system, texts = results.project.display.unit_system, [""] * len(results.project.joints)
    for stop in stop_states(results, state):
        words = signed_contact_text(stop, system)
        texts[stop.joint] = f"{texts[stop.joint]}; {words}" if texts[stop.joint] else words
    return tuple(texts)
