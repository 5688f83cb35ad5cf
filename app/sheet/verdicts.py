"""What is said of one check on paper: of what, its numbers, and the verdict in words."""

from __future__ import annotations

from collections.abc import Sequence

from app.sheet.blocks import Block, column, table
from app.sheet.readings import DIGITS, NOTHING, Readings
from app.units import Quantity, utilisation_text
from app.words import tr
from solver.checks import Check, Status


def status_word(status: Status | str) -> str:
    """The verdict of a check in a word."""
    return {"pass": tr("passes"), "fail": tr("FAILS"), "not_made": tr("NOT CHECKED")}[status]


def quantity_of(check: Check) -> Quantity:
    """What the value of a check is measured in."""
    if check.check in ("tension", "compression"):
        return "stress"
    return "force" if check.check == "reaction" else "displacement"


def kind_words(check: Check) -> str:
    """What was compared."""
    return {
        "tension": tr("stress in tension"),
        "compression": tr("stress in compression"),
        "displacement": tr("displacement"),
        "relative": tr("relative movement"),
        "reaction": tr("reaction"),
    }[check.check]


def subject(check: Check) -> str:
    """Of what: a segment, a joint, or two joints."""
    if check.segment is not None:
        return tr("segment {mark}").format(mark=check.segment)
    if check.joint is not None:
        return tr("joint {mark}").format(mark=check.joint)
    return tr("joints {start} to {end}").format(start=check.start, end=check.end)


def check_row(check: Check, say: Readings) -> list[str]:
    """Subject, kind, place, value, limit, utilisation, verdict, combination."""
    quantity = quantity_of(check)
    place = NOTHING if check.position is None else say.plain(check.position, "length", unit=True)
    numbers = [NOTHING, NOTHING, NOTHING]
    if check.value is not None and check.limit is not None and check.utilisation is not None:
        limit = say.exact(check.limit, quantity) if quantity != "stress" else say.read(check.limit, quantity)
        numbers = [
            against(check.value, check.limit, quantity, say),
            f"{limit} {say.unit(quantity)}",
            utilisation_text(check.utilisation, check.status),
        ]
    return [subject(check), kind_words(check), check.combination, place, *numbers, status_word(check.status)]


def against(value: float, limit: float, quantity: Quantity, say: Readings) -> str:
    """The value to so many digits that it lies on the right side of its limit when read."""
    for digits in range(DIGITS, 18):
        rounded = float(f"{abs(value):.{digits - 1}e}")
        if (rounded > limit) == (abs(value) > limit):
            return say.read(value, quantity, digits=digits)
    return say.read(value, quantity, digits=17)


def check_table(title: str, checks: Sequence[Check], say: Readings) -> Block:
    """Checks with their numbers and verdicts; those that fail stand out, and say so in words."""
    columns = [
        column(tr("Of"), align="left"),
        column(tr("What"), align="left"),
        column(tr("In"), align="left"),
        column(tr("at x")),
        column(tr("Value")),
        column(tr("Limit")),
        column(tr("Utilisation")),
        column(tr("Verdict"), align="left"),
    ]
    strong = [index for index, check in enumerate(checks) if check.status == "fail"]
    return table(title, columns, [check_row(check, say) for check in checks], strong=strong)
