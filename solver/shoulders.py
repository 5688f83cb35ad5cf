"""Shoulders: how much larger than force by area the stress at a step of the section is.

The factor of a step from solid round to solid round in tension is the fit of the chart "shouldered bar of
circular cross section, tension" of W. D. Pilkey and D. F. Pilkey, Peterson's Stress Concentration Factors.
Its coefficients stand here from memory; what speaks for them is that they sum to 1 at the far end of the
chart (2h/D = 1) and that the two ranges meet, which the tests hold. For h/r outside 0.1 … 20 there is no fit,
and no factor is made up. For every other step the factor is the engineer's. What a step does to parts that
are bonded together is not known here, so it is said to be unchecked.

The nominal stress is that of the smaller side; where both sides have one area it is taken on both.
"""

from __future__ import annotations

import math
from collections.abc import Iterator
from typing import Final

from msgspec import Struct, UnsetType

from solver.checks import Reason
from solver.model import Project, RoundSection, Segment, Shoulder, end_of
from solver.sections import area_coefficients

LEAST_RATIO: Final = 0.1  # of the step's height h to the fillet radius r
MOST_RATIO: Final = 20.0
_BREAK: Final = 2.0  # where the second set of coefficients begins
_SAME: Final = 1e-9  # of a size: less is no step

# C1 … C4, each as its parts that are constant, with √(h/r) and with h/r.
_BLUNT: Final = (
    (0.926, 1.157, -0.099),
    (0.012, -3.036, 0.961),
    (-0.302, 3.977, -1.744),
    (0.365, -2.098, 0.878),
)
_SHARP: Final = (
    (1.200, 0.860, -0.022),
    (-1.805, -0.346, -0.038),
    (2.198, -0.486, 0.165),
    (-0.593, -0.028, -0.106),
)


class Step(Struct, frozen=True):
    """A step from round to round: the diameters on its larger and smaller side, and the fillet radius, m."""

    large: float
    small: float
    radius: float

    @property
    def height(self) -> float:
        """h, half the difference of the diameters."""
        return 0.5 * (self.large - self.small)

    @property
    def ratio(self) -> float:
        """h/r, for which the fit holds between `LEAST_RATIO` and `MOST_RATIO`."""
        return self.height / self.radius

    @property
    def depth(self) -> float:
        """2h/D."""
        return 2.0 * self.height / self.large

    @property
    def coefficients(self) -> tuple[float, ...]:
        """C1 … C4 of the fit."""
        root = math.sqrt(self.ratio)
        return tuple(a + b * root + c * self.ratio for a, b, c in self.rows)

    @property
    def rows(self) -> tuple[tuple[float, float, float], ...]:
        """What C1 … C4 are made of: the parts that are constant, with √(h/r) and with h/r."""
        return _BLUNT if self.ratio <= _BREAK else _SHARP

    @property
    def factor(self) -> float:
        """The factor; never below 1, which the fit may miss by its own error."""
        return max(1.0, sum(c * self.depth**power for power, c in enumerate(self.coefficients)))


class Notch(Struct, frozen=True):
    """A shoulder as seen from one side of its joint: the segment whose stress it raises, and its factor.

    Without a `factor` there is a `reason`; `ratio` is h/r where that is the reason. `step` is None where the
    factor was entered.
    """

    joint: int
    segment: int
    at_start: bool  # of that segment
    factor: float | None = None
    reason: Reason | None = None
    ratio: float | None = None
    step: Step | None = None


def notches(project: Project) -> tuple[Notch, ...]:
    """All shoulders in order of the chain; one between equal areas twice, once for each side."""
    return tuple(
        notch
        for index, joint in enumerate(project.joints)
        if isinstance(joint.shoulder, Shoulder)
        for notch in _notches_at(project, index, joint.shoulder)
    )


def _notches_at(project: Project, joint: int, shoulder: Shoulder) -> Iterator[Notch]:
    last = len(project.segments)
    if joint in (0, last):
        yield Notch(joint, min(joint, last - 1), joint == 0, reason="shoulder_at_end")
        return
    left, right = project.segments[joint - 1], project.segments[joint]
    if left.bonded or right.bonded:
        yield Notch(joint, joint - 1, at_start=False, reason="shoulder_bonded")
        return
    for at_start in _smaller_sides(left, right):
        side = Notch(joint, joint if at_start else joint - 1, at_start)
        if isinstance(shoulder.factor, UnsetType):
            yield _fitted(side, left, right, float(shoulder.fillet_radius or 0.0))
        else:
            yield _with(side, factor=float(shoulder.factor))
        if isinstance(shoulder.factor, UnsetType) and not _is_step(left, right):
            return  # said once


def _smaller_sides(left: Segment, right: Segment) -> tuple[bool, ...]:
    """Whether the side after the joint is the smaller one, the side before it, or both."""
    before, after = area_coefficients(left.section)[2], area_coefficients(right.section)[0]
    if abs(before - after) <= _SAME * max(before, after):
        return (False, True)
    return (after < before,)


def _is_step(left: Segment, right: Segment) -> bool:
    return len(_smaller_sides(left, right)) == 1


def _fitted(side: Notch, left: Segment, right: Segment, radius: float) -> Notch:
    if not _is_step(left, right):
        return _with(side, reason="shoulder_no_step")
    if not (isinstance(left.section, RoundSection) and isinstance(right.section, RoundSection)):
        return _with(side, reason="shoulder_not_round")
    ends = end_of(left.section.diameter, left.section.diameter_end), right.section.diameter
    step = Step(max(ends), min(ends), radius)
    if not LEAST_RATIO * (1.0 - _SAME) <= step.ratio <= MOST_RATIO * (1.0 + _SAME):
        return _with(side, reason="shoulder_out_of_range", ratio=step.ratio, step=step)
    return _with(side, factor=step.factor, step=step)


def _with(
    side: Notch,
    *,
    factor: float | None = None,
    reason: Reason | None = None,
    ratio: float | None = None,
    step: Step | None = None,
) -> Notch:
    return Notch(side.joint, side.segment, side.at_start, factor, reason, ratio, step)
