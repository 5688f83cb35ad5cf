"""Why a typed text was not taken in, in words; drafts keep the sentence beside the text."""

from __future__ import annotations

from app.edits import EditError
from app.entry import EntryError
from app.lateral_entry import LateralError
from app.phrases import fault_sentence
from app.places import place_words
from app.support_entry import SupportError
from solver.faults import Fault, Place, place_text
from solver.model import UnitSystemName


class NotTaken(ValueError):  # noqa: N818 - its message is the sentence beside the cell
    """A text that a table cannot take in, for a reason that only the table knows."""


TypingError = (EntryError, EditError, SupportError, LateralError, NotTaken)


def reason_of(error: Exception, system: UnitSystemName, place: Place = ()) -> str:
    """The sentence beside the cell at `place`, in the words and units of the tables.

    What is wrong with the cell's own record is said without saying where: the cell is named beside it.
    """
    if isinstance(error, EditError):
        record = place_text(_record_of(place))
        return "; ".join(_sentence(fault, system, record) for fault in error.faults)
    return str(error)


def _sentence(fault: Fault, system: UnitSystemName, record: str) -> str:
    sentence = fault_sentence(fault, system)
    own = record and fault.place.startswith(record)
    return sentence.removeprefix(f"{place_words(fault.place)}: ") if own else sentence


def _record_of(place: Place) -> Place:
    """The place up to its last index."""
    last = max((i for i, step in enumerate(place) if isinstance(step, int)), default=-1)
    return place[: last + 1]
