"""One typed text for several records at once: all of them take it, or none does.

What a text makes of one record is a column's own business; here it is only done one record after another, so
that drawing and tables change many in the same way.
"""

from __future__ import annotations

from collections.abc import Callable, Iterable
from typing import Protocol, TypeVar

from solver.model import Project


class Changed(Protocol):
    """What a text made of one record, with a line where it did more than it seems to."""

    @property
    def project(self) -> Project:
        """The project with it."""

    @property
    def note(self) -> str:
        """The line, or an empty text."""


_C = TypeVar("_C", bound=Changed)


def put_in_all(
    project: Project, records: Iterable[int], put: Callable[[Project, int], _C]
) -> tuple[Project, tuple[str, ...]]:
    """The project with `put` done for every record, and the notes that came of it, each once.

    The records keep their numbers meanwhile. What `put` raises for one of them ends it: nothing is changed.
    """
    notes: dict[str, None] = {}
    for record in records:
        change = put(project, record)
        project = change.project
        if change.note:
            notes[change.note] = None
    return project, tuple(notes)
