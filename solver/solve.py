"""A project in, its results out: the one door through which window, terminal and sheet get their numbers."""

from __future__ import annotations

import math
from collections.abc import Callable
from dataclasses import fields

import numpy as np

from solver.allowables import Range, allowables, check_stresses, no_stress
from solver.arrays import BoolArray, FloatArray, frozen
from solver.axial import solve_axial
from solver.bonded import constrained
from solver.chain import Chain, Loads
from solver.checking import Checker, governing_of, verdict_of
from solver.companion_packing import with_companions
from solver.companion_results import Beside, beside, companion_results, part_of_loads, part_of_solution
from solver.errors import Cancelled, NotSolvable, OutOfRange, never
from solver.extremes import ExtremeFinder, Extremes
from solver.fatigue import FatigueChecker
from solver.faults import Fault
from solver.model import Project
from solver.packing import pack, states_of
from solver.part_results import (
    every_part,
    own_limits,
    own_stress,
    part_results,
    utilisation_of_segments,
)
from solver.peaks import PeakChecker
from solver.results import CompanionResults, Results, State
from solver.segment_results import segment_results
from solver.shoulders import notches
from solver.solution import Solution
from solver.stability import Assessor, Stability, compressed_states
from solver.swings import Row
from solver.validation import unsolvable


def solve(
    project: Project,
    *,
    cases: bool = True,
    tolerance: float = 1e-9,
    cancelled: Callable[[], bool] = never,
) -> Results:
    """The results of a well-formed project, for every combination and, with `cases`, every case alone.

    A case alone that is beside the checks is left out where nothing holds the member in it: stops that its
    loads do not press. `tolerance` is what every state's relative error bound must meet. `cancelled` is asked
    between stages.
    Raises an `InputError` (`NotSolvable`, `StiffnessContrast`, `BoundNotMet`, `OutOfRange`) or `Cancelled`.
    """
    _refuse_unsolvable(project)
    _ask(cancelled)
    chain, loads, states = pack(project, cases=cases)
    whole, loads = with_companions(project, chain, loads, states)
    _refuse_out_of_range(whole, states)
    try:
        solution = _solved(whole, loads, states, tolerance, cancelled)
    except NotSolvable as loose:
        if any(states[index].checked for index in loose.states):
            raise
        states, loads = _without(states, loads, loose.states)
        solution = _solved(whole, loads, states, tolerance, cancelled)
    _ask(cancelled)
    with np.errstate(all="ignore"):  # what overflows is found by its result
        results = _results(project, (chain, whole), loads, states, solution, cancelled)
    _refuse_overflow(results)
    return results


def _solved(
    chain: Chain, loads: Loads, states: tuple[State, ...], tolerance: float, cancelled: Callable[[], bool]
) -> Solution:
    names = tuple(state.name for state in states)
    return solve_axial(chain, loads, names=names, tolerance=tolerance, cancelled=cancelled)


def _without(
    states: tuple[State, ...], loads: Loads, dropped: tuple[int, ...]
) -> tuple[tuple[State, ...], Loads]:
    """The states but those dropped, with their loads; checked states come first and keep their places."""
    kept = [index for index in range(len(states)) if index not in dropped]
    some = {field.name: frozen(getattr(loads, field.name)[kept]) for field in fields(loads)}
    return tuple(states[index] for index in kept), Loads(**some)


def _ask(cancelled: Callable[[], bool]) -> None:
    if cancelled():
        raise Cancelled


def _results(
    project: Project,
    chains: tuple[Chain, Chain],
    loads: Loads,
    states: tuple[State, ...],
    solution: Solution,
    cancelled: Callable[[], bool],
) -> Results:
    """`chains` are the member's and the one with companions behind it, which loads and solution belong to."""
    chain, count = chains[0], len(chains[0].length)
    position = frozen(np.concatenate([[0.0], np.cumsum(chain.length)]))
    row = beside(project, chains[1], loads, solution, position)
    if row is not None:
        loads, solution = part_of_loads(loads, slice(count)), part_of_solution(solution, 0, count)
    finder = ExtremeFinder(chain, solution, loads, position[:-1], position[1:])
    stress, force = finder.stress(), finder.force()
    held = constrained(chain.bonded, loads.temperature)
    zero = frozen(no_stress(*_ranges(stress, force, solution.force_bound, row), held))
    limits = allowables(project, states, every_part(project))
    stress_checks = check_stresses(stress, zero, limits)
    _ask(cancelled)
    parts = part_results(project, chain.bonded, stress, stress_checks, limits)
    shoulders = notches(project)
    peaks = PeakChecker(project, position, stress, zero, shoulders)
    rows = _rows((chain, loads, solution), position, row, zero)
    fatigue = FatigueChecker(project, states, *rows, shoulders)
    companions, others = (None, None) if row is None else companion_results(project, states, row, zero)
    stability = _stability(project, (chain, solution), states, force, companions, cancelled)
    checker = Checker(
        project, states, solution, position, stress_checks, peaks, stability, fatigue, parts, others
    )
    checks = checker.checks()
    segment_mass = frozen(_segment_mass(chain))
    return Results(
        project=project,
        chain=chain,
        loads=loads,
        states=states,
        solution=solution,
        position=position,
        segments=segment_results(
            own_stress(stress, count),
            force,
            finder.displacement(),
            utilisation_of_segments(stress_checks, chain.bonded),
            solution.force_bound,
        ),
        parts=parts,
        allowables=own_limits(limits, count),
        no_stress=zero,
        checks=checks,
        verdict=verdict_of(checks),
        governing=governing_of(checks),
        segment_mass=segment_mass,
        mass=float(np.sum(segment_mass) + (0.0 if companions is None else np.sum(companions.segment_mass))),
        stability=stability,
        companions=companions,
    )


def _rows(
    member: tuple[Chain, Loads, Solution], position: FloatArray, others: Beside | None, zero: FloatArray
) -> tuple[Row, Row | None]:
    """The member's segments and the companions', for what swings along them."""
    own = Row(*member, position[:-1], position[1:], zero)
    if others is None:
        return own, None
    return own, Row(others.chain, others.loads, others.solution, others.begins, others.ends, zero)


def _stability(
    project: Project,
    solved: tuple[Chain, Solution],
    states: tuple[State, ...],
    force: Extremes,
    companions: CompanionResults | None,
    cancelled: Callable[[], bool],
) -> tuple[Stability | None, ...]:
    """Of the checked states, which come first; None for the others."""
    checked = sum(state.checked for state in states)
    compressed = compressed_states((force.largest, force.smallest), solved[1].force_bound)
    beside = np.zeros_like(compressed)
    if companions is not None:
        forces = companions.segments.force_max, companions.segments.force_min
        beside = compressed_states(forces, companions.solution.force_bound)
    found = Assessor(project, *solved, cancelled).states(compressed[:checked], beside[:checked])
    return (*found, *(None,) * (len(states) - checked))


def _ranges(
    stress: Extremes, force: Extremes, bound: FloatArray, row: Beside | None
) -> tuple[Range, Range, FloatArray]:
    """Largest and smallest stress and force with the bound of the force, over the companions as well."""
    own = (stress.largest, stress.smallest), (force.largest, force.smallest)
    if row is None:
        return *own, bound
    of_stress, of_force = (
        (np.concatenate([one[0], other[0]], axis=1), np.concatenate([one[1], other[1]], axis=1))
        for one, other in zip(own, row.ranges(), strict=True)
    )
    return of_stress, of_force, np.concatenate([bound, row.solution.force_bound], axis=1)


def _refuse_unsolvable(project: Project) -> None:
    faults = unsolvable(project)
    if faults:
        raise NotSolvable(faults, _states_with(project, faults))


def _states_with(project: Project, faults: tuple[Fault, ...]) -> tuple[str, ...]:
    """The checked states that the faults concern: those that use the faults' cases, else all of them."""
    states = states_of(project, cases=False)
    cases = {fault.facts.get("case") for fault in faults}
    if None in cases:
        return tuple(state.name for state in states)
    names = tuple(state.name for state in states if any(state.factors.get(str(case)) for case in cases))
    return names or tuple(map(str, cases))


def _refuse_out_of_range(chain: Chain, states: tuple[State, ...]) -> None:
    """Stiffnesses that floating point cannot hold; what follows from loads is the solver's to see."""
    with np.errstate(over="ignore"):
        stiffness = chain.rigidity(slice(None))
    if not (np.all(np.isfinite(stiffness)) and np.all(stiffness > 0.0)):
        raise OutOfRange(states[0].name, "stiffness")


def _refuse_overflow(results: Results) -> None:
    """Stresses, positions, masses, allowables and utilisations that floating point could not hold."""
    segments, limits = results.segments, results.allowables
    stress = [segments.stress_max, segments.stress_min, segments.stress_max_at]
    _require(np.all(np.isfinite(stress), axis=0), "stress", results)
    if results.companions is not None:
        other = results.companions.segments
        _require(np.all(np.isfinite([other.stress_max, other.stress_min]), axis=0), "stress", results)
        _require(~np.isinf(other.utilisation), "utilisation", results)
    if results.parts is not None:
        of_parts = [results.parts.stress_max, results.parts.stress_min]
        _require(np.all(np.isfinite(of_parts), axis=0), "stress", results)
        limits = results.parts.allowables
    for limit in (limits.tension, limits.compression):
        _require(np.isnan(limit) | (np.isfinite(limit) & (limit > 0.0)), "allowable", results)
    _require(~np.isinf(segments.utilisation), "utilisation", results)
    if not math.isfinite(results.mass):
        raise OutOfRange(results.states[0].name, "mass")
    for check in results.checks:
        if check.utilisation is not None and not math.isfinite(check.utilisation):
            raise OutOfRange(check.combination, "utilisation")


def _require(sound: BoolArray, what: str, results: Results) -> None:
    """Refuse the first state (m, n) that is not sound."""
    states = np.all(sound, axis=1)
    if not np.all(states):
        raise OutOfRange(results.states[int(np.argmin(states))].name, what)


def _segment_mass(chain: Chain) -> FloatArray:
    """∫ ρ A dx of each segment (n,) in kg; the mean of an area is that of its Bernstein coefficients."""
    masses: FloatArray = chain.length * np.mean(chain.mass(slice(None)), axis=-1)
    return masses
