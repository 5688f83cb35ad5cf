"""What a table is made of, as data: its rows from a project, its columns, what a typed text changes.

A column knows how a cell is read (`show`), what its editor starts from (`entry`, None where the cell of that
row is not for typing) and what a typed text makes of the project (`put`). It knows no Qt, so that each
table can be tested without a window. Functions take the index of the record, not of the table's row.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass, field
from typing import Any

import numpy as np

from app.gui.places import Place
from app.units import Quantity
from app.words import tr
from solver.arrays import FloatArray
from solver.model import LoadCase, Project, UnitSystemName


@dataclass(frozen=True, slots=True)
class Sight:
    """How the tables are read: the unit system, and the load case whose loads they edit (None: no case)."""

    system: UnitSystemName
    case: int | None

    def load_case(self, project: Project) -> LoadCase | None:
        """The case whose loads are edited."""
        return None if self.case is None else project.load_cases[self.case]

    @property
    def case_place(self) -> Place:
        """The edited case as the end of a cell's place; −1 for none."""
        return ("load_cases", -1 if self.case is None else self.case)


@dataclass(frozen=True, slots=True)
class Figures:
    """What the tables show of the results of the state that is looked at; empty arrays where there is none.

    `utilisation` (n,), NaN where no check was made; `governs` (n,) the sign of the stress that governs it;
    `displacement` and `reaction` (n + 1,), NaN in an envelope and where there is no support; `contacts` what
    the stops of each joint do, in words.
    `segment_mass` (n,) in kg; `force` and `stress` (n, 2), the least and the largest within the segment.
    `current` is False for results of an earlier edit. `beside` has the same for the segments of companions.
    """

    utilisation: FloatArray = field(default_factory=lambda: np.zeros(0))
    governs: FloatArray = field(default_factory=lambda: np.zeros(0))
    displacement: FloatArray = field(default_factory=lambda: np.zeros(0))
    reaction: FloatArray = field(default_factory=lambda: np.zeros(0))
    contacts: tuple[str, ...] = ()
    mass: float | None = None
    segment_mass: FloatArray = field(default_factory=lambda: np.zeros(0))
    force: FloatArray = field(default_factory=lambda: np.zeros((0, 2)))
    stress: FloatArray = field(default_factory=lambda: np.zeros((0, 2)))
    checked: bool = True  # whether checks are made of the state
    current: bool = True
    beside: Figures | None = None  # of the companions' segments

    @staticmethod
    def value(values: FloatArray, index: int) -> float | None:
        """One of the values; None where there is none."""
        if not 0 <= index < len(values) or np.isnan(values[index]):
            return None
        return float(values[index])


@dataclass(frozen=True, slots=True)
class Change:
    """What a typed text makes of the project, with a line to say where it does more than it seems to.

    The note of an added record speaks of what its other cells start with; `stands` is True where it holds
    also when these are typed at once, as in a paste.
    """

    project: Project
    note: str = ""
    stands: bool = False


@dataclass(frozen=True, slots=True)
class Offer:
    """A name that a cell offers while it is typed into, with a remark beside it."""

    name: str
    remark: str = ""

    @property
    def spoken(self) -> str:
        """Both, as they are read aloud."""
        return f"{self.name}, {self.remark}" if self.remark else self.name


Show = Callable[[Any, Sight], str]
Entry = Callable[[Any, Sight], str | None]
Put = Callable[[Project, int, str, Sight], Change]
Offers = Callable[[Project, Sight], tuple[Offer, ...]]


@dataclass(frozen=True, slots=True)
class Column:
    """One column. `optional` cells can be cleared; `figure` and `bar` are of results, never typed."""

    key: str
    title: str
    show: Show = lambda _row, _sight: ""
    entry: Entry = lambda _row, _sight: None
    put: Put | None = None
    place: Callable[[int, Sight], Place] | None = None
    quantity: Quantity | None = None
    optional: bool = False
    width: int = 9  # in digits
    figure: Callable[[int, Figures, Sight], str] | None = None
    bar: Callable[[int, Figures], tuple[float, float] | None] | None = None  # utilisation, sign of the stress
    why_none: Callable[[int, Figures], str] | None = None  # why there is no figure, where there is none
    of_case: bool = False  # the cell belongs to the load case that is edited
    named_by_user: bool = False  # the title is the user's own word
    offers: Offers | None = None  # names for a cell that refers to something
    settled_by: str = ""  # the column that says more, where a pasted row brings both
    at_first: bool = True  # whether it is shown before anyone has chosen
    filled: Callable[[Project], bool] | None = None  # shown in any case where something stands in it
    separator: str = ""  # what stands between several names with their values in one cell

    @property
    def holds_a_name(self) -> bool:
        """Whether its cells name something, be it by a mark such as "2"."""
        by_offer = self.offers is not None and self.key != "support"
        return by_offer or self.key in ("mark", "name", "companion")

    @property
    def words(self) -> str:
        """The title in the user's language."""
        return self.title if self.named_by_user else tr(self.title)


@dataclass(frozen=True, slots=True)
class Adding:
    """The last row: typing into it adds a record."""

    hint: str
    put: Callable[[Project, str, Sight], Change]
    name: str  # of the undo step
    column: str  # the key of the column whose text adds a record when rows are pasted past the end
    offers: Offers | None = None
    unread: Callable[[Project, Sight], Project] | None = None  # the record of a text that cannot be read


@dataclass(frozen=True, slots=True)
class Table:
    """One table; `lead` rows stand before the first record."""

    key: str
    title: str
    rows: Callable[[Project, Sight], tuple[object, ...]]
    columns: Callable[[Project, Sight], tuple[Column, ...]]
    row_name: Callable[[Project, int, Sight], str]
    records: Callable[[Sight], Place]  # the list the rows stand for
    adding: Adding | None = None
    lead: int = 0
    total: Callable[[Project, Figures, Sight], str] | None = None
    delete: Callable[[Project, tuple[int, ...], Sight], Project] | None = None
    delete_name: str = ""
    place: Callable[[Project, int, str], Place] | None = None  # of a cell, where rows are no plain list
    movable: bool = False  # whether the order of the rows is a person's to change
    one: Callable[[Project, int, Sight], object] | None = None  # one row, where all would take long

    def row(self, project: Project, row: int, sight: Sight) -> object:
        """One of the rows, by its place among all."""
        return self.rows(project, sight)[row] if self.one is None else self.one(project, row, sight)

    def count(self, project: Project, sight: Sight) -> int:
        """How many rows there are."""
        if self.one is None or self.place is not None:
            return len(self.rows(project, sight))
        return self.lead + len(getattr(project, str(self.records(sight)[0])))
