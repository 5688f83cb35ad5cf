"""A number of the project in the hand: how far a pull takes it, in which steps, and where it must stop."""

from __future__ import annotations

import math
from collections.abc import Callable
from dataclasses import dataclass
from fractions import Fraction

from app.edits import EditError
from app.edits.linear import exact
from app.hand.steps import fine_step, next_step, round_step, snapped
from app.phrases import fault_sentence
from app.units import Quantity, format_value, input_text, symbol
from app.words import tr
from solver.model import Project, UnitSystemName

COARSE = 10  # steps that a large one counts for


@dataclass(frozen=True, slots=True)
class Grip:
    """One number. A pull is counted in pixels, positive where the handle goes outward or along +x.

    `name` is that of the undo step; `at` gives the value after a pull, not yet rounded; `put` the project
    with a value (EditError where it is refused); `tell` says what a value means and what moves along.
    The value stays over `above` and under `below`, and is never less than `least`.
    """

    name: str
    quantity: Quantity
    system: UnitSystemName
    value: float
    at: Callable[[float], float]
    put: Callable[[float], Project]
    tell: Callable[[float], str]
    above: float = -math.inf
    least: float = -math.inf
    below: float = math.inf

    def pulled(self, pixels: float, *, free: bool = False) -> float:
        """The value after a pull: on a round step or back where it was, whichever is nearer; or `free`."""
        wanted, step = self.at(pixels), self._fine if free else self._step
        found = snapped(wanted, step)
        if abs(wanted - self.value) <= abs(wanted - found):
            return self.value
        return self._within(found, step)

    def nudged(self, value: float, direction: int, *, coarse: bool = False) -> float:
        """A step on from a value (`direction` 1) or back (−1), or a large one."""
        step = self._step * (COARSE if coarse else 1)
        return self._within(next_step(value, step, direction), step)

    def outcome(self, value: float) -> Outcome:
        """The project with the value, or why there is none."""
        try:
            return Outcome(value, self.put(value))
        except EditError as error:
            reasons = (fault_sentence(fault, self.system) for fault in error.faults)
            return Outcome(value, None, "; ".join(reasons))

    def was(self, value: float) -> str:
        """What the value was before, and by how much it has changed."""
        old = input_text(self.value, self.quantity, self.system)
        unit = symbol(self.quantity, self.system)
        change = format_value(value - self.value, self.quantity, self.system, strip=True)
        sign = "+" if value > self.value else ""
        return tr("was {old} {unit} ({change})").format(old=old, unit=unit, change=f"{sign}{change}")

    @property
    def _rate(self) -> float:
        """How much of the number a pixel is, where the pull begins."""
        return abs(self.at(0.5) - self.at(-0.5)) or math.ulp(self.value)

    @property
    def _step(self) -> Fraction:
        return round_step(self._rate, self.quantity, self.system)

    @property
    def _fine(self) -> Fraction:
        return fine_step(self._rate, self.quantity, self.system)

    def _within(self, value: float, step: Fraction) -> float:
        """The value, kept on the steps that the bounds leave; where it is beyond them already, it stays."""
        low, high = -math.inf, math.inf
        if math.isfinite(self.above):
            low = min(float((math.floor(exact(self.above) / step) + 1) * step), self.value)
        if math.isfinite(self.below):
            high = max(float((math.ceil(exact(self.below) / step) - 1) * step), self.value)
        return min(max(value, low, self.least), high)


@dataclass(frozen=True, slots=True)
class Outcome:
    """What a value makes: a project, or the reason why it is refused."""

    value: float
    project: Project | None
    reason: str = ""


@dataclass(frozen=True, slots=True)
class Refusal:
    """Why a hand cannot take hold of a number, and what to do, in words."""

    reason: str
