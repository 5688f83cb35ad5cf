"""The sentences of stability: what was compared, why it was not, and what the comparison does not say.

Everywhere the same three things are said of a critical factor: it is that of the elastic critical load,
without imperfections, and it is no design resistance.
"""

from __future__ import annotations

from collections.abc import Mapping
from typing import Final

from app.numerals import reading, rounded
from app.words import later
from solver.checks import Reason, Status

CHECK: Final = later(
    "Stability: critical factor {value}, at least {limit} required, {utilisation}, bends out most at"
    " {position}, {combination}"
)
SUBJECT: Final = later("Stability")

REASONS: Final[Mapping[Reason, str]] = {
    "no_lateral": later("the member is compressed and no joint is held sideways"),
    "lateral_insufficient": later(
        "the member is compressed and could still move or turn sideways as a whole"
    ),
    "no_second_moment": later("a section in it has no second moment"),
    "no_stability_factor": later("no least critical factor is required"),
    "not_settled": later("the critical factor did not settle"),
    "companion_compressed": later("a companion is compressed, whose stability is not computed"),
}

REMEDIES: Final[Mapping[Reason, str]] = {
    "no_lateral": later("enter lateral supports of the joints, or waive the check with a reason"),
    "lateral_insufficient": later(
        "hold two joints sideways, or one joint sideways and one against turning, or waive the check with a"
        " reason"
    ),
    "no_second_moment": later("enter it behind the area, as in A 1200 I 4.5e4"),
    "no_stability_factor": later("enter the required stability factor in Limits"),
    "not_settled": later("check it separately"),
    "companion_compressed": later("check the companion separately, and waive this check with the reason"),
}

NOT_MADE: Final[Mapping[Reason, str]] = {
    "no_lateral": later("Not checked: stability, no joint is held sideways ({states})"),
    "lateral_insufficient": later(
        "Not checked: stability, what holds the member sideways is not enough ({states})"
    ),
    "no_second_moment": later("Not checked: stability, no second moment in {places} ({states})"),
    "no_stability_factor": later(
        "Not checked: stability, critical factor {factor} and none required ({states})"
    ),
    "not_settled": later("Not checked: stability, the critical factor did not settle ({states})"),
    "companion_compressed": later("Not checked: stability, a companion is compressed ({states})"),
}

WAIVED: Final = later("Stability waived ({states}): {reason}")

ELASTIC: Final = later(
    "Stability is compared with the elastic critical load, without imperfections: it is not a design"
    " resistance, and the local code's column rules govern"
)
CONTACT: Final = later(
    "For stability every stop stays in contact or open as it is under the loads themselves"
)

BESIDE: Final = later("For stability companions neither brace nor load the member")

_DIGITS: Final = 3
_LIMIT_DIGITS: Final = 6
_MOST_DIGITS: Final = 17


def factor_text(value: float) -> str:
    """A critical factor by itself."""
    return reading(value, _DIGITS)


def factor_texts(value: float, least: float, status: Status) -> tuple[str, str]:
    """Critical and required factor, with as many digits as it takes not to contradict the status."""
    for digits in range(_DIGITS, _MOST_DIGITS):
        bound = max(digits, _LIMIT_DIGITS)
        if (rounded(value, digits) < rounded(least, bound)) == (status == "fail"):
            return reading(value, digits), reading(least, bound, strip=True)
    return reading(value, _MOST_DIGITS), reading(least, _MOST_DIGITS, strip=True)
