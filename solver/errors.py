"""What the solver raises: each a named error with its facts as attributes, never a logged warning.

`InputError` and its kin mean "this input cannot be computed" and become a sentence for the user; anything
else that escapes the solver is a fault of ours.
"""

from __future__ import annotations

from solver.faults import Fault


class Cancelled(Exception):  # noqa: N818 - not an error: the caller asked for it
    """The caller withdrew the request between two stages of the solution."""


def never() -> bool:
    """The answer of a caller that never cancels."""
    return False


class InputError(Exception):
    """Base of everything that a change of the input cures."""


class NotSolvable(InputError):  # noqa: N818 - the contract's own word
    """Well formed but not solvable; `combinations` names where, `faults` say what is missing.

    `states` are the indices of those states among the ones to be solved, where only some are concerned.
    """

    def __init__(
        self, faults: tuple[Fault, ...], combinations: tuple[str, ...], states: tuple[int, ...] = ()
    ) -> None:
        super().__init__(f"not solvable in {', '.join(combinations)}: {', '.join(f.rule for f in faults)}")
        self.faults = faults
        self.combinations = combinations
        self.states = states


class StiffnessContrast(InputError):  # noqa: N818
    """Stiffnesses so far apart that the joint equilibrium loses its digits.

    `residual` (N) is the largest force left over, `largest_force` (N) what it is measured against, and
    `joint` the index of the joint with the largest leftover.
    """

    def __init__(self, combination: str, joint: int, residual: float, largest_force: float) -> None:
        super().__init__(f"{combination}: {residual:g} N left over at joint {joint} of {largest_force:g} N")
        self.combination = combination
        self.joint = joint
        self.residual = residual
        self.largest_force = largest_force


class BoundNotMet(InputError):  # noqa: N818
    """Refinement ended before the error bound met the tolerance in `combination`."""

    def __init__(self, combination: str, bound: float, tolerance: float) -> None:
        super().__init__(f"{combination}: error bound {bound:g}, wanted {tolerance:g}")
        self.combination = combination
        self.bound = bound
        self.tolerance = tolerance


class OutOfRange(InputError):  # noqa: N818
    """Numbers so large or so small that floating point cannot hold what follows from them."""

    def __init__(self, combination: str, what: str) -> None:
        super().__init__(f"{combination}: {what} is not finite")
        self.combination = combination
        self.what = what
