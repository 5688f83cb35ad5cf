"""The shape in which the member buckles in one state, evaluated where somebody looks: no size, largest 1.

Beside the fields of stress and force, since few states have a shape and nobody else should wait for it.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from solver.arrays import FloatArray, IntArray, frozen
from solver.buckling_mode import Mode
from solver.results import Results
from solver.sampling import Window, places_for


@dataclass(frozen=True, slots=True)
class ModeCurve:
    """The shape along the member, all (k,), in order of x; its largest value is among them."""

    segment: IntArray
    x: FloatArray
    deflection: FloatArray


def mode_in(results: Results, state: int | None) -> Mode | None:
    """The shape of one state; none of the envelope, of what is not compressed, of what was not computed."""
    found = None if state is None else results.stability[state]
    return None if found is None else found.mode


def peak_of(results: Results, mode: Mode) -> float:
    """Where the shape is largest, x in m."""
    start, length = results.position[mode.peak_segment], results.chain.length[mode.peak_segment]
    return float(start + mode.peak * length)


def mode_curve(
    results: Results, state: int | None, points: int = 600, near: Window | None = None
) -> ModeCurve | None:
    """The shape of one state through about `points` places."""
    mode = mode_in(results, state)
    if mode is None:
        return None
    places = places_for(results, np.array([state]), points, near, (peak_of(results, mode),))
    return ModeCurve(places.segment, places.x, frozen(mode.at(places.segment, places.fraction)))


def mode_along(results: Results, mode: Mode, segment: IntArray, x: FloatArray) -> FloatArray:
    """(k,) the shape at places x of segments."""
    fraction = (x - results.position[segment]) / results.chain.length[segment]
    return mode.at(segment, np.clip(fraction, 0.0, 1.0))


def mode_at(results: Results, state: int | None, x: float) -> float | None:
    """The shape at one place; a chain has no hinges, so both sides of a joint have the same."""
    mode = mode_in(results, state)
    if mode is None:
        return None
    last = len(results.position) - 2
    segment = np.array([np.clip(np.searchsorted(results.position, x, side="right") - 1, 0, last)])
    return float(mode_along(results, mode, segment, np.array([x]))[0])
