"""Stresses against allowable stresses, as arrays over all states and segments.

A stress has a sign, and so a check, where it exceeds `NO_STRESS` of the largest in its state. Where every
force of a state lies within its own error bound, as in a heated bar that is free to grow, what is left is
rounding, and no stress has a sign.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from typing import TypeAlias

import numpy as np
from msgspec import UnsetType

from solver.arrays import BoolArray, FloatArray, frozen
from solver.checks import NO_STRESS
from solver.extremes import SAME, Extremes
from solver.model import BondedPart, CompanionSegment, Project, Segment
from solver.results import Allowables, State

Range: TypeAlias = tuple[FloatArray, FloatArray]  # largest and smallest by segment, (m, n) each


def allowables(
    project: Project, states: tuple[State, ...], parts: Sequence[Segment | BondedPart | CompanionSegment]
) -> Allowables:
    """The allowable stresses of parts (p,) in every state, (m, p) each."""
    by_name = {material.name: material for material in project.materials}
    materials = [by_name[part.material] for part in parts]
    factor = np.array([[state.allowable_factor] for state in states])
    tension = np.array([_or_nan(material.allowable_tension) for material in materials])
    compression = np.array([_or_nan(material.allowable_compression) for material in materials])
    return Allowables(frozen(factor * tension), frozen(factor * compression))


def _or_nan(value: float | UnsetType) -> float:
    return np.nan if isinstance(value, UnsetType) else value


def no_stress(
    stress: Range, force: Range, force_bound: FloatArray, constrained: BoolArray | None
) -> FloatArray:
    """The stress (m,) up to which a state's stress counts as zero; infinite where all of it is rounding.

    Where bonded parts constrain each other (m,), there is stress without any axial force.
    """
    rounding = np.all(_size(force) <= force_bound, axis=1)
    if constrained is not None:
        rounding &= ~constrained
    return np.where(rounding, np.inf, NO_STRESS * np.max(_size(stress), axis=1))


def _size(extremes: Range) -> FloatArray:
    largest, smallest = extremes
    return np.asarray(np.maximum(np.abs(largest), np.abs(smallest)))


@dataclass(frozen=True, slots=True)
class Side:
    """Tension or compression compared with its allowable, all (m, n).

    `present` says where there is such a stress at all; `value` keeps its sign; `limit` and `utilisation` are
    NaN where the material has no such allowable, `utilisation` also where the stress is not present.
    """

    present: BoolArray
    value: FloatArray
    at: FloatArray
    limit: FloatArray
    utilisation: FloatArray


@dataclass(frozen=True, slots=True)
class StressChecks:
    """Both sides, and the larger utilisation with the smallest x that has it; NaN where none was made.

    By segment, or by part where parts are bonded.
    """

    tension: Side
    compression: Side
    utilisation: FloatArray
    utilisation_at: FloatArray


def check_stresses(stress: Extremes, zero: FloatArray, limits: Allowables) -> StressChecks:
    """Compare the extremes of stress with the allowables; up to `zero` (m,) a stress is none."""
    nothing = zero[:, np.newaxis]
    tension = _side(stress.largest > nothing, stress.largest, stress.largest_at, limits.tension)
    compression = _side(-stress.smallest > nothing, stress.smallest, stress.smallest_at, limits.compression)
    largest = np.fmax(tension.utilisation, compression.utilisation)
    places = [
        np.where(side.utilisation >= largest * (1.0 - SAME), side.at, np.nan)
        for side in (tension, compression)
    ]
    return StressChecks(tension, compression, frozen(largest), frozen(np.fmin(*places)))


def _side(present: BoolArray, value: FloatArray, at: FloatArray, limit: FloatArray) -> Side:
    return Side(present, value, at, limit, np.where(present, np.abs(value) / limit, np.nan))
