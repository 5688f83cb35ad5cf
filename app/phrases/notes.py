"""Standing sentences: the numerical error in words, what this version does not cover, the caution."""

from __future__ import annotations

import math
from typing import Final

from app.numerals import at_most
from app.words import later, tr

BEDDING: Final = later(
    "The bedding pushes and pulls alike and has no slip limit: check that the ground can do so"
)
NO_EXPANSION: Final = later(
    "The temperature of {places} in {cases} has no effect: the material has no expansion"
)
NO_DENSITY_IN_PART: Final = later(
    "Gravity in {cases} leaves out a part of {places}: the material of one of its bonded parts has no density"
)
NO_DENSITY: Final = later("Gravity in {cases} gives no weight to {places}: the material has no density")


def numerical_error_sentence(bound: float) -> str:
    """The relative error bound of a state (or the largest of several) in words; never rounded down."""
    return tr("Numerical error {bound}").format(bound=numerical_error_text(bound))


def numerical_error_text(bound: float) -> str:
    """The same for where its name stands beside it."""
    if not math.isfinite(bound):
        return tr("unknown")
    sentence = tr("at most {bound} (displacement, energy norm); it says nothing about the model or the input")
    return sentence.format(bound=at_most(bound))


def caution() -> str:
    """What every sheet, terminal and window says about the calculation as a whole."""
    return tr(
        "An aid to calculation, to be verified by a competent engineer;"
        " local codes and licensed practice govern."
    )
