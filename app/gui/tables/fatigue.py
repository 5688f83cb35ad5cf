"""Ranges of fatigue, from which to which combination the stress swings; and the line it is held to.

The line of a material is two numbers that only stand together. Whichever is typed first, the other starts so
low that nothing passes by oversight, and a note says so.
"""

from __future__ import annotations

import re
from typing import Literal

from msgspec import UNSET, UnsetType

from app import edits
from app.entry import parse_entry
from app.gui.tables import offers
from app.gui.tables.column import Adding, Change, Column, Sight, Table
from app.gui.tables.reasons import NotTaken
from app.units import entry_text, format_value
from app.words import later, tr
from solver.model import Endurance, FatigueRange, Material, Project

FIRST_SHARE = 1e-6  # of the ultimate stress: the amplitude until it is typed


def _end(key: Literal["start", "end"], file_key: str, title: str) -> Column:
    def put(project: Project, index: int, text: str, _sight: Sight) -> Change:
        return Change(edits.set_value(project, ("fatigue", index, file_key), text.strip()))

    def show(row: FatigueRange, _sight: Sight) -> str:
        return row.start if key == "start" else row.end

    return Column(key, title, show, show, put, width=14, offers=offers.combinations)


def _add(project: Project, text: str, _sight: Sight) -> Change:
    """Two names, such as "Full -> Empty"."""
    names = [part.strip() for part in re.split(r"\s*(?:→|->)\s*", text.strip())]
    if len(names) != 2:
        raise NotTaken(tr("type two combinations, such as Full -> Empty"))
    return Change(edits.add_record(project, ("fatigue",), FatigueRange(*names)))


FATIGUE = Table(
    key="fatigue",
    title=later("Fatigue"),
    rows=lambda project, _sight: tuple(project.fatigue),
    columns=lambda _project, _sight: (
        _end("start", "from", later("Fatigue from")),
        _end("end", "to", later("to combination")),
    ),
    row_name=lambda project, index, _sight: project.fatigue[index].start,
    records=lambda _sight: ("fatigue",),
    adding=Adding(later("type two combinations: Full -> Empty"), _add, later("Add fatigue range"), "start"),
    delete=lambda project, indexes, _sight: edits.remove_records(project, ("fatigue",), indexes),
    delete_name=later("Delete fatigue ranges"),
)


def _endurance(key: Literal["amplitude", "ultimate"], title: str) -> Column:
    """A column for one of the two numbers of a material's line of fatigue."""

    def value(row: Material) -> float | None:
        if isinstance(row.endurance, UnsetType):
            return None
        return row.endurance.amplitude if key == "amplitude" else row.endurance.ultimate

    def show(row: Material, sight: Sight) -> str:
        number = value(row)
        return "" if number is None else format_value(number, "stress", sight.system, strip=True)

    def entry(row: Material, sight: Sight) -> str:
        number = value(row)
        return "" if number is None else entry_text(number, "stress", sight.system)

    def put(project: Project, index: int, text: str, sight: Sight) -> Change:
        place = ("materials", index, "endurance")
        old = project.materials[index].endurance
        if not text.strip():
            note = "" if isinstance(old, UnsetType) else tr("amplitude and ultimate stress go together")
            return Change(edits.set_value(project, place, UNSET), note)
        number = parse_entry(text, "stress", sight.system)
        if not isinstance(old, UnsetType):
            return Change(edits.set_value(project, (*place, key), number))
        return _first(project, place, key, number)

    return Column(
        f"endured_{key}",
        title,
        show,
        entry,
        put,
        place=lambda index, _sight: ("materials", index, "endurance", key),
        quantity="stress",
        optional=True,
        width=12,
        at_first=False,
        filled=lambda project: any(material.endurance is not UNSET for material in project.materials),
    )


def _first(project: Project, place: tuple[str | int, ...], key: str, number: float) -> Change:
    """The first of the two numbers, with the other one so low that it must be typed."""
    if key == "amplitude":
        made = Endurance(amplitude=number, ultimate=number)
        note = tr("the ultimate stress starts as low as the amplitude: type yours")
    else:
        made = Endurance(amplitude=FIRST_SHARE * number, ultimate=number)
        note = tr("the endured amplitude is next to nothing until you type yours")
    return Change(edits.set_value(project, place, made), note)


ENDURED_AMPLITUDE = _endurance("amplitude", later("Endured amplitude"))
ENDURED_ULTIMATE = _endurance("ultimate", later("Ultimate stress"))
