"""Loads in the hand. The drawing shows a state, a load belongs to a case: a pull changes the case that is
edited so that what is shown follows the hand, that is divided by the case's factor in what is shown.

A load has no size on paper that a hand could follow to scale; a pull of `FULL` pixels is the load itself.
"""

from __future__ import annotations

from dataclasses import dataclass
from math import fsum
from typing import Final

from msgspec import UNSET

from app import edits
from app.edits.linear import exact, rounded
from app.hand.cells import case_share
from app.hand.grip import Grip, Refusal
from app.hand.sections import Where
from app.shown import Shown
from app.units import Quantity, input_text, symbol
from app.words import later, tr
from solver.model import LoadCase, Project, end_of

FULL = 80.0  # pixels
NEGLIGIBLE = 1e-12


@dataclass(frozen=True, slots=True)
class Aim:
    """Which case a pull changes, and with which factor it takes part in what is shown."""

    case: LoadCase
    factor: float
    shown: Shown

    @property
    def alone(self) -> bool:
        """Whether the case itself is what is shown."""
        return self.shown.kind == "case"


def aim_at(project: Project, shown: Shown, case: str | None) -> Aim | Refusal:
    """The edited case as part of what is shown; a refusal where it takes no part in it."""
    edited = next((found for found in project.load_cases if found.name == case), None)
    if edited is None:
        return Refusal(tr("There is no load case to edit: add one in the Loads table."))
    factor = case_share(project, shown, project.load_cases.index(edited))
    if abs(factor) > NEGLIGIBLE:
        return Aim(edited, factor, shown)
    return Refusal(
        tr(
            "{case}, whose loads are edited, takes no part in {shown}: "
            "choose another case at Edit loads of, or show {case}."
        ).format(case=edited.name, shown=shown.name)
    )


def force_grip(project: Project, joint: int, aim: Aim, total: float) -> Grip:
    """The force at a joint in the edited case; `total` is what is shown there."""
    mark = project.joints[joint].mark
    value = fsum(load.force for load in aim.case.joint_loads if load.joint == mark)
    cancelled = abs(total) <= NEGLIGIBLE * abs(aim.factor * value)
    size = _largest_force(aim.case) if cancelled else abs(total)
    rate = (size or 1.0) / FULL / aim.factor

    def put(force: float) -> Project:
        return edits.set_joint_load(project, aim.case.name, mark, "force", force or UNSET)

    def tell(force: float) -> str:
        words = tr("Force at {mark}: {value} {unit}, {case}")
        shown = total + aim.factor * (force - value)
        return _told(project, aim, words, mark, "force", (force,)) + _as_shown(
            project, aim, "force", force, shown
        )

    return Grip(
        name=_as_typed(tr("Force along +x"), mark, aim),
        quantity="force",
        system=project.display.unit_system,
        value=value,
        at=lambda pixels: value + rate * pixels,
        put=put,
        tell=tell,
    )


def _largest_force(case: LoadCase) -> float:
    return max((abs(load.force) for load in case.joint_loads), default=0.0)


def distributed_grip(
    project: Project, index: int, where: Where, aim: Aim, total: tuple[float, float]
) -> Grip:
    """The distributed load on a segment in the edited case; outward is more of the direction it has."""
    mark = project.segments[index].mark
    found = [load for load in aim.case.segment_loads if load.segment == mark]
    start = fsum(load.load_start for load in found)
    end = fsum(end_of(load.load_start, load.load_end) for load in found)
    at_hand, here = (end, total[1]) if where == "end" else (start, total[0])
    largest = max(abs(total[0]), abs(total[1])) or 1.0
    sign = -1.0 if (here or sum(total)) < 0 else 1.0
    rate = sign * largest / FULL / aim.factor

    def ends(value: float) -> tuple[float, float]:
        return _ends(start, end, where, value)

    def put(value: float) -> Project:
        return _put_distributed(project, aim.case.name, mark, ends(value))

    def tell(value: float) -> str:
        words = tr(DISTRIBUTED["plain" if where == "both" and start == end else where])
        text = _told(project, aim, words, mark, "distributed", ends(value))
        shown = here + aim.factor * (value - at_hand)
        return text + _as_shown(project, aim, "distributed", value, shown)

    return Grip(
        name=_as_typed(tr(COLUMNS["start" if where == "both" and start == end else where]), mark, aim),
        quantity="distributed",
        system=project.display.unit_system,
        value=at_hand,
        at=lambda pixels: at_hand + rate * pixels,
        put=put,
        tell=tell,
    )


def _as_typed(column: str, mark: str, aim: Aim) -> str:
    """A step is called the same whether it is pulled or typed into the table."""
    return tr("{column} of {row}, {case}").format(column=column, row=mark, case=aim.case.name)


COLUMNS: Final = {
    "start": later("Load at start"),
    "end": later("Load at end"),
    "both": later("Load"),
}
DISTRIBUTED: Final = {
    "start": later("Load on {mark} at its start: {value} {unit}, {case}"),
    "end": later("Load on {mark} at its end: {last} {unit}, {case}"),
    "both": later("Load on {mark}: {value} at its start, {last} {unit} at its end, {case}"),
    "plain": later("Load on {mark}: {value} {unit}, {case}"),
}


def _ends(start: float, end: float, where: Where, value: float) -> tuple[float, float]:
    """Both ends with the value at one; at `both` the start takes it and the end goes along."""
    if where == "start":
        return value, end
    if where == "end":
        return start, value
    return value, value if start == end else rounded(exact(end) + exact(value) - exact(start))


def _put_distributed(project: Project, case: str, mark: str, ends: tuple[float, float]) -> Project:
    """Both ends written; the second only where it differs, neither where nothing is left."""
    start, end = ends
    first = UNSET if start == end == 0.0 else start
    changed = edits.set_segment_load(project, case, mark, "load_start", first)
    return edits.set_segment_load(changed, case, mark, "load_end", UNSET if start == end else end)


def _told(
    project: Project, aim: Aim, words: str, mark: str, quantity: Quantity, values: tuple[float, ...]
) -> str:
    system = project.display.unit_system
    texts = [input_text(value, quantity, system) for value in values]
    unit = symbol(quantity, system)
    return words.format(mark=mark, value=texts[0], last=texts[-1], unit=unit, case=aim.case.name)


def _as_shown(project: Project, aim: Aim, quantity: Quantity, value: float, in_state: float) -> str:
    """What the state that is shown comes to, where that is another number than the case's own."""
    system = project.display.unit_system
    shown, factor = input_text(in_state, quantity, system), input_text(aim.factor, "factor", system)
    if aim.alone or shown == input_text(value, quantity, system):
        return ""
    return "\n" + tr("counts ×{factor}: {value} {unit} in {shown}").format(
        factor=factor, value=shown, unit=symbol(quantity, system), shown=aim.shown.name
    )
