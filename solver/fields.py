"""Displacement, axial force, stress and utilisation along the member, evaluated where somebody looks.

The results hold piecewise polynomials; here they become curves, an envelope over the checked states, and the
values at one position. At a joint there are two sides, and both are given.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.polynomial import legendre

from solver.arrays import FloatArray, IntArray, frozen
from solver.bonded import constraint_at
from solver.results import Allowables, PartResults, Results
from solver.sampling import Places, Window, places_for, x_of
from solver.sections import area_at

_AT_JOINT = 1e-12  # of the member's length: nearer to a joint than this is at the joint


@dataclass(frozen=True, slots=True)
class Curves:
    """One state along the member, all (k,), in order of x; two points at a joint between segments.

    `utilisation` is NaN where there is no allowable for the stress.
    """

    segment: IntArray
    x: FloatArray
    displacement: FloatArray
    force: FloatArray
    stress: FloatArray
    utilisation: FloatArray


@dataclass(frozen=True, slots=True)
class Envelope:
    """Largest and smallest over the checked states, all (k,); extremes, not one state in equilibrium.

    `*_state` is the index of the state that governs there, the first of equals; −1 where there is none.
    """

    segment: IntArray
    x: FloatArray
    displacement_max: FloatArray
    displacement_max_state: IntArray
    displacement_min: FloatArray
    displacement_min_state: IntArray
    force_max: FloatArray
    force_max_state: IntArray
    force_min: FloatArray
    force_min_state: IntArray
    stress_max: FloatArray
    stress_max_state: IntArray
    stress_min: FloatArray
    stress_min_state: IntArray
    utilisation: FloatArray
    utilisation_state: IntArray


@dataclass(frozen=True, slots=True)
class Bundle:
    """The checked states one by one, all (s, k) over x (k,); `states` (s,) are their indices."""

    states: IntArray
    x: FloatArray
    displacement: FloatArray
    force: FloatArray
    stress: FloatArray
    utilisation: FloatArray


@dataclass(frozen=True, slots=True)
class PointValues:
    """What one state has at one place; `utilisation` is NaN where there is no allowable for the stress."""

    segment: int
    displacement: float
    force: float
    stress: float
    utilisation: float
    parts: tuple[float, ...] = ()  # the stress of each bonded part, the segment's own first; empty without


@dataclass(frozen=True, slots=True)
class Readout:
    """The values on both sides of x: equal inside a segment, None beyond the member's ends."""

    x: float
    left: PointValues | None
    right: PointValues | None


@dataclass(frozen=True, slots=True)
class EnvelopePoint:
    """The envelope at one place, with the indices of the governing states as in `Envelope`."""

    segment: int
    displacement_max: float
    displacement_max_state: int
    displacement_min: float
    displacement_min_state: int
    force_max: float
    force_max_state: int
    force_min: float
    force_min_state: int
    stress_max: float
    stress_max_state: int
    stress_min: float
    stress_min_state: int
    utilisation: float
    utilisation_state: int
    parts: tuple[tuple[float, float], ...] = ()  # smallest and largest stress of each bonded part


@dataclass(frozen=True, slots=True)
class EnvelopeReadout:
    """The envelope on both sides of x: equal inside a segment, None beyond the member's ends."""

    x: float
    left: EnvelopePoint | None
    right: EnvelopePoint | None


def curves(
    results: Results,
    state_index: int,
    points: int = 600,
    near: Window | None = None,
    also: tuple[float, ...] = (),
) -> Curves:
    """The curves of one state through at most `points` places, more only where the joints alone take more.

    A window that is looked at closely has as many again; `also` are further places, m.
    """
    states = np.array([state_index])
    places = places_for(results, states, points, near, also)
    values = _evaluate(results, states, places)
    return Curves(
        places.segment,
        places.x,
        frozen(values.displacement[0]),
        frozen(values.force[0]),
        frozen(values.stress[0]),
        frozen(values.utilisation[0]),
    )


def envelope(results: Results, points: int = 600, near: Window | None = None) -> Envelope:
    """The envelope over the checked states, at places chosen as for `curves`."""
    states = checked_states(results)
    return _envelope(results, states, places_for(results, states, points, near))


def bundle(results: Results, points: int = 600, near: Window | None = None) -> Bundle:
    """The curves of all checked states, at the places of their envelope."""
    states = checked_states(results)
    places = places_for(results, states, points, near)
    values = _evaluate(results, states, places)
    return Bundle(
        states,
        places.x,
        frozen(values.displacement),
        frozen(values.force),
        frozen(values.stress),
        frozen(values.utilisation),
    )


def at(results: Results, state_index: int, x: float) -> Readout:
    """The values of one state at the position x (m)."""
    states = np.array([state_index])
    left, right = _sides(results, x)
    first = _point(results, states, left)
    return Readout(x, first, first if right is left else _point(results, states, right))


def envelope_at(results: Results, x: float) -> EnvelopeReadout:
    """The envelope at the position x (m)."""
    states = checked_states(results)
    left, right = _sides(results, x)
    first = _envelope_point(results, states, left)
    return EnvelopeReadout(x, first, first if right is left else _envelope_point(results, states, right))


def checked_states(results: Results) -> IntArray:
    """The indices of the states that take part in checks and envelope."""
    return np.array([index for index, state in enumerate(results.states) if state.checked], dtype=np.intp)


# --- evaluation ---


@dataclass(frozen=True, slots=True)
class _Values:
    """The quantities of s states at k places, all (s, k)."""

    displacement: FloatArray
    force: FloatArray
    stress: FloatArray
    utilisation: FloatArray


def _evaluate(results: Results, states: IntArray, places: Places) -> _Values:
    solution = results.solution
    element = _elements(results, places)
    start, end = solution.start[element], solution.end[element]
    t = np.clip((2.0 * places.fraction - start - end) / (end - start), -1.0, 1.0)
    force = _legendre_values(solution.force, states, element, t)
    stress = stress_at(results, states, places.segment, places, force)
    utilisation = _utilisation(results, states, places.segment, stress, results.allowables)
    if results.parts is not None:
        utilisation = np.fmax(utilisation, _of_bonded(results, results.parts, states, places, force))
    return _Values(_legendre_values(solution.displacement, states, element, t), force, stress, utilisation)


def stress_at(
    results: Results, states: IntArray, part: IntArray, places: Places, force: FloatArray
) -> FloatArray:
    """(s, k) the stress of parts (k,) at places with their axial force (s, k); part i is segment i's own."""
    bonded, s = results.chain.bonded, places.fraction
    if bonded is None:
        return np.asarray(force / area_at(results.chain.area[places.segment], s))
    held = constraint_at(bonded, part, results.loads.temperature[states], s)
    return np.asarray((force + held) / area_at(bonded.transformed[part], s))


def _of_bonded(
    results: Results, parts: PartResults, states: IntArray, places: Places, force: FloatArray
) -> FloatArray:
    """(s, k) the largest utilisation of the bonded parts at each place, NaN where there are none."""
    largest = np.full(force.shape, np.nan)
    for number in range(1, int(parts.number.max()) + 1):
        part_of_segment = np.full(len(results.chain.length), -1)
        numbered = np.flatnonzero(parts.number == number)
        part_of_segment[parts.segment[numbered]] = numbered
        part = part_of_segment[places.segment]
        here = part >= 0
        own = Places(places.segment[here], places.fraction[here], places.x[here])
        stress = stress_at(results, states, part[here], own, force[:, here])
        used = _utilisation(results, states, part[here], stress, parts.allowables)
        largest[:, here] = np.fmax(largest[:, here], used)
    return largest


def _elements(results: Results, places: Places) -> IntArray:
    """The element each place lies in; at a seam inside a segment the later one, never another segment's."""
    solution = results.solution
    found = (
        np.searchsorted(solution.segment + solution.start, places.segment + places.fraction, side="right") - 1
    )
    first = np.searchsorted(solution.segment, places.segment, side="left")
    last = np.searchsorted(solution.segment, places.segment, side="right") - 1
    return np.clip(found, first, last)


def _legendre_values(
    coefficients: FloatArray, states: IntArray, element: IntArray, t: FloatArray
) -> FloatArray:
    basis = legendre.legvander(t, coefficients.shape[-1] - 1)
    values: FloatArray = np.einsum("skq,kq->sk", coefficients[states[:, np.newaxis], element], basis)
    return values


def _utilisation(
    results: Results, states: IntArray, part: IntArray, stress: FloatArray, limits: Allowables
) -> FloatArray:
    """|σ| over the allowable of its sign; 0 where there is no stress but an allowable of either sign."""
    where = states[:, np.newaxis], part
    tension, compression = limits.tension[where], limits.compression[where]
    zero = results.no_stress[states][:, np.newaxis]
    nothing = np.where(np.isnan(tension) & np.isnan(compression), np.nan, 0.0)
    with np.errstate(over="ignore"):  # the side that is not taken may overflow
        pressed = np.where(stress < -zero, -stress / compression, nothing)
        return np.where(stress > zero, stress / tension, pressed)


def _envelope(results: Results, states: IntArray, places: Places) -> Envelope:
    values = _evaluate(results, states, places)
    utilisation = np.where(np.isnan(values.utilisation), -np.inf, values.utilisation)
    largest, of_largest = _largest(states, utilisation)
    never = largest == -np.inf
    return Envelope(
        places.segment,
        places.x,
        *_both(states, values.displacement),
        *_both(states, values.force),
        *_both(states, values.stress),
        frozen(np.where(never, np.nan, largest)),
        np.where(never, -1, of_largest),
    )


def _both(states: IntArray, values: FloatArray) -> tuple[FloatArray, IntArray, FloatArray, IntArray]:
    largest, of_largest = _largest(states, values)
    smallest, of_smallest = _largest(states, -values)
    return frozen(largest), of_largest, frozen(0.0 - smallest), of_smallest


def _largest(states: IntArray, values: FloatArray) -> tuple[FloatArray, IntArray]:
    index = np.argmax(values, axis=0)
    return values[index, np.arange(values.shape[1])], states[index]


# --- one position ---


def _sides(results: Results, x: float) -> tuple[Places | None, Places | None]:
    """The places left and right of x, which are the same inside a segment."""
    position = results.position
    n = len(position) - 1
    near = _AT_JOINT * position[-1]
    nearest = int(np.argmin(np.abs(position - x)))
    if abs(position[nearest] - x) <= near:
        left = _place(results, nearest - 1, 1.0) if nearest > 0 else None
        return left, _place(results, nearest, 0.0) if nearest < n else None
    if not 0.0 < x < position[-1]:
        return None, None
    segment = int(np.searchsorted(position, x)) - 1
    inside = _place(results, segment, float((x - position[segment]) / results.chain.length[segment]))
    return inside, inside


def _place(results: Results, segment: int, fraction: float) -> Places:
    where, part = np.array([segment]), np.array([fraction])
    return Places(where, part, x_of(results, where, part))


def _point(results: Results, states: IntArray, place: Places | None) -> PointValues | None:
    if place is None:
        return None
    values = _evaluate(results, states, place)
    arrays = (values.displacement, values.force, values.stress, values.utilisation)
    u, force, stress, utilisation = (float(array[0, 0]) for array in arrays)
    parts = tuple(each[0] for each in _part_stresses(results, states, place, values.force))
    return PointValues(int(place.segment[0]), u, force, stress, utilisation, parts)


def _part_stresses(
    results: Results, states: IntArray, place: Places, force: FloatArray
) -> list[tuple[float, ...]]:
    """The stress of each bonded part at one place by state, the segment's own first; empty without any."""
    parts = results.parts
    own = [] if parts is None else parts.of_segment(int(place.segment[0])).tolist()
    if len(own) < 2:
        return []
    return [tuple(stress_at(results, states, np.array([part]), place, force)[:, 0].tolist()) for part in own]


def _envelope_point(results: Results, states: IntArray, place: Places | None) -> EnvelopePoint | None:
    if place is None:
        return None
    found = _envelope(results, states, place)
    names = [name for name in EnvelopePoint.__dataclass_fields__ if name != "parts"]
    force = _evaluate(results, states, place).force if results.parts is not None else np.zeros(0)
    parts = tuple((min(each), max(each)) for each in _part_stresses(results, states, place, force))
    return EnvelopePoint(**{name: getattr(found, name)[0].item() for name in names}, parts=parts)
