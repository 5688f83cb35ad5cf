"""What is said of stability beside its checks: why it was waived, and what a critical factor is not."""

from __future__ import annotations

from collections.abc import Iterator

from app.findings.listing import listed
from app.phrases.stability import BESIDE, CONTACT, ELASTIC, WAIVED, factor_text
from app.phrases.states import state_words
from app.words import tr
from solver.checks import Check
from solver.model import StopSupport, supports_of
from solver.results import Results


def stability_notes(results: Results) -> Iterator[str]:
    """The standing sentences that this member needs; the waiver first."""
    yield from waived_notes(results)
    if any(found is not None and found.critical_factor is not None for found in results.stability):
        yield tr(ELASTIC)
        supports = (support for joint in results.project.joints for support in supports_of(joint))
        if any(isinstance(support, StopSupport) for support in supports):
            yield tr(CONTACT)
        if results.project.companions:
            yield tr(BESIDE)


def waived_notes(results: Results) -> Iterator[str]:
    """That the check is waived, in which states and for which reason; nothing where it is not."""
    waived = [check for check in results.checks if check.waiver is not None]
    if waived:
        states = listed(list(map(_waived_state, waived)))
        yield tr(WAIVED).format(states=states, reason=waived[0].waiver)


def _waived_state(check: Check) -> str:
    """The state, and its critical factor where one is known all the same: a waiver hides no number."""
    name = state_words(check.combination)
    if check.value is None:
        return name
    return tr("{state} with critical factor {factor}").format(state=name, factor=factor_text(check.value))
