"""Load cases, and the combinations that name them."""

from __future__ import annotations

from collections.abc import Iterable

from msgspec import UnsetType, structs

from app.edits.cells import set_value
from app.edits.checking import consistent
from app.edits.records import kept, mapped
from solver.model import Combination, Project


def remove_case(project: Project, name: str) -> Project:
    """The project without the load case, and without the factors that name it."""

    def without(combination: Combination) -> Combination:
        factors = {case: factor for case, factor in combination.factors.items() if case != name}
        return structs.replace(combination, factors=factors) if name in combination.factors else combination

    cases = kept(project.load_cases, lambda case: case.name != name)
    combinations = mapped(project.combinations, without)
    return consistent(structs.replace(project, load_cases=cases, combinations=combinations))


def remove_combinations(project: Project, indices: Iterable[int]) -> Project:
    """The project without these combinations, and without the ranges of fatigue from or to one of them."""
    names = {project.combinations[index].name for index in indices}
    combinations = kept(project.combinations, lambda combination: combination.name not in names)
    fatigue = kept(project.fatigue, lambda swing: not {swing.start, swing.end} & names)
    return consistent(structs.replace(project, combinations=combinations, fatigue=fatigue))


def set_factor(project: Project, combination: str, case: str, factor: float | UnsetType) -> Project:
    """The project with the case's factor in the combination set; UNSET leaves the case out of it."""
    index = next(i for i, found in enumerate(project.combinations) if found.name == combination)
    return set_value(project, ("combinations", index, "factors", case), factor)
