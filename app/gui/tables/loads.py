"""The Loads tab: the load cases, and the records of the case that is edited, on segments and at joints."""

from __future__ import annotations

from typing import Any

from msgspec import UNSET, UnsetType

from app import edits
from app.entry import parse_entry
from app.gui.tables import offers
from app.gui.tables.column import Adding, Change, Column, Offers, Sight, Table
from app.gui.tables.materials import name_of, put_name
from app.gui.tables.reasons import NotTaken
from app.units import Quantity, entry_text, format_value
from app.words import later, tr
from solver.model import JointLoad, LoadCase, Project, SegmentLoad, end_of


def needed_case(project: Project, sight: Sight) -> LoadCase:
    """The edited case; NotTaken where there is no case yet."""
    case = sight.load_case(project)
    if case is None:
        raise NotTaken(tr("add a load case in the Loads table first"))
    return case


def _case_name(project: Project, sight: Sight) -> str:
    case = sight.load_case(project)
    return "" if case is None else case.name


# The cases


def _gravity_show(row: LoadCase, sight: Sight) -> str:
    return format_value(row.gravity, "acceleration", sight.system, strip=True)


def _put_gravity(project: Project, index: int, text: str, sight: Sight) -> Change:
    value = parse_entry(text, "acceleration", sight.system) if text.strip() else UNSET
    return Change(edits.set_value(project, ("load_cases", index, "gravity"), value))


def delete_cases(project: Project, indexes: tuple[int, ...]) -> Project:
    """The project without these cases and without their factors."""
    for name in [project.load_cases[index].name for index in indexes]:
        project = edits.remove_case(project, name)
    return project


CASES = Table(
    key="load_cases",
    title=later("Load cases"),
    rows=lambda project, _sight: tuple(project.load_cases),
    columns=lambda _project, _sight: CASE_COLUMNS,
    row_name=lambda project, index, _sight: project.load_cases[index].name,
    records=lambda _sight: ("load_cases",),
    adding=Adding(
        later("type a name to add a case"),
        lambda project, text, _sight: Change(
            edits.add_record(project, ("load_cases",), LoadCase(text.strip()))
        ),
        later("Add load case"),
        "name",
    ),
    delete=lambda project, indexes, _sight: delete_cases(project, indexes),
    delete_name=later("Delete load cases"),
)

CASE_COLUMNS = (
    Column("name", later("Load case"), name_of, name_of, put_name("load_cases"), width=16),
    Column(
        "gravity",
        later("Gravity along +x"),
        _gravity_show,
        lambda row, sight: entry_text(row.gravity, "acceleration", sight.system),
        _put_gravity,
        quantity="acceleration",
        optional=True,
    ),
)


# The records of the edited case


def _number(kind: str, key: str, title: str, quantity: Quantity, follows: str = "") -> Column:
    """A column for one number of a load record; an absent end follows its start."""

    def value(row: Any) -> float:
        number: float | UnsetType = getattr(row, key)
        return end_of(getattr(row, follows), number) if follows else number  # type: ignore[return-value]

    def put(project: Project, index: int, text: str, sight: Sight) -> Change:
        number = parse_entry(text, quantity, sight.system) if text.strip() else UNSET
        return Change(edits.set_value(project, (*sight.case_place, kind, index, key), number))

    return Column(
        key,
        title,
        lambda row, sight: format_value(value(row), quantity, sight.system, strip=True),
        lambda row, sight: entry_text(value(row), quantity, sight.system),
        put,
        quantity=quantity,
        optional=True,
        width=8,
    )


def _reference(kind: str, key: str, title: str, offered: Offers) -> Column:
    """A column with the mark of what is loaded."""

    def put(project: Project, index: int, text: str, sight: Sight) -> Change:
        place = (*sight.case_place, kind, index, key)
        return Change(edits.set_value(project, place, text.strip()))

    def show(row: Any, _sight: Sight) -> str:
        mark: str = getattr(row, key)
        return mark

    return Column(key, title, show, show, put, width=8, offers=offered)


def _records(kind: str, key: str, title: str, columns: tuple[Column, ...], adding: Adding) -> Table:
    """A table of one list of the edited case."""

    def rows(project: Project, sight: Sight) -> tuple[object, ...]:
        case = sight.load_case(project)
        return () if case is None else tuple(getattr(case, kind))

    def row_name(project: Project, index: int, sight: Sight) -> str:
        return f"{getattr(rows(project, sight)[index], key)}, {_case_name(project, sight)}"

    return Table(
        key=kind,
        title=title,
        rows=rows,
        columns=lambda _project, _sight: columns,
        row_name=row_name,
        records=lambda sight: (*sight.case_place, kind),
        adding=adding,
        delete=lambda project, indexes, sight: edits.remove_records(
            project, (*sight.case_place, kind), indexes
        ),
        delete_name=later("Delete loads"),
    )


def _add_segment_load(project: Project, text: str, sight: Sight) -> Change:
    needed_case(project, sight)
    return Change(edits.add_record(project, (*sight.case_place, "segment_loads"), SegmentLoad(text.strip())))


def _add_joint_load(project: Project, text: str, sight: Sight) -> Change:
    needed_case(project, sight)
    return Change(edits.add_record(project, (*sight.case_place, "joint_loads"), JointLoad(text.strip())))


SEGMENT_LOADS = _records(
    "segment_loads",
    "segment",
    later("Loads on segments"),
    (
        _reference("segment_loads", "segment", later("Segment"), offers.segments),
        _number("segment_loads", "load_start", later("Load at start"), "distributed"),
        _number("segment_loads", "load_end", later("Load at end"), "distributed", "load_start"),
        _number("segment_loads", "temperature_start", later("ΔT at start"), "temperature"),
        _number("segment_loads", "temperature_end", later("ΔT at end"), "temperature", "temperature_start"),
        _number("segment_loads", "lack_of_fit", later("Lack of fit"), "displacement"),
    ),
    Adding(
        later("type a segment's mark to load it"),
        _add_segment_load,
        later("Add segment load"),
        "segment",
        offers.segments,
    ),
)

JOINT_LOADS = _records(
    "joint_loads",
    "joint",
    later("Loads at joints"),
    (
        _reference("joint_loads", "joint", later("Joint"), offers.joints),
        _number("joint_loads", "force", later("Force along +x"), "force"),
        _number("joint_loads", "movement", later("Support movement"), "displacement"),
    ),
    Adding(
        later("type a joint's mark to load it"),
        _add_joint_load,
        later("Add joint load"),
        "joint",
        offers.joints,
    ),
)
