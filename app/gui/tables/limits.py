"""The Limits tab: how far joints may move, how far from each other, and what supports may take."""

from __future__ import annotations

from typing import Any

from app import edits
from app.entry import parse_entry
from app.gui.tables import offers
from app.gui.tables.column import Adding, Change, Column, Offers, Sight, Table
from app.gui.tables.reasons import NotTaken
from app.units import Quantity, entry_text, format_value
from app.words import later, tr
from solver.model import DisplacementLimit, Project, ReactionLimit, RelativeLimit

# What a new limit starts from, to be typed over: so little that hardly anything passes until it is.
FIRST_DISPLACEMENT = 1e-6  # m
FIRST_REACTION = 1.0  # N


def _mark(kind: str, key: str, file_key: str, title: str, offered: Offers = offers.joints) -> Column:
    def put(project: Project, index: int, text: str, _sight: Sight) -> Change:
        return Change(edits.set_value(project, ("limits", kind, index, file_key), text.strip()))

    def show(row: Any, _sight: Sight) -> str:
        mark: str = getattr(row, key)
        return mark

    return Column(key, title, show, show, put, width=8, offers=offered)


def _limit(kind: str, quantity: Quantity) -> Column:
    def put(project: Project, index: int, text: str, sight: Sight) -> Change:
        value = parse_entry(text, quantity, sight.system)
        return Change(edits.set_value(project, ("limits", kind, index, "limit"), value))

    return Column(
        "limit",
        later("Limit"),
        lambda row, sight: format_value(row.limit, quantity, sight.system, strip=True),
        lambda row, sight: entry_text(row.limit, quantity, sight.system),
        put,
        quantity=quantity,
    )


def _table(kind: str, title: str, columns: tuple[Column, ...], adding: Adding) -> Table:
    def row_name(project: Project, index: int, sight: Sight) -> str:
        return columns[0].show(getattr(project.limits, kind)[index], sight)

    return Table(
        key=f"limits {kind}",
        title=title,
        rows=lambda project, _sight: tuple(getattr(project.limits, kind)),
        columns=lambda _project, _sight: columns,
        row_name=row_name,
        records=lambda _sight: ("limits", kind),
        adding=adding,
        delete=lambda project, indexes, _sight: edits.remove_records(project, ("limits", kind), indexes),
        delete_name=later("Delete limits"),
    )


def _added(project: Project, kind: str, limit: DisplacementLimit | RelativeLimit | ReactionLimit) -> Change:
    note = tr("the new limit is next to nothing until you type yours")
    return Change(edits.add_record(project, ("limits", kind), limit), note)


def _add_displacement(project: Project, text: str, _sight: Sight) -> Change:
    return _added(project, "displacement", DisplacementLimit(text.strip(), FIRST_DISPLACEMENT))


def _add_reaction(project: Project, text: str, _sight: Sight) -> Change:
    return _added(project, "reaction", ReactionLimit(text.strip(), FIRST_REACTION))


def _add_relative(project: Project, text: str, _sight: Sight) -> Change:
    """Two marks, such as "0 -> 2"."""
    marks = [part.strip() for part in text.replace("→", "->").split("->")]
    if len(marks) != 2:
        raise NotTaken(tr("type two joints' marks, such as 0 -> 2"))
    return _added(project, "relative", RelativeLimit(*marks, FIRST_DISPLACEMENT))


DISPLACEMENT = _table(
    "displacement",
    later("Displacement of a joint"),
    (
        _mark("displacement", "joint", "joint", later("Displacement of joint")),
        _limit("displacement", "displacement"),
    ),
    Adding(
        later("type a joint's mark to limit it"),
        _add_displacement,
        later("Add displacement limit"),
        "joint",
        offers.joints,
    ),
)
RELATIVE = _table(
    "relative",
    later("Relative displacement of joints"),
    (
        _mark("relative", "start", "from", later("Displacement from joint")),
        _mark("relative", "end", "to", later("to joint")),
        _limit("relative", "displacement"),
    ),
    Adding(later("type two marks: 0 -> 2"), _add_relative, later("Add relative limit"), "start"),
)
REACTION = _table(
    "reaction",
    later("Reaction of a support"),
    (
        _mark("reaction", "joint", "joint", later("Reaction at joint"), offers.held_joints),
        _limit("reaction", "force"),
    ),
    Adding(
        later("type a joint's mark to limit it"),
        _add_reaction,
        later("Add reaction limit"),
        "joint",
        offers.held_joints,
    ),
)
