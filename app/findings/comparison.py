"""What has changed against a reference: verdict, largest utilisation, mass, displacements and reactions.

Like is held against like: a joint against the joint of the same mark, in the state of the same name. What has
no counterpart is left out of the differences, and the comparison says that it is not complete.
"""

from __future__ import annotations

from collections import Counter
from collections.abc import Callable, Iterator
from dataclasses import dataclass
from typing import Final

import numpy as np

from app.numerals import decimals_for, decimals_of, fixed, reading
from app.phrases.checks import verdict_line
from app.references import Reference
from app.units import Quantity, format_value, symbol, to_display, utilisation_text
from app.words import tr, trn
from solver.arrays import FloatArray
from solver.model import UnitSystemName
from solver.results import Results

MOST: Final = 3  # displacements and reactions that are named, those that change most
SAME: Final = 1e-9  # of the largest of its kind: the tolerance that the solver solves to
_DIGITS: Final = 4
_PLAIN: Final = (1e-3, 1e9)  # sizes of display values that are written without a power of ten


@dataclass(frozen=True, slots=True)
class Change:
    """One figure then and now: "1.05 → 0.97 (−0.08)"; without a name it goes on with the one above."""

    name: str
    text: str


@dataclass(frozen=True, slots=True)
class Comparison:
    """The figures against those of the reference called `name`; over checked states only."""

    name: str
    overall: tuple[Change, ...]
    displacements: tuple[Change, ...]  # of the joints that changed most, the most first
    reactions: tuple[Change, ...]
    notes: tuple[Change, ...]  # what could not be compared


def comparison(reference: Reference, results: Results, system: UnitSystemName) -> Comparison:
    """What `results` have that the reference has not, in display units."""
    old, new = reference.results, results
    return Comparison(
        reference.name,
        tuple(_overall(old, new, system)),
        _changes(old, new, lambda r: r.solution.joint_displacement, "displacement", system),
        _changes(old, new, lambda r: r.solution.reaction, "force", system),
        tuple(_notes(old, new)),
    )


def _overall(old: Results, new: Results, system: UnitSystemName) -> Iterator[Change]:
    verdicts = verdict_line(old), verdict_line(new)
    if verdicts[0] != verdicts[1]:
        first, *reservations = verdicts[0].split("; ")
        yield Change(tr("verdict before"), first)
        yield from (Change("", reservation) for reservation in reservations)  # a line each: none is cut off
    yield Change(tr("largest utilisation"), _utilisation_change(old, new))
    missing = _not_made(old), _not_made(new)
    if missing[0] != missing[1]:
        yield Change(tr("checks not made"), _arrow(*(fixed(count, 0) for count in missing)))
    lengths = float(old.position[-1]), float(new.position[-1])
    if not _same(*lengths, max(lengths)):
        yield Change(tr("length"), change_text(*lengths, "length", system))
    yield from _clamp_changes(old, new, system)
    masses = old.mass, new.mass
    yield Change(tr("mass"), change_text(*masses, "mass", system, scale=max(masses)))


def _clamp_changes(old: Results, new: Results, system: UnitSystemName) -> Iterator[Change]:
    """The least clamp force of companions that both have, where it has changed."""
    then, now = _clamps(old), _clamps(new)
    scale = max([abs(force) for force in (*then.values(), *now.values())], default=0.0)
    for mark, force in now.items():
        if mark in then and not _same(then[mark], force, scale):
            name = tr("least clamp force of {mark}").format(mark=mark)
            yield Change(name, change_text(then[mark], force, "force", system, scale=scale))


def _clamps(results: Results) -> dict[str, float]:
    """By the mark of those companions that act one way only."""
    if results.companions is None:
        return {}
    least = zip(results.project.companions, results.companions.least_clamp.tolist(), strict=True)
    return {companion.mark: force for companion, force in least if companion.action != "both"}


def _not_made(results: Results) -> int:
    return Counter(check.status for check in results.checks)["not_made"]


def _utilisation_change(old: Results, new: Results) -> str:
    """With as many decimals in the difference as it takes to see it; none where one was not computed."""
    then, now = (_largest(results) for results in (old, new))
    if then is None or now is None:
        none = tr("none checked")
        return _arrow(then[1] if then else none, now[1] if now else none)
    if _same(then[0], now[0], 1.0):
        return tr("{value}, unchanged").format(value=now[1])
    decimals = max(decimals_of(text) for text in (then[1], now[1]))
    return _with_difference(_arrow(then[1], now[1]), now[0] - then[0], decimals)


def _largest(results: Results) -> tuple[float, str] | None:
    check = results.governing
    if check is None or check.utilisation is None:
        return None
    return check.utilisation, utilisation_text(check.utilisation, check.status)


def _changes(
    old: Results,
    new: Results,
    values: Callable[[Results], FloatArray],
    quantity: Quantity,
    system: UnitSystemName,
) -> tuple[Change, ...]:
    """For each joint in both the state in which it changed most; of the joints those that changed most."""
    states, joints = _common_states(old, new), _common_joints(old, new)
    if not states or not joints:
        return ()
    then = values(old)[np.ix_([s for s, _ in states], [j for j, _ in joints])]
    now = values(new)[np.ix_([s for _, s in states], [j for _, j in joints])]
    scale = float(np.max(np.nan_to_num(np.abs([then, now])), initial=0.0))
    size = np.nan_to_num(np.abs(now - then), nan=-1.0)  # a reaction that only one of them has
    worst = np.argmax(size, axis=0)
    order = sorted(range(len(joints)), key=lambda j: -size[worst[j], j])[:MOST]
    return tuple(
        Change(
            tr("joint {mark}, {state}").format(
                mark=new.project.joints[joints[j][1]].mark, state=new.states[states[worst[j]][1]].name
            ),
            change_text(float(then[worst[j], j]), float(now[worst[j], j]), quantity, system, scale=scale),
        )
        for j in order
        if size[worst[j], j] > SAME * scale
    )


def _common_states(old: Results, new: Results) -> list[tuple[int, int]]:
    """Indices, then and now, of the checked states that both have."""
    then = {(s.kind, s.name): i for i, s in enumerate(old.states) if s.checked}
    now = ((i, (s.kind, s.name)) for i, s in enumerate(new.states) if s.checked)
    return [(then[key], i) for i, key in now if key in then]


def _common_joints(old: Results, new: Results) -> list[tuple[int, int]]:
    then = {joint.mark: i for i, joint in enumerate(old.project.joints)}
    return [(then[joint.mark], i) for i, joint in enumerate(new.project.joints) if joint.mark in then]


def _notes(old: Results, new: Results) -> Iterator[Change]:
    """How many states and joints have no counterpart, on either side."""
    states = sum(s.checked for r in (old, new) for s in r.states) - 2 * len(_common_states(old, new))
    if states:
        yield Change(tr("not compared"), trn("{count} state", "{count} states", states))
    joints = len(old.project.joints) + len(new.project.joints) - 2 * len(_common_joints(old, new))
    if joints:
        yield Change(tr("not compared"), trn("{count} joint", "{count} joints", joints))
    then, now = _supported(old), _supported(new)
    if then != now:
        count = len(then ^ now)
        yield Change(tr("not compared"), trn("{count} reaction", "{count} reactions", count))


def _supported(results: Results) -> set[str]:
    held = np.isfinite(results.solution.reaction[0])  # the same joints in every state
    return {results.project.joints[i].mark for i in np.flatnonzero(held).tolist()}


def change_text(
    old: float, new: float, quantity: Quantity, system: UnitSystemName, *, scale: float | None = None
) -> str:
    """Both values (SI) with the decimals of the larger, their unit, and the difference with its sign.

    The difference is taken before rounding. What differs by less than the solver's tolerance of `scale` is
    unchanged.
    """
    scale = max(abs(old), abs(new)) if scale is None else scale
    if _same(old, new, scale):
        value = format_value(0.0 if abs(new) <= SAME * scale else new, quantity, system, with_unit=True)
        return tr("{value}, unchanged").format(value=value)
    shown = [to_display(value, quantity, system) for value in (old, new)]
    largest = max(map(abs, shown))
    if not _PLAIN[0] <= largest < _PLAIN[1]:
        texts, decimals = [reading(value, _DIGITS) for value in shown], 0
    else:
        decimals = decimals_for(largest, _DIGITS)
        texts = [fixed(value, decimals) for value in shown]
    return _with_difference(f"{_arrow(*texts)} {symbol(quantity, system)}", shown[1] - shown[0], decimals)


def _same(old: float, new: float, scale: float) -> bool:
    return abs(new - old) <= SAME * scale


def _arrow(old: str, new: str) -> str:
    return f"{old} → {new}"


def _with_difference(text: str, difference: float, decimals: int) -> str:
    """With the decimals of the values, and more where it takes them for two digits of the difference."""
    few = 0 < abs(difference) * 10**decimals < 10
    number = reading(difference, 2) if few else fixed(difference, decimals)
    return f"{text} ({'+' if difference > 0 else ''}{number})"
