"""The books of each checked state: reactions with the sum of all forces along x, energies, displacements.

Every figure of a sum has the same decimals, those of its largest part, so that the column can be added by
hand; what is left over is shown to the same decimals.
"""

from __future__ import annotations

import math

import numpy as np

from app.findings.records import JointDisplacement, JointReaction, StateBooks, SupportPart
from app.numerals import decimals_for, fixed
from app.phrases.notes import numerical_error_text
from app.phrases.states import state_words
from app.support_entry import support_name
from app.units import format_value, symbol, to_display
from app.words import tr
from solver.arrays import FloatArray
from solver.model import StopSupport, UnitSystemName, supports_of
from solver.outcomes import SupportOutcome, support_outcomes
from solver.results import Results, State

_DIGITS = 4
_ROUNDING = 1e-9  # of the largest axial force: the tolerance that the solver solves to


def state_books(results: Results, system: UnitSystemName) -> tuple[StateBooks, ...]:
    """The books of every checked state, in order."""
    bedded = bool(np.any(results.chain.bedding > 0))
    return tuple(
        _books(results, index, state, bedded, system)
        for index, state in enumerate(results.states)
        if state.checked
    )


def _books(results: Results, index: int, state: State, bedded: bool, system: UnitSystemName) -> StateBooks:
    solution = results.solution
    reactions = solution.reaction[index]
    loads, bedding, residual = (
        float(part[index]) for part in (solution.loads, solution.bedding, solution.residual)
    )
    forces = np.array([*reactions[np.isfinite(reactions)], loads, bedding])
    column = _Column(forces, _largest_inside(results, index), system)
    return StateBooks(
        name=state_words(state.name),
        kind=state.kind,
        reactions=_reactions(results, index, column),
        reactions_text=column.text(float(np.nansum(reactions))),
        loads_text=column.text(loads),
        bedding_text=column.text(bedding) if bedded else "",
        residual=residual,
        residual_text=column.text(residual),
        strain_text=_energy(solution.strain_energy[index], system),
        potential_text=_energy(solution.potential[index], system),
        numerical_error=numerical_error_text(float(solution.error_bound[index])),
    )


def _largest_inside(results: Results, index: int) -> float:
    """The largest axial force of the state, in the member and its companions."""
    rows = (
        [results.segments] if results.companions is None else [results.segments, results.companions.segments]
    )
    return max(float(np.max(np.abs([row.force_max[index], row.force_min[index]]))) for row in rows)


class _Column:
    """Forces that are added up: all with the decimals of the largest."""

    def __init__(self, forces: FloatArray, inside: float, system: UnitSystemName) -> None:
        largest = float(np.max(np.abs(forces), initial=0.0))
        if largest <= _ROUNDING * inside:  # what is left of forces that hold each other within the member
            largest = inside
        self._decimals = decimals_for(to_display(largest, "force", system), _DIGITS)
        self.system = system

    def text(self, force: float) -> str:
        """A force with its unit."""
        number = fixed(to_display(force, "force", self.system), self._decimals)
        return f"{number} {symbol('force', self.system)}"


def _reactions(results: Results, state: int, column: _Column) -> tuple[JointReaction, ...]:
    reactions = results.solution.reaction[state].tolist()
    return tuple(
        JointReaction(index, joint.mark, value, column.text(value), _parts(results, state, index, column))
        for index, (joint, value) in enumerate(zip(results.project.joints, reactions, strict=True))
        if not math.isnan(value)
    )


def _parts(results: Results, state: int, joint: int, column: _Column) -> tuple[SupportPart, ...]:
    """The supports of a joint one by one; none where there is only one and no stop."""
    supports = supports_of(results.project.joints[joint])
    if len(supports) == 1 and not isinstance(supports[0], StopSupport):
        return ()
    outcomes = support_outcomes(results, state, joint)
    return tuple(
        SupportPart(support_name(support, column.system), _does(outcome, column))
        for support, outcome in zip(supports, outcomes, strict=True)
    )


def _does(outcome: SupportOutcome, column: _Column) -> str:
    if outcome.contact == "open":
        left = format_value(outcome.clearance or 0.0, "displacement", column.system, with_unit=True)
        return tr("open, {gap} left").format(gap=left)
    force = column.text(outcome.force)
    return tr("closed, {force}").format(force=force) if outcome.contact == "closed" else force


def _energy(value: float, system: UnitSystemName) -> str:
    return format_value(float(value), "energy", system, with_unit=True)


def displacements(results: Results, system: UnitSystemName) -> tuple[JointDisplacement, ...]:
    """For each joint the displacement of largest size among the checked states."""
    states = [state_words(state.name) for state in results.states if state.checked]
    moved = results.solution.joint_displacement[: len(states)]
    worst = np.argmax(np.abs(moved), axis=0).tolist()
    return tuple(
        _displacement(index, joint.mark, float(moved[row, index]), states[row], system)
        for index, (joint, row) in enumerate(zip(results.project.joints, worst, strict=True))
    )


def _displacement(
    joint: int, mark: str, value: float, state: str, system: UnitSystemName
) -> JointDisplacement:
    text = format_value(value, "displacement", system, with_unit=True)
    return JointDisplacement(joint, mark, value, text, state)
