"""What the companions do: their forces by state, whether they have parted, and the clamp force that remains.

The clamp force is what a companion that acts one way only presses or pulls its far joint with. The least over
the checked states is what is left of a tightening; it needs no limit of the user's to be told.
"""

from __future__ import annotations

import math
from collections.abc import Iterator

from app.findings.records import CompanionFinding, CompanionState
from app.phrases.states import state_words
from app.units import format_value
from app.words import tr
from solver.model import Companion, UnitSystemName
from solver.results import CompanionResults, Results


def companion_findings(results: Results, system: UnitSystemName) -> tuple[CompanionFinding, ...]:
    """One for each companion, in the order of the file."""
    found = results.companions
    if found is None:
        return ()
    return tuple(
        _finding(results, found, at, companion, system)
        for at, companion in enumerate(results.project.companions)
    )


def _finding(
    results: Results, found: CompanionResults, at: int, companion: Companion, system: UnitSystemName
) -> CompanionFinding:
    first, last = found.companions.first[at : at + 2].tolist()
    least = float(found.least_clamp[at])
    worst = int(found.least_clamp_state[at])
    return CompanionFinding(
        at=at,
        mark=companion.mark,
        acts=companion.action,
        segments=tuple(range(first, last)),
        position=float(found.ends[last - 1]),
        sentence=_clamp_sentence(results, found, at, companion, system),
        clamp=None if math.isnan(least) else least,
        clamp_text="" if math.isnan(least) else _force(least, system),
        clamp_state=results.states[worst].name,
        parts=bool(found.separated[worst, at]),
        states=tuple(_states(results, found, at, companion, system)),
    )


def _states(
    results: Results, found: CompanionResults, at: int, companion: Companion, system: UnitSystemName
) -> Iterator[CompanionState]:
    for index, state in enumerate(results.states):
        if state.checked:
            separated = bool(found.separated[index, at])
            start, end = float(found.force_from[index, at]), float(found.force_to[index, at])
            yield CompanionState(
                name=state_words(state.name),
                kind=state.kind,
                force_from=start,
                force_to=end,
                separated=separated,
                gap=float(found.gap[index, at]),
                text=_state_text(start, end, companion, system, separated=separated)
                + (_gap_text(float(found.gap[index, at]), system) if separated else ""),
            )


def _state_text(
    start: float, end: float, companion: Companion, system: UnitSystemName, *, separated: bool
) -> str:
    """The force, both ends where they differ, and whether it has parted."""
    if separated:
        return tr("slack") if companion.action == "tension" else tr("separated")
    texts = [_force(start, system), _force(end, system)]
    return texts[0] if texts[0] == texts[1] else " → ".join(texts)


def _gap_text(gap: float, system: UnitSystemName) -> str:
    """By how much it has parted; nothing where it hardly has."""
    if gap == 0.0:
        return ""
    return tr(", gap {gap}").format(gap=format_value(gap, "displacement", system, strip=True, with_unit=True))


def _clamp_sentence(
    results: Results, found: CompanionResults, at: int, companion: Companion, system: UnitSystemName
) -> str:
    """What remains of the clamping, or where it is lost; empty for a companion that is tied."""
    least, state = float(found.least_clamp[at]), int(found.least_clamp_state[at])
    if math.isnan(least):
        return ""
    name = state_words(results.states[state].name)
    if found.separated[state, at] and found.gap[:, at].max() > 0.0:
        gaps = [i for i, one in enumerate(results.states) if one.checked and found.separated[i, at]]
        widest = max(gaps, key=lambda i: found.gap[i, at])
        gap = format_value(float(found.gap[widest, at]), "displacement", system, strip=True, with_unit=True)
        words = (
            tr("Companion {mark} is slack: no force, gap {gap}, {state}")
            if companion.action == "tension"
            else tr("Companion {mark} separates at joint {joint}: no clamp force, gap {gap}, {state}")
        )
        return words.format(
            mark=companion.mark, joint=companion.end, gap=gap, state=state_words(results.states[widest].name)
        )
    words = (
        tr("Companion {mark}: least tension {force}, {state}")
        if companion.action == "tension"
        else tr("Companion {mark}: least clamp force {force}, {state}")
    )
    return words.format(mark=companion.mark, force=_force(least, system), state=name)


def _force(value: float, system: UnitSystemName) -> str:
    return format_value(value, "force", system, with_unit=True)
