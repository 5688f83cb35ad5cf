"""The head of the sheet: who, what, when, from which file, and the verdict in one line."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Final

from app.sheet.blocks import Value
from app.sheet.printable import shortened
from app.title_fields import TITLE_FIELDS
from app.words import tr
from solver.model import Project

LONGEST_TITLE: Final = 160
_LONGEST_FIELD: Final = 100


@dataclass(frozen=True, slots=True)
class Origin:
    """Where the sheet comes from: file, date (ISO), program with version, fingerprint of the project."""

    file_name: str
    date: str
    program: str
    sha256: str
    changed: bool = False  # whether the file does not hold this project


def title_block(project: Project, origin: Origin) -> dict[str, Value]:
    """The fields of the title block, as pairs in reading order; what nobody filled in stays blank to sign."""
    texts = [(tr(name), str(getattr(project.sheet, key))) for key, name in TITLE_FIELDS]
    fields: list[Value] = [[name, shortened(text, _LONGEST_FIELD)] for name, text in texts]
    return {
        "title": shortened(project.title, LONGEST_TITLE) or tr("Untitled member"),
        "fields": [
            *fields,
            [tr("Date of this sheet"), origin.date],
            [tr("File"), _file(origin)],
            [tr("Program"), origin.program],
        ],
        "fingerprint": [_hash_name(origin), origin.sha256],
    }


def _file(origin: Origin) -> str:
    """The file, and that it is of an earlier state where it is."""
    name = shortened(origin.file_name, _LONGEST_FIELD)
    if not origin.changed:
        return name
    return tr("{name}, changed since it was saved").format(name=name) if name else tr("not saved")


def _hash_name(origin: Origin) -> str:
    """What the SHA-256 is of: the file's bytes, or those that saving would write."""
    if origin.changed:
        return tr("SHA-256 of the project as printed, in the form in which it is saved")
    return tr("SHA-256 of the project as saved")
