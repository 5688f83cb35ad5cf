"""Checks as data: what was compared with what, where, and whether it passes; worded in `app.phrases`.

A check that could not be made is listed as not made, with the reason, and never counts as passed.
There are as many as segments times combinations, hence a struct, which is made faster than a dataclass.
"""

from __future__ import annotations

from typing import Final, Literal, TypeAlias

from msgspec import Struct

CheckKind: TypeAlias = Literal[
    "tension", "compression", "peak", "displacement", "relative", "reaction", "stability", "fatigue"
]
Status: TypeAlias = Literal["pass", "fail", "not_made", "waived"]
Verdict: TypeAlias = Literal["pass", "fail", "incomplete"]
StabilityReason: TypeAlias = Literal[
    "no_lateral",
    "lateral_insufficient",
    "no_second_moment",
    "no_stability_factor",
    "not_settled",
    "companion_compressed",
]
Reason: TypeAlias = Literal[
    "no_allowable_tension",
    "no_allowable_compression",
    "no_support",
    "no_allowable_peak",
    "no_endurance",
    "shoulder_at_end",
    "shoulder_no_step",
    "shoulder_not_round",
    "shoulder_out_of_range",  # with `ratio`
    "shoulder_bonded",
    StabilityReason,
]

STRESSES: Final = ("tension", "compression")  # the checks of stress by segment

PASS_MARGIN = 1e-9  # a utilisation up to 1 + this passes: room for rounding, not for judgement
NO_STRESS = 1e-9  # |σ| up to this part of the state's largest |σ| has no sign and is not checked


class Check(Struct, frozen=True, gc=False):
    """One comparison. `segment` or `joint` or `start` and `end` (the file's `from` and `to`) say of what.

    Where a segment has bonded parts, `part` is which of them, 0 its own, and `material` what it is of.

    `position` is in m along the member (None for `relative`), `value` and `limit` are in SI and never
    negative except that `value` of a stress, displacement or reaction keeps its sign. None where not made.

    `peak` is of a shoulder: `joint`, and `segment` for its smaller side. `fatigue` is of a segment, or of a
    shoulder alike; `between` are the combinations between which the stress swings (`combination` is the
    second), its `value` is the amplitude and its `limit` the one endured without a mean, so that
    `utilisation` is more than their ratio where there is a tensile `mean`.
    Stability compares the other way round: `value` is the critical factor, `limit` the least that is
    required, and `position` where the member bends out most. One that was not made is `waived` where the
    engineer does without it, `waiver` being the reason given; it is neither passed nor failed.
    """

    check: CheckKind
    combination: str
    status: Status
    segment: str | None = None
    part: int | None = None
    material: str | None = None
    joint: str | None = None
    start: str | None = None
    end: str | None = None
    position: float | None = None
    value: float | None = None
    limit: float | None = None
    utilisation: float | None = None
    reason: Reason | None = None
    waiver: str | None = None
    # of shoulders and fatigue alone
    between: tuple[str, str] | None = None  # the file's `from` and `to`
    factor: float | None = None  # Kt
    nominal: float | None = None  # the stress that Kt raises; of fatigue in the first combination
    nominal_to: float | None = None  # of fatigue in the second one
    amplitude: float | None = None
    mean: float | None = None
    ultimate: float | None = None  # the mean endured without an amplitude
    ratio: float | None = None  # h/r, where that is why a check was not made


def status_of(utilisation: float) -> Status:
    """Whether a check with this utilisation passes."""
    return "pass" if utilisation <= 1.0 + PASS_MARGIN else "fail"
