"""What is said of one check on paper: of what, its numbers, and the verdict in words."""

from __future__ import annotations

from collections.abc import Sequence

from app.numerals import decimals_of, fixed, rounded
from app.phrases.checks import state_text
from app.phrases.segments import segment_words
from app.phrases.stability import factor_texts
from app.sheet.blocks import Block, column, table
from app.sheet.readings import DIGITS, NOTHING, PLAIN, Readings
from app.units import Quantity, to_display, utilisation_text
from app.words import tr
from solver.checks import PASS_MARGIN, STRESSES, Check, Status

_MOST_DIGITS = 17


def status_word(status: Status | str) -> str:
    """The verdict of a check in a word."""
    return {"pass": tr("passes"), "fail": tr("FAILS"), "not_made": tr("NOT CHECKED"), "waived": tr("WAIVED")}[
        status
    ]


def quantity_of(check: Check) -> Quantity:
    """What the value of a check is measured in."""
    if check.check in (*STRESSES, "peak", "fatigue"):
        return "stress"
    if check.check == "stability":
        return "factor"
    return "force" if check.check == "reaction" else "displacement"


def kind_words(check: Check) -> str:
    """What was compared."""
    return {
        "tension": tr("stress in tension"),
        "compression": tr("stress in compression"),
        "displacement": tr("displacement"),
        "relative": tr("relative displacement"),
        "reaction": tr("reaction"),
        "peak": tr("peak stress"),
        "fatigue": tr("fatigue, amplitude (the mean adds)"),
        "stability": tr("critical factor"),
    }[check.check]


def subject(check: Check) -> str:
    """Of what: a segment, a joint, or two joints."""
    if check.segment is not None and check.joint is None:
        return tr("segment {mark}").format(mark=segment_words(check))
    if check.joint is not None:
        return tr("joint {mark}").format(mark=check.joint)
    if check.check == "stability":
        return tr("member")
    return tr("joints {start} to {end}").format(start=check.start, end=check.end)


def check_row(check: Check, say: Readings) -> list[str]:
    """Subject, kind, place, value, limit, utilisation, verdict, combination."""
    quantity = quantity_of(check)
    place = NOTHING if check.position is None else say.plain(check.position, "length", unit=True)
    numbers = [NOTHING, NOTHING, NOTHING]
    if check.value is not None and check.limit is not None and check.utilisation is not None:
        numbers = [
            *against(check.value, check.limit, quantity, say),
            utilisation_text(check.utilisation, check.status),
        ]
    return [subject(check), kind_words(check), state_text(check), place, *numbers, status_word(check.status)]


def against(value: float, limit: float, quantity: Quantity, say: Readings) -> list[str]:
    """Value and limit to so many digits that, read side by side, they say what the verdict says.

    A value that is nothing but rounding beside its limit reads 0, as in the tables of results.
    """
    if quantity == "factor":
        factor, least = factor_texts(value, limit, "fail" if value * (1 + PASS_MARGIN) < limit else "pass")
        return [factor, f"≥ {least}"]
    shown, bound = (to_display(v, quantity, say.units) for v in (abs(value), limit))
    for digits in range(DIGITS, _MOST_DIGITS):
        if (rounded(shown, digits) > rounded(bound, max(digits, PLAIN))) == value_over(value, limit):
            break
    else:
        digits = _MOST_DIGITS
    return [
        say.read(value, quantity, digits=digits, beside=limit),
        say.plain(limit, quantity, unit=True, digits=max(digits, PLAIN)),
    ]


def value_over(value: float, limit: float) -> bool:
    """Whether a value exceeds its limit, beyond the margin for rounding."""
    return abs(value) > limit * (1 + PASS_MARGIN)


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


def utilisation_by_hand(check: Check) -> str:
    """The utilisation to four decimals at least, more where its verdict needs them."""
    value = check.utilisation or 0.0
    shown = utilisation_text(value, check.status)
    return shown if decimals_of(shown) >= 4 else fixed(value, 4)
