"""What each stop does in the checked states, in a sentence: closed with its force, open with what is left."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Sequence
from typing import Final

from app.contacts import StopState, stop_states
from app.findings.listing import listed
from app.findings.records import ContactFinding
from app.phrases.contacts import left_text, push_text
from app.phrases.states import state_words
from app.support_entry import support_name
from app.words import later, tr
from solver.model import UnitSystemName
from solver.results import Results

_SENTENCES: Final = {
    (True, True): later("Joint {mark}, {stop}: closed in {closed}; open in {open}"),
    (True, False): later("Joint {mark}, {stop}: closed in {closed}"),
    (False, True): later("Joint {mark}, {stop}: open in {open}"),
}


def contact_findings(
    results: Results, system: UnitSystemName, only: str | None = None
) -> tuple[ContactFinding, ...]:
    """One for each stop, along the chain, over all checked states or over the one called `only`."""
    found: defaultdict[tuple[int, int], list[tuple[str, StopState]]] = defaultdict(list)
    for index, state in enumerate(results.states):
        if state.checked and only in (None, state.name):
            for stop in stop_states(results, index):
                found[stop.joint, stop.number].append((state_words(state.name), stop))
    return tuple(_finding(results, states, system) for states in found.values())


def _finding(
    results: Results, states: Sequence[tuple[str, StopState]], system: UnitSystemName
) -> ContactFinding:
    first = states[0][1]
    return ContactFinding(
        joint=first.joint,
        mark=first.mark,
        number=first.number,
        sentence=_sentence(states, system),
        position=float(results.position[first.joint]),
    )


def _sentence(states: Sequence[tuple[str, StopState]], system: UnitSystemName) -> str:
    """The largest force first, then the least clearance left."""
    closed = sorted((s for s in states if s[1].closed), key=lambda pair: -pair[1].push)
    opened = sorted((s for s in states if not s[1].closed), key=lambda pair: pair[1].left)
    left, pushed = tr("{state} ({gap} left)"), tr("{state} ({force})")
    first = states[0][1]
    return tr(_SENTENCES[bool(closed), bool(opened)]).format(
        mark=first.mark,
        stop=support_name(first.stop, system),
        closed=listed([pushed.format(state=name, force=push_text(s, system)) for name, s in closed]),
        open=listed([left.format(state=name, gap=left_text(s, system)) for name, s in opened]),
    )
