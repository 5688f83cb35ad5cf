"""Why a typed text was not taken in, in words; drafts keep the sentence beside the text."""

from __future__ import annotations

from app.edits import EditError
from app.entry import EntryError
from app.phrases import fault_sentence
from app.support_entry import SupportError


class NotTaken(ValueError):  # noqa: N818 - its message is the sentence beside the cell
    """A text that a table cannot take in, for a reason that only the table knows."""


TypingError = (EntryError, EditError, SupportError, NotTaken)


def reason_of(error: Exception) -> str:
    """The sentence beside the cell."""
    if isinstance(error, EditError):
        return "; ".join(fault_sentence(fault) for fault in error.faults)
    return str(error)
