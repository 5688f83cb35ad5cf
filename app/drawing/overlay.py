"""Results on the drawing: the colour of force or stress along the member, and the displaced shape.

Only values of the solver are shown, none is computed. Force and stress are graded in a few steps from 0 to
the largest magnitude, so that the same shade means the same on the drawing and on its scale.
"""

from __future__ import annotations

from dataclasses import dataclass
from itertools import groupby
from typing import Literal, TypeAlias

import numpy as np
from msgspec import Struct

from app.allowable_lines import NOTHING, unchecked_segments
from app.drawing.member import Member
from app.drawing.ruler import Ruler
from app.looks import Colour
from solver.arrays import BoolArray, FloatArray, IntArray
from solver.bonded import constrained_segments
from solver.checks import PASS_MARGIN
from solver.fields import Curves, Envelope, checked_states, curves, envelope
from solver.results import Results

STEPS = 5  # shades from 0 to the largest magnitude
SLICE = 5.0  # px, the finest stretch of one shade
MOST_SLICES = 60  # of a segment
LARGEST_SHIFT = 0.035  # of the drawn member, of the displaced shape where nothing is displaced more
LEAST_LEFT = 0.5  # of every segment's width, however much its joints approach each other
ROUND = (1.0, 2.0, 5.0)
Sign: TypeAlias = Literal[-1, 0, 1]


@dataclass(frozen=True, slots=True)
class Graded:
    """Force or stress along the member, two points at a joint; of an envelope the governing one."""

    quantity: Literal["force", "stress"]
    position: FloatArray  # (n + 1,) m, of the joints
    x: FloatArray  # (k,) m
    segment: IntArray  # (k,)
    value: FloatArray  # (k,) SI
    utilisation: FloatArray  # (k,), NaN where there is none
    unchecked: BoolArray  # (n,) segments of which a check of stress was not made, in a state that is checked
    governing: bool  # of an envelope
    checked: bool  # whether any check is made of what is shown

    @property
    def largest(self) -> float:
        """The largest magnitude."""
        return float(np.abs(self.value).max())


class Shade(Struct, frozen=True):
    """A stretch of one shade from where to where (m), with its sign and step, and whether over 1.

    It lies in `segment`, or where segments are narrower than a pixel goes on through those up to `until`.
    """

    segment: int
    until: int
    first: float
    last: float
    sign: Sign
    step: int
    over: bool
    unchecked: bool


def graded(results: Results, state: int | None, colour: Colour) -> Graded | None:
    """What is shown as colour of a state, or of the envelope (None); None where it is nothing everywhere."""
    if colour == "none":
        return None
    curve: Curves | Envelope
    if state is None:
        whole = envelope(results)
        high, low = (getattr(whole, f"{colour}_{side}") for side in ("max", "min"))
        value = np.where(np.abs(high) >= np.abs(low), high, low)
        states, curve = checked_states(results).tolist(), whole
    else:
        states, curve = [state], curves(results, state)
        value = getattr(curve, colour)
    value = np.where(_only_rounding(results, states)[curve.segment], 0.0, value)
    stiffness = float(results.chain.modulus.max())
    stiffness *= float(results.chain.area.max()) if colour == "force" else 1.0
    if not value.size or np.abs(value).max() <= NOTHING * stiffness:
        return None
    checked = any(results.states[index].checked for index in states)
    unchecked = np.zeros(len(results.position) - 1, dtype=np.bool_)
    if checked:
        unchecked[list(unchecked_segments(results, states, curve.segment, curve.utilisation))] = True
    return Graded(
        colour,
        results.position,
        curve.x,
        curve.segment,
        value,
        curve.utilisation,
        unchecked,
        governing=state is None,
        checked=checked,
    )


def _only_rounding(results: Results, states: list[int]) -> BoolArray:
    """The segments (n,) whose force is within its numerical error in all of these states."""
    segments = results.segments
    size = np.maximum(np.abs(segments.force_max[states]), np.abs(segments.force_min[states]))
    only: BoolArray = np.all(size <= segments.force_bound[states], axis=0)
    if results.chain.bonded is not None:  # its parts can stress each other without any force
        only &= ~constrained_segments(results.chain.bonded, results.loads.temperature[states]).any(axis=0)
    return only


def shades(shown: Graded, ruler: Ruler) -> list[Shade]:
    """The stretches of one shade each that are in the window, in order along the member."""
    pixels = ruler.pixel(shown.position)
    low, high = sorted((ruler.begin, ruler.end))
    ends = np.sort(np.stack([pixels[:-1], pixels[1:]]), axis=0)
    inside, width = (ends[1] > low) & (ends[0] < high), ends[1] - ends[0]
    bounds = np.searchsorted(shown.segment, np.arange(len(shown.position)))
    found = _narrow_shades(shown, bounds, pixels, np.flatnonzero(inside & (width < SLICE)))
    for index in np.flatnonzero(inside & (width >= SLICE)).tolist():
        at = slice(bounds[index], bounds[index + 1])
        found += _shades_of(shown, index, at, int(np.clip(width[index] / SLICE, 1, MOST_SLICES)))
    return sorted(found, key=lambda shade: shade.first)


def _narrow_shades(shown: Graded, bounds: IntArray, pixels: FloatArray, chosen: IntArray) -> list[Shade]:
    """One shade for each of the segments, and for all in one column of pixels: that of the most stressed."""
    if not len(chosen):
        return []
    starts = bounds[chosen]
    peaks = np.maximum.reduceat(np.abs(shown.value), bounds[:-1])[chosen] / shown.largest
    first = shown.value[starts]  # the sign of segments so short
    over = np.maximum.reduceat(np.nan_to_num(shown.utilisation), bounds[:-1])[chosen] > 1 + PASS_MARGIN
    column = np.floor(pixels[chosen])
    begins = np.flatnonzero(np.append(True, (np.diff(column) != 0) | (np.diff(chosen) > 1)))
    ends = np.append(begins[1:], len(chosen)) - 1
    group = np.repeat(np.arange(len(begins)), ends - begins + 1)
    worst = np.lexsort((peaks, over, group))[ends]
    unchecked = np.logical_or.reduceat(shown.unchecked[chosen], begins)
    position = shown.position
    return [
        Shade(
            int(chosen[a]), int(chosen[b]), float(position[chosen[a]]), float(position[chosen[b] + 1]), *how
        )
        for a, b, how in zip(
            begins,
            ends,
            zip(
                np.sign(first[worst]).astype(int).tolist(),
                _steps(peaks[worst]),
                over[worst].tolist(),
                unchecked.tolist(),
                strict=True,
            ),
            strict=True,
        )
    ]


def _shades_of(shown: Graded, index: int, at: slice, count: int) -> list[Shade]:
    """Of one segment in so many slices; a slice is over where any point of it is."""
    places = np.linspace(float(shown.position[index]), float(shown.position[index + 1]), count + 1)
    x, utilisation = shown.x[at], np.nan_to_num(shown.utilisation[at])
    value = np.interp(0.5 * (places[1:] + places[:-1]), x, shown.value[at]) / shown.largest
    over = _largest_in(places, x, utilisation) > 1 + PASS_MARGIN
    keys = zip(np.sign(value).astype(int).tolist(), _steps(np.abs(value)), over.tolist(), strict=True)
    found, first = [], 0
    unchecked = bool(shown.unchecked[index])
    for how, run in groupby(keys):
        last = first + len(list(run))
        found.append(Shade(index, index, float(places[first]), float(places[last]), *how, unchecked))
        first = last
    return found


def _largest_in(places: FloatArray, x: FloatArray, value: FloatArray) -> FloatArray:
    """The largest value between each two places, those at both of them included."""
    at_places = np.interp(places, x, value)
    inside = np.full(len(places) - 1, -np.inf)
    np.maximum.at(inside, np.clip(np.searchsorted(places, x, "right") - 1, 0, len(inside) - 1), value)
    largest: FloatArray = np.maximum(inside, np.maximum(at_places[:-1], at_places[1:]))
    return largest


def _steps(share: FloatArray) -> list[int]:
    steps: list[int] = np.ceil(share * STEPS - 1e-9).astype(int).tolist()
    return steps


def displacements(results: Results, state: int) -> FloatArray:
    """The displacement of every joint in one state, (n + 1,) m."""
    shown = curves(results, state)
    return np.interp(results.position, shown.x, shown.displacement)


def displaced_factor(member: Member, ruler: Ruler, moved: FloatArray) -> float:
    """How much the displaced shape is exaggerated: a round factor, the same however close the window is.

    The largest displacement becomes a small part of the drawing, and no segment loses more than half.
    """
    if np.abs(moved).max() <= NOTHING * member.position[-1]:
        return 0.0
    pixels = moved * ruler.pixels_per_metre
    widths = np.abs(np.diff(ruler.pixel(np.asarray(member.position))))
    shrinks = np.maximum(pixels[:-1] - pixels[1:], 0.0)
    with np.errstate(divide="ignore", over="ignore"):  # beyond all numbers is no limit
        limits = np.append(LEAST_LEFT * widths / shrinks, LARGEST_SHIFT * widths.sum() / np.abs(pixels).max())
    return _round_down(float(limits.min()))


def _round_down(value: float) -> float:
    """The largest of 1, 2, 5 × 10ⁿ that is not above a value."""
    power = 10.0 ** np.floor(np.log10(value))
    return float(max((power * step for step in ROUND if power * step <= value * (1 + 1e-9)), default=power))
