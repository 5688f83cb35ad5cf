"""What each support of a joint does in a state: a joint may have several, and a stop is open or closed.

The reaction at a joint is the sum of its supports' forces. Springs and stops follow from how far they are
pushed; beside a fixed support, the first one where there are several, they have nothing to do.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal, TypeAlias

import numpy as np

from solver.model import FixedSupport, SpringSupport, supports_of
from solver.results import Results

Contact: TypeAlias = Literal["open", "closed"]


@dataclass(frozen=True, slots=True)
class SupportOutcome:
    """One support in one state; `force` acts on the member along +x.

    A stop is `closed` where it pushes with more than 1e-12 of the largest force, else `open`; `clearance` is
    what it has left, 0 where closed. Both are None for other supports.
    """

    kind: Literal["fixed", "spring", "stop"]
    force: float  # N
    contact: Contact | None = None
    clearance: float | None = None  # m


def support_outcomes(results: Results, state: int, joint: int) -> tuple[SupportOutcome, ...]:
    """The supports of the joint with this index, in their order; empty for a free joint."""
    supports = supports_of(results.project.joints[joint])
    solution, shift = results.solution, float(results.loads.movement[state, joint])
    moved = float(solution.joint_displacement[state, joint]) - shift
    stops = iter(_stops(results, state, joint))
    left = float(solution.reaction[state, joint])
    found: list[SupportOutcome] = []
    for support in supports:
        if isinstance(support, SpringSupport):
            found.append(SupportOutcome("spring", -support.stiffness * moved))
        elif isinstance(support, FixedSupport):
            found.append(SupportOutcome("fixed", 0.0))
        else:
            found.append(next(stops))
    return _with_the_rest(found, left)


def _stops(results: Results, state: int, joint: int) -> list[SupportOutcome]:
    stops, solution = results.chain.stops, results.solution
    first, last = np.searchsorted(stops.joint, [joint, joint + 1]).tolist()
    found = []
    for i in range(first, last):
        push, gap = float(solution.push[state, i]), float(solution.gap[state, i])
        contact: Contact = "closed" if push > 0.0 else "open"
        found.append(SupportOutcome("stop", -float(stops.side[i]) * push, contact, gap))
    return found


def _with_the_rest(found: list[SupportOutcome], reaction: float) -> tuple[SupportOutcome, ...]:
    """The reaction is the fixed support's, beside which nothing gives way, or that of a spring alone."""
    for index, one in enumerate(found):
        if one.kind == "fixed":
            found[index] = SupportOutcome("fixed", reaction)
            break
    else:
        if len(found) == 1 and found[0].kind == "spring":
            found[0] = SupportOutcome("spring", reaction)
    return tuple(found)
