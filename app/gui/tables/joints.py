"""The joints table: where each joint is, what holds and loads it, and what it does in the shown state."""

from __future__ import annotations

from dataclasses import dataclass
from itertools import accumulate
from math import fsum

from msgspec import UNSET

from app import edits
from app.entry import parse_entry
from app.gui.tables import offers
from app.gui.tables.column import Change, Column, Figures, Sight, Table
from app.gui.tables.loads import needed_case
from app.gui.tables.supports import with_supports
from app.lateral_entry import LateralKey, hold_entry, hold_text, parse_hold
from app.shoulder_entry import parse_shoulder, shoulder_entry, shoulder_text
from app.support_entry import parse_supports, supports_entry, supports_text
from app.units import Quantity, entry_text, format_value
from app.words import later
from solver.model import Joint, JointLoad, Project, supports_of


@dataclass(frozen=True, slots=True)
class JointRow:
    """A joint, its position and its loads in the edited case."""

    joint: Joint
    position: float
    loads: tuple[JointLoad, ...] | None


def rows(project: Project, sight: Sight) -> tuple[object, ...]:
    """A row for each joint."""
    case = sight.load_case(project)
    positions = accumulate((segment.length for segment in project.segments), initial=0.0)
    return tuple(
        JointRow(
            joint, x, None if case is None else tuple(p for p in case.joint_loads if p.joint == joint.mark)
        )
        for joint, x in zip(project.joints, positions, strict=True)
    )


def _put_support(project: Project, index: int, text: str, sight: Sight) -> Change:
    return with_supports(
        project, index, parse_supports(text, sight.system, supports_of(project.joints[index]))
    )


def _put_shoulder(project: Project, index: int, text: str, sight: Sight) -> Change:
    shoulder = parse_shoulder(text, sight.system, project.joints[index].shoulder)
    return Change(edits.set_value(project, ("joints", index, "shoulder"), shoulder))


def _load(key: str, title: str, quantity: Quantity) -> Column:
    """A column for the sum of one kind of load in the edited case."""

    def total(row: JointRow) -> float | None:
        return None if row.loads is None else fsum(getattr(load, key) for load in row.loads)

    def show(row: JointRow, sight: Sight) -> str:
        value = total(row)
        return "" if value is None else format_value(value, quantity, sight.system, strip=True)

    def entry(row: JointRow, sight: Sight) -> str | None:
        value = total(row)
        single = row.loads is not None and len(row.loads) <= 1
        return entry_text(value, quantity, sight.system) if single and value is not None else None

    def put(project: Project, index: int, text: str, sight: Sight) -> Change:
        value = parse_entry(text, quantity, sight.system) if text.strip() else UNSET
        case, mark = needed_case(project, sight).name, project.joints[index].mark
        return Change(edits.set_joint_load(project, case, mark, key, value))

    return Column(key, title, show, entry, put, quantity=quantity, optional=True, width=12, of_case=True)


def _lateral(key: LateralKey, title: str) -> Column:
    """A column for what holds the joint sideways, or against turning sideways."""

    def put(project: Project, index: int, text: str, sight: Sight) -> Change:
        hold = parse_hold(text, key, sight.system)
        return Change(edits.hold_sideways(project, (index,), key, hold))

    return Column(
        f"lateral_{key}",
        title,
        lambda row, sight: hold_text(row.joint.lateral, key, sight.system),
        lambda row, sight: hold_entry(row.joint.lateral, key, sight.system),
        put,
        optional=True,
        width=12,
    )


def _figure(name: str, quantity: Quantity) -> Column:
    def text(index: int, figures: Figures, sight: Sight) -> str:
        value = figures.value(getattr(figures, name), index)
        return "" if value is None else format_value(value, quantity, sight.system)

    titles = {"displacement": later("Displacement"), "reaction": later("Reaction")}
    return Column(name, titles[name], quantity=quantity, figure=text, width=10)


def _contact(index: int, figures: Figures, _sight: Sight) -> str:
    """What the stops of the joint do."""
    return figures.contacts[index] if index < len(figures.contacts) else ""


COLUMNS = (
    Column(
        "mark",
        later("Mark"),
        lambda row, _sight: row.joint.mark,
        lambda row, _sight: row.joint.mark,
        lambda project, index, text, _sight: Change(
            edits.set_value(project, ("joints", index, "mark"), text.strip())
        ),
        width=6,
    ),
    Column(
        "position",
        later("Position"),
        lambda row, sight: format_value(row.position, "length", sight.system, 6, strip=True),
        quantity="length",
    ),
    Column(
        "support",
        later("Support"),
        lambda row, sight: supports_text(supports_of(row.joint), sight.system),
        lambda row, sight: supports_entry(supports_of(row.joint), sight.system),
        _put_support,
        optional=True,
        width=20,
        offers=offers.supports,
    ),
    Column(
        "shoulder",
        later("Shoulder"),
        lambda row, sight: shoulder_text(row.joint.shoulder, sight.system),
        lambda row, sight: shoulder_entry(row.joint.shoulder, sight.system),
        _put_shoulder,
        optional=True,
        width=10,
    ),
    _lateral("translation", later("Held sideways")),
    _lateral("rotation", later("Held against turning")),
    _load("force", later("Force along +x"), "force"),
    _load("movement", later("Support movement"), "displacement"),
    _figure("displacement", "displacement"),
    _figure("reaction", "force"),
    Column("contact", later("Contact"), figure=_contact, width=18),
)

JOINTS = Table(
    key="joints",
    title=later("Joints"),
    rows=rows,
    columns=lambda _project, _sight: COLUMNS,
    row_name=lambda project, index, _sight: project.joints[index].mark,
    records=lambda _sight: ("joints",),
)
