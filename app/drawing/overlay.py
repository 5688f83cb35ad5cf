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

from app.allowable_lines import NOTHING
from app.drawing.member import Member
from app.drawing.ruler import Ruler
from app.looks import Colour
from solver.arrays import FloatArray, IntArray
from solver.checks import PASS_MARGIN
from solver.fields import curves, envelope
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
    governing: bool  # of an envelope

    @property
    def largest(self) -> float:
        """The largest magnitude."""
        return float(np.abs(self.value).max())


class Shade(Struct, frozen=True):
    """A stretch of one shade: its segment, from where to where (m), sign, step, and whether over 1."""

    segment: int
    first: float
    last: float
    sign: Sign
    step: int
    over: bool


def graded(results: Results, state: int | None, colour: Colour) -> Graded | None:
    """What is shown as colour of a state, or of the envelope (None); None where it is nothing everywhere."""
    if colour == "none":
        return None
    if state is None:
        whole = envelope(results)
        high, low = (getattr(whole, f"{colour}_{side}") for side in ("max", "min"))
        value = np.where(np.abs(high) >= np.abs(low), high, low)
        made = Graded(colour, results.position, whole.x, whole.segment, value, whole.utilisation, True)
    else:
        one = curves(results, state)
        value = getattr(one, colour)
        made = Graded(colour, results.position, one.x, one.segment, value, one.utilisation, False)
    stiffness = float(results.chain.modulus.max())
    stiffness *= float(results.chain.area.max()) if colour == "force" else 1.0
    return made if made.value.size and made.largest > NOTHING * stiffness else None


def shades(shown: Graded, ruler: Ruler) -> list[Shade]:
    """The stretches of one shade each, in order along the member."""
    found: list[Shade] = []
    ends = np.searchsorted(shown.segment, np.arange(len(shown.position)))
    for index in range(len(shown.position) - 1):
        found += _shades_of(shown, ruler, index, slice(ends[index], ends[index + 1]))
    return found


def _shades_of(shown: Graded, ruler: Ruler, index: int, at: slice) -> list[Shade]:
    low, high = float(shown.position[index]), float(shown.position[index + 1])
    width = abs(ruler.pixel(high) - ruler.pixel(low))
    count = int(np.clip(width / SLICE, 1, MOST_SLICES))
    places = np.linspace(low, high, count + 1)
    middle = 0.5 * (places[1:] + places[:-1])
    value = np.interp(middle, shown.x[at], shown.value[at]) / shown.largest
    over = np.interp(middle, shown.x[at], np.nan_to_num(shown.utilisation[at])) > 1 + PASS_MARGIN
    steps = np.ceil(np.abs(value) * STEPS - 1e-9).astype(int)
    keys = zip(np.sign(value).astype(int).tolist(), steps.tolist(), over.tolist(), strict=True)
    found, first = [], 0
    for (sign, step, is_over), run in groupby(keys):
        last = first + len(list(run))
        found.append(Shade(index, float(places[first]), float(places[last]), sign, step, is_over))
        first = last
    return found


def displacements(results: Results, state: int) -> FloatArray:
    """The displacement of every joint in one state, (n + 1,) m."""
    shown = curves(results, state)
    return np.interp(results.position, shown.x, shown.displacement)


def displaced_factor(member: Member, ruler: Ruler, moved: FloatArray) -> float:
    """How much the displaced shape is exaggerated: a round factor, the same however close the window is.

    The largest displacement becomes a small part of the drawing, and no segment loses more than half.
    """
    pixels = moved * ruler.pixels_per_metre
    widths = np.abs(np.diff(ruler.pixel(np.asarray(member.position))))
    shrinks = np.maximum(pixels[:-1] - pixels[1:], 0.0)
    with np.errstate(divide="ignore"):
        limits = np.append(LEAST_LEFT * widths / shrinks, _safe(LARGEST_SHIFT * widths.sum(), pixels))
    least = float(limits.min())
    return _round_down(least) if np.isfinite(least) else 0.0


def _safe(room: float, pixels: FloatArray) -> float:
    largest = float(np.abs(pixels).max())
    return room / largest if largest > 0.0 else np.inf


def _round_down(value: float) -> float:
    """The largest of 1, 2, 5 × 10ⁿ that is not above a value."""
    power = 10.0 ** np.floor(np.log10(value))
    return float(max((power * step for step in ROUND if power * step <= value * (1 + 1e-9)), default=power))
