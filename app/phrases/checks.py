"""The sentences of checks and of the verdict over them.

Careful with what is said: "Passes" alone stands only where every check was made and passes; a waived check is
named in the same line.
"""

from __future__ import annotations

from collections import Counter
from collections.abc import Iterator, Mapping
from typing import Final, Literal

from app.numerals import reading, rounded
from app.phrases import stability
from app.phrases.fatigue import fatigue_place, fatigue_sentence, fatigue_subject, swing_text
from app.phrases.segments import part_words, segment_words
from app.phrases.shoulders import REASONS_OF_SHOULDERS, REMEDIES_OF_SHOULDERS, ratio_facts
from app.phrases.states import state_words
from app.units import Quantity, format_value, symbol, to_display, utilisation_text
from app.words import later, tr, trn
from solver.checks import STRESSES, Check, CheckKind, Reason, Status
from solver.model import UnitSystemName
from solver.results import Results

QUANTITIES: Final[Mapping[CheckKind, Quantity]] = {
    "tension": "stress",
    "compression": "stress",
    "peak": "stress",
    "fatigue": "stress",
    "displacement": "displacement",
    "relative": "displacement",
    "reaction": "force",
    "stability": "factor",
}

CHECKS: Final[Mapping[CheckKind, str]] = {
    "tension": later(
        "{segment}: {value} of {limit} {unit} in tension, {utilisation}, at {position}, {combination}"
    ),
    "compression": later(
        "{segment}: {value} of {limit} {unit} in compression, {utilisation}, at {position}, {combination}"
    ),
    "peak": later("Joint {joint}: peak {value} of {limit} {unit}, Kt {factor}, {utilisation}, {combination}"),
    "displacement": later(
        "Joint {joint}: displacement {value} of {limit} {unit}, {utilisation}, {combination}"
    ),
    "relative": later(
        "Joints {start} to {end}: relative displacement {value} of {limit} {unit}, {utilisation},"
        " {combination}"
    ),
    "reaction": later("Joint {joint}: reaction {value} of {limit} {unit}, {utilisation}, {combination}"),
    "stability": stability.CHECK,
}

# Of a stress beside a mark and a utilisation of its own.
SHORT: Final[Mapping[Literal["tension", "compression"], str]] = {
    "tension": later("{value} of {limit} {unit} in tension, at {position}, {combination}"),
    "compression": later("{value} of {limit} {unit} in compression, at {position}, {combination}"),
}

SUBJECTS: Final[Mapping[CheckKind, str]] = {
    "tension": later("{segment}: tension"),
    "compression": later("{segment}: compression"),
    "peak": later("Joint {joint}: peak stress"),
    "displacement": later("Joint {joint}: displacement"),
    "relative": later("Joints {start} to {end}: relative displacement"),
    "reaction": later("Joint {joint}: reaction"),
    "stability": stability.SUBJECT,
}

# Why a check was not made.
REASONS: Final[Mapping[Reason, str]] = {
    **REASONS_OF_SHOULDERS,
    "no_allowable_tension": later("the material has no allowable stress in tension"),
    "no_allowable_compression": later("the material has no allowable stress in compression"),
    "no_support": later("the joint has no support and so no reaction"),
    **stability.REASONS,
}

# What to enter for it; a second wording names the material.
REMEDIES: Final[Mapping[Reason, tuple[str, str]]] = {
    **REMEDIES_OF_SHOULDERS,
    "no_allowable_tension": (
        later("enter the material's allowable stress in tension"),
        later("enter an allowable stress in tension for {material}"),
    ),
    "no_allowable_compression": (
        later("enter the material's allowable stress in compression"),
        later("enter an allowable stress in compression for {material}"),
    ),
    "no_support": (
        later("give it a support or take the limit out"),
        later("give it a support or take the limit out"),
    ),
    **{reason: (remedy, remedy) for reason, remedy in stability.REMEDIES.items()},
}

# Several checks not made for the same reason, in one sentence; those of shoulders and fatigue have their own.
NOT_MADE: Final[Mapping[Reason, str]] = {
    "no_allowable_tension": later("Not checked: tension in {places} ({states})"),
    "no_allowable_compression": later("Not checked: compression in {places} ({states})"),
    "no_support": later("Not checked: reaction at joint {places} ({states})"),
    **stability.NOT_MADE,
}

_PLACES: Final[Mapping[CheckKind, str]] = {
    "tension": later("segment {segment}, {combination}"),
    "compression": later("segment {segment}, {combination}"),
    "peak": later("peak stress at joint {joint}, {combination}"),
    "displacement": later("joint {joint}, {combination}"),
    "relative": later("joints {start} to {end}, {combination}"),
    "reaction": later("joint {joint}, {combination}"),
    "stability": later("stability, {combination}"),
}


def check_sentence(check: Check, system: UnitSystemName) -> str:
    """A check in one sentence: "C: 129 of 160 MPa in tension, 0.80, at 760 mm, Hot start"."""
    if check.value is None or check.limit is None or check.utilisation is None:
        return not_made_sentence(check)
    if check.check == "fatigue":
        return fatigue_sentence(check, position_text(check.position, system), system)
    return _filled(CHECKS[check.check], check, check.value, check.limit, check.utilisation, system)


def short_sentence(check: Check, system: UnitSystemName) -> str:
    """A made check of stress without its mark and utilisation, where those stand beside it."""
    if check.value is None or check.limit is None or check.utilisation is None:
        return not_made_sentence(check)
    template = SHORT["tension" if check.check == "tension" else "compression"]
    sentence = _filled(template, check, check.value, check.limit, check.utilisation, system)
    return sentence if check.part is None else f"{part_words(check.part, check.material)}: {sentence}"


def _filled(
    template: str, check: Check, value: float, limit: float, utilisation: float, system: UnitSystemName
) -> str:
    quantity = QUANTITIES[check.check]
    # A stress has its sign in words, tension or compression.
    size = abs(value) if check.check in STRESSES else value
    if check.check == "stability":
        value_text, limit_text = stability.factor_texts(value, limit, check.status)
    else:
        value_text, limit_text = compared(size, limit, check.status, quantity, system)
    return tr(template).format(
        **_names(check),
        value=value_text,
        limit=limit_text,
        unit=symbol(quantity, system),
        utilisation=utilisation_text(utilisation, check.status),
        position=position_text(check.position, system),
        factor="" if check.factor is None else reading(check.factor, 3),
    )


def not_made_sentence(check: Check) -> str:
    """A check that was not made, with the reason and what to enter."""
    if check.waiver is not None:
        return _waived_sentence(check, check.waiver)
    sentence = tr("{subject} not checked, {combination}: {reason}")
    reason = reason_text(check.reason, check.ratio) if check.reason else tr("it could not be made")
    return sentence.format(subject=subject_text(check), combination=state_text(check), reason=reason)


def _waived_sentence(check: Check, reason: str) -> str:
    words = tr("{subject} waived, {combination}: {reason}")
    return words.format(subject=subject_text(check), combination=state_text(check), reason=reason)


def subject_text(check: Check) -> str:
    """What a check is of, in a few words at the head of a line."""
    if check.check == "fatigue":
        return fatigue_subject(check)
    return tr(SUBJECTS[check.check]).format(**_names(check))


def state_text(check: Check) -> str:
    """The combination a check is of, of fatigue both."""
    return state_words(check.combination) if check.between is None else swing_text(check.between)


def reason_text(reason: Reason, ratio: float | None = None) -> str:
    """Why a check was not made, and what to enter for it; `ratio` is the check's."""
    return f"{why_text(reason, ratio)}; {remedy_text(reason)}"


def why_text(reason: Reason, ratio: float | None = None) -> str:
    """Why a check was not made."""
    return tr(REASONS[reason]).format(**ratio_facts(ratio))


def remedy_text(reason: Reason, material: str = "") -> str:
    """What to enter to have the check made, naming the material where it is known."""
    general, named = REMEDIES[reason]
    return tr(named).format(material=material) if material else tr(general)


def compared(
    value: float, limit: float, status: Status, quantity: Quantity, system: UnitSystemName
) -> tuple[str, str]:
    """Value and limit in display units, with as many digits as it takes not to contradict the status."""
    shown = to_display(value, quantity, system)
    bound = to_display(limit, quantity, system)
    digits, limit_digits = _digits(abs(shown), bound, status)
    return (
        format_value(value, quantity, system, digits),
        format_value(limit, quantity, system, limit_digits, strip=True),
    )


def _digits(value: float, limit: float, status: Status) -> tuple[int, int]:
    """The fewest digits of value and limit, both in display units, that agree with the status."""
    for limit_digits in range(_limit_digits(limit), _MOST_DIGITS):
        shown_limit = rounded(limit, limit_digits)
        for digits in range(_VALUE_DIGITS, _MOST_DIGITS):
            if not _contradicts(rounded(value, digits), shown_limit, status):
                return digits, limit_digits
    return _MOST_DIGITS, _MOST_DIGITS


_VALUE_DIGITS: Final = 3
_TYPED_DIGITS: Final = 6
_CONVERTED_DIGITS: Final = 4
_MOST_DIGITS: Final = 17
_SAME: Final = 1e-9  # of a limit, far below what six digits show


def _limit_digits(limit: float) -> int:
    """All digits of a limit that was typed in these units; four of one that was converted into them."""
    typed = abs(rounded(limit, _TYPED_DIGITS) - limit) <= _SAME * abs(limit)
    return _TYPED_DIGITS if typed else _CONVERTED_DIGITS


def _contradicts(value: float, limit: float, status: Status) -> bool:
    return (value > limit) != (status == "fail")


def position_text(position: float | None, system: UnitSystemName) -> str:
    """A position along the member, with its unit."""
    return "" if position is None else format_value(position, "length", system, strip=True, with_unit=True)


def _names(check: Check) -> dict[str, str | None]:
    """What a check is of, for the templates."""
    return {
        "segment": segment_words(check),
        "joint": check.joint,
        "start": check.start,
        "end": check.end,
        "combination": state_words(check.combination),
    }


def verdict_line(results: Results) -> str:
    """The verdict, which never flatters: what speaks against a pass stands in the same line.

    A waived check is named, and so is a state without any load. No note where the line says that the member
    does not pass, or nothing was checked.
    """
    made = any(check.status in ("pass", "fail") for check in results.checks)
    notes = _reservations(results) if made and results.verdict != "fail" else ()
    return "; ".join((_verdict(results), *notes))


def _reservations(results: Results) -> Iterator[str]:
    if any(check.status == "waived" for check in results.checks):
        yield tr("stability waived")
    names = [state.name for state in results.unloaded if state.kind != "unloaded"]
    if names:
        yield tr("no load in {names}").format(names=", ".join(names))
    elif results.unloaded:
        yield tr("no load entered")


def _verdict(results: Results) -> str:
    counts = Counter(check.status for check in results.checks)
    if counts["fail"]:
        return tr("Does not pass")
    if not counts["pass"]:
        return tr("Nothing checked")
    if counts["not_made"]:
        return trn("No check fails, {count} not made", "No check fails, {count} not made", counts["not_made"])
    return tr("Passes")


def verdict_detail(results: Results) -> str:
    """What stands under the verdict: the largest utilisation, what fails, what was not made."""
    governing = results.governing
    if governing is None or governing.utilisation is None:
        return _nothing_made(results)
    text = utilisation_text(governing.utilisation, governing.status)
    place = fatigue_place(governing) or tr(_PLACES[governing.check]).format(**_names(governing))
    largest = tr("Largest utilisation {utilisation}: {place}").format(utilisation=text, place=place)
    return f"{largest}. {_counted(results)}" if results.verdict == "fail" else largest


def _nothing_made(results: Results) -> str:
    if not results.checks:
        return tr("Nothing stresses the member and it has no limits: enter loads or limits to check")
    missing = sum(check.status == "not_made" for check in results.checks)
    return trn("{count} check could not be made", "{count} checks could not be made", missing)


def _counted(results: Results) -> str:
    """How many of the checks fail and how many were not made."""
    counts = Counter(check.status for check in results.checks)
    fails = trn("{count} of {{total}} checks fails", "{count} of {{total}} checks fail", counts["fail"])
    fails = fails.format(total=len(results.checks))
    if counts["not_made"]:
        fails += f", {tr('{count} not made').format(count=counts['not_made'])}"
    if counts["waived"]:
        fails += f", {tr('{count} waived').format(count=counts['waived'])}"
    return fails
