"""What a finding is about: one segment's stress, or one limit, over all combinations.

A finding stands for several checks; its subject is what they have in common, so that a filter, a cure and the
row in the panel all mean the same.
"""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass
from typing import Literal, TypeAlias

from solver.checks import Check

# Of fatigue, that of a segment and that of a shoulder at a joint.
SubjectKind: TypeAlias = Literal[
    "stress", "peak", "displacement", "relative", "reaction", "fatigue", "fatigue_joint", "stability"
]


@dataclass(frozen=True, slots=True)
class Subject:
    """What checks are of: a segment, or a joint (two, for a relative displacement), by mark.

    Stability is the whole member's and has no mark.
    """

    kind: SubjectKind
    marks: tuple[str, ...]


def subject_of(check: Check) -> Subject:
    """What the check is of."""
    if check.check == "tension" or check.check == "compression":
        return Subject("stress", (str(check.segment),))
    if check.check == "fatigue":
        return _fatigue(check)
    if check.check == "stability":
        return Subject("stability", ())
    marks = (check.joint,) if check.joint is not None else (check.start, check.end)
    return Subject(check.check, tuple(map(str, marks)))


def _fatigue(check: Check) -> Subject:
    if check.joint is None:
        return Subject("fatigue", (str(check.segment),))
    return Subject("fatigue_joint", (check.joint,))


def worst_by_subject(checks: Iterable[Check]) -> dict[Subject, Check]:
    """The made check of largest utilisation of each subject, the first of equals."""
    worst: dict[Subject, Check] = {}
    for check in checks:
        subject = subject_of(check)
        if check.utilisation is not None and check.utilisation > utilisation_of(worst.get(subject)):
            worst[subject] = check
    return worst


def worst_first(checks: Iterable[Check]) -> list[Check]:
    """The same, the worst first."""
    return sorted(worst_by_subject(checks).values(), key=utilisation_of, reverse=True)


def utilisation_of(check: Check | None) -> float:
    """A check's utilisation; less than any where there is none."""
    return -1.0 if check is None or check.utilisation is None else check.utilisation
