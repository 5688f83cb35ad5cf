"""What is drawn besides the shown curves: a reference dashed, single states thin, an envelope dotted.

Plain values, as all that strips show.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import TypeAlias

import numpy as np

from app.strip_choice import Kind
from app.words import tr
from solver.arrays import FloatArray, IntArray
from solver.fields import Curves, Envelope, bundle, curves, envelope
from solver.results import Results

LEGEND_BETWEEN = " · "  # the parts of a legend
Values: TypeAlias = dict[Kind, tuple[FloatArray, ...]]

NONE, PLAIN, TENSION, COMPRESSION, OVER = -1, 0, 1, 2, 3  # how an interval of a curve is drawn


@dataclass(frozen=True, slots=True)
class Trace:
    """One curve of k points and how each of its k − 1 intervals is drawn (NONE: a jump or no value)."""

    x: FloatArray  # (k,) m
    value: FloatArray  # (k,) SI
    drawn: IntArray  # (k − 1,)


@dataclass(frozen=True, slots=True)
class Earlier:
    """The same curves of a reference: its name, places (k,) and values; empty where it has no such state."""

    name: str
    x: FloatArray
    values: Values


@dataclass(frozen=True, slots=True)
class Beside:
    """What is drawn along with the shown curves: the single states of an envelope, or a state's envelope."""

    x: FloatArray
    values: Values
    is_envelope: bool


@dataclass(frozen=True, slots=True)
class Company:
    """All that is drawn besides the shown curves."""

    earlier: Earlier | None = None
    beside: Beside | None = None

    def values(self, kind: Kind) -> tuple[FloatArray, ...]:
        """Their values in a strip, for its range."""
        return sum((part.values.get(kind, ()) for part in (self.earlier, self.beside) if part), ())

    def of_earlier(self, kind: Kind) -> tuple[Trace, ...]:
        """The traces of the reference."""
        return _plain_traces(self.earlier, kind)

    def singles(self, kind: Kind) -> tuple[Trace, ...]:
        """The traces of single states."""
        return () if self.beside is None or self.beside.is_envelope else _plain_traces(self.beside, kind)

    def around(self, kind: Kind) -> tuple[Trace, ...]:
        """The traces of the envelope around a state."""
        return _plain_traces(self.beside, kind) if self.beside and self.beside.is_envelope else ()

    @property
    def legend(self) -> str:
        """What the lines are that are not as thick as the shown ones."""
        parts = []
        if self.earlier is not None:
            words = tr("dashed: {name}") if self.earlier.values else tr("{name}: no state of this name")
            parts.append(words.format(name=self.earlier.name))
        if self.beside is not None:
            parts.append(tr("dotted: envelope") if self.beside.is_envelope else tr("thin: states"))
        return LEGEND_BETWEEN.join(parts)


def _plain_traces(part: Earlier | Beside | None, kind: Kind) -> tuple[Trace, ...]:
    """Lines and no more: where they jump or have no value they break."""
    if part is None:
        return ()
    steps = np.diff(part.x) > 0
    values = part.values.get(kind, ())
    return tuple(
        Trace(part.x, value, np.where(steps & np.isfinite(value[1:] + value[:-1]), PLAIN, NONE))
        for value in values
    )


def earlier_curves(
    name: str,
    results: Results,
    state: int | None,
    near: tuple[float, float] | None = None,
    *,
    whole: bool = True,
) -> Earlier:
    """The curves of a reference in one state, or of its envelope where that is shown (`whole`)."""
    if state is None and not whole:
        return Earlier(name, results.position, {})
    if state is None:
        whole = envelope(results, near=near)
        return Earlier(name, whole.x, of_envelope(whole))
    shown = curves(results, state, near=near)
    return Earlier(name, shown.x, of_state(shown))


def envelope_beside(results: Results, near: tuple[float, float] | None = None) -> Beside | None:
    """The envelope, where it is of more than one state."""
    if sum(state.checked for state in results.states) < 2:
        return None
    shown = envelope(results, near=near)
    return Beside(shown.x, of_envelope(shown), is_envelope=True)


def singles_beside(results: Results, near: tuple[float, float] | None = None) -> Beside:
    """The states that the envelope is of."""
    shown = bundle(results, near=near)
    values: Values = {
        "displacement": tuple(shown.displacement),
        "force": tuple(shown.force),
        "stress": tuple(shown.stress),
        "utilisation": tuple(shown.utilisation),
    }
    return Beside(shown.x, values, is_envelope=False)


def of_state(shown: Curves) -> Values:
    """The curves of one state, by strip."""
    return {
        "displacement": (shown.displacement,),
        "force": (shown.force,),
        "stress": (shown.stress,),
        "utilisation": (shown.utilisation,),
    }


def of_envelope(shown: Envelope) -> Values:
    """The largest and the smallest, by strip; of utilisation the largest."""
    return {
        "displacement": (shown.displacement_max, shown.displacement_min),
        "force": (shown.force_max, shown.force_min),
        "stress": (shown.stress_max, shown.stress_min),
        "utilisation": (shown.utilisation,),
    }
