"""What stops do in a state, gathered for whoever says or shows it: closed with a force, or open with what is
left of the clearance.
"""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass

from solver.model import Project, StopSupport, supports_of
from solver.outcomes import support_outcomes
from solver.results import Results


@dataclass(frozen=True, slots=True)
class StopState:
    """One stop in one state; `number` is its place among the supports of its joint, `alone` whether it is it.

    `push` is the contact force, 0 where it is open; `left` what remains of the clearance, 0 where closed.
    """

    joint: int
    mark: str
    number: int
    stop: StopSupport
    alone: bool
    closed: bool
    push: float  # N
    left: float  # m


def has_stops(project: Project) -> bool:
    """Whether there is any stop."""
    return any(isinstance(s, StopSupport) for joint in project.joints for s in supports_of(joint))


def stop_states(results: Results, state: int) -> tuple[StopState, ...]:
    """All stops in one state, along the chain."""
    return tuple(_stop_states(results, state))


def _stop_states(results: Results, state: int) -> Iterator[StopState]:
    for index, joint in enumerate(results.project.joints):
        supports = supports_of(joint)
        if not any(isinstance(support, StopSupport) for support in supports):
            continue
        outcomes = support_outcomes(results, state, index)
        for number, (support, outcome) in enumerate(zip(supports, outcomes, strict=True)):
            if isinstance(support, StopSupport):
                yield StopState(
                    index,
                    joint.mark,
                    number,
                    support,
                    len(supports) == 1,
                    outcome.contact == "closed",
                    abs(outcome.force),
                    outcome.clearance or 0.0,
                )
