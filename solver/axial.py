"""The axial solver: arrays in, arrays out, refined until the bound meets the tolerance in every state.

One pass solves the member on one mesh (`solver.passes`) and bounds its error; if the bound is too large, the
mesh is refined where its shares are large, and the pass is made anew. What cannot be solved to the tolerance
raises a named error, it is never returned.
"""

from __future__ import annotations

from collections.abc import Callable, Sequence

import numpy as np

from solver.arrays import BoolArray
from solver.chain import Chain, Loads
from solver.closing import Loose
from solver.errors import BoundNotMet, Cancelled, NotSolvable, OutOfRange, StiffnessContrast, never
from solver.faults import Fault
from solver.joints import FactorError
from solver.mesh import Mesh
from solver.net import net_of
from solver.passes import Pass
from solver.patterns import Unsettled
from solver.refine import first_mesh, refined
from solver.solution import Solution

TOLERANCE = 1e-9
LEFTOVER = 1e-9  # part of the largest force that may be left over at a joint
PASSES = 60
SMALLEST_SIZE = 1e-140  # √J; the squares of smaller numbers have lost digits to underflow
AIM = 0.25  # part of the allowed Σ η² that refinement aims at


def solve_axial(
    chain: Chain,
    loads: Loads,
    names: Sequence[str],
    tolerance: float = TOLERANCE,
    cancelled: Callable[[], bool] = never,
) -> Solution:
    """Displacement, force, reactions, energies and bounds of m states, whose names (m) errors mention.

    `tolerance` is relative, in the energy norm. Raises NotSolvable for a member that nothing holds or that
    stops alone would hold if the loads pressed on them, with those states,
    OutOfRange where numbers overflow or vanish, StiffnessContrast where joints do not balance, BoundNotMet
    where refinement ends above the tolerance, Cancelled when `cancelled` says so between two stages.
    """
    if not (chain.fixed.any() or chain.spring.any() or chain.bedding.any() or chain.stops.joint.size):
        raise NotSolvable((Fault("joints", "not_held"),), tuple(names))
    with np.errstate(all="ignore"):  # what overflows is found by its result, state by state
        return _refined_until_met(chain, loads, names, tolerance, cancelled)


def _refined_until_met(
    chain: Chain, loads: Loads, names: Sequence[str], tolerance: float, cancelled: Callable[[], bool]
) -> Solution:
    mesh: Mesh | None = first_mesh(chain, tolerance)
    bound = np.full(len(names), np.inf)
    for _ in range(PASSES):
        if mesh is None:
            break
        trial = _sound_pass(chain, loads, mesh, names, cancelled)
        bound = trial.bound.relative()
        if (bound <= tolerance).all():
            return trial.solution()
        mesh = _finer(mesh, trial, tolerance)
    worst = int(np.argmax(bound))
    raise BoundNotMet(names[worst], float(bound[worst]), tolerance)


def _finer(mesh: Mesh, trial: Pass, tolerance: float) -> Mesh | None:
    """The mesh of the next pass; None where rounding alone is too much, or nothing is left to refine."""
    bound, allowed = trial.bound, tolerance * trial.bound.size
    if (bound.leftover + bound.rounding > allowed).any():
        return None
    unmet = bound.relative() > tolerance
    return refined(mesh, trial.fields.error, np.where(unmet, AIM * allowed**2, np.inf))


def _sound_pass(
    chain: Chain, loads: Loads, mesh: Mesh, names: Sequence[str], cancelled: Callable[[], bool]
) -> Pass:
    if cancelled():
        raise Cancelled
    try:
        trial = Pass(chain, loads, mesh, cancelled)
    except Loose as loose:
        states = tuple(loose.states.tolist())
        faults = (Fault("joints", "not_pressed"),)
        raise NotSolvable(faults, tuple(names[state] for state in states), states) from loose
    except Unsettled as lost:
        joint = net_of(chain, mesh).joint_of(lost.at)
        raise StiffnessContrast(names[lost.state], joint, lost.force, lost.force) from lost
    except FactorError as lost:
        state = int(np.argmax(lost.largest_load))
        largest = float(lost.largest_load[state])
        joint = net_of(chain, mesh).joint_of(lost.at)
        raise StiffnessContrast(names[state], joint, largest, largest) from lost
    _require_range(trial, names)
    _require_balance(trial, names)
    return trial


def _require_range(trial: Pass, names: Sequence[str]) -> None:
    size = trial.bound.size
    moved = trial.ends.high.any(axis=1) | trial.fields.start_force.any(axis=1)
    _require(np.isfinite(trial.ends.high.sum(axis=1)), "displacement", names)
    _require(np.isfinite(trial.leftover.sum(axis=1)), "force", names)
    _require(np.isfinite(trial.bound.relative()), "energy", names)
    _require((size > SMALLEST_SIZE) | ~moved, "energy", names)


def _require(good: BoolArray, what: str, names: Sequence[str]) -> None:
    if not good.all():
        raise OutOfRange(names[int(np.argmin(good))], what)


def _require_balance(trial: Pass, names: Sequence[str]) -> None:
    leftover = np.abs(trial.leftover)
    if (leftover.max(axis=1) <= LEFTOVER * np.abs(trial.fields.end_force).max(axis=1)).all():
        return  # by what is at hand, before the full measure
    largest = trial.largest_force()
    lost = leftover.max(axis=1) > LEFTOVER * largest
    if lost.any():
        state = int(np.argmax(lost))
        at = int(np.argmax(leftover[state]))
        joint = trial.patterns.net.joint_of(at)
        raise StiffnessContrast(names[state], joint, float(leftover[state, at]), float(largest[state]))
