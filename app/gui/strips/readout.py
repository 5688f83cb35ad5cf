"""The readout line: what holds at the cursor, both sides at a joint; words only, no window."""

from __future__ import annotations

import math
from collections.abc import Sequence

import numpy as np

from app.gui.strips.content import number, of_unit_strain, unit_of
from app.gui.strips.readout_beside import beside_cursor
from app.strip_choice import USUAL, Kind, kind_symbols
from app.units import format_value
from app.words import tr
from solver.fields import EnvelopePoint, PointValues, Readout, at, checked_states, envelope_at
from solver.model import parts_of
from solver.results import Results

ROUNDING = 1e-15  # a strain this small is rounding and reads as 0
BETWEEN = "    "  # the quantities; where a line ends if there is not room for all
AT_JOINT = 1e-12  # of the member's length, as `solver.fields` has it


def resting() -> str:
    """The line while there is no cursor: how to get one."""
    words = (
        tr("Point at the sheet to read the values there"),
        tr("by keys: arrows, with Ctrl from joint to joint"),
    )
    return BETWEEN.join(words)


def state_readout(results: Results, state: int, x: float) -> str:
    """The line for one state at the position x (m)."""
    readout = at(results, state, x)
    more = [*_parts(results, (readout.left, readout.right)), *beside_cursor(results, (state,), readout.x)]
    return BETWEEN.join([_line(results, readout), *more])


def envelope_readout(results: Results, x: float) -> str:
    """The line for the envelope at x: smallest … largest of each quantity over the checked states."""
    readout = envelope_at(results, x)
    sides = [side for side in (readout.left, readout.right) if side is not None]
    pairs = [_joint_pair(kind, [_span(kind, s, results) for s in sides], results) for kind in USUAL]
    more = [*_parts(results, (readout.left, readout.right))]
    if results.companions is not None:
        more += beside_cursor(results, checked_states(results).tolist(), x)
    return BETWEEN.join([_joined(results, x, pairs), *more])


def nearest_state(results: Results, kind: Kind, x: float, value: float) -> str:
    """The checked state whose value at x is nearest to a value, on either side of a joint, in words."""
    x = min(max(x, 0.0), float(results.position[-1]))
    found = []
    for state in checked_states(results).tolist():
        readout = at(results, state, x)
        sides = [getattr(side, kind) for side in (readout.left, readout.right) if side is not None]
        found += [(abs(own - value), own, state) for own in sides if not math.isnan(own)]
    if not found:
        return ""
    _distance, own, state = min(found)
    text = f"{_number(kind, own, results)} {unit_of(kind, results.project.display.unit_system)}".rstrip()
    words = tr("nearest in {strip}: {state}, {value}")
    return words.format(strip=kind_symbols()[kind], state=results.states[state].name, value=text)


def _line(results: Results, readout: Readout) -> str:
    sides = [side for side in (readout.left, readout.right) if side is not None]
    pairs = [_joint_pair(kind, [_value(kind, s, results) for s in sides], results) for kind in USUAL]
    return _joined(results, readout.x, pairs)


def _parts(results: Results, sides: Sequence[PointValues | EnvelopePoint | None]) -> list[str]:
    """The stress of every bonded part, segment by segment: "B: Concrete −1.56, Steel −19.0 MPa"."""
    found = {side.segment: side.parts for side in sides if side is not None and side.parts}
    unit = unit_of("stress", results.project.display.unit_system)
    texts = []
    for index, stresses in found.items():
        segment = results.project.segments[index]
        named = zip(parts_of(segment), stresses, strict=True)
        said = ", ".join(f"{part.material} {_stress_text(results, stress)}" for part, stress in named)
        texts.append(f"{segment.mark}: {said} {unit}")
    return texts


def _stress_text(results: Results, stress: float | tuple[float, float]) -> str:
    ends = stress if isinstance(stress, tuple) else (stress,)
    return " … ".join(dict.fromkeys(_number("stress", value, results) for value in ends))


def _joined(results: Results, x: float, pairs: list[str]) -> str:
    return BETWEEN.join([_place(results, x), *pairs])


def _place(results: Results, x: float) -> str:
    """The position, with the joint where it is one."""
    system = results.project.display.unit_system
    text = f"x {format_value(x, 'length', system, with_unit=True)}"
    joint = joint_at(results, x)
    if joint is None:
        return text
    return text + " " + tr("(joint {mark})").format(mark=results.project.joints[joint].mark)


def joint_at(results: Results, x: float) -> int | None:
    """The joint at this position, or None."""
    nearest = int(np.argmin(np.abs(results.position - x)))
    return nearest if abs(results.position[nearest] - x) <= AT_JOINT * results.position[-1] else None


def _joint_pair(kind: Kind, texts: list[str], results: Results) -> str:
    """Symbol, value (left | right of a joint where they differ) and unit."""
    unit = unit_of(kind, results.project.display.unit_system)
    return f"{kind_symbols()[kind]} {' | '.join(dict.fromkeys(texts))} {unit}".rstrip()


def _value(kind: Kind, side: PointValues, results: Results) -> str:
    return _number(kind, getattr(side, kind), results)


def _span(kind: Kind, side: EnvelopePoint, results: Results) -> str:
    if kind == "utilisation":
        return _number(kind, side.utilisation, results)
    low, high = (_number(kind, getattr(side, f"{kind}_{end}"), results) for end in ("min", "max"))
    return low if low == high else f"{low} … {high}"


def _number(kind: Kind, value: float, results: Results) -> str:
    """A value as the strips write it; what is only rounding is 0."""
    if math.isnan(value):
        return tr("not checked")
    rounding = ROUNDING * of_unit_strain(results)[kind]
    return number(kind, value if abs(value) > rounding else 0.0, results.project.display.unit_system)
