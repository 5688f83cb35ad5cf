"""The gate every edit passes: what is not well formed is refused with its faults, and nothing changes."""

from __future__ import annotations

from app.decode import convert, project_type
from app.encode import plain
from solver import validation
from solver.faults import Fault, Place, Rule, place_text
from solver.model import Project


class EditError(Exception):
    """The edit would not give a well-formed project, or cannot be made; `faults` says why."""

    def __init__(self, faults: tuple[Fault, ...]) -> None:
        super().__init__("; ".join(f"{fault.place}: {fault.rule}" for fault in faults))
        self.faults = faults


def refused(place: Place, rule: Rule, **facts: object) -> EditError:
    """The error for one fault."""
    return EditError((Fault(place_text(place), rule, facts),))


def consistent(project: Project) -> Project:
    """The project itself, its single values being right already; EditError for faults of records together."""
    faults = validation.faults(project)
    if faults:
        raise EditError(faults)
    return project


def checked(project: Project) -> Project:
    """The project itself, every value of it looked at again; EditError where it is not well formed."""
    faults: list[Fault] = []
    convert(plain(project), project_type(), (), faults)
    if faults:
        raise EditError(tuple(faults))
    return consistent(project)
