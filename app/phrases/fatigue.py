"""The sentences of fatigue, whose value is a pair and whose state is two: amplitude and mean, from and to."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Final

from app.phrases.segments import segment_words
from app.units import format_value, symbol, utilisation_text
from app.words import later, tr
from solver.checks import Check
from solver.model import UnitSystemName

# By whether it is of a shoulder, and whether the mean is tensile and so counts.
_SENTENCES: Final[Mapping[tuple[bool, bool], str]] = {
    (True, True): later(
        "Joint {joint}: fatigue, amplitude {amplitude} of {limit} {unit} and mean {mean} of {ultimate}"
        " {unit}, {utilisation}, {states}"
    ),
    (True, False): later(
        "Joint {joint}: fatigue, amplitude {amplitude} of {limit} {unit}, mean {mean} {unit} not counted,"
        " {utilisation}, {states}"
    ),
    (False, True): later(
        "{segment}: fatigue, amplitude {amplitude} of {limit} {unit} and mean {mean} of {ultimate} {unit},"
        " {utilisation}, at {position}, {states}"
    ),
    (False, False): later(
        "{segment}: fatigue, amplitude {amplitude} of {limit} {unit}, mean {mean} {unit} not counted,"
        " {utilisation}, at {position}, {states}"
    ),
}


def swing_text(between: tuple[str, str]) -> str:
    """The two combinations that the stress goes between."""
    return tr("{first} to {second}").format(first=between[0], second=between[1])


def fatigue_sentence(check: Check, position: str, system: UnitSystemName) -> str:
    """A made check of fatigue in one sentence."""
    mean = check.mean or 0.0
    return tr(_SENTENCES[check.joint is not None, mean > 0.0]).format(
        joint=check.joint,
        segment=segment_words(check),
        amplitude=format_value(check.amplitude or 0.0, "stress", system, 3),
        limit=format_value(check.limit or 0.0, "stress", system, 6, strip=True),
        mean=format_value(mean, "stress", system, 3),
        ultimate=format_value(check.ultimate or 0.0, "stress", system, 6, strip=True),
        unit=symbol("stress", system),
        utilisation=utilisation_text(check.utilisation or 0.0, check.status),
        position=position,
        states=_states(check),
    )


def fatigue_subject(check: Check) -> str:
    """What it is of, at the head of a line."""
    words = tr("{segment}: fatigue") if check.joint is None else tr("Joint {joint}: fatigue")
    return words.format(segment=segment_words(check), joint=check.joint)


def fatigue_place(check: Check) -> str:
    """Where it is, in the middle of a sentence; empty for a check of another kind."""
    if check.check != "fatigue":
        return ""
    shoulder = tr("fatigue at joint {joint}, {states}")
    words = tr("fatigue in segment {segment}, {states}") if check.joint is None else shoulder
    return words.format(segment=segment_words(check), joint=check.joint, states=_states(check))


def _states(check: Check) -> str:
    return "" if check.between is None else swing_text(check.between)
