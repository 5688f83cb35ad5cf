"""Loads of the edited case in the rows of segments, the member's and its companions' alike.

A cell that stands for several records shows their sum and is edited in the Loads table.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from math import fsum
from operator import attrgetter
from typing import Any, Final, Protocol

from msgspec import UNSET

from app import edits
from app.entry import parse_entry
from app.gui.tables.column import Change, Column, Sight
from app.gui.tables.loads import needed_case
from app.gui.tables.numbers import pair_entry, pair_text, parse_pair, parts_of_pair
from app.units import Quantity, entry_text, format_value
from app.words import later
from solver.model import LoadCase, Project, SegmentLoad, end_of

Functions = dict[str, Any]  # a column's show, entry and put, by these names
MarkOf = Callable[[Project, int], str]  # of the segment in a row, by its index


class Loaded(Protocol):
    """A row that can be loaded; None where no case is edited."""

    @property
    def loads(self) -> tuple[SegmentLoad, ...] | None:
        """What acts on it in the edited case."""


def loads_on(mark: str, case: LoadCase) -> tuple[SegmentLoad, ...]:
    """The records of the case on one segment."""
    marks = list(map(attrgetter("segment"), case.segment_loads))
    if mark not in marks:
        return ()  # at a glance: a paste asks this for every cell
    return tuple(load for load, on in zip(case.segment_loads, marks, strict=True) if on == mark)


def loads_by_mark(case: LoadCase | None) -> dict[str, list[SegmentLoad]] | None:
    """The records of the case by the segment that they are on; None without a case."""
    if case is None:
        return None
    found: dict[str, list[SegmentLoad]] = {}
    for load in case.segment_loads:
        found.setdefault(load.segment, []).append(load)
    return found


@dataclass(frozen=True, slots=True)
class Ends:
    """The two keys of a load that varies along the segment."""

    start: str
    end: str
    quantity: Quantity

    def of(self, load: SegmentLoad) -> tuple[float, float]:
        """The load at both ends."""
        start: float = getattr(load, self.start)
        return start, end_of(start, getattr(load, self.end))

    def total(self, row: Loaded) -> tuple[float, float] | None:
        """The sum of the segment's records; None where no case is edited."""
        if row.loads is None:
            return None
        pairs = [self.of(load) for load in row.loads]
        return fsum(start for start, _ in pairs), fsum(end for _, end in pairs)


FORCE: Final = Ends("load_start", "load_end", "distributed")
HEAT: Final = Ends("temperature_start", "temperature_end", "temperature")


def _end_of_load(ends: Ends, which: int, mark_of: MarkOf) -> Functions:
    """A column's functions for the load at the start (0) or the end (1) of the segment."""

    def show(row: Loaded, sight: Sight) -> str:
        total = ends.total(row)
        return "" if total is None else format_value(total[which], ends.quantity, sight.system, strip=True)

    def entry(row: Loaded, sight: Sight) -> str | None:
        total = ends.total(row)
        editable = total is not None and row.loads is not None and len(row.loads) <= 1
        return entry_text(total[which], ends.quantity, sight.system) if editable and total else None

    def put(project: Project, index: int, text: str, sight: Sight) -> Change:
        mark = mark_of(project, index)
        if which == 0 and len(parts_of_pair(text)) == 2:
            return _put_ends(ends, project, mark, text, sight)
        value = parse_entry(text, ends.quantity, sight.system) if text.strip() else UNSET
        key = ends.start if which == 0 else ends.end
        return Change(edits.set_segment_load(project, needed_case(project, sight).name, mark, key, value))

    return {"show": show, "entry": entry, "put": put}


def _put_ends(ends: Ends, project: Project, mark: str, text: str, sight: Sight) -> Change:
    """Both ends at once, "3 -> 5"; an empty text takes both away."""
    start, end = parse_pair(text, ends.quantity, sight.system) if text.strip() else (UNSET, UNSET)
    case = needed_case(project, sight).name
    begun = edits.set_segment_load(project, case, mark, ends.start, start)
    return Change(edits.set_segment_load(begun, case, mark, ends.end, end))


def _heat_of(mark_of: MarkOf) -> Functions:
    """A column's functions for the temperature rise, both ends in one cell."""

    def show(row: Loaded, sight: Sight) -> str:
        total = HEAT.total(row)
        return "" if total is None else pair_text(*total, HEAT.quantity, sight.system)

    def entry(row: Loaded, sight: Sight) -> str | None:
        total = HEAT.total(row)
        if total is None or row.loads is None or len(row.loads) > 1:
            return None
        return pair_entry(*total, HEAT.quantity, sight.system)

    def put(project: Project, index: int, text: str, sight: Sight) -> Change:
        return _put_ends(HEAT, project, mark_of(project, index), text, sight)

    return {"show": show, "entry": entry, "put": put}


def load_columns(mark_of: MarkOf, of: Callable[[Functions], Functions] = dict) -> tuple[Column, ...]:
    """The columns of the edited case's loads; `of` makes their functions fit the rows of a table."""
    columns = (
        ("load_start", later("Load at start"), _end_of_load(FORCE, 0, mark_of), FORCE),
        ("load_end", later("Load at end"), _end_of_load(FORCE, 1, mark_of), FORCE),
        ("heat", later("Temperature rise"), _heat_of(mark_of), HEAT),
    )
    return tuple(
        Column(key, title, **of(functions), of_case=True, quantity=ends.quantity, optional=True)
        for key, title, functions, ends in columns
    )
