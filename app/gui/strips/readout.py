"""The readout line: what holds at the cursor, both sides at a joint; words only, no window."""

from __future__ import annotations

import math

import numpy as np

from app.gui.strips.content import Kind, number, titles, unit_of
from app.units import format_value
from app.words import tr
from solver.fields import EnvelopePoint, PointValues, Readout, at, envelope_at
from solver.model import UnitSystemName
from solver.results import Results

AT_JOINT = 1e-12  # of the member's length, as `solver.fields` has it


def state_readout(results: Results, state: int, x: float) -> str:
    """The line for one state at the position x (m)."""
    return _line(results, at(results, state, x))


def envelope_readout(results: Results, x: float) -> str:
    """The line for the envelope at x: smallest … largest of each quantity over the checked states."""
    readout = envelope_at(results, x)
    sides = [side for side in (readout.left, readout.right) if side is not None]
    return _joined(
        results,
        x,
        [_joint_pair(kind, [_span(kind, s, results) for s in sides], results) for kind in titles()],
    )


def _line(results: Results, readout: Readout) -> str:
    sides = [side for side in (readout.left, readout.right) if side is not None]
    system = results.project.display.unit_system
    pairs = [_joint_pair(kind, [_value(kind, s, system) for s in sides], results) for kind in titles()]
    return _joined(results, readout.x, pairs)


def _joined(results: Results, x: float, pairs: list[str]) -> str:
    return "    ".join([_place(results, x), *pairs])


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
    return f"{titles()[kind]} {' | '.join(dict.fromkeys(texts))} {unit}".rstrip()


def _value(kind: Kind, side: PointValues, system: UnitSystemName) -> str:
    value = getattr(side, kind)
    return tr("not checked") if math.isnan(value) else number(kind, value, system)


def _span(kind: Kind, side: EnvelopePoint, results: Results) -> str:
    system = results.project.display.unit_system
    if kind == "utilisation":
        return tr("not checked") if math.isnan(side.utilisation) else number(kind, side.utilisation, system)
    low, high = (number(kind, getattr(side, f"{kind}_{end}"), system) for end in ("min", "max"))
    return low if low == high else f"{low} … {high}"
