"""How a companion acts as typed text: "both", "compression", "tension"; English is understood everywhere."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Final

from msgspec import UNSET, UnsetType

from app.entry import EntryError
from app.words import in_every_language, later, tr
from solver.model import CompanionAction

WORDS: Final[Mapping[CompanionAction, str]] = {
    "both": later("both ways"),
    "compression": later("compression only"),
    "tension": later("tension only"),
}
REMARKS: Final[Mapping[CompanionAction, str]] = {
    "both": later("tied at both ends"),
    "compression": later("can separate, as clamped plates do"),
    "tension": later("can go slack, as a rope does"),
}


def action_text(action: CompanionAction) -> str:
    """The words for it."""
    return tr(WORDS[action])


def parse_action(text: str) -> CompanionAction | UnsetType:
    """The way of acting that a text begins to name, UNSET for none; EntryError where it names none."""
    wanted = text.strip().casefold()
    if not wanted:
        return UNSET
    for action, words in WORDS.items():
        if any(name.casefold().startswith(wanted) for name in (action, *in_every_language(words))):
            return action
    words = ", ".join(tr(words) for words in WORDS.values())
    raise EntryError(tr("a companion acts in one of these ways: {ways}").format(ways=words))
