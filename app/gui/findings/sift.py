"""Which rows of the findings are listed, by kind and by marks, and how many are hidden.

The verdict is no row, and a problem that keeps from solving is never hidden. The combination is not asked
here: for one of them the findings themselves are others (`app.findings.findings_in`).
"""

from __future__ import annotations

import re
from collections.abc import Iterable, Sequence
from dataclasses import dataclass
from typing import Final

from app.gui.findings.content import Row, RowKind
from app.words import later, tr, trn

# In the picker's order; None lists all.
KINDS: Final[tuple[tuple[RowKind | None, str], ...]] = (
    (None, later("All kinds")),
    ("fails", later("Does not pass")),
    ("stress", later("Stress")),
    ("peak", later("Peak stress")),
    ("fatigue", later("Fatigue")),
    ("displacement", later("Displacement")),
    ("relative", later("Relative displacement")),
    ("reaction", later("Reaction")),
    ("stability", later("Stability")),
    ("not_made", later("Not checked")),
    ("contact", later("Contact of stops")),
    ("companion", later("Companions")),
    ("note", later("Notes")),
)


@dataclass(frozen=True, slots=True)
class Sift:
    """What is asked for: a kind (None for all), the name of a combination, marks as typed."""

    kind: RowKind | None = None
    state: str | None = None
    marks: str = ""

    @property
    def is_open(self) -> bool:
        """Whether it lets everything through."""
        return self.kind is None and self.state is None and not self.marks.strip()


def sifted(rows: Sequence[Row], sift: Sift) -> tuple[Row, ...]:
    """The rows that are asked for; problems always."""
    wanted = _wanted(sift.marks, {mark for row in rows for mark in row.marks})
    return tuple(row for row in rows if row.tone == "problem" or _is_of(row, sift.kind, wanted))


def _is_of(row: Row, kind: RowKind | None, wanted: frozenset[str] | None) -> bool:
    kinds: tuple[RowKind | None, ...] = ("fatigue", "fatigue_joint") if kind == "fatigue" else (kind,)
    right_kind = kind is None or row.kind in kinds or (kind == "fails" and row.tone == "fail")
    return right_kind and (wanted is None or bool(wanted & row.marks))


def _wanted(typed: str, known: Iterable[str]) -> frozenset[str] | None:
    """The marks that are typed, or where there is none such, those that begin so; None for all."""
    words = [word.strip().casefold() for word in re.split(r"[,;]", typed) if word.strip()]
    if not words:
        return None
    marks = tuple(known)
    found: set[str] = set()
    for word in words:
        exact = {mark for mark in marks if mark.casefold() == word}
        found |= exact or {mark for mark in marks if mark.casefold().startswith(word)}
    return frozenset(found)


def count_line(listed: Sequence[Row], everything: Sequence[Row], state: str | None) -> str:
    """How many are listed of how many, and whether any that does not pass is not seen to."""
    line = tr("{shown} of {total} shown").format(shown=_count(listed), total=_count(everything))
    failing = _failing(everything) - _failing(listed)
    if failing <= 0:
        return line
    if state is None:
        hidden = trn("{count} that does not pass is hidden", "{count} that do not pass are hidden", failing)
    else:
        hidden = trn(
            "{count} does not pass in another combination",
            "{count} do not pass in another combination",
            failing,
        )
    return f"{line}; {hidden}"


def _count(rows: Sequence[Row]) -> int:
    return sum(row.tone != "problem" for row in rows)


def _failing(rows: Sequence[Row]) -> int:
    return sum(row.tone == "fail" for row in rows)
