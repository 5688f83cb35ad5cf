"""Allowable stresses as the strips of σ draw them, the same on screen and paper: where, and in what words.

Over several states it is the least allowable that is drawn: no stress inside it is over the limit in any of
them, and the words say that it is the least where the states' factors differ.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from itertools import pairwise
from typing import Final

import numpy as np

from app.units import format_value
from app.words import tr
from solver.arrays import FloatArray, IntArray
from solver.model import UnitSystemName
from solver.results import Results

FAR: Final = 12.0  # an allowable beyond this many times the largest stress of its sign is named, not drawn,
FAR_FROM_ALL: Final = 3.0  # unless it is within this many times the largest stress of either sign
NOTHING: Final = 1e-9  # a strain this small is drawn as nothing


@dataclass(frozen=True, slots=True)
class AllowableLine:
    """An allowable from `first` to `last` (m); `value` in Pa is negative in compression."""

    first: float
    last: float
    value: float
    far: bool  # too far from the stress to be drawn to scale
    least: bool  # the least of several states with different factors


def least_allowables(results: Results, states: tuple[int, ...]) -> tuple[FloatArray, FloatArray]:
    """The least allowable of the states in tension and in compression, (n,) Pa, NaN where there is none."""
    rows, allowables = list(states), results.allowables
    return allowables.tension[rows].min(axis=0), allowables.compression[rows].min(axis=0)


def over_least(
    results: Results,
    states: tuple[int, ...],
    segment: IntArray,
    stress: FloatArray,
    utilisation: FloatArray,
) -> FloatArray:
    """What is above 1 where a stress of the envelope is over the limit, all (k,), NaN without an allowable.

    There some state has a utilisation above 1, and this stress is beyond the least allowable of its sign.
    """
    tension, compression = least_allowables(results, states)
    least = np.where(stress > 0, tension[segment], compression[segment])
    over: FloatArray = np.minimum(utilisation, np.abs(stress) / least)
    return over


def unchecked_segments(
    results: Results, states: Sequence[int], segment: IntArray, utilisation: FloatArray
) -> frozenset[int]:
    """Segments with a check of stress not made in one of the states, or without any utilisation (k,)."""
    missing = {int(i) for i in np.unique(segment[np.isnan(utilisation)])}
    names = {results.states[i].name for i in states if results.states[i].checked}
    marks = {c.segment for c in results.checks if c.status == "not_made" and c.combination in names}
    return frozenset(missing | {i for i, s in enumerate(results.project.segments) if s.mark in marks})


def allowable_lines(
    results: Results, states: tuple[int, ...], stress: tuple[FloatArray, ...]
) -> tuple[AllowableLine, ...]:
    """The lines of the states' allowables beside the drawn stresses, of each sign that has any stress."""
    largest = max(float(curve.max()) for curve in stress), -min(float(curve.min()) for curve in stress)
    nothing = NOTHING * float(results.chain.modulus.max())
    least = len({results.states[index].allowable_factor for index in states}) > 1
    sides = zip((1.0, -1.0), largest, least_allowables(results, states), strict=True)
    return tuple(
        AllowableLine(*run, abs(run[2]) > max(FAR * reached, FAR_FROM_ALL * max(largest)), least)
        for sign, reached, allowable in sides
        if reached > nothing
        for run in _runs(results.position, sign * allowable)
    )


def allowable_texts(line: AllowableLine, system: UnitSystemName) -> tuple[str, ...]:
    """What the line says, and the same in ever less room; at last its number alone."""
    number = format_value(abs(line.value), "stress", system, strip=True)
    words = [tr("least allowable {value}"), tr("least {value}")] if line.least else [tr("allowable {value}")]
    return (*(word.format(value=number) for word in words), number)


def _runs(position: FloatArray, allowable: FloatArray) -> list[tuple[float, float, float]]:
    """From, to and value; neighbours with the same allowable share one line."""
    changes = np.flatnonzero(np.diff(np.nan_to_num(allowable)) != 0) + 1
    starts = [0, *changes.tolist(), len(allowable)]
    return [
        (float(position[first]), float(position[stop]), float(allowable[first]))
        for first, stop in pairwise(starts)
        if np.isfinite(allowable[first])
    ]
