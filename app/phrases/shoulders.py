"""Why a peak stress or fatigue could not be checked, and what to enter for it."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Final

from app.numerals import reading
from app.words import later, tr
from solver.checks import Check, Reason
from solver.shoulders import LEAST_RATIO, MOST_RATIO

REASONS_OF_SHOULDERS: Final[Mapping[Reason, str]] = {
    "no_allowable_peak": later("the material has no allowable peak stress"),
    "no_endurance": later("the material has no endurance"),
    "shoulder_at_end": later("at an end of the member there is no step"),
    "shoulder_no_step": later("both sides have the same size, so that there is no step"),
    "shoulder_not_round": later("the fit for fillets holds between two solid round sections only"),
    "shoulder_out_of_range": later(
        "the step is {ratio} times as high as the fillet radius, the fit holds for {least} to {most} times"
    ),
    "shoulder_bonded": later("no stress concentration is known beside bonded parts"),
}

_FACTOR: Final = later("enter the factor itself at the joint, such as Kt 1.8")
_OTHERWISE: Final = later("verify it by other means")

# A second wording names the material.
REMEDIES_OF_SHOULDERS: Final[Mapping[Reason, tuple[str, str]]] = {
    "no_allowable_peak": (
        later("enter the material's allowable peak stress"),
        later("enter an allowable peak stress for {material}"),
    ),
    "no_endurance": (
        later("enter the material's endured amplitude and ultimate stress"),
        later("enter endured amplitude and ultimate stress for {material}"),
    ),
    "shoulder_at_end": 2 * (later("take the shoulder off or put it at a joint between segments"),),
    "shoulder_no_step": 2 * (_FACTOR,),
    "shoulder_not_round": 2 * (_FACTOR,),
    "shoulder_out_of_range": 2 * (_FACTOR,),
    "shoulder_bonded": 2 * (_OTHERWISE,),
}  # fmt: skip


def ratio_facts(ratio: float | None) -> dict[str, str]:
    """What the sentence on the range of the fit is filled with."""
    found = "" if ratio is None else reading(ratio, 3, strip=True)
    return {
        "ratio": found,
        "least": reading(LEAST_RATIO, 3, strip=True),
        "most": reading(MOST_RATIO, 3, strip=True),
    }


def not_made_words(check: Check) -> str:
    """The sentence for several checks not made for this one's reason; the reason itself stands in it."""
    if check.check == "peak":
        return tr("Not checked: peak stress at joint {places} ({states}): {reason}")
    if check.joint is not None:
        return tr("Not checked: fatigue at joint {places} ({states}): {reason}")
    return tr("Not checked: fatigue in {places} ({states}): {reason}")
