"""What is drawn: a project and the loads of the shown state, as the solver packs them."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from app.shown import Shown
from solver.chain import Loads
from solver.model import Project, UnitSystemName
from solver.packing import pack_loads, states_of
from solver.shoulders import Notch, notches


@dataclass(frozen=True, slots=True)
class Member:
    """A project, its joints' positions, and loads of one state (None for the envelope)."""

    project: Project
    position: tuple[float, ...]
    loads: Loads | None
    shoulders: tuple[Notch, ...] = ()

    @classmethod
    def of(cls, project: Project, shown: Shown) -> Member:
        """The member with the loads of what is shown."""
        lengths = [segment.length for segment in project.segments]
        position = tuple(map(float, np.concatenate([[0.0], np.cumsum(lengths)])))
        return cls(project, position, _loads(project, shown), notches(project))

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
