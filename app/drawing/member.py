"""What is drawn: a project and the loads of the shown state, as the solver packs them."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass

import numpy as np

from app.beside import beside
from app.shown import Shown
from solver.chain import Loads
from solver.model import Project, SegmentLoad, UnitSystemName, end_of
from solver.packing import pack_loads, states_of
from solver.shoulders import Notch, notches


@dataclass(frozen=True, slots=True)
class Acting:
    """What acts on a companion's segment: load along +x and temperature rise at both ends, lack of fit."""

    load: tuple[float, float]
    heat: tuple[float, float]
    fit: float


def acting_beside(project: Project, factors: Mapping[str, float]) -> tuple[Acting, ...]:
    """What acts on each segment of the companions where the load cases have these factors."""
    sums = {of.segment.mark: [0.0] * 5 for of in beside(project)}
    for case in project.load_cases:
        factor = factors.get(case.name, 0.0)
        for load in case.segment_loads if factor else ():
            own = sums.get(load.segment, [])
            for place, value in enumerate(_numbers(load)) if own else ():
                own[place] += factor * value
    return tuple(Acting((a, b), (c, d), e) for a, b, c, d, e in sums.values())


def _numbers(load: SegmentLoad) -> tuple[float, float, float, float, float]:
    load_end = end_of(load.load_start, load.load_end)
    heat_end = end_of(load.temperature_start, load.temperature_end)
    return load.load_start, load_end, load.temperature_start, heat_end, load.lack_of_fit


@dataclass(frozen=True, slots=True)
class Member:
    """A project, its joints' positions, and loads of one state (None for the envelope)."""

    project: Project
    position: tuple[float, ...]
    loads: Loads | None
    shoulders: tuple[Notch, ...] = ()
    beside: tuple[Acting, ...] = ()  # on the companions' segments; empty without a single state

    @classmethod
    def of(cls, project: Project, shown: Shown) -> Member:
        """The member with the loads of what is shown."""
        lengths = [segment.length for segment in project.segments]
        position = tuple(map(float, np.concatenate([[0.0], np.cumsum(lengths)])))
        factors = _factors(project, shown) if project.companions else None
        beside = () if factors is None else acting_beside(project, factors)
        return cls(project, position, _loads(project, shown), notches(project), beside)

    @property
    def system(self) -> UnitSystemName:
        """The display unit system."""
        return self.project.display.unit_system


def _loads(project: Project, shown: Shown) -> Loads | None:
    """The loads of the shown state, arrays with one row; None where there is no such single state."""
    for state in states_of(project):
        if (state.kind, state.name) == (shown.kind, shown.name):
            return pack_loads(project, (state,))
    return None


def _factors(project: Project, shown: Shown) -> Mapping[str, float] | None:
    """The factors of the load cases in the shown state; None where there is no such single state."""
    found = (s.factors for s in states_of(project) if (s.kind, s.name) == (shown.kind, shown.name))
    return next(found, None)
