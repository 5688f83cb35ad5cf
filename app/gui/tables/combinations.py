"""The combinations table: a factor for each load case, and what the allowable stresses are scaled by."""

from __future__ import annotations

from msgspec import UNSET

from app import edits
from app.entry import parse_entry
from app.gui.places import Place
from app.gui.tables.column import Adding, Change, Column, Sight, Table
from app.gui.tables.materials import name_of, put_name
from app.units import entry_text, format_value
from app.words import later, tr
from solver.model import Combination, Project


def _factor(case: int, name: str) -> Column:
    """The column of one case; a case that a combination does not name counts 0."""

    def show(row: Combination, sight: Sight) -> str:
        return (
            format_value(row.factors[name], "factor", sight.system, strip=True)
            if name in row.factors
            else "0"
        )

    def entry(row: Combination, sight: Sight) -> str:
        return entry_text(row.factors.get(name, 0.0), "factor", sight.system)

    def put(project: Project, index: int, text: str, sight: Sight) -> Change:
        value = parse_entry(text, "factor", sight.system) if text.strip() else UNSET
        return Change(edits.set_factor(project, project.combinations[index].name, name, value))

    def place(index: int, _sight: Sight) -> Place:
        return ("combinations", index, "factors", "load_cases", case)

    return Column(
        f"factor of {name}", name, show, entry, put, place=place, optional=True, width=8, named_by_user=True
    )


def _put_allowable(project: Project, index: int, text: str, sight: Sight) -> Change:
    value = parse_entry(text, "factor", sight.system)
    return Change(edits.set_value(project, ("combinations", index, "allowable_factor"), value))


def columns(project: Project, _sight: Sight) -> tuple[Column, ...]:
    """Name, a factor for each case, the factor of the allowables."""
    factors = (_factor(place, case.name) for place, case in enumerate(project.load_cases))
    return (_NAME, *factors, _ALLOWABLE)


def _add(project: Project, text: str, _sight: Sight) -> Change:
    """A new combination takes every case once."""
    factors = {case.name: 1.0 for case in project.load_cases}
    combination = Combination(text.strip(), factors)
    note = tr("“{name}” takes every load case with factor 1").format(name=combination.name) if factors else ""
    return Change(edits.add_record(project, ("combinations",), combination), note)


_NAME = Column("name", later("Combination"), name_of, name_of, put_name("combinations"), width=16)
_ALLOWABLE = Column(
    "allowable_factor",
    later("Factor on allowables"),
    lambda row, sight: format_value(row.allowable_factor, "factor", sight.system, strip=True),
    lambda row, sight: entry_text(row.allowable_factor, "factor", sight.system),
    _put_allowable,
    width=8,
)

COMBINATIONS = Table(
    key="combinations",
    title=later("Combinations"),
    rows=lambda project, _sight: tuple(project.combinations),
    columns=columns,
    row_name=lambda project, index, _sight: project.combinations[index].name,
    records=lambda _sight: ("combinations",),
    adding=Adding(later("type a name to add a combination"), _add, later("Add combination"), "name"),
    delete=lambda project, indexes, _sight: edits.remove_combinations(project, indexes),
    delete_name=later("Delete combinations"),
)
