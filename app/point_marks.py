"""What the strips show at single places beside their curves: peak stresses at shoulders, and fatigue.

A mark is a diamond with a word; the same on screen and paper. Fatigue away from shoulders is one of every
segment, so only the worst of them is marked; that of companions, which the strips do not show, is not.
"""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Sequence
from dataclasses import dataclass
from typing import Final

from app.findings.subjects import utilisation_of
from app.strip_choice import Kind
from app.units import format_value, utilisation_text
from app.words import tr
from solver.checks import Check
from solver.results import Results

MOST: Final = 60  # in one strip; a chain of thousands of shoulders would be all diamonds


@dataclass(frozen=True, slots=True)
class PointMark:
    """A value at one place: x in m, value in SI, its text, and whether it is beyond what is allowed."""

    x: float
    value: float
    text: str
    over: bool


def point_marks(results: Results, states: Sequence[int], kind: Kind) -> tuple[PointMark, ...]:
    """The marks of one strip for these states, the worst first; none in other strips and unchecked states."""
    project = results.project
    if kind not in ("stress", "utilisation") or not (
        project.fatigue or any(j.shoulder for j in project.joints)
    ):
        return ()
    names = {results.states[state].name for state in states if results.states[state].checked}
    found = _peaks(results, names) if kind == "stress" else _utilisations(results, names)
    return tuple(sorted(found, key=lambda mark: -abs(mark.value))[:MOST])


def _peaks(results: Results, names: set[str]) -> Iterator[PointMark]:
    """The largest and the smallest peak stress of each shoulder."""
    made = [c for c in results.checks if c.check == "peak" and c.value is not None and c.combination in names]
    for own in _by_place(made):
        for sign in (1.0, -1.0):
            check = max(own, key=lambda c: sign * (c.value or 0.0))
            value = check.value or 0.0
            if sign * value > 0.0:
                text = format_value(value, "stress", results.project.display.unit_system, 3)
                yield _mark(check, value, tr("peak {value}").format(value=text))


def _utilisations(results: Results, names: set[str]) -> Iterator[PointMark]:
    """The largest of each shoulder, of peak stress and of fatigue; elsewhere the largest of all."""
    made = [c for c in results.checks if c.utilisation is not None and names & {*_states(c)}]
    marks = {segment.mark for segment in results.project.segments}
    peaks = [c for c in made if c.check == "peak"]
    swings = [c for c in made if c.check == "fatigue" and c.joint is not None]
    plain = [c for c in made if c.check == "fatigue" and c.joint is None and c.segment in marks]
    for own in _by_place(peaks):
        yield _used(max(own, key=utilisation_of), tr("peak {value}"))
    for own in (*_by_place(swings), *([plain] if plain else [])):
        yield _used(max(own, key=utilisation_of), tr("fatigue {value}"))


def _states(check: Check) -> tuple[str, ...]:
    return check.between or (check.combination,)


def _by_place(checks: Iterable[Check]) -> list[list[Check]]:
    places: dict[str | None, list[Check]] = {}
    for check in checks:
        places.setdefault(check.joint, []).append(check)
    return list(places.values())


def _used(check: Check, words: str) -> PointMark:
    value = check.utilisation or 0.0
    return _mark(check, value, words.format(value=utilisation_text(value, check.status)))


def _mark(check: Check, value: float, text: str) -> PointMark:
    return PointMark(check.position or 0.0, value, text, check.status == "fail")
