"""Stability in the Limits tab: the least critical factor, and the reason for doing without the check.

One row, which is always there: both cells may be empty.
"""

from __future__ import annotations

from msgspec import UNSET, UnsetType

from app import edits
from app.entry import parse_entry
from app.gui.tables.column import Change, Column, Sight, Table
from app.units import entry_text, format_value
from app.words import later, tr
from solver.model import Limits, Project, Waiver


def _show_factor(limits: Limits, sight: Sight) -> str:
    factor = limits.stability_factor
    return "" if isinstance(factor, UnsetType) else format_value(factor, "factor", sight.system, strip=True)


def _factor_entry(limits: Limits, sight: Sight) -> str:
    factor = limits.stability_factor
    return "" if isinstance(factor, UnsetType) else entry_text(factor, "factor", sight.system)


def _put_factor(project: Project, _index: int, text: str, sight: Sight) -> Change:
    value = parse_entry(text, "factor", sight.system) if text.strip() else UNSET
    return Change(edits.set_value(project, ("limits", "stability_factor"), value))


def _waiver(limits: Limits, _sight: Sight) -> str:
    return next((waiver.reason for waiver in limits.waived if waiver.check == "stability"), "")


def _put_waiver(project: Project, _index: int, text: str, _sight: Sight) -> Change:
    """Without a reason nothing is waived."""
    reason = text.strip()
    others = tuple(waiver for waiver in project.limits.waived if waiver.check != "stability")
    waived = (*others, Waiver("stability", reason)) if reason else others
    place = ("limits", "waived")
    note = tr("stability is waived where it cannot be checked: the verdict says so") if reason else ""
    return Change(edits.set_value(project, place, waived or UNSET), note)


COLUMNS = (
    Column(
        "stability_factor",
        later("Critical factor at least"),
        _show_factor,
        _factor_entry,
        _put_factor,
        place=lambda _record, _sight: ("limits", "stability_factor"),
        quantity="factor",
        optional=True,
        width=8,
    ),
    Column(
        "waived",
        later("Stability waived because"),
        _waiver,
        _waiver,
        _put_waiver,
        place=lambda _record, _sight: ("limits", "waived"),
        optional=True,
        width=22,
    ),
)

STABILITY = Table(
    key="limits stability",
    title=later("Stability"),
    rows=lambda project, _sight: (project.limits,),
    columns=lambda _project, _sight: COLUMNS,
    row_name=lambda _project, _index, _sight: tr("the member"),
    records=lambda _sight: ("limits",),
)
