"""The names of the title block's fields: the same in the window's form and on the calc sheet."""

from __future__ import annotations

from typing import Final

from app.words import later

# By key of the project file's `sheet`, in reading order.
TITLE_FIELDS: Final[tuple[tuple[str, str], ...]] = (
    ("job", later("Job")),
    ("revision", later("Revision")),
    ("author", later("Author")),
    ("checker", later("Checker")),
    ("date", later("Date of the calculation")),
)
