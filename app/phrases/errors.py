"""The sentences of everything that can go wrong with an input: the solver's errors and lists of faults."""

from __future__ import annotations

from collections.abc import Callable, Mapping
from typing import Final, Protocol, runtime_checkable

from app.numerals import at_most, reading
from app.phrases.faults import fault_sentence
from app.words import later, tr
from solver.errors import BoundNotMet, InputError, NotSolvable, OutOfRange, StiffnessContrast
from solver.faults import Fault
from solver.model import Project, UnitSystemName

ERRORS: Final[Mapping[type[InputError], str]] = {
    StiffnessContrast: later(
        "{combination}: stiffnesses are so far apart that the digits do not suffice ({share} times the"
        " largest force is left over at joint {joint}); look for springs or bedding that are very stiff or"
        " very soft, and join tiny segments"
    ),
    BoundNotMet: later(
        "{combination}: the numerical error can be held to {bound} only, {tolerance} is wanted; look for"
        " strong tapers and very stiff bedding and split those segments"
    ),
    OutOfRange: later(
        "{combination}: {what} goes beyond the numbers that can be computed with; look for a value that"
        " is far too large or too small"
    ),
}
_WHATS: Final[Mapping[str, str]] = {
    "stiffness": later("a stiffness"),
    "displacement": later("a displacement"),
    "force": later("a force"),
    "energy": later("an energy"),
    "stress": later("a stress"),
    "allowable": later("an allowable stress"),
    "utilisation": later("a utilisation"),
    "mass": later("the mass"),
}
_IN: Final = later("{sentence} ({combinations})")


@runtime_checkable
class _Faulty(Protocol):
    """An error that carries faults: a project file's, an edit's, the solver's."""

    faults: tuple[Fault, ...]


def error_sentences(
    error: Exception, *, project: Project | None = None, system: UnitSystemName | None = None
) -> tuple[str, ...]:
    """One sentence for each thing to mend; TypeError for an error that is not of the input.

    The project, where there is one, lends its marks; a system turns faults into the tables' words and units.
    """
    if isinstance(error, NotSolvable):
        return tuple(_unsolvable(fault, error.combinations, system) for fault in error.faults)
    if isinstance(error, _Faulty):
        return tuple(fault_sentence(fault, system) for fault in error.faults)
    for kind, template in ERRORS.items():
        if isinstance(error, kind):
            return (tr(template).format_map(_FACTS[kind](error, project)),)
    raise TypeError(type(error).__name__) from error


def _unsolvable(fault: Fault, combinations: tuple[str, ...], system: UnitSystemName | None) -> str:
    """The fault and the combinations that it keeps from being solved."""
    sentence = fault_sentence(fault, system)
    return (
        tr(_IN).format(sentence=sentence, combinations=", ".join(combinations)) if combinations else sentence
    )


def _contrast_facts(error: StiffnessContrast, project: Project | None) -> dict[str, str]:
    mark = project.joints[error.joint].mark if project else tr("number {count}").format(count=error.joint + 1)
    share = reading(error.residual / error.largest_force, 1) if error.largest_force else "1"
    return {"combination": error.combination, "joint": mark, "share": share}


def _bound_facts(error: BoundNotMet, _project: Project | None) -> dict[str, str]:
    return {
        "combination": error.combination,
        "bound": at_most(error.bound),
        "tolerance": reading(error.tolerance, 1),
    }


def _range_facts(error: OutOfRange, _project: Project | None) -> dict[str, str]:
    return {"combination": error.combination, "what": tr(_WHATS.get(error.what, error.what))}


_FACTS: Final[Mapping[type[InputError], Callable[..., dict[str, str]]]] = {
    StiffnessContrast: _contrast_facts,
    BoundNotMet: _bound_facts,
    OutOfRange: _range_facts,
}
