"""Load cases, and the combinations that name them."""

from __future__ import annotations

from msgspec import UnsetType, structs

from app.edits.cells import add_record, set_value
from app.edits.checking import consistent
from app.edits.records import free_name, kept, mapped
from solver.model import Combination, LoadCase, Project


def add_case(project: Project, name: str) -> Project:
    """The project with an empty load case called `name`, or like it with a number where that is taken."""
    taken = (case.name for case in project.load_cases)
    return add_record(project, ("load_cases",), LoadCase(free_name(taken, name)))


def remove_case(project: Project, name: str) -> Project:
    """The project without the load case, and without the factors that name it."""

    def without(combination: Combination) -> Combination:
        factors = {case: factor for case, factor in combination.factors.items() if case != name}
        return structs.replace(combination, factors=factors) if name in combination.factors else combination

    cases = kept(project.load_cases, lambda case: case.name != name)
    combinations = mapped(project.combinations, without)
    return consistent(structs.replace(project, load_cases=cases, combinations=combinations))


def add_combination(project: Project, name: str) -> Project:
    """The project with a combination of all cases with factor 1, called `name` or like it with a number."""
    taken = (combination.name for combination in project.combinations)
    factors = {case.name: 1.0 for case in project.load_cases}
    return add_record(project, ("combinations",), Combination(free_name(taken, name), factors))


def set_factor(project: Project, combination: str, case: str, factor: float | UnsetType) -> Project:
    """The project with the case's factor in the combination set; UNSET leaves the case out of it."""
    index = next(i for i, found in enumerate(project.combinations) if found.name == combination)
    return set_value(project, ("combinations", index, "factors", case), factor)
